package resolve

import (
	"math"

	"spanwright/lang/quantity"
)

// Value is what an expression comes to: a scalar, or a vector of two parts in
// a plane model and three in space.
type Value struct {
	// Parts holds one quantity for a scalar, two or three for a vector. It is
	// empty where the expression could not be evaluated; whoever uses such a
	// value stays silent, since the mistake has been reported where it is.
	Parts []quantity.Quantity
}

// value is the evaluator's form of Value, without a slice of its own.
type value struct {
	parts [3]quantity.Quantity
	count uint8 // 1 for a scalar, 2 or 3 for a vector, 0 for a value that could not be found
	// bare marks a plain number without any unit or name in it, which may have
	// lost its unit; zero marks a written 0, which fits every dimension.
	bare, zero bool
}

// bad is the value of an expression with a mistake in it.
var bad = value{}

func scalar(q quantity.Quantity) value {
	v := value{count: 1}
	v.parts[0] = q
	return v
}

func plain(x float64) value { return scalar(quantity.Plain(x)) }

// position returns a vector of lengths, of two parts (x, z) in a plane model.
func positionValue(p [3]float64, plane bool) value {
	length := func(x float64) quantity.Quantity {
		return quantity.Quantity{Value: x, Dimension: quantity.Length}
	}
	if plane {
		return value{parts: [3]quantity.Quantity{length(p[0]), length(p[2])}, count: 2}
	}
	return value{parts: [3]quantity.Quantity{length(p[0]), length(p[1]), length(p[2])}, count: 3}
}

func (v value) isBad() bool    { return v.count == 0 }
func (v value) isVector() bool { return v.count > 1 }

// q returns a scalar's quantity, and a vector's first part.
func (v value) q() quantity.Quantity { return v.parts[0] }

// number returns a scalar's SI value.
func (v value) number() float64 { return v.parts[0].Value }

// each returns the value with a function applied to its parts.
func (v value) each(f func(quantity.Quantity) quantity.Quantity) value {
	for i := range v.count {
		v.parts[i] = f(v.parts[i])
	}
	return v
}

// finite reports whether all parts are numbers that can be computed with.
func (v value) finite() bool {
	for i := range v.count {
		if math.IsNaN(v.parts[i].Value) || math.IsInf(v.parts[i].Value, 0) {
			return false
		}
	}
	return true
}

// words says what the value is: "a length", "an angle", "a position of two parts".
func (v value) words() string {
	switch {
	case v.count == 1:
		return v.parts[0].Words()
	case v.parts[0].Dimension == quantity.Length && v.count == 2:
		return "a position (x, z)"
	case v.parts[0].Dimension == quantity.Length:
		return "a position (x, y, z)"
	}
	return "a vector"
}

// public returns the value for readers outside the package.
func (v value) public() Value {
	if v.isBad() {
		return Value{}
	}
	return Value{Parts: append([]quantity.Quantity(nil), v.parts[:v.count]...)}
}
