package frame

import (
	"spanwright/analysis/element"
	"spanwright/lang/model"
)

// segment is an element between two bodies: a member, or the part of one
// between two of its nodes.
type segment struct {
	member   int
	element  *element.Element
	from, to float64 // on the member, m from its first flexible end
	axes     [3][3]float64
	bodies   [2]int
	arms     [2][3]float64 // from the body's reference point to the segment's end
}

// makeSegments makes the elements of all members.
func (s *Structure) makeSegments() error {
	m := s.model
	s.first = make([]int, len(m.Members)+1)
	for i := range m.Members {
		s.first[i] = len(s.segments)
		b := &m.Members[i]
		if b.Kind == model.Link {
			continue
		}
		if err := s.cut(i); err != nil {
			return s.memberError(i, err)
		}
	}
	s.first[len(m.Members)] = len(s.segments)
	return nil
}

// cut makes the segments of one member, from node to node.
func (s *Structure) cut(member int) error {
	m := s.model
	b := &m.Members[member]
	axes := m.MemberAxes(member)
	if b.Kind == model.Spring && b.Length == 0 {
		axes = [3][3]float64{{1, 0, 0}, {0, 1, 0}, {0, 0, 1}}
	}
	start, _ := m.FlexibleEnds(member)
	place := func(n int) float64 {
		switch n {
		case 0:
			return 0
		case len(b.Nodes) - 1:
			return b.Length
		}
		return model.Dot(minus(m.Nodes[b.Nodes[n]].Position, start), axes[0])
	}
	for n := 0; n+1 < len(b.Nodes); n++ {
		g := segment{member: member, from: place(n), to: place(n + 1), axes: axes}
		joints := element.Rigid()
		for e := range 2 {
			node := b.Nodes[n+e]
			g.bodies[e], g.arms[e] = s.bodyOf[node], s.arms[node]
			if atEnd := n+e == 0 && e == 0 || n+e == len(b.Nodes)-1 && e == 1; atEnd {
				g.arms[e] = plus(g.arms[e], b.Ends[e].Offset)
				setJoints(joints[6*e:6*e+6], &b.Ends[e])
			}
		}
		var err error
		if g.element, err = s.elementOf(b, g.to-g.from, joints, s.status.slackens(member)); err != nil {
			return err
		}
		s.segments = append(s.segments, g)
	}
	return nil
}

// setJoints fills the joints of one end.
func setJoints(joints []float64, end *model.End) {
	for k, j := range end.Joint {
		switch j.Kind {
		case model.Released:
			joints[k] = 0
		case model.SemiRigid:
			joints[k] = j.Stiffness
		}
	}
}

// elementOf makes the element of a segment. A slack one-way member carries no
// axial force; loads across it still reach its ends, as on a simple beam.
func (s *Structure) elementOf(b *model.Member, length float64, joints element.Vector, slack bool) (*element.Element, error) {
	if b.Kind == model.Spring {
		stiffness := b.Stiffness
		if slack {
			stiffness[0] = 0
		}
		return element.NewSpring(length, stiffness)
	}
	p := s.propertiesOf(b)
	if slack {
		p.EA = 0
	}
	if b.Kind == model.Bar || slack {
		return element.NewBar(length, p)
	}
	return element.New(length, p, joints)
}

// propertiesOf returns the stiffnesses of a member's section. In a plane model
// nothing twists, and what bends out of the plane is never moved.
func (s *Structure) propertiesOf(b *model.Member) element.Properties {
	c := &s.model.Sections[b.Section]
	mat := &s.model.Materials[c.Material]
	p := element.Properties{EA: mat.E * c.A, EIy: mat.E * c.Iy, EIz: mat.E * c.Iz}
	if !s.model.Plane {
		p.GIt = mat.G * c.It
	}
	if s.model.ShearFlexible {
		p.GAy, p.GAz = mat.G*c.Avy, mat.G*c.Avz
	}
	return p
}

// ends returns the movements of the segment's ends in its own axes, for the
// movements of its bodies.
func (g *segment) ends(first, second vector6) (d element.Vector) {
	a := toLocal(&g.axes, carried(first, g.arms[0]))
	b := toLocal(&g.axes, carried(second, g.arms[1]))
	copy(d[:6], a[:])
	copy(d[6:], b[:])
	return d
}

// onBody returns a force on one end of the segment, in its own axes, as a force
// at the reference point of the body there.
func (g *segment) onBody(end int, local vector6) vector6 {
	return brought(toGlobal(&g.axes, local), g.arms[end])
}
