package protocol

// Requests of the client that glsp does not know.
const (
	MethodTextDocumentInlayHint            = "textDocument/inlayHint"
	MethodInlayHintResolve                 = "inlayHint/resolve"
	MethodTextDocumentDiagnostic           = "textDocument/diagnostic"
	MethodWorkspaceDiagnostic              = "workspace/diagnostic"
	MethodTextDocumentPrepareTypeHierarchy = "textDocument/prepareTypeHierarchy"
	MethodTypeHierarchySupertypes          = "typeHierarchy/supertypes"
	MethodTypeHierarchySubtypes            = "typeHierarchy/subtypes"
	MethodWorkspaceSymbolResolve           = "workspaceSymbol/resolve"
	MethodTextDocumentRangesFormatting     = "textDocument/rangesFormatting"
)

// Requests of the server to the client that glsp does not name.
const (
	ServerClientRegisterCapability       = "client/registerCapability"
	ServerClientUnregisterCapability     = "client/unregisterCapability"
	ServerWorkspaceInlayHintRefresh      = "workspace/inlayHint/refresh"
	ServerWorkspaceDiagnosticRefresh     = "workspace/diagnostic/refresh"
	ServerWorkspaceCodeLensRefresh       = "workspace/codeLens/refresh"
	ServerWorkspaceSemanticTokensRefresh = "workspace/semanticTokens/refresh"
	ServerWorkspaceFoldingRangeRefresh   = "workspace/foldingRange/refresh"
)

// The position encodings of [ServerCapabilities] and [ClientCapabilities].
const (
	PositionEncodingUTF8  = "utf-8"
	PositionEncodingUTF16 = "utf-16"
)
