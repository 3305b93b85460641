package envelope

import (
	"math"

	"spanwright/analysis/element"
)

// LargestOffset returns the sums in which c + √(a² + b²) is largest, at most
// count of them, largest first: the normal stress of a round section, c from
// the axial force, a and b from the two moments.
func LargestOffset(sums []Sum, count int, c, a, b *Path) []Peak {
	switch {
	case b.Zero():
		return largestOfTwo(sums, count, c, a)
	case a.Zero():
		return largestOfTwo(sums, count, c, b)
	}
	return rank(sums, count, offset{c, a, b})
}

// largestOfTwo ranks by c + |a|, the larger of c + a and c − a.
func largestOfTwo(sums []Sum, count int, c, a *Path) []Peak {
	plus, minus := Blend([]float64{1, 1}, c, a), Blend([]float64{1, -1}, c, a)
	return LargestOf(count, rank(sums, count, signed{plus, 1}), rank(sums, count, signed{minus, 1}))
}

// stretch is a part of a piece with the Bernstein coefficients of c, a and b
// over it.
type stretch struct {
	from, to float64
	controls [3]element.Polynomial
}

// bound is never below the value on the stretch: the size of a vector is convex.
func (s *stretch) bound(degree int) float64 {
	bound := math.Inf(-1)
	for k := 0; k <= degree; k++ {
		bound = max(bound, s.value(k))
	}
	return bound
}

// closerBound is the bound of the quarters of the stretch, some sixteen times as
// close to the value.
func (s *stretch) closerBound(degree int) float64 {
	left, right := s.halves(degree)
	a, b := left.halves(degree)
	c, d := right.halves(degree)
	return max(a.bound(degree), b.bound(degree), c.bound(degree), d.bound(degree))
}

// value is that of the coefficients k; at 0 and the degree that of the ends.
func (s *stretch) value(k int) float64 {
	return s.controls[0][k] + math.Hypot(s.controls[1][k], s.controls[2][k])
}

// halves splits the stretch in the middle, by de Casteljau's construction.
func (s *stretch) halves(degree int) (left, right stretch) {
	middle := s.from + (s.to-s.from)/2
	left, right = stretch{from: s.from, to: middle}, stretch{from: middle, to: s.to}
	for i, c := range s.controls {
		for k := 0; k <= degree; k++ {
			left.controls[i][k] = c[0]
			right.controls[i][degree-k] = c[degree-k]
			for j := 0; j < degree-k; j++ {
				c[j] = (c[j] + c[j+1]) / 2
			}
		}
	}
	return left, right
}

// offset is the measure c + √(a² + b²).
type offset [3]*Path

func (m offset) degree() int { return max(m[0].degree, m[1].degree, m[2].degree) }

func (m offset) on(piece int, sum Sum) stretch {
	s := stretch{from: m[0].Breaks[piece], to: m[0].Breaks[piece+1]}
	for i, p := range m {
		s.controls[i] = p.raised(piece, sum, m.degree())
	}
	return s
}

func (m offset) bound(sum Sum) float64 {
	bound := math.Inf(-1)
	for piece := range len(m[0].Breaks) - 1 {
		s := m.on(piece, sum)
		bound = max(bound, s.bound(m.degree()))
	}
	return bound
}

// largest halves what could still hold a larger value, until no more than
// rounding is left. The axial force may change along the piece, so that no
// polynomial has the stationary places as its roots.
func (m offset) largest(sum Sum, floor float64) (value, at float64, exceeds bool) {
	degree := m.degree()
	var found best
	for piece := range len(m[0].Breaks) - 1 {
		whole := m.on(piece, sum)
		open := []stretch{whole}
		for len(open) > 0 {
			s := open[len(open)-1]
			open = open[:len(open)-1]
			if found.reached(s.bound(degree), floor) {
				continue
			}
			found.see(s.value(0), s.from)
			found.see(s.value(degree), s.to)
			if s.to-s.from < 1e-9*(whole.to-whole.from) {
				continue
			}
			left, right := s.halves(degree)
			if left.bound(degree) > right.bound(degree) {
				left, right = right, left
			}
			open = append(open, left, right)
		}
	}
	return found.value, found.at, found.seen && Above(found.value, floor)
}
