package frame_test

import (
	"context"
	"math"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"spanwright/analysis/frame"
	"spanwright/lang/model"
)

// structureOf resolves and factorises a model given as text.
func structureOf(t testing.TB, text string) *frame.Structure {
	s, err := frame.Prepare(context.Background(), resolved(t, "test.span", text), nil)
	require.NoError(t, err)
	return s.Structure()
}

const simpleSection = `
material steel = { E 200 GPa, G 80 GPa }
section sec = { A 50 cm2, Iy 4000 cm4, Iz 1500 cm4, It 100 cm4 } of steel
`

// The values of simpleSection.
const (
	ea  = 200e9 * 50e-4
	eiy = 200e9 * 4000e-8
	eiz = 200e9 * 1500e-8
	git = 80e9 * 100e-8
)

func close(t *testing.T, want, got float64, what ...any) {
	t.Helper()
	assert.InDelta(t, want, got, 1e-9*math.Abs(want), what...)
}

func stiffnessAt(t *testing.T, s *frame.Structure, name string) *frame.NodeStiffness {
	for i := range s.Model().Nodes {
		if s.Model().Nodes[i].Name == name {
			k, err := s.StiffnessAt(context.Background(), i)
			require.NoError(t, err)
			return k
		}
	}
	require.Fail(t, "no node "+name)
	return nil
}

// A cantilever's tip has the stiffnesses and flexibilities of any beam table:
// 12EI/L³, 6EI/L², 4EI/L with the others held; 3EI/L³, EI/L with them free.
func TestStiffnessAtACantileversTip(t *testing.T) {
	s := structureOf(t, "model \"\" space\n"+simpleSection+`
node A = (0, 0, 0) m
node B = (4, 0, 0) m
beam b = A -> B of sec
support A fixed
`)
	const l = 4.0
	k := stiffnessAt(t, s, "B")
	require.Equal(t, []int{0, 1, 2, 3, 4, 5}, k.Freedoms)
	for f, want := range [6]float64{ea / l, 12 * eiz / (l * l * l), 12 * eiy / (l * l * l), git / l, 4 * eiy / l, 4 * eiz / l} {
		close(t, want, k.OthersHeld[f], f)
		close(t, want, k.Stiffness[f][f], f)
	}
	for f, want := range [6]float64{ea / l, 3 * eiz / (l * l * l), 3 * eiy / (l * l * l), git / l, eiy / l, eiz / l} {
		close(t, want, k.OthersFree[f], f)
		close(t, 1/want, k.Flexibility[f][f], f)
	}
	close(t, -6*eiz/(l*l), k.Stiffness[1][5])
	close(t, 6*eiy/(l*l), k.Stiffness[2][4])
	close(t, l*l/(2*eiz), k.Flexibility[1][5])
	close(t, -l*l/(2*eiy), k.Flexibility[2][4])

	k = stiffnessAt(t, s, "A")
	assert.Empty(t, k.Freedoms)
	for f := range 6 {
		assert.True(t, math.IsInf(k.OthersHeld[f], 1) && math.IsInf(k.OthersFree[f], 1), f)
	}
}

// Where a support holds or nothing resists, that is said instead of a number.
func TestStiffnessAtHeldAndLooseFreedoms(t *testing.T) {
	s := structureOf(t, "model \"\" plane\n"+simpleSection+`
node A = (0, 0) m
node B = (4, 0) m
node C = (2, 2) m
bar a = A -> B of sec
bar b = B -> C of sec
bar c = C -> A of sec
support A pinned
support B holds uz, turned 30 deg
`)
	k := stiffnessAt(t, s, "A")
	assert.Equal(t, []int{4}, k.Freedoms)
	assert.True(t, math.IsInf(k.OthersFree[0], 1))
	assert.Zero(t, k.OthersFree[4])
	assert.Zero(t, k.OthersHeld[4])
	assert.True(t, math.IsInf(k.Flexibility[0][0], 1), "nothing resists turning")

	k = stiffnessAt(t, s, "B")
	assert.Equal(t, []int{0, 4}, k.Freedoms, "in the support's axes")
	assert.True(t, math.IsInf(k.OthersHeld[2], 1))
	close(t, k.OthersHeld[0], k.OthersFree[0], "nothing else moves there")
	// A along the slope: the bars a, b and c; statics gives the flexibility by
	// the unit-load theorem Σ n² L/EA. With a force of 1 along the slope (down
	// to the right, as the support is turned about +y) and the normal reaction r,
	// the supports carry no more: r = tan 30° of nothing — the truss alone.
	angle := math.Pi / 6
	along := [2]float64{math.Cos(angle), -math.Sin(angle)}
	normal := [2]float64{math.Sin(angle), math.Cos(angle)}
	// Joint C is unloaded and its two bars are not in line: both are without
	// force. So bar a takes the horizontal part and r the rest.
	r := -along[1] / normal[1]
	n := along[0] + r*normal[0]
	close(t, ea/4/(n*n), k.OthersFree[0])
}

// The terms of a member's stiffness by name, for a beam fast at both ends, one
// with an end hinged, and with shear: Przemieniecki, Theory of Matrix Structural
// Analysis (1968), table 5.1 and eq. 5.116.
func TestMemberStiffnessHasNamedTerms(t *testing.T) {
	head := simpleSection + "node A = (0, 0, 0) m\nnode B = (4, 0, 0) m\nsupport A fixed\nsupport B fixed\n"
	const l = 4.0
	terms := func(text string) map[string]float64 {
		s := structureOf(t, text)
		k, ok := s.StiffnessOf(0)
		require.True(t, ok)
		list := map[string]float64{}
		for _, term := range k.Terms {
			list[term.Name] = term.Value
			close(t, math.Abs(k.Own[12*term.Row+term.Column]), term.Value, term.Name)
		}
		for i, v := range k.Own {
			assert.Equal(t, v != 0, k.Names[i] != "", i)
		}
		return list
	}
	fast := terms("model \"\" space\n" + head + "beam b = A -> B of sec\n")
	want := map[string]float64{
		"EA/L": ea / l, "GIt/L": git / l,
		"12EIz/L³": 12 * eiz / (l * l * l), "6EIz/L²": 6 * eiz / (l * l), "4EIz/L": 4 * eiz / l, "2EIz/L": 2 * eiz / l,
		"12EIy/L³": 12 * eiy / (l * l * l), "6EIy/L²": 6 * eiy / (l * l), "4EIy/L": 4 * eiy / l, "2EIy/L": 2 * eiy / l,
	}
	require.Len(t, fast, len(want))
	for name, value := range want {
		close(t, value, fast[name], name)
	}
	hinged := terms("model \"\" space\n" + head + "beam b = A -> B of sec, hinge at B\n")
	for name, want := range map[string]float64{"3EIy/L": 3 * eiy / l, "3EIy/L²": 3 * eiy / (l * l), "3EIz/L³": 3 * eiz / (l * l * l)} {
		close(t, want, hinged[name], name)
	}
	flexible := terms("model \"\" space, shear flexible\nmaterial steel = { E 200 GPa, G 80 GPa }\nsection sec = { A 50 cm2, Iy 4000 cm4, Iz 1500 cm4, It 100 cm4, Avy 30 cm2, Avz 20 cm2 } of steel\nnode A = (0, 0, 0) m\nnode B = (4, 0, 0) m\nsupport A fixed\nsupport B fixed\nbeam b = A -> B of sec\n")
	phi := 12 * eiy / (80e9 * 20e-4 * l * l)
	close(t, (4+phi)*eiy/((1+phi)*l), flexible["(4+Φz)EIy/((1+Φz)L)"])
	close(t, 12*eiy/((1+phi)*l*l*l), flexible["12EIy/((1+Φz)L³)"])
	assert.Equal(t, map[string]float64{"EA/L": ea / l}, terms("model \"\" space\n"+head+"bar b = A -> B of sec\n"))
}

// Global axes and offsets: the work of any movement is the same.
func TestMemberStiffnessInGlobalAxes(t *testing.T) {
	s := structureOf(t, "model \"\" space\n"+simpleSection+`
node A = (0, 0, 0) m
node B = (3, 2, 6) m
support A fixed
support B fixed
beam b = A -> B of sec, offset B (0, 0, -1) m, roll 20 deg
`)
	k, ok := s.StiffnessOf(0)
	require.True(t, ok)
	m := s.Model()
	axes := m.MemberAxes(0)
	// A unit movement of B along x, and one turn about y with the arm of −1 m
	// along z, which moves the end by ry × arm = −1 m along x.
	for _, c := range []struct {
		freedom int
		move    [3]float64
		turn    [3]float64
	}{{0, [3]float64{1, 0, 0}, [3]float64{}}, {4, [3]float64{-1, 0, 0}, [3]float64{0, 1, 0}}} {
		var d [12]float64
		for i := range 3 {
			d[6+i] = model.Dot(axes[i], c.move)
			d[9+i] = model.Dot(axes[i], c.turn)
		}
		work := 0.0
		for i := range 12 {
			for j := range 12 {
				work += d[i] * k.Own[12*i+j] * d[j]
			}
		}
		close(t, work, k.Global[13*(6+c.freedom)])
	}
}
