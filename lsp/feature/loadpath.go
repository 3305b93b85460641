package feature

import (
	"fmt"
	"math"
	"slices"

	"spanwright/analysis"
	"spanwright/lang/model"
	"spanwright/lang/quantity"
	"spanwright/lang/resolve"
	"spanwright/lang/source"
	"spanwright/lsp/workspace"
)

// The load path is what a load goes through on its way to the ground: a case
// loads members and nodes, a member gives its load to the members and supports
// that it rests on. Which way it goes is seen in one result, that with the
// largest sum of loads: at a node, a member whose end force has a part along
// that sum gives load to the node, one whose end force is against it takes load.

// Step is one step along the load path.
type Step struct {
	Item Item
	// From are the places where it is written: in the statement of the item that
	// was asked about for LoadsTo, in that of Item for LoadsFrom.
	From []source.Span
}

// PathItem returns the case, member or node at a place.
func PathItem(s *workspace.Snapshot, path string, offset int) (Item, bool) {
	return itemAt(s, path, offset, func(v *workspace.View, d *resolve.Definition) (string, bool) {
		if d.Kind != resolve.NodeName && d.Kind != resolve.CaseName && !d.Kind.Member() {
			return "", false
		}
		p, ok := pathOf(v)
		if !ok {
			return v.Words(), true
		}
		return "in " + p.result.Name(), true
	})
}

// loadPath is the flow of load in one result.
type loadPath struct {
	view   *workspace.View
	n      *numbers
	result analysis.Result
	way    [3]float64 // of the sum of the loads, of length one
	size   float64    // of that sum, N
}

// pathOf finds the result with the largest sum of loads, among those that hints
// speak of.
func pathOf(v *workspace.View) (*loadPath, bool) {
	n, ok := numbersOf(v)
	if !ok {
		return nil, false
	}
	e, ok := n.first()
	if !ok {
		return nil, false
	}
	p := &loadPath{view: v, n: n}
	for _, r := range e.Results() {
		applied := r.Equilibrium().Applied
		f := [3]float64(applied[:3])
		if size := math.Sqrt(model.Dot(f, f)); size > (1+1e-9)*p.size {
			p.result, p.size = r, size
			p.way = [3]float64{f[0] / size, f[1] / size, f[2] / size}
		}
	}
	return p, p.size > 0
}

// given is the load that a member gives to a node, N; negative where it takes.
func (p *loadPath) given(member, place int) float64 {
	m := p.n.model
	b := &m.Members[member]
	along := p.result.Member(member)
	var local [3]float64 // what the node does to the member, member axes
	switch ends := along.Ends(); place {
	case 0:
		local = [3]float64(ends[0][:3])
	case len(b.Nodes) - 1:
		local = [3]float64(ends[1][:3])
	default:
		at := distance(m, member, b.Nodes[place])
		local = minus(sectionForce(along, at, analysis.Member.ForceBefore), sectionForce(along, at, analysis.Member.Force))
	}
	axes := m.MemberAxes(member)
	flow := 0.0
	for i := range 3 {
		flow -= local[i] * model.Dot(axes[i], p.way)
	}
	return flow
}

// sectionForce is what the part of a member behind a section does to the part
// before it, member axes. Vz = dMy/dx makes it −Vz along z.
func sectionForce(m analysis.Member, at float64, force func(analysis.Member, analysis.Quantity, float64) float64) [3]float64 {
	return [3]float64{force(m, analysis.N, at), -force(m, analysis.Vy, at), -force(m, analysis.Vz, at)}
}

func minus(a, b [3]float64) [3]float64 {
	return [3]float64{a[0] - b[0], a[1] - b[1], a[2] - b[2]}
}

// distance is that of a node along a member, from the first end of its flexible
// part.
func distance(m *model.Model, member, node int) float64 {
	first, _ := m.FlexibleEnds(member)
	return model.Dot(minus(m.Nodes[node].Position, first), m.MemberAxes(member)[0])
}

// touch is a member at a node.
type touch struct{ member, place int }

// touching returns the members at a node.
func (p *loadPath) touching(node int) []touch {
	var list []touch
	for i := range p.n.model.Members {
		if k := slices.Index(p.n.model.Members[i].Nodes, node); k >= 0 && p.n.model.Members[i].Length > 0 {
			list = append(list, touch{i, k})
		}
	}
	return list
}

// counts reports whether a flow is more than rounding.
func (p *loadPath) counts(flow float64) bool { return flow > 1e-6*p.size }

func (p *loadPath) words(what string, flow float64, node int) string {
	return fmt.Sprintf("%s %s at %s in %s", what, quantity.Write(flow, p.n.display.Force, 3), p.n.model.Nodes[node].Name, p.result.Name())
}

// LoadsTo returns where an item's load goes next.
func LoadsTo(s *workspace.Snapshot, item Item) []Step {
	v, ok := s.View(item.Location.Path)
	if !ok {
		return nil
	}
	p, ok := pathOf(&v)
	if !ok {
		return nil
	}
	var steps []Step
	switch {
	case item.Kind == resolve.CaseName:
		steps = p.loaded(item)
	case item.Kind == resolve.NodeName:
		if node := p.n.solution.Node(item.Name); node >= 0 {
			steps = p.takers(item, node, -1)
		}
	case item.Kind.Member():
		member := p.n.solution.Member(item.Name)
		if member < 0 {
			return nil
		}
		for place, node := range p.n.model.Members[member].Nodes {
			if p.counts(p.given(member, place)) {
				steps = append(steps, p.takers(item, node, member)...)
			}
		}
	}
	return steps
}

// takers are what takes load at a node: its support, and members.
func (p *loadPath) takers(from Item, node, without int) []Step {
	var steps []Step
	name := p.n.model.Nodes[node].Name
	written := p.writtenIn(from, name)
	r := p.result.Reaction(node)
	if taken := -model.Dot([3]float64(r[:3]), p.way); p.counts(taken) && without >= 0 {
		if item, ok := itemOf(p.view, resolve.NodeName, name, p.words("support takes", taken, node)); ok {
			steps = append(steps, Step{item, written})
		}
	}
	for _, t := range p.touching(node) {
		if t.member == without {
			continue
		}
		if taken := -p.given(t.member, t.place); p.counts(taken) {
			if item, ok := itemOf(p.view, resolve.BeamName, p.n.model.Members[t.member].Name, p.words("takes", taken, node)); ok {
				steps = append(steps, Step{item, written})
			}
		}
	}
	return steps
}

// writtenIn returns the places of a thing's name in the statement of an item, or
// that of the item's own name where it is not written there.
func (p *loadPath) writtenIn(item Item, full string) []source.Span {
	var list []source.Span
	references := p.view.Resolved.References(item.Location.Path)
	first, _ := slices.BinarySearchFunc(references, item.Whole.Start, func(r resolve.Reference, at int) int { return r.Span.Start - at })
	for _, r := range references[first:] {
		if r.Span.Start >= item.Whole.End {
			break
		}
		if slices.Contains(r.Definition.Full, full) {
			list = append(list, r.Span)
		}
	}
	if len(list) == 0 {
		list = append(list, item.Location.Span)
	}
	return list
}

// loaded are the members and nodes that a case loads directly.
func (p *loadPath) loaded(item Item) []Step {
	m := p.view.Resolved.Model
	i := indexOf(m.Cases, item.Name, func(c *model.Case) string { return c.Name })
	if i < 0 {
		return nil
	}
	type target struct {
		kind resolve.Kind
		name string
	}
	loads := map[target][]model.Load{}
	var order []target
	for _, l := range m.Cases[i].Loads {
		var t target
		switch {
		case l.Member >= 0 && l.Kind != model.SelfWeight:
			t = target{resolve.BeamName, m.Members[l.Member].Name}
		case l.Node >= 0 && l.Kind != model.SelfWeight:
			t = target{resolve.NodeName, m.Nodes[l.Node].Name}
		default:
			continue // self-weight loads all
		}
		if loads[t] == nil {
			order = append(order, t)
		}
		loads[t] = append(loads[t], l)
	}
	var steps []Step
	for _, t := range order[:min(len(order), mostItems)] {
		total := resultant(m, loads[t])
		if to, ok := itemOf(p.view, t.kind, t.name, forceWords(m, total)); ok {
			var from []source.Span
			for _, l := range loads[t] {
				if m.Files[l.Origin.File].Path == item.Location.Path && !slices.Contains(from, l.Origin.Statement) {
					from = append(from, l.Origin.Statement)
				}
			}
			if len(from) == 0 {
				from = append(from, item.Location.Span)
			}
			steps = append(steps, Step{to, from})
		}
	}
	return steps
}

// LoadsFrom returns where an item's load comes from.
func LoadsFrom(s *workspace.Snapshot, item Item) []Step {
	v, ok := s.View(item.Location.Path)
	if !ok {
		return nil
	}
	p, ok := pathOf(&v)
	if !ok {
		return nil
	}
	steps := p.casesOn(item)
	switch {
	case item.Kind == resolve.NodeName:
		if node := p.n.solution.Node(item.Name); node >= 0 {
			steps = append(steps, p.givers(node, -1)...)
		}
	case item.Kind.Member():
		member := p.n.solution.Member(item.Name)
		if member < 0 {
			return steps
		}
		for place, node := range p.n.model.Members[member].Nodes {
			if p.counts(-p.given(member, place)) {
				steps = append(steps, p.givers(node, member)...)
			}
		}
	}
	return steps
}

// givers are the members that give load to a node.
func (p *loadPath) givers(node, without int) []Step {
	var steps []Step
	for _, t := range p.touching(node) {
		if t.member == without {
			continue
		}
		if flow := p.given(t.member, t.place); p.counts(flow) {
			if item, ok := itemOf(p.view, resolve.BeamName, p.n.model.Members[t.member].Name, p.words("gives", flow, node)); ok {
				steps = append(steps, Step{item, p.writtenIn(item, p.n.model.Nodes[node].Name)})
			}
		}
	}
	return steps
}

// casesOn are the cases that load an item directly.
func (p *loadPath) casesOn(item Item) []Step {
	m := p.view.Resolved.Model
	var steps []Step
	for i := range m.Cases {
		var loads []model.Load
		for _, l := range m.Cases[i].Loads {
			if l.Kind != model.SelfWeight &&
				(l.Member >= 0 && item.Kind.Member() && m.Members[l.Member].Name == item.Name ||
					l.Node >= 0 && item.Kind == resolve.NodeName && m.Nodes[l.Node].Name == item.Name) {
				loads = append(loads, l)
			}
		}
		if len(loads) == 0 {
			continue
		}
		if c, ok := itemOf(p.view, resolve.CaseName, m.Cases[i].Name, forceWords(m, resultant(m, loads))); ok {
			var from []source.Span
			for _, l := range loads {
				if m.Files[l.Origin.File].Path == c.Location.Path && !slices.Contains(from, l.Origin.Statement) {
					from = append(from, l.Origin.Statement)
				}
			}
			steps = append(steps, Step{c, from})
		}
	}
	return steps
}
