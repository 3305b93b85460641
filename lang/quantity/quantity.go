package quantity

import "fmt"

// Quantity is a number with a dimension. Value is in SI units.
type Quantity struct {
	Value     float64
	Dimension Dimension
	// Angle remembers that a dimensionless value is an angle, so that it is
	// shown in degrees or milliradians.
	Angle bool
}

// Of returns value of a unit: Of(12, kN).
func Of(value float64, u Unit) Quantity {
	return Quantity{Value: value * u.Factor, Dimension: u.Dimension, Angle: u.Angle}
}

// Plain returns a dimensionless quantity.
func Plain(value float64) Quantity { return Quantity{Value: value} }

// In returns the number of units in the quantity. The dimensions must agree.
func (q Quantity) In(u Unit) float64 { return q.Value / u.Factor }

// Words returns what the quantity is, in words: "an angle", "a length".
func (q Quantity) Words() string {
	if q.Angle && q.Dimension == None {
		return "an angle"
	}
	return q.Dimension.Words()
}

// MismatchError says that two quantities cannot be added, compared or assigned.
type MismatchError struct{ Left, Right Quantity }

// Error names both sides in words.
func (e *MismatchError) Error() string {
	return fmt.Sprintf("the left side is %s, the right side %s", e.Left.Words(), e.Right.Words())
}

// Plus returns the sum; the error is a *MismatchError.
func (q Quantity) Plus(r Quantity) (Quantity, error) {
	if q.Dimension != r.Dimension {
		return Quantity{}, &MismatchError{q, r}
	}
	return Quantity{q.Value + r.Value, q.Dimension, q.Angle || r.Angle}, nil
}

// Minus returns the difference; the error is a *MismatchError.
func (q Quantity) Minus(r Quantity) (Quantity, error) { return q.Plus(r.Negated()) }

// Negated returns the quantity with the other sign.
func (q Quantity) Negated() Quantity { return Quantity{-q.Value, q.Dimension, q.Angle} }

// Times returns the product. An angle times a plain number stays an angle.
func (q Quantity) Times(r Quantity) Quantity {
	return Quantity{
		Value:     q.Value * r.Value,
		Dimension: q.Dimension.Times(r.Dimension),
		Angle:     q.Angle != r.Angle && q.Dimension == None && r.Dimension == None,
	}
}

// Over returns the quotient. The caller refuses a zero divisor.
func (q Quantity) Over(r Quantity) Quantity {
	return Quantity{
		Value:     q.Value / r.Value,
		Dimension: q.Dimension.Over(r.Dimension),
		Angle:     q.Angle && !r.Angle && q.Dimension == None && r.Dimension == None,
	}
}
