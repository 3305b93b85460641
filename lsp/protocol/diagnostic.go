package protocol

import glsp "github.com/tliron/glsp/protocol_3_16"

// Diagnostic is a mistake or remark about a range. Unlike glsp's it keeps its
// code when decoded, as code actions need.
type Diagnostic struct {
	Range    glsp.Range              `json:"range"`
	Severity glsp.DiagnosticSeverity `json:"severity,omitempty"`
	// Code is nil, a number or a string.
	Code               any                                 `json:"code,omitempty"`
	CodeDescription    *glsp.CodeDescription               `json:"codeDescription,omitempty"`
	Source             string                              `json:"source,omitempty"`
	Message            string                              `json:"message"`
	Tags               []glsp.DiagnosticTag                `json:"tags,omitempty"`
	RelatedInformation []glsp.DiagnosticRelatedInformation `json:"relatedInformation,omitempty"`
	// Data comes back in the context of a code action.
	Data any `json:"data,omitempty"`
}

// PublishDiagnosticsParams replaces all diagnostics of a document. The version
// is signed, as the version of a document is.
type PublishDiagnosticsParams struct {
	URI         glsp.DocumentUri `json:"uri"`
	Version     *int32           `json:"version,omitempty"`
	Diagnostics List[Diagnostic] `json:"diagnostics"`
}

// The kinds of a diagnostic report.
const (
	DiagnosticReportFull      = "full"
	DiagnosticReportUnchanged = "unchanged"
)

// DocumentDiagnosticParams asks for the diagnostics of one document.
type DocumentDiagnosticParams struct {
	TextDocument     glsp.TextDocumentIdentifier `json:"textDocument"`
	Identifier       string                      `json:"identifier,omitempty"`
	PreviousResultID string                      `json:"previousResultId,omitempty"`
}

// FullDocumentDiagnosticReport answers textDocument/diagnostic with a full set.
type FullDocumentDiagnosticReport struct {
	// Kind is DiagnosticReportFull.
	Kind     string           `json:"kind"`
	ResultID string           `json:"resultId,omitempty"`
	Items    List[Diagnostic] `json:"items"`
	// RelatedDocuments holds full or unchanged reports of documents whose
	// diagnostics follow from this one, by URI.
	RelatedDocuments map[glsp.DocumentUri]any `json:"relatedDocuments,omitempty"`
}

// UnchangedDocumentDiagnosticReport says that the last report still holds.
type UnchangedDocumentDiagnosticReport struct {
	// Kind is DiagnosticReportUnchanged.
	Kind             string                   `json:"kind"`
	ResultID         string                   `json:"resultId"`
	RelatedDocuments map[glsp.DocumentUri]any `json:"relatedDocuments,omitempty"`
}

// PreviousResultID names the last report that the client holds of a document.
type PreviousResultID struct {
	URI   glsp.DocumentUri `json:"uri"`
	Value string           `json:"value"`
}

// WorkspaceDiagnosticParams asks for the diagnostics of all documents.
type WorkspaceDiagnosticParams struct {
	Identifier        string             `json:"identifier,omitempty"`
	PreviousResultIDs []PreviousResultID `json:"previousResultIds"`
}

// WorkspaceDiagnosticReport answers workspace/diagnostic. Its items are
// WorkspaceFullDocumentDiagnosticReport or
// WorkspaceUnchangedDocumentDiagnosticReport.
type WorkspaceDiagnosticReport struct {
	Items List[any] `json:"items"`
}

// WorkspaceFullDocumentDiagnosticReport is the full set of one document.
// Version is null for a document that is not open.
type WorkspaceFullDocumentDiagnosticReport struct {
	FullDocumentDiagnosticReport
	URI     glsp.DocumentUri `json:"uri"`
	Version *int32           `json:"version"`
}

// WorkspaceUnchangedDocumentDiagnosticReport says that a document's last
// report still holds.
type WorkspaceUnchangedDocumentDiagnosticReport struct {
	UnchangedDocumentDiagnosticReport
	URI     glsp.DocumentUri `json:"uri"`
	Version *int32           `json:"version"`
}

// DiagnosticOptions is the server's offer of pull diagnostics.
type DiagnosticOptions struct {
	Identifier string `json:"identifier,omitempty"`
	// InterFileDependencies: an edit in one file may change another's set.
	InterFileDependencies bool `json:"interFileDependencies"`
	WorkspaceDiagnostics  bool `json:"workspaceDiagnostics"`
}

// DiagnosticServerCancellationData goes with an error of code −32802: whether
// the client should ask again.
type DiagnosticServerCancellationData struct {
	RetriggerRequest bool `json:"retriggerRequest"`
}
