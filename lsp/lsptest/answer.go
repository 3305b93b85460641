package lsptest

import (
	"context"
	"encoding/json"

	"github.com/sourcegraph/jsonrpc2"

	"spanwright/lang/source"
)

// handler takes what the server sends.
type handler struct{ *Client }

// Handle records a message and answers it if it is a request.
func (h handler) Handle(ctx context.Context, conn *jsonrpc2.Conn, request *jsonrpc2.Request) {
	params := json.RawMessage("{}")
	if request.Params != nil {
		params = *request.Params
	}
	h.update(func() { h.received = append(h.received, Message{request.Method, params}) })
	if request.Notif {
		return
	}
	result, err := h.answer(request.Method, params)
	if err != nil {
		conn.ReplyWithError(ctx, request.ID, err)
		return
	}
	conn.Reply(ctx, request.ID, result)
}

func (h handler) answer(method string, params json.RawMessage) (any, *jsonrpc2.Error) {
	switch method {
	case "workspace/configuration":
		return h.configured(params), nil
	case "workspace/applyEdit":
		return h.applyEdit(params), nil
	case "window/showDocument":
		return map[string]any{"success": true}, nil
	case "client/registerCapability", "client/unregisterCapability",
		"window/workDoneProgress/create", "window/showMessageRequest",
		"workspace/inlayHint/refresh", "workspace/diagnostic/refresh",
		"workspace/codeLens/refresh", "workspace/semanticTokens/refresh":
		return nil, nil
	}
	return nil, &jsonrpc2.Error{Code: jsonrpc2.CodeMethodNotFound, Message: method}
}

// Configure changes the client's configuration and tells the server.
func (c *Client) Configure(configuration map[string]any) {
	c.t.Helper()
	c.update(func() { c.configuration = configuration })
	c.Notify("workspace/didChangeConfiguration", map[string]any{"settings": nil})
}

func (h handler) configured(params json.RawMessage) []any {
	var asked struct{ Items []struct{ Section string } }
	json.Unmarshal(params, &asked)
	h.mu.Lock()
	defer h.mu.Unlock()
	values := []any{}
	for _, item := range asked.Items {
		values = append(values, h.configuration[item.Section])
	}
	return values
}

// applyEdit makes the server's edit in the client's documents, and tells the
// server as if the user had typed it.
func (h handler) applyEdit(params json.RawMessage) any {
	var asked struct{ Edit WorkspaceEdit }
	if err := json.Unmarshal(params, &asked); err != nil {
		return map[string]any{"applied": false, "failureReason": err.Error()}
	}
	for uri, edits := range asked.Edit.ByDocument() {
		var text, reason string
		var version int32
		h.update(func() {
			d := h.documents[uri]
			if d == nil {
				reason = uri + " is not open"
				return
			}
			var err error
			if text, err = source.Apply(d.file.Text, h.edits(d.file, edits)); err != nil {
				reason = err.Error()
				return
			}
			d.file = source.New(uri, text)
			d.version++
			version = d.version
		})
		if reason != "" {
			return map[string]any{"applied": false, "failureReason": reason}
		}
		h.conn.Notify(context.Background(), "textDocument/didChange", map[string]any{
			"textDocument":   map[string]any{"uri": uri, "version": version},
			"contentChanges": []any{map[string]any{"text": text}},
		})
	}
	return map[string]any{"applied": true}
}
