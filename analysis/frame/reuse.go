package frame

import (
	"context"
	"slices"

	"spanwright/analysis/element"
)

// reuse makes the structure ready to be solved with as little work as the
// previous version of it leaves to be done: nothing where the stiffness is the
// same; a small system beside the old factor where few stiffnesses differ; a new
// factor in the old order where the connections are the same; all anew
// otherwise. previous may be nil.
func (s *Structure) reuse(ctx context.Context, previous *Structure) error {
	if previous == nil || previous.factor == nil || !s.sameUnknowns(previous) {
		return s.Factor(ctx, previous)
	}
	if s.sameStiffness(previous) {
		s.symbolic, s.matrix, s.factor, s.update, s.softest = previous.symbolic, previous.matrix, previous.factor, previous.update, previous.softest
		s.path = Path{Kind: LoadsOnly}
		return nil
	}
	if base := previous.factorised(); s.sameUnknowns(base) {
		if updated, err := s.updateFrom(ctx, base); updated || err != nil {
			return err
		}
	}
	return s.Factor(ctx, previous)
}

// factorised returns the structure that the factor is of.
func (s *Structure) factorised() *Structure {
	if s.update != nil {
		return s.update.base
	}
	return s
}

// sameUnknowns reports whether the unknowns of two structures are the same
// movements of the same bodies.
func (s *Structure) sameUnknowns(o *Structure) bool {
	if s.unknowns != o.unknowns || len(s.bodies) != len(o.bodies) || s.scale != o.scale {
		return false
	}
	for i := range s.bodies {
		if !slices.Equal(s.bodies[i].basis, o.bodies[i].basis) {
			return false
		}
	}
	return true
}

// sameStiffness reports whether two structures with the same unknowns have the
// same segments and supports, to the last digit.
func (s *Structure) sameStiffness(o *Structure) bool {
	if len(s.segments) != len(o.segments) || len(s.holds) != len(o.holds) {
		return false
	}
	for i := range s.holds {
		a, b := &s.holds[i], &o.holds[i]
		if a.body != b.body || a.row != b.row || a.stiffness != b.stiffness || s.status.lifts(i) != o.status.lifts(i) {
			return false
		}
	}
	for i := range s.segments {
		if !sameSegment(&s.segments[i], &o.segments[i]) {
			return false
		}
	}
	return true
}

// sameSegment reports whether two segments add the same to the stiffness.
func sameSegment(a, b *segment) bool { return sameGeometry(a, b) && element.Same(a.element, b.element) }

// sameGeometry reports whether two segments lie between the same bodies in the
// same way.
func sameGeometry(a, b *segment) bool {
	return a.bodies == b.bodies && a.arms == b.arms && a.axes == b.axes
}
