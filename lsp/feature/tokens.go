package feature

import (
	"slices"

	"spanwright/lang/resolve"
	"spanwright/lang/source"
	"spanwright/lang/syntax"
	"spanwright/lsp/workspace"
)

// Role is what a word of the text is, for its colour.
type Role int

// The roles, in the order of [Roles].
const (
	KeywordRole   Role = iota // begins a statement, or joins its parts
	ModifierRole              // an option: pinned, hinge, plan, strength
	CommentRole               //
	TextRole                  // a title
	NumberRole                //
	UnitRole                  //
	OperatorRole              //
	FunctionRole              //
	ValueRole                 // a let
	ParameterRole             // of a part
	NodeRole                  //
	MemberRole                //
	GroupRole                 // group, part, placed part
	StuffRole                 // section, material
	ActionRole                // case, combination, family
)

// Roles returns the protocol's names of the roles, by Role: standard ones, so
// that every client has a colour for them.
func Roles() []string {
	return []string{"keyword", "modifier", "comment", "string", "number", "type", "operator", "function",
		"variable", "parameter", "class", "property", "namespace", "struct", "event"}
}

// TokenModifiers returns the names of the bits of Token.Modifiers.
func TokenModifiers() []string { return []string{"declaration", "readonly"} }

// The bits of [Token.Modifiers].
const (
	DeclarationBit = 1 << iota
	ReadonlyBit
)

// Token is a coloured word. It never goes over a line's end.
type Token struct {
	Span      source.Span
	Role      Role
	Modifiers int
}

// Tokens returns the coloured words of a part of a file, in order.
func Tokens(s *workspace.Snapshot, path string, part source.Span) []Token {
	v, ok := s.View(path)
	if !ok {
		return nil
	}
	i := v.Resolved.FileIndex(path)
	if i < 0 {
		return nil
	}
	p := painter{tree: v.Resolved.Trees[i], names: namesIn(v.Resolved, path, part), part: part}
	return p.paint()
}

// screenful is about as much text as an editor asks for at a time.
const screenful = 20_000 // bytes

// namesIn returns the names in a part of a file: of much of it from the index of
// all names, which is made once for a version.
func namesIn(r *resolve.Result, path string, part source.Span) []resolve.Named {
	if part.Len() <= screenful {
		return r.NamesIn(path, part)
	}
	references := r.References(path)
	list := make([]resolve.Named, 0, len(references))
	for _, ref := range references {
		if ref.Span.Overlaps(part) {
			list = append(list, resolve.Named{Span: ref.Span, Kind: ref.Definition.Kind, Declaration: ref.Declaration})
		}
	}
	return list
}

type painter struct {
	tree   *syntax.Tree
	names  []resolve.Named // in order; those before the place at hand are cut off
	part   source.Span
	tokens []Token
}

func (p *painter) paint() []Token {
	first := max(0, p.tree.UnitBefore(p.part.Start))
	at := 0
	if first < len(p.tree.Units) && first > 0 {
		at = p.tree.Units[first-1].End
	}
	for i := first; i < len(p.tree.Units) && p.tree.Units[i].Start <= p.part.End; i++ {
		u := &p.tree.Units[i]
		p.between(at, u.Start)
		p.statement(u)
		at = u.End
	}
	p.between(at, min(len(p.tree.File.Text), p.part.End))
	return p.tokens
}

// between paints the comments outside of statements.
func (p *painter) between(from, to int) {
	if from >= to {
		return
	}
	text := p.tree.File.Text[from:to]
	for _, t := range syntax.Tokens(text) {
		if t.Kind == syntax.Comment {
			p.add(t.Span().Shift(from), CommentRole, 0)
		}
	}
}

func (p *painter) add(span source.Span, role Role, modifiers int) {
	if !span.Empty() && span.End >= p.part.Start && span.Start <= p.part.End {
		p.tokens = append(p.tokens, Token{span, role, modifiers})
	}
}

func (p *painter) statement(u *syntax.Unit) {
	text := u.Statement.Text
	tokens := syntax.Tokens(text)
	first := true
	for i, t := range tokens {
		span := t.Span().Shift(u.Start)
		switch t.Kind {
		case syntax.Comment:
			p.add(span, CommentRole, 0)
		case syntax.Text:
			p.add(span, TextRole, 0)
		case syntax.Number:
			p.add(span, NumberRole, 0)
		case syntax.Sign:
			if operator(t.In(text)) {
				p.add(span, OperatorRole, 0)
			}
		case syntax.Word:
			p.word(u, span, t.In(text), first, opensBracket(tokens[i+1:], text))
		}
		first = first && t.Trivia()
	}
}

func operator(sign string) bool {
	switch sign {
	case "(", ")", "{", "}", ",":
		return false
	}
	return true
}

// opensBracket reports whether a "(" comes next.
func opensBracket(rest []syntax.Token, text string) bool {
	for _, t := range rest {
		if !t.Trivia() {
			return t.Kind == syntax.Sign && t.In(text) == "("
		}
	}
	return false
}

func (p *painter) word(u *syntax.Unit, span source.Span, word string, first, called bool) {
	for len(p.names) > 0 && p.names[0].Span.End <= span.Start {
		p.names = p.names[1:]
	}
	if len(p.names) > 0 && p.names[0].Span.Overlaps(span) && !p.names[0].Span.Empty() {
		p.name(span)
		return
	}
	_, keyword := syntax.KeywordOf(word)
	switch {
	case first && keyword, syntax.Reserved(word):
		p.add(span, KeywordRole, 0)
	case called && isFunction(word):
		p.add(span, FunctionRole, 0)
	case syntax.UnitSymbol(word):
		p.add(span, UnitRole, 0)
	case !u.Statement.Broken():
		p.add(span, ModifierRole, 0)
	}
}

// name paints a word that stands for something; of a qualified name each part
// has its own reference.
func (p *painter) name(span source.Span) {
	for _, r := range p.names {
		if r.Span.Start >= span.End {
			break
		}
		modifiers := 0
		if r.Declaration {
			modifiers |= DeclarationBit
		}
		role := roleOf(r.Kind)
		if role == ValueRole {
			modifiers |= ReadonlyBit
		}
		p.add(r.Span, role, modifiers)
	}
}

func roleOf(k resolve.Kind) Role {
	switch k {
	case resolve.LetName:
		return ValueRole
	case resolve.ParameterName:
		return ParameterRole
	case resolve.NodeName:
		return NodeRole
	case resolve.SectionName, resolve.MaterialName:
		return StuffRole
	case resolve.CaseName, resolve.CombinationName, resolve.FamilyName:
		return ActionRole
	case resolve.GroupName, resolve.PlaceName, resolve.PartName:
		return GroupRole
	}
	return MemberRole
}

func isFunction(word string) bool {
	return slices.ContainsFunc(resolve.Functions(), func(f resolve.Function) bool { return f.Name == word })
}
