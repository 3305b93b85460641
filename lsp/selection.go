package lsp

import (
	"github.com/tliron/glsp"
	lsp "github.com/tliron/glsp/protocol_3_16"

	"spanwright/lsp/feature"
)

// selections answers textDocument/selectionRange.
func (s *server) selections(context *glsp.Context, params *lsp.SelectionRangeParams) ([]lsp.SelectionRange, error) {
	tree, err := s.moment(context).tree(params.TextDocument)
	if err != nil {
		return nil, err
	}
	all := make([]lsp.SelectionRange, len(params.Positions))
	for i, p := range params.Positions {
		var outer *lsp.SelectionRange
		spans := feature.Selections(tree, s.offset(tree.File, p))
		for k := len(spans) - 1; k >= 0; k-- {
			outer = &lsp.SelectionRange{Range: s.rangeOf(tree.File, spans[k]), Parent: outer}
		}
		all[i] = *outer
	}
	return all, nil
}
