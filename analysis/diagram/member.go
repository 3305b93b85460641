package diagram

import "spanwright/analysis"

// SectionForce returns a section force along a member as a course to draw;
// moments about y and z are drawn on the tension side.
func SectionForce(m analysis.Member, q analysis.Quantity) Course {
	c := along(m, q.String())
	most, least, _ := m.Range(q)
	c.Most, c.Least = Mark(most), Mark(least)
	c.Value = func(x float64) float64 { return m.Force(q, x) }
	display := m.Model().Display
	c.Unit = display.Force
	switch q {
	case analysis.My, analysis.Mz:
		c.Unit, c.Flipped = display.Moment, true
	case analysis.T:
		c.Unit = display.Moment
	}
	return c
}

// Shape returns the departure from the chord along one of the member's axes (1:
// y, 2: z) as a course to draw, and false where it cannot be known.
func Shape(m analysis.Member, axis int) (Course, bool) {
	most, least, known := m.Sag(axis)
	if !known {
		return Course{}, false
	}
	c := along(m, [...]string{"", "along y", "along z"}[axis])
	c.Most, c.Least = Mark(most), Mark(least)
	c.Value = func(x float64) float64 { return m.Departure(axis, x) }
	c.Unit = m.Model().Display.Movement
	return c, true
}

// Bending returns what a hover shows of a member: the larger of the two moments
// and the larger of the two departures from the chord.
func Bending(m analysis.Member) []Course {
	courses := []Course{larger(SectionForce(m, analysis.My), SectionForce(m, analysis.Mz))}
	alongZ, known := Shape(m, 2)
	if !known {
		return courses
	}
	alongY, _ := Shape(m, 1)
	return append(courses, larger(alongZ, alongY))
}

func larger(first, second Course) Course {
	if second.largest() > first.largest()*(1+negligible) {
		return second
	}
	return first
}

func along(m analysis.Member, label string) Course {
	mod := m.Model()
	nodes := mod.Members[m.Index()].Nodes
	steps := m.Steps()
	return Course{
		Label: label, Length: m.Length(), Steps: steps[1 : len(steps)-1],
		First: mod.Nodes[nodes[0]].Name, Last: mod.Nodes[nodes[len(nodes)-1]].Name,
		Lengths: mod.Display.Length,
	}
}
