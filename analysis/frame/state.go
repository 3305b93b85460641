package frame

import (
	"math"

	"spanwright/analysis/element"
	"spanwright/lang/model"
)

// State is the structure under one set of loads. It does not change.
type State struct {
	structure *Structure
	loading   loading
	x         []float64
	bodies    []vector6 // movements of the reference points
	holds     []float64 // reactions by hold, along its direction, N or Nm
	reacted   vector6
	residual  float64
	backward  float64
}

func (s *Structure) stateOf(l *loading, x []float64) *State {
	return &State{structure: s, loading: *l, x: x}
}

// finish works out movements and reactions from the unknowns.
func (s *Structure) finish(st *State) {
	st.bodies = s.movedSupports(&st.loading)
	for b := range s.bodies {
		for i := range s.bodies[b].basis {
			for k := range 6 {
				st.bodies[b][k] += s.bodies[b].basis[i][k] * st.x[s.start[b]+i]
			}
		}
	}
	s.react(st)
}

// react works out the reactions: what the bodies need beside their loads to
// hold the members' ends.
func (s *Structure) react(st *State) {
	st.holds = make([]float64, len(s.holds))
	needed := make([]vector6, len(s.bodies))
	supported := make([]bool, len(s.bodies))
	for i := range s.holds {
		supported[s.holds[i].body] = true
	}
	largest := 0.0
	for i := range s.segments {
		g := &s.segments[i]
		if !supported[g.bodies[0]] && !supported[g.bodies[1]] {
			continue
		}
		f := st.endForces(i)
		for end := range 2 {
			local := vector6(f[6*end : 6*end+6])
			for k := range 3 {
				largest = max(largest, math.Abs(local[k]))
			}
			on := g.onBody(end, local)
			for k := range on {
				needed[g.bodies[end]][k] += on[k]
			}
		}
	}
	for node, f := range st.loading.nodes {
		on := brought(f, s.arms[node])
		for k := range on {
			needed[s.bodyOf[node]][k] -= on[k]
		}
	}
	for i := range s.holds {
		if h := &s.holds[i]; h.stiffness > 0 && !s.status.lifts(i) {
			give := dot6(&h.row, &st.bodies[h.body])
			if st.loading.amounts != nil {
				give -= st.loading.amounts[i]
			}
			st.holds[i] = -h.stiffness * give
			for k := range h.row {
				needed[h.body][k] -= st.holds[i] * h.row[k]
			}
		}
	}
	for b := range s.bodies {
		rigid := s.rigidHolds(b)
		scaled := s.scaled(needed[b], -1)
		for _, held := range s.bodies[b].held {
			part := dot6(&held.row, &scaled)
			for k, w := range held.weights {
				st.holds[rigid[k]] += part * w
			}
		}
	}
	s.balance(st, largest)
}

// balance sums the reactions and compares them with what was applied, relative
// to the largest force about.
func (s *Structure) balance(st *State, largest float64) {
	extent := s.scale
	for i := range s.model.Nodes {
		p := s.model.Nodes[i].Position
		extent = max(extent, math.Sqrt(model.Dot(p, p)))
	}
	for i := range s.holds {
		h := &s.holds[i]
		f := h.along
		scale(&f, st.holds[i])
		f = brought(f, s.model.Nodes[h.node].Position)
		for k := range f {
			st.reacted[k] += f[k]
		}
		size := math.Abs(st.holds[i])
		if h.freedom >= 3 {
			size /= extent
		}
		largest = max(largest, size)
	}
	for k := range 3 {
		largest = max(largest, math.Abs(st.loading.applied[k]), math.Abs(st.loading.applied[3+k])/extent)
	}
	if largest == 0 {
		return
	}
	for k := range 6 {
		size := largest
		if k >= 3 {
			size *= extent
		}
		st.residual = max(st.residual, math.Abs(st.loading.applied[k]+st.reacted[k])/size)
	}
	if st.residual > balanced {
		if play := st.inPlay(extent); play > largest {
			st.residual *= largest / play
		}
	}
}

// inPlay returns the largest of the forces that cancel each other where the
// structure gives way freely: warming, lack of fit or a settlement of a statically
// determinate structure leaves nothing but the rounding of such forces, which must
// not be measured against itself.
func (st *State) inPlay(extent float64) (largest float64) {
	s := st.structure
	take := func(force element.Vector) {
		for k, f := range force {
			if k%6 >= 3 {
				f /= extent
			}
			largest = max(largest, math.Abs(f))
		}
	}
	for i := range s.segments {
		e := s.segments[i].element
		if spans := s.spansOn(i, &st.loading); len(spans) > 0 {
			take(e.FixedEnd(spans))
		}
		if st.loading.amounts == nil {
			continue
		}
		var force element.Vector
		moved, stiffness := st.movedEnds(i), e.Stiffness()
		for row := range force {
			for column, d := range moved {
				force[row] += math.Abs(stiffness[len(moved)*row+column] * d)
			}
		}
		take(force)
	}
	return largest
}

// endForces returns what the bodies do to a segment's ends, in member axes.
func (st *State) endForces(segment int) element.Vector {
	g := &st.structure.segments[segment]
	return g.element.EndForces(st.movedEnds(segment), st.structure.spansOn(segment, &st.loading))
}

func (st *State) movedEnds(segment int) element.Vector {
	g := &st.structure.segments[segment]
	return g.ends(st.bodies[g.bodies[0]], st.bodies[g.bodies[1]])
}

// Movement returns that of a node: ux, uy, uz, rx, ry, rz, global, m and rad. A
// turn that nothing resists is given as zero.
func (st *State) Movement(node int) [6]float64 {
	s := st.structure
	return carried(st.bodies[s.bodyOf[node]], s.arms[node])
}

// Reaction returns what the supports of a node do to it: Fx … Mz, global, N and
// Nm; zeros where there are none.
func (st *State) Reaction(node int) (force [6]float64) {
	s := st.structure
	for _, i := range s.bodies[s.bodyOf[node]].holds {
		if h := &s.holds[i]; h.node == node {
			for k := range force {
				force[k] += st.holds[i] * h.along[k]
			}
		}
	}
	return force
}

// SupportForce returns the reaction of one support in its own axes: Fx … Mz, N
// and Nm.
func (st *State) SupportForce(support int) (force [6]float64) {
	s := st.structure
	for i := range s.holds {
		if s.holds[i].support == support {
			force[s.holds[i].freedom] = st.holds[i]
		}
	}
	return force
}

// Ends returns what the nodes do to the first and the last end of a member: Fx …
// Mz in member axes, N and Nm. A rigid link gives zeros: statics alone does not
// tell its forces.
func (st *State) Ends(member int) (ends [2][6]float64) {
	s := st.structure
	first, last := s.first[member], s.first[member+1]-1
	if last < first {
		return ends
	}
	f := st.endForces(first)
	copy(ends[0][:], f[:6])
	f = st.endForces(last)
	copy(ends[1][:], f[6:])
	return ends
}

// Resultants returns those of the loads and of the reactions about the origin:
// Fx … Mz, global, N and Nm.
func (st *State) Resultants() (applied, reacted [6]float64) { return st.loading.applied, st.reacted }

// Residual is what is left of loads and reactions together, relative to the
// largest force about.
func (st *State) Residual() float64 { return st.residual }

// BackwardError is the componentwise backward error of the solve.
func (st *State) BackwardError() float64 { return st.backward }
