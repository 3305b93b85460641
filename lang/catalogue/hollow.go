package catalogue

import "math"

// ring makes a round tube. Shear area for resistance 2A/π (EN 1993-1-1,
// 6.2.6(3)g). Elastic shear area by Cowper (The shear coefficient in
// Timoshenko's beam theory, Journal of Applied Mechanics 33, 1966) without
// Poisson's effect, as 5/6 is for a rectangle: A/2 for a thin wall.
//
//	As = A·6·(1 + m²)²/(7·(1 + m²)² + 20·m²), m = inner over outer diameter
func (s *Section) ring(diameter, wall float64) {
	inner := diameter - 2*wall
	s.finish(outline{[][]piece{
		rectangle(diameter, diameter, diameter/2),
		reversed(rectangle(inner, inner, inner/2)),
	}})
	s.It = s.Iy + s.Iz
	m := inner / diameter
	both := (1 + m*m) * (1 + m*m)
	s.Asy = s.A * 6 * both / (7*both + 20*m*m)
	s.Asz = s.Asy
	s.Avy = 2 * s.A / math.Pi
	s.Avz = s.Avy
}

// box makes a rectangular tube with rounded corners. Shear areas for resistance
// A·h/(b + h) along the depth and A·b/(b + h) along the width (EN 1993-1-1,
// 6.2.6(3)f).
func (s *Section) box(depth, width, wall, outerRadius, innerRadius float64) {
	s.finish(outline{[][]piece{
		rectangle(width, depth, outerRadius),
		reversed(rectangle(width-2*wall, depth-2*wall, innerRadius)),
	}})
	s.It = torsionBox(depth, width, wall, (outerRadius+innerRadius)/2)
	s.Avz = s.A * depth / (depth + width)
	s.Avy = s.A * width / (depth + width)
}
