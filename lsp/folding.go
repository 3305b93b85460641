package lsp

import (
	"github.com/tliron/glsp"
	lsp "github.com/tliron/glsp/protocol_3_16"

	"spanwright/lsp/feature"
)

// folding answers textDocument/foldingRange.
func (s *server) folding(context *glsp.Context, params *lsp.FoldingRangeParams) ([]lsp.FoldingRange, error) {
	tree, err := s.moment(context).tree(params.TextDocument)
	if err != nil {
		return nil, err
	}
	folds := feature.Folds(tree)
	if limit := s.client.FoldingLimit; limit > 0 && len(folds) > limit {
		folds = folds[:limit]
	}
	ranges := make([]lsp.FoldingRange, len(folds))
	for i, f := range folds {
		ranges[i] = lsp.FoldingRange{StartLine: uint32(f.First), EndLine: uint32(f.Last)}
		if f.Comment {
			ranges[i].Kind = pointer(string(lsp.FoldingRangeKindComment))
		}
	}
	return ranges, nil
}
