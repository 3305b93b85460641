package protocol

import glsp "github.com/tliron/glsp/protocol_3_16"

// DocumentRangesFormattingParams asks to format several ranges at once (3.18).
type DocumentRangesFormattingParams struct {
	TextDocument glsp.TextDocumentIdentifier `json:"textDocument"`
	Ranges       []glsp.Range                `json:"ranges"`
	Options      glsp.FormattingOptions      `json:"options"`
}

// DocumentRangeFormattingOptions is the server's offer of range formatting.
type DocumentRangeFormattingOptions struct {
	RangesSupport bool `json:"rangesSupport,omitempty"`
}
