package element

import (
	"math"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

const (
	length = 6.0
	ei     = 210e9 * 8356e-8 // IPE 300 about y
)

func steel() Properties {
	return Properties{EA: 210e9 * 53.81e-4, EIy: ei, EIz: 210e9 * 604e-8, GIt: 80.77e9 * 20e-8}
}

func made(t *testing.T, props Properties, joints Vector) *Element {
	t.Helper()
	e, err := New(length, props, joints)
	require.NoError(t, err)
	return e
}

// Stiffness terms: Przemieniecki, Theory of Matrix Structural Analysis (1968),
// eq. 5.116 with Φ = 0, and 3EI/L, 3EI/L³ of slope–deflection.
func TestStiffnessTermsOfTheTextbook(t *testing.T) {
	k := made(t, steel(), Rigid()).Stiffness()
	assert.InEpsilon(t, steel().EA/length, k[at(6, 6)], 1e-14)
	assert.InEpsilon(t, steel().GIt/length, k[at(9, 9)], 1e-14)
	assert.InEpsilon(t, 12*ei/math.Pow(length, 3), k[at(8, 8)], 1e-14)
	assert.InEpsilon(t, 6*ei/length/length, k[at(10, 8)], 1e-14, "moment about +y at end 2 that goes with an upward force there")
	assert.InEpsilon(t, -6*steel().EIz/length/length, k[at(11, 7)], 1e-14)
	assert.InEpsilon(t, 4*ei/length, k[at(4, 4)], 1e-14)
	assert.InEpsilon(t, 2*ei/length, k[at(4, 10)], 1e-14)

	hinged := Rigid()
	hinged[10] = 0
	k = made(t, steel(), hinged).Stiffness()
	assert.InEpsilon(t, 3*ei/length, k[at(4, 4)], 1e-13)
	assert.InEpsilon(t, 3*ei/math.Pow(length, 3), k[at(8, 8)], 1e-13)
	assert.Zero(t, k[at(10, 10)])
	assert.Zero(t, k[at(10, 4)])

	// A joint k at end 1, end 2 fast: M = 1/(1/k + L/4EI), half of it carried over.
	spring := Rigid()
	spring[4] = 8e6
	k = made(t, steel(), spring).Stiffness()
	want := 1 / (1/8e6 + length/(4*ei))
	assert.InEpsilon(t, want, k[at(4, 4)], 1e-13)
	assert.InEpsilon(t, want/2, k[at(10, 4)], 1e-13)
}

func TestShearFlexibleStiffness(t *testing.T) {
	// Przemieniecki (1968) eq. 5.116: L = 1.2 m, EI = 162 MNm2, GAv = 1875 MN, Φ = 0.72.
	props := Properties{EA: 1, EIy: 30e9 * 5.4e-3, GAz: 12.5e9 * 0.15}
	e, err := New(1.2, props, Rigid())
	require.NoError(t, err)
	assert.InEpsilon(t, 0.72, ShearParameter(props.EIy, props.GAz, 1.2), 1e-14)
	k := e.Stiffness()
	assert.InEpsilon(t, 12*162e6/(1.728*1.72), k[at(8, 8)], 1e-13)
	assert.InEpsilon(t, (4+0.72)*162e6/(1.2*1.72), k[at(4, 4)], 1e-13)
	assert.InEpsilon(t, (2-0.72)*162e6/(1.2*1.72), k[at(4, 10)], 1e-13)
}

// Held-end forces: fixed-end moments of any handbook (AISC Manual table 3-23
// cases 15 to 17, from memory), as forces of the nodes on the member.
func TestFixedEndForcesOfTheHandbook(t *testing.T) {
	const q, p, a, b = -20e3, -50e3, 2.2, 3.8
	e := made(t, steel(), Rigid())
	for name, c := range map[string]struct {
		load SpanLoad
		want map[int]float64
	}{
		"uniform": {Line(0, length, [3]float64{0, 0, q}, [3]float64{0, 0, q}),
			map[int]float64{2: -q * length / 2, 8: -q * length / 2, 4: q * length * length / 12, 10: -q * length * length / 12}},
		"point": {Point(a, [3]float64{0, 0, p}, [3]float64{}),
			map[int]float64{2: -p * b * b * (length + 2*a) / math.Pow(length, 3), 4: p * a * b * b / length / length, 10: -p * a * a * b / length / length}},
		"triangle": {Line(0, length, [3]float64{}, [3]float64{0, 0, q}),
			map[int]float64{2: -3 * q * length / 20, 8: -7 * q * length / 20, 4: q * length * length / 30, 10: -q * length * length / 20}},
		"point across y": {Point(a, [3]float64{0, p, 0}, [3]float64{}),
			map[int]float64{1: -p * b * b * (length + 2*a) / math.Pow(length, 3), 5: -p * a * b * b / length / length, 11: p * a * a * b / length / length}},
		"along":   {Point(a, [3]float64{p, 0, 0}, [3]float64{}), map[int]float64{0: -p * b / length, 6: -p * a / length}},
		"torque":  {Point(a, [3]float64{}, [3]float64{p, 0, 0}), map[int]float64{3: -p * b / length, 9: -p * a / length}},
		"warming": {SpanLoad{Strain: 12e-6 * 30}, map[int]float64{0: steel().EA * 12e-6 * 30, 6: -steel().EA * 12e-6 * 30}},
		// Warmer above: the member would arch upward; held straight it hogs, tension above.
		"warmer above": {SpanLoad{StrainPerZ: 1e-5}, map[int]float64{4: ei * 1e-5, 10: -ei * 1e-5, 2: 0}},
		"on end 2":     {Point(length, [3]float64{0, 0, p}, [3]float64{0, 7, 0}), map[int]float64{8: -p, 10: -7, 2: 0, 4: 0}},
		"on end 1":     {Point(0, [3]float64{0, 0, p}, [3]float64{0, 7, 0}), map[int]float64{2: -p, 4: -7, 8: 0, 10: 0}},
	} {
		f := e.FixedEnd([]SpanLoad{c.load})
		for i, want := range c.want {
			assert.InDelta(t, want, f[i], 1e-11*(math.Abs(want)+1e4), "%s, force %d", name, i)
		}
	}
}

func TestHingedEndPassesNoMoment(t *testing.T) {
	hinged := Rigid()
	hinged[10] = 0
	f := made(t, steel(), hinged).FixedEnd([]SpanLoad{Line(0, length, [3]float64{0, 0, -20e3}, [3]float64{0, 0, -20e3})})
	// Propped cantilever: 5/8 qL, qL²/8 (AISC table 3-23 case 12, from memory).
	assert.InEpsilon(t, 5.0/8*20e3*length, f[2], 1e-13)
	assert.InEpsilon(t, -20e3*length*length/8, f[4], 1e-13)
	assert.Zero(t, f[10])
}

func TestSimpleBeamCourses(t *testing.T) {
	joints := Rigid()
	joints[4], joints[10] = 0, 0
	e := made(t, steel(), joints)
	c := e.Recover(Vector{}, []SpanLoad{Line(0, length, [3]float64{0, 0, -20e3}, [3]float64{0, 0, -20e3})}, nil)
	most, _ := c.Range(My)
	assert.InEpsilon(t, 90e3, most.Value, 1e-13, "sagging is positive: qL²/8")
	assert.InDelta(t, 3, most.At, 1e-12)
	assert.InEpsilon(t, 30e3, c.At(Vz, 1.5, Before), 1e-13)
	_, least := c.Range(BentW)
	assert.InEpsilon(t, -5*20e3*math.Pow(length, 4)/(384*ei), least.Value, 1e-13)
	assert.InEpsilon(t, 20e3*math.Pow(length, 3)/(24*ei), c.At(ThetaY, 0, After), 1e-13, "end 1 turns z toward x")
}

func TestBothSidesOfAStep(t *testing.T) {
	joints := Rigid()
	joints[4], joints[10] = 0, 0
	c := made(t, steel(), joints).Recover(Vector{}, []SpanLoad{Point(2, [3]float64{}, [3]float64{0, 40e3, 0})}, nil)
	assert.InEpsilon(t, -13333.333333333334, c.At(My, 2, Before), 1e-12)
	assert.InEpsilon(t, 26666.666666666668, c.At(My, 2, After), 1e-12)
}

func TestBarCarriesLoadsAcrossItAsASimpleBeam(t *testing.T) {
	e, err := NewBar(length, Properties{EA: 1e8, EIy: ei})
	require.NoError(t, err)
	load := []SpanLoad{Point(2, [3]float64{300, 0, -900}, [3]float64{})}
	f := e.FixedEnd(load)
	assert.InDeltaSlice(t, []float64{-200, 0, 600, 0, 0, 0, -100, 0, 300, 0, 0, 0}, f[:], 1e-9)
	c := e.Recover(Vector{}, load, nil)
	assert.InDelta(t, 1200, c.At(My, 2, Before), 1e-9)
	assert.True(t, c.BentZKnown)
	soft, err := NewBar(length, Properties{EA: 1e8})
	require.NoError(t, err)
	assert.False(t, soft.Recover(Vector{}, load, nil).BentZKnown, "without Iy nobody knows the sag")
}

func TestLooseMembersAreRefused(t *testing.T) {
	for _, released := range [][]int{{0, 6}, {3, 9}, {4, 10, 2}, {2, 8}, {5, 11, 7}} {
		joints := Rigid()
		for _, i := range released {
			joints[i] = 0
		}
		_, err := New(length, steel(), joints)
		assert.ErrorIs(t, err, ErrLoose, "%v", released)
	}
	_, err := New(0, steel(), Rigid())
	assert.ErrorIs(t, err, ErrLength)
	_, err = New(1, Properties{EA: math.NaN()}, Rigid())
	assert.ErrorIs(t, err, ErrProperties)
}
