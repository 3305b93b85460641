package lsp

import (
	"github.com/tliron/glsp"
	lsp "github.com/tliron/glsp/protocol_3_16"

	"spanwright/lsp/feature"
)

// hover answers textDocument/hover.
func (s *server) hover(context *glsp.Context, params *lsp.HoverParams) (*lsp.Hover, error) {
	r := s.connection.Request(context)
	m := momentOf(r)
	tree, offset, err := m.place(params.TextDocumentPositionParams)
	if err != nil {
		return nil, err
	}
	options := feature.HoverOptions{Pictures: s.pictures && s.client.HoverMarkdown()}
	found, ok := feature.HoverAt(r.Context, m.Snapshot, tree.File.Path, offset, options)
	if !ok {
		return nil, nil
	}
	return &lsp.Hover{
		Contents: markup(found.Markdown, s.client.HoverMarkdown()),
		Range:    pointer(s.rangeOf(tree.File, found.Span)),
	}, nil
}

// markup returns a text as a client can show it: as Markdown or plain.
func markup(markdown string, rich bool) lsp.MarkupContent {
	if rich {
		return lsp.MarkupContent{Kind: lsp.MarkupKindMarkdown, Value: markdown}
	}
	return lsp.MarkupContent{Kind: lsp.MarkupKindPlainText, Value: feature.Plain(markdown)}
}
