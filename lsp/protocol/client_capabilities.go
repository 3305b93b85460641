package protocol

import (
	"encoding/json"
	"slices"

	glsp "github.com/tliron/glsp/protocol_3_16"
)

// ClientCapabilities is what a client said it can do, as far as the server asks:
// flat, and the zero value is a client that can do nothing beyond the protocol's
// minimum.
type ClientCapabilities struct {
	// PositionEncodings are the client's, best first; empty means UTF-16 only.
	PositionEncodings []string
	WorkDoneProgress  bool // window/workDoneProgress/create may be sent

	// Workspace.
	DocumentChanges       bool // versioned edits instead of a map
	Configuration         bool // workspace/configuration may be sent
	RegisterConfiguration bool // didChangeConfiguration can be registered
	RegisterWatchedFiles  bool // didChangeWatchedFiles can be registered
	RefreshInlayHints     bool
	RefreshDiagnostics    bool
	RefreshCodeLenses     bool
	RefreshSemanticTokens bool

	// Help while writing and reading. Formats are best first.
	Snippets              bool
	CompletionFormats     []glsp.MarkupKind
	HoverFormats          []glsp.MarkupKind
	SignatureFormats      []glsp.MarkupKind
	SignatureLabelOffsets bool // a parameter's label may be two offsets

	// Diagnostics and code actions.
	PullDiagnostics    bool
	RelatedInformation bool
	DiagnosticTags     []glsp.DiagnosticTag
	CodeActionResolve  []string // properties that may come late
	CodeActionData     bool

	// Structure of documents.
	HierarchicalSymbols bool
	PrepareRename       bool
	FoldingLimit        int // 0 means none
	RangesFormatting    bool
}

// OffersEncoding reports whether the client offered a position encoding.
func (c ClientCapabilities) OffersEncoding(encoding string) bool {
	return encoding == PositionEncodingUTF16 || slices.Contains(c.PositionEncodings, encoding)
}

// HoverMarkdown reports whether hovers may be markdown; the client's first
// choice counts.
func (c ClientCapabilities) HoverMarkdown() bool { return prefersMarkdown(c.HoverFormats) }

// CompletionMarkdown reports whether completion documentation may be markdown.
func (c ClientCapabilities) CompletionMarkdown() bool { return prefersMarkdown(c.CompletionFormats) }

// SignatureMarkdown reports whether signature documentation may be markdown.
func (c ClientCapabilities) SignatureMarkdown() bool { return prefersMarkdown(c.SignatureFormats) }

func prefersMarkdown(formats []glsp.MarkupKind) bool {
	return len(formats) > 0 && formats[0] == glsp.MarkupKindMarkdown
}

// DecodeClientCapabilities reads the parameters of initialize. A field of a
// wrong type is an error; all other fields are read nevertheless.
func DecodeClientCapabilities(initialize json.RawMessage) (ClientCapabilities, error) {
	var params struct {
		Capabilities announced `json:"capabilities"`
	}
	err := json.Unmarshal(initialize, &params)
	return params.Capabilities.flat(), err
}

// announced is what of the client's capabilities is asked for, in the shape in
// which it comes.
type announced struct {
	General struct {
		PositionEncodings []string `json:"positionEncodings"`
	} `json:"general"`
	Window struct {
		WorkDoneProgress bool `json:"workDoneProgress"`
	} `json:"window"`
	Workspace    announcedWorkspace `json:"workspace"`
	TextDocument announcedDocument  `json:"textDocument"`
}

// supports is the shape of most capabilities with one switch.
type supports struct {
	Dynamic bool `json:"dynamicRegistration"`
	Refresh bool `json:"refreshSupport"`
}

type announcedWorkspace struct {
	WorkspaceEdit struct {
		DocumentChanges bool `json:"documentChanges"`
	} `json:"workspaceEdit"`
	DidChangeConfiguration supports `json:"didChangeConfiguration"`
	DidChangeWatchedFiles  supports `json:"didChangeWatchedFiles"`
	Configuration          bool     `json:"configuration"`
	InlayHint              supports `json:"inlayHint"`
	Diagnostics            supports `json:"diagnostics"`
	CodeLens               supports `json:"codeLens"`
	SemanticTokens         supports `json:"semanticTokens"`
}

type announcedDocument struct {
	Completion struct {
		CompletionItem struct {
			SnippetSupport      bool              `json:"snippetSupport"`
			DocumentationFormat []glsp.MarkupKind `json:"documentationFormat"`
		} `json:"completionItem"`
	} `json:"completion"`
	Hover struct {
		ContentFormat []glsp.MarkupKind `json:"contentFormat"`
	} `json:"hover"`
	SignatureHelp struct {
		SignatureInformation struct {
			DocumentationFormat  []glsp.MarkupKind `json:"documentationFormat"`
			ParameterInformation struct {
				LabelOffsetSupport bool `json:"labelOffsetSupport"`
			} `json:"parameterInformation"`
		} `json:"signatureInformation"`
	} `json:"signatureHelp"`
	Diagnostic         *struct{} `json:"diagnostic"`
	PublishDiagnostics struct {
		RelatedInformation bool `json:"relatedInformation"`
		TagSupport         struct {
			ValueSet []glsp.DiagnosticTag `json:"valueSet"`
		} `json:"tagSupport"`
	} `json:"publishDiagnostics"`
	CodeAction struct {
		DataSupport    bool `json:"dataSupport"`
		ResolveSupport struct {
			Properties []string `json:"properties"`
		} `json:"resolveSupport"`
	} `json:"codeAction"`
	DocumentSymbol struct {
		Hierarchical bool `json:"hierarchicalDocumentSymbolSupport"`
	} `json:"documentSymbol"`
	Rename struct {
		PrepareSupport bool `json:"prepareSupport"`
	} `json:"rename"`
	FoldingRange struct {
		RangeLimit int `json:"rangeLimit"`
	} `json:"foldingRange"`
	RangeFormatting struct {
		RangesSupport bool `json:"rangesSupport"`
	} `json:"rangeFormatting"`
}

func (a *announced) flat() ClientCapabilities {
	workspace, document := &a.Workspace, &a.TextDocument
	signature := &document.SignatureHelp.SignatureInformation
	return ClientCapabilities{
		PositionEncodings: a.General.PositionEncodings,
		WorkDoneProgress:  a.Window.WorkDoneProgress,

		DocumentChanges:       workspace.WorkspaceEdit.DocumentChanges,
		Configuration:         workspace.Configuration,
		RegisterConfiguration: workspace.DidChangeConfiguration.Dynamic,
		RegisterWatchedFiles:  workspace.DidChangeWatchedFiles.Dynamic,
		RefreshInlayHints:     workspace.InlayHint.Refresh,
		RefreshDiagnostics:    workspace.Diagnostics.Refresh,
		RefreshCodeLenses:     workspace.CodeLens.Refresh,
		RefreshSemanticTokens: workspace.SemanticTokens.Refresh,

		Snippets:              document.Completion.CompletionItem.SnippetSupport,
		CompletionFormats:     document.Completion.CompletionItem.DocumentationFormat,
		HoverFormats:          document.Hover.ContentFormat,
		SignatureFormats:      signature.DocumentationFormat,
		SignatureLabelOffsets: signature.ParameterInformation.LabelOffsetSupport,

		PullDiagnostics:    document.Diagnostic != nil,
		RelatedInformation: document.PublishDiagnostics.RelatedInformation,
		DiagnosticTags:     document.PublishDiagnostics.TagSupport.ValueSet,
		CodeActionResolve:  document.CodeAction.ResolveSupport.Properties,
		CodeActionData:     document.CodeAction.DataSupport,

		HierarchicalSymbols: document.DocumentSymbol.Hierarchical,
		PrepareRename:       document.Rename.PrepareSupport,
		FoldingLimit:        document.FoldingRange.RangeLimit,
		RangesFormatting:    document.RangeFormatting.RangesSupport,
	}
}
