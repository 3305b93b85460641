package quantity

import (
	"fmt"
	"strings"
)

// Dimension holds the exponents of the base dimensions of a quantity. The zero
// value is dimensionless. Angles are dimensionless.
type Dimension struct {
	Length, Mass, Time, Temperature int8
}

// The dimensions that the language speaks of.
var (
	None                   = Dimension{}
	Length                 = Dimension{Length: 1}
	Area                   = Dimension{Length: 2}
	Volume                 = Dimension{Length: 3} // a section modulus too
	SecondMoment           = Dimension{Length: 4} // second moment of area, torsion constant
	WarpingConstant        = Dimension{Length: 6}
	Curvature              = Dimension{Length: -1}
	Mass                   = Dimension{Mass: 1}
	MassPerLength          = Dimension{Mass: 1, Length: -1}
	MassPerArea            = Dimension{Mass: 1, Length: -2}
	Density                = Dimension{Mass: 1, Length: -3}
	MassInertia            = Dimension{Mass: 1, Length: 2}
	Time                   = Dimension{Time: 1}
	Frequency              = Dimension{Time: -1}
	Velocity               = Dimension{Length: 1, Time: -1}
	Acceleration           = Dimension{Length: 1, Time: -2}
	Force                  = Dimension{Mass: 1, Length: 1, Time: -2}
	Moment                 = Dimension{Mass: 1, Length: 2, Time: -2} // rotational stiffness too
	ForcePerLength         = Dimension{Mass: 1, Time: -2}            // a line load, a stiffness
	Stress                 = Dimension{Mass: 1, Length: -1, Time: -2}
	ForcePerVolume         = Dimension{Mass: 1, Length: -2, Time: -2}
	MomentPerLength        = Force
	Temperature            = Dimension{Temperature: 1}
	TemperaturePerLength   = Dimension{Temperature: 1, Length: -1}
	Expansion              = Dimension{Temperature: -1}
	FlexuralRigidity       = Dimension{Mass: 1, Length: 3, Time: -2} // EI
	TranslationFlexibility = Dimension{Mass: -1, Time: 2}
)

// words names dimensions as an engineer does, in the singular with its article.
var words = map[Dimension]string{
	None:                   "a plain number",
	Length:                 "a length",
	Area:                   "an area",
	Volume:                 "a volume or section modulus",
	SecondMoment:           "a second moment of area",
	WarpingConstant:        "a warping constant",
	Curvature:              "a number per length",
	Mass:                   "a mass",
	MassPerLength:          "a mass per length",
	MassPerArea:            "a mass per area",
	Density:                "a density",
	MassInertia:            "a moment of inertia of mass",
	Time:                   "a time",
	Frequency:              "a frequency",
	Velocity:               "a speed",
	Acceleration:           "an acceleration",
	Force:                  "a force",
	Moment:                 "a moment",
	ForcePerLength:         "a force per length",
	Stress:                 "a force per area",
	ForcePerVolume:         "a force per volume",
	Temperature:            "a temperature",
	TemperaturePerLength:   "a temperature per length",
	Expansion:              "a number per temperature",
	FlexuralRigidity:       "a bending stiffness EI",
	TranslationFlexibility: "a length per force",
}

// Words returns the dimension in words, with an article: "a length", "a force
// per area". A dimension without a name of its own is spelt out in base units.
func (d Dimension) Words() string {
	if w, ok := words[d]; ok {
		return w
	}
	return "a quantity in " + d.String()
}

// String returns the dimension in SI base units: "kg·m/s2", or "1".
func (d Dimension) String() string {
	var over, under []string
	add := func(symbol string, exponent int8) {
		list := &over
		if exponent < 0 {
			list, exponent = &under, -exponent
		}
		switch exponent {
		case 0:
		case 1:
			*list = append(*list, symbol)
		default:
			*list = append(*list, fmt.Sprintf("%s%d", symbol, exponent))
		}
	}
	add("kg", d.Mass)
	add("m", d.Length)
	add("s", d.Time)
	add("K", d.Temperature)
	text := strings.Join(over, "·")
	if text == "" {
		text = "1"
	}
	for _, u := range under {
		text += "/" + u
	}
	return text
}

// Times returns the dimension of a product.
func (d Dimension) Times(e Dimension) Dimension {
	return Dimension{d.Length + e.Length, d.Mass + e.Mass, d.Time + e.Time, d.Temperature + e.Temperature}
}

// Over returns the dimension of a quotient.
func (d Dimension) Over(e Dimension) Dimension {
	return Dimension{d.Length - e.Length, d.Mass - e.Mass, d.Time - e.Time, d.Temperature - e.Temperature}
}

// maxExponent bounds exponents, so that repeated powers cannot wrap around.
const maxExponent = 24

// Sane reports whether the exponents are of a size that any formula has.
func (d Dimension) Sane() bool {
	for _, e := range []int8{d.Length, d.Mass, d.Time, d.Temperature} {
		if e > maxExponent || e < -maxExponent {
			return false
		}
	}
	return true
}

// Power returns the dimension raised to n, and false where the exponents would
// leave the range of any formula.
func (d Dimension) Power(n int) (Dimension, bool) {
	if n > maxExponent || n < -maxExponent {
		return Dimension{}, d == None
	}
	wide := [4]int{int(d.Length) * n, int(d.Mass) * n, int(d.Time) * n, int(d.Temperature) * n}
	for _, e := range wide {
		if e > maxExponent || e < -maxExponent {
			return Dimension{}, false
		}
	}
	return Dimension{int8(wide[0]), int8(wide[1]), int8(wide[2]), int8(wide[3])}, true
}

// Root returns the dimension of the square root, and false where an exponent
// is odd.
func (d Dimension) Root() (Dimension, bool) {
	if d.Length%2 != 0 || d.Mass%2 != 0 || d.Time%2 != 0 || d.Temperature%2 != 0 {
		return Dimension{}, false
	}
	return Dimension{d.Length / 2, d.Mass / 2, d.Time / 2, d.Temperature / 2}, true
}
