package envelope

import (
	"math"

	"spanwright/analysis/element"
)

// maxDegree is that of the slope of a² + b² for two Polynomials.
const maxDegree = 9

// polynomial holds the coefficients of c0 + c1 s + … + c9 s⁹; degree is that of
// the highest one that is not zero, −1 where all are.
type polynomial struct {
	c      [maxDegree + 1]float64
	degree int
}

// trimmed sets the degree.
func (p *polynomial) trimmed() {
	p.degree = maxDegree
	for p.degree >= 0 && p.c[p.degree] == 0 {
		p.degree--
	}
}

func (p *polynomial) at(s float64) float64 {
	v := 0.0
	for i := p.degree; i >= 0; i-- {
		v = v*s + p.c[i]
	}
	return v
}

func (p *polynomial) derivative() (d polynomial) {
	for i := 1; i <= p.degree; i++ {
		d.c[i-1] = float64(i) * p.c[i]
	}
	d.degree = p.degree - 1
	return d
}

// places are roots, in order.
type places struct {
	at    [maxDegree + 1]float64
	count int
}

func (l *places) add(s float64) {
	if l.count < len(l.at) {
		l.at[l.count] = s
		l.count++
	}
}

// roots returns the places in (0, length) where p changes its sign or touches
// zero at a stationary place: between neighbouring roots of the derivative p is
// monotonic, and has one root at most. A polynomial that is zero throughout has
// none.
func (p *polynomial) roots(length float64) (found places) {
	if p.degree < 1 {
		return found
	}
	if p.degree == 1 {
		if s := -p.c[0] / p.c[1]; s > 0 && s < length {
			found.add(s)
		}
		return found
	}
	d := p.derivative()
	stationary := d.roots(length)
	left, atLeft := 0.0, p.at(0)
	for i := 0; i <= stationary.count; i++ {
		right := length
		if i < stationary.count {
			right = stationary.at[i]
		}
		atRight := p.at(right)
		switch {
		case atRight == 0 && right < length:
			found.add(right)
		case atLeft < 0 && atRight > 0 || atLeft > 0 && atRight < 0:
			found.add(p.between(&d, left, right, atLeft < 0))
		}
		left, atLeft = right, atRight
	}
	return found
}

// between finds the root of a bracket by Newton steps, halving where they leave
// it or gain too little (Press et al., Numerical Recipes, 3rd ed., 2007, section
// 9.4).
func (p *polynomial) between(d *polynomial, left, right float64, rising bool) float64 {
	s := left + (right-left)/2
	lastStep := right - left
	for range 200 {
		v := p.at(s)
		if v == 0 {
			return s
		}
		if v < 0 == rising {
			left = s
		} else {
			right = s
		}
		step := -v / d.at(s)
		next := s + step
		if !(next > left && next < right) || math.Abs(step) > lastStep/2 {
			next = left + (right-left)/2
			step = (right - left) / 2
		}
		if next == s || next <= left || next >= right || math.Abs(step) <= 2e-16*math.Abs(s) {
			return next
		}
		s, lastStep = next, math.Abs(step)
	}
	return s
}

// stationary returns the places in (0, length) where a course is stationary.
func stationary(course element.Polynomial, length float64) places {
	var slope polynomial
	for i := 1; i < len(course); i++ {
		slope.c[i-1] = float64(i) * course[i]
	}
	slope.trimmed()
	return slope.roots(length)
}
