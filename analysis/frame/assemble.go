package frame

import (
	"math"

	"spanwright/analysis/element"
	"spanwright/lang/model"
)

// legs are the movements of a segment's end, in its own axes, for unit free
// coordinates of the body there: 6 × f, by columns.
func (s *Structure) legs(g *segment, end int) []vector6 {
	basis := s.bodies[g.bodies[end]].basis
	columns := make([]vector6, len(basis))
	for i := range basis {
		columns[i] = toLocal(&g.axes, carried(basis[i], g.arms[end]))
	}
	return columns
}

// block returns Hᵃᵀ k Hᵇ for the part of an element's stiffness between two of
// its ends, row-major.
func block(k *element.Matrix, rowEnd, columnEnd int, rows, columns []vector6) []float64 {
	out := make([]float64, len(rows)*len(columns))
	for c := range columns {
		var force vector6
		for i := range 6 {
			for j := range 6 {
				force[i] += k[12*(6*rowEnd+i)+6*columnEnd+j] * columns[c][j]
			}
		}
		for r := range rows {
			out[r*len(columns)+c] = dot6(&rows[r], &force)
		}
	}
	return out
}

// assemble adds the stiffness of all segments and elastic supports to the
// matrix.
func (s *Structure) assemble() {
	s.matrix.Zero()
	for i := range s.segments {
		g := &s.segments[i]
		k := g.element.Stiffness()
		a, b := s.legs(g, 0), s.legs(g, 1)
		first, second := g.bodies[0], g.bodies[1]
		s.matrix.AddBlock(first, first, block(k, 0, 0, a, a))
		s.matrix.AddBlock(second, second, block(k, 1, 1, b, b))
		if first == second {
			s.matrix.AddBlock(first, first, block(k, 0, 1, a, b))
			s.matrix.AddBlock(first, first, block(k, 1, 0, b, a))
		} else {
			s.matrix.AddBlock(first, second, block(k, 0, 1, a, b))
		}
	}
	for i := range s.holds {
		if h := &s.holds[i]; h.stiffness > 0 && !s.status.lifts(i) {
			basis := s.bodies[h.body].basis
			out := make([]float64, len(basis)*len(basis))
			for r := range basis {
				for c := range basis {
					out[r*len(basis)+c] = h.stiffness * dot6(&h.row, &basis[r]) * dot6(&h.row, &basis[c])
				}
			}
			s.matrix.AddBlock(h.body, h.body, out)
		}
	}
}

// unresisted is the share of the stiffness against turning at a body below
// which a turn counts as resisted by nothing: rounding leaves some 1e-16.
const unresisted = 1e-12

// dropInactive takes the movements that no element and no spring resists out of
// the bodies: all of those of a node that nothing joins, and turns of nodes
// whose members are all hinged there. What moves freely otherwise is a
// mechanism, and stays.
func (s *Structure) dropInactive() {
	turning := make([][9]float64, len(s.bodies)) // stiffness against turns about the reference point
	joined := make([]bool, len(s.bodies))
	for i := range s.segments {
		g := &s.segments[i]
		for end := range 2 {
			joined[g.bodies[end]] = true
			s.addTurning(&turning[g.bodies[end]], g, end)
		}
	}
	for i := range s.holds {
		h := &s.holds[i]
		joined[h.body] = joined[h.body] || h.stiffness > 0
		if !s.status.lifts(i) && h.stiffness > 0 {
			for r := range 3 {
				for c := range 3 {
					turning[h.body][3*r+c] += h.stiffness * h.row[3+r] * h.row[3+c]
				}
			}
		}
	}
	for b := range s.bodies {
		body := &s.bodies[b]
		if !joined[b] {
			body.basis = nil
			continue
		}
		body.basis = s.activeTurns(body.basis, &turning[b])
	}
}

// addTurning adds the stiffness of a segment's end against turns of its body.
func (s *Structure) addTurning(sum *[9]float64, g *segment, end int) {
	var turns [3]vector6
	for r := range 3 {
		var unit vector6
		unit[3+r] = 1
		turns[r] = toLocal(&g.axes, carried(unit, g.arms[end]))
	}
	k := block(g.element.Stiffness(), end, end, turns[:], turns[:])
	for i := range k {
		sum[i] += k[i]
	}
	s.addTwist(sum, g, end)
}

// addTwist counts a beam that is fast in torsion at this end as resisting, even
// where its far end lets it spin: body and beam then spin together, which is a
// mechanism and not a local turn that nobody holds.
func (s *Structure) addTwist(sum *[9]float64, g *segment, end int) {
	m := &s.model.Members[g.member]
	if m.Kind != model.Beam {
		return
	}
	outer := end == 0 && g.from == 0 || end == 1 && g.to == m.Length
	if outer && m.Ends[end].Joint[3].Kind == model.Released {
		return
	}
	section := &s.model.Sections[m.Section]
	twist := s.model.Materials[section.Material].G * section.It / m.Length
	for r := range 3 {
		for c := range 3 {
			sum[3*r+c] += twist * g.axes[0][r] * g.axes[0][c]
		}
	}
}

// activeTurns returns a basis without the pure turns that nothing resists.
// Those are eigenvectors of the stiffness against turning with eigenvalue zero.
func (s *Structure) activeTurns(basis []vector6, turning *[9]float64) []vector6 {
	var pure, rest []vector6
	for _, v := range basis {
		if v[0] == 0 && v[1] == 0 && v[2] == 0 {
			pure = append(pure, v)
		} else {
			rest = append(rest, v)
		}
	}
	trace := turning[0] + turning[4] + turning[8]
	if len(pure) == 0 || trace == 0 {
		return rest
	}
	k := make([]float64, len(pure)*len(pure))
	for r := range pure {
		for c := range pure {
			for i := range 3 {
				for j := range 3 {
					k[r*len(pure)+c] += pure[r][3+i] * turning[3*i+j] * pure[c][3+j]
				}
			}
		}
	}
	limit := unresisted * trace / (s.scale * s.scale)
	values, vectors := eigen(k, len(pure))
	for n := range pure {
		if values[n] <= limit {
			continue
		}
		var v vector6
		for r := range pure {
			for i := range v {
				v[i] += vectors[r*len(pure)+n] * pure[r][i]
			}
		}
		rest = append(rest, v)
	}
	if len(rest) == len(basis) {
		return basis // all are resisted: keep the plain axes
	}
	return rest
}

// eigen returns eigenvalues and eigenvectors (columns) of a small symmetric
// matrix by Jacobi rotations (Golub and Van Loan, Matrix Computations, 4th ed.,
// algorithm 8.5.2).
func eigen(a []float64, n int) (values, vectors []float64) {
	a = append([]float64(nil), a...)
	vectors = make([]float64, n*n)
	for i := range n {
		vectors[i*n+i] = 1
	}
	for range 30 {
		off := 0.0
		for p := range n {
			for q := p + 1; q < n; q++ {
				off += math.Abs(a[p*n+q])
				if a[p*n+q] == 0 {
					continue
				}
				tau := (a[q*n+q] - a[p*n+p]) / (2 * a[p*n+q])
				t := 1 / (math.Abs(tau) + math.Sqrt(1+tau*tau))
				if tau < 0 {
					t = -t
				}
				c := 1 / math.Sqrt(1+t*t)
				rotate(a, vectors, n, p, q, c, t*c)
			}
		}
		if off == 0 {
			break
		}
	}
	values = make([]float64, n)
	for i := range n {
		values[i] = a[i*n+i]
	}
	return values, vectors
}

// rotate applies one Jacobi rotation in the plane (p, q).
func rotate(a, vectors []float64, n, p, q int, c, s float64) {
	for k := range n {
		x, y := a[k*n+p], a[k*n+q]
		a[k*n+p], a[k*n+q] = c*x-s*y, s*x+c*y
	}
	for k := range n {
		x, y := a[p*n+k], a[q*n+k]
		a[p*n+k], a[q*n+k] = c*x-s*y, s*x+c*y
		x, y = vectors[k*n+p], vectors[k*n+q]
		vectors[k*n+p], vectors[k*n+q] = c*x-s*y, s*x+c*y
	}
	a[p*n+q], a[q*n+p] = 0, 0
}
