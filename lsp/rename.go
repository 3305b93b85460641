package lsp

import (
	"github.com/tliron/glsp"
	lsp "github.com/tliron/glsp/protocol_3_16"

	"spanwright/lsp/feature"
	"spanwright/lsp/rpc"
)

// prepareRename answers textDocument/prepareRename: the name under the cursor,
// or why there is none to rename.
func (s *server) prepareRename(context *glsp.Context, params *lsp.PrepareRenameParams) (any, error) {
	m := s.moment(context)
	tree, offset, err := m.place(params.TextDocumentPositionParams)
	if err != nil {
		return nil, err
	}
	span, name, err := feature.PrepareRename(m.Snapshot, tree.File.Path, offset)
	if err != nil {
		return nil, refused(err)
	}
	return lsp.RangeWithPlaceholder{Range: s.rangeOf(tree.File, span), Placeholder: name}, nil
}

// rename answers textDocument/rename.
func (s *server) rename(r *rpc.Request, params *lsp.RenameParams) (any, error) {
	m := momentOf(r)
	tree, offset, err := m.place(params.TextDocumentPositionParams)
	if err != nil {
		return nil, err
	}
	edits, err := feature.Rename(m.Snapshot, tree.File.Path, offset, params.NewName)
	if err != nil {
		return nil, refused(err)
	}
	return m.workspaceEdit(edits)
}
