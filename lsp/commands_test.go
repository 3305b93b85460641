package lsp

import (
	"context"
	"encoding/json"
	"io"
	"log/slog"
	"strings"
	"testing"
	"time"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"spanwright/lang/generate"
	"spanwright/lsp/lsptest"
	"spanwright/lsp/rpc"
)

// serveAnnounced tells of every solve at once.
func serveAnnounced(ctx context.Context, conn io.ReadWriteCloser, log *slog.Logger) int {
	pace := quick()
	pace.Slow = time.Nanosecond
	return Serve(ctx, conn, Options{Log: log, Version: "test", Pace: pace})
}

// A long solve is shown, can be cancelled by the user, and runs again on
// command.
func TestLongSolves(t *testing.T) {
	c := lsptest.Start(t, serveAnnounced, lsptest.Options{})
	text := generate.Building{Storeys: 10, Bays: 10, Rows: 10}.Text()
	c.Open(uri, text)
	create := c.WaitReceived("window/workDoneProgress/create", 1)
	var asked struct{ Token string }
	require.NoError(t, json.Unmarshal(create[0].Params, &asked))
	progress := c.WaitReceived("$/progress", 1)
	assert.Contains(t, string(progress[0].Params), `"kind":"begin"`)
	assert.Contains(t, string(progress[0].Params), "Solving shed")
	c.Notify("window/workDoneProgress/cancel", map[string]any{"token": asked.Token})
	progress = c.WaitReceived("$/progress", 2)
	assert.Contains(t, string(progress[1].Params), `"kind":"end"`)

	c.WaitReceived("workspace/codeLens/refresh", 1)
	lenses := c.Lenses(uri)
	require.NotEmpty(t, lenses)
	require.Contains(t, lenses[0].Command.Title, "cancelled")

	c.Execute("spanwright.solveNow", map[string]any{"uri": uri, "position": map[string]any{"line": 0, "character": 0}})
	c.WaitReceived("workspace/codeLens/refresh", 2)
	assert.Contains(t, c.Lenses(uri)[0].Command.Title, "this version")

	// A client that shows no progress is not bothered.
	plain := lsptest.Start(t, serveAnnounced, lsptest.Options{Capabilities: map[string]any{}})
	plain.Open(uri, generate.Thousand.Text())
	for deadline := time.Now().Add(lsptest.Patience); !strings.Contains(plain.Lenses(uri)[0].Command.Title, "this version"); {
		require.True(t, time.Now().Before(deadline), "the solve never ends")
		time.Sleep(10 * time.Millisecond)
	}
	assert.Empty(t, plain.Received("window/workDoneProgress/create"))
}

func TestCommandsThatMakeNoSense(t *testing.T) {
	c := start(t, lsptest.Options{})
	for _, params := range []map[string]any{
		{"command": "spanwright.nothing", "arguments": []any{map[string]any{"uri": uri}}},
		{"command": "spanwright.solveNow"},
		{"command": "spanwright.solveNow", "arguments": []any{5}},
		{"command": "spanwright.solveNow", "arguments": []any{map[string]any{"uri": "file:///no/such.span"}}},
		{},
	} {
		assert.EqualValues(t, -32602, c.Refused("workspace/executeCommand", params).Code, params)
	}
	offered := c.ServerCapabilities["executeCommandProvider"].(map[string]any)["commands"]
	assert.Contains(t, offered, "spanwright.solveNow")
}

func TestShowStiffness(t *testing.T) {
	c := start(t, lsptest.Options{})
	c.Open(uri, frame)
	c.WaitReceived("workspace/inlayHint/refresh", 1)
	ask := func(mark string) map[string]any {
		return map[string]any{"command": "spanwright.showStiffness", "arguments": []any{
			map[string]any{"uri": uri, "position": c.At(uri, mark)}}}
	}
	// HEA 100 of A = 21.24 cm2 over 3 m: EA/L = 148.7 MN/m (EN 10365).
	text := lsptest.Ask[string](c, "workspace/executeCommand", ask("beam |c"))
	assert.Contains(t, text, "EA/L | 149 MN/m")
	text = lsptest.Ask[string](c, "workspace/executeCommand", ask("node |B"))
	assert.Contains(t, text, "| uz | 149 MN/m | 149 MN/m |")
	refused := c.Refused("workspace/executeCommand", ask("case |W"))
	assert.EqualValues(t, rpc.CodeRequestFailed, refused.Code)
	assert.Contains(t, refused.Message, "node or a member")
}

// A file that two models use is seen through one of them; its lenses say which,
// and change it.
func TestPinModel(t *testing.T) {
	folder, main, common := parts(t)
	_, other := write(t, folder, "other.span", fileText(t, main))
	c := start(t, lsptest.Options{Folders: []string{uriOf(folder)}})
	c.Open(main, fileText(t, main))
	c.Open(other, fileText(t, other))
	c.Open(common, fileText(t, common))
	c.WaitDiagnostics(common)
	titles := func() (all []string) {
		for _, l := range c.Lenses(common) {
			all = append(all, l.Command.Title)
		}
		return all
	}
	assert.Equal(t, []string{"seen through main", "see it through other"}, titles())
	choose := c.Lenses(common)[1].Command
	c.Execute(choose.Command, choose.Arguments...)
	assert.Equal(t, []string{"seen through other", "see it through main"}, titles())
	refused := c.Refused("workspace/executeCommand", map[string]any{"command": choose.Command,
		"arguments": []any{map[string]any{"uri": common, "model": uri}}})
	assert.EqualValues(t, rpc.CodeRequestFailed, refused.Code)
}
