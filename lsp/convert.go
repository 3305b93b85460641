package lsp

import (
	lsp "github.com/tliron/glsp/protocol_3_16"

	"spanwright/lang/source"
	"spanwright/lang/syntax"
)

// offset returns the offset of a position. One outside the text is moved to the
// nearest place in it, as the protocol has it.
func (s *server) offset(file *source.File, p lsp.Position) int {
	return file.Offset(source.Point{Line: int(p.Line), Character: int(p.Character)}, s.encoding)
}

// span returns the span of a range; one that is the wrong way round is turned.
func (s *server) span(file *source.File, r lsp.Range) source.Span {
	start, end := s.offset(file, r.Start), s.offset(file, r.End)
	return source.Span{Start: min(start, end), End: max(start, end)}
}

func (s *server) position(file *source.File, offset int) lsp.Position {
	p := file.Point(offset, s.encoding)
	return lsp.Position{Line: uint32(p.Line), Character: uint32(p.Character)}
}

func (s *server) rangeOf(file *source.File, span source.Span) lsp.Range {
	return lsp.Range{Start: s.position(file, span.Start), End: s.position(file, span.End)}
}

// location returns the location of a span in a file that was read.
func (s *server) location(tree *syntax.Tree, span source.Span) lsp.Location {
	return lsp.Location{URI: s.buffers.uri(tree.File.Path), Range: s.rangeOf(tree.File, span)}
}

// textEdits returns edits of one file. The list is never nil.
func (s *server) textEdits(file *source.File, edits []source.Edit) []lsp.TextEdit {
	all := make([]lsp.TextEdit, len(edits))
	for i, e := range edits {
		all[i] = lsp.TextEdit{Range: s.rangeOf(file, e.Span), NewText: e.New}
	}
	return all
}
