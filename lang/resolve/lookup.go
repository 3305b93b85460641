package resolve

import (
	"math"
	"slices"
	"strings"

	"spanwright/lang/quantity"
	"spanwright/lang/source"
	"spanwright/lang/syntax"
)

// find looks a name up, from the statement's own scope outward, and notes that
// the statement needs it. It returns nil where nothing has the name. A name
// with dots ("F1.A") is looked up in the placed part before the dot; names of
// combinations hold their dots themselves.
func (e *evaluation) find(space Space, name string, span source.Span, byValue bool) *fragment {
	return e.session.find(e.fragment, e, space, name, span, byValue)
}

// find looks a name up on behalf of a fragment. The evaluation, where there is
// one, takes note.
func (s *Session) find(f *fragment, e *evaluation, space Space, name string, span source.Span, byValue bool) *fragment {
	from := f.scope
	if space != Actions {
		for {
			head, tail, dotted := strings.Cut(name, ".")
			if !dotted {
				break
			}
			place := s.findSimple(f, e, from, Structure, head, source.Span{Start: span.Start, End: span.Start + len(head)}, true)
			if place == nil || place.kind != PlaceName || place.inner == nil {
				return nil
			}
			// Behind the dot only the part's own names count.
			from = &scope{place: place.inner.scope.place}
			from = place.inner.scope
			name, span.Start = tail, span.Start+len(head)+1
			if !strings.Contains(tail, ".") {
				return s.findIn(f, e, from, space, tail, span, byValue)
			}
		}
	}
	return s.findSimple(f, e, from, space, name, span, byValue)
}

// findSimple looks a name without dots up in a scope and those around it.
func (s *Session) findSimple(f *fragment, e *evaluation, from *scope, space Space, name string, span source.Span, byValue bool) *fragment {
	for ; from != nil; from = from.outer {
		if w := s.findIn(f, e, from, space, name, span, byValue); w != nil {
			return w
		}
	}
	return nil
}

// findIn looks a name up in one scope.
func (s *Session) findIn(f *fragment, e *evaluation, in *scope, space Space, name string, span source.Span, byValue bool) *fragment {
	if e != nil && e.silent || e == nil {
		if symbol := s.symbols[symbolKey{in, space, name}]; symbol != nil {
			return symbol.winner()
		}
		return nil
	}
	symbol := s.symbols.get(symbolKey{in, space, name})
	f.depend(symbol, byValue)
	w := symbol.winner()
	if w == nil {
		return nil
	}
	e.out.references = append(e.out.references, reference{span, symbol})
	if byValue {
		s.settle(w)
	}
	return w
}

// name works out a name in an expression: a unit, pi, a let, a parameter, or a
// node, which stands for its position.
func (e *evaluation) name(n *syntax.NameNode) value {
	if v, ok := e.special[n.Text]; ok {
		return v
	}
	if n.Text == "pi" {
		return plain(math.Pi)
	}
	if u, ok := e.unitOf(n); ok {
		return scalar(quantity.Of(1, u))
	}
	w := e.find(Structure, n.Text, n.Span, true)
	if w == nil {
		e.unknownInExpression(n)
		return bad
	}
	switch r := w.result().(type) {
	case *letResult:
		return r.value
	case *nodeResult:
		return e.seen(w, r)
	}
	if w.kind != LetName && w.kind != ParameterName && w.kind != NodeName {
		e.fail("wrong-kind-of-name", n.Span, "Use a let value or a node here: %s is a %s, which has no value.", n.Text, w.kind).
			relate(w, "%s is declared here", n.Text)
	}
	return bad
}

// result returns what a fragment has come to, or nil.
func (f *fragment) result() any {
	if f.outcome == nil {
		return nil
	}
	return f.outcome.result
}

// unknownInExpression says that a name in an expression stands for nothing, or
// that it is a unit in the wrong case.
func (e *evaluation) unknownInExpression(n *syntax.NameNode) {
	if u, ok := quantity.WrongCase(syntax.NormalUnit(n.Text)); ok && !e.resembles(n.Text) {
		e.fail("wrong-case-unit", n.Span, "Write %s: units keep their upper and lower case, and %s is none.", u.Symbol, n.Text).
			fix("Write "+u.Symbol, n.Span, u.Symbol)
		return
	}
	if e.behindNumber(n) && !e.resembles(n.Text) {
		if near := nearest(n.Text, unitSymbols()); len(near) > 0 {
			e.fail("unknown-unit", n.Span, "Did you mean %s? %s is no unit.", either(near), n.Text).
				fix("Write "+near[0], n.Span, near[0])
			return
		}
	}
	e.unknown(Structure, "value", n.Text, n.Span)
}

// resembles reports whether a name in use is spelt like the word but for upper
// and lower case.
func (e *evaluation) resembles(string) bool { return false }

// behindNumber reports whether a digit or a unit stands before the name, so
// that it was probably meant as a unit.
func (e *evaluation) behindNumber(n *syntax.NameNode) bool {
	before := strings.TrimRight(e.statement.Text[:n.Span.Start], " \t")
	if before == "" {
		return false
	}
	c := before[len(before)-1]
	return '0' <= c && c <= '9' || c == '.' || c == '/' || c == '*'
}

// unitSymbols returns all units that a file may write by one symbol.
func unitSymbols() []string {
	var list []string
	for _, u := range quantity.Units() {
		list = append(list, u.Symbol)
	}
	return list
}

// unknownName is a name that stands for nothing, kept so that the names like it
// are found when all names are known.
type unknownName struct {
	space Space
	want  string // "node", "section", "value" …
	name  string
}

// unknown says that a name stands for nothing. The words are found at the end,
// when all names are known: see [Session.spell].
func (e *evaluation) unknown(space Space, want, name string, span source.Span) {
	f := e.fail("unknown-name", span, "")
	f.unknown = &unknownName{space, want, name}
}

// find what a name stands for, as one of some kinds; otherwise say what is
// wrong. Want is the kind in a word.
func (e *evaluation) need(n *syntax.Name, space Space, want string, byValue bool, fits func(Kind) bool) *fragment {
	if n == nil {
		return nil
	}
	w := e.find(space, n.Text, n.Span(), byValue)
	if w == nil {
		e.unknown(space, want, n.Text, n.Span())
		return nil
	}
	if !fits(w.kind) {
		e.fail("wrong-kind-of-name", n.Span(), "Name a %s here: %s is a %s.", want, n.Text, w.kind).
			relate(w, "%s is declared here", n.Text)
		return nil
	}
	return w
}

func isNode(k Kind) bool { return k == NodeName }

// needNode looks a node up.
func (e *evaluation) needNode(n *syntax.Name, byValue bool) *fragment {
	return e.need(n, Structure, "node", byValue, isNode)
}

// mention notes, for a broken statement, every word that may be a name, so that
// what it names does not count as unused.
func (e *evaluation) mention() {
	for _, t := range syntax.Tokens(e.statement.Text) {
		if t.Kind != syntax.Word {
			continue
		}
		word := t.In(e.statement.Text)
		for _, space := range []Space{Structure, Sections, Materials, Actions, Parts} {
			if e.declares() == word && space == e.kind.Space() {
				continue
			}
			for from := e.scope; from != nil; from = from.outer {
				if symbol := e.session.symbols[symbolKey{from, space, word}]; symbol != nil && symbol.winner() != nil {
					e.find(space, word, t.Span(), false)
					break
				}
			}
		}
	}
}

// declares returns the name that the statement declares, or "".
func (e *evaluation) declares() string {
	if e.fragment.name == nil {
		return ""
	}
	return e.fragment.name.name
}

// checkName refuses names that the language keeps for itself.
func (e *evaluation) checkName() {
	n := e.statement.Declares()
	if n == nil || e.parameter >= 0 {
		return
	}
	e.checkDeclared(n, e.kind)
}

func (e *evaluation) checkDeclared(n *syntax.Name, kind Kind) {
	switch {
	case syntax.UnitSymbol(n.Text) && !(powerOfUnit(n.Text) && neverInExpressions(kind)):
		e.fail("name-is-unit", n.Span(), "Choose another name for this %s: %s is a unit.", kind, n.Text)
	case syntax.Reserved(n.Text):
		e.fail("name-is-reserved", n.Span(), "Choose another name for this %s: the language itself uses the word %s.", kind, n.Text)
	case strings.Contains(n.Text, ".") && kind != CombinationName:
		e.fail("name-with-dot", n.Span(), "Write the name without a dot: %s would be a name inside a placed part.", n.Text)
	case !plainName(n.Text):
		e.fail("name-letters", n.Span(), "Use letters a to z, digits and _ in a name: %s has other characters.", n.Text)
	}
}

// powerOfUnit reports whether a unit is a power, such as m2: what the third of
// m1, m2, m3 may well be called.
func powerOfUnit(symbol string) bool {
	c := symbol[len(symbol)-1]
	return '2' <= c && c <= '6'
}

// neverInExpressions reports whether names of a kind stand in no expression, so
// that they cannot be taken for a unit.
func neverInExpressions(k Kind) bool {
	return k.Member() || k == GroupName || k == SectionName || k == MaterialName || k == PartName
}

// plainName reports whether a name has nothing but letters of ASCII, digits, _
// and dots.
func plainName(name string) bool {
	return !slices.ContainsFunc([]byte(name), func(c byte) bool {
		return !('a' <= c && c <= 'z' || 'A' <= c && c <= 'Z' || '0' <= c && c <= '9' || c == '_' || c == '.')
	})
}
