package element

import (
	"math"
	"testing"

	"github.com/stretchr/testify/require"
	"gonum.org/v1/gonum/mat"
	"pgregory.net/rapid"
)

func drawProperties(t *rapid.T) Properties {
	size := rapid.Float64Range(1e5, 1e8)
	p := Properties{EA: size.Draw(t, "EA"), EIy: size.Draw(t, "EIy"), EIz: size.Draw(t, "EIz"), GIt: size.Draw(t, "GIt")}
	if rapid.Bool().Draw(t, "shear flexible") {
		p.GAy, p.GAz = size.Draw(t, "GAy"), size.Draw(t, "GAz")
	}
	return p
}

func drawJoints(t *rapid.T) Vector {
	j := Rigid()
	for _, i := range []int{4, 5, 10, 11} {
		switch rapid.IntRange(0, 3).Draw(t, "joint") {
		case 0:
			j[i] = 0
		case 1:
			j[i] = rapid.Float64Range(1e4, 1e8).Draw(t, "stiffness")
		}
	}
	if rapid.Bool().Draw(t, "other joints") {
		for _, i := range []int{0, 3, 7, 8} {
			j[i] = rapid.Float64Range(1e4, 1e8).Draw(t, "stiffness")
		}
	}
	return j
}

func drawVector3(t *rapid.T, name string) [3]float64 {
	var v [3]float64
	for i := range v {
		v[i] = rapid.Float64Range(-1e4, 1e4).Draw(t, name)
	}
	return v
}

func drawLoads(t *rapid.T, length float64) []SpanLoad {
	var loads []SpanLoad
	for range rapid.IntRange(1, 3).Draw(t, "loads") {
		a, b := rapid.Float64Range(0, length).Draw(t, "a"), rapid.Float64Range(0, length).Draw(t, "b")
		switch rapid.IntRange(0, 2).Draw(t, "kind") {
		case 0:
			loads = append(loads, Point(a, drawVector3(t, "force"), drawVector3(t, "moment")))
		case 1:
			loads = append(loads, SpanLoad{From: min(a, b), To: max(a, b) + 1e-3, Force1: drawVector3(t, "q1"), Force2: drawVector3(t, "q2"),
				Moment1: drawVector3(t, "m1"), Moment2: drawVector3(t, "m2")})
			if loads[len(loads)-1].To > length {
				loads[len(loads)-1].From, loads[len(loads)-1].To = 0, length
			}
		default:
			loads = append(loads, SpanLoad{Strain: 1e-4, StrainPerY: rapid.Float64Range(-1e-3, 1e-3).Draw(t, "per y"), StrainPerZ: 2e-4})
		}
	}
	return loads
}

func drawMovements(t *rapid.T) Vector {
	var d Vector
	for i := range d {
		d[i] = rapid.Float64Range(-0.01, 0.01).Draw(t, "movement")
	}
	return d
}

// The member cut in two at any place, its middle node eliminated by a dense
// solve, must answer at its ends as the whole one: stiffness, held-end forces
// and joints are checked against each other without a formula in common.
func TestCuttingAMemberInTwoChangesNothing(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		l := rapid.Float64Range(1, 12).Draw(t, "length")
		props, joints, loads, d := drawProperties(t), drawJoints(t), drawLoads(t, l), drawMovements(t)
		whole, err := New(l, props, joints)
		require.NoError(t, err)
		cut := l * rapid.Float64Range(0.1, 0.9).Draw(t, "cut")

		first, second := Rigid(), Rigid()
		copy(first[:6], joints[:6])
		copy(second[6:], joints[6:])
		left, err := New(cut, props, first)
		require.NoError(t, err)
		right, err := New(l-cut, props, second)
		require.NoError(t, err)
		leftLoads, rightLoads := Between(loads, 0, cut, l), Between(loads, cut, l, l)

		// Middle node: K_mm m = −(f0 + K_me d).
		var k mat.Dense
		k.ReuseAs(6, 6)
		rhs := mat.NewVecDense(6, nil)
		lf, rf := left.FixedEnd(leftLoads), right.FixedEnd(rightLoads)
		for i := range 6 {
			sum := lf[6+i] + rf[i]
			for j := range 6 {
				k.Set(i, j, left.Stiffness()[at(6+i, 6+j)]+right.Stiffness()[at(i, j)])
				sum += left.Stiffness()[at(6+i, j)]*d[j] + right.Stiffness()[at(i, 6+j)]*d[6+j]
			}
			rhs.SetVec(i, -sum)
		}
		var m mat.VecDense
		if err := m.SolveVec(&k, rhs); err != nil {
			return // a cut right at two hinges: ill-conditioned by the draw, not by us
		}
		var dl, dr Vector
		copy(dl[:6], d[:6])
		copy(dr[6:], d[6:])
		for i := range 6 {
			dl[6+i], dr[i] = m.AtVec(i), m.AtVec(i)
		}
		want := whole.EndForces(d, loads)
		gotLeft, gotRight := left.EndForces(dl, leftLoads), right.EndForces(dr, rightLoads)
		scale := 0.0
		for _, f := range want {
			scale = max(scale, math.Abs(f))
		}
		for i := range 6 {
			require.InDelta(t, want[i], gotLeft[i], 1e-8*scale+1e-6)
			require.InDelta(t, want[6+i], gotRight[6+i], 1e-8*scale+1e-6)
		}
		courses := whole.Recover(d, loads, nil)
		lc, rc := left.Recover(dl, leftLoads, nil), right.Recover(dr, rightLoads, nil)
		x := l * rapid.Float64Range(0.01, 0.99).Draw(t, "x")
		for c := N; c <= ThetaZ; c++ {
			var got float64
			if x < cut {
				got = lc.At(c, x, Before)
			} else {
				got = rc.At(c, x-cut, Before)
			}
			tolerance := 1e-8*scale + 1e-6
			if c >= U {
				tolerance = 1e-8
			}
			require.InDelta(t, courses.At(c, x, Before), got, tolerance, "component %d at %g of %g", c, x, l)
		}
	})
}

func TestStiffnessIsSymmetricAndFreeOfForceInRigidMovement(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		l := rapid.Float64Range(0.5, 12).Draw(t, "length")
		e, err := New(l, drawProperties(t), drawJoints(t))
		require.NoError(t, err)
		if rapid.Bool().Draw(t, "spring") {
			e, err = NewSpring(l, [6]float64{1e6, 2e5, 3e5, 4e4, 5e4, 6e4})
			require.NoError(t, err)
		}
		k := e.Stiffness()
		d := drawMovements(t)
		var energy float64
		for i := range 12 {
			for j := range 12 {
				require.Equal(t, k[at(i, j)], k[at(j, i)], "(%d, %d)", i, j)
				energy += d[i] * k[at(i, j)] * d[j] / 2
			}
		}
		require.GreaterOrEqual(t, energy, -1e-9)
		require.InDelta(t, energy, e.StrainEnergy(d), 1e-9*(energy+1))
		// A rigid movement: shift s, turn r about end 1.
		var rigid Vector
		copy(rigid[:6], d[:6])
		rigid[6], rigid[7], rigid[8] = d[0], d[1]+d[5]*l, d[2]-d[4]*l
		rigid[9], rigid[10], rigid[11] = d[3], d[4], d[5]
		for _, f := range e.EndForces(rigid, nil) {
			require.InDelta(t, 0, f, 1e-7)
		}
	})
}

// Courses meet the ends: section forces there equal the end forces, and a
// member fast to its nodes moves there as they do.
func TestCoursesMeetTheEnds(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		l := rapid.Float64Range(0.5, 12).Draw(t, "length")
		e, err := New(l, drawProperties(t), Rigid())
		require.NoError(t, err)
		loads, d := drawLoads(t, l), drawMovements(t)
		f, c := e.EndForces(d, loads), e.Recover(d, loads, nil)
		for i := range 6 {
			require.InDelta(t, d[i], c.At(U+Component(i), 0, Before), 1e-9)
			require.InDelta(t, d[6+i], c.At(U+Component(i), l, Before), 1e-9)
		}
		for i, sign := range []float64{1, -1, -1, 1, -1, 1} {
			sum := f[6+i]
			for _, load := range loads {
				if !load.spread(l) && near(load.From, l, l) {
					sum += append(load.Force1[:], load.Moment1[:]...)[i]
				}
			}
			require.InDelta(t, sign*sum, c.At(Component(i), l, Before), 1e-6)
		}
	})
}

func TestRootsAreFoundAndOrdered(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		roots := []float64{}
		p := Polynomial{1}
		for range rapid.IntRange(1, 5).Draw(t, "degree") {
			r := math.Round(rapid.Float64Range(0.1, 9.9).Draw(t, "root")*100) / 100
			for _, other := range roots {
				if math.Abs(other-r) < 0.05 {
					return
				}
			}
			roots = append(roots, r)
			var q Polynomial
			for i := range 5 {
				q[i+1] += p[i]
				q[i] -= r * p[i]
			}
			q[5] += 0
			p = q
		}
		found := p.Roots(10)
		require.Len(t, found, len(roots))
		for i, s := range found {
			if i > 0 {
				require.Greater(t, s, found[i-1])
			}
			nearest := math.Inf(1)
			for _, r := range roots {
				nearest = min(nearest, math.Abs(r-s))
			}
			require.Less(t, nearest, 1e-6)
		}
	})
}
