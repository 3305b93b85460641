package lsp

import (
	lsp "github.com/tliron/glsp/protocol_3_16"

	"spanwright/lsp/feature"
	"spanwright/lsp/protocol"
	"spanwright/lsp/rpc"
)

// inlayHints answers textDocument/inlayHint.
func (s *server) inlayHints(r *rpc.Request, params *protocol.InlayHintParams) (any, error) {
	m := momentOf(r)
	tree, span, err := m.span(params.TextDocument, params.Range)
	if err != nil {
		return nil, err
	}
	hints := protocol.List[protocol.InlayHint]{}
	for _, h := range feature.Hints(m.Snapshot, tree.File.Path, span, m.configuration.InlayHints.features()) {
		hint := protocol.InlayHint{Position: s.position(tree.File, h.At), Label: h.Label, PaddingLeft: true}
		if h.Tooltip != "" {
			hint.Tooltip = lsp.MarkupContent{Kind: lsp.MarkupKindMarkdown, Value: h.Tooltip}
		}
		hints = append(hints, hint)
	}
	return hints, nil
}

// features returns the switches as the feature knows them.
func (i inlayHintSwitches) features() feature.HintSwitches { return feature.HintSwitches(i) }
