package protocol

import glsp "github.com/tliron/glsp/protocol_3_16"

// CompletionItem is a proposal. Every field survives decoding, so that
// completionItem/resolve can send back what it was sent.
type CompletionItem struct {
	Label  string                   `json:"label"`
	Kind   glsp.CompletionItemKind  `json:"kind,omitempty"`
	Tags   []glsp.CompletionItemTag `json:"tags,omitempty"`
	Detail string                   `json:"detail,omitempty"`
	// Documentation is nil, a string or a MarkupContent.
	Documentation    any                   `json:"documentation,omitempty"`
	Deprecated       bool                  `json:"deprecated,omitempty"`
	Preselect        bool                  `json:"preselect,omitempty"`
	SortText         string                `json:"sortText,omitempty"`
	FilterText       string                `json:"filterText,omitempty"`
	InsertText       string                `json:"insertText,omitempty"`
	InsertTextFormat glsp.InsertTextFormat `json:"insertTextFormat,omitempty"`
	InsertTextMode   glsp.InsertTextMode   `json:"insertTextMode,omitempty"`
	// TextEdit is nil, a TextEdit or an InsertReplaceEdit.
	TextEdit            any             `json:"textEdit,omitempty"`
	AdditionalTextEdits []glsp.TextEdit `json:"additionalTextEdits,omitempty"`
	CommitCharacters    []string        `json:"commitCharacters,omitempty"`
	Command             *glsp.Command   `json:"command,omitempty"`
	// Data comes back in completionItem/resolve.
	Data any `json:"data,omitempty"`
}

// CompletionList is the answer to textDocument/completion.
type CompletionList struct {
	// IsIncomplete makes the client ask again on further typing.
	IsIncomplete bool                 `json:"isIncomplete"`
	Items        List[CompletionItem] `json:"items"`
}
