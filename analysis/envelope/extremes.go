package envelope

import (
	"math"
	"slices"
)

// equal is the relative difference below which two values count as equal.
const equal = 1e-12

// Above says that value is larger than best by more than rounding.
func Above(value, best float64) bool {
	return math.IsInf(best, -1) || value-best > equal*math.Abs(best)
}

// Extremes returns the largest and the smallest value of the quantity over all
// sums and the whole length. Without sums both have Sum −1.
func (p *Path) Extremes(sums []Sum) (most, least Peak) {
	if len(sums) == 0 {
		return nothing(), nothing()
	}
	if p.degree < 0 {
		return Peak{}, Peak{}
	}
	most, least = Peak{Value: math.Inf(-1)}, Peak{Value: math.Inf(1)}
	for i, sum := range sums {
		see := func(value, at float64) {
			if Above(value, most.Value) {
				most = Peak{value, at, i}
			}
			if Above(-value, -least.Value) {
				least = Peak{value, at, i}
			}
		}
		for piece := range len(p.Breaks) - 1 {
			from, length := p.Breaks[piece], p.Breaks[piece+1]-p.Breaks[piece]
			c := p.controls(piece, sum)
			see(c[0], from)
			inside := false
			for k := 1; k < p.degree; k++ {
				inside = inside || Above(c[k], most.Value) || Above(-c[k], -least.Value)
			}
			if inside {
				course := p.course(piece, sum)
				stationary := stationary(course, length)
				for _, s := range stationary.at[:stationary.count] {
					see(course.At(s), from+s)
				}
			}
			see(c[p.degree], from+length)
		}
	}
	return most, least
}

// measure is a quantity of which each sum has a largest value along the member.
type measure interface {
	// bound returns a value that the sum does not exceed.
	bound(sum Sum) float64
	// largest returns the largest value and its place. It may stop and report
	// false as soon as it knows that the value does not exceed floor.
	largest(sum Sum, floor float64) (value, at float64, exceeds bool)
}

// rank returns the sums with the largest values, at most count, largest first.
// The sum with the highest bound is looked at before all others: few remain to
// be searched after it.
func rank(sums []Sum, count int, m measure) []Peak {
	if len(sums) == 0 || count == 0 {
		return nil
	}
	bounds := make([]float64, len(sums))
	promising := 0
	for i, sum := range sums {
		bounds[i] = m.bound(sum)
		if Above(bounds[i], bounds[promising]) {
			promising = i
		}
	}
	var best []Peak
	look := func(i int) {
		floor := math.Inf(-1)
		if len(best) == count {
			floor = best[count-1].Value
		}
		if !Above(bounds[i], floor) {
			return
		}
		value, at, exceeds := m.largest(sums[i], floor)
		if !exceeds {
			return
		}
		place := len(best)
		for place > 0 && (Above(value, best[place-1].Value) || !Above(best[place-1].Value, value) && i < best[place-1].Sum) {
			place--
		}
		best = slices.Insert(best, place, Peak{value, at, i})
		best = best[:min(len(best), count)]
	}
	look(promising)
	for i := range sums {
		if i != promising {
			look(i)
		}
	}
	return best
}
