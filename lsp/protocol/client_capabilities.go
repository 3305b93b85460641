package protocol

import (
	"encoding/json"
	"slices"

	glsp "github.com/tliron/glsp/protocol_3_16"
)

// ClientCapabilities is what a client said it can do, flat: the zero value is
// a client that can do nothing beyond the protocol's minimum.
type ClientCapabilities struct {
	// Name and Version are the client's own; empty where it did not say.
	Name, Version string
	// PositionEncodings are the client's, best first; empty means UTF-16 only.
	PositionEncodings []string

	// Window.
	WorkDoneProgress bool // window/workDoneProgress/create may be sent
	ShowDocument     bool

	// Workspace.
	ApplyEdit              bool
	DocumentChanges        bool     // versioned edits instead of a map
	ResourceOperations     []string // "create", "rename", "delete"
	ChangeAnnotations      bool
	Configuration          bool // workspace/configuration may be sent
	RegisterConfiguration  bool // didChangeConfiguration can be registered
	WorkspaceFolders       bool
	RegisterWatchedFiles   bool // didChangeWatchedFiles can be registered
	WatchedFilesRelative   bool // with a RelativePattern
	WorkspaceSymbolResolve []string
	RefreshInlayHints      bool
	RefreshDiagnostics     bool
	RefreshCodeLenses      bool
	RefreshSemanticTokens  bool
	RefreshFoldingRanges   bool

	// Completion.
	Snippets                bool
	LabelDetails            bool
	InsertReplace           bool
	CompletionFormats       []glsp.MarkupKind // of documentation, best first
	CompletionResolve       []string          // properties that may come late
	CompletionItemDefaults  []string          // fields of CompletionItemDefaults
	CompletionTagDeprecated bool

	// Hover and signature help.
	HoverFormats             []glsp.MarkupKind // best first
	SignatureFormats         []glsp.MarkupKind
	SignatureLabelOffsets    bool // a parameter's label may be two offsets
	SignatureActiveParameter bool // per signature

	// Inlay hints and diagnostics.
	InlayHints         bool
	InlayHintResolve   []string // properties that may come late
	PullDiagnostics    bool
	RelatedDocuments   bool // in a pulled report
	RelatedInformation bool
	DiagnosticTags     []glsp.DiagnosticTag
	DiagnosticVersion  bool
	DiagnosticData     bool
	CodeDescription    bool

	// Symbols, navigation, rename.
	HierarchicalSymbols bool
	DefinitionLinks     bool
	PrepareRename       bool
	TypeHierarchy       bool
	CallHierarchy       bool
	FoldingLinesOnly    bool
	FoldingLimit        int // 0 means none

	// Code actions.
	CodeActionLiterals bool // actions, not only commands
	CodeActionKinds    []glsp.CodeActionKind
	CodeActionResolve  []string // properties that may come late
	CodeActionData     bool
	CodeActionDisabled bool
	CodeActionPrefer   bool

	// Semantic tokens.
	SemanticTokenTypes     []string
	SemanticTokenModifiers []string
	SemanticTokensDelta    bool
	SemanticTokensRange    bool
	SemanticMultiline      bool

	// Formatting.
	RangesFormatting bool
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
	var params initializeParams
	err := json.Unmarshal(initialize, &params)
	c := params.flatten()
	return c, err
}

// supports is the shape of most capabilities with one switch.
type supports struct {
	Dynamic bool `json:"dynamicRegistration"`
	Refresh bool `json:"refreshSupport"`
	Link    bool `json:"linkSupport"`
}

type properties struct {
	Properties []string `json:"properties"`
}

// initializeParams is the part of initialize that is asked for anything.
type initializeParams struct {
	ClientInfo struct {
		Name    string `json:"name"`
		Version string `json:"version"`
	} `json:"clientInfo"`
	Capabilities struct {
		General struct {
			PositionEncodings []string `json:"positionEncodings"`
		} `json:"general"`
		Window struct {
			WorkDoneProgress bool `json:"workDoneProgress"`
			ShowDocument     struct {
				Support bool `json:"support"`
			} `json:"showDocument"`
		} `json:"window"`
		Workspace    workspaceCapabilities    `json:"workspace"`
		TextDocument textDocumentCapabilities `json:"textDocument"`
	} `json:"capabilities"`
}

type workspaceCapabilities struct {
	ApplyEdit     bool `json:"applyEdit"`
	WorkspaceEdit struct {
		DocumentChanges         bool      `json:"documentChanges"`
		ResourceOperations      []string  `json:"resourceOperations"`
		ChangeAnnotationSupport *struct{} `json:"changeAnnotationSupport"`
	} `json:"workspaceEdit"`
	DidChangeConfiguration supports `json:"didChangeConfiguration"`
	DidChangeWatchedFiles  struct {
		supports
		RelativePatternSupport bool `json:"relativePatternSupport"`
	} `json:"didChangeWatchedFiles"`
	Symbol struct {
		ResolveSupport properties `json:"resolveSupport"`
	} `json:"symbol"`
	Configuration    bool     `json:"configuration"`
	WorkspaceFolders bool     `json:"workspaceFolders"`
	InlayHint        supports `json:"inlayHint"`
	Diagnostics      supports `json:"diagnostics"`
	CodeLens         supports `json:"codeLens"`
	SemanticTokens   supports `json:"semanticTokens"`
	FoldingRange     supports `json:"foldingRange"`
}

type textDocumentCapabilities struct {
	Completion struct {
		CompletionItem struct {
			SnippetSupport       bool              `json:"snippetSupport"`
			LabelDetailsSupport  bool              `json:"labelDetailsSupport"`
			InsertReplaceSupport bool              `json:"insertReplaceSupport"`
			DocumentationFormat  []glsp.MarkupKind `json:"documentationFormat"`
			ResolveSupport       properties        `json:"resolveSupport"`
			TagSupport           struct {
				ValueSet []glsp.CompletionItemTag `json:"valueSet"`
			} `json:"tagSupport"`
		} `json:"completionItem"`
		CompletionList struct {
			ItemDefaults []string `json:"itemDefaults"`
		} `json:"completionList"`
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
			ActiveParameterSupport bool `json:"activeParameterSupport"`
		} `json:"signatureInformation"`
	} `json:"signatureHelp"`
	InlayHint *struct {
		supports
		ResolveSupport properties `json:"resolveSupport"`
	} `json:"inlayHint"`
	Diagnostic *struct {
		RelatedDocumentSupport bool `json:"relatedDocumentSupport"`
	} `json:"diagnostic"`
	PublishDiagnostics struct {
		RelatedInformation bool `json:"relatedInformation"`
		TagSupport         struct {
			ValueSet []glsp.DiagnosticTag `json:"valueSet"`
		} `json:"tagSupport"`
		VersionSupport         bool `json:"versionSupport"`
		DataSupport            bool `json:"dataSupport"`
		CodeDescriptionSupport bool `json:"codeDescriptionSupport"`
	} `json:"publishDiagnostics"`
	DocumentSymbol struct {
		Hierarchical bool `json:"hierarchicalDocumentSymbolSupport"`
	} `json:"documentSymbol"`
	Definition supports `json:"definition"`
	Rename     struct {
		PrepareSupport bool `json:"prepareSupport"`
	} `json:"rename"`
	TypeHierarchy *struct{} `json:"typeHierarchy"`
	CallHierarchy *struct{} `json:"callHierarchy"`
	FoldingRange  struct {
		LineFoldingOnly bool `json:"lineFoldingOnly"`
		RangeLimit      int  `json:"rangeLimit"`
	} `json:"foldingRange"`
	CodeAction struct {
		LiteralSupport *struct {
			Kind struct {
				ValueSet []glsp.CodeActionKind `json:"valueSet"`
			} `json:"codeActionKind"`
		} `json:"codeActionLiteralSupport"`
		ResolveSupport     properties `json:"resolveSupport"`
		DataSupport        bool       `json:"dataSupport"`
		DisabledSupport    bool       `json:"disabledSupport"`
		IsPreferredSupport bool       `json:"isPreferredSupport"`
	} `json:"codeAction"`
	SemanticTokens struct {
		TokenTypes     []string `json:"tokenTypes"`
		TokenModifiers []string `json:"tokenModifiers"`
		Requests       struct {
			// Both are a bool or an object.
			Full  json.RawMessage `json:"full"`
			Range json.RawMessage `json:"range"`
		} `json:"requests"`
		MultilineTokenSupport bool `json:"multilineTokenSupport"`
	} `json:"semanticTokens"`
	RangeFormatting struct {
		RangesSupport bool `json:"rangesSupport"`
	} `json:"rangeFormatting"`
}

func (p initializeParams) flatten() ClientCapabilities {
	workspace, text := p.Capabilities.Workspace, p.Capabilities.TextDocument
	c := ClientCapabilities{
		Name:              p.ClientInfo.Name,
		Version:           p.ClientInfo.Version,
		PositionEncodings: p.Capabilities.General.PositionEncodings,
		WorkDoneProgress:  p.Capabilities.Window.WorkDoneProgress,
		ShowDocument:      p.Capabilities.Window.ShowDocument.Support,
	}
	workspace.flattenInto(&c)
	text.flattenAssistInto(&c)
	text.flattenStructureInto(&c)
	return c
}

func (w workspaceCapabilities) flattenInto(c *ClientCapabilities) {
	c.ApplyEdit = w.ApplyEdit
	c.DocumentChanges = w.WorkspaceEdit.DocumentChanges
	c.ResourceOperations = w.WorkspaceEdit.ResourceOperations
	c.ChangeAnnotations = w.WorkspaceEdit.ChangeAnnotationSupport != nil
	c.Configuration = w.Configuration
	c.RegisterConfiguration = w.DidChangeConfiguration.Dynamic
	c.WorkspaceFolders = w.WorkspaceFolders
	c.RegisterWatchedFiles = w.DidChangeWatchedFiles.Dynamic
	c.WatchedFilesRelative = w.DidChangeWatchedFiles.RelativePatternSupport
	c.WorkspaceSymbolResolve = w.Symbol.ResolveSupport.Properties
	c.RefreshInlayHints = w.InlayHint.Refresh
	c.RefreshDiagnostics = w.Diagnostics.Refresh
	c.RefreshCodeLenses = w.CodeLens.Refresh
	c.RefreshSemanticTokens = w.SemanticTokens.Refresh
	c.RefreshFoldingRanges = w.FoldingRange.Refresh
}

// flattenAssistInto fills in what helps while typing and reading.
func (t textDocumentCapabilities) flattenAssistInto(c *ClientCapabilities) {
	item := t.Completion.CompletionItem
	c.Snippets = item.SnippetSupport
	c.LabelDetails = item.LabelDetailsSupport
	c.InsertReplace = item.InsertReplaceSupport
	c.CompletionFormats = item.DocumentationFormat
	c.CompletionResolve = item.ResolveSupport.Properties
	c.CompletionTagDeprecated = slices.Contains(item.TagSupport.ValueSet, glsp.CompletionItemTagDeprecated)
	c.CompletionItemDefaults = t.Completion.CompletionList.ItemDefaults

	c.HoverFormats = t.Hover.ContentFormat
	signature := t.SignatureHelp.SignatureInformation
	c.SignatureFormats = signature.DocumentationFormat
	c.SignatureLabelOffsets = signature.ParameterInformation.LabelOffsetSupport
	c.SignatureActiveParameter = signature.ActiveParameterSupport

	if t.InlayHint != nil {
		c.InlayHints = true
		c.InlayHintResolve = t.InlayHint.ResolveSupport.Properties
	}
	if t.Diagnostic != nil {
		c.PullDiagnostics = true
		c.RelatedDocuments = t.Diagnostic.RelatedDocumentSupport
	}
	c.RelatedInformation = t.PublishDiagnostics.RelatedInformation
	c.DiagnosticTags = t.PublishDiagnostics.TagSupport.ValueSet
	c.DiagnosticVersion = t.PublishDiagnostics.VersionSupport
	c.DiagnosticData = t.PublishDiagnostics.DataSupport
	c.CodeDescription = t.PublishDiagnostics.CodeDescriptionSupport
}

// flattenStructureInto fills in what reads or changes the document's structure.
func (t textDocumentCapabilities) flattenStructureInto(c *ClientCapabilities) {
	c.HierarchicalSymbols = t.DocumentSymbol.Hierarchical
	c.DefinitionLinks = t.Definition.Link
	c.PrepareRename = t.Rename.PrepareSupport
	c.TypeHierarchy = t.TypeHierarchy != nil
	c.CallHierarchy = t.CallHierarchy != nil
	c.FoldingLinesOnly = t.FoldingRange.LineFoldingOnly
	c.FoldingLimit = t.FoldingRange.RangeLimit

	if literal := t.CodeAction.LiteralSupport; literal != nil {
		c.CodeActionLiterals = true
		c.CodeActionKinds = literal.Kind.ValueSet
	}
	c.CodeActionResolve = t.CodeAction.ResolveSupport.Properties
	c.CodeActionData = t.CodeAction.DataSupport
	c.CodeActionDisabled = t.CodeAction.DisabledSupport
	c.CodeActionPrefer = t.CodeAction.IsPreferredSupport

	c.SemanticTokenTypes = t.SemanticTokens.TokenTypes
	c.SemanticTokenModifiers = t.SemanticTokens.TokenModifiers
	c.SemanticMultiline = t.SemanticTokens.MultilineTokenSupport
	c.SemanticTokensRange = isOffered(t.SemanticTokens.Requests.Range)
	var full struct {
		Delta bool `json:"delta"`
	}
	c.SemanticTokensDelta = json.Unmarshal(t.SemanticTokens.Requests.Full, &full) == nil && full.Delta
	c.RangesFormatting = t.RangeFormatting.RangesSupport
}

// isOffered reports whether a "bool or object" capability is there.
func isOffered(raw json.RawMessage) bool {
	text := string(raw)
	return text != "" && text != "false" && text != "null"
}
