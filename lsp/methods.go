package lsp

import (
	"github.com/tliron/glsp"
	lsp "github.com/tliron/glsp/protocol_3_16"

	"spanwright/lsp/protocol"
	"spanwright/lsp/rpc"
)

// methods returns the methods that glsp does not know, or decodes with losses.
func (s *server) methods() map[string]rpc.Method {
	return map[string]rpc.Method{
		string(lsp.MethodTextDocumentDidChange):         s.didChange,
		protocol.MethodTextDocumentDiagnostic:           rpc.Typed(s.pullDiagnostics),
		protocol.MethodTextDocumentRangesFormatting:     rpc.Typed(s.rangesFormatting),
		string(lsp.MethodTextDocumentCodeAction):        rpc.Typed(s.codeActions),
		string(lsp.MethodCodeActionResolve):             rpc.Typed(s.resolveAction),
		string(lsp.MethodTextDocumentCompletion):        rpc.Typed(s.completion),
		string(lsp.MethodCompletionItemResolve):         rpc.Typed(s.resolveCompletion),
		protocol.MethodTextDocumentPrepareTypeHierarchy: rpc.Typed(s.prepareTypes),
		protocol.MethodTypeHierarchySupertypes:          rpc.Typed(s.supertypes),
		protocol.MethodTypeHierarchySubtypes:            rpc.Typed(s.subtypes),
		protocol.MethodTextDocumentInlayHint:            rpc.Typed(s.inlayHints),
		string(lsp.MethodWorkspaceExecuteCommand):       rpc.Typed(s.executeCommand),
		string(lsp.MethodTextDocumentRename):            rpc.Typed(s.rename),
	}
}

// handler returns the methods that glsp dispatches.
func (s *server) handler() *lsp.Handler {
	return &lsp.Handler{
		Initialized: s.initialized,
		SetTrace:    func(*glsp.Context, *lsp.SetTraceParams) error { return nil },

		WorkspaceDidChangeWorkspaceFolders: s.didChangeWorkspaceFolders,
		WorkspaceDidChangeConfiguration:    s.didChangeConfiguration,
		WorkspaceDidChangeWatchedFiles:     s.didChangeWatchedFiles,

		TextDocumentDidOpen:  s.didOpen,
		TextDocumentDidClose: s.didClose,

		TextDocumentHover:             s.hover,
		TextDocumentSignatureHelp:     s.signatureHelp,
		TextDocumentDefinition:        s.definition,
		TextDocumentDocumentSymbol:    s.symbols,
		WorkspaceSymbol:               s.workspaceSymbols,
		TextDocumentReferences:        s.references,
		TextDocumentDocumentHighlight: s.highlight,
		TextDocumentCodeLens:          s.lenses,
		TextDocumentDocumentLink:      s.links,
		TextDocumentFoldingRange:      s.folding,
		TextDocumentSelectionRange:    s.selections,
		TextDocumentPrepareRename:     s.prepareRename,

		TextDocumentPrepareCallHierarchy: s.prepareCalls,
		CallHierarchyIncomingCalls:       s.incomingCalls,
		CallHierarchyOutgoingCalls:       s.outgoingCalls,

		TextDocumentSemanticTokensFull:      s.tokensFull,
		TextDocumentSemanticTokensFullDelta: s.tokensDelta,
		TextDocumentSemanticTokensRange:     s.tokensRange,

		TextDocumentFormatting:       s.formatting,
		TextDocumentRangeFormatting:  s.rangeFormatting,
		TextDocumentOnTypeFormatting: s.onTypeFormatting,
	}
}
