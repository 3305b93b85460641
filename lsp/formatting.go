package lsp

import (
	"slices"

	"github.com/tliron/glsp"
	lsp "github.com/tliron/glsp/protocol_3_16"

	format "spanwright/fmt"
	"spanwright/lang/source"
	"spanwright/lsp/protocol"
	"spanwright/lsp/rpc"
)

// formatting brings a document into normal form.
func (s *server) formatting(context *glsp.Context, params *lsp.DocumentFormattingParams) ([]lsp.TextEdit, error) {
	tree, err := s.moment(context).tree(params.TextDocument)
	if err != nil {
		return nil, err
	}
	return s.textEdits(tree.File, format.Edits(tree)), nil
}

// rangeFormatting brings the lines of a range into normal form.
func (s *server) rangeFormatting(context *glsp.Context, params *lsp.DocumentRangeFormattingParams) ([]lsp.TextEdit, error) {
	tree, span, err := s.moment(context).span(params.TextDocument, params.Range)
	if err != nil {
		return nil, err
	}
	return s.textEdits(tree.File, format.RangeEdits(tree, span)), nil
}

// rangesFormatting brings the lines of several ranges into normal form.
func (s *server) rangesFormatting(r *rpc.Request, params *protocol.DocumentRangesFormattingParams) (any, error) {
	m := momentOf(r)
	tree, err := m.tree(params.TextDocument)
	if err != nil {
		return nil, err
	}
	edits := []source.Edit{}
	for _, asked := range params.Ranges {
		for _, e := range format.RangeEdits(tree, s.span(tree.File, asked)) {
			if !slices.Contains(edits, e) {
				edits = append(edits, e)
			}
		}
	}
	return s.textEdits(tree.File, edits), nil
}

// onTypeFormatting brings the statement that was just ended into normal form:
// the line above a new line, the block above its closing brace. The line that
// is being written stays as it is.
func (s *server) onTypeFormatting(context *glsp.Context, params *lsp.DocumentOnTypeFormattingParams) ([]lsp.TextEdit, error) {
	tree, offset, err := s.moment(context).place(params.TextDocumentPositionParams)
	if err != nil {
		return nil, err
	}
	line := tree.File.LineAt(offset)
	span := source.At(offset)
	switch {
	case params.Ch == "\n" && line > 0:
		span = source.At(tree.File.LineStart(line - 1))
	case params.Ch == "\n":
		return []lsp.TextEdit{}, nil
	}
	var edits []source.Edit
	for _, e := range format.RangeEdits(tree, span) {
		if params.Ch != "\n" || e.End <= tree.File.LineStart(line) {
			edits = append(edits, e)
		}
	}
	return s.textEdits(tree.File, edits), nil
}
