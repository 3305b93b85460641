package element

import "math"

// Polynomial holds the coefficients of c0 + c1 s + … + c5 s⁵.
type Polynomial [6]float64

// At returns the value at s.
func (p Polynomial) At(s float64) float64 {
	v := p[5]
	for i := 4; i >= 0; i-- {
		v = v*s + p[i]
	}
	return v
}

// Plus returns p + factor · q.
func (p Polynomial) Plus(factor float64, q Polynomial) Polynomial {
	for i := range p {
		p[i] += factor * q[i]
	}
	return p
}

// Times returns factor · p.
func (p Polynomial) Times(factor float64) Polynomial {
	for i := range p {
		p[i] *= factor
	}
	return p
}

// Derivative returns dp/ds.
func (p Polynomial) Derivative() Polynomial {
	var d Polynomial
	for i := 1; i < len(p); i++ {
		d[i-1] = float64(i) * p[i]
	}
	return d
}

// Integral returns the integral from 0 to s plus a constant. The degree must
// be below five.
func (p Polynomial) Integral(constant float64) Polynomial {
	q := Polynomial{constant}
	for i := 1; i < len(q); i++ {
		q[i] = p[i-1] / float64(i)
	}
	return q
}

// Roots returns the places in (0, length) where p changes its sign or touches
// zero, in order, each to rounding. A polynomial that is zero throughout has
// none.
func (p Polynomial) Roots(length float64) []float64 {
	degree := len(p) - 1
	for degree > 0 && p[degree] == 0 {
		degree--
	}
	switch degree {
	case 0:
		return nil
	case 1:
		if s := -p[0] / p[1]; s > 0 && s < length {
			return []float64{s}
		}
		return nil
	case 2:
		return quadraticRoots(p, length)
	}
	// Between neighbouring stationary places p is monotonic: one root at most.
	places := append(p.Derivative().Roots(length), length)
	var roots []float64
	left, atLeft := 0.0, p.At(0)
	for _, right := range places {
		atRight := p.At(right)
		switch {
		case atRight == 0 && right < length:
			roots = append(roots, right)
		case atLeft*atRight < 0:
			roots = append(roots, bracketed(p, left, right, atLeft))
		}
		left, atLeft = right, atRight
	}
	return roots
}

// quadraticRoots solves without cancellation: Press et al., Numerical Recipes
// (3rd ed., 2007), eq. 5.6.4.
func quadraticRoots(p Polynomial, length float64) []float64 {
	a, b, c := p[2], p[1], p[0]
	discriminant := b*b - 4*a*c
	if discriminant < 0 {
		return nil
	}
	q := -(b + math.Copysign(math.Sqrt(discriminant), b)) / 2
	r1 := q / a
	r2 := r1
	if q != 0 {
		r2 = c / q
	}
	if r1 > r2 {
		r1, r2 = r2, r1
	}
	var roots []float64
	if r1 > 0 && r1 < length {
		roots = append(roots, r1)
	}
	if r2 > 0 && r2 < length && r2 != r1 {
		roots = append(roots, r2)
	}
	return roots
}

// bracketed finds the root between left and right, where p has opposite signs,
// by Newton steps that fall back to halving when they leave the bracket.
func bracketed(p Polynomial, left, right, atLeft float64) float64 {
	d := p.Derivative()
	s := (left + right) / 2
	for range 100 {
		v := p.At(s)
		if v == 0 {
			return s
		}
		if v*atLeft > 0 {
			left = s
		} else {
			right = s
		}
		next := s - v/d.At(s)
		if !(next > left && next < right) {
			next = (left + right) / 2
		}
		if next == s || right-left <= 4e-16*math.Abs(right) {
			return next
		}
		s = next
	}
	return s
}
