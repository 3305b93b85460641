package frame

import "spanwright/lang/model"

// body is a node, or nodes that rigid links join.
type body struct {
	nodes []int     // the first is the reference point
	holds []int     // indices into Structure.holds
	basis []vector6 // B, a column each
	held  []heldRow // what the rigid holds take out: see constrain
}

// joinBodies finds the bodies: the connected parts of the graph of links, in
// the order of their first nodes.
func (s *Structure) joinBodies() {
	m := s.model
	parent := make([]int, len(m.Nodes))
	for i := range parent {
		parent[i] = i
	}
	root := func(i int) int {
		for parent[i] != i {
			parent[i] = parent[parent[i]]
			i = parent[i]
		}
		return i
	}
	for i := range m.Members {
		if b := &m.Members[i]; b.Kind == model.Link {
			a, c := root(b.Nodes[0]), root(b.Nodes[len(b.Nodes)-1])
			parent[max(a, c)] = min(a, c)
		}
	}
	s.bodyOf = make([]int, len(m.Nodes))
	s.arms = make([][3]float64, len(m.Nodes))
	for i := range m.Nodes {
		r := root(i)
		if r == i {
			s.bodyOf[i] = len(s.bodies)
			s.bodies = append(s.bodies, body{})
		} else {
			s.bodyOf[i] = s.bodyOf[r]
		}
		b := &s.bodies[s.bodyOf[i]]
		b.nodes = append(b.nodes, i)
		s.arms[i] = minus(m.Nodes[i].Position, m.Nodes[r].Position)
	}
}
