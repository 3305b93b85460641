package sparse

import (
	"context"
	"math"
	"math/rand/v2"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"gonum.org/v1/gonum/mat"
	"pgregory.net/rapid"
)

// random returns a matrix of a pattern: springs of random stiffness across
// every edge, and some to the ground.
func random(t require.TestingT, p Pattern, seed uint64) *Matrix {
	s, err := Analyse(p)
	require.NoError(t, err)
	m := NewMatrix(s)
	r := rand.New(rand.NewPCG(seed, 1))
	for _, e := range p.Edges {
		a, b := e[0], e[1]
		if a == b {
			continue
		}
		wa, wb := p.Weights[a], p.Weights[b]
		for range max(wa, wb) {
			va, vb := make([]float64, wa), make([]float64, wb)
			for i := range va {
				va[i] = r.NormFloat64()
			}
			for i := range vb {
				vb[i] = r.NormFloat64()
			}
			m.AddBlock(a, a, outer(va, va))
			m.AddBlock(b, b, outer(vb, vb))
			m.AddBlock(a, b, outer(va, vb))
		}
	}
	for g, w := range p.Weights {
		d := make([]float64, w*w)
		for i := range w {
			d[i*w+i] = math.Exp(4 * r.NormFloat64())
		}
		m.AddBlock(g, g, d)
	}
	return m
}

func outer(a, b []float64) []float64 {
	out := make([]float64, 0, len(a)*len(b))
	for _, x := range a {
		for _, y := range b {
			out = append(out, x*y)
		}
	}
	return out
}

func dense(m *Matrix) *mat.SymDense {
	d := mat.NewSymDense(m.symbolic.n, nil)
	m.each(func(row, column int, v float64) { d.SetSym(row, column, v) })
	return d
}

func drawPattern(t *rapid.T) Pattern {
	n := rapid.IntRange(1, 40).Draw(t, "groups")
	p := Pattern{Weights: rapid.SliceOfN(rapid.IntRange(0, 6), n, n).Draw(t, "weights")}
	for range rapid.IntRange(0, 3*n).Draw(t, "edges") {
		p.Edges = append(p.Edges, [2]int{rapid.IntRange(0, n-1).Draw(t, "a"), rapid.IntRange(0, n-1).Draw(t, "b")})
	}
	return p
}

func TestSolvesAsTheDenseFactorisationDoes(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		m := random(t, drawPattern(t), rapid.Uint64().Draw(t, "seed"))
		n := m.symbolic.n
		if n == 0 {
			return
		}
		f := NewFactor(m.symbolic)
		noted, err := f.Factorize(context.Background(), m, Tiny)
		require.NoError(t, err)
		require.Empty(t, noted)
		count := rapid.IntRange(1, 40).Draw(t, "right-hand sides")
		b := mat.NewDense(n, count, nil)
		x := make([]float64, n*count)
		r := rand.New(rand.NewPCG(7, 7))
		for c := range count {
			for i := range n {
				x[c*n+i] = r.NormFloat64()
				b.Set(i, c, x[c*n+i])
			}
		}
		require.NoError(t, f.Solve(context.Background(), x, count))
		var c mat.Cholesky
		require.True(t, c.Factorize(dense(m)))
		var want mat.Dense
		require.NoError(t, c.SolveTo(&want, b))
		for k := range count {
			for i := range n {
				require.InDelta(t, want.At(i, k), x[k*n+i], 1e-14*c.Cond()*(1+mat.Norm(&want, math.Inf(1))))
			}
		}
		residual, size := make([]float64, n), make([]float64, n)
		column := mat.Col(nil, 0, b)
		m.Residual(column, x[:n], residual, size)
		for i := range residual {
			require.LessOrEqual(t, math.Abs(residual[i]), 1e-11*size[i]+1e-300)
		}
	})
}

// grid is a building of nx × ny × nz storeys of nodes with six freedoms.
func grid(nx, ny, nz int) Pattern {
	p := Pattern{}
	at := func(x, y, z int) int { return (z*ny+y)*nx + x }
	for z := range nz {
		for y := range ny {
			for x := range nx {
				p.Weights = append(p.Weights, 6)
				p.Coordinates = append(p.Coordinates, [3]float64{float64(x), float64(y), float64(z)})
				if x > 0 {
					p.Edges = append(p.Edges, [2]int{at(x, y, z), at(x-1, y, z)})
				}
				if y > 0 {
					p.Edges = append(p.Edges, [2]int{at(x, y, z), at(x, y-1, z)})
				}
				if z > 0 {
					p.Edges = append(p.Edges, [2]int{at(x, y, z), at(x, y, z-1)})
				}
			}
		}
	}
	return p
}

func TestALargeGridIsSolved(t *testing.T) {
	m := random(t, grid(6, 5, 8), 3)
	n := m.symbolic.n
	f := NewFactor(m.symbolic)
	_, err := f.Factorize(context.Background(), m, Tiny)
	require.NoError(t, err)
	want, b := make([]float64, n), make([]float64, n)
	for i := range want {
		want[i] = float64(i%13) - 6
	}
	m.Multiply(want, b)
	require.NoError(t, f.Solve(context.Background(), b, 1))
	for i := range want {
		require.InDelta(t, want[i], b[i], 1e-8)
	}
}

func TestRefactorisationAllocatesNothing(t *testing.T) {
	m := random(t, grid(4, 4, 4), 5)
	f := NewFactor(m.symbolic)
	ctx := context.Background()
	assert.Zero(t, testing.AllocsPerRun(5, func() {
		if _, err := f.Factorize(ctx, m, Tiny); err != nil {
			t.Fatal(err)
		}
	}))
}

// A chain of springs without a hold: one pivot vanishes, and the solution for a
// force there is the free movement.
func TestAFreeMovementIsNoted(t *testing.T) {
	p := Pattern{Weights: []int{1, 1, 1, 1}, Edges: [][2]int{{0, 1}, {1, 2}, {2, 3}}}
	s, err := Analyse(p)
	require.NoError(t, err)
	m := NewMatrix(s)
	for _, e := range p.Edges {
		m.AddBlock(e[0], e[0], []float64{5})
		m.AddBlock(e[1], e[1], []float64{5})
		m.AddBlock(e[0], e[1], []float64{-5})
	}
	f := NewFactor(s)
	noted, err := f.Factorize(context.Background(), m, Tiny)
	require.NoError(t, err)
	require.Len(t, noted, 1)
	x := make([]float64, 4)
	x[noted[0]] = 1
	require.NoError(t, f.Solve(context.Background(), x, 1))
	for i := range x {
		assert.InEpsilon(t, x[0], x[i], 1e-9)
	}
}

func TestPatternsOutOfRangeAreRefused(t *testing.T) {
	_, err := Analyse(Pattern{Weights: []int{1}, Edges: [][2]int{{0, 1}}})
	assert.ErrorIs(t, err, ErrPattern)
	_, err = Analyse(Pattern{Weights: []int{-1}})
	assert.ErrorIs(t, err, ErrPattern)
}

func BenchmarkFactorize(b *testing.B) {
	for name, p := range map[string]Pattern{"5x5x5": grid(5, 5, 5), "6x4x10": grid(6, 4, 10), "4x4x60": grid(4, 4, 60), "11x11x20": grid(11, 11, 20)} {
		b.Run(name, func(b *testing.B) {
			m := random(b, p, 1)
			f := NewFactor(m.symbolic)
			for b.Loop() {
				if _, err := f.Factorize(context.Background(), m, Tiny); err != nil {
					b.Fatal(err)
				}
			}
		})
	}
}

func BenchmarkAnalyse(b *testing.B) {
	p := grid(11, 11, 20)
	for b.Loop() {
		if _, err := Analyse(p); err != nil {
			b.Fatal(err)
		}
	}
}
