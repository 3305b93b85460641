package frame

import (
	"context"
	"errors"

	"spanwright/lang/model"
)

// Solver answers a model's load cases and combinations. It is for one goroutine
// at a time; the states that it returns do not change.
type Solver struct {
	structure *Structure
	loadings  []loading
	oneWay    *oneWay // nil where all parts act both ways
	// states are those of the cases once they are solved; kept are states of the
	// previous version whose case and stiffness have not changed, by case, nil for
	// none.
	states, kept []*State
}

// Prepare makes a solver: the structure with its factor, and the loads. previous,
// if not nil, is the solver of an earlier version of the model, from which
// everything is taken over that still holds. The error is a *MechanismError, a
// *MemberError, a *SupportError, ErrSecondOrder, ErrTooSoft or the context's.
func Prepare(ctx context.Context, m *model.Model, previous *Solver) (*Solver, error) {
	s, err := New(m)
	if err != nil {
		return nil, err
	}
	var old *Structure
	if previous != nil {
		old = previous.structure
	}
	if err := s.reuse(ctx, old); err != nil {
		return nil, err
	}
	solver := &Solver{structure: s, loadings: s.loadings()}
	for i := range solver.loadings {
		if err := s.checkInactive(&solver.loadings[i], "case "+m.Cases[i].Name); err != nil {
			return nil, err
		}
	}
	if s.hasOneWay() {
		solver.oneWay = newOneWay(s)
	} else if previous != nil && previous.oneWay == nil && s.path.Kind == LoadsOnly {
		solver.keepStates(previous)
	}
	return solver, nil
}

// Structure returns the structure with all its parts acting.
func (v *Solver) Structure() *Structure { return v.structure }

// OneWay reports whether some members or supports act one way only, so that
// combinations have to be solved and cannot be superposed.
func (v *Solver) OneWay() bool { return v.oneWay != nil }

// Path returns how much of the last version's work served again.
func (v *Solver) Path() Path { return v.structure.path }

// Softest returns the relative strain energy of the softest movement that was
// looked at, and 1 where none gave cause; below [Soft] it deserves a warning.
func (v *Solver) Softest() float64 { return v.structure.softest }

// Condition estimates the condition of the scaled stiffness in the 1-norm; of an
// updated stiffness, that before the update, which it is near to.
func (v *Solver) Condition(ctx context.Context) (float64, error) {
	s := v.structure
	if s.unknowns == 0 {
		return 1, nil
	}
	base := s.factorised()
	return base.factor.Condition(ctx, base.matrix)
}

// Cases solves all load cases. With one-way parts each finds its own; errs[i] is
// then why case i has no state, a *OneWayError or *MechanismError.
func (v *Solver) Cases(ctx context.Context) (states []*State, errs []error, err error) {
	errs = make([]error, len(v.loadings))
	if v.oneWay == nil {
		v.states, err = v.solveChanged(ctx)
		return v.states, errs, err
	}
	states = make([]*State, len(v.loadings))
	for i := range v.loadings {
		states[i], errs[i] = v.oneWay.solve(ctx, v.loadings[i])
		if errors.Is(errs[i], context.Canceled) || errors.Is(errs[i], context.DeadlineExceeded) {
			return nil, nil, errs[i]
		}
	}
	return states, errs, nil
}

// keepStates finds the cases that the previous version solved already.
func (v *Solver) keepStates(previous *Solver) {
	v.kept = make([]*State, len(v.loadings))
	for i := range min(len(v.loadings), len(previous.states)) {
		if v.loadings[i].equal(&previous.loadings[i]) {
			kept := *previous.states[i]
			kept.structure, kept.loading = v.structure, v.loadings[i]
			v.kept[i] = &kept
		}
	}
}

// solveChanged solves the cases that are not known yet.
func (v *Solver) solveChanged(ctx context.Context) ([]*State, error) {
	states := make([]*State, len(v.loadings))
	copy(states, v.kept)
	var list []loading
	var at []int
	for i := range states {
		if states[i] == nil {
			list, at = append(list, v.loadings[i]), append(at, i)
		}
	}
	solved, err := v.structure.solveAll(ctx, list)
	if err != nil {
		return nil, err
	}
	for k, i := range at {
		states[i] = solved[k]
	}
	return states, nil
}

// Combination solves a sum of load cases as a load of its own, as one-way parts
// demand.
func (v *Solver) Combination(ctx context.Context, factors []model.Factor) (*State, error) {
	sum := v.structure.combined(v.loadings, factors)
	if v.oneWay != nil {
		return v.oneWay.solve(ctx, sum)
	}
	states, err := v.structure.solveAll(ctx, []loading{sum})
	if err != nil {
		return nil, err
	}
	return states[0], nil
}

// checkInactive refuses loads on movements that nothing resists and that were
// taken out: a moment on a hinge, a force on a node without members. who is what
// the message calls the load.
func (s *Structure) checkInactive(l *loading, who string) error {
	for node, f := range l.nodes {
		if f == (vector6{}) {
			continue
		}
		if left := s.unheld(node, f); left >= 0 {
			return s.looseLoad(node, left, who)
		}
	}
	return nil
}

// unheld returns the freedom of a node's load that neither the basis nor the
// supports of its body take, or −1.
func (s *Structure) unheld(node int, f vector6) int {
	b := &s.bodies[s.bodyOf[node]]
	force := s.scaled(brought(f, s.arms[node]), -1)
	size := dot6(&force, &force)
	rows := append([]heldRow(nil), b.held...)
	for _, v := range b.basis {
		rows = append(rows, heldRow{row: s.scaled(v, 1)})
	}
	s.orthogonalise(rows, &force, nil)
	largest, at := 0.0, -1
	for _, k := range freedomsOf(s.model.Plane) {
		if v := force[k] * force[k]; v > 1e-18*size && v > largest {
			largest, at = v, k
		}
	}
	return at
}

// looseLoad says that nothing takes up a load on a node.
func (s *Structure) looseLoad(node, freedom int, who string) error {
	shape := make([][6]float64, len(s.model.Nodes))
	shape[node][freedom] = 1
	return &MechanismError{
		structure: s, Shapes: [][][6]float64{shape}, Moves: []NodeFreedom{{node, freedom}}, Remedy: []NodeFreedom{{node, freedom}},
		Load: who + " drives it",
	}
}
