package lsp

import (
	"github.com/tliron/glsp"
	lsp "github.com/tliron/glsp/protocol_3_16"

	"spanwright/lang/resolve"
	"spanwright/lang/source"
	"spanwright/lsp/feature"
)

// symbols answers textDocument/documentSymbol: an outline, or a plain list for
// a client that shows no outline.
func (s *server) symbols(context *glsp.Context, params *lsp.DocumentSymbolParams) (any, error) {
	m := s.moment(context)
	tree, err := m.tree(params.TextDocument)
	if err != nil {
		return nil, err
	}
	outline := feature.Symbols(m.Snapshot, tree.File.Path)
	if s.client.HierarchicalSymbols {
		return s.outline(tree.File, outline), nil
	}
	list := []lsp.SymbolInformation{}
	var flatten func(symbols []feature.Symbol, container string)
	flatten = func(symbols []feature.Symbol, container string) {
		for _, symbol := range symbols {
			if symbol.Kind != resolve.NoKind {
				information := lsp.SymbolInformation{Name: symbol.Name, Kind: symbolKind(symbol.Kind), Location: s.location(tree, symbol.Whole)}
				if container != "" {
					information.ContainerName = pointer(container)
				}
				list = append(list, information)
			}
			flatten(symbol.Children, symbol.Name)
		}
	}
	flatten(outline, "")
	return list, nil
}

func (s *server) outline(file *source.File, symbols []feature.Symbol) []lsp.DocumentSymbol {
	all := make([]lsp.DocumentSymbol, len(symbols))
	for i, symbol := range symbols {
		all[i] = lsp.DocumentSymbol{
			Name:           symbol.Name,
			Kind:           symbolKind(symbol.Kind),
			Range:          s.rangeOf(file, symbol.Whole),
			SelectionRange: s.rangeOf(file, symbol.NameSpan),
			Children:       s.outline(file, symbol.Children),
		}
		if symbol.Detail != "" {
			all[i].Detail = pointer(symbol.Detail)
		}
	}
	return all
}

// workspaceSymbols answers workspace/symbol.
func (s *server) workspaceSymbols(context *glsp.Context, params *lsp.WorkspaceSymbolParams) ([]lsp.SymbolInformation, error) {
	m := s.moment(context)
	list := []lsp.SymbolInformation{}
	for _, found := range feature.WorkspaceSymbols(m.Snapshot, params.Query) {
		places := m.locations([]feature.Location{found.Location})
		if len(places) == 0 {
			continue // the file is gone by now
		}
		information := lsp.SymbolInformation{Name: found.Name, Kind: symbolKind(found.Kind), Location: places[0]}
		if found.Container != "" {
			information.ContainerName = pointer(found.Container)
		}
		list = append(list, information)
	}
	return list, nil
}

// symbolKind returns the kind whose icon clients show.
func symbolKind(k resolve.Kind) lsp.SymbolKind {
	switch k {
	case resolve.LetName, resolve.ParameterName:
		return lsp.SymbolKindConstant
	case resolve.NodeName:
		return lsp.SymbolKindClass
	case resolve.BeamName, resolve.BarName, resolve.LinkName, resolve.SpringName:
		return lsp.SymbolKindProperty
	case resolve.GroupName:
		return lsp.SymbolKindArray
	case resolve.PartName, resolve.PlaceName:
		return lsp.SymbolKindModule
	case resolve.SectionName, resolve.MaterialName:
		return lsp.SymbolKindStruct
	case resolve.CaseName, resolve.CombinationName:
		return lsp.SymbolKindEvent
	case resolve.FamilyName:
		return lsp.SymbolKindEnum
	}
	return lsp.SymbolKindNamespace
}
