package lsp

import (
	"github.com/tliron/glsp"
	lsp "github.com/tliron/glsp/protocol_3_16"

	"spanwright/lsp/feature"
)

// lenses answers textDocument/codeLens. Most lenses only tell and have no command
// behind them; those at the top of a file that several models use choose one of
// them.
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
	all = append(all, m.modelLenses(tree.File.Path, params.TextDocument.URI)...)
	for _, l := range feature.Lenses(m.Snapshot, tree.File.Path) {
		all = append(all, lsp.CodeLens{Range: s.rangeOf(tree.File, l.Span), Command: &lsp.Command{Title: l.Title}})
	}
	return all, nil
}

// modelLenses say of a file that several models use which of them its numbers
// belong to, and offer the others.
func (m *moment) modelLenses(path, uri string) []lsp.CodeLens {
	models := m.Models(path)
	if len(models) < 2 {
		return nil
	}
	current := m.ModelOf(path)
	lenses := []lsp.CodeLens{{Command: &lsp.Command{Title: "seen through " + nameOf(current)}}}
	for _, model := range models {
		if model == current {
			continue
		}
		lenses = append(lenses, lsp.CodeLens{Command: &lsp.Command{
			Title: "see it through " + nameOf(model), Command: pinModelCommand,
			Arguments: []any{map[string]any{"uri": uri, "model": m.server.buffers.uri(model)}},
		}})
	}
	return lenses
}
