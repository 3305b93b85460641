package lsp

import (
	lsp "github.com/tliron/glsp/protocol_3_16"

	"spanwright/lsp/protocol"
)

// capabilities returns what the server can do for its client.
func (s *server) capabilities(encoding string) protocol.ServerCapabilities {
	yes := true
	c := protocol.ServerCapabilities{
		PositionEncoding:      encoding,
		InlayHintProvider:     &protocol.InlayHintOptions{},
		TypeHierarchyProvider: true,
		ServerCapabilities: lsp.ServerCapabilities{
			TextDocumentSync: lsp.TextDocumentSyncOptions{
				OpenClose: &yes,
				Change:    pointer(lsp.TextDocumentSyncKindIncremental),
			},
			CompletionProvider:              &lsp.CompletionOptions{ResolveProvider: &yes, TriggerCharacters: []string{" ", ".", ">"}},
			HoverProvider:                   true,
			DefinitionProvider:              true,
			DocumentSymbolProvider:          true,
			WorkspaceSymbolProvider:         true,
			ReferencesProvider:              true,
			DocumentHighlightProvider:       true,
			CodeLensProvider:                &lsp.CodeLensOptions{},
			DocumentLinkProvider:            &lsp.DocumentLinkOptions{},
			FoldingRangeProvider:            true,
			SelectionRangeProvider:          true,
			SignatureHelpProvider:           &lsp.SignatureHelpOptions{TriggerCharacters: []string{"(", ",", ":", "="}},
			CodeActionProvider:              s.actionOptions(),
			CallHierarchyProvider:           true,
			RenameProvider:                  s.renameOptions(),
			SemanticTokensProvider:          tokenOptions(),
			ExecuteCommandProvider:          &lsp.ExecuteCommandOptions{Commands: s.commandNames()},
			DocumentFormattingProvider:      true,
			DocumentRangeFormattingProvider: protocol.DocumentRangeFormattingOptions{RangesSupport: s.client.RangesFormatting},
			DocumentOnTypeFormattingProvider: &lsp.DocumentOnTypeFormattingOptions{
				FirstTriggerCharacter: "\n", MoreTriggerCharacter: []string{"}"},
			},
			Workspace: &lsp.ServerCapabilitiesWorkspace{
				WorkspaceFolders: &lsp.WorkspaceFoldersServerCapabilities{
					Supported: &yes, ChangeNotifications: &lsp.BoolOrString{Value: true},
				},
			},
		},
	}
	// Only a client that can be asked to pull again learns of a finished solve.
	if s.client.PullDiagnostics && s.client.RefreshDiagnostics {
		c.DiagnosticProvider = &protocol.DiagnosticOptions{Identifier: section, InterFileDependencies: true}
	}
	return c
}

// actionOptions is the offer of code actions, with edits that can wait until an
// action is chosen.
func (s *server) actionOptions() any {
	return lsp.CodeActionOptions{CodeActionKinds: []lsp.CodeActionKind{lsp.CodeActionKindQuickFix, lsp.CodeActionKindRefactorRewrite}, ResolveProvider: pointer(true)}
}

// renameOptions is the offer of rename; only a client that knows how may ask
// beforehand what would be renamed.
func (s *server) renameOptions() any {
	if !s.client.PrepareRename {
		return true
	}
	return lsp.RenameOptions{PrepareProvider: pointer(true)}
}

func pointer[T any](value T) *T { return &value }
