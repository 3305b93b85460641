package frame

import (
	"fmt"
	"math"

	"spanwright/lang/model"
)

// hold is one restraint of one support: a direction that it holds, rigidly or
// elastically.
type hold struct {
	support   int // index into Model.Supports
	freedom   int // 0 to 5, in the support's axes
	node      int
	body      int
	row       vector6 // the movement held, over the body's movement
	along     vector6 // the force of a unit reaction on the node, global
	stiffness float64 // N/m or Nm/rad; 0 for a rigid restraint
	oneWay    bool    // pushes along +, never pulls
}

// heldRow is a direction taken out of a body's movements: it is the combination
// weights of the rows of its rigid holds.
type heldRow struct {
	row     vector6   // unit, in scaled coordinates
	weights []float64 // over rigid
}

// makeHolds lists the restraints of all supports and takes the rigid ones out
// of the movements of their bodies.
func (s *Structure) makeHolds() error {
	m := s.model
	for i := range m.Supports {
		sup := &m.Supports[i]
		for _, f := range freedomsOf(m.Plane) {
			r := sup.Freedoms[f]
			if r.Kind == model.Free {
				continue
			}
			h := hold{support: i, freedom: f, node: sup.Node, body: s.bodyOf[sup.Node], oneWay: sup.UpOnly && f == 2}
			if r.Kind == model.Elastic {
				h.stiffness = r.Stiffness
			}
			for j := range 3 {
				h.along[f/3*3+j] = sup.Axes[f%3][j]
			}
			h.row = brought(h.along, s.arms[sup.Node])
			b := &s.bodies[h.body]
			b.holds = append(b.holds, len(s.holds))
			s.holds = append(s.holds, h)
		}
	}
	for b := range s.bodies {
		if err := s.constrain(b); err != nil {
			return err
		}
	}
	return nil
}

// dependent is the length, of a unit row, below which what is left of it after
// the others were taken out counts as nothing.
const dependent = 1e-9

// rigidHolds returns the indices of the rigid holds of a body that act.
func (s *Structure) rigidHolds(b int) []int {
	var list []int
	for _, i := range s.bodies[b].holds {
		if s.holds[i].stiffness == 0 && !s.status.lifts(i) {
			list = append(list, i)
		}
	}
	return list
}

// constrain finds the movements that the supports leave to a body: an
// orthonormal basis, in coordinates whose turns are multiplied by the typical
// length, by modified Gram–Schmidt (Golub and Van Loan, Matrix Computations,
// 4th ed., section 5.2.8), first over the rows held, then over the unit vectors.
// Unit rows leave unit vectors, exactly.
func (s *Structure) constrain(b int) error {
	body := &s.bodies[b]
	body.held = body.held[:0]
	rigid := s.rigidHolds(b)
	for n, i := range rigid {
		h := &s.holds[i]
		row := s.scaled(h.row, -1)
		length := math.Sqrt(dot6(&row, &row))
		weights := make([]float64, len(rigid))
		weights[n] = 1 / length
		scale(&row, 1/length)
		s.orthogonalise(body.held, &row, weights)
		left := math.Sqrt(dot6(&row, &row))
		if left < dependent {
			return s.heldTwice(h)
		}
		scale(&row, 1/left)
		for k := range weights {
			weights[k] /= left
		}
		body.held = append(body.held, heldRow{row, weights})
	}
	body.basis = body.basis[:0]
	taken := make([]heldRow, len(body.held), 6)
	copy(taken, body.held)
	room := len(freedomsOf(s.model.Plane)) - len(body.held)
	for _, f := range s.candidates(b) {
		if len(body.basis) == room {
			break
		}
		row := f
		s.orthogonalise(taken, &row, nil)
		left := math.Sqrt(dot6(&row, &row))
		if left < 1e-3 { // six unit vectors always leave some that are longer
			continue
		}
		scale(&row, 1/left)
		taken = append(taken, heldRow{row: row})
		body.basis = append(body.basis, s.scaled(row, -1))
	}
	return nil
}

// candidates are the directions that a body's basis is made from: those of a
// turned support first, then the global ones.
func (s *Structure) candidates(b int) []vector6 {
	var list []vector6
	for _, i := range s.bodies[b].holds {
		if h := &s.holds[i]; s.model.Supports[h.support].Turned && len(s.bodies[b].nodes) == 1 {
			axes := &s.model.Supports[h.support].Axes
			for _, f := range freedomsOf(s.model.Plane) {
				var unit vector6
				unit[f] = 1
				list = append(list, toGlobal(axes, unit))
			}
			break
		}
	}
	for _, f := range freedomsOf(s.model.Plane) {
		var unit vector6
		unit[f] = 1
		list = append(list, unit)
	}
	return list
}

// orthogonalise takes the parts along the given rows out of one, twice over for
// the sake of rounding, and its weights along.
func (s *Structure) orthogonalise(rows []heldRow, row *vector6, weights []float64) {
	for range 2 {
		for i := range rows {
			part := dot6(&rows[i].row, row)
			for k := range row {
				row[k] -= part * rows[i].row[k]
			}
			for k := range weights {
				weights[k] -= part * rows[i].weights[k]
			}
		}
	}
}

// scaled multiplies the turns of a movement by the typical length to the given
// power. Rows over movements scale the other way round.
func (s *Structure) scaled(v vector6, power float64) vector6 {
	factor := math.Pow(s.scale, power)
	for k := 3; k < 6; k++ {
		v[k] *= factor
	}
	return v
}

func scale(v *vector6, factor float64) {
	for k := range v {
		v[k] *= factor
	}
}

// heldTwice says that a restraint adds nothing to those before it.
func (s *Structure) heldTwice(h *hold) error {
	name := s.nodeName(h.node)
	text := fmt.Sprintf("the supports of %s hold the same movement twice; keep one of them", name)
	if len(s.bodies[h.body].nodes) > 1 {
		text = fmt.Sprintf("the support of %s holds what other supports of the same rigid links hold already, so nobody can say how they share the reaction; free it there, or give the links a stiffness", name)
	}
	return &SupportError{Node: h.node, Text: text}
}

// prescribed returns the movement q₀ of a body whose rigid holds move by the
// given amounts (by hold; nil for none).
func (s *Structure) prescribed(b int, amounts []float64) (q vector6) {
	if amounts == nil {
		return q
	}
	body := &s.bodies[b]
	rigid := s.rigidHolds(b)
	for i := range body.held {
		var amount float64
		for k, w := range body.held[i].weights {
			amount += w * amounts[rigid[k]]
		}
		row := s.scaled(body.held[i].row, -1)
		for k := range q {
			q[k] += amount * row[k]
		}
	}
	return q
}
