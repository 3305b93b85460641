package quantity

import (
	"strings"
	"sync"
)

// Unit is a unit of measurement.
type Unit struct {
	// Symbol is the normal spelling: "kN", "mm2", "kNm", "kN/m2".
	Symbol string
	// Name is the unit in words: "kilonewton". Derived units may have none.
	Name string
	// Factor is the SI value of one of it.
	Factor    float64
	Dimension Dimension
	// Angle marks rad, deg and mrad, which are dimensionless.
	Angle bool
	// Customary marks US customary units.
	Customary bool
}

const (
	inch       = 0.0254            // exact, international yard and pound agreement of 1959
	pound      = 0.45359237        // kg, exact, the same agreement
	standardG  = 9.80665           // m/s2, exact, 3rd CGPM 1901
	poundForce = pound * standardG // N
	degree     = 3.141592653589793238462643383279502884 / 180
	squareFoot = 144 * inch * inch
	squareInch = inch * inch
	kip        = 1000 * poundForce
	tonne      = 1000.0
	foot       = 12 * inch
	yard       = 3 * foot
)

// base is the table of units that a file may write. A length symbol may carry
// a power from 2 to 6 ("mm2", "in4"); those are made from this table.
var base = []Unit{
	{Symbol: "m", Name: "metre", Factor: 1, Dimension: Length},
	{Symbol: "mm", Name: "millimetre", Factor: 1e-3, Dimension: Length},
	{Symbol: "cm", Name: "centimetre", Factor: 1e-2, Dimension: Length},
	{Symbol: "km", Name: "kilometre", Factor: 1e3, Dimension: Length},
	{Symbol: "in", Name: "inch", Factor: inch, Dimension: Length, Customary: true},
	{Symbol: "ft", Name: "foot", Factor: foot, Dimension: Length, Customary: true},
	{Symbol: "yd", Name: "yard", Factor: yard, Dimension: Length, Customary: true},

	{Symbol: "N", Name: "newton", Factor: 1, Dimension: Force},
	{Symbol: "kN", Name: "kilonewton", Factor: 1e3, Dimension: Force},
	{Symbol: "MN", Name: "meganewton", Factor: 1e6, Dimension: Force},
	{Symbol: "lbf", Name: "pound-force", Factor: poundForce, Dimension: Force, Customary: true},
	{Symbol: "kip", Name: "kip (1000 pound-force)", Factor: kip, Dimension: Force, Customary: true},

	{Symbol: "Pa", Name: "pascal", Factor: 1, Dimension: Stress},
	{Symbol: "kPa", Name: "kilopascal", Factor: 1e3, Dimension: Stress},
	{Symbol: "MPa", Name: "megapascal (N/mm2)", Factor: 1e6, Dimension: Stress},
	{Symbol: "GPa", Name: "gigapascal", Factor: 1e9, Dimension: Stress},
	{Symbol: "psi", Name: "pound-force per square inch", Factor: poundForce / squareInch, Dimension: Stress, Customary: true},
	{Symbol: "ksi", Name: "kip per square inch", Factor: kip / squareInch, Dimension: Stress, Customary: true},
	{Symbol: "psf", Name: "pound-force per square foot", Factor: poundForce / squareFoot, Dimension: Stress, Customary: true},
	{Symbol: "ksf", Name: "kip per square foot", Factor: kip / squareFoot, Dimension: Stress, Customary: true},

	{Symbol: "kg", Name: "kilogram", Factor: 1, Dimension: Mass},
	{Symbol: "t", Name: "tonne", Factor: tonne, Dimension: Mass},
	{Symbol: "lb", Name: "pound (mass)", Factor: pound, Dimension: Mass, Customary: true},

	{Symbol: "s", Name: "second", Factor: 1, Dimension: Time},
	{Symbol: "Hz", Name: "hertz", Factor: 1, Dimension: Frequency},
	{Symbol: "K", Name: "kelvin (a temperature difference)", Factor: 1, Dimension: Temperature},

	{Symbol: "rad", Name: "radian", Factor: 1, Angle: true},
	{Symbol: "mrad", Name: "milliradian", Factor: 1e-3, Angle: true},
	{Symbol: "deg", Name: "degree", Factor: degree, Angle: true},
	{Symbol: "%", Name: "per cent", Factor: 1e-2},

	{Symbol: "Nm", Name: "newton metre", Factor: 1, Dimension: Moment},
	{Symbol: "kNm", Name: "kilonewton metre", Factor: 1e3, Dimension: Moment},
	{Symbol: "MNm", Name: "meganewton metre", Factor: 1e6, Dimension: Moment},
	{Symbol: "kipft", Name: "kip foot", Factor: kip * foot, Dimension: Moment, Customary: true},
	{Symbol: "kipin", Name: "kip inch", Factor: kip * inch, Dimension: Moment, Customary: true},
	{Symbol: "lbft", Name: "pound-force foot", Factor: poundForce * foot, Dimension: Moment, Customary: true},
	{Symbol: "plf", Name: "pound-force per foot", Factor: poundForce / foot, Dimension: ForcePerLength, Customary: true},
	{Symbol: "klf", Name: "kip per foot", Factor: kip / foot, Dimension: ForcePerLength, Customary: true},
}

// units is the whole table by symbol, powers of lengths and of the second
// included. It is made once and never written again.
var units = sync.OnceValue(func() map[string]Unit {
	table := make(map[string]Unit, 2*len(base))
	for _, u := range base {
		table[u.Symbol] = u
		if u.Dimension == Length {
			for n := 2; n <= 6; n++ {
				p := u.Power(n)
				table[p.Symbol] = p
			}
		}
	}
	table["s2"] = table["s"].Power(2)
	return table
})

// Lookup returns the unit with a symbol in its normal spelling, powers such as
// "mm2" included. Joined forms with "/" or "*" are expressions, not units.
func Lookup(symbol string) (Unit, bool) {
	u, ok := units()[symbol]
	return u, ok
}

// Units returns all units that a file may write by one symbol, without powers,
// in the order of the table. The slice is the caller's own.
func Units() []Unit { return append([]Unit(nil), base...) }

// ByDimension returns the units of a dimension, powers included, in the order
// of the table, SI before customary.
func ByDimension(d Dimension) []Unit {
	var si, customary []Unit
	add := func(u Unit) {
		if u.Dimension != d || u.Angle {
			return
		}
		if u.Customary {
			customary = append(customary, u)
		} else {
			si = append(si, u)
		}
	}
	for _, u := range base {
		add(u)
		if u.Dimension == Length {
			for n := 2; n <= 6; n++ {
				add(u.Power(n))
			}
		}
	}
	return append(si, customary...)
}

// Angles returns the units of angle.
func Angles() []Unit {
	var list []Unit
	for _, u := range base {
		if u.Angle {
			list = append(list, u)
		}
	}
	return list
}

// WrongCase returns the unit that is spelt like symbol but for upper and lower
// case ("KN" for kN, "Mm" for mm, "mpa" for MPa), and false where there is
// none, the symbol is right as it is, or more than one would fit ("MRAD").
func WrongCase(symbol string) (Unit, bool) {
	if _, ok := Lookup(symbol); ok {
		return Unit{}, false
	}
	var found Unit
	count := 0
	for s, u := range units() {
		if strings.EqualFold(s, symbol) {
			found = u
			count++
		}
	}
	return found, count == 1
}

// Power returns the unit raised to n ≥ 2, with the symbol "mm2".
func (u Unit) Power(n int) Unit {
	p := Unit{Symbol: u.Symbol + string(rune('0'+n)), Factor: 1, Customary: u.Customary}
	for range n {
		p.Factor *= u.Factor
		p.Dimension = p.Dimension.Times(u.Dimension)
	}
	switch n {
	case 2:
		p.Name = "square " + u.Name
	case 3:
		p.Name = "cubic " + u.Name
	default:
		p.Name = u.Name + " to the power " + string(rune('0'+n))
	}
	return p
}

// Over returns the quotient of two units, with the symbol "kN/m".
func (u Unit) Over(v Unit) Unit {
	return Unit{
		Symbol: u.Symbol + "/" + v.Symbol, Name: u.Name + " per " + v.Name,
		Factor: u.Factor / v.Factor, Dimension: u.Dimension.Over(v.Dimension),
		Customary: u.Customary || v.Customary,
	}
}
