package combine

import (
	"fmt"
	"maps"
	"math"
	"slices"
	"testing"

	"github.com/stretchr/testify/require"
	"pgregory.net/rapid"

	"spanwright/lang/model"
)

// drawCases draws a small model with cases of all kinds and alternates.
func drawCases(t *rapid.T) *model.Model {
	m := &model.Model{}
	for i := range rapid.IntRange(0, 5).Draw(t, "cases") {
		kind := model.CaseKind(rapid.IntRange(int(model.Permanent), int(model.Settlement)).Draw(t, "kind"))
		c := model.Case{Name: fmt.Sprintf("c%d", i), Kind: kind}
		if kind == model.Imposed {
			c.Category = rapid.SampledFrom([]byte{0, 'A', 'E', 'H'}).Draw(t, "category")
		}
		m.Cases = append(m.Cases, c)
	}
	if len(m.Cases) > 1 && rapid.Bool().Draw(t, "alternates") {
		two := rapid.Permutation([]int{0, 1, len(m.Cases) - 1}).Draw(t, "alternate")[:2]
		// Only among cases that may be absent: alternates of permanent cases
		// have a test of their own.
		if two[0] != two[1] && m.Cases[two[0]].Kind != model.Permanent && m.Cases[two[1]].Kind != model.Permanent {
			m.Alternates = []model.Alternate{{Cases: two}}
		}
	}
	return m
}

// exhaustive tries, for every leading action and none, every way in which each
// case takes one of the factors that EN 1990 (6.10) or (6.14b) allows it, and
// keeps what breaks no rule: a second way of forming the same set.
func exhaustive(m *model.Model, strength bool) map[string]bool {
	gammaG, gammaQ := []float64{1.35, 1}, 1.5
	if !strength {
		gammaG, gammaQ = []float64{1}, 1
	}
	allowed := func(c *model.Case, leading Action) []float64 {
		switch {
		case c.Kind == model.Permanent:
			return gammaG
		case c.Kind == model.Settlement:
			return []float64{0, gammaG[0]}
		case ActionOf(c) == leading:
			return []float64{0, gammaQ}
		}
		return []float64{0, math.Round(gammaQ*en1990PsiTable[ActionOf(c)][0]*1e12) / 1e12}
	}
	found := map[string]bool{}
	for _, leading := range append(variableActions(), Action{Kind: -1}) {
		factors := make([]float64, len(m.Cases))
		var walk func(i int)
		walk = func(i int) {
			if i < len(m.Cases) {
				for _, f := range allowed(&m.Cases[i], leading) {
					factors[i] = f
					walk(i + 1)
				}
				return
			}
			leads, others, roof, weather, empty := false, false, false, false, true
			var list []model.Factor
			for i, f := range factors {
				if f == 0 {
					continue
				}
				c := &m.Cases[i]
				empty = false
				variable := c.Kind != model.Permanent && c.Kind != model.Settlement
				leads = leads || ActionOf(c) == leading
				others = others || variable && ActionOf(c) != leading
				roof = roof || ActionOf(c) == imposedOf('H')
				weather = weather || c.Kind == model.Snow || c.Kind == model.Wind
				list = append(list, model.Factor{Case: i, Factor: f})
			}
			clash := slices.ContainsFunc(m.Alternates, func(a model.Alternate) bool {
				return factors[a.Cases[0]] != 0 && factors[a.Cases[1]] != 0
			})
			if empty || clash || roof && weather || others && !leads {
				return
			}
			found[factorKey(list)] = true
		}
		walk(0)
	}
	return found
}

func TestGeneratedEqualsExhaustive(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		m := drawCases(t)
		strength := rapid.Bool().Draw(t, "strength")
		situation := model.Characteristic
		if strength {
			situation = model.Strength
		}
		m.Families = []model.Family{{Name: "F", Code: model.EN1990, Situation: situation}}
		set, problems := Expand(m)
		require.Empty(t, problems)
		got := map[string]bool{}
		names := map[string]bool{}
		for _, c := range set.All {
			require.False(t, got[factorKey(c.Factors)], "duplicate %s", c.Name)
			require.False(t, names[c.Name], "name %s twice", c.Name)
			got[factorKey(c.Factors)], names[c.Name] = true, true
		}
		want := exhaustive(m, strength)
		require.ElementsMatch(t, slices.Collect(maps.Keys(want)), slices.Collect(maps.Keys(got)))
	})
}

func TestSameSetInAnyOrderOfStatements(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		m := drawCases(t)
		code := rapid.SampledFrom([]model.Code{model.EN1990, model.ASCE7}).Draw(t, "code")
		m.Families = []model.Family{{Name: "F", Code: code, Situation: model.Strength}}
		order := make([]int, len(m.Cases))
		for i := range order {
			order[i] = i
		}
		order = rapid.Permutation(order).Draw(t, "order")
		turned := &model.Model{Families: m.Families}
		place := make([]int, len(order))
		for at, i := range order {
			turned.Cases = append(turned.Cases, m.Cases[i])
			place[i] = at
		}
		for _, a := range m.Alternates {
			turned.Alternates = append(turned.Alternates, model.Alternate{Cases: []int{place[a.Cases[0]], place[a.Cases[1]]}})
		}
		one, _ := Expand(m)
		two, _ := Expand(turned)
		require.Len(t, two.All, len(one.All))
		for k, c := range one.All {
			require.Equal(t, c.Name, two.All[k].Name)
			for _, f := range c.Factors {
				require.Contains(t, two.All[k].Factors, model.Factor{Case: place[f.Case], Factor: f.Factor})
			}
		}
	})
}
