package quantity

import (
	"math"
	"strconv"
	"strings"
)

// Display says in which unit each kind of value is shown to people.
type Display struct {
	Length   Unit // sizes and positions
	Movement Unit // displacements and deflections
	Force    Unit
	Moment   Unit
	Stress   Unit
	Angle    Unit // rotations
	Mass     Unit
}

// Metric is the display without any wish of the file: m, mm, kN, kNm, MPa,
// mrad, kg.
func Metric() Display {
	return Display{
		Length: unit("m"), Movement: unit("mm"), Force: unit("kN"), Moment: unit("kNm"),
		Stress: unit("MPa"), Angle: unit("mrad"), Mass: unit("kg"),
	}
}

// Customary is the display of a file that speaks in US customary units.
func Customary() Display {
	return Display{
		Length: unit("ft"), Movement: unit("in"), Force: unit("kip"), Moment: unit("kipft"),
		Stress: unit("ksi"), Angle: unit("mrad"), Mass: unit("lb"),
	}
}

func unit(symbol string) Unit {
	u, ok := Lookup(symbol)
	if !ok {
		panic("quantity: no unit " + symbol)
	}
	return u
}

// For returns the unit in which a quantity of this dimension is shown. Where
// the display has no unit for the dimension, one is made from those it has
// (force per length: Force/Length), and at last from SI base units.
func (d Display) For(dimension Dimension) Unit {
	switch dimension {
	case None:
		return Unit{Factor: 1}
	case Length:
		return d.Length
	case Force:
		return d.Force
	case Moment:
		return d.Moment
	case Stress:
		return d.Stress
	case Mass:
		return d.Mass
	case ForcePerLength:
		return d.Force.Over(d.Length)
	case Area, Volume, SecondMoment, WarpingConstant:
		small := unit("cm")
		if d.Length.Customary {
			small = unit("in")
		}
		return small.Power(int(dimension.Length))
	case Temperature:
		return unit("K")
	case TemperaturePerLength:
		return unit("K").Over(d.Length)
	case Frequency:
		return unit("Hz")
	case Time:
		return unit("s")
	case MassPerLength:
		return d.Mass.Over(d.Length)
	case Density:
		return d.Mass.Over(d.Length.Power(3))
	case Acceleration:
		return d.Length.Over(unit("s2"))
	}
	return Unit{Symbol: dimension.String(), Factor: 1, Dimension: dimension}
}

// Show writes a quantity for people, in the unit of the display, with three
// significant digits and the unit: "21.4 kN", "−18.2 kNm", "30 deg".
func (d Display) Show(q Quantity) string {
	u := d.For(q.Dimension)
	if q.Angle && q.Dimension == None {
		u = d.Angle
	}
	return Write(q.Value, u, 3)
}

// Write writes an SI value in a unit for people: a number as [Number] writes
// it, a space, the unit.
func Write(value float64, u Unit, significant int) string {
	number := Number(value/u.Factor, significant)
	if u.Symbol == "" {
		return number
	}
	if u.Symbol[0] == '1' && strings.HasPrefix(u.Symbol, "1/") {
		return number + " " + u.Symbol[1:]
	}
	return number + " " + u.Symbol
}

// Number writes a number for people with the given significant digits, digits
// before the decimal point never rounded away, no trailing zeros behind it, a
// true minus sign, and powers of ten where zeros would hide the value. A
// negative number that rounds to zero is written "0".
func Number(value float64, significant int) string {
	switch {
	case math.IsNaN(value):
		return "not a number"
	case math.IsInf(value, 1):
		return "∞"
	case math.IsInf(value, -1):
		return "−∞"
	case value == 0:
		return "0"
	}
	magnitude := int(math.Floor(math.Log10(math.Abs(value))))
	var text string
	if magnitude < -5 || magnitude > 9 {
		text = strconv.FormatFloat(value, 'e', max(significant-1, 0), 64)
		mantissa, exponent, _ := strings.Cut(text, "e")
		n, _ := strconv.Atoi(exponent)
		text = trimZeros(mantissa) + "e" + strconv.Itoa(n)
	} else {
		text = trimZeros(strconv.FormatFloat(value, 'f', max(significant-1-magnitude, 0), 64))
	}
	if text == "-0" {
		return "0"
	}
	return strings.ReplaceAll(text, "-", "−")
}

// trimZeros cuts zeros at the end of a decimal fraction.
func trimZeros(text string) string {
	if !strings.Contains(text, ".") {
		return text
	}
	return strings.TrimRight(strings.TrimRight(text, "0"), ".")
}
