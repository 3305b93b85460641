package lsptest

import (
	"context"
	"encoding/json"
	"fmt"
	"io"
	"log/slog"
	"runtime"
	"testing"
	"time"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"github.com/tliron/glsp"
	lsp "github.com/tliron/glsp/protocol_3_16"

	"spanwright/lsp/protocol"
	"spanwright/lsp/rpc"
)

const uri = "file:///m/a.span"

// parrot is a server that publishes the length of each text as a diagnostic,
// and has the client edit "bad" into "good" at place 0.
func parrot(ctx context.Context, conn io.ReadWriteCloser, log *slog.Logger) int {
	return rpc.Serve(ctx, conn, log, func(c *rpc.Connection) rpc.Service {
		publish := func(version int32, message string) {
			c.Notify("textDocument/publishDiagnostics", protocol.PublishDiagnosticsParams{
				URI: uri, Version: &version, Diagnostics: protocol.List[protocol.Diagnostic]{{Code: "length", Message: message}},
			})
		}
		return rpc.Service{
			Initialize: func(*rpc.Request) (any, error) {
				return map[string]any{"capabilities": map[string]any{"positionEncoding": "utf-8"}}, nil
			},
			Protocol: &lsp.Handler{
				TextDocumentDidOpen: func(_ *glsp.Context, p *lsp.DidOpenTextDocumentParams) error {
					publish(p.TextDocument.Version, fmt.Sprint(len(p.TextDocument.Text)))
					return nil
				},
				TextDocumentDidChange: func(_ *glsp.Context, p *lsp.DidChangeTextDocumentParams) error {
					text, _ := json.Marshal(p.ContentChanges)
					publish(p.TextDocument.Version, string(text))
					return nil
				},
				TextDocumentDidSave: func(*glsp.Context, *lsp.DidSaveTextDocumentParams) error {
					c.Go(func(ctx context.Context) {
						edit := map[string]any{"edit": protocol.WorkspaceEdit{Changes: map[string][]lsp.TextEdit{
							uri: {{Range: lsp.Range{End: lsp.Position{Character: 3}}, NewText: "good"}},
						}}}
						var result struct{ Applied bool }
						err := c.Call(ctx, "workspace/applyEdit", edit, &result)
						c.Notify("window/logMessage", map[string]any{"applied": result.Applied, "err": err != nil})
						var values []map[string]int
						c.Call(ctx, "workspace/configuration", map[string]any{"items": []any{map[string]any{"section": "parrot"}}}, &values)
						c.Notify("window/logMessage", values[0])
					})
					return nil
				},
			},
		}
	})
}

func TestClient(t *testing.T) {
	c := Start(t, parrot, Options{Configuration: map[string]any{"parrot": map[string]any{"age": 30}}})
	c.Open(uri, "bad é\nlast")
	assert.Equal(t, "11", c.WaitDiagnostics(uri)[0].Message)
	version := c.Edit(uri, "la", "fa")
	assert.Equal(t, int32(2), version)
	assert.JSONEq(t, `[{"range":{"start":{"line":1,"character":0},"end":{"line":1,"character":2}},"text":"fa"}]`,
		c.WaitDiagnostic(uri, "length").Message)
	c.Insert(uri, "é|", "!")
	assert.Contains(t, c.WaitDiagnostics(uri)[0].Message, `{"line":0,"character":6}`, "UTF-8 was agreed on")
	assert.Equal(t, lsp.Position{Line: 1, Character: 1}, c.At(uri, "f|ast"))
	assert.Equal(t, "fast", c.Under(uri, c.Range(uri, "fast")))

	c.Save(uri)
	messages := c.WaitReceived("window/logMessage", 2)
	assert.JSONEq(t, `{"applied":true,"err":false}`, string(messages[0].Params))
	assert.JSONEq(t, `{"age":30}`, string(messages[1].Params))
	assert.Equal(t, "good é!\nfast", c.Text(uri))
	assert.Equal(t, int32(4), c.Version(uri))
	c.WaitDiagnostics(uri)
	assert.Equal(t, -32601, int(c.Refused("nothing/known", nil).Code))
	assert.Len(t, c.Published(uri), 4)
}

// failing is a test whose failure is looked at.
type failing struct {
	testing.TB
	failed string
}

func (f *failing) Errorf(format string, arguments ...any) {
	f.failed += fmt.Sprintf(format, arguments...)
}
func (f *failing) FailNow() { runtime.Goexit() }
func (f *failing) Helper()  {}

func TestWaitsInVainEndAtOnce(t *testing.T) {
	fail := func(c *Client, wait func()) string {
		f := &failing{TB: t}
		c.t = f
		done := make(chan struct{})
		start := time.Now()
		go func() {
			defer close(done)
			wait()
		}()
		<-done
		c.t = t
		require.Less(t, time.Since(start), Patience/2)
		return f.failed
	}
	c := Start(t, parrot, Options{})
	c.Open(uri, "bad")
	c.WaitDiagnostics(uri)
	c.Edit(uri, "bad", "worse")
	c.WaitDiagnostics(uri)
	c.update(func() { c.documents[uri].version = 1 })
	assert.Contains(t, fail(c, func() { c.WaitDiagnostics(uri) }), "diagnostics came of version")
	assert.Equal(t, 1, c.HangUp())
	assert.Contains(t, fail(c, func() { c.WaitReceived("some/thing", 1) }), "the server has gone")
}
