package protocol

import glsp "github.com/tliron/glsp/protocol_3_16"

// CompletionItem is a proposal. Every field survives decoding, so that
// completionItem/resolve can send back what it was sent.
type CompletionItem struct {
	Label        string                      `json:"label"`
	LabelDetails *CompletionItemLabelDetails `json:"labelDetails,omitempty"`
	Kind         glsp.CompletionItemKind     `json:"kind,omitempty"`
	Tags         []glsp.CompletionItemTag    `json:"tags,omitempty"`
	Detail       string                      `json:"detail,omitempty"`
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
	TextEdit any `json:"textEdit,omitempty"`
	// TextEditText is the new text where the list's defaults give the range.
	TextEditText        string          `json:"textEditText,omitempty"`
	AdditionalTextEdits []glsp.TextEdit `json:"additionalTextEdits,omitempty"`
	CommitCharacters    []string        `json:"commitCharacters,omitempty"`
	Command             *glsp.Command   `json:"command,omitempty"`
	// Data comes back in completionItem/resolve.
	Data any `json:"data,omitempty"`
}

// CompletionItemLabelDetails stands behind the label in the list: Detail close
// to it, Description at the right edge.
type CompletionItemLabelDetails struct {
	Detail      string `json:"detail,omitempty"`
	Description string `json:"description,omitempty"`
}

// CompletionList is the answer to textDocument/completion.
type CompletionList struct {
	// IsIncomplete makes the client ask again on further typing.
	IsIncomplete bool                    `json:"isIncomplete"`
	ItemDefaults *CompletionItemDefaults `json:"itemDefaults,omitempty"`
	Items        List[CompletionItem]    `json:"items"`
}

// CompletionItemDefaults holds what items without the field of their own use.
// Send only the fields that ClientCapabilities.CompletionItemDefaults lists.
type CompletionItemDefaults struct {
	CommitCharacters []string `json:"commitCharacters,omitempty"`
	// EditRange is nil, a Range or an InsertReplaceRange.
	EditRange        any                   `json:"editRange,omitempty"`
	InsertTextFormat glsp.InsertTextFormat `json:"insertTextFormat,omitempty"`
	InsertTextMode   glsp.InsertTextMode   `json:"insertTextMode,omitempty"`
	Data             any                   `json:"data,omitempty"`
}

// InsertReplaceRange gives both ranges of an insert-or-replace completion.
type InsertReplaceRange struct {
	Insert  glsp.Range `json:"insert"`
	Replace glsp.Range `json:"replace"`
}

// CompletionOptions is the server's offer of completion.
type CompletionOptions struct {
	glsp.CompletionOptions
	CompletionItem *CompletionItemOptions `json:"completionItem,omitempty"`
}

// CompletionItemOptions says what the server's items hold.
type CompletionItemOptions struct {
	LabelDetailsSupport bool `json:"labelDetailsSupport,omitempty"`
}
