package analysis

import (
	"context"
	"fmt"
	"testing"

	"github.com/stretchr/testify/require"

	"spanwright/lang/model"
)

// building makes a space frame of bays × bays × storeys with fixed feet, eight
// load cases on all its beams, and a family of written combinations.
func building(t testing.TB, bays, storeys, combinations int) *model.Model {
	b := build(t, false)
	m := b.m
	name := func(i, j, k int) string { return fmt.Sprintf("n%d_%d_%d", i, j, k) }
	index := map[string]int{}
	for k := range storeys + 1 {
		for i := range bays + 1 {
			for j := range bays + 1 {
				index[name(i, j, k)] = len(m.Nodes)
				b.node(name(i, j, k), 6*float64(i), 6*float64(j), 3.5*float64(k))
			}
		}
	}
	add := func(from, to string, length float64) {
		m.Members = append(m.Members, model.Member{Name: from + to, Nodes: []int{index[from], index[to]}, Length: length})
	}
	for k := range storeys {
		for i := range bays + 1 {
			for j := range bays + 1 {
				add(name(i, j, k), name(i, j, k+1), 3.5)
				if i < bays {
					add(name(i, j, k+1), name(i+1, j, k+1), 6)
				}
				if j < bays {
					add(name(i, j, k+1), name(i, j+1, k+1), 6)
				}
			}
		}
	}
	for i := range bays + 1 {
		for j := range bays + 1 {
			b.holds(name(i, j, 0), "ux uy uz rx ry rz")
		}
	}
	for c := range 8 {
		var loads []model.Load
		for i := range m.Members {
			if m.Members[i].Length == 6 {
				loads = append(loads, b.line(i, 100*float64(c%3), -1e3*float64(c+1+i%5)))
			}
		}
		b.load(fmt.Sprintf("c%d", c), model.Permanent, loads...)
	}
	m.Families = []model.Family{{Name: "F"}}
	for n := range combinations {
		c := model.Combination{Name: fmt.Sprintf("F.n%d", n)}
		for k := range 8 {
			if k == 0 || (n>>(k%5))&1 == 0 {
				c.Factors = append(c.Factors, model.Factor{Case: k, Factor: 1 + 0.05*float64((n+k)%11)})
			}
		}
		m.Combinations = append(m.Combinations, c)
	}
	return m
}

// BenchmarkRun is a solve from nothing, and one after an edit of a load, both to
// the reactions of all supports.
func BenchmarkRun(b *testing.B) {
	for _, size := range []struct{ members, bays, storeys int }{{100, 3, 3}, {1000, 7, 6}, {10000, 16, 12}} {
		m := building(b, size.bays, size.storeys, 20)
		b.Run(fmt.Sprintf("fresh/members=%d", len(m.Members)), func(b *testing.B) {
			for b.Loop() {
				reactions(b, m, nil)
			}
		})
		first := reactions(b, m, nil)
		b.Run(fmt.Sprintf("loads/members=%d", len(m.Members)), func(b *testing.B) {
			for b.Loop() {
				reactions(b, m, first)
			}
		})
	}
}

func reactions(b *testing.B, m *model.Model, previous *Results) *Results {
	r, err := Run(context.Background(), m, previous)
	require.NoError(b, err)
	require.True(b, r.Solved(), "%v", r.Diagnostics())
	require.NotEmpty(b, r.Envelope(0).SupportRows())
	return r
}

// BenchmarkEnvelopes is the envelope of everything along all members.
func BenchmarkEnvelopes(b *testing.B) {
	for _, combinations := range []int{20, 200} {
		m := building(b, 16, 12, combinations)
		r := reactions(b, m, nil)
		b.Run(fmt.Sprintf("members=%d/combinations=%d", len(m.Members), combinations), func(b *testing.B) {
			b.ReportAllocs()
			for b.Loop() {
				require.NoError(b, Prepare(context.Background(), r.familyEnvelopes()...))
			}
		})
	}
}
