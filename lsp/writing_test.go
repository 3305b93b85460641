package lsp

import (
	"encoding/json"
	"slices"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	lsp "github.com/tliron/glsp/protocol_3_16"

	"spanwright/lsp/lsptest"
	"spanwright/lsp/protocol"
)

func labelled(list protocol.CompletionList, label string) (protocol.CompletionItem, bool) {
	i := slices.IndexFunc(list.Items, func(p protocol.CompletionItem) bool { return p.Label == label })
	if i < 0 {
		return protocol.CompletionItem{}, false
	}
	return list.Items[i], true
}

func TestCompletion(t *testing.T) {
	c := start(t, lsptest.Options{})
	c.Open(uri, frame)
	list := c.Complete(uri, c.At(uri, "A -> |B"))
	node, ok := labelled(list, "A")
	require.True(t, ok)
	_, ok = labelled(list, "c")
	assert.False(t, ok, "a member is no end of a member")

	// The documentation comes on demand, by what the item carries.
	assert.Nil(t, node.Documentation)
	resolved := lsptest.Ask[protocol.CompletionItem](c, "completionItem/resolve", node)
	assert.Equal(t, "A", resolved.Label)
	require.IsType(t, map[string]any{}, resolved.Documentation)
	assert.Contains(t, resolved.Documentation.(map[string]any)["value"], "A")
	node.Data = nil
	lsptest.Ask[protocol.CompletionItem](c, "completionItem/resolve", node)

	// What is written takes the place of what was typed, behind signs of two units.
	c.Edit(uri, "model \"Shed\" plane\n", "model \"🏚\" pl\n")
	proposal, ok := labelled(c.Complete(uri, c.At(uri, "pl|\n")), "plane")
	require.True(t, ok)
	var edit lsp.TextEdit
	text, err := json.Marshal(proposal.TextEdit)
	require.NoError(t, err)
	require.NoError(t, json.Unmarshal(text, &edit))
	assert.True(t, strings.HasPrefix(c.Applied(uri, []lsp.TextEdit{edit}), "model \"🏚\" plane\n"))
}

// Snippets go only to a client that fills them in.
func TestSnippets(t *testing.T) {
	ask := func(capabilities map[string]any) protocol.CompletionItem {
		c := start(t, lsptest.Options{Capabilities: capabilities})
		c.Open(uri, frame)
		item, ok := labelled(c.Complete(uri, lsp.Position{Line: 10}), "beam")
		require.True(t, ok)
		return item
	}
	rich := ask(nil)
	assert.Equal(t, lsp.InsertTextFormatSnippet, rich.InsertTextFormat)
	assert.Contains(t, rich.TextEdit.(map[string]any)["newText"], "${1:")
	plain := ask(map[string]any{})
	assert.NotEqual(t, lsp.InsertTextFormatSnippet, plain.InsertTextFormat)
	assert.Equal(t, "beam ", plain.TextEdit.(map[string]any)["newText"])
}

func TestSignatureHelp(t *testing.T) {
	c := start(t, lsptest.Options{})
	c.Open(uri, frame+"let h = atan2(1 m, 2 m)\n")
	help := c.SignatureHelp(uri, c.At(uri, "atan2(1 m, |2 m)"))
	require.NotNil(t, help)
	require.Len(t, help.Signatures, 1)
	assert.Equal(t, 1, help.ActiveParameter)
	parameter := help.Signatures[0].Parameters[1].Label.([]any)
	assert.Equal(t, "run", help.Signatures[0].Label[int(parameter[0].(float64)):int(parameter[1].(float64))])
	assert.Nil(t, c.SignatureHelp(uri, lsp.Position{Line: 1000}))

	plain := start(t, lsptest.Options{Capabilities: map[string]any{}})
	plain.Open(uri, c.Text(uri))
	help = plain.SignatureHelp(uri, plain.At(uri, "atan2(1 m, |2 m)"))
	assert.Equal(t, "run", help.Signatures[0].Parameters[1].Label)
}

// A fix mends its diagnostic; its edit speaks of the version that it was made
// for.
func TestFixes(t *testing.T) {
	c := start(t, lsptest.Options{Capabilities: pushing()})
	c.Open(uri, strings.Replace(frame, "B of post", "B of pst", 1))
	d := c.WaitDiagnostic(uri, "unknown-name")
	actions := c.CodeActions(uri, d.Range, []protocol.Diagnostic{d})
	i := slices.IndexFunc(actions, func(a lsptest.CodeAction) bool { return a.IsPreferred })
	require.GreaterOrEqual(t, i, 0, "%+v", actions)
	fix := actions[i]
	assert.Equal(t, "quickfix", fix.Kind)
	require.Len(t, fix.Diagnostics, 1)
	assert.Equal(t, d.Code, fix.Diagnostics[0].Code)
	require.NotNil(t, fix.Edit)
	assert.EqualValues(t, 1, *fix.Edit.DocumentChanges[0].TextDocument.Version)
	c.Apply(*fix.Edit)
	assert.Empty(t, c.WaitDiagnostics(uri))
	assert.Equal(t, frame, c.Text(uri))

	params := map[string]any{"textDocument": map[string]any{"uri": uri}, "range": d.Range,
		"context": map[string]any{"diagnostics": []any{}, "only": []string{"source"}}}
	assert.Empty(t, lsptest.Ask[[]lsptest.CodeAction](c, "textDocument/codeAction", params))
}

// The smallest restraint that stops a mechanism is found when it is chosen; a
// client that cannot wait gets it at once.
func TestRestraintsOnDemand(t *testing.T) {
	for name, late := range map[string]bool{"late": true, "at once": false} {
		t.Run(name, func(t *testing.T) {
			capabilities := pushing()
			if !late {
				lsptest.Set(capabilities, nil, "textDocument", "codeAction", "resolveSupport")
			}
			c := start(t, lsptest.Options{Capabilities: capabilities})
			c.Open(uri, strings.Replace(frame, "A fixed", "A pinned", 1))
			d := c.WaitDiagnostic(uri, "mechanism")
			actions := c.CodeActions(uri, d.Range, []protocol.Diagnostic{d})
			i := slices.IndexFunc(actions, func(a lsptest.CodeAction) bool { return a.Kind == "quickfix" })
			require.GreaterOrEqual(t, i, 0)
			action := actions[i]
			assert.Equal(t, late, action.Edit == nil)
			if late {
				action = lsptest.Ask[lsptest.CodeAction](c, "codeAction/resolve", action)
			}
			require.NotNil(t, action.Edit)
			c.Apply(*action.Edit)
			c.WaitReceived("workspace/codeLens/refresh", 2)
			assert.Empty(t, c.WaitDiagnosticsThat(uri, "are none", none))
		})
	}
}
