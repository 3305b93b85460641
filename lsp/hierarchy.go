package lsp

import (
	"encoding/json"

	"github.com/tliron/glsp"
	lsp "github.com/tliron/glsp/protocol_3_16"

	"spanwright/lang/resolve"
	"spanwright/lang/source"
	"spanwright/lsp/feature"
	"spanwright/lsp/protocol"
	"spanwright/lsp/rpc"
)

// itemData comes back with an item of a hierarchy, and finds it again though
// the text may have moved on.
type itemData struct {
	Name string       `json:"name"`
	Kind resolve.Kind `json:"kind"`
}

// itemAgain returns the item that a client speaks of.
func itemAgain(uri string, data any) (feature.Item, error) {
	var of itemData
	text, err := json.Marshal(data)
	if err == nil {
		err = json.Unmarshal(text, &of)
	}
	if err != nil || of.Name == "" {
		return feature.Item{}, rpc.InvalidParams("the item has lost its data")
	}
	return feature.Item{Name: of.Name, Kind: of.Kind, Location: feature.Location{Path: pathOf(uri)}}, nil
}

// typeItems turns items into the protocol's; one whose file is gone by now is
// left out. The list is never nil.
func (m *moment) typeItems(items []feature.Item) protocol.List[protocol.TypeHierarchyItem] {
	list := protocol.List[protocol.TypeHierarchyItem]{}
	for _, item := range items {
		tree, err := m.Tree(item.Location.Path)
		if err != nil {
			continue
		}
		list = append(list, protocol.TypeHierarchyItem{
			Name: item.Name, Kind: symbolKind(item.Kind), Detail: item.Detail,
			URI:            m.server.buffers.uri(item.Location.Path),
			Range:          m.server.rangeOf(tree.File, item.Whole),
			SelectionRange: m.server.rangeOf(tree.File, item.Location.Span),
			Data:           itemData{item.Name, item.Kind},
		})
	}
	return list
}

// callItem returns an item as one of a call hierarchy.
func callItem(t protocol.TypeHierarchyItem) lsp.CallHierarchyItem {
	return lsp.CallHierarchyItem{
		Name: t.Name, Kind: t.Kind, Detail: &t.Detail, URI: t.URI,
		Range: t.Range, SelectionRange: t.SelectionRange, Data: t.Data,
	}
}

// prepareTypes answers textDocument/prepareTypeHierarchy: materials, sections
// and members.
func (s *server) prepareTypes(r *rpc.Request, params *protocol.TypeHierarchyPrepareParams) (any, error) {
	m := momentOf(r)
	tree, offset, err := m.place(params.TextDocumentPositionParams)
	if err != nil {
		return nil, err
	}
	if item, ok := feature.TypeItem(m.Snapshot, tree.File.Path, offset); ok {
		return m.typeItems([]feature.Item{item}), nil
	}
	return nil, nil
}

// supertypes answers typeHierarchy/supertypes: what an item is made of.
func (s *server) supertypes(r *rpc.Request, params *protocol.TypeHierarchySupertypesParams) (any, error) {
	item, err := itemAgain(params.Item.URI, params.Item.Data)
	if err != nil {
		return nil, err
	}
	m := momentOf(r)
	return m.typeItems(feature.Supertypes(m.Snapshot, item)), nil
}

// subtypes answers typeHierarchy/subtypes: what is made of an item.
func (s *server) subtypes(r *rpc.Request, params *protocol.TypeHierarchySubtypesParams) (any, error) {
	item, err := itemAgain(params.Item.URI, params.Item.Data)
	if err != nil {
		return nil, err
	}
	m := momentOf(r)
	return m.typeItems(feature.Subtypes(m.Snapshot, item)), nil
}

// prepareCalls answers textDocument/prepareCallHierarchy: what loads go through.
func (s *server) prepareCalls(context *glsp.Context, params *lsp.CallHierarchyPrepareParams) ([]lsp.CallHierarchyItem, error) {
	m := s.moment(context)
	tree, offset, err := m.place(params.TextDocumentPositionParams)
	if err != nil {
		return nil, err
	}
	item, ok := feature.PathItem(m.Snapshot, tree.File.Path, offset)
	if !ok {
		return nil, nil
	}
	var list []lsp.CallHierarchyItem
	for _, t := range m.typeItems([]feature.Item{item}) {
		list = append(list, callItem(t))
	}
	return list, nil
}

// incomingCalls answers callHierarchy/incomingCalls: what gives load to an item.
func (s *server) incomingCalls(context *glsp.Context, params *lsp.CallHierarchyIncomingCallsParams) ([]lsp.CallHierarchyIncomingCall, error) {
	item, err := itemAgain(params.Item.URI, params.Item.Data)
	if err != nil {
		return nil, err
	}
	m := s.moment(context)
	calls := []lsp.CallHierarchyIncomingCall{}
	for _, step := range feature.LoadsFrom(m.Snapshot, item) {
		for _, t := range m.typeItems([]feature.Item{step.Item}) {
			calls = append(calls, lsp.CallHierarchyIncomingCall{
				From: callItem(t), FromRanges: m.ranges(step.Item.Location.Path, step.From),
			})
		}
	}
	return calls, nil
}

// outgoingCalls answers callHierarchy/outgoingCalls: what an item gives its
// load to.
func (s *server) outgoingCalls(context *glsp.Context, params *lsp.CallHierarchyOutgoingCallsParams) ([]lsp.CallHierarchyOutgoingCall, error) {
	item, err := itemAgain(params.Item.URI, params.Item.Data)
	if err != nil {
		return nil, err
	}
	m := s.moment(context)
	calls := []lsp.CallHierarchyOutgoingCall{}
	for _, step := range feature.LoadsTo(m.Snapshot, item) {
		for _, t := range m.typeItems([]feature.Item{step.Item}) {
			calls = append(calls, lsp.CallHierarchyOutgoingCall{
				To: callItem(t), FromRanges: m.ranges(item.Location.Path, step.From),
			})
		}
	}
	return calls, nil
}

// ranges returns places in a file as the protocol's. The list is never nil.
func (m *moment) ranges(path string, spans []source.Span) []lsp.Range {
	list := []lsp.Range{}
	tree, err := m.Tree(path)
	if err != nil {
		return list
	}
	for _, span := range spans {
		list = append(list, m.server.rangeOf(tree.File, span))
	}
	return list
}
