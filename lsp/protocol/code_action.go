package protocol

import glsp "github.com/tliron/glsp/protocol_3_16"

// CodeActionParams asks for the actions at a range.
type CodeActionParams struct {
	TextDocument glsp.TextDocumentIdentifier `json:"textDocument"`
	Range        glsp.Range                  `json:"range"`
	Context      CodeActionContext           `json:"context"`
}

// CodeActionContext is what the client shows at the range.
type CodeActionContext struct {
	Diagnostics []Diagnostic          `json:"diagnostics"`
	Only        []glsp.CodeActionKind `json:"only,omitempty"`
}

// CodeAction is a change on offer. Every field survives decoding.
type CodeAction struct {
	Title       string              `json:"title"`
	Kind        glsp.CodeActionKind `json:"kind,omitempty"`
	Diagnostics []Diagnostic        `json:"diagnostics,omitempty"`
	IsPreferred bool                `json:"isPreferred,omitempty"`
	Edit        *WorkspaceEdit      `json:"edit,omitempty"`
	// Data comes back in codeAction/resolve.
	Data any `json:"data,omitempty"`
}

// WorkspaceEdit is a change over several documents. A client that announced
// documentChanges gets DocumentChanges, any other one Changes.
type WorkspaceEdit struct {
	Changes         map[glsp.DocumentUri][]glsp.TextEdit `json:"changes,omitempty"`
	DocumentChanges []TextDocumentEdit                   `json:"documentChanges,omitempty"`
}

// TextDocumentEdit is the change of one document at one version.
type TextDocumentEdit struct {
	TextDocument OptionalVersionedTextDocumentIdentifier `json:"textDocument"`
	Edits        List[glsp.TextEdit]                     `json:"edits"`
}

// OptionalVersionedTextDocumentIdentifier names a document; a nil version
// means the content on disk.
type OptionalVersionedTextDocumentIdentifier struct {
	URI     glsp.DocumentUri `json:"uri"`
	Version *int32           `json:"version"`
}
