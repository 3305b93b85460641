package lsptest

import (
	lsp "github.com/tliron/glsp/protocol_3_16"

	"spanwright/lsp/protocol"
)

// at is a place in a document, as most requests take it.
func at(uri string, p lsp.Position) map[string]any {
	return map[string]any{"textDocument": map[string]any{"uri": uri}, "position": p}
}

// within is a range of a document.
func within(uri string, r lsp.Range) map[string]any {
	return map[string]any{"textDocument": map[string]any{"uri": uri}, "range": r}
}

// Hover is the answer to textDocument/hover.
type Hover struct {
	Contents lsp.MarkupContent `json:"contents"`
	Range    *lsp.Range        `json:"range"`
}

// Hover asks for the hover at a place; nil where there is none.
func (c *Client) Hover(uri string, p lsp.Position) *Hover {
	c.t.Helper()
	return Ask[*Hover](c, "textDocument/hover", at(uri, p))
}

// Complete asks for completion at a place.
func (c *Client) Complete(uri string, p lsp.Position) protocol.CompletionList {
	c.t.Helper()
	return Ask[protocol.CompletionList](c, "textDocument/completion", at(uri, p))
}

// SignatureHelp is the answer to textDocument/signatureHelp.
type SignatureHelp struct {
	Signatures []struct {
		Label         string `json:"label"`
		Documentation any    `json:"documentation"`
		Parameters    []struct {
			Label any `json:"label"`
		} `json:"parameters"`
	} `json:"signatures"`
	ActiveSignature int `json:"activeSignature"`
	ActiveParameter int `json:"activeParameter"`
}

// SignatureHelp asks for the forms of what is being written at a place.
func (c *Client) SignatureHelp(uri string, p lsp.Position) *SignatureHelp {
	c.t.Helper()
	return Ask[*SignatureHelp](c, "textDocument/signatureHelp", at(uri, p))
}

// Definition asks where the name at a place is declared.
func (c *Client) Definition(uri string, p lsp.Position) []lsp.Location {
	c.t.Helper()
	return Ask[[]lsp.Location](c, "textDocument/definition", at(uri, p))
}

// References asks where the name at a place is used, and declared.
func (c *Client) References(uri string, p lsp.Position) []lsp.Location {
	c.t.Helper()
	params := at(uri, p)
	params["context"] = map[string]any{"includeDeclaration": true}
	return Ask[[]lsp.Location](c, "textDocument/references", params)
}

// Highlights asks for the places of the name at a place in its document.
func (c *Client) Highlights(uri string, p lsp.Position) []lsp.DocumentHighlight {
	c.t.Helper()
	return Ask[[]lsp.DocumentHighlight](c, "textDocument/documentHighlight", at(uri, p))
}

// Symbols asks for the outline of a document.
func (c *Client) Symbols(uri string) []lsp.DocumentSymbol {
	c.t.Helper()
	return Ask[[]lsp.DocumentSymbol](c, "textDocument/documentSymbol", identifier(uri))
}

// WorkspaceSymbols asks for the symbols of all documents that match.
func (c *Client) WorkspaceSymbols(query string) []lsp.SymbolInformation {
	c.t.Helper()
	return Ask[[]lsp.SymbolInformation](c, "workspace/symbol", map[string]any{"query": query})
}

// Format asks for the edits that bring a document into its normal form.
func (c *Client) Format(uri string) []lsp.TextEdit {
	c.t.Helper()
	params := identifier(uri)
	params["options"] = map[string]any{"tabSize": 4, "insertSpaces": true}
	return Ask[[]lsp.TextEdit](c, "textDocument/formatting", params)
}

// InlayHints asks for the hints in a range.
func (c *Client) InlayHints(uri string, r lsp.Range) []protocol.InlayHint {
	c.t.Helper()
	return Ask[[]protocol.InlayHint](c, "textDocument/inlayHint", within(uri, r))
}

// Lenses asks for the code lenses of a document.
func (c *Client) Lenses(uri string) []lsp.CodeLens {
	c.t.Helper()
	return Ask[[]lsp.CodeLens](c, "textDocument/codeLens", identifier(uri))
}

// Links asks for the links of a document.
func (c *Client) Links(uri string) []lsp.DocumentLink {
	c.t.Helper()
	return Ask[[]lsp.DocumentLink](c, "textDocument/documentLink", identifier(uri))
}

// Folding asks for the ranges that can be folded.
func (c *Client) Folding(uri string) []lsp.FoldingRange {
	c.t.Helper()
	return Ask[[]lsp.FoldingRange](c, "textDocument/foldingRange", identifier(uri))
}

// Tokens asks for the semantic tokens of a document.
func (c *Client) Tokens(uri string) lsp.SemanticTokens {
	c.t.Helper()
	return Ask[lsp.SemanticTokens](c, "textDocument/semanticTokens/full", identifier(uri))
}

// CodeAction is one offered change, with its edit as it is decoded.
type CodeAction struct {
	Title       string                `json:"title"`
	Kind        string                `json:"kind"`
	IsPreferred bool                  `json:"isPreferred"`
	Diagnostics []protocol.Diagnostic `json:"diagnostics"`
	Edit        *WorkspaceEdit        `json:"edit,omitempty"`
	Data        any                   `json:"data,omitempty"`
}

// CodeActions asks for the changes on offer at a range, given the diagnostics
// that the client shows there.
func (c *Client) CodeActions(uri string, r lsp.Range, shown []protocol.Diagnostic) []CodeAction {
	c.t.Helper()
	params := within(uri, r)
	params["context"] = protocol.CodeActionContext{Diagnostics: append([]protocol.Diagnostic{}, shown...)}
	return Ask[[]CodeAction](c, "textDocument/codeAction", params)
}

// Rename asks for the edits that give the name at a place a new one.
func (c *Client) Rename(uri string, p lsp.Position, name string) WorkspaceEdit {
	c.t.Helper()
	params := at(uri, p)
	params["newName"] = name
	return Ask[WorkspaceEdit](c, "textDocument/rename", params)
}

// Pull asks for the diagnostics of a document.
func (c *Client) Pull(uri, previous string) protocol.FullDocumentDiagnosticReport {
	c.t.Helper()
	params := identifier(uri)
	params["previousResultId"] = previous
	return Ask[protocol.FullDocumentDiagnosticReport](c, "textDocument/diagnostic", params)
}

// Execute runs a command of the server.
func (c *Client) Execute(command string, arguments ...any) any {
	c.t.Helper()
	return Ask[any](c, "workspace/executeCommand", map[string]any{"command": command, "arguments": arguments})
}
