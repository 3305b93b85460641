package protocol

import glsp "github.com/tliron/glsp/protocol_3_16"

// TypeHierarchyPrepareParams asks which item stands at a place.
type TypeHierarchyPrepareParams struct {
	glsp.TextDocumentPositionParams
}

// TypeHierarchyItem is one node of a hierarchy.
type TypeHierarchyItem struct {
	Name           string           `json:"name"`
	Kind           glsp.SymbolKind  `json:"kind"`
	Tags           []glsp.SymbolTag `json:"tags,omitempty"`
	Detail         string           `json:"detail,omitempty"`
	URI            glsp.DocumentUri `json:"uri"`
	Range          glsp.Range       `json:"range"`
	SelectionRange glsp.Range       `json:"selectionRange"`
	// Data comes back in the requests for super- and subtypes.
	Data any `json:"data,omitempty"`
}

// TypeHierarchySupertypesParams asks for the items above an item.
type TypeHierarchySupertypesParams struct {
	Item TypeHierarchyItem `json:"item"`
}

// TypeHierarchySubtypesParams asks for the items below an item.
type TypeHierarchySubtypesParams struct {
	Item TypeHierarchyItem `json:"item"`
}
