package frame

import (
	"slices"

	"spanwright/analysis/element"
)

// takeOver lets the structure use the factor of one with the same stiffness,
// and reports whether it could.
func (s *Structure) takeOver(previous *Structure) bool {
	if previous == nil || previous.factor == nil || s.unknowns != previous.unknowns || !s.sameStiffness(previous) {
		return false
	}
	s.symbolic, s.matrix, s.factor, s.softest = previous.symbolic, previous.matrix, previous.factor, previous.softest
	s.path = Path{Kind: LoadsOnly}
	return true
}

// sameStiffness reports whether two structures have the same bodies, segments
// and supports, to the last digit.
func (s *Structure) sameStiffness(o *Structure) bool {
	if len(s.segments) != len(o.segments) || len(s.holds) != len(o.holds) || len(s.bodies) != len(o.bodies) || s.scale != o.scale {
		return false
	}
	for i := range s.bodies {
		if !slices.Equal(s.bodies[i].basis, o.bodies[i].basis) {
			return false
		}
	}
	for i := range s.holds {
		a, b := &s.holds[i], &o.holds[i]
		if a.body != b.body || a.row != b.row || a.stiffness != b.stiffness || s.status.lifts(i) != o.status.lifts(i) {
			return false
		}
	}
	for i := range s.segments {
		a, b := &s.segments[i], &o.segments[i]
		if a.bodies != b.bodies || a.arms != b.arms || a.axes != b.axes || !element.Same(a.element, b.element) {
			return false
		}
	}
	return true
}
