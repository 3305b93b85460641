package resolve

import (
	"cmp"
	"fmt"
	"math"
	"slices"

	"spanwright/lang/diagnostic"
	"spanwright/lang/model"
	"spanwright/lang/quantity"
	"spanwright/lang/source"
	"spanwright/lang/syntax"
)

// updateGeometry brings the grid in line with the model and returns what touches
// without being joined, in the order of the text.
func (a *assembly) updateGeometry() []*pair {
	g := &a.geometry
	cell := a.cellSize()
	if cell != g.cell {
		for _, f := range a.all {
			f.bodies = nil
		}
		*g = geometry{cell: cell, cells: map[cellKey][]*body{}, pairs: map[pairKey]*pair{}, near: map[*fragment][]*pair{}}
	}
	for _, f := range a.all {
		if f.kind != NodeName && !f.kind.Member() {
			continue
		}
		has := f.bodies != nil
		want := f.index >= 0
		if has == want && !g.moved[f] {
			continue
		}
		if has {
			g.takeOut(f)
		}
		if want {
			g.putIn(f, bodiesOf(f))
		}
	}
	clear(g.moved)
	pairs := make([]*pair, 0, len(g.pairs))
	for _, p := range g.pairs {
		pairs = append(pairs, p)
	}
	slices.SortFunc(pairs, func(p, q *pair) int {
		return cmp.Or(
			cmp.Compare(max(p.first.order, p.second.order), max(q.first.order, q.second.order)),
			cmp.Compare(min(p.first.order, p.second.order), min(q.first.order, q.second.order)))
	})
	return pairs
}

// cellSize returns a power of two near the mean length of the members, so that
// the grid is the same whatever edits led to the model.
func (a *assembly) cellSize() float64 {
	sum, count := 0.0, 0
	for i := range a.model.Members {
		if length := a.model.Members[i].Length; length > 0 && length < farthest {
			sum += length
			count++
		}
	}
	if count == 0 {
		return 1
	}
	_, exponent := math.Frexp(max(sum/float64(count), 1e-3))
	return math.Ldexp(1, exponent)
}

// bodiesOf returns what a node or member is in the grid: nothing for links and
// springs, which may touch what they like, and for members that offsets take
// away from the line between their nodes.
func bodiesOf(f *fragment) []*body {
	switch r := f.outcome.result.(type) {
	case *nodeResult:
		if tooFar(r.global) {
			return []*body{}
		}
		return []*body{{fragment: f, a: r.global, b: r.global, point: true}}
	case *memberResult:
		if r.kind == model.Link || r.kind == model.Spring || r.ends != nil && (r.ends[0].Offset != [3]float64{} || r.ends[1].Offset != [3]float64{}) {
			return []*body{}
		}
		bodies := make([]*body, 0, len(r.nodes)-1)
		for i := 1; i < len(r.nodes); i++ {
			from, to := r.nodes[i-1].result().(*nodeResult).global, r.nodes[i].result().(*nodeResult).global
			if tooFar(from) || tooFar(to) {
				return []*body{}
			}
			bodies = append(bodies, &body{fragment: f, a: from, b: to, from: r.nodes[i-1], to: r.nodes[i], first: i - 1})
		}
		return bodies
	}
	return []*body{}
}

func tooFar(p [3]float64) bool {
	return !(math.Abs(p[0]) < farthest && math.Abs(p[1]) < farthest && math.Abs(p[2]) < farthest)
}

// maxPairs bounds the messages on geometry of one model.
const maxPairs = 100

// checkGeometry reports what touches without being joined.
func (a *assembly) checkGeometry() {
	twins := a.sameMembers()
	count := 0
	excused := map[*fragment]bool{} // of two nodes at one place: the second, whose members touch those of the first
	pairs := a.updateGeometry()
	for _, p := range pairs {
		if p.kind == sameplace {
			later := p.first
			if p.second.order > later.order {
				later = p.second
			}
			excused[later] = true
		}
	}
	for _, p := range pairs {
		first, second := p.first, p.second
		if count >= maxPairs {
			return
		}
		switch p.kind {
		case sameplace:
			if first.order > second.order {
				first, second = second, first
			}
			if a.firstAt(first, pairs) {
				a.nodesTogether(first, second)
				count++
			}
		case nodeTouch:
			if !excused[second] && !twins[first] {
				a.nodeOnMember(p)
				count++
			}
		case crossing:
			if first.kind == BarName && second.kind == BarName || twins[first] || twins[second] {
				continue // crossing diagonals that are not joined: common practice
			}
			a.membersCross(p)
			count++
		}
	}
}

// firstAt reports whether no node before this one stands at the same place: of
// several together, each is reported with the first only.
func (a *assembly) firstAt(f *fragment, pairs []*pair) bool {
	for _, p := range a.geometry.near[f] {
		if p.kind == sameplace && min(p.first.order, p.second.order) < f.order {
			return false
		}
	}
	return true
}

// nodesTogether says that two nodes stand at one place.
func (a *assembly) nodesTogether(first, second *fragment) {
	if a.endsOfNothing(first, second) {
		return
	}
	f := &finding{Diagnostic: diagnostic.Diagnostic{
		Name: "coincident-nodes", Severity: diagnostic.Warning, Subject: second.nameSpan(),
		Summary: fmt.Sprintf("Use %s instead of %s, or move one: they stand at the same place and nothing joins them.", first.full(), second.full()),
	}}
	f.relate(first, "%s stands here", first.full())
	a.locate(second, f)
}

// endsOfNothing reports whether a member without a length joins two nodes: then
// all has been said.
func (a *assembly) endsOfNothing(first, second *fragment) bool {
	uses := func(f *fragment, node *fragment) bool {
		return slices.ContainsFunc(f.dependencies, func(d dependency) bool { return d.symbol == node.name })
	}
	return slices.ContainsFunc(a.all, func(f *fragment) bool {
		return slices.ContainsFunc(f.outcome.findings, func(x finding) bool { return x.Name == "zero-length" }) && uses(f, first) && uses(f, second)
	})
}

// nodeOnMember says that a node stands on a member that does not know it.
func (a *assembly) nodeOnMember(p *pair) {
	member, node := p.first, p.second
	name := node.full()
	f := &finding{Diagnostic: diagnostic.Diagnostic{Name: "node-on-member", Severity: diagnostic.Warning, Subject: member.nameSpan()}}
	path := memberPath(member)
	if member.kind == BeamName && path != nil && member.place == node.place {
		after := path[p.piece]
		f.Summary = fmt.Sprintf("Lead %s through %s, which stands on it: write %s -> %s -> %s. They are not joined now.", member.full(), name, path[p.piece].Text, node.name.name, path[p.piece+1].Text)
		f.fix("Lead "+member.full()+" through "+name, source.At(after.Span().End), " -> "+node.name.name)
	} else {
		f.Summary = fmt.Sprintf("Split %s at %s, or move the node: it stands on the %s, but they are not joined.", member.full(), name, member.kind)
	}
	f.relate(node, "%s stands here", name)
	a.locate(member, f)
}

// memberPath returns the nodes that a member statement names.
func memberPath(f *fragment) []*syntax.Name {
	if tree, ok := f.statement.Tree.(*syntax.MemberStatement); ok {
		return tree.Path
	}
	return nil
}

// membersCross says that two members cross without a joint.
func (a *assembly) membersCross(p *pair) {
	first, second, piece, other := p.first, p.second, p.piece, p.other
	if first.order > second.order {
		first, second, piece, other = second, first, other, piece
	}
	where := a.position(p.at)
	f := &finding{Diagnostic: diagnostic.Diagnostic{
		Name: "members-cross", Severity: diagnostic.Warning, Subject: second.nameSpan(),
		Summary: fmt.Sprintf("Put a node at %s and lead %s and %s through it if they are joined: they cross there without a joint.", where, first.full(), second.full()),
	}}
	if first.kind == BarName || second.kind == BarName {
		f.Severity = diagnostic.Information
	}
	f.relate(first, "%s crosses here", first.full())
	if d := a.locate(second, f); first.kind == BeamName && second.kind == BeamName && first.place == nil && second.place == nil && first.sheet == second.sheet {
		a.joinFix(d, first, second, piece, other, where)
	}
}

// joinFix adds the change that joins two beams where they cross.
func (a *assembly) joinFix(d *diagnostic.Diagnostic, first, second *fragment, piece, other int, where string) {
	name := a.freeName("X")
	at := func(f *fragment, piece int) source.Span {
		return source.At(memberPath(f)[piece].Span().End).Shift(f.sheet.tree.Units[f.unit].Start)
	}
	d.Fixes = append(d.Fixes, diagnostic.Fix{
		Title: fmt.Sprintf("Join %s and %s in a new node %s", first.full(), second.full(), name),
		Edits: []diagnostic.Edit{
			{Edit: source.Edit{Span: source.At(a.lineStart(first)), New: "node " + name + " = " + where + "\n"}},
			{Edit: source.Edit{Span: at(first, piece), New: " -> " + name}},
			{Edit: source.Edit{Span: at(second, other), New: " -> " + name}},
		},
	})
}

// freeName returns a name with a number that nothing in the structure has.
func (a *assembly) freeName(stem string) string {
	for i := 1; ; i++ {
		name := fmt.Sprintf("%s%d", stem, i)
		if s := a.symbols[symbolKey{a.global, Structure, name}]; s == nil || s.winner() == nil {
			return name
		}
	}
}

// position writes a place as the language does.
func (a *assembly) position(p [3]float64) string {
	number := func(x float64) string {
		return plainMinus(quantity.Number(math.Round(x*1e6)/1e6, 7))
	}
	if a.header.plane {
		return fmt.Sprintf("(%s, %s) m", number(p[0]), number(p[2]))
	}
	return fmt.Sprintf("(%s, %s, %s) m", number(p[0]), number(p[1]), number(p[2]))
}

// plainMinus writes a true minus as the ASCII one that people type.
func plainMinus(s string) string {
	if len(s) >= len("−") && s[:len("−")] == "−" {
		return "-" + s[len("−"):]
	}
	return s
}

// sameMembers reports members between the same nodes as another one of their
// kind, and returns them.
func (a *assembly) sameMembers() map[*fragment]bool {
	type ends struct {
		kind        model.MemberKind
		first, last int
	}
	twins := map[*fragment]bool{}
	seen := make(map[ends]*fragment, len(a.model.Members))
	for _, f := range a.kinds[syntax.BeamKind] {
		if f.index < 0 {
			continue
		}
		m := &a.model.Members[f.index]
		first, last := m.Nodes[0], m.Nodes[len(m.Nodes)-1]
		if m.Kind == model.Link || m.Kind == model.Spring {
			continue
		}
		key := ends{m.Kind, min(first, last), max(first, last)}
		before := seen[key]
		if before == nil {
			seen[key] = f
			continue
		}
		if m.Ends != a.model.Members[before.index].Ends {
			continue // with offsets, two members may run side by side
		}
		twins[f] = true
		found := &finding{Diagnostic: diagnostic.Diagnostic{
			Name: "duplicate-member", Severity: diagnostic.Warning, Subject: f.nameSpan(),
			Summary: fmt.Sprintf("Delete %s, or correct its nodes: %s runs between the same two nodes already.", f.full(), before.full()),
		}}
		found.relate(before, "%s runs here", before.full())
		a.locate(f, found)
	}
	return twins
}
