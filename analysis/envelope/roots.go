package envelope

import "math"

// polynomial holds the coefficients of c0 + c1 s + … of any degree.
type polynomial []float64

func (p polynomial) at(s float64) float64 {
	v := 0.0
	for i := len(p) - 1; i >= 0; i-- {
		v = v*s + p[i]
	}
	return v
}

func (p polynomial) derivative() polynomial {
	if len(p) < 2 {
		return nil
	}
	d := make(polynomial, len(p)-1)
	for i := range d {
		d[i] = float64(i+1) * p[i+1]
	}
	return d
}

// roots returns the places in (0, length) where p changes its sign or touches
// zero at a stationary place, in order: between neighbouring roots of the
// derivative p is monotonic, and has one root at most.
func (p polynomial) roots(length float64) []float64 {
	for len(p) > 0 && p[len(p)-1] == 0 {
		p = p[:len(p)-1]
	}
	if len(p) < 2 {
		return nil
	}
	places := append(p.derivative().roots(length), length)
	var found []float64
	left, atLeft := 0.0, p.at(0)
	for _, right := range places {
		atRight := p.at(right)
		switch {
		case atRight == 0 && right < length:
			found = append(found, right)
		case atLeft < 0 && atRight > 0 || atLeft > 0 && atRight < 0:
			found = append(found, p.between(left, right, atLeft < 0))
		}
		left, atLeft = right, atRight
	}
	return found
}

// between halves the interval down to rounding.
func (p polynomial) between(left, right float64, rising bool) float64 {
	for {
		middle := left + (right-left)/2
		if middle <= left || middle >= right {
			return middle
		}
		v := p.at(middle)
		if v == 0 {
			return middle
		}
		if v < 0 == rising {
			left = middle
		} else {
			right = middle
		}
		if right-left <= 4e-16*math.Abs(right) {
			return left + (right-left)/2
		}
	}
}
