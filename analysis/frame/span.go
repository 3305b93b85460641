package frame

import (
	"slices"

	"spanwright/analysis/element"
	"spanwright/lang/model"
)

// loading is what one load case does: forces on the nodes, loads on the
// members, and movements of the supports. It is linear in its parts, so that
// loadings can be added with factors.
type loading struct {
	nodes   []vector6 // by node, global
	spans   [][]element.SpanLoad
	amounts []float64 // by hold; nil for none
	// applied is the resultant of all forces about the origin.
	applied vector6
}

// equal reports whether two loadings on structures with the same nodes, members
// and supports are the same to the last digit.
func (l *loading) equal(o *loading) bool {
	return l.applied == o.applied && slices.Equal(l.nodes, o.nodes) && slices.Equal(l.amounts, o.amounts) &&
		slices.EqualFunc(l.spans, o.spans, slices.Equal[[]element.SpanLoad])
}

// loadings works out the loading of each case of the model.
func (s *Structure) loadings() []loading {
	list := make([]loading, len(s.model.Cases))
	for i := range s.model.Cases {
		list[i] = s.loadingOf(&s.model.Cases[i])
	}
	return list
}

func (s *Structure) loadingOf(c *model.Case) loading {
	l := loading{nodes: make([]vector6, len(s.model.Nodes)), spans: make([][]element.SpanLoad, len(s.model.Members))}
	for i := range c.Loads {
		s.addLoad(&l, &c.Loads[i])
	}
	return l
}

func (s *Structure) addLoad(l *loading, load *model.Load) {
	switch load.Kind {
	case model.NodeForce:
		l.addNode(s, load.Node, vector6{load.Start[0], load.Start[1], load.Start[2]})
	case model.NodeMoment:
		l.addNode(s, load.Node, vector6{3: load.Start[0], 4: load.Start[1], 5: load.Start[2]})
	case model.NodeMove, model.NodeTurn:
		s.addMovement(l, load)
	case model.SelfWeight:
		s.addSelfWeight(l, load)
	default:
		s.addSpan(l, load)
	}
}

// addNode adds a force at a node.
func (l *loading) addNode(s *Structure, node int, f vector6) {
	for k := range f {
		l.nodes[node][k] += f[k]
	}
	l.addApplied(f, s.model.Nodes[node].Position)
}

func (l *loading) addApplied(f vector6, at [3]float64) {
	f = brought(f, at)
	for k := range f {
		l.applied[k] += f[k]
	}
}

// addMovement adds the movement of a support: its parts along what the node's
// supports hold.
func (s *Structure) addMovement(l *loading, load *model.Load) {
	if l.amounts == nil {
		l.amounts = make([]float64, len(s.holds))
	}
	var v vector6
	offset := 0
	if load.Kind == model.NodeTurn {
		offset = 3
	}
	copy(v[offset:], load.Start[:])
	for i := range s.holds {
		if h := &s.holds[i]; h.node == load.Node {
			l.amounts[i] += dot6(&h.along, &v)
		}
	}
}

// addSpan adds a load on the length of a member, in member axes.
func (s *Structure) addSpan(l *loading, load *model.Load) {
	b := &s.model.Members[load.Member]
	if b.Kind == model.Link {
		s.addToLink(l, load)
		return
	}
	axes := s.model.MemberAxes(load.Member)
	into := func(v [3]float64) (local [3]float64) {
		if load.Axes == model.Local {
			return v
		}
		for i := range 3 {
			local[i] = model.Dot(axes[i], v)
		}
		return local
	}
	span := element.SpanLoad{From: load.From, To: load.To}
	expansion := 0.0
	if b.Section >= 0 {
		expansion = s.model.Materials[s.model.Sections[b.Section].Material].Expansion
	}
	switch load.Kind {
	case model.PointForce:
		span = element.Point(load.From, into(load.Start), [3]float64{})
	case model.PointMoment:
		span = element.Point(load.From, [3]float64{}, into(load.Start))
	case model.LineForce:
		span.Force1, span.Force2 = into(load.Start), into(load.End)
	case model.LineMoment:
		span.Moment1, span.Moment2 = into(load.Start), into(load.End)
	case model.Warming:
		span = element.SpanLoad{Strain: expansion * load.Amount}
	case model.Gradient:
		span = element.SpanLoad{}
		if load.Axis == 1 {
			span.StrainPerY = expansion * load.Amount
		} else {
			span.StrainPerZ = expansion * load.Amount
		}
	case model.LackOfFit:
		span = element.SpanLoad{Strain: load.Amount / b.Length}
	case model.Pretension:
		p := s.propertiesOf(b)
		span = element.SpanLoad{Strain: -load.Amount / p.EA}
	}
	l.spans[load.Member] = append(l.spans[load.Member], span)
	s.applySpan(l, load.Member, span)
}

// applySpan adds a member load to the resultant of what is applied.
func (s *Structure) applySpan(l *loading, member int, span element.SpanLoad) {
	axes := s.model.MemberAxes(member)
	start, _ := s.model.FlexibleEnds(member)
	at := func(x float64) (p [3]float64) {
		for i := range 3 {
			p[i] = start[i] + x*axes[0][i]
		}
		return p
	}
	global := func(force, moment [3]float64, factor float64) vector6 {
		var f vector6
		for i := range 3 {
			f[i], f[3+i] = factor*force[i], factor*moment[i]
		}
		return toGlobal(&axes, f)
	}
	length := span.To - span.From
	if length <= 1e-12*s.model.Members[member].Length {
		l.addApplied(global(span.Force1, span.Moment1, 1), at(span.From))
		return
	}
	// A linear spread is two triangles, each acting at its own third point.
	l.addApplied(global(span.Force1, span.Moment1, length/2), at(span.From+length/3))
	l.addApplied(global(span.Force2, span.Moment2, length/2), at(span.From+2*length/3))
}

// addToLink brings a load on a rigid link to its first node.
func (s *Structure) addToLink(l *loading, load *model.Load) {
	b := &s.model.Members[load.Member]
	node := b.Nodes[0]
	position := s.model.Nodes[node].Position
	last := s.model.Nodes[b.Nodes[1]].Position
	along := minus(last, position)
	length := s.model.Members[load.Member].Length
	add := func(v [3]float64, factor, x float64, moment bool) {
		if load.Axes == model.Local {
			axes := s.model.MemberAxes(load.Member)
			g := toGlobal(&axes, vector6{v[0], v[1], v[2]})
			v = [3]float64{g[0], g[1], g[2]}
		}
		var f vector6
		for i := range 3 {
			if moment {
				f[3+i] = factor * v[i]
			} else {
				f[i] = factor * v[i]
			}
		}
		var arm [3]float64
		for i := range 3 {
			arm[i] = along[i] * x / length
		}
		l.addNode(s, node, brought(f, arm))
	}
	spread := load.To - load.From
	switch load.Kind {
	case model.PointForce, model.PointMoment:
		add(load.Start, 1, load.From, load.Kind == model.PointMoment)
	case model.LineForce, model.LineMoment:
		add(load.Start, spread/2, load.From+spread/3, load.Kind == model.LineMoment)
		add(load.End, spread/2, load.From+2*spread/3, load.Kind == model.LineMoment)
	}
}

// addSelfWeight adds the weight of members, over their flexible length, and of
// the masses.
func (s *Structure) addSelfWeight(l *loading, load *model.Load) {
	m := s.model
	weigh := func(member int) {
		b := &m.Members[member]
		if b.Section < 0 {
			return
		}
		c := &m.Sections[b.Section]
		q := -load.Amount * m.Gravity * weightPerLength(m, c)
		if q == 0 {
			return
		}
		axes := m.MemberAxes(member)
		local := [3]float64{axes[0][2] * q, axes[1][2] * q, axes[2][2] * q}
		span := element.Line(0, b.Length, local, local)
		l.spans[member] = append(l.spans[member], span)
		s.applySpan(l, member, span)
	}
	if load.Members != nil {
		for _, member := range load.Members {
			weigh(member)
		}
		return
	}
	for member := range m.Members {
		weigh(member)
	}
	for i := range m.Masses {
		l.addNode(s, m.Masses[i].Node, vector6{2: -load.Amount * m.Gravity * m.Masses[i].Mass})
	}
}

// weightPerLength returns the mass per length of a section, kg/m.
func weightPerLength(m *model.Model, c *model.Section) float64 {
	return c.A * m.Materials[c.Material].Density
}

// combined returns the sum of loadings with factors.
func (s *Structure) combined(list []loading, factors []model.Factor) loading {
	sum := loading{nodes: make([]vector6, len(s.model.Nodes)), spans: make([][]element.SpanLoad, len(s.model.Members))}
	for _, f := range factors {
		part := &list[f.Case]
		for node, v := range part.nodes {
			for k := range v {
				sum.nodes[node][k] += f.Factor * v[k]
			}
		}
		for member, spans := range part.spans {
			for _, span := range spans {
				sum.spans[member] = append(sum.spans[member], times(span, f.Factor))
			}
		}
		if part.amounts != nil {
			if sum.amounts == nil {
				sum.amounts = make([]float64, len(part.amounts))
			}
			for i, a := range part.amounts {
				sum.amounts[i] += f.Factor * a
			}
		}
		for k := range sum.applied {
			sum.applied[k] += f.Factor * part.applied[k]
		}
	}
	return sum
}

// times returns a load multiplied by a factor.
func times(l element.SpanLoad, factor float64) element.SpanLoad {
	for i := range 3 {
		l.Force1[i] *= factor
		l.Force2[i] *= factor
		l.Moment1[i] *= factor
		l.Moment2[i] *= factor
	}
	l.Strain *= factor
	l.StrainPerY *= factor
	l.StrainPerZ *= factor
	return l
}
