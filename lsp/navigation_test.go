package lsp

import (
	"encoding/json"
	"slices"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	lsp "github.com/tliron/glsp/protocol_3_16"

	"spanwright/lsp/feature"
	"spanwright/lsp/lsptest"
	"spanwright/lsp/rpc"
)

func TestReferencesAndHighlights(t *testing.T) {
	folder, main, common := parts(t)
	c := start(t, lsptest.Options{Capabilities: pushing(), Folders: []string{uriOf(folder)}})
	c.Open(main, fileText(t, main))
	c.WaitDiagnostics(main)
	at := c.At(main, "of |post")
	found := c.References(main, at)
	require.Len(t, found, 2)
	assert.Equal(t, []string{common, main}, []string{found[0].URI, found[1].URI})
	assert.Equal(t, c.Range(main, "post"), found[1].Range)

	marks := c.Highlights(main, c.At(main, "support |A"))
	require.Len(t, marks, 3)
	assert.Equal(t, lsp.DocumentHighlightKindWrite, *marks[0].Kind)
	assert.Equal(t, lsp.DocumentHighlightKindRead, *marks[1].Kind)
	assert.Empty(t, c.References(main, lsp.Position{Line: 1000}))

	assert.Equal(t, []lsp.Location{found[0]}, c.Definition(main, at))
	assert.Empty(t, c.Definition(main, lsp.Position{}))

	links := c.Links(main)
	require.Len(t, links, 1)
	assert.Equal(t, common, *links[0].Target)
	assert.Equal(t, "common.span", c.Under(main, links[0].Range))
}

func TestRenameAcrossFiles(t *testing.T) {
	folder, main, common := parts(t)
	c := start(t, lsptest.Options{Capabilities: pushing(), Folders: []string{uriOf(folder)}})
	c.Open(main, fileText(t, main))
	c.Open(common, fileText(t, common))
	c.WaitDiagnostics(main)
	at := c.At(main, "of |post")
	var prepared struct {
		Range       lsp.Range
		Placeholder string
	}
	params := map[string]any{"textDocument": map[string]any{"uri": main}, "position": at}
	require.NoError(t, c.Call("textDocument/prepareRename", params, &prepared))
	assert.Equal(t, "post", prepared.Placeholder)
	assert.Equal(t, "post", c.Under(main, prepared.Range))

	edit := c.Rename(main, at, "mast")
	require.Len(t, edit.DocumentChanges, 2)
	for _, change := range edit.DocumentChanges {
		require.NotNil(t, change.TextDocument.Version)
		assert.Equal(t, c.Version(change.TextDocument.URI), *change.TextDocument.Version)
	}
	c.Apply(edit)
	assert.Contains(t, c.Text(main), "A -> B of mast\n")
	assert.Contains(t, c.Text(common), "section mast = ")
	assert.Empty(t, c.WaitDiagnosticsThat(main, "are none", none)) // one file changes before the other

	params["newName"] = "kN"
	refused := c.Refused("textDocument/rename", params)
	assert.EqualValues(t, rpc.CodeRequestFailed, refused.Code)
	assert.Contains(t, refused.Message, "kN is a unit")
	params["position"] = lsp.Position{}
	assert.EqualValues(t, rpc.CodeRequestFailed, c.Refused("textDocument/prepareRename", params).Code)

	plain := start(t, lsptest.Options{Capabilities: map[string]any{}})
	plain.Open(uri, frame)
	edit = plain.Rename(uri, plain.At(uri, "of |post"), "mast")
	assert.Empty(t, edit.DocumentChanges)
	assert.Len(t, edit.Changes[uri], 2)
	assert.Equal(t, true, plain.ServerCapabilities["renameProvider"])
}

func TestFoldingAndSelection(t *testing.T) {
	c := start(t, lsptest.Options{})
	c.Open(uri, "# one\n# two\n"+frame)
	folds := c.Folding(uri)
	require.Len(t, folds, 2)
	block := folds[slices.IndexFunc(folds, func(f lsp.FoldingRange) bool { return f.Kind == nil })]
	assert.EqualValues(t, 9, block.StartLine)
	assert.EqualValues(t, 10, block.EndLine)

	positions := []lsp.Position{c.At(uri, "A -> |B of"), {Line: 5000, Character: 5000}}
	all := lsptest.Ask[[]lsp.SelectionRange](c, "textDocument/selectionRange", map[string]any{
		"textDocument": map[string]any{"uri": uri}, "positions": positions,
	})
	require.Len(t, all, 2)
	assert.Equal(t, "B", c.Under(uri, all[0].Range))
	last := all[0]
	for last.Parent != nil {
		assert.Contains(t, c.Under(uri, last.Parent.Range), c.Under(uri, last.Range))
		last = *last.Parent
	}
	assert.Equal(t, c.Text(uri), c.Under(uri, last.Range))
}

func TestLenses(t *testing.T) {
	c := start(t, lsptest.Options{Configuration: map[string]any{}})
	c.Open(uri, frame)
	c.WaitReceived("workspace/codeLens/refresh", 1)
	lenses := c.Lenses(uri)
	require.Len(t, lenses, 2)
	assert.Contains(t, lenses[0].Command.Title, "2 nodes")
	assert.Contains(t, lenses[1].Command.Title, "4 kN")
	assert.EqualValues(t, 7, lenses[1].Range.Start.Line)

	c.Configure(map[string]any{"spanwright": map[string]any{"codeLens": false}})
	c.WaitReceived("workspace/codeLens/refresh", 2)
	assert.Empty(t, c.Lenses(uri))
}

// decode returns the words that tokens colour, each with its role.
func decode(text string, data []uint32) []string {
	var words []string
	lines := strings.Split(text, "\n")
	line, character := 0, 0
	for i := 0; i < len(data); i += perToken {
		if data[i] > 0 {
			line, character = line+int(data[i]), 0
		}
		character += int(data[i+1])
		words = append(words, lines[line][character:character+int(data[i+2])]+":"+feature.Roles()[data[i+3]])
	}
	return words
}

func TestTokens(t *testing.T) {
	c := start(t, lsptest.Options{})
	c.Open(uri, frame)
	full := c.Tokens(uri)
	words := decode(frame, full.Data)
	for _, want := range []string{"model:keyword", `"Shed":string`, "steel:struct", "A:class", "c:property", "kN:type", "4:number", "W:event"} {
		assert.Contains(t, words, want)
	}
	document := map[string]any{"uri": uri}
	part := lsptest.Ask[lsp.SemanticTokens](c, "textDocument/semanticTokens/range", map[string]any{
		"textDocument": document, "range": c.Range(uri, "beam c = A -> B of post"),
	})
	inside := decode(frame, part.Data)
	assert.Contains(t, inside, "beam:keyword")
	assert.NotContains(t, inside, "case:keyword")

	// The difference after an edit, put into what the client has, gives the whole.
	c.Edit(uri, "4 kN along x", "14.5 kN along x")
	delta := lsptest.Ask[lsp.SemanticTokensDelta](c, "textDocument/semanticTokens/full/delta", map[string]any{
		"textDocument": document, "previousResultId": *full.ResultID,
	})
	require.Len(t, delta.Edits, 1)
	e := delta.Edits[0]
	assert.Less(t, len(e.Data), len(full.Data)/4)
	patched := slices.Concat(full.Data[:e.Start], e.Data, full.Data[e.Start+e.DeleteCount:])
	assert.Equal(t, c.Tokens(uri).Data, patched)

	var other map[string]json.RawMessage
	require.NoError(t, c.Call("textDocument/semanticTokens/full/delta", map[string]any{"textDocument": document, "previousResultId": "old"}, &other))
	assert.Contains(t, other, "data", "a client with something else gets all")
}

func TestSymbols(t *testing.T) {
	c := start(t, lsptest.Options{})
	c.Open(uri, frame)
	outline := c.Symbols(uri)
	index := slices.IndexFunc(outline, func(s lsp.DocumentSymbol) bool { return s.Name == "Nodes" })
	require.GreaterOrEqual(t, index, 0)
	nodes := outline[index].Children
	require.Len(t, nodes, 2)
	assert.Equal(t, "A", nodes[0].Name)
	assert.Equal(t, "node A = (0, 0) m", c.Under(uri, nodes[0].Range))
	assert.Equal(t, "A", c.Under(uri, nodes[0].SelectionRange))

	found := c.WorkspaceSymbols("post")
	require.Len(t, found, 1)
	assert.Equal(t, uri, found[0].Location.URI)
	assert.Equal(t, "Shed", *found[0].ContainerName)
	assert.Empty(t, c.WorkspaceSymbols("nobody"))

	flat := start(t, lsptest.Options{Capabilities: map[string]any{}})
	flat.Open(uri, frame)
	list := lsptest.Ask[[]lsp.SymbolInformation](flat, "textDocument/documentSymbol", map[string]any{"textDocument": map[string]any{"uri": uri}})
	var names []string
	for _, s := range list {
		names = append(names, s.Name)
	}
	assert.ElementsMatch(t, []string{"steel", "post", "A", "B", "c", "W"}, names)
}

// The load path: the case loads the node, the node is held by the column.
func TestLoadPath(t *testing.T) {
	c := start(t, lsptest.Options{})
	c.Open(uri, frame)
	c.WaitReceived("workspace/inlayHint/refresh", 1)
	prepare := func(method, mark string) []lsp.CallHierarchyItem {
		return lsptest.Ask[[]lsp.CallHierarchyItem](c, method, map[string]any{
			"textDocument": map[string]any{"uri": uri}, "position": c.At(uri, mark)})
	}
	items := prepare("textDocument/prepareCallHierarchy", "case |W")
	require.Len(t, items, 1)
	assert.Equal(t, "W", c.Under(uri, items[0].SelectionRange))
	out := lsptest.Ask[[]lsp.CallHierarchyOutgoingCall](c, "callHierarchy/outgoingCalls", map[string]any{"item": items[0]})
	require.NotEmpty(t, out)
	assert.Equal(t, "B", out[0].To.Name)
	require.NotEmpty(t, out[0].FromRanges)
	assert.Equal(t, "B: 4 kN along x", c.Under(uri, out[0].FromRanges[0]))
	in := lsptest.Ask[[]lsp.CallHierarchyIncomingCall](c, "callHierarchy/incomingCalls", map[string]any{"item": out[0].To})
	require.NotEmpty(t, in)
	assert.Equal(t, "W", in[0].From.Name)

	items = prepare("textDocument/prepareTypeHierarchy", "section |post")
	require.Len(t, items, 1)
	up := lsptest.Ask[[]lsp.CallHierarchyItem](c, "typeHierarchy/supertypes", map[string]any{"item": items[0]})
	require.Len(t, up, 1)
	assert.Equal(t, "steel", up[0].Name)
	down := lsptest.Ask[[]lsp.CallHierarchyItem](c, "typeHierarchy/subtypes", map[string]any{"item": items[0]})
	require.Len(t, down, 1)
	assert.Equal(t, "c", down[0].Name)
	assert.Empty(t, prepare("textDocument/prepareTypeHierarchy", "case |W"))
	items[0].Data = nil
	assert.EqualValues(t, -32602, c.Refused("typeHierarchy/subtypes", map[string]any{"item": items[0]}).Code)
}
