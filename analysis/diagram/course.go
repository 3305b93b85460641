package diagram

import (
	"math"

	"spanwright/lang/quantity"
)

// Course is a quantity along a member.
type Course struct {
	// Label is the trade's symbol or a word: "My", "w".
	Label string
	// Length of the member, m; First and Last are the names of its end nodes.
	Length      float64
	First, Last string
	// Value returns the quantity, SI, at a distance from the first end.
	Value func(x float64) float64
	// Most and Least are the exact largest and smallest value.
	Most, Least Mark
	// Steps are the places where the quantity may jump or turn, m, ascending.
	Steps []float64
	// Flipped draws positive values downward, as moments on the tension side are.
	Flipped bool
	// Unit is that of values, Lengths that of places.
	Unit, Lengths quantity.Unit
}

// Mark is a value and its place.
type Mark struct {
	Value float64 // SI
	At    float64 // m from the first end
}

// largest is the size to which the curve is scaled.
func (c *Course) largest() float64 {
	return math.Max(math.Abs(c.Most.Value), math.Abs(c.Least.Value))
}

// negligible is the share of the largest value below which an extreme is
// rounding, and not worth a label.
const negligible = 1e-6

// positive and negative say which signs the curve takes.
func (c *Course) positive() bool { return c.Most.Value > negligible*c.largest() }
func (c *Course) negative() bool { return c.Least.Value < -negligible*c.largest() }

// words writes a mark: "41 kNm at 3.72 m", "−86.3 kNm at B".
func (c *Course) words(m Mark) string {
	return quantity.Write(m.Value, c.Unit, 3) + " at " + c.place(m.At)
}

// place writes a distance, or the name of the node at an end.
func (c *Course) place(at float64) string {
	switch {
	case at <= 1e-9*c.Length && c.First != "":
		return c.First
	case at >= (1-1e-9)*c.Length && c.Last != "":
		return c.Last
	}
	return quantity.Write(at, c.Lengths, 3)
}
