package frame

import (
	"context"
	"math"

	"spanwright/analysis/element"
	"spanwright/analysis/sparse"
)

// Factor assembles and factorises the stiffness. The error is a
// *MechanismError where the structure can move without resistance, or the
// context's. previous, if not nil, is a structure whose symbolic work may serve
// again.
func (s *Structure) Factor(ctx context.Context, previous *Structure) error {
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
	return s.factor.Solve(ctx, x, count)
}

// solveAll solves several loadings together.
func (s *Structure) solveAll(ctx context.Context, list []loading) ([]*State, error) {
	n := s.unknowns
	right := make([]float64, n*len(list))
	for i := range list {
		s.rightSide(&list[i], right[i*n:(i+1)*n])
	}
	x := append([]float64(nil), right...)
	if n > 0 {
		if err := s.factor.Solve(ctx, x, len(list)); err != nil {
			return nil, err
		}
	}
	states := make([]*State, len(list))
	for i := range list {
		states[i] = s.stateOf(&list[i], x[i*n:(i+1)*n])
		states[i].backward = s.refine(ctx, right[i*n:(i+1)*n], states[i].x)
	}
	for i := range states {
		s.finish(states[i])
	}
	return states, ctx.Err()
}

// enough is the componentwise backward error at which refining a solution gains
// nothing worth its price.
const enough = 1e-14

// refine improves a solution by at most two steps of iterative refinement and
// returns its componentwise backward error (Oettli and Prager 1964; Higham,
// Accuracy and Stability of Numerical Algorithms, 2nd ed., theorem 7.3).
func (s *Structure) refine(ctx context.Context, b, x []float64) float64 {
	if len(x) == 0 {
		return 0
	}
	residual, size := make([]float64, len(x)), make([]float64, len(x))
	measure := func() float64 {
		s.matrix.Residual(b, x, residual, size)
		worst, largest := 0.0, 0.0
		for _, v := range size {
			largest = max(largest, v)
		}
		for i := range residual {
			// Rows that carry next to nothing are measured against the others.
			worst = max(worst, math.Abs(residual[i])/max(size[i], 1e-12*largest, math.SmallestNonzeroFloat64))
		}
		return worst
	}
	error := measure()
	for range 2 {
		if error <= enough || ctx.Err() != nil {
			break
		}
		if s.factor.Solve(ctx, residual, 1) != nil {
			break
		}
		better := make([]float64, len(x))
		for i := range x {
			better[i] = x[i] + residual[i]
		}
		old := append([]float64(nil), x...)
		copy(x, better)
		if e := measure(); e < error {
			error = e
			continue
		}
		copy(x, old)
		break
	}
	return error
}
