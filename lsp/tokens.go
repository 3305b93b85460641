package lsp

import (
	"github.com/tliron/glsp"
	lsp "github.com/tliron/glsp/protocol_3_16"

	"spanwright/lang/source"
	"spanwright/lsp/feature"
)

// tokenOptions is the offer of semantic tokens.
func tokenOptions() lsp.SemanticTokensOptions {
	return lsp.SemanticTokensOptions{
		Legend: lsp.SemanticTokensLegend{TokenTypes: feature.Roles(), TokenModifiers: feature.TokenModifiers()},
		Range:  true,
		Full:   lsp.SemanticDelta{Delta: pointer(true)},
	}
}

// tokensFull answers textDocument/semanticTokens/full.
func (s *server) tokensFull(context *glsp.Context, params *lsp.SemanticTokensParams) (*lsp.SemanticTokens, error) {
	path, data, err := s.moment(context).allTokens(params.TextDocument)
	if err != nil {
		return nil, err
	}
	identity := s.tokens.hold(path, data)
	return &lsp.SemanticTokens{ResultID: &identity, Data: data}, nil
}

// tokensDelta answers textDocument/semanticTokens/full/delta: the difference to
// what the client has, or all where it has something else.
func (s *server) tokensDelta(context *glsp.Context, params *lsp.SemanticTokensDeltaParams) (any, error) {
	path, data, err := s.moment(context).allTokens(params.TextDocument)
	if err != nil {
		return nil, err
	}
	before, ok := s.tokens.held(path, params.PreviousResultID)
	identity := s.tokens.hold(path, data)
	if !ok {
		return lsp.SemanticTokens{ResultID: &identity, Data: data}, nil
	}
	return lsp.SemanticTokensDelta{ResultId: &identity, Edits: tokenEdits(before, data)}, nil
}

// tokensRange answers textDocument/semanticTokens/range.
func (s *server) tokensRange(context *glsp.Context, params *lsp.SemanticTokensRangeParams) (any, error) {
	m := s.moment(context)
	tree, span, err := m.span(params.TextDocument, params.Range)
	if err != nil {
		return nil, err
	}
	tokens := feature.Tokens(m.Snapshot, tree.File.Path, span)
	return lsp.SemanticTokens{Data: s.encodeTokens(tree.File, tokens)}, nil
}

// allTokens returns the tokens of a whole document, encoded.
func (m *moment) allTokens(document lsp.TextDocumentIdentifier) (path string, data []uint32, err error) {
	tree, err := m.tree(document)
	if err != nil {
		return "", nil, err
	}
	path = tree.File.Path
	tokens := feature.Tokens(m.Snapshot, path, source.Span{End: len(tree.File.Text)})
	return path, m.server.encodeTokens(tree.File, tokens), nil
}

// encodeTokens writes tokens as the protocol has them: five numbers each, the
// place relative to the token before. The list is never nil.
func (s *server) encodeTokens(file *source.File, tokens []feature.Token) []uint32 {
	data := make([]uint32, 0, perToken*len(tokens))
	last := source.Point{}
	for _, t := range tokens {
		start, end := file.Point(t.Span.Start, s.encoding), file.Point(t.Span.End, s.encoding)
		character := start.Character
		if start.Line == last.Line {
			character -= last.Character
		}
		data = append(data, uint32(start.Line-last.Line), uint32(character),
			uint32(end.Character-start.Character), uint32(t.Role), uint32(t.Modifiers))
		last = start
	}
	return data
}
