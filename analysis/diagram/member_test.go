package diagram

import (
	"context"
	"math"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"spanwright/analysis"
	"spanwright/lang/model"
	"spanwright/lang/quantity"
)

// overhang is a beam of 6 m on A and B with an overhang of 2 m to C, one
// physical member through B, under 6 kN/m down on all of it.
func overhang(t testing.TB) analysis.Member {
	t.Helper()
	m := &model.Model{
		Plane: true, Gravity: 9.80665, Display: quantity.Metric(),
		Materials: []model.Material{{E: 210e9, G: 81e9}},
		Sections:  []model.Section{{A: 5e-3, Iy: 8e-5, Iz: 6e-6, It: 2e-7, Wy: 6e-4, Wz: 8e-5}},
		Nodes: []model.Node{
			{Name: "A"}, {Name: "B", Position: [3]float64{6, 0, 0}}, {Name: "C", Position: [3]float64{8, 0, 0}},
		},
		Members: []model.Member{{Name: "b", Nodes: []int{0, 1, 2}, Length: 8}},
	}
	axes := [3][3]float64{{1, 0, 0}, {0, 1, 0}, {0, 0, 1}}
	held := model.Restraint{Kind: model.Held}
	m.Supports = []model.Support{
		{Node: 0, Axes: axes, Freedoms: [6]model.Restraint{held, {}, held}},
		{Node: 1, Axes: axes, Freedoms: [6]model.Restraint{{}, {}, held}},
	}
	q := [3]float64{0, 0, -6e3}
	m.Cases = []model.Case{{Name: "G", Loads: []model.Load{{Kind: model.LineForce, Node: -1, Member: 0, Start: q, End: q, To: 8}}}}
	r, err := analysis.Run(context.Background(), m, nil)
	require.NoError(t, err)
	require.True(t, r.Solved(), "%v", r.Diagnostics())
	return r.Case(0).Member(0)
}

// The moment at B is −qc²/2 = −12 kNm; A takes ql/2 − 12/6 = 16 kN, so that the
// largest moment is 16²/(2·6) = 21.3 kNm at 2.67 m.
func TestTextOfAMember(t *testing.T) {
	m := overhang(t)
	moment := SectionForce(m, analysis.My)
	assert.True(t, moment.Flipped)
	assert.InEpsilon(t, 16e3*16e3/12e3, moment.Most.Value, 1e-12)
	assert.InEpsilon(t, 16.0/6, moment.Most.At, 1e-12)
	assert.InEpsilon(t, -12e3, moment.Least.Value, 1e-12)
	assert.InEpsilon(t, 6, moment.Least.At, 1e-12)
	assert.Equal(t, strings.Join([]string{
		"My + A ▂▄▅▆▇▇█████▇▆▅▄▂         C  21.3 kNm at 2.67 m",
		"   − A                 ▂▄▄▃▂▁▁▁ C  −12 kNm at 6 m",
	}, "\n"), Text(moment, 24))

	shear := SectionForce(m, analysis.Vz)
	assert.False(t, shear.Flipped)
	assert.Equal(t, "kN", shear.Unit.Symbol)
	assert.InEpsilon(t, -20e3, shear.Least.Value, 1e-12)
	assert.Equal(t, []float64{6}, shear.Steps)
}

func TestBendingShowsMomentAndShape(t *testing.T) {
	courses := Bending(overhang(t))
	require.Len(t, courses, 2)
	assert.Equal(t, "My", courses[0].Label)
	assert.Equal(t, "along z", courses[1].Label)
	assert.Equal(t, "mm", courses[1].Unit.Symbol)
	assert.Less(t, courses[1].Least.Value, 0.0)
	assert.InDelta(t, courses[1].Least.Value, courses[1].Value(courses[1].Least.At), 1e-12)
	svg, err := Picture(courses...)
	require.NoError(t, err)
	assert.Contains(t, string(svg), "21.3 kNm at 2.67 m")
	assert.False(t, math.IsNaN(courses[1].Most.Value))
}
