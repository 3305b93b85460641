package frame

import (
	"context"
	"math"
	"runtime"
	"slices"

	"golang.org/x/sync/errgroup"

	"spanwright/analysis/element"
	"spanwright/analysis/sparse"
)

// Factor assembles and factorises the stiffness. The error is a
// *MechanismError where the structure can move without resistance, or the
// context's. previous, if not nil, is a structure whose symbolic work may serve
// again.
func (s *Structure) Factor(ctx context.Context, previous *Structure) error {
	s.update, s.softest = nil, 1
	if s.unknowns == 0 {
		s.path = Path{Kind: Nothing}
		return nil
	}
	pattern := s.pattern()
	if previous != nil && previous.symbolic != nil && previous.symbolic.Fits(pattern) {
		s.symbolic, s.path = previous.symbolic, Path{Kind: Numeric}
	} else {
		var err error
		if s.symbolic, err = sparse.Analyse(pattern); err != nil {
			return err
		}
		s.path = Path{Kind: Symbolic}
	}
	if err := ctx.Err(); err != nil {
		return err
	}
	s.matrix = sparse.NewMatrix(s.symbolic)
	s.assemble()
	s.factor = sparse.NewFactor(s.symbolic)
	noted, err := s.factor.Factorize(ctx, s.matrix, sparse.Tiny)
	if err != nil {
		return err
	}
	return s.judge(ctx, noted)
}

// refactor computes the factor again for a structure that is soft but sound,
// with the pivots as small as they are.
func (s *Structure) refactor(ctx context.Context) error {
	noted, err := s.factor.Factorize(ctx, s.matrix, 0)
	if err == nil && len(noted) > 0 {
		return ErrTooSoft
	}
	return err
}

// pattern is the graph of the bodies.
func (s *Structure) pattern() sparse.Pattern {
	p := sparse.Pattern{Weights: make([]int, len(s.bodies)), Coordinates: make([][3]float64, len(s.bodies))}
	for i := range s.bodies {
		p.Weights[i] = len(s.bodies[i].basis)
		p.Coordinates[i] = s.model.Nodes[s.bodies[i].nodes[0]].Position
	}
	for i := range s.segments {
		if a, b := s.segments[i].bodies[0], s.segments[i].bodies[1]; a != b {
			p.Edges = append(p.Edges, [2]int{a, b})
		}
	}
	return p
}

// spansOn returns the loads on a segment out of those on its member.
func (s *Structure) spansOn(segment int, l *loading) []element.SpanLoad {
	g := &s.segments[segment]
	spans := l.spans[g.member]
	if len(spans) == 0 || s.first[g.member+1]-s.first[g.member] == 1 {
		return spans
	}
	return element.Between(spans, g.from, g.to, s.model.Members[g.member].Length)
}

// rightSide fills the forces on the unknowns that a loading comes to.
func (s *Structure) rightSide(l *loading, out []float64) {
	loads := s.onBodies(l)
	for b := range s.bodies {
		for i := range s.bodies[b].basis {
			out[s.start[b]+i] = dot6(&s.bodies[b].basis[i], &loads[b])
		}
	}
}

// onBodies returns the forces at the reference points of the bodies that a
// loading comes to, prescribed movements included.
func (s *Structure) onBodies(l *loading) []vector6 {
	onBodies := make([]vector6, len(s.bodies))
	add := func(b int, f vector6, sign float64) {
		for k := range f {
			onBodies[b][k] += sign * f[k]
		}
	}
	for node, f := range l.nodes {
		if f != (vector6{}) {
			add(s.bodyOf[node], brought(f, s.arms[node]), 1)
		}
	}
	moved := s.movedSupports(l)
	for i := range s.segments {
		g := &s.segments[i]
		spans := s.spansOn(i, l)
		first, second := moved[g.bodies[0]], moved[g.bodies[1]]
		if len(spans) == 0 && first == (vector6{}) && second == (vector6{}) {
			continue
		}
		f := g.element.EndForces(g.ends(first, second), spans)
		for end := range 2 {
			add(g.bodies[end], g.onBody(end, vector6(f[6*end:6*end+6])), -1)
		}
	}
	for i := range s.holds {
		if h := &s.holds[i]; h.stiffness > 0 && !s.status.lifts(i) {
			give := -dot6(&h.row, &moved[h.body])
			if l.amounts != nil {
				give += l.amounts[i]
			}
			row := h.row
			scale(&row, h.stiffness*give)
			add(h.body, row, 1)
		}
	}
	return onBodies
}

// movedSupports returns the movement q₀ of each body that the supports
// prescribe.
func (s *Structure) movedSupports(l *loading) []vector6 {
	moved := make([]vector6, len(s.bodies))
	if l.amounts == nil {
		return moved
	}
	for b := range s.bodies {
		moved[b] = s.prescribed(b, l.amounts)
	}
	return moved
}

// substitute replaces right-hand sides, one behind the other, by the unknowns.
func (s *Structure) substitute(ctx context.Context, x []float64, count int) error {
	if s.unknowns == 0 || count == 0 {
		return nil
	}
	if err := s.factor.Solve(ctx, x, count); err != nil {
		return err
	}
	if s.update != nil {
		s.update.correct(x, count)
	}
	return nil
}

// solveAll solves several loadings together.
func (s *Structure) solveAll(ctx context.Context, list []loading) ([]*State, error) {
	n := s.unknowns
	right := make([]float64, n*len(list))
	if err := eachCase(ctx, len(list), func(i int) { s.rightSide(&list[i], right[i*n:(i+1)*n]) }); err != nil {
		return nil, err
	}
	x := append([]float64(nil), right...)
	if err := s.substitute(ctx, x, len(list)); err != nil {
		return nil, err
	}
	errors, err := s.refine(ctx, right, x, len(list))
	if err != nil {
		return nil, err
	}
	if s.update != nil && len(list) > 0 && !(slices.Max(errors) <= mostOfUpdate) {
		// The change is too large for the old factor.
		if err := s.Factor(ctx, s.update.base); err != nil {
			return nil, err
		}
		return s.solveAll(ctx, list)
	}
	states := make([]*State, len(list))
	if err := eachCase(ctx, len(list), func(i int) {
		states[i] = s.stateOf(&list[i], x[i*n:(i+1)*n])
		states[i].backward = errors[i]
		s.finish(states[i])
	}); err != nil {
		return nil, err
	}
	for i := range states {
		if err := s.rebalance(ctx, right[i*n:(i+1)*n], states[i]); err != nil {
			return nil, err
		}
	}
	return states, ctx.Err()
}

// eachCase does a piece of work for each load case with all processors. What a
// case comes to does not depend on the others.
func eachCase(ctx context.Context, count int, work func(i int)) error {
	var group errgroup.Group
	group.SetLimit(runtime.GOMAXPROCS(0))
	for i := range count {
		group.Go(func() error {
			if err := ctx.Err(); err != nil {
				return err
			}
			work(i)
			return nil
		})
	}
	return group.Wait()
}

// enough is the componentwise backward error at which refining a solution gains
// nothing worth its price.
const enough = 1e-14

// refine improves solutions by at most two steps of iterative refinement, all
// that need it together, and returns their componentwise backward errors
// (Oettli and Prager 1964; Higham, Accuracy and Stability of Numerical
// Algorithms, 2nd ed., theorem 7.3).
func (s *Structure) refine(ctx context.Context, b, x []float64, count int) ([]float64, error) {
	n := s.unknowns
	errors := make([]float64, count)
	if n == 0 {
		return errors, nil
	}
	residuals := make([]float64, n*count)
	measure := func(i int, x []float64) float64 {
		return s.backwardError(b[i*n:(i+1)*n], x, residuals[i*n:(i+1)*n])
	}
	if err := eachCase(ctx, count, func(i int) { errors[i] = measure(i, x[i*n:(i+1)*n]) }); err != nil {
		return nil, err
	}
	var rough []int // solutions that may be bettered
	for i, e := range errors {
		if e > enough {
			rough = append(rough, i)
		}
	}
	for range 2 {
		if len(rough) == 0 {
			break
		}
		steps := make([]float64, n*len(rough))
		for k, i := range rough {
			copy(steps[k*n:(k+1)*n], residuals[i*n:(i+1)*n])
		}
		if err := s.substitute(ctx, steps, len(rough)); err != nil {
			return nil, err
		}
		bettered := make([]bool, len(rough))
		if err := eachCase(ctx, len(rough), func(k int) {
			i := rough[k]
			better, old := steps[k*n:(k+1)*n], x[i*n:(i+1)*n]
			for u := range better {
				better[u] += old[u]
			}
			if e := measure(i, better); e < errors[i] {
				errors[i], bettered[k] = e, true
				copy(old, better)
			}
		}); err != nil {
			return nil, err
		}
		still := rough[:0]
		for k, i := range rough {
			if bettered[k] && errors[i] > enough {
				still = append(still, i)
			}
		}
		rough = still
	}
	return errors, nil
}

// balanced is the residual of loads and reactions that needs no mending.
const balanced = 1e-12

// rebalance mends a state whose loads and reactions do not balance to the last
// digits. That happens where very stiff members move as rigid bodies on soft
// springs: the rounding of an entry of K is then no longer small against the
// springs. Refinement helps, if the residual is worked out member by member from
// natural deformations, because such end forces are in balance whatever the
// movements.
func (s *Structure) rebalance(ctx context.Context, right []float64, st *State) error {
	for range 3 {
		if st.residual <= balanced || len(st.x) == 0 {
			return nil
		}
		step := s.resistance(st.x)
		for i := range step {
			step[i] = right[i] - step[i]
		}
		if err := s.substitute(ctx, step, 1); err != nil {
			return err
		}
		for i := range step {
			step[i] += st.x[i]
		}
		better := s.stateOf(&st.loading, step)
		better.backward = st.backward
		s.finish(better)
		if !(better.residual < st.residual) {
			return nil
		}
		*st = *better
	}
	return nil
}

// resistance returns K x from natural deformations.
func (s *Structure) resistance(x []float64) []float64 {
	moved := s.movedBodies(x)
	forces := make([]vector6, len(s.bodies))
	for i := range s.segments {
		g := &s.segments[i]
		f := g.element.EndForces(g.ends(moved[g.bodies[0]], moved[g.bodies[1]]), nil)
		for end := range 2 {
			on := g.onBody(end, vector6(f[6*end:6*end+6]))
			for k := range on {
				forces[g.bodies[end]][k] += on[k]
			}
		}
	}
	for i := range s.holds {
		if h := &s.holds[i]; h.stiffness > 0 && !s.status.lifts(i) {
			row := h.row
			scale(&row, h.stiffness*dot6(&h.row, &moved[h.body]))
			for k := range row {
				forces[h.body][k] += row[k]
			}
		}
	}
	out := make([]float64, len(x))
	for b := range s.bodies {
		for i := range s.bodies[b].basis {
			out[s.start[b]+i] = dot6(&s.bodies[b].basis[i], &forces[b])
		}
	}
	return out
}

// backwardError returns that of a solution, and fills its residual.
func (s *Structure) backwardError(b, x, residual []float64) float64 {
	size := make([]float64, len(x))
	s.matrix.Residual(b, x, residual, size)
	worst, largest := 0.0, slices.Max(size)
	for i := range residual {
		// Rows that carry next to nothing are measured against the others.
		worst = max(worst, math.Abs(residual[i])/max(size[i], 1e-12*largest, math.SmallestNonzeroFloat64))
	}
	return worst
}
