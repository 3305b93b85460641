package lsp

import (
	"maps"
	"slices"

	lsp "github.com/tliron/glsp/protocol_3_16"

	"spanwright/lang/source"
	"spanwright/lsp/protocol"
	"spanwright/lsp/rpc"
)

// workspaceEdit returns edits of several files as one change. A client that
// knows versions gets the ones that the edits speak of, and so refuses a change
// that its text has overtaken.
func (m *moment) workspaceEdit(byPath map[string][]source.Edit) (*protocol.WorkspaceEdit, error) {
	edit := &protocol.WorkspaceEdit{}
	for _, path := range slices.Sorted(maps.Keys(byPath)) {
		tree, err := m.Tree(path)
		if err != nil {
			return nil, rpc.Refuse("%s cannot be changed: %v", path, err)
		}
		uri := m.server.buffers.uri(path)
		edits := m.server.textEdits(tree.File, byPath[path])
		if !m.server.client.DocumentChanges {
			if edit.Changes == nil {
				edit.Changes = map[lsp.DocumentUri][]lsp.TextEdit{}
			}
			edit.Changes[uri] = edits
			continue
		}
		change := protocol.TextDocumentEdit{
			TextDocument: protocol.OptionalVersionedTextDocumentIdentifier{URI: uri},
			Edits:        edits,
		}
		if d, open := m.Document(path); open {
			change.TextDocument.Version = &d.Version
		}
		edit.DocumentChanges = append(edit.DocumentChanges, change)
	}
	return edit, nil
}
