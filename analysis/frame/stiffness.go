package frame

import (
	"context"
	"math"

	"spanwright/analysis/element"
	"spanwright/lang/model"
)

// NodeStiffness is how the structure resists movements of one node, everything
// else free to follow: the rest of the structure condensed to the node. A
// coefficient K_ij is the force at freedom i for one unit of movement at j while
// the other freedoms of the node are held. One-way parts count as in the
// structure asked.
type NodeStiffness struct {
	Node int // index into Model.Nodes
	// Axes are the axes of the freedoms ux … rz, as rows in global coordinates:
	// those of the node's support where that is turned, otherwise the global ones.
	Axes [3][3]float64
	// Freedoms are the freedoms that the model has and no support holds; the
	// blocks below have a row and a column for each.
	Freedoms []int
	// Stiffness is the condensed block, N/m, N/rad, Nm/m and Nm/rad. Flexibility
	// is the movement at i for a unit force at j, all freedoms free to follow:
	// the inverse. It is +Inf where nothing resists.
	Stiffness, Flexibility [][]float64
	// OthersHeld and OthersFree are, by freedom, the force for one unit of
	// movement while the other freedoms of the node are held, and while they are
	// free. A movement that supports hold has +Inf, one that nothing resists 0.
	OthersHeld, OthersFree [6]float64
}

// StiffnessAt returns the stiffness of the structure at a node. The structure
// must have been factorised. The error is the context's.
func (s *Structure) StiffnessAt(ctx context.Context, node int) (*NodeStiffness, error) {
	at := s.bodyOf[node]
	flexibility, err := s.bodyFlexibility(ctx, at)
	if err != nil {
		return nil, err
	}
	k := &NodeStiffness{Node: node, Axes: s.axesAt(node)}
	condensed := inverted(flexibility)
	moves := map[int][]float64{} // by freedom that can be moved alone: the body's coordinates
	for f := range 6 {
		k.OthersHeld[f] = math.Inf(1)
	}
	for _, f := range freedomsOf(s.model.Plane) {
		var unit vector6
		unit[f] = 1
		if x, free := s.coordinates(node, toGlobal(&k.Axes, unit)); free {
			moves[f] = x
			k.Freedoms = append(k.Freedoms, f)
			k.OthersHeld[f] = product(x, condensed, x)
		}
	}
	k.Stiffness = square(len(k.Freedoms))
	k.Flexibility = square(len(k.Freedoms))
	forces := make([][]float64, 6)
	for f := range 6 {
		var unit vector6
		unit[f] = 1
		forces[f] = s.onCoordinates(node, toGlobal(&k.Axes, unit))
		k.OthersFree[f] = 1 / s.flexibilityBetween(node, k.Axes, flexibility, forces, f, f)
	}
	for i, fi := range k.Freedoms {
		for j, fj := range k.Freedoms {
			k.Stiffness[i][j] = product(moves[fi], condensed, moves[fj])
			k.Flexibility[i][j] = s.flexibilityBetween(node, k.Axes, flexibility, forces, fi, fj)
		}
	}
	return k, nil
}

// axesAt returns the axes in which a node's freedoms are best told.
func (s *Structure) axesAt(node int) [3][3]float64 {
	for _, i := range s.bodies[s.bodyOf[node]].holds {
		if h := &s.holds[i]; h.node == node && s.model.Supports[h.support].Turned {
			return s.model.Supports[h.support].Axes
		}
	}
	return [3][3]float64{{1, 0, 0}, {0, 1, 0}, {0, 0, 1}}
}

// bodyFlexibility returns the movements of a body's free coordinates for unit
// forces at each of them.
func (s *Structure) bodyFlexibility(ctx context.Context, b int) ([][]float64, error) {
	count, start, n := len(s.bodies[b].basis), s.start[b], s.unknowns
	flexibility := square(count)
	if count == 0 {
		return flexibility, nil
	}
	x := make([]float64, n*count)
	for j := range count {
		x[j*n+start+j] = 1
	}
	if err := s.substitute(ctx, x, count); err != nil {
		return nil, err
	}
	for i := range count {
		for j := range count {
			flexibility[i][j] = (x[j*n+start+i] + x[i*n+start+j]) / 2
		}
	}
	return flexibility, nil
}

// coordinates returns the free coordinates of a body at which one of its nodes
// moves by v, and whether the supports allow that at all. Parts of the movement
// that nothing resists have no coordinate.
func (s *Structure) coordinates(node int, v vector6) ([]float64, bool) {
	b := &s.bodies[s.bodyOf[node]]
	arm := s.arms[node]
	q := s.scaled(carried(v, [3]float64{-arm[0], -arm[1], -arm[2]}), 1)
	size := math.Sqrt(dot6(&q, &q))
	for i := range b.held {
		if math.Abs(dot6(&b.held[i].row, &q)) > dependent*size {
			return nil, false
		}
	}
	x := make([]float64, len(b.basis))
	for i := range b.basis {
		unit := s.scaled(b.basis[i], 1)
		x[i] = dot6(&unit, &q)
	}
	return x, true
}

// onCoordinates returns what a force on a node is on the free coordinates of its
// body.
func (s *Structure) onCoordinates(node int, force vector6) []float64 {
	b := &s.bodies[s.bodyOf[node]]
	force = brought(force, s.arms[node])
	f := make([]float64, len(b.basis))
	for i := range b.basis {
		f[i] = dot6(&b.basis[i], &force)
	}
	return f
}

// flexibilityBetween returns the movement at freedom i of a node for a unit force
// at freedom j: +Inf where that force meets no resistance at i.
func (s *Structure) flexibilityBetween(node int, axes [3][3]float64, flexibility, forces [][]float64, i, j int) float64 {
	var unit vector6
	unit[j] = 1
	if !s.hasFreedom(i) || !s.hasFreedom(j) {
		return 0
	}
	if i == j && s.unheld(node, toGlobal(&axes, unit)) >= 0 {
		return math.Inf(1)
	}
	return product(forces[i], flexibility, forces[j])
}

func (s *Structure) hasFreedom(f int) bool { return !s.model.Plane || f == 0 || f == 2 || f == 4 }

func square(n int) [][]float64 {
	rows := make([][]float64, n)
	for i := range rows {
		rows[i] = make([]float64, n)
	}
	return rows
}

// product returns aᵀ M b.
func product(a []float64, m [][]float64, b []float64) float64 {
	sum := 0.0
	for i := range a {
		for j := range b {
			sum += a[i] * m[i][j] * b[j]
		}
	}
	return sum
}

// inverted returns the inverse of a small positive definite matrix, exactly
// symmetric: Gauss–Jordan elimination on the matrix scaled to a unit diagonal.
func inverted(m [][]float64) [][]float64 {
	n := len(m)
	scale := make([]float64, n)
	for i := range n {
		scale[i] = 1 / math.Sqrt(m[i][i])
	}
	work := make([][]float64, n)
	for i := range n {
		work[i] = make([]float64, 2*n)
		for j := range n {
			work[i][j] = m[i][j] * scale[i] * scale[j]
		}
		work[i][n+i] = 1
	}
	for p := range n {
		pivot := work[p][p]
		for c := range work[p] {
			work[p][c] /= pivot
		}
		for r := range n {
			if factor := work[r][p]; r != p && factor != 0 {
				for c := range work[r] {
					work[r][c] -= factor * work[p][c]
				}
			}
		}
	}
	inverse := square(n)
	for i := range n {
		for j := range n {
			inverse[i][j] = (work[i][n+j] + work[j][n+i]) / 2 * scale[i] * scale[j]
		}
	}
	return inverse
}

// MemberStiffness is the stiffness of one member between its end nodes: entry
// (i, j) is the force at freedom i for one unit of movement at j, all others
// held. The order is ux uy uz rx ry rz at the first end, then at the last.
type MemberStiffness struct {
	Member int // index into Model.Members
	// Own is in member axes, at the ends of the flexible part; Global in global
	// axes, at the nodes, offsets included.
	Own, Global element.Matrix
	// Terms are the entries of Own by name, each once: "12EIy/L³". A semi-rigid
	// joint leaves entries without a name.
	Terms []Term
	// Names gives each entry of Own its term, signs left aside; "" where it is
	// zero or has no closed form.
	Names [144]string
}

// Term is a stiffness with its closed form.
type Term struct {
	Name  string
	Value float64 // N/m, N/rad or Nm/rad
	// Row and Column are an entry of Own that is this term.
	Row, Column int
}

// StiffnessOf returns the stiffness of one member, as one piece from its first
// node to its last whatever nodes lie between. A rigid link has none: the second
// result is false.
func (s *Structure) StiffnessOf(member int) (*MemberStiffness, bool) {
	b := &s.model.Members[member]
	if b.Kind == model.Link {
		return nil, false
	}
	joints := element.Rigid()
	setJoints(joints[:6], &b.Ends[0])
	setJoints(joints[6:], &b.Ends[1])
	e, err := s.elementOf(b, b.Length, joints, false)
	if err != nil {
		return nil, false // New has made the same element
	}
	k := &MemberStiffness{Member: member, Own: *e.Stiffness()}
	first := &s.segments[s.first[member]]
	whole := segment{axes: first.axes, arms: [2][3]float64{b.Ends[0].Offset, b.Ends[1].Offset}}
	k.Global = whole.atNodes(&k.Own)
	k.name(s, b, e)
	return k, true
}

// atNodes returns a stiffness of the segment in global axes at the far ends of
// its arms: HᵀkH.
func (g *segment) atNodes(own *element.Matrix) (global element.Matrix) {
	var columns [2][]vector6
	for end := range 2 {
		for f := range 6 {
			var unit vector6
			unit[f] = 1
			columns[end] = append(columns[end], toLocal(&g.axes, carried(unit, g.arms[end])))
		}
	}
	for a := range 2 {
		for b := range 2 {
			part := block(own, a, b, columns[a], columns[b])
			for i := range 6 {
				for j := range 6 {
					global[12*(6*a+i)+6*b+j] = part[6*i+j]
				}
			}
		}
	}
	return global
}
