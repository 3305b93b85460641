package protocol

import glsp "github.com/tliron/glsp/protocol_3_16"

// InlayHintKind says what an inlay hint tells; clients may colour by it.
type InlayHintKind int

// The kinds of inlay hint. A hint that is neither has no kind.
const (
	InlayHintKindType      InlayHintKind = 1
	InlayHintKindParameter InlayHintKind = 2
)

// InlayHintParams asks for the hints in a range.
type InlayHintParams struct {
	TextDocument glsp.TextDocumentIdentifier `json:"textDocument"`
	Range        glsp.Range                  `json:"range"`
}

// InlayHint is a short text shown between the characters of the document.
type InlayHint struct {
	Position glsp.Position `json:"position"`
	// Label is a string or a List of InlayHintLabelPart.
	Label any           `json:"label"`
	Kind  InlayHintKind `json:"kind,omitempty"`
	// TextEdits are made when the hint is accepted, by a double click say.
	TextEdits []glsp.TextEdit `json:"textEdits,omitempty"`
	// Tooltip is nil, a string or a MarkupContent.
	Tooltip      any  `json:"tooltip,omitempty"`
	PaddingLeft  bool `json:"paddingLeft,omitempty"`
	PaddingRight bool `json:"paddingRight,omitempty"`
	// Data comes back in inlayHint/resolve.
	Data any `json:"data,omitempty"`
}

// InlayHintLabelPart is a piece of a hint with its own tooltip and target.
type InlayHintLabelPart struct {
	Value    string         `json:"value"`
	Tooltip  any            `json:"tooltip,omitempty"`
	Location *glsp.Location `json:"location,omitempty"`
	Command  *glsp.Command  `json:"command,omitempty"`
}

// InlayHintOptions is the server's offer of inlay hints.
type InlayHintOptions struct {
	ResolveProvider bool `json:"resolveProvider,omitempty"`
}
