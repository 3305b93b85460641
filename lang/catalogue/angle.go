package catalogue

import "math"

// angle makes an angle with its corner at −y, −z: leg h along z, leg b along y,
// root radius r1 and toe radii r2.
//
// The shear centre is where the middle lines of the legs meet (thin-walled
// theory: the stresses of each leg run along it). Shear areas are 5/6 of each
// leg (common practice): Zhuravskii's formula needs principal axes. Warping is
// that of the leg's thickness only and is left at 0.
func (s *Section) angle(h, b, t, r1, r2 float64) {
	s.finish(outline{[][]piece{loop(
		corner{0, 0, 0}, corner{b, 0, 0}, corner{b, t, r2}, corner{t, t, r1}, corner{t, h, r2}, corner{0, h, 0},
	)}})
	s.It = torsionAngle(h, b, t, r1)
	s.Asz, s.Asy = 5.0/6*h*t, 5.0/6*b*t
	s.Avz, s.Avy = s.Asz, s.Asy
	s.YShear, s.ZShear = s.YMin+t/2, s.ZMin+t/2
	s.Notes = append(s.Notes, "y and z are parallel to the legs, not principal: "+
		"u is turned by "+decimal(math.Round(s.Alpha*180/math.Pi*100)/100)+"° from y towards z")
}
