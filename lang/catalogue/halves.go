package catalogue

import (
	"math"
	"slices"
)

// above returns the area above a level of z and its first moment about that
// level. By Green's theorem ∫max(z−c, 0)^k dA over the material is
// −∮max(z−c, 0)^(k+1)/(k+1) dy along the boundary.
func (o outline) above(level float64) (area, first float64) {
	o.each(func(p *piece) {
		p.sharesAbove(level, func(t0, t1 float64) {
			p.points(t0, t1, func(_, z, dy, _ float64) {
				area -= (z - level) * dy
				first -= (z - level) * (z - level) / 2 * dy
			})
		})
	})
	return area, first
}

// sharesAbove visits the parts of a piece that lie above a level.
func (p *piece) sharesAbove(level float64, visit func(t0, t1 float64)) {
	var room [2]float64
	begin := 0.0
	for _, end := range append(p.crossings(level, room[:0]), 1) {
		if _, z := p.at((begin + end) / 2); z > level && end > begin {
			visit(begin, end)
		}
		begin = end
	}
}

// crossings appends the shares, inside (0, 1) and ascending, at which the piece
// crosses a level of z.
func (p *piece) crossings(level float64, into []float64) []float64 {
	if p.radius == 0 {
		if t := (level - p.z0) / (p.z1 - p.z0); t > 0 && t < 1 {
			into = append(into, t)
		}
		return into
	}
	sine := (level - p.cz) / p.radius
	if math.Abs(sine) >= 1 {
		return into
	}
	rising := math.Asin(sine)
	for _, angle := range [2]float64{rising, math.Pi - rising} {
		// The share of the sweep at which the direction is reached first.
		turn := math.Mod(math.Copysign(1, p.sweep)*(angle-p.from), 2*math.Pi)
		if turn < 0 {
			turn += 2 * math.Pi
		}
		if t := turn / math.Abs(p.sweep); t > 0 && t < 1 {
			into = append(into, t)
		}
	}
	slices.Sort(into)
	return into
}

// chord returns the breadth of the material at a level of z.
func (o outline) chord(level float64) float64 {
	var breadth float64
	var room [2]float64
	o.each(func(p *piece) {
		for _, t := range p.crossings(level, room[:0]) {
			y, _ := p.at(t)
			_, zBefore := p.at(max(0, t-1e-6))
			_, zAfter := p.at(min(1, t+1e-6))
			breadth += y * math.Copysign(1, zAfter-zBefore) // upward on the right, downward on the left
		}
	})
	return breadth
}

// plasticModulus returns the modulus about the horizontal axis that halves the
// area: ∫|z − c| dA = 2∫max(z − c, 0) dA − ∫(z − c) dA. The outline is about its
// centroid, so that the last integral is −c·A.
func (o outline) plasticModulus() float64 {
	total, _, _ := o.area()
	level := 0.0
	if area, _ := o.above(0); math.Abs(area-total/2) > 1e-13*total {
		level = o.halvingLevel(total)
	}
	_, first := o.above(level)
	return 2*first + level*total
}

// halvingLevel finds the level with half the area above it by bisection: the
// area above falls steadily, but its slope, the breadth, jumps.
func (o outline) halvingLevel(total float64) float64 {
	_, _, low, high := o.extremes()
	for range 60 {
		middle := (low + high) / 2
		if area, _ := o.above(middle); area > total/2 {
			low = middle
		} else {
			high = middle
		}
	}
	return (low + high) / 2
}

// shearArea returns the elastic area for shear along z. The energy of
// Zhuravskii's stresses V·S/(I·b) equals that of V over an even area As:
//
//	As = I² / ∫ S(z)²/b(z) dz
//
// with S the first moment of what lies above z and b the breadth there
// (Timoshenko, Strength of Materials I, strain energy of shear): 5/6·A for a
// rectangle, 9/10·A for a circle, nearly the web for an I. Only stresses along z
// count, so that a ring, whose wall leans, needs its own formula.
func (o outline) shearArea(second float64) float64 {
	var energy float64
	levels := o.levels()
	for i := 1; i < len(levels); i++ {
		middle, half := (levels[i]+levels[i-1])/2, (levels[i]-levels[i-1])/2
		// The breadth beside an arc's end goes like a square root, which the
		// substitution z = middle − half·cos θ makes smooth.
		for _, g := range arcGauss {
			sin, cos := math.Sincos(g.t * math.Pi)
			z := middle - half*cos
			area, first := o.above(z)
			statical := first + z*area
			if breadth := o.chord(z); breadth > 0 {
				energy += statical * statical / breadth * g.weight * math.Pi * half * sin
			}
		}
	}
	return second * second / energy
}

// levels returns the heights at which pieces begin and end, ascending, without
// repeats.
func (o outline) levels() []float64 {
	var all []float64
	o.each(func(p *piece) { all = append(all, p.z0, p.z1) })
	slices.Sort(all)
	near := (all[len(all)-1] - all[0]) * 1e-9
	return slices.CompactFunc(all, func(a, b float64) bool { return math.Abs(a-b) < near })
}
