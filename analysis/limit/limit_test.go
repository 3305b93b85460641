package limit

import (
	"math"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"spanwright/analysis/element"
	"spanwright/analysis/envelope"
	"spanwright/lang/model"
)

// fixed is a source with given results.
type fixed struct {
	along     map[int]*envelope.Member
	movements map[[2]int][]float64
	reactions map[[2]int][]float64
}

func (f *fixed) Along(member int) *envelope.Member { return f.along[member] }

func (f *fixed) Movement(node, freedom int) []float64 { return f.movements[[2]int{node, freedom}] }

func (f *fixed) Reaction(node, freedom int) []float64 { return f.reactions[[2]int{node, freedom}] }

// member makes quantities along a member of 4 m from polynomials by component
// and state; what is not given is zero in all states.
func member(states int, given map[element.Component][]element.Polynomial) *envelope.Member {
	pieces := make([][]element.Piece, states)
	for s := range pieces {
		pieces[s] = []element.Piece{{From: 0, To: 4}}
		for c, of := range given {
			pieces[s][0].Courses[c] = of[s]
		}
	}
	return envelope.NewMember(pieces, true)
}

// girder has G and W as states: moments of a 4 m simple beam under 3 kN/m and
// −5 kN/m, an axial force of −8 and +10 kN.
func girder() *fixed {
	return &fixed{
		along: map[int]*envelope.Member{0: member(2, map[element.Component][]element.Polynomial{
			element.N:     {{-8e3}, {10e3}},
			element.Vz:    {{6e3, -3e3}, {-10e3, 5e3}},
			element.My:    {{0, 6e3, -1.5e3}, {0, -10e3, 2.5e3}},
			element.BentW: {{0, -0.004, 0.001}, {0, 0.006, -0.0015}},
		})},
		movements: map[[2]int][]float64{{1, 0}: {0.002, -0.015}, {1, 1}: {0, 0}, {2, 0}: {0.001, -0.006}, {2, 1}: {0, 0.012}},
		reactions: map[[2]int][]float64{{0, 2}: {12e3, -9e3}},
	}
}

var sums = []envelope.Sum{{{State: 0, Factor: 1.35}}, {{State: 0, Factor: 1}, {State: 1, Factor: 1.5}}}

func model1(l model.Limit) *model.Model {
	if l.Targets == nil {
		l.Targets = []model.Target{{Member: -1, Bound: 0}}
	}
	return &model.Model{
		Members:  []model.Member{{Name: "r", Section: 0}},
		Sections: []model.Section{{Name: "s", A: 2e-3, Wy: 1e-4, Wz: 2e-5, Avz: 1e-3}},
		Limits:   []model.Limit{l},
	}
}

func TestEachMeasure(t *testing.T) {
	of := func(member int, bound float64) []model.Target {
		return []model.Target{{Member: member, Bound: bound}}
	}
	for _, c := range []struct {
		name           string
		limit          model.Limit
		value, at      float64 // NaN: no place
		sum            int
		ratio          float64
		holds          bool
		secondOfTheTwo float64 // the value of the other combination
	}{
		{"deflection", model.Limit{Measure: model.Deflection, AtMost: true, Targets: of(0, 0.016)}, 0.0054, 2, 0, 0.3375, true, 0.005},
		{"shear", model.Limit{Measure: model.ShearForce, AtMost: true, Targets: of(0, 9e3)}, 9e3, 0, 1, 1, true, 8.1e3},
		{"moment", model.Limit{Measure: model.BendingMoment, AtMost: true, Targets: of(0, 5e3)}, 9e3, 2, 1, 1.8, false, 8.1e3},
		{"axial, size", model.Limit{Measure: model.AxialForce, AtMost: true, Targets: of(0, 21.6e3)}, 10.8e3, 0, 0, 0.5, true, 7e3},
		{"axial, no compression", model.Limit{Measure: model.AxialForce, Targets: of(0, 0)}, -10.8e3, 0, 0, math.Inf(1), false, 7e3},
		{"axial, no tension", model.Limit{Measure: model.AxialForce, AtMost: true, Targets: of(0, 0)}, 7e3, 0, 1, math.Inf(1), false, -10.8e3},
		// 10.8/0.002 + 8.1/1e-4 = 5.4 + 81 MPa; 7/0.002 + 9/1e-4 = 3.5 + 90 MPa.
		{"stress", model.Limit{Measure: model.Stress, AtMost: true, Targets: of(0, 187e6)}, 93.5e6, 2, 1, 0.5, true, 86.4e6},
		{"compression", model.Limit{Measure: model.Stress, Targets: of(0, -80e6)}, -86.5e6, 2, 1, 86.5 / 80, false, -86.4e6},
		{"movement, size", model.Limit{Measure: model.Movement, Node: 1, Freedom: 0, AtMost: true, Targets: of(-1, 0.01)}, 0.0205, math.NaN(), 1, 2.05, false, 0.0027},
		{"movement, signed", model.Limit{Measure: model.Movement, Node: 1, Freedom: 0, Targets: of(-1, -0.041)}, -0.0205, math.NaN(), 1, 0.5, true, 0.0027},
		{"drift", model.Limit{Measure: model.Drift, Node: 1, OtherNode: 2, AtMost: true, Targets: of(-1, 0.05)}, math.Hypot(0.0125, 0.018), math.NaN(), 1, math.Hypot(0.25, 0.36), true, 0.00135},
		{"uplift", model.Limit{Measure: model.Reaction, Node: 0, Freedom: 2, Targets: of(-1, 0)}, -1.5e3, math.NaN(), 1, math.Inf(1), false, 16.2e3},
		{"reaction at least", model.Limit{Measure: model.Reaction, Node: 0, Freedom: 2, Targets: of(-1, 1e3)}, -1.5e3, math.NaN(), 1, math.Inf(1), false, 16.2e3},
		{"reaction at most", model.Limit{Measure: model.Reaction, Node: 0, Freedom: 2, AtMost: true, Targets: of(-1, 32.4e3)}, 16.2e3, math.NaN(), 0, 0.5, true, 1.5e3},
	} {
		t.Run(c.name, func(t *testing.T) {
			got := Check(t.Context(), model1(c.limit), 0, sums, girder())
			require.Empty(t, got.Problem)
			assert.InEpsilon(t, c.value, got.Governs.Value, 1e-12)
			assert.Equal(t, c.sum, got.Governs.Sum)
			if math.IsInf(c.ratio, 1) {
				assert.True(t, math.IsInf(got.Governs.Ratio, 1))
			} else {
				assert.InEpsilon(t, c.ratio, got.Governs.Ratio, 1e-12)
			}
			assert.Equal(t, c.holds, got.Holds)
			if math.IsNaN(c.at) {
				assert.True(t, math.IsNaN(got.Governs.At))
			} else {
				assert.InDelta(t, c.at, got.Governs.At, 1e-12)
			}
			require.Len(t, got.Next, 1)
			assert.InEpsilon(t, c.secondOfTheTwo, got.Next[0].Value, 1e-12)
			assert.Equal(t, 1-c.sum, got.Next[0].Sum)
		})
	}
}

func TestSeveralMembersRankByTheirShare(t *testing.T) {
	from := girder()
	m := model1(model.Limit{Measure: model.Deflection, AtMost: true})
	for i := range 6 {
		m.Members = append(m.Members, model.Member{Section: 0})
		from.along[i] = from.along[0]
		if i == 3 {
			from.along[i] = member(2, map[element.Component][]element.Polynomial{element.BentW: {{0, -0.001}, {0, 0.03}}})
		}
		m.Limits[0].Targets = append(m.Limits[0].Targets, model.Target{Member: i, Bound: 0.1 - 0.01*float64(i)})
	}
	m.Limits[0].Targets = m.Limits[0].Targets[1:]
	got := Check(t.Context(), m, 0, sums, from)
	assert.Equal(t, 3, got.Governs.Member)
	assert.False(t, got.Holds)
	var next []int
	for _, v := range got.Next {
		next = append(next, v.Member)
	}
	assert.Equal(t, []int{5, 4, 2}, next)
}

func TestWhatCannotBeAnsweredSaysWhy(t *testing.T) {
	for _, c := range []struct {
		limit model.Limit
		words string
	}{
		{model.Limit{Measure: model.CriticalFactor}, "stability analysis"},
		{model.Limit{Measure: model.Frequency}, "vibration analysis"},
		{model.Limit{Measure: model.Deflection, AtMost: true, Targets: []model.Target{{Member: 1, Bound: 1}}}, "deflection of b is not known"},
		{model.Limit{Measure: model.Stress, AtMost: true, Targets: []model.Target{{Member: 2, Bound: 1}}}, "section t has no Wy"},
		{model.Limit{Measure: model.Stress, AtMost: true, Targets: []model.Target{{Member: 3, Bound: 1}}}, "link has no section"},
	} {
		m := model1(c.limit)
		m.Members = append(m.Members, model.Member{Name: "b"}, model.Member{Name: "c", Section: 1}, model.Member{Name: "link", Section: -1})
		m.Sections = append(m.Sections, model.Section{Name: "t", A: 1})
		from := girder()
		from.along[1] = &envelope.Member{}
		from.along[2], from.along[3] = from.along[0], from.along[0]
		got := Check(t.Context(), m, 0, sums, from)
		assert.Contains(t, got.Problem, c.words)
		assert.Equal(t, -1, got.Governs.Sum)
		assert.False(t, got.Holds)
	}
	got := Check(t.Context(), model1(model.Limit{Measure: model.Reaction, Node: 0, Freedom: 2}), 0, nil, girder())
	assert.Contains(t, got.Problem, "no combination")
}

// A round bar under My = 3 and Mz = 4 kNm has 5 kNm about the skew axis, where
// a square one of the same moduli has 3/W + 4/W in its corner.
func TestRoundSectionsHaveNoCorners(t *testing.T) {
	along := member(1, map[element.Component][]element.Polynomial{element.N: {{2e3}}, element.My: {{3e3}}, element.Mz: {{4e3}}})
	one := []envelope.Sum{{{State: 0, Factor: 1}}, {{State: 0, Factor: -1}}}
	pipe := &model.Section{Title: "pipe 114.3 × 5 mm", A: 1e-3, Wy: 1e-4, Wz: 1e-4, Iy: 1, Iz: 1}
	square := &model.Section{Title: "tube 100 × 100 × 5 mm", A: 1e-3, Wy: 1e-4, Wz: 1e-4, Iy: 1, Iz: 1}
	for _, c := range []struct {
		section *model.Section
		bending float64
	}{{pipe, 50e6}, {square, 70e6}} {
		stress, lacks := StressOf(c.section, along)
		require.Empty(t, lacks)
		assert.InEpsilon(t, c.bending+2e6, stress.Size(one, 1)[0].Value, 1e-12)
		assert.InEpsilon(t, c.bending+2e6, stress.Tension(one, 1)[0].Value, 1e-12)
		assert.Equal(t, 0, stress.Tension(one, 1)[0].Sum)
		assert.InEpsilon(t, -c.bending-2e6, stress.Compression(one, 1)[0].Value, 1e-12)
		assert.Equal(t, 1, stress.Compression(one, 1)[0].Sum)
	}
}

func TestShearStress(t *testing.T) {
	from := girder()
	m := model1(model.Limit{})
	peaks, lacks := ShearStress(&m.Sections[0], from.along[0], sums, 1)
	require.Empty(t, lacks)
	assert.InEpsilon(t, 9e6, peaks[0].Value, 1e-12)
	_, lacks = ShearStress(&model.Section{Avy: 1}, from.along[0], sums, 1)
	assert.Equal(t, "Avz", lacks)
}

func TestRatioIsAboveOneExactlyWhereBroken(t *testing.T) {
	values := []float64{-3, -1, 0, 1, 3}
	for _, value := range values {
		for _, bound := range values {
			assert.Equal(t, value > bound, Ratio(value, bound, true) > 1, "%g at most %g", value, bound)
			assert.Equal(t, value < bound, Ratio(value, bound, false) > 1, "%g at least %g", value, bound)
		}
	}
	assert.True(t, math.IsInf(Ratio(math.NaN(), 1, true), 1))
}
