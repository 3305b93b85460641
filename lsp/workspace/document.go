package workspace

import (
	"spanwright/lang/source"
	"spanwright/lang/syntax"
)

// Document is one version of an open file. It does not change.
type Document struct {
	// Path is slash-separated, or the whole URI of a buffer without a file.
	Path string
	// Version is the client's number of this text.
	Version int32
	File    *source.File
	Tree    *syntax.Tree

	// serial counts the document's versions from 0 since it was opened; it goes
	// up by one with every change, whatever the client's numbers do.
	serial  int
	changes []change // the last ones; the end of the slice leads to serial
	opening uint64   // tells one opening of a path from the next
}

// change is one replacement of text: old offsets Start to End became Length
// bytes.
type change struct {
	span   source.Span
	length int
}

// remembered is the number of changes from which places can be followed. What
// is older is of no use to anybody.
const remembered = 256

// Replacement is a change of text as an editor sends it: the text between two
// places is replaced, or all of it.
type Replacement struct {
	Whole    bool
	From, To source.Point
	Text     string
}

// followed returns the document after replacements. They apply one after the
// other, each in terms of the text that the one before left. Places outside the
// text count as its nearest place.
func (d *Document) followed(version int32, replacements []Replacement, encoding source.Encoding) *Document {
	n := &Document{Path: d.Path, Version: version, serial: d.serial + 1, opening: d.opening, File: d.File}
	made := change{span: source.At(0)}
	for i, r := range replacements {
		span := source.Span{Start: 0, End: len(n.File.Text)}
		if !r.Whole {
			from, to := n.File.Offset(r.From, encoding), n.File.Offset(r.To, encoding)
			span = source.Span{Start: min(from, to), End: max(from, to)}
		}
		c := change{span, len(r.Text)}
		if i == 0 {
			made = c
		} else {
			made = made.then(c)
		}
		n.File = source.New(d.Path, n.File.Text[:span.Start]+r.Text+n.File.Text[span.End:])
	}
	n.Tree = d.Tree.Reparse(n.File)
	n.changes = append(d.changes[max(0, len(d.changes)-remembered+1):len(d.changes):len(d.changes)], made)
	return n
}

// then returns one change that does at least what two do one after the other.
func (c change) then(next change) change {
	// In between, the first change covers the bytes from its start on.
	between := source.Span{Start: c.span.Start, End: c.span.Start + c.length}
	joined := between.Join(next.span)
	before := between.Start - joined.Start
	after := joined.End - between.End
	return change{
		span:   source.Span{Start: c.span.Start - before, End: c.span.End + after},
		length: joined.Len() - next.span.Len() + next.length,
	}
}

// follow returns where a place of an earlier version, told by its serial, is
// now. It is false where an edit touched the place, and where the version is
// too old.
func (d *Document) follow(span source.Span, serial int) (source.Span, bool) {
	back := d.serial - serial
	if back < 0 || back > len(d.changes) {
		return source.Span{}, false
	}
	for _, c := range d.changes[len(d.changes)-back:] {
		switch {
		case span.End <= c.span.Start && span.Start < c.span.Start:
		case span.Start >= c.span.End:
			span = span.Shift(c.length - c.span.Len())
		default:
			return source.Span{}, false
		}
	}
	return span, true
}

// IsModel reports whether a file has a model line of its own.
func IsModel(tree *syntax.Tree) bool {
	for i := range tree.Units {
		if tree.Units[i].Statement.Kind == syntax.ModelKind {
			return true
		}
	}
	return false
}
