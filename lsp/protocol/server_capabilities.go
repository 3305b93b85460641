package protocol

import glsp "github.com/tliron/glsp/protocol_3_16"

// InitializeResult answers initialize. It is for encoding only: the embedded
// type's decoder would take over and lose the fields of 3.17.
type InitializeResult struct {
	Capabilities ServerCapabilities               `json:"capabilities"`
	ServerInfo   *glsp.InitializeResultServerInfo `json:"serverInfo,omitempty"`
}

// ServerCapabilities adds what came after 3.16. It encodes flat; never decode
// into it.
type ServerCapabilities struct {
	glsp.ServerCapabilities
	// PositionEncoding is one of those the client offered; empty means UTF-16.
	PositionEncoding      string             `json:"positionEncoding,omitempty"`
	InlayHintProvider     *InlayHintOptions  `json:"inlayHintProvider,omitempty"`
	DiagnosticProvider    *DiagnosticOptions `json:"diagnosticProvider,omitempty"`
	TypeHierarchyProvider bool               `json:"typeHierarchyProvider,omitempty"`
}
