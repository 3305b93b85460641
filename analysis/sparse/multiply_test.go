package sparse

import (
	"math/rand/v2"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"gonum.org/v1/gonum/blas"
	"gonum.org/v1/gonum/blas/blas64"
	"pgregory.net/rapid"
)

func randomBlock(r *rand.Rand, rows, columns, stride int) blas64.General {
	m := blas64.General{Rows: rows, Cols: columns, Stride: stride, Data: make([]float64, rows*stride)}
	for i := range m.Data {
		m.Data[i] = r.NormFloat64()
	}
	return m
}

// TestProducts holds the packed products against gonum's, for blocks of all
// shapes, and checks that nothing outside of the block is touched.
func TestProducts(t *testing.T) {
	if !hasKernel() {
		t.Log("this processor has no kernel: gonum is held against itself")
	}
	rapid.Check(t, func(t *rapid.T) {
		m := rapid.IntRange(1, 260).Draw(t, "rows")
		n := rapid.IntRange(1, 120).Draw(t, "columns")
		k := rapid.IntRange(1, 300).Draw(t, "depth")
		gap := rapid.IntRange(0, 5).Draw(t, "gap")
		r := rand.New(rand.NewPCG(uint64(m), uint64(n*1000+k)))
		a, b, c := randomBlock(r, m, k, k+gap), randomBlock(r, n, k, k+gap), randomBlock(r, m, n, n+gap)
		want := blas64.General{Rows: m, Cols: n, Stride: c.Stride, Data: append([]float64(nil), c.Data...)}
		newMultiplier(true).subtract(a, b, want)
		fast := newMultiplier(false)
		for range 2 { // the second time in used room
			got := blas64.General{Rows: m, Cols: n, Stride: c.Stride, Data: append([]float64(nil), c.Data...)}
			fast.subtract(a, b, got)
			require.InDeltaSlice(t, want.Data, got.Data, 1e-11)
			for i := range m {
				for j := n; j < got.Stride; j++ {
					require.Equal(t, c.Data[i*c.Stride+j], got.Data[i*c.Stride+j], "outside of the block")
				}
			}
		}
		square := randomBlock(r, m, m, m+gap)
		lower := append([]float64(nil), square.Data...)
		newMultiplier(true).subtractSquare(a, blas64.Symmetric{N: m, Stride: square.Stride, Data: lower, Uplo: blas.Lower})
		fast.subtractSquare(a, blas64.Symmetric{N: m, Stride: square.Stride, Data: square.Data, Uplo: blas.Lower})
		require.InDeltaSlice(t, lower, square.Data, 1e-11)
	})
}

// TestProductsDoNotDependOnWorkers compares bit by bit.
func TestProductsDoNotDependOnWorkers(t *testing.T) {
	r := rand.New(rand.NewPCG(1, 2))
	a := randomBlock(r, 700, 90, 90)
	c := randomBlock(r, 700, 700, 700)
	one, many := append([]float64(nil), c.Data...), append([]float64(nil), c.Data...)
	for i := 0; i < 700; i += stripe { // one worker by hand
		p := newMultiplier(false)
		if !p.fast {
			return
		}
		p.columns, p.rows = make([]float64, 704*depth), [][]float64{make([]float64, stripe*depth)}
		pack(p.columns, a, 0, a.Rows, 0, a.Cols, tileColumns)
		p.stripe(p.rows[0], a, blas64.General{Rows: 700, Cols: 700, Stride: 700, Data: one}, i, 0, a.Cols, true)
	}
	newMultiplier(false).subtractSquare(a, blas64.Symmetric{N: 700, Stride: 700, Data: many, Uplo: blas.Lower})
	assert.Equal(t, one, many)
}

func BenchmarkProduct(b *testing.B) {
	r := rand.New(rand.NewPCG(1, 2))
	a, c := randomBlock(r, 600, 200, 200), randomBlock(r, 600, 600, 600)
	for name, plain := range map[string]bool{"kernel": false, "gonum": true} {
		b.Run(name, func(b *testing.B) {
			p := newMultiplier(plain)
			for b.Loop() {
				p.subtractSquare(a, blas64.Symmetric{N: 600, Stride: 600, Data: c.Data, Uplo: blas.Lower})
			}
			b.ReportMetric(600*600*200*float64(b.N)/float64(b.Elapsed().Nanoseconds()), "GFLOP/s")
		})
	}
}
