package protocol

import glsp "github.com/tliron/glsp/protocol_3_16"

// CodeActionTriggerKind says why code actions were asked for.
type CodeActionTriggerKind int

// The reasons for asking: by the user, or by the client on its own.
const (
	CodeActionTriggerInvoked   CodeActionTriggerKind = 1
	CodeActionTriggerAutomatic CodeActionTriggerKind = 2
)

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
	TriggerKind CodeActionTriggerKind `json:"triggerKind,omitempty"`
}

// CodeAction is a change or command on offer. Every field survives decoding.
type CodeAction struct {
	Title       string              `json:"title"`
	Kind        glsp.CodeActionKind `json:"kind,omitempty"`
	Diagnostics []Diagnostic        `json:"diagnostics,omitempty"`
	IsPreferred bool                `json:"isPreferred,omitempty"`
	Disabled    *CodeActionDisabled `json:"disabled,omitempty"`
	Edit        *WorkspaceEdit      `json:"edit,omitempty"`
	Command     *glsp.Command       `json:"command,omitempty"`
	// Data comes back in codeAction/resolve.
	Data any `json:"data,omitempty"`
}

// CodeActionDisabled says why an action cannot be used here.
type CodeActionDisabled struct {
	Reason string `json:"reason"`
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

// ApplyWorkspaceEditParams asks the client to make a change.
type ApplyWorkspaceEditParams struct {
	Label string        `json:"label,omitempty"`
	Edit  WorkspaceEdit `json:"edit"`
}
