package sparse

import (
	"runtime"
	"sync"

	"gonum.org/v1/gonum/blas"
	"gonum.org/v1/gonum/blas/blas64"
)

// Almost all work of a factorisation is C ← C − A·Bᵀ on dense blocks. Where the
// processor has the instructions, that is done in pieces of 6 × 8 that stay in
// registers, on copies of A and B in which every piece finds its numbers one
// behind the other (K. Goto and R. van de Geijn, Anatomy of high-performance
// matrix multiplication, ACM Transactions on Mathematical Software 34, 2008).
// Elsewhere, and for small blocks, gonum does it.

const (
	tileRows    = 6
	tileColumns = 8
	depth       = 256 // columns of A and B that are packed at a time
	stripe      = 96  // rows of A that one worker packs at a time; a multiple of tileRows
)

// multiplier computes products of blocks, with room for copies that it keeps. It
// is for one goroutine at a time, and uses others for large products: each row
// of C is the work of one of them, so the result does not depend on their number.
type multiplier struct {
	fast    bool
	columns []float64   // packed Bᵀ
	rows    [][]float64 // packed A, for each worker

	// task is what the workers share at the moment; run starts each of them
	// without making anything new.
	task task
	run  []func()
	wait sync.WaitGroup
}

// task is one depth of a product, shared among workers.
type task struct {
	a, c       blas64.General
	k, d       int
	lower      bool
	goroutines int
}

// newMultiplier returns one that uses the processor's best instructions, or
// gonum alone.
func newMultiplier(plain bool) *multiplier { return &multiplier{fast: hasKernel() && !plain} }

// worthPacking is the number of multiplications from which packing pays, and
// worthSharing that from which several goroutines do.
const (
	worthPacking = 8000
	worthSharing = 2_000_000
)

// subtract computes C ← C − A·Bᵀ.
func (p *multiplier) subtract(a, b, c blas64.General) {
	if !p.fast || a.Rows*b.Rows*a.Cols < worthPacking {
		blas64.Gemm(blas.NoTrans, blas.Trans, -1, a, b, 1, c)
		return
	}
	p.packed(a, b, c, false)
}

// subtractSquare computes the lower triangle of C ← C − A·Aᵀ.
func (p *multiplier) subtractSquare(a blas64.General, c blas64.Symmetric) {
	if !p.fast || a.Rows*a.Rows*a.Cols/2 < worthPacking {
		blas64.Syrk(blas.NoTrans, -1, a, 1, c)
		return
	}
	p.packed(a, a, blas64.General{Rows: c.N, Cols: c.N, Stride: c.Stride, Data: c.Data}, true)
}

// packed does the work; lower leaves out what is above the diagonal.
func (p *multiplier) packed(a, b, c blas64.General, lower bool) {
	workers := 1
	if work := a.Rows * b.Rows * a.Cols; work >= worthSharing {
		workers = min(runtime.GOMAXPROCS(0), (a.Rows+stripe-1)/stripe)
	}
	p.hire(workers)
	tiles := (b.Rows + tileColumns - 1) / tileColumns
	if need := tiles * tileColumns * depth; len(p.columns) < need {
		p.columns = make([]float64, need)
	}
	for k := 0; k < a.Cols; k += depth {
		d := min(depth, a.Cols-k)
		pack(p.columns, b, 0, b.Rows, k, d, tileColumns)
		if workers == 1 {
			for i := 0; i < a.Rows; i += stripe {
				p.stripe(p.rows[0], a, c, i, k, d, lower)
			}
			continue
		}
		p.task = task{a, c, k, d, lower, workers}
		p.wait.Add(workers)
		for w := range workers {
			go p.run[w]()
		}
		p.wait.Wait()
	}
}

// hire makes room for so many workers.
func (p *multiplier) hire(workers int) {
	for w := len(p.rows); w < workers; w++ {
		p.rows = append(p.rows, make([]float64, stripe*depth))
		p.run = append(p.run, func() {
			defer p.wait.Done()
			t := &p.task
			// Stripes in turn: below the diagonal later ones are longer.
			for i := w * stripe; i < t.a.Rows; i += t.goroutines * stripe {
				p.stripe(p.rows[w], t.a, t.c, i, t.k, t.d, t.lower)
			}
		})
	}
}

// stripe brings some rows of C up to date.
func (p *multiplier) stripe(room []float64, a, c blas64.General, first, k, d int, lower bool) {
	last := min(first+stripe, a.Rows)
	pack(room, a, first, last-first, k, d, tileRows)
	columns := c.Cols
	if lower {
		columns = min(columns, last)
	}
	var tile [tileRows * tileColumns]float64
	for j := 0; j < columns; j += tileColumns {
		b := &p.columns[j*d]
		for i := first; i < last; i += tileRows {
			if lower && i+tileRows <= j {
				continue
			}
			kernel6x8(d, &room[(i-first)*d], b, &tile[0])
			for r := range min(tileRows, last-i) {
				width := min(tileColumns, c.Cols-j)
				if lower {
					width = min(width, i+r-j+1)
				}
				if width <= 0 {
					continue
				}
				out := c.Data[(i+r)*c.Stride+j : (i+r)*c.Stride+j+width]
				for q, v := range tile[r*tileColumns : r*tileColumns+width] {
					out[q] -= v
				}
			}
		}
	}
}

// pack copies rows of a matrix, height at a time, column by column; rows that a
// last tile lacks are zero.
func pack(to []float64, m blas64.General, first, count, k, d, height int) {
	for i := 0; i < count; i += height {
		tile := to[i*d : i*d+height*d]
		rows := min(height, count-i)
		if rows < height {
			clear(tile)
		}
		for r := range rows {
			row := m.Data[(first+i+r)*m.Stride+k : (first+i+r)*m.Stride+k+d]
			for q, v := range row {
				tile[q*height+r] = v
			}
		}
	}
}
