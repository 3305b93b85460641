package protocol

// Requests of the client that glsp does not know.
const (
	MethodTextDocumentInlayHint            = "textDocument/inlayHint"
	MethodTextDocumentDiagnostic           = "textDocument/diagnostic"
	MethodTextDocumentPrepareTypeHierarchy = "textDocument/prepareTypeHierarchy"
	MethodTypeHierarchySupertypes          = "typeHierarchy/supertypes"
	MethodTypeHierarchySubtypes            = "typeHierarchy/subtypes"
	MethodTextDocumentRangesFormatting     = "textDocument/rangesFormatting"
)

// Requests of the server to the client that glsp does not name.
const (
	ServerClientRegisterCapability       = "client/registerCapability"
	ServerWorkspaceInlayHintRefresh      = "workspace/inlayHint/refresh"
	ServerWorkspaceDiagnosticRefresh     = "workspace/diagnostic/refresh"
	ServerWorkspaceCodeLensRefresh       = "workspace/codeLens/refresh"
	ServerWorkspaceSemanticTokensRefresh = "workspace/semanticTokens/refresh"
)

// The position encodings of [ServerCapabilities] and [ClientCapabilities].
const (
	PositionEncodingUTF8  = "utf-8"
	PositionEncodingUTF16 = "utf-16"
)
