package lsp

import (
	"github.com/tliron/glsp"
	lsp "github.com/tliron/glsp/protocol_3_16"

	"spanwright/lsp/feature"
)

// lenses answers textDocument/codeLens. The lenses only tell; they have no
// command behind them.
func (s *server) lenses(context *glsp.Context, params *lsp.CodeLensParams) ([]lsp.CodeLens, error) {
	m := s.moment(context)
	tree, err := m.tree(params.TextDocument)
	if err != nil {
		return nil, err
	}
	all := []lsp.CodeLens{}
	if !m.configuration.CodeLens {
		return all, nil
	}
	for _, l := range feature.Lenses(m.Snapshot, tree.File.Path) {
		all = append(all, lsp.CodeLens{Range: s.rangeOf(tree.File, l.Span), Command: &lsp.Command{Title: l.Title}})
	}
	return all, nil
}
