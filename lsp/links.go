package lsp

import (
	"github.com/tliron/glsp"
	lsp "github.com/tliron/glsp/protocol_3_16"

	"spanwright/lsp/feature"
)

// links answers textDocument/documentLink.
func (s *server) links(context *glsp.Context, params *lsp.DocumentLinkParams) ([]lsp.DocumentLink, error) {
	tree, err := s.moment(context).tree(params.TextDocument)
	if err != nil {
		return nil, err
	}
	all := []lsp.DocumentLink{}
	for _, l := range feature.Links(tree) {
		target := s.buffers.uri(l.Target)
		all = append(all, lsp.DocumentLink{Range: s.rangeOf(tree.File, l.Span), Target: &target})
	}
	return all, nil
}
