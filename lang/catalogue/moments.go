package catalogue

import "math"

// Gauss–Legendre points and weights on (0, 1). Three points are exact for the
// polynomials of a straight piece (degree 5); for those of an arc up to a quarter
// turn, twelve are at rounding level.
var (
	straightGauss = gaussPoints(3)
	arcGauss      = gaussPoints(12)
)

type gaussPoint struct{ t, weight float64 }

// gaussPoints finds the zeros of the Legendre polynomial of a degree by Newton's
// method (Abramowitz and Stegun, Handbook of Mathematical Functions, 25.4.29).
func gaussPoints(degree int) []gaussPoint {
	n := float64(degree)
	points := make([]gaussPoint, degree)
	for i := range points {
		x := math.Cos(math.Pi * (float64(i) + 0.75) / (n + 0.5))
		var slope float64
		for range 20 { // five are enough
			value, before := x, 1.0
			for k := 2.0; k <= n; k++ {
				value, before = ((2*k-1)*x*value-(k-1)*before)/k, value
			}
			slope = n * (x*value - before) / (x*x - 1)
			x -= value / slope
		}
		points[i] = gaussPoint{(1 + x) / 2, 1 / ((1 - x*x) * slope * slope)}
	}
	return points
}

// points visits the Gauss points of the share t0 to t1 of a piece, with the
// weighted steps dy and dz along it.
func (p *piece) points(t0, t1 float64, visit func(y, z, dy, dz float64)) {
	part := t1 - t0
	if p.radius == 0 {
		dy, dz := part*(p.y1-p.y0), part*(p.z1-p.z0)
		for _, g := range straightGauss {
			y, z := p.at(t0 + g.t*part)
			visit(y, z, g.weight*dy, g.weight*dz)
		}
		return
	}
	for _, g := range arcGauss {
		sin, cos := math.Sincos(p.from + (t0+g.t*part)*p.sweep)
		step := g.weight * part * p.sweep * p.radius
		visit(p.cy+p.radius*cos, p.cz+p.radius*sin, -sin*step, cos*step)
	}
}

// area returns ∫dA and the first moments ∫y dA and ∫z dA, by Green's theorem
// ∫f dA = ∮F dz with ∂F/∂y = f.
func (o outline) area() (area, firstY, firstZ float64) {
	o.each(func(p *piece) {
		p.points(0, 1, func(y, z, _, dz float64) {
			area += y * dz
			firstY += y * y / 2 * dz
			firstZ += y * z * dz
		})
	})
	return area, firstY, firstZ
}

// second returns ∫z2 dA, ∫y2 dA and ∫yz dA.
func (o outline) second() (iy, iz, iyz float64) {
	o.each(func(p *piece) {
		p.points(0, 1, func(y, z, _, dz float64) {
			iy += y * z * z * dz
			iz += y * y * y / 3 * dz
			iyz += y * y / 2 * z * dz
		})
	})
	return iy, iz, iyz
}

// centred moves the outline so that its centroid is the origin.
func (o outline) centred() outline {
	area, firstY, firstZ := o.area()
	return o.moved(-firstY/area, -firstZ/area)
}

// measure computes all that follows from a boundary about its centroid. Torsion,
// warping, shear areas for resistance and the shear centre are left to the
// shape.
func measure(o outline) Properties {
	var p Properties
	p.A, _, _ = o.area()
	p.Mass = p.A * SteelDensity
	p.Iy, p.Iz, p.Iyz = o.second()
	p.YMin, p.YMax, p.ZMin, p.ZMax = o.extremes()
	p.Depth, p.Width = p.ZMax-p.ZMin, p.YMax-p.YMin
	p.Wely = p.Iy / max(p.ZMax, -p.ZMin)
	p.Welz = p.Iz / max(p.YMax, -p.YMin)
	p.principal(o)

	lying := o.lying()
	p.Wply, p.Wplz = o.plasticModulus(), lying.plasticModulus()
	p.Asz, p.Asy = o.shearArea(p.Iy), lying.shearArea(p.Iz)
	return p
}

// principal fills the principal values by Mohr's circle.
func (p *Properties) principal(o outline) {
	const rounding = 1e-12
	sum, difference := p.Iy+p.Iz, p.Iy-p.Iz
	if math.Abs(p.Iyz) < rounding*sum {
		p.Iyz = 0
		p.Iu, p.Iv, p.Wu, p.Wv = p.Iy, p.Iz, p.Wely, p.Welz
		if difference < -rounding*sum {
			p.Alpha = math.Pi / 2
			p.Iu, p.Iv, p.Wu, p.Wv = p.Iz, p.Iy, p.Welz, p.Wely
		}
		return
	}
	radius := math.Hypot(difference/2, p.Iyz)
	p.Iu, p.Iv = sum/2+radius, sum/2-radius
	if math.Abs(difference) < rounding*sum {
		difference = 0
	}
	p.Alpha = math.Atan2(-2*p.Iyz, difference) / 2
	uMin, uMax, vMin, vMax := o.turned(-p.Alpha).extremes()
	p.Wu = p.Iu / max(vMax, -vMin)
	p.Wv = p.Iv / max(uMax, -uMin)
}
