package sparse

import (
	"math"
	"slices"
)

// entry is a block of the matrix in the panel of a front.
type entry struct {
	values        int   // offset of the block's values
	row, column   int32 // of the panel
	rows, columns int32 // of the block as it stands in the panel
	transposed    bool  // the values are columns × rows
	diagonal      bool
}

// layOutBlocks gives every block of the matrix its place among the values, and
// says which panel it goes into: that of the group eliminated first.
func (s *Symbolic) layOutBlocks(neighbours [][]int32) {
	groups := len(s.pattern.Weights)
	s.blocks, s.offsets = make([][]int32, groups), make([][]int, groups)
	for g := range groups {
		w := s.pattern.Weights[g]
		s.offsets[g] = append(s.offsets[g], s.values)
		s.values += w * w
		for _, h := range neighbours[g] {
			if int(h) > g {
				s.blocks[g] = append(s.blocks[g], h)
				s.offsets[g] = append(s.offsets[g], s.values)
				s.values += w * s.pattern.Weights[h]
			}
		}
	}
	rowOf := make([]int32, groups)
	for i := range s.fronts {
		f := &s.fronts[i]
		row := int32(0)
		for _, g := range f.groups {
			rowOf[g] = row
			row += int32(s.pattern.Weights[g])
		}
		for k, g := range f.groups[:f.own] {
			w := int32(s.pattern.Weights[g])
			f.entries = append(f.entries, entry{values: s.offsets[g][0], row: rowOf[g], column: rowOf[g], rows: w, columns: w, diagonal: true})
			for _, h := range neighbours[g] {
				later := s.frontOf[h] > int32(i) || s.frontOf[h] == int32(i) && slices.Index(f.groups[:f.own], h) > k
				if !later {
					continue
				}
				offset, transposed := s.block(int(h), int(g))
				f.entries = append(f.entries, entry{values: offset, row: rowOf[h], column: rowOf[g],
					rows: int32(s.pattern.Weights[h]), columns: w, transposed: transposed})
			}
		}
	}
}

// block returns where the values of the block (row group, column group) are,
// and whether they are stored the other way round. The offset is −1 where the
// pattern has no such block.
func (s *Symbolic) block(row, column int) (offset int, transposed bool) {
	if row == column {
		return s.offsets[row][0], false
	}
	low, high := min(row, column), max(row, column)
	k, found := slices.BinarySearch(s.blocks[low], int32(high))
	if !found {
		return -1, false
	}
	return s.offsets[low][1+k], row > column
}

// Matrix is a symmetric matrix of a pattern. Only one block of each pair of
// groups is stored, rows those of the lower number.
type Matrix struct {
	symbolic *Symbolic
	values   []float64
}

// NewMatrix returns a matrix of zeros.
func NewMatrix(s *Symbolic) *Matrix { return &Matrix{symbolic: s, values: make([]float64, s.values)} }

// Zero sets all values to zero.
func (m *Matrix) Zero() { clear(m.values) }

// AddBlock adds a block, row-major, of the rows of one group and the columns of
// another. The block that mirrors it is added with it; a diagonal block is to be
// symmetric and whole. It panics where the pattern has no such block.
func (m *Matrix) AddBlock(row, column int, block []float64) {
	if len(block) == 0 {
		return
	}
	offset, transposed := m.symbolic.block(row, column)
	if offset < 0 {
		panic("sparse: block outside of the pattern")
	}
	if !transposed {
		for i, v := range block {
			m.values[offset+i] += v
		}
		return
	}
	rows, columns := m.symbolic.pattern.Weights[row], m.symbolic.pattern.Weights[column]
	for r := range rows {
		for c := range columns {
			m.values[offset+c*rows+r] += block[r*columns+c]
		}
	}
}

// Diagonal returns the diagonal.
func (m *Matrix) Diagonal() []float64 {
	s := m.symbolic
	d := make([]float64, s.n)
	for g, w := range s.pattern.Weights {
		for i := range w {
			d[s.start[g]+i] = m.values[s.offsets[g][0]+i*w+i]
		}
	}
	return d
}

// each calls visit for every stored value with its row and column, once for
// each unordered pair.
func (m *Matrix) each(visit func(row, column int, value float64)) {
	s := m.symbolic
	for g, w := range s.pattern.Weights {
		at := s.offsets[g][0]
		for r := range w {
			for c := r; c < w; c++ {
				visit(s.start[g]+r, s.start[g]+c, m.values[at+r*w+c])
			}
		}
		for k, h := range s.blocks[g] {
			at, columns := s.offsets[g][1+k], s.pattern.Weights[h]
			for r := range w {
				for c := range columns {
					visit(s.start[g]+r, s.start[h]+c, m.values[at+r*columns+c])
				}
			}
		}
	}
}

// Multiply fills y with K x.
func (m *Matrix) Multiply(x, y []float64) {
	clear(y)
	m.each(func(row, column int, v float64) {
		y[row] += v * x[column]
		if row != column {
			y[column] += v * x[row]
		}
	})
}

// Residual fills residual with b − K x and size with |b| + |K| |x|, row by row.
func (m *Matrix) Residual(b, x, residual, size []float64) {
	copy(residual, b)
	for i, v := range b {
		size[i] = math.Abs(v)
	}
	m.each(func(row, column int, v float64) {
		residual[row] -= v * x[column]
		size[row] += math.Abs(v * x[column])
		if row != column {
			residual[column] -= v * x[row]
			size[column] += math.Abs(v * x[row])
		}
	})
}
