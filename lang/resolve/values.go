package resolve

import (
	"sync"

	"spanwright/lang/source"
	"spanwright/lang/syntax"
)

// valueIndex is the symbols of a result, frozen, for working expressions out.
type valueIndex struct {
	once    sync.Once
	session *Session
	byEntry []*fragment
}

// frozen returns a session that stands still at this result: all fragments are
// clean, and nothing is noted.
func (r *Result) frozen() *valueIndex {
	r.values.once.Do(func() {
		v := &r.values
		v.session = &Session{symbols: table{}, header: r.header, global: r.global}
		v.byEntry = make([]*fragment, len(r.entries))
		copies := make(map[*fragment]*fragment, len(r.entries))
		for i := range r.entries {
			e := &r.entries[i]
			f := e.fragment
			c := &fragment{statement: f.statement, scope: f.scope, parameter: f.parameter, kind: f.kind, name: f.name, outcome: e.outcome}
			if e.inner != nil {
				c.inner = &instance{scope: e.inner}
			}
			copies[f] = c
			v.byEntry[i] = c
			if f.name != nil {
				symbol := v.session.symbols.get(f.name.symbolKey)
				symbol.declarations = append(symbol.declarations, c)
			}
		}
		for i := range r.entries {
			place := r.entries[i].fragment.place
			if place == nil {
				continue
			}
			if copies[place] == nil { // the stand-in for the place of a part that is not placed
				copies[place] = &fragment{kind: PlaceName, parameter: -1, scope: r.global, outcome: &outcome{result: &placeResult{turn: identity}}}
			}
			v.byEntry[i].place = copies[place]
		}
	})
	return &r.values
}

// entryAt returns the index of the first entry of the statement at an offset, or
// −1.
func (r *Result) entryAt(path string, offset int) int {
	file := r.FileIndex(path)
	if file < 0 {
		return -1
	}
	unit := r.Trees[file].UnitAt(offset)
	if unit < 0 {
		return -1
	}
	for i := range r.entries {
		if e := &r.entries[i]; int(e.file) == file && int(e.unit) == unit && e.fragment.parameter < 0 {
			return i
		}
	}
	return -1
}

// ValueAt returns the value of the expression at an offset of a file, the
// smallest that holds the offset, a number together with its unit. It has no
// parts where there is none or where it cannot be worked out. Inside a part that
// is placed several times the first place counts.
func (r *Result) ValueAt(path string, offset int) (v Value, span source.Span, ok bool) {
	i := r.entryAt(path, offset)
	if i < 0 {
		return Value{}, source.Span{}, false
	}
	base := r.span(&r.entries[i]).Start
	node := smallest(r.entries[i].fragment.statement, offset-base)
	if node == nil {
		return Value{}, source.Span{}, false
	}
	return r.evaluate(i, node), node.Place().Shift(base), true
}

// Value returns the value of an expression of the statement at an offset of a
// file.
func (r *Result) Value(path string, offset int, x *syntax.Expression) Value {
	i := r.entryAt(path, offset)
	if i < 0 || x == nil || x.Root == nil || x.Problem != nil {
		return Value{}
	}
	return r.evaluate(i, x.Root)
}

func (r *Result) evaluate(i int, node syntax.Node) Value {
	f := r.frozen()
	e := &evaluation{session: f.session, fragment: f.byEntry[i], out: &outcome{}, silent: true}
	e.special = r.specialAt(e)
	v := e.node(node)
	if !v.isBad() && !v.finite() {
		return Value{}
	}
	return v.public()
}

// specialAt returns the words that mean something in a statement only: "length"
// in a load's place.
func (r *Result) specialAt(e *evaluation) map[string]value {
	var who []*syntax.Name
	switch tree := e.statement.Tree.(type) {
	case *syntax.LoadLine:
		who = tree.Who
	case *syntax.LimitStatement:
		if tree.Of != nil {
			who = []*syntax.Name{tree.Of}
		}
	}
	for _, n := range who {
		w := e.find(Structure, n.Text, n.Span(), false)
		if w == nil {
			continue
		}
		m, ok := w.result().(*memberResult)
		if !ok {
			continue
		}
		yield := 0.0
		for j := range r.Model.Members {
			if b := &r.Model.Members[j]; b.Name == w.name.full() && b.Section >= 0 {
				yield = r.Model.Materials[r.Model.Sections[b.Section].Material].Yield
			}
		}
		return sample(m.length, yield)
	}
	return nil
}

// smallest returns the smallest expression of a statement that holds an offset,
// but a number together with its unit, or nil.
func smallest(s *syntax.Statement, offset int) syntax.Node {
	var best syntax.Node
	s.Expressions(func(x *syntax.Expression) {
		if x.Root == nil || !x.Span.Contains(offset) || best != nil {
			return
		}
		n := x.Root
		for n != nil {
			best = n
			var below syntax.Node
			for _, c := range operands(n) {
				if c.Place().Contains(offset) {
					below = c
					break
				}
			}
			if b, ok := n.(*syntax.BinaryNode); ok && b.Op == syntax.Joined {
				if _, isNumber := b.X.(*syntax.NumberNode); isNumber {
					if u, isName := b.Y.(*syntax.NameNode); isName && syntax.UnitSymbol(u.Text) {
						return
					}
				}
			}
			n = below
		}
	})
	return best
}

func operands(n syntax.Node) []syntax.Node {
	switch n := n.(type) {
	case *syntax.UnaryNode:
		return []syntax.Node{n.X}
	case *syntax.BinaryNode:
		return []syntax.Node{n.X, n.Y}
	case *syntax.GroupNode:
		return []syntax.Node{n.X}
	case *syntax.VectorNode:
		return n.Parts
	case *syntax.CallNode:
		return n.Arguments
	}
	return nil
}
