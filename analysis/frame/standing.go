package frame

import (
	"context"
	"errors"
	"math"

	"spanwright/lang/model"
)

// standing returns the variant with the given parts out of action. Where it can
// move without resistance, parts are put back that stop the movement: those that
// the load would make act, or, where the load does not drive the movement, any.
// (A panel with two crossed ties under gravity alone: both would be pressed, and
// without both nothing holds it sideways, but nothing pushes it either.) What no
// part stops is a mechanism.
func (o *oneWay) standing(ctx context.Context, st status, l *loading) (*Structure, error) {
	for range o.steps() {
		s, err := o.structure(ctx, st)
		var mechanism *MechanismError
		if !errors.As(err, &mechanism) {
			return s, err
		}
		back := mechanism.structure.putBack(mechanism.Shapes, l)
		if len(back) == 0 {
			return nil, err
		}
		st = st.changed(back)
	}
	return o.structure(ctx, st)
}

// putBack picks a part to put back for each shape, or returns none where a shape
// has no such part.
func (s *Structure) putBack(shapes [][][6]float64, l *loading) []change {
	loads := s.onBodies(l)
	work := make([][][6]float64, len(shapes))
	for i := range shapes {
		work[i] = append([][6]float64(nil), shapes[i]...)
	}
	parts := s.outOfAction()
	var back []change
	for k, shape := range work {
		drive := s.drive(shape, loads)
		best, most := -1, 1e-9
		for i, part := range parts {
			stretch := s.stretch(part, shape)
			// A driven part must be one that the movement makes act.
			if stretch*drive < 0 {
				continue
			}
			if math.Abs(stretch) > most*(1+1e-6) {
				best, most = i, math.Abs(stretch)
			}
		}
		if best < 0 {
			return nil
		}
		back = append(back, parts[best])
		// What is left of the other shapes does not move the part put back.
		stretch := s.stretch(parts[best], shape)
		for _, other := range work[k+1:] {
			factor := s.stretch(parts[best], other) / stretch
			for node := range other {
				for f := range other[node] {
					other[node][f] -= factor * shape[node][f]
				}
			}
		}
		parts = append(parts[:best:best], parts[best+1:]...)
	}
	return back
}

// outOfAction lists the one-way parts that do not act.
func (s *Structure) outOfAction() []change {
	var parts []change
	for i := range s.model.Members {
		if s.status.slackens(i) {
			parts = append(parts, change{member: i, hold: -1})
		}
	}
	for i := range s.holds {
		if s.status.lifts(i) {
			parts = append(parts, change{member: -1, hold: i})
		}
	}
	return parts
}

// drive is the work of the loads through a movement, 0 where it is nothing but
// rounding.
func (s *Structure) drive(shape [][6]float64, loads []vector6) float64 {
	sum, size := 0.0, 0.0
	for b := range s.bodies {
		v := shape[s.bodies[b].nodes[0]]
		for k := range v {
			sum += v[k] * loads[b][k]
			size += math.Abs(v[k] * loads[b][k])
		}
	}
	if math.Abs(sum) <= 1e-9*size {
		return 0
	}
	return sum
}

// stretch is by how much a movement calls on a one-way part: the elongation of a
// tie, the shortening of a strut, the sinking of a support.
func (s *Structure) stretch(part change, shape [][6]float64) float64 {
	if part.hold >= 0 {
		h := &s.holds[part.hold]
		return -dot6(&h.along, &shape[h.node])
	}
	b := &s.model.Members[part.member]
	g := &s.segments[s.first[part.member]]
	first := toLocal(&g.axes, carried(shape[b.Nodes[0]], b.Ends[0].Offset))
	last := toLocal(&g.axes, carried(shape[b.Nodes[len(b.Nodes)-1]], b.Ends[1].Offset))
	if b.Sense == model.CompressionOnly {
		return first[0] - last[0]
	}
	return last[0] - first[0]
}
