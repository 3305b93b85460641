package rpc

import (
	"context"
	"encoding/json"
	"fmt"
	"runtime/debug"
	"sync"
	"sync/atomic"

	"github.com/sourcegraph/jsonrpc2"
	"github.com/tliron/glsp"
)

// Request is one request or notification of the client on its way through the
// server.
type Request struct {
	// Context ends when the client cancels the request or the connection ends.
	Context context.Context
	// ID is empty for a notification.
	ID     ID
	Method string
	// Params are as the client wrote them; missing ones are {}.
	Params json.RawMessage
	// Prepared is what Service.Prepare returned; nil for a notification.
	Prepared any

	cancel    context.CancelFunc
	cancelled atomic.Bool // by the client
}

// Request returns the request that a handler of glsp is answering.
func (c *Connection) Request(of *glsp.Context) *Request {
	r, ok := c.requests.Load(of)
	if !ok {
		panic("rpc: the context belongs to no request that is being answered")
	}
	return r.(*Request)
}

// running holds the requests that are not answered yet, by identity.
type running struct {
	mu   sync.Mutex
	byID map[ID]*Request
}

func (t *running) add(r *Request) {
	t.mu.Lock()
	defer t.mu.Unlock()
	t.byID[r.ID] = r
}

func (t *running) remove(r *Request) {
	t.mu.Lock()
	defer t.mu.Unlock()
	if t.byID[r.ID] == r { // a client may use an identity twice
		delete(t.byID, r.ID)
	}
}

func (t *running) cancel(id ID) {
	t.mu.Lock()
	defer t.mu.Unlock()
	if r := t.byID[id]; r != nil {
		r.cancelled.Store(true)
		r.cancel()
	}
}

// start prepares a request on the read loop and answers it in a goroutine.
func (c *Connection) start(r *Request) {
	if !c.answering.begin() {
		c.respond(r, nil, context.Canceled)
		return
	}
	err := c.guard(r, func() (err error) {
		if c.service.Prepare != nil {
			r.Prepared = c.service.Prepare(r.Method)
		}
		return nil
	})
	if err != nil {
		c.respond(r, nil, err)
		c.answering.end()
		return
	}
	r.Context, r.cancel = context.WithCancel(r.Context)
	c.running.add(r)
	go func() {
		defer c.answering.end()
		defer r.cancel()
		value, err := c.answer(r)
		c.running.remove(r)
		c.respond(r, value, err)
	}()
}

// answer waits for its turn and answers a request. One that is cancelled
// before its turn does no work.
func (c *Connection) answer(r *Request) (value any, err error) {
	select {
	case c.turns <- struct{}{}:
		defer func() { <-c.turns }()
	case <-r.Context.Done():
	}
	if r.Context.Err() != nil {
		return nil, r.Context.Err()
	}
	err = c.guard(r, func() (err error) {
		var found bool
		value, found, err = c.dispatch(r)
		if !found && err == nil {
			err = &jsonrpc2.Error{Code: jsonrpc2.CodeMethodNotFound, Message: "there is no method " + r.Method}
		}
		return err
	})
	return value, err
}

// guard is the wall behind which a panic is the error of one request.
func (c *Connection) guard(r *Request, work func() error) (err error) {
	defer func() {
		if p := recover(); p != nil {
			c.log.Error("a defect in the server", "method", r.Method, "panic", p, "stack", string(debug.Stack()))
			err = &jsonrpc2.Error{Code: jsonrpc2.CodeInternalError,
				Message: fmt.Sprintf("%s failed because of a defect in the server; its log says more", r.Method)}
		}
	}()
	return work()
}

// respond writes the answer of a request.
func (c *Connection) respond(r *Request, value any, err error) {
	if err == nil {
		if err = c.stream.answer(r.ID, value); err == nil || err == errClosed {
			return
		}
		c.log.Error("a result that cannot be encoded", "method", r.Method, "error", err)
	}
	answer := protocolError(err, r.cancelled.Load())
	if answer.Code == jsonrpc2.CodeInternalError {
		c.log.Error("a request failed", "method", r.Method, "error", err)
	}
	c.stream.fail(r.ID, answer)
}
