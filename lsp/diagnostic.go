package lsp

import (
	"spanwright/lsp/protocol"
	"spanwright/lsp/rpc"
)

// pullDiagnostics answers textDocument/diagnostic.
func (s *server) pullDiagnostics(r *rpc.Request, params *protocol.DocumentDiagnosticParams) (any, error) {
	m := momentOf(r)
	tree, err := m.tree(params.TextDocument)
	if err != nil {
		return nil, err
	}
	path := tree.File.Path
	items := s.diagnostics(m.Snapshot, path, m.Diagnostics(path))
	identity := identityOf(items)
	s.pulls(m.Snapshot, path, identity)
	if params.PreviousResultID == identity {
		return protocol.UnchangedDocumentDiagnosticReport{Kind: protocol.DiagnosticReportUnchanged, ResultID: identity}, nil
	}
	return protocol.FullDocumentDiagnosticReport{Kind: protocol.DiagnosticReportFull, ResultID: identity, Items: items}, nil
}
