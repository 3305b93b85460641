package sparse

import (
	"context"
	"errors"
	"math"

	"gonum.org/v1/gonum/blas"
	"gonum.org/v1/gonum/blas/blas64"
)

// Factor is the Cholesky factor of a scaled matrix, L Lᵀ = D K D with D the
// inverse roots of the diagonal. Its storage is made once and serves every
// factorisation of the same symbolic phase.
type Factor struct {
	symbolic *Symbolic
	scale    []float64
	panels   []float64
	stack    []float64
	noted    []int
	tiny     float64
	multiply *multiplier

	smallest   float64 // pivot of the scaled matrix
	smallestAt int
}

// Tiny is the pivot of the scaled matrix below which an unknown deserves a look.
const Tiny = 1e-12

// ErrMisuse says that a matrix or right-hand side does not belong to the factor.
var ErrMisuse = errors.New("sparse: sizes do not agree")

// NewFactor returns a factor without numbers.
func NewFactor(s *Symbolic) *Factor {
	return &Factor{symbolic: s, scale: make([]float64, s.n), panels: make([]float64, s.factor), stack: make([]float64, s.updates), multiply: newMultiplier(false)}
}

// NewPlainFactor returns a factor that keeps to gonum's kernels, whatever the
// processor can do: for comparison.
func NewPlainFactor(s *Symbolic) *Factor {
	f := NewFactor(s)
	f.multiply = newMultiplier(true)
	return f
}

// Factorize computes the factor of a matrix. It returns the unknowns, in the
// order of elimination, at which the pivot was not above
// tiny ([Tiny] as a rule): in its place 1 was
// put, which is as if a spring held the unknown there, and the factor is that of
// the matrix with those springs. A positive definite matrix notes none. The
// context is looked at between fronts.
func (f *Factor) Factorize(ctx context.Context, m *Matrix, tiny float64) (noted []int, err error) {
	if m.symbolic != f.symbolic {
		return nil, ErrMisuse
	}
	f.setScale(m)
	f.tiny = tiny
	f.noted, f.smallest, f.smallestAt = f.noted[:0], math.Inf(1), -1
	for i := range f.symbolic.fronts {
		if i%64 == 0 && ctx.Err() != nil {
			return nil, ctx.Err()
		}
		f.front(&f.symbolic.fronts[i], m)
	}
	return f.noted, nil
}

// Smallest returns the smallest pivot of the scaled matrix, 1 at the most, and
// its unknown; −1 for a matrix without any.
func (f *Factor) Smallest() (pivot float64, unknown int) { return f.smallest, f.smallestAt }

// Spring returns the stiffness, in the unscaled matrix, of the spring that stands
// for a noted unknown.
func (f *Factor) Spring(unknown int) float64 { return 1 / (f.scale[unknown] * f.scale[unknown]) }

// setScale takes the inverse roots of the diagonal; a diagonal of zero or below
// counts as one, and its pivot will be noted.
func (f *Factor) setScale(m *Matrix) {
	s := f.symbolic
	for g, w := range s.pattern.Weights {
		for i := range w {
			d := m.values[s.offsets[g][0]+i*w+i]
			if d > 0 {
				f.scale[s.start[g]+i] = 1 / math.Sqrt(d)
			} else {
				f.scale[s.start[g]+i] = 1
			}
		}
	}
}

// front assembles and eliminates one front.
func (f *Factor) front(fr *front, m *Matrix) {
	rows, pivots := len(fr.rows), fr.pivots
	left := rows - pivots
	panel := f.panels[fr.panel : fr.panel+rows*pivots]
	update := f.stack[fr.work : fr.work+left*left]
	clear(panel)
	clear(update)
	f.scatter(fr, panel, m)
	for _, c := range fr.children {
		f.extendAdd(&f.symbolic.fronts[c], panel, pivots, update, left)
	}
	f.eliminate(fr, panel, rows, pivots)
	if left == 0 {
		return
	}
	if pivots > 0 {
		below := blas64.General{Rows: left, Cols: pivots, Stride: pivots, Data: panel[pivots*pivots:]}
		f.multiply.subtractSquare(below, blas64.Symmetric{N: left, Stride: left, Data: update, Uplo: blas.Lower})
	}
	copy(f.stack[fr.update:fr.update+left*left], update)
}

// scatter puts the blocks of the matrix into the panel, scaled.
func (f *Factor) scatter(fr *front, panel []float64, m *Matrix) {
	for i := range fr.entries {
		e := &fr.entries[i]
		values := m.values[e.values : e.values+int(e.rows*e.columns)]
		for r := range int(e.rows) {
			row := int(e.row) + r
			d := f.scale[fr.rows[row]]
			out := panel[row*fr.pivots+int(e.column):]
			for c := range int(e.columns) {
				v := 0.0
				if e.transposed {
					v = values[c*int(e.rows)+r]
				} else {
					v = values[r*int(e.columns)+c]
				}
				out[c] += d * f.scale[fr.rows[int(e.column)+c]] * v
			}
		}
	}
}

// extendAdd adds a child's update, the lower triangle, to its parent.
func (f *Factor) extendAdd(child *front, panel []float64, pivots int, update []float64, left int) {
	size := len(child.scatter)
	values := f.stack[child.update : child.update+size*size]
	for r, to := range child.scatter {
		row := int(to)
		source := values[r*size : r*size+r+1]
		for c, v := range source {
			column := int(child.scatter[c])
			low, high := column, row
			if low > high {
				low, high = high, low
			}
			if low < pivots {
				panel[high*pivots+low] += v
			} else {
				update[(high-pivots)*left+low-pivots] += v
			}
		}
	}
}

// width is how many columns of a panel are eliminated before the rest of it is
// brought up to date.
const width = 48

// eliminate factorises the panel in place: the lower triangle of its square top
// and the rows below.
func (f *Factor) eliminate(fr *front, panel []float64, rows, pivots int) {
	for k := 0; k < pivots; k += width {
		w := min(width, pivots-k)
		f.eliminateTop(fr, panel, pivots, k, w)
		if k+w >= rows {
			continue
		}
		top := blas64.Triangular{N: w, Stride: pivots, Data: panel[k*pivots+k:], Uplo: blas.Lower, Diag: blas.NonUnit}
		below := blas64.General{Rows: rows - k - w, Cols: w, Stride: pivots, Data: panel[(k+w)*pivots+k:]}
		blas64.Trsm(blas.Right, blas.Trans, 1, top, below)
		if rest := pivots - k - w; rest > 0 {
			square := blas64.General{Rows: rest, Cols: w, Stride: pivots, Data: panel[(k+w)*pivots+k:]}
			f.multiply.subtractSquare(square, blas64.Symmetric{N: rest, Stride: pivots, Data: panel[(k+w)*pivots+k+w:], Uplo: blas.Lower})
			if under := rows - pivots; under > 0 {
				lower := blas64.General{Rows: under, Cols: w, Stride: pivots, Data: panel[pivots*pivots+k:]}
				f.multiply.subtract(lower, square, blas64.General{Rows: under, Cols: rest, Stride: pivots, Data: panel[pivots*pivots+k+w:]})
			}
		}
	}
}

// eliminateTop factorises a square block on the diagonal, column by column,
// and notes pivots that are too small.
func (f *Factor) eliminateTop(fr *front, panel []float64, stride, k, w int) {
	for j := range w {
		row := panel[(k+j)*stride+k : (k+j)*stride+k+w]
		pivot := row[j]
		for _, v := range row[:j] {
			pivot -= v * v
		}
		if !(pivot >= f.smallest) {
			f.smallest, f.smallestAt = pivot, int(fr.rows[k+j])
		}
		if !(pivot > f.tiny) {
			f.noted = append(f.noted, int(fr.rows[k+j]))
			pivot = 1
		}
		root := math.Sqrt(pivot)
		row[j] = root
		for i := j + 1; i < w; i++ {
			other := panel[(k+i)*stride+k : (k+i)*stride+k+w]
			v := other[j]
			for c, u := range row[:j] {
				v -= u * other[c]
			}
			other[j] = v / root
		}
	}
}
