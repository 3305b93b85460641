package protocol

import glsp "github.com/tliron/glsp/protocol_3_16"

// InlayHintParams asks for the hints in a range.
type InlayHintParams struct {
	TextDocument glsp.TextDocumentIdentifier `json:"textDocument"`
	Range        glsp.Range                  `json:"range"`
}

// InlayHint is a short text shown between the characters of the document.
type InlayHint struct {
	Position glsp.Position `json:"position"`
	Label    string        `json:"label"`
	// Tooltip is nil, a string or a MarkupContent.
	Tooltip     any  `json:"tooltip,omitempty"`
	PaddingLeft bool `json:"paddingLeft,omitempty"`
}

// InlayHintOptions is the server's offer of inlay hints.
type InlayHintOptions struct{}
