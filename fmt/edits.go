package format

import (
	udiff "github.com/aymanbagabas/go-udiff"

	"spanwright/lang/source"
	"spanwright/lang/syntax"
)

// Edits returns the changes of whole lines that bring a file into normal form,
// in order; none where it is in normal form.
func Edits(tree *syntax.Tree) []source.Edit {
	old, text := tree.File.Text, Tree(tree)
	if old == text {
		return nil
	}
	var edits []source.Edit
	for _, e := range udiff.Lines(old, text) {
		edits = append(edits, source.Edit{Span: source.Span{Start: e.Start, End: e.End}, New: e.New})
	}
	return edits
}

// RangeEdits returns those changes that touch the lines of a span: formatting a
// range gives just the part of formatting the whole.
func RangeEdits(tree *syntax.Tree, span source.Span) []source.Edit {
	first := tree.File.LineStart(tree.File.LineAt(span.Start))
	last := tree.File.LineStart(tree.File.LineAt(span.End) + 1)
	var edits []source.Edit
	for _, e := range Edits(tree) {
		if e.Start >= first && e.End <= last {
			edits = append(edits, e)
		}
	}
	return edits
}
