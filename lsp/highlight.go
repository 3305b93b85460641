package lsp

import (
	"github.com/tliron/glsp"
	lsp "github.com/tliron/glsp/protocol_3_16"

	"spanwright/lsp/feature"
)

// highlight answers textDocument/documentHighlight.
func (s *server) highlight(context *glsp.Context, params *lsp.DocumentHighlightParams) ([]lsp.DocumentHighlight, error) {
	m := s.moment(context)
	tree, offset, err := m.place(params.TextDocumentPositionParams)
	if err != nil {
		return nil, err
	}
	all := []lsp.DocumentHighlight{}
	for _, h := range feature.Highlights(m.Snapshot, tree.File.Path, offset) {
		kind := lsp.DocumentHighlightKindRead
		if h.Declaration {
			kind = lsp.DocumentHighlightKindWrite
		}
		all = append(all, lsp.DocumentHighlight{Range: s.rangeOf(tree.File, h.Span), Kind: &kind})
	}
	return all, nil
}
