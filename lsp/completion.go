package lsp

import (
	"encoding/json"
	"fmt"

	lsp "github.com/tliron/glsp/protocol_3_16"

	"spanwright/lang/resolve"
	"spanwright/lsp/feature"
	"spanwright/lsp/protocol"
	"spanwright/lsp/rpc"
)

// proposalData comes back with a proposal whose documentation is asked for.
type proposalData struct {
	URI string `json:"uri"`
	Key string `json:"key"`
}

// completion answers textDocument/completion.
func (s *server) completion(r *rpc.Request, params *lsp.CompletionParams) (any, error) {
	m := momentOf(r)
	tree, offset, err := m.place(params.TextDocumentPositionParams)
	if err != nil {
		return nil, err
	}
	found := feature.Complete(m.Snapshot, tree.File.Path, offset, feature.CompleteOptions{Snippets: s.client.Snippets})
	list := protocol.CompletionList{IsIncomplete: found.Incomplete, Items: make([]protocol.CompletionItem, len(found.Proposals))}
	place := s.rangeOf(tree.File, found.Span)
	typed := tree.File.Slice(found.Span)
	for i := range found.Proposals {
		p := &found.Proposals[i]
		item := protocol.CompletionItem{
			Label: p.Label, Detail: p.Detail, Kind: proposalKind(p), SortText: fmt.Sprintf("%05d", i),
			TextEdit: lsp.TextEdit{Range: place, NewText: p.Insert},
		}
		if p.Kind == feature.SectionProposal && typed != "" {
			// "ipe30" fits IPE 300 though a client would not say so.
			item.FilterText = typed
		}
		if p.Snippet {
			item.InsertTextFormat = lsp.InsertTextFormatSnippet
		}
		if p.Key != "" {
			item.Data = proposalData{params.TextDocument.URI, p.Key}
		}
		list.Items[i] = item
	}
	return list, nil
}

// resolveCompletion answers completionItem/resolve with the documentation.
func (s *server) resolveCompletion(r *rpc.Request, item *protocol.CompletionItem) (any, error) {
	data, err := json.Marshal(item.Data)
	if err != nil {
		return item, nil
	}
	var of proposalData
	if json.Unmarshal(data, &of) != nil || of.Key == "" {
		return item, nil
	}
	if text := feature.Describe(r.Context, momentOf(r).Snapshot, pathOf(of.URI), of.Key); text != "" {
		item.Documentation = markup(text, s.client.CompletionMarkdown())
	}
	return item, nil
}

// proposalKind returns the kind whose icon clients show.
func proposalKind(p *feature.Proposal) lsp.CompletionItemKind {
	switch p.Kind {
	case feature.StatementProposal:
		return lsp.CompletionItemKindSnippet
	case feature.UnitProposal:
		return lsp.CompletionItemKindUnit
	case feature.FunctionProposal:
		return lsp.CompletionItemKindFunction
	case feature.SectionProposal:
		return lsp.CompletionItemKindStruct
	case feature.GradeProposal:
		return lsp.CompletionItemKindEnumMember
	case feature.WordProposal:
		return lsp.CompletionItemKindKeyword
	}
	switch p.Name {
	case resolve.LetName, resolve.ParameterName:
		return lsp.CompletionItemKindConstant
	case resolve.NodeName:
		return lsp.CompletionItemKindClass
	case resolve.SectionName, resolve.MaterialName:
		return lsp.CompletionItemKindStruct
	case resolve.CaseName, resolve.CombinationName, resolve.FamilyName:
		return lsp.CompletionItemKindEvent
	case resolve.GroupName, resolve.PlaceName, resolve.PartName:
		return lsp.CompletionItemKindModule
	}
	return lsp.CompletionItemKindProperty
}
