package element

// Extreme is a value and where it stands.
type Extreme struct {
	Value float64
	At    float64 // m from end 1
}

// Range returns the largest and the smallest value of a component along the
// whole length, both sides of a step included, found from the roots of the
// derivatives. Of equal values the one nearest end 1 counts.
func (c *Curves) Range(component Component) (largest, smallest Extreme) {
	started := false
	see := func(value, at float64) {
		if !started {
			largest, smallest, started = Extreme{value, at}, Extreme{value, at}, true
			return
		}
		if value > largest.Value {
			largest = Extreme{value, at}
		}
		if value < smallest.Value {
			smallest = Extreme{value, at}
		}
	}
	for i := range c.Pieces {
		p := &c.Pieces[i]
		course := p.Courses[component]
		length := p.To - p.From
		see(course[0], p.From)
		for _, s := range course.Derivative().Roots(length) {
			see(course.At(s), p.From+s)
		}
		see(course.At(length), p.To)
	}
	return largest, smallest
}

// Side picks the side of a step.
type Side int

// The sides: toward end 1 and toward end 2.
const (
	Before Side = iota
	After
)

// At returns a component at a distance from end 1, on the given side of a step.
func (c *Curves) At(component Component, x float64, side Side) float64 {
	chosen := &c.Pieces[0]
	for i := range c.Pieces {
		p := &c.Pieces[i]
		if p.From < x || (side == After && p.From <= x) {
			chosen = p
		}
	}
	return chosen.Courses[component].At(x - chosen.From)
}

// Add adds factor times the curves of another case with the same breaks.
func (c *Curves) Add(factor float64, other *Curves) {
	for i := range c.Pieces {
		for k := range c.Pieces[i].Courses {
			c.Pieces[i].Courses[k] = c.Pieces[i].Courses[k].Plus(factor, other.Pieces[i].Courses[k])
		}
	}
	c.BentYKnown = c.BentYKnown && other.BentYKnown
	c.BentZKnown = c.BentZKnown && other.BentZKnown
}
