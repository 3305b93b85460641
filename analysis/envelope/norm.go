package envelope

import (
	"math"

	"spanwright/analysis/element"
)

// Largest returns the sums in which the size √(a² + b²) of a quantity with two
// parts is largest, at most count of them, largest first; b may be nil for |a|.
func Largest(sums []Sum, count int, a, b *Path) []Peak {
	switch {
	case b == nil || b.Zero():
		return rank(sums, count, size{a})
	case a.Zero():
		return rank(sums, count, size{b})
	}
	return rank(sums, count, norm{a, b})
}

// LargestSigned returns the sums in which the quantity is largest (smallest, if
// least is set), at most count of them, the most extreme first.
func LargestSigned(sums []Sum, count int, p *Path, least bool) []Peak {
	sign := 1.0
	if least {
		sign = -1
	}
	peaks := rank(sums, count, signed{p, sign})
	for i := range peaks {
		peaks[i].Value *= sign
	}
	return peaks
}

// best keeps the largest value seen and its place.
type best struct {
	value, at float64
	seen      bool
}

func (b *best) see(value, at float64) {
	if !b.seen || Above(value, b.value) {
		b.value, b.at, b.seen = value, at, true
	}
}

// reached says that a piece with this upper bound need not be searched.
func (b *best) reached(bound, floor float64) bool {
	return !Above(bound, floor) || b.seen && !Above(bound, b.value)
}

// signed is the measure sign · p.
type signed struct {
	path *Path
	sign float64
}

func (m signed) bound(sum Sum) float64 {
	bound := math.Inf(-1)
	for piece := range len(m.path.Breaks) - 1 {
		c := m.path.controls(piece, sum)
		bound = max(bound, m.boundOf(&c))
	}
	return bound
}

// boundOf is the largest of the Bernstein coefficients of a piece.
func (m signed) boundOf(c *element.Polynomial) float64 {
	bound := m.sign * c[0]
	for k := 1; k <= m.path.degree; k++ {
		bound = max(bound, m.sign*c[k])
	}
	return bound
}

func (m signed) largest(sum Sum, floor float64) (value, at float64, exceeds bool) {
	p := m.path
	var found best
	for piece := range len(p.Breaks) - 1 {
		from, length := p.Breaks[piece], p.Breaks[piece+1]-p.Breaks[piece]
		c := p.controls(piece, sum)
		if found.reached(m.boundOf(&c), floor) {
			continue
		}
		found.see(m.sign*c[0], from)
		if p.degree > 1 {
			course := p.course(piece, sum)
			stationary := stationary(course, length)
			for _, s := range stationary.at[:stationary.count] {
				found.see(m.sign*course.At(s), from+s)
			}
		}
		found.see(m.sign*c[max(p.degree, 0)], from+length)
	}
	return found.value, found.at, found.seen && Above(found.value, floor)
}

// size is the measure |p|.
type size struct{ path *Path }

func (m size) bound(sum Sum) float64 {
	bound := 0.0
	for piece := range len(m.path.Breaks) - 1 {
		c := m.path.controls(piece, sum)
		for k := 0; k <= m.path.degree; k++ {
			bound = max(bound, math.Abs(c[k]))
		}
	}
	return bound
}

func (m size) largest(sum Sum, floor float64) (value, at float64, exceeds bool) {
	up, atUp, upExceeds := signed{m.path, 1}.largest(sum, floor)
	down, atDown, downExceeds := signed{m.path, -1}.largest(sum, floor)
	if downExceeds && (!upExceeds || further(down, atDown, up, atUp)) {
		return down, atDown, true
	}
	return up, atUp, upExceeds
}

// further says that a value goes before another of the same sum: it is larger,
// or equal and nearer to the first end.
func further(value, at, than, thanAt float64) bool {
	return Above(value, than) || !Above(than, value) && at < thanAt
}

// norm is the measure √(a² + b²).
type norm struct{ a, b *Path }

// on returns both parts on a piece, as a stretch whose first part is zero.
func (m norm) on(piece int, sum Sum) stretch {
	return stretch{
		from: m.a.Breaks[piece], to: m.a.Breaks[piece+1],
		controls: [3]element.Polynomial{{}, m.a.raised(piece, sum, m.b.degree), m.b.raised(piece, sum, m.a.degree)},
	}
}

func (m norm) degree() int { return max(m.a.degree, m.b.degree) }

func (m norm) bound(sum Sum) float64 {
	bound := 0.0
	for piece := range len(m.a.Breaks) - 1 {
		s := m.on(piece, sum)
		bound = max(bound, s.bound(m.degree()))
	}
	return bound
}

// largest looks at the stationary places, the roots of a a′ + b b′, of those
// pieces that closer bounds do not rule out.
func (m norm) largest(sum Sum, floor float64) (value, at float64, exceeds bool) {
	var found best
	for piece := range len(m.a.Breaks) - 1 {
		s := m.on(piece, sum)
		if found.reached(s.bound(m.degree()), floor) || found.reached(s.closerBound(m.degree()), floor) {
			continue
		}
		pa, pb := m.a.course(piece, sum), m.b.course(piece, sum)
		length := s.to - s.from
		found.see(math.Hypot(pa[0], pb[0]), s.from)
		stationary := normStationary(pa, pb, length)
		for _, x := range stationary.at[:stationary.count] {
			found.see(math.Hypot(pa.At(x), pb.At(x)), s.from+x)
		}
		found.see(math.Hypot(pa.At(length), pb.At(length)), s.to)
	}
	return found.value, found.at, found.seen && Above(found.value, floor)
}

// normStationary returns the places in (0, length) where a² + b² is stationary.
func normStationary(a, b element.Polynomial, length float64) places {
	da, db := a.Derivative(), b.Derivative()
	var slope polynomial
	for i := range a {
		for j := range len(da) - 1 { // the last coefficient of a derivative is zero
			slope.c[i+j] += a[i]*da[j] + b[i]*db[j]
		}
	}
	slope.trimmed()
	return slope.roots(length)
}

// raised returns the Bernstein coefficients of a sum on a piece, raised to at
// least the given degree: b_k' = k/(n+1) b_{k−1} + (1 − k/(n+1)) b_k (Farin,
// section 6.1).
func (p *Path) raised(piece int, sum Sum, degree int) element.Polynomial {
	c := p.controls(piece, sum)
	for n := max(p.degree, 0); n < degree; n++ {
		for k := n + 1; k > 0; k-- {
			share := float64(k) / float64(n+1)
			c[k] = share*c[k-1] + (1-share)*c[k]
		}
	}
	return c
}
