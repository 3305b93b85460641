package lsp

import (
	"github.com/tliron/glsp"
	lsp "github.com/tliron/glsp/protocol_3_16"

	"spanwright/lsp/feature"
)

// definition answers textDocument/definition.
func (s *server) definition(context *glsp.Context, params *lsp.DefinitionParams) (any, error) {
	m := s.moment(context)
	tree, offset, err := m.place(params.TextDocumentPositionParams)
	if err != nil {
		return nil, err
	}
	if place, ok := feature.Definition(m.Snapshot, tree.File.Path, offset); ok {
		return m.locations([]feature.Location{place}), nil
	}
	return []lsp.Location{}, nil
}
