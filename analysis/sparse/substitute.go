package sparse

import (
	"context"

	"gonum.org/v1/gonum/blas"
	"gonum.org/v1/gonum/blas/blas64"
)

// together is how many right-hand sides are carried through the fronts at once.
const together = 32

// Solve replaces the right-hand sides, columns of n numbers one behind the
// other, by the solutions.
func (f *Factor) Solve(ctx context.Context, b []float64, count int) error {
	n := f.symbolic.n
	if len(b) != n*count {
		return ErrMisuse
	}
	block := make([]float64, n*min(count, together))
	work := make([]float64, f.symbolic.largest*min(count, together))
	for first := 0; first < count; first += together {
		if err := ctx.Err(); err != nil {
			return err
		}
		k := min(together, count-first)
		f.solveBlock(b[first*n:(first+k)*n], block[:n*k], work, k)
	}
	return nil
}

// solveBlock solves k right-hand sides, kept row by row so that the kernels run
// along them.
func (f *Factor) solveBlock(b, x, work []float64, k int) {
	n := f.symbolic.n
	for c := range k {
		for i := range n {
			x[i*k+c] = b[c*n+i] * f.scale[i]
		}
	}
	fronts := f.symbolic.fronts
	for i := range fronts {
		f.forward(&fronts[i], x, work, k)
	}
	for i := len(fronts) - 1; i >= 0; i-- {
		f.back(&fronts[i], x, work, k)
	}
	for c := range k {
		for i := range n {
			b[c*n+i] = x[i*k+c] * f.scale[i]
		}
	}
}

// gather copies the rows of a front out of x.
func gather(fr *front, x, work []float64, k int) blas64.General {
	for r, u := range fr.rows {
		copy(work[r*k:r*k+k], x[int(u)*k:int(u)*k+k])
	}
	return blas64.General{Rows: len(fr.rows), Cols: k, Stride: k, Data: work}
}

func (f *Factor) parts(fr *front) (top blas64.Triangular, below blas64.General) {
	rows, pivots := len(fr.rows), fr.pivots
	panel := f.panels[fr.panel : fr.panel+rows*pivots]
	top = blas64.Triangular{N: pivots, Stride: pivots, Data: panel, Uplo: blas.Lower, Diag: blas.NonUnit}
	return top, blas64.General{Rows: rows - pivots, Cols: pivots, Stride: pivots, Data: panel[pivots*pivots:]}
}

func (f *Factor) forward(fr *front, x, work []float64, k int) {
	if fr.pivots == 0 {
		return
	}
	all := gather(fr, x, work, k)
	top, below := f.parts(fr)
	own := blas64.General{Rows: fr.pivots, Cols: k, Stride: k, Data: all.Data}
	blas64.Trsm(blas.Left, blas.NoTrans, 1, top, own)
	if below.Rows > 0 {
		rest := blas64.General{Rows: below.Rows, Cols: k, Stride: k, Data: all.Data[fr.pivots*k:]}
		blas64.Gemm(blas.NoTrans, blas.NoTrans, -1, below, own, 1, rest)
	}
	for r, u := range fr.rows {
		copy(x[int(u)*k:int(u)*k+k], work[r*k:r*k+k])
	}
}

func (f *Factor) back(fr *front, x, work []float64, k int) {
	if fr.pivots == 0 {
		return
	}
	all := gather(fr, x, work, k)
	top, below := f.parts(fr)
	own := blas64.General{Rows: fr.pivots, Cols: k, Stride: k, Data: all.Data}
	if below.Rows > 0 {
		rest := blas64.General{Rows: below.Rows, Cols: k, Stride: k, Data: all.Data[fr.pivots*k:]}
		blas64.Gemm(blas.Trans, blas.NoTrans, -1, below, rest, 1, own)
	}
	blas64.Trsm(blas.Left, blas.Trans, 1, top, own)
	for r, u := range fr.rows[:fr.pivots] {
		copy(x[int(u)*k:int(u)*k+k], work[r*k:r*k+k])
	}
}
