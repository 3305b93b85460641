package lsp

import (
	"github.com/tliron/glsp"
	lsp "github.com/tliron/glsp/protocol_3_16"

	"spanwright/lsp/feature"
)

// references answers textDocument/references.
func (s *server) references(context *glsp.Context, params *lsp.ReferenceParams) ([]lsp.Location, error) {
	m := s.moment(context)
	tree, offset, err := m.place(params.TextDocumentPositionParams)
	if err != nil {
		return nil, err
	}
	return m.locations(feature.References(m.Snapshot, tree.File.Path, offset, params.Context.IncludeDeclaration)), nil
}

// locations turns places into the protocol's; a file that is gone by now is left
// out. The list is never nil.
func (m *moment) locations(places []feature.Location) []lsp.Location {
	all := make([]lsp.Location, 0, len(places))
	for _, p := range places {
		if tree, err := m.Tree(p.Path); err == nil {
			all = append(all, m.server.location(tree, p.Span))
		}
	}
	return all
}
