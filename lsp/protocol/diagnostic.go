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
}

// UnchangedDocumentDiagnosticReport says that the last report still holds.
type UnchangedDocumentDiagnosticReport struct {
	// Kind is DiagnosticReportUnchanged.
	Kind     string `json:"kind"`
	ResultID string `json:"resultId"`
}

// DiagnosticOptions is the server's offer of pull diagnostics.
type DiagnosticOptions struct {
	Identifier string `json:"identifier,omitempty"`
	// InterFileDependencies: an edit in one file may change another's set.
	InterFileDependencies bool `json:"interFileDependencies"`
	WorkspaceDiagnostics  bool `json:"workspaceDiagnostics"`
}
