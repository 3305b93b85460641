package catalogue

import "math"

// SteelDensity is the mass density behind Properties.Mass and the masses that
// section tables print, kg/m3 (EN 10365, EN 10056-1; EN 1993-1-1, 3.2.6).
const SteelDensity = 7850.0

// Section is a cross-section with what it is called, how it is drawn and what it
// is worth.
type Section struct {
	// Title is how people call it: "IPE 300", "rect 200 × 400 mm".
	Title string
	// Series and Size are the catalogue's names ("IPE", "300"); "" for a shape.
	Series, Size string
	// Shape is the word of a shape ("rect", "round", "pipe", "tube", "angle");
	// "" for a section of the catalogue.
	Shape string
	// Source is the standard that lays the dimensions down; "" for a shape.
	Source string
	// Notes say in words what a reader of the properties should know.
	Notes []string
	// Dimensions describe the section as the standard or the author does.
	Dimensions []Dimension
	// PublishedMass is the mass per metre that the standard prints, kg/m; 0 for
	// a shape.
	PublishedMass float64

	Properties

	boundary outline // about the centroid
}

// Dimension is one measure of a section.
type Dimension struct {
	Symbol string  // as the trade writes it: h, b, tw, tf, r
	Name   string  // in words: "depth", "web thickness"
	Value  float64 // m
}

// Properties are what a cross-section is worth in an elastic or plastic
// calculation. y and z are explained in the package documentation.
type Properties struct {
	A    float64 // m2, area
	Mass float64 // kg/m, A times SteelDensity

	Iy, Iz float64 // m4, second moments of area about y and z through the centroid: ∫z2 dA, ∫y2 dA
	Iyz    float64 // m4, product moment ∫yz dA; 0 for sections with an axis of symmetry along y or z

	Iu, Iv float64 // m4, principal second moments, Iu ≥ Iv
	Alpha  float64 // rad, from y to the major axis u, towards z; within (−π/2, π/2]

	It float64 // m4, St Venant torsion constant
	Iw float64 // m6, warping constant; 0 where warping is negligible

	Wely, Welz float64 // m3, elastic moduli of the fibre farthest from the axis
	Wply, Wplz float64 // m3, plastic moduli about the equal-area axes parallel to y and z
	Wu, Wv     float64 // m3, elastic moduli about the principal axes

	Avy, Avz float64 // m2, shear areas for resistance, shear along y and along z (EN 1993-1-1, 6.2.6(3))
	Asy, Asz float64 // m2, elastic shear areas, for a shear-flexible analysis

	Depth, Width float64 // m, overall along z and along y

	// The farthest fibres from the centroid, m: two negative numbers and two
	// positive ones. A symmetric section has YMin = −YMax.
	YMin, YMax, ZMin, ZMax float64

	// YShear and ZShear place the shear centre, from the centroid, m.
	YShear, ZShear float64
}

// RadiusY is the radius of gyration about y, m: √(Iy/A).
func (p *Properties) RadiusY() float64 { return math.Sqrt(p.Iy / p.A) }

// RadiusZ is the radius of gyration about z, m: √(Iz/A).
func (p *Properties) RadiusZ() float64 { return math.Sqrt(p.Iz / p.A) }

// RadiusU is the radius of gyration about the major principal axis, m.
func (p *Properties) RadiusU() float64 { return math.Sqrt(p.Iu / p.A) }

// RadiusV is the radius of gyration about the minor principal axis, m, the
// smallest of all.
func (p *Properties) RadiusV() float64 { return math.Sqrt(p.Iv / p.A) }

// IsPrincipal says that y and z are principal axes.
func (p *Properties) IsPrincipal() bool { return p.Iyz == 0 }

// Principal returns the section turned by −Alpha, so that its y and z are the
// principal axes u and v: Iy is Iu, Iz is Iv and Iyz is 0. A member that is to
// stand as before needs Alpha added to its roll. Plastic moduli and elastic
// shear areas are those of the turned boundary. A section whose axes are
// principal already comes back as it is.
func (s Section) Principal() Section {
	if s.IsPrincipal() {
		return s
	}
	turned := s
	turned.boundary = s.boundary.turned(-s.Alpha)
	turned.Properties = measure(turned.boundary)
	turned.Iyz, turned.Alpha = 0, 0
	turned.It, turned.Iw = s.It, s.Iw
	turned.Avy, turned.Avz = turned.Asy, turned.Asz
	sin, cos := math.Sincos(-s.Alpha)
	turned.YShear, turned.ZShear = cos*s.YShear-sin*s.ZShear, sin*s.YShear+cos*s.ZShear
	return turned
}

// Point is a place in a section, m from the centroid.
type Point struct{ Y, Z float64 }

// Outline returns the boundary as closed polygons, for drawing: the outer one
// anticlockwise (y to the right, z up), then holes clockwise. An arc becomes
// that many chords per quarter turn, at least one. The first point is not
// repeated at the end.
func (s Section) Outline(perQuarter int) [][]Point { return s.boundary.polygons(max(perQuarter, 1)) }

// finish fills what follows from the boundary, drawn anywhere, and puts the
// boundary about its centroid.
func (s *Section) finish(drawn outline) {
	s.boundary = drawn.centred()
	s.Properties = measure(s.boundary)
	s.Avy, s.Avz = s.Asy, s.Asz
}
