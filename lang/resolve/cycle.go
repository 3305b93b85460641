package resolve

import (
	"slices"

	"spanwright/lang/source"
	"spanwright/lang/syntax"
)

// settleInOrder brings a definition and all that it needs up to date, what is
// needed first. Definitions that need each other in a circle are found as the
// strongly connected sets of the graph (R. Tarjan, Depth-first search and
// linear graph algorithms, SIAM J. Comput. 1 (1972) 146–160), without recursion:
// a chain of a hundred thousand lets is no danger to the stack.
func (s *Session) settleInOrder(root *fragment) {
	type frame struct {
		f     *fragment
		needs []*fragment
		next  int
		self  bool
	}
	var path []frame
	var open []*fragment
	enter := func(f *fragment) {
		s.visits++
		f.visit, f.low, f.open = s.visits, s.visits, true
		open = append(open, f)
		needs := s.needs(f)
		path = append(path, frame{f: f, needs: needs, self: slices.Contains(needs, f)})
	}
	s.visits++
	floor := s.visits // visits before this search count for nothing
	enter(root)
	for len(path) > 0 {
		top := &path[len(path)-1]
		if top.next < len(top.needs) {
			need := top.needs[top.next]
			top.next++
			switch {
			case need.state == clean:
			case need.visit <= floor:
				enter(need)
			case need.open:
				top.f.low = min(top.f.low, need.visit)
			}
			continue
		}
		done := *top
		path = path[:len(path)-1]
		if len(path) > 0 {
			above := path[len(path)-1].f
			above.low = min(above.low, done.f.low)
		}
		if done.f.low != done.f.visit {
			continue
		}
		start := slices.Index(open, done.f)
		set := slices.Clone(open[start:])
		open = open[:start]
		for _, f := range set {
			f.open = false
		}
		if len(set) == 1 && !done.self {
			s.refresh(done.f)
		} else {
			s.circle(set)
		}
	}
}

// circle marks definitions that need each other.
func (s *Session) circle(set []*fragment) {
	slices.SortFunc(set, func(a, b *fragment) int { return a.order - b.order })
	c := &cycle{members: set}
	for _, f := range set { // first of all, so that none is evaluated on behalf of another
		f.state, f.must, f.evaluated, f.changed = clean, false, s.revision, s.revision
	}
	for _, f := range set {
		f.forget(s.symbols)
		e := &evaluation{session: s, fragment: f, out: &outcome{cycle: c}}
		s.names(f, func(space Space, name string, span source.Span) {
			e.find(space, name, span, true)
		})
		e.ownPlace()
		f.outcome = e.out
	}
}

// needs returns the definitions whose values a definition follows from, by the
// names in its text.
func (s *Session) needs(f *fragment) []*fragment {
	var list []*fragment
	add := func(w *fragment) {
		if w != nil {
			list = append(list, w)
		}
	}
	s.names(f, func(space Space, name string, span source.Span) {
		w := s.find(f, nil, space, name, span, true)
		add(w)
		for w != nil && w.place != nil && w.place.scope != f.scope && w.place != f.place {
			add(w.place)
			w = w.place
		}
	})
	if f.kind == NodeName && f.place != nil {
		add(f.place)
	}
	return list
}

// names calls visit for the names that a chained definition looks up.
func (s *Session) names(f *fragment, visit func(space Space, name string, span source.Span)) {
	expression := func(x *syntax.Expression) {
		if x == nil || x.Root == nil {
			return
		}
		eachName(x.Root, func(n *syntax.NameNode) {
			if !syntax.UnitSymbol(n.Text) && n.Text != "pi" {
				visit(Structure, n.Text, n.Span)
			}
		})
	}
	if f.statement.Broken() {
		return
	}
	switch tree := f.statement.Tree.(type) {
	case *syntax.LetStatement:
		expression(tree.Value)
	case *syntax.NodeStatement:
		expression(tree.Position)
	case *syntax.GroupStatement:
		for _, m := range tree.Members {
			visit(Structure, m.Text, m.Span())
		}
	case *syntax.PlaceStatement:
		if f.parameter >= 0 {
			if f.parameter < len(tree.Values) {
				expression(tree.Values[f.parameter])
			}
			return
		}
		expression(tree.At)
		for _, t := range tree.Turned {
			expression(t.Angle)
		}
	}
}

// eachName calls visit for the names in an expression. Chains of operators,
// which lean to the left, are followed without recursion.
func eachName(n syntax.Node, visit func(*syntax.NameNode)) {
	for n != nil {
		switch x := n.(type) {
		case *syntax.NameNode:
			visit(x)
			return
		case *syntax.UnaryNode:
			n = x.X
		case *syntax.GroupNode:
			n = x.X
		case *syntax.BinaryNode:
			eachName(x.Y, visit)
			n = x.X
		case *syntax.VectorNode:
			for _, p := range x.Parts {
				eachName(p, visit)
			}
			return
		case *syntax.CallNode:
			for _, a := range x.Arguments {
				eachName(a, visit)
			}
			return
		default:
			return
		}
	}
}
