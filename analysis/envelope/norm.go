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
		return rank(sums, count, a.largestSize)
	case a.Zero():
		return rank(sums, count, b.largestSize)
	}
	return rank(sums, count, func(sum Sum, floor float64) (float64, float64, bool) {
		return largestNorm(sum, floor, a, b)
	})
}

// LargestSigned returns the sums in which the quantity is largest (smallest, if
// least is set), at most count of them, the most extreme first.
func LargestSigned(sums []Sum, count int, p *Path, least bool) []Peak {
	sign := 1.0
	if least {
		sign = -1
	}
	peaks := rank(sums, count, func(sum Sum, floor float64) (float64, float64, bool) {
		return p.largestSigned(sum, floor, sign)
	})
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

func (p *Path) largestSigned(sum Sum, floor, sign float64) (value, at float64, exceeds bool) {
	var found best
	for piece := range len(p.Breaks) - 1 {
		from, length := p.Breaks[piece], p.Breaks[piece+1]-p.Breaks[piece]
		c := p.controls(piece, sum)
		bound := math.Inf(-1)
		for k := 0; k <= max(p.degree, 0); k++ {
			bound = max(bound, sign*c[k])
		}
		if found.reached(bound, floor) {
			continue
		}
		found.see(sign*c[0], from)
		if p.degree > 1 {
			course := p.course(piece, sum)
			for _, s := range course.Derivative().Roots(length) {
				found.see(sign*course.At(s), from+s)
			}
		}
		found.see(sign*c[max(p.degree, 0)], from+length)
	}
	return found.value, found.at, found.seen && Above(found.value, floor)
}

func (p *Path) largestSize(sum Sum, floor float64) (value, at float64, exceeds bool) {
	up, atUp, upExceeds := p.largestSigned(sum, floor, 1)
	down, atDown, downExceeds := p.largestSigned(sum, floor, -1)
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

// largestNorm searches √(a² + b²): its stationary places are the roots of
// a a′ + b b′.
func largestNorm(sum Sum, floor float64, a, b *Path) (value, at float64, exceeds bool) {
	var found best
	for piece := range len(a.Breaks) - 1 {
		from, length := a.Breaks[piece], a.Breaks[piece+1]-a.Breaks[piece]
		ca, cb := a.raised(piece, sum, b.degree), b.raised(piece, sum, a.degree)
		degree := max(a.degree, b.degree)
		bound := 0.0
		for k := 0; k <= degree; k++ {
			bound = max(bound, math.Hypot(ca[k], cb[k]))
		}
		if found.reached(bound, floor) {
			continue
		}
		pa, pb := a.course(piece, sum), b.course(piece, sum)
		found.see(math.Hypot(pa[0], pb[0]), from)
		for _, s := range normStationary(pa, pb, length) {
			found.see(math.Hypot(pa.At(s), pb.At(s)), from+s)
		}
		found.see(math.Hypot(pa.At(length), pb.At(length)), from+length)
	}
	return found.value, found.at, found.seen && Above(found.value, floor)
}

// normStationary returns the places in (0, length) where a² + b² is stationary.
func normStationary(a, b element.Polynomial, length float64) []float64 {
	da, db := a.Derivative(), b.Derivative()
	slope := make(polynomial, 2*len(a)-1)
	for i := range a {
		for j := range da {
			slope[i+j] += a[i]*da[j] + b[i]*db[j]
		}
	}
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
