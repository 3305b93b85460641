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

// sizes are the buildings that benchmarks solve.
var sizes = []struct{ members, bays, storeys int }{{100, 3, 3}, {1000, 7, 6}, {10000, 16, 12}}

// BenchmarkKeystroke is the way from the resolved model to what an editor shows:
// the reactions of all supports, what governs the members in view, and limits
// over all members; from nothing, and after an edit of a load, of a section that
// two thirds of the members have, and of one member.
func BenchmarkKeystroke(b *testing.B) {
	for _, size := range sizes {
		m := building(b, size.bays, size.storeys, 20)
		limited(m)
		first := run(b, &builder{b, m})
		for _, e := range []struct {
			name  string
			edit  func(*model.Model) *model.Model
			start *Results
			way   string
		}{
			{"fresh", func(m *model.Model) *model.Model { return m }, nil, "anew"},
			{"load", editLoad, first, "loads only"},
			{"section", editSection, first, "order kept"},
			{"member", editMember, first, "factor kept"},
		} {
			b.Run(fmt.Sprintf("members=%d/%s", size.members, e.name), func(b *testing.B) {
				edited := e.edit(m)
				b.ReportAllocs()
				for b.Loop() {
					require.Contains(b, show(b, edited, e.start).Way(), e.way)
				}
			})
		}
	}
}

// show works out what an editor shows.
func show(b *testing.B, m *model.Model, previous *Results) *Results {
	ctx := context.Background()
	r, err := Run(ctx, m, previous)
	require.NoError(b, err)
	require.True(b, r.Solved(), "%v", r.Diagnostics())
	e := r.Envelope(0)
	require.NotEmpty(b, e.SupportRows())
	const inView = 60
	for member := range min(inView, len(m.Members)) {
		require.NotEmpty(b, e.Governing(member))
	}
	limits, err := r.Limits(ctx)
	require.NoError(b, err)
	require.Len(b, limits, 2)
	return r
}

// limited adds a limit on the stress of all members, and one on the drift.
func limited(m *model.Model) {
	stress := model.Limit{Measure: model.Stress, Node: -1, OtherNode: -1, AtMost: true, Under: model.Under{Families: []int{0}}}
	for i := range m.Members {
		stress.Targets = append(stress.Targets, model.Target{Member: i, Bound: 275e6})
	}
	sway := model.Limit{Measure: model.Movement, Node: len(m.Nodes) - 1, OtherNode: -1, AtMost: true, Under: stress.Under,
		Targets: []model.Target{{Member: -1, Bound: 0.1}}}
	m.Limits = []model.Limit{stress, sway}
}

func editLoad(m *model.Model) *model.Model {
	edited := *m
	edited.Cases = append([]model.Case(nil), m.Cases...)
	c := &edited.Cases[3]
	c.Loads = append([]model.Load(nil), c.Loads...)
	c.Loads[0].Start[2] *= 1.25
	return &edited
}

// editSection gives all beams another section.
func editSection(m *model.Model) *model.Model {
	edited := *m
	edited.Sections = append(append([]model.Section(nil), m.Sections...), m.Sections[0])
	edited.Sections[1].Iy *= 1.2
	edited.Members = append([]model.Member(nil), m.Members...)
	for i := range edited.Members {
		if edited.Members[i].Length == 6 {
			edited.Members[i].Section = 1
		}
	}
	return &edited
}

// editMember hinges an end of one member.
func editMember(m *model.Model) *model.Model {
	edited := *m
	edited.Members = append([]model.Member(nil), m.Members...)
	edited.Members[len(m.Members)/2].Ends[1].Joint[4].Kind = model.Released
	return &edited
}

// BenchmarkEnvelopes is the envelope of everything along all members.
func BenchmarkEnvelopes(b *testing.B) {
	for _, combinations := range []int{20, 200} {
		m := building(b, 16, 12, combinations)
		r := run(b, &builder{b, m})
		b.Run(fmt.Sprintf("members=%d/combinations=%d", len(m.Members), combinations), func(b *testing.B) {
			b.ReportAllocs()
			for b.Loop() {
				require.NoError(b, Prepare(context.Background(), r.familyEnvelopes()...))
			}
		})
	}
}
