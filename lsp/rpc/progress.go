package rpc

import (
	"context"
	"encoding/json"
	"fmt"
	"sync"

	lsp "github.com/tliron/glsp/protocol_3_16"

	"spanwright/lsp/protocol"
)

// progressTable holds what is shown to the user and can be cancelled.
type progressTable struct {
	mu      sync.Mutex
	started int
	byToken map[string]context.CancelFunc
}

func (t *progressTable) add(cancel context.CancelFunc) (token string) {
	t.mu.Lock()
	defer t.mu.Unlock()
	t.started++
	token = fmt.Sprintf("spanwright-%d", t.started)
	if t.byToken == nil {
		t.byToken = map[string]context.CancelFunc{}
	}
	t.byToken[token] = cancel
	return token
}

func (t *progressTable) remove(token string) {
	t.mu.Lock()
	defer t.mu.Unlock()
	delete(t.byToken, token)
}

// cancel takes window/workDoneProgress/cancel.
func (t *progressTable) cancel(params json.RawMessage) {
	token := protocol.ProgressToken(params, "token")
	if token == nil {
		return
	}
	t.mu.Lock()
	defer t.mu.Unlock()
	name, _ := token.Value.(string)
	if cancel := t.byToken[name]; cancel != nil {
		cancel()
	}
}

// Progress is work that the client shows to the user. Its methods may be called
// from any goroutine; on a nil Progress they do nothing.
type Progress struct {
	connection *Connection
	token      lsp.ProgressToken
	cancel     context.CancelFunc

	mu      sync.Mutex
	shown   bool
	ended   bool
	message string
	end     chan struct{}
}

// StartProgress announces work that the user may cancel: the returned context
// ends then. Call it only for a client that has announced
// window.workDoneProgress, and call End whatever happens.
func (c *Connection) StartProgress(ctx context.Context, title string) (context.Context, *Progress) {
	ctx, cancel := context.WithCancel(ctx)
	name := c.progress.add(cancel)
	p := &Progress{connection: c, token: lsp.ProgressToken{Value: name}, cancel: cancel, end: make(chan struct{})}
	context.AfterFunc(ctx, func() { c.progress.remove(name) })
	c.Go(func(background context.Context) {
		defer cancel()
		p.show(background, title)
		select {
		case <-background.Done():
		case <-p.end:
		}
	})
	return ctx, p
}

// show asks the client for a place and begins there.
func (p *Progress) show(ctx context.Context, title string) {
	c := p.connection
	err := c.Call(ctx, string(lsp.ServerWindowWorkDoneProgressCreate), lsp.WorkDoneProgressCreateParams{Token: p.token}, nil)
	if err != nil {
		return // the client does not want to show it
	}
	p.mu.Lock()
	defer p.mu.Unlock()
	if p.ended {
		return
	}
	p.shown = true
	cancellable := true
	p.notify(lsp.WorkDoneProgressBegin{Kind: "begin", Title: title, Cancellable: &cancellable, Message: optional(p.message)})
}

// Report says how far the work has got.
func (p *Progress) Report(message string) {
	if p == nil {
		return
	}
	p.mu.Lock()
	defer p.mu.Unlock()
	if p.message == message {
		return
	}
	p.message = message
	if p.shown && !p.ended {
		p.notify(lsp.WorkDoneProgressReport{Kind: "report", Message: &message})
	}
}

// End says that the work is over, and how it went. The context of the work
// ends.
func (p *Progress) End(message string) {
	if p == nil {
		return
	}
	p.mu.Lock()
	defer p.mu.Unlock()
	if p.ended {
		return
	}
	p.ended = true
	close(p.end)
	p.cancel()
	if p.shown {
		p.notify(lsp.WorkDoneProgressEnd{Kind: "end", Message: optional(message)})
	}
}

func (p *Progress) notify(value any) {
	p.connection.Notify(lsp.MethodProgress, lsp.ProgressParams{Token: p.token, Value: value})
}

func optional(text string) *string {
	if text == "" {
		return nil
	}
	return &text
}
