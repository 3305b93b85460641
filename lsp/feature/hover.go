package feature

import (
	"context"

	"spanwright/lang/model"
	"spanwright/lang/resolve"
	"spanwright/lang/source"
	"spanwright/lang/syntax"
	"spanwright/lsp/workspace"
)

// HoverOptions say what the client can show.
type HoverOptions struct {
	// Pictures: it draws images in a hover.
	Pictures bool
}

// Hover is what there is to say about a place.
type Hover struct {
	Span     source.Span
	Markdown string // [Plain] makes text of it
}

// HoverAt returns what there is to say about a place of a file: about the name
// there, else about the number, unit or word, else about the whole statement.
func HoverAt(ctx context.Context, s *workspace.Snapshot, path string, offset int, options HoverOptions) (Hover, bool) {
	v, ok := s.View(path)
	if !ok {
		return Hover{}, false
	}
	file := v.Resolved.FileIndex(path)
	if file < 0 {
		return Hover{}, false
	}
	h := hover{ctx: ctx, view: &v, options: options, path: path, offset: offset, file: file, tree: v.Resolved.Trees[file], model: v.Resolved.Model}
	h.numbers, h.solved = numbersOf(&v)
	i := h.tree.UnitAt(offset)
	if i < 0 {
		return Hover{}, false
	}
	h.unit = &h.tree.Units[i]
	h.write()
	if len(h.page.blocks) == 0 {
		return Hover{}, false
	}
	return Hover{Span: h.span, Markdown: h.page.String()}, true
}

// hover is one hover being written.
type hover struct {
	ctx     context.Context
	view    *workspace.View
	options HoverOptions
	path    string
	offset  int
	file    int
	tree    *syntax.Tree
	unit    *syntax.Unit
	model   *model.Model // of the text, not necessarily that of the numbers
	numbers *numbers
	solved  bool

	span    source.Span
	page    page
	numeric bool // what was written may depend on the solve
}

// write finds what the place is about.
func (h *hover) write() {
	if r, ok := h.view.Resolved.NameAt(h.path, h.offset); ok {
		h.span = r.Span
		h.name(r.Definition)
		return
	}
	token, ok := h.token()
	if !ok {
		return
	}
	h.span = token.Span().Shift(h.unit.Start)
	if h.span.Start == h.unit.Start {
		h.statement()
		h.word(token)
	} else {
		h.word(token)
		h.statement()
	}
	if h.numeric {
		h.age()
	}
}

// word writes what a word, number or unit means by itself.
func (h *hover) word(token syntax.Token) {
	text := token.In(h.unit.Statement.Text)
	switch {
	case h.span.Start == h.unit.Start && h.keyword(text), h.described(token):
	case token.Kind == syntax.Number:
		h.value()
	case token.Kind != syntax.Word, h.function(text), h.generated(text):
	case syntax.UnitSymbol(text):
		if !h.value() {
			h.unitMeaning(text)
		}
	default:
		h.option(text)
	}
}

// described writes about the section or material that a catalogue's name or a
// shape in the statement describes.
func (h *hover) described(token syntax.Token) bool {
	var span source.Span
	var write func(*resolve.Definition)
	switch tree := h.unit.Statement.Tree.(type) {
	case *syntax.SectionStatement:
		if tree.Profile == nil {
			return false
		}
		span, write = tree.Profile.Span, h.section
	case *syntax.MaterialStatement:
		if tree.Grade == nil {
			return false
		}
		span, write = tree.Grade.Span, h.material
	default:
		return false
	}
	if !span.Contains(int(token.Start)) || !span.Contains(int(token.End)) {
		return false
	}
	name := h.unit.Statement.Declares()
	if name == nil {
		return false
	}
	r, ok := h.view.Resolved.NameAt(h.path, h.unit.Start+name.Span().Start)
	if !ok {
		return false
	}
	h.span = span.Shift(h.unit.Start)
	write(r.Definition)
	return true
}

// token returns the token at the place. The blank behind a word is no word; the
// end of the statement belongs to its last one.
func (h *hover) token() (syntax.Token, bool) {
	text := h.unit.Statement.Text
	inside := int32(h.offset - h.unit.Start)
	for _, t := range syntax.Tokens(text) {
		if t.Start <= inside && (inside < t.End || inside == t.End && int(t.End) == len(text)) {
			return t, !t.Trivia()
		}
	}
	return syntax.Token{}, false
}

// name writes about what a name stands for.
func (h *hover) name(d *resolve.Definition) {
	switch d.Kind {
	case resolve.NodeName:
		h.node(d)
	case resolve.BeamName, resolve.BarName, resolve.LinkName, resolve.SpringName:
		h.member(d)
	case resolve.SectionName:
		h.section(d)
	case resolve.MaterialName:
		h.material(d)
	case resolve.CaseName:
		h.loadCase(d)
	case resolve.CombinationName:
		h.combination(fullName(d))
	case resolve.FamilyName:
		h.family(d)
	case resolve.LetName:
		h.let(d)
	case resolve.ParameterName:
		h.parameter(d)
	case resolve.GroupName:
		h.group(d)
	case resolve.PartName:
		h.part(d)
	case resolve.PlaceName:
		h.place(d)
	}
	if len(d.Full) > 1 && d.Kind != resolve.ParameterName {
		h.page.add("Shown for " + code(d.Full[0]) + ", the first of " + counted(len(d.Full), "place") + ".")
	}
	if d.Description != "" {
		h.page.add(d.Description)
	}
	switch d.Kind {
	case resolve.LetName, resolve.ParameterName, resolve.MaterialName, resolve.SectionName, resolve.PartName:
	default:
		h.age()
	}
}

// statement writes about the whole line, where it is about numbers.
func (h *hover) statement() {
	switch h.unit.Statement.Kind {
	case syntax.ModelKind:
		h.whole()
	case syntax.LimitKind:
		h.limit()
	case syntax.LoadKind:
		h.load()
	case syntax.SupportKind:
		if h.span.Start != h.unit.Start {
			return
		}
		h.support()
	default:
		return
	}
	h.numeric = true
}

// age says which version the numbers belong to.
func (h *hover) age() {
	if h.view.State != workspace.Library {
		h.page.add(h.view.Words())
	}
	if len(h.view.Others) > 0 && h.path != h.view.Path {
		h.page.add("Seen through " + h.model.Title + ", one of " + counted(1+len(h.view.Others), "model") + " that use this file")
	}
}

// fullName returns the name of a thing in the model; of what a part declares,
// that in its first place.
func fullName(d *resolve.Definition) string {
	if len(d.Full) == 0 {
		return d.Name
	}
	return d.Full[0]
}

// indexOf returns the index of a thing in a slice of the model, or −1.
func indexOf[T any](list []T, name string, of func(*T) string) int {
	for i := range list {
		if of(&list[i]) == name {
			return i
		}
	}
	return -1
}
