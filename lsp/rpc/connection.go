package rpc

import (
	"context"
	"errors"
	"fmt"
	"io"
	"log/slog"
	"runtime/debug"
	"strings"
	"sync"
	"sync/atomic"
	"time"

	"github.com/sourcegraph/jsonrpc2"
	lsp "github.com/tliron/glsp/protocol_3_16"
)

const (
	// turns is the number of requests that are answered at the same time.
	turns = 4
	// patience is how long the end of a connection waits for answers that are
	// under way, and for a client to read them.
	patience = time.Second
)

// Connection is the server's side of one connection. Its methods may be called
// from any goroutine, except that [Connection.Call] waits and so must not be
// called on the read loop.
type Connection struct {
	service Service
	log     *slog.Logger
	stream  *stream
	conn    *jsonrpc2.Conn
	ctx     context.Context

	state    state // of the read loop
	running  running
	requests sync.Map // *glsp.Context → *Request
	turns    chan struct{}
	calls    atomic.Uint64 // of the client, so far
	progress progressTable

	answering  tasks // requests
	background tasks // what Go started

	// said is closed when the client says exit; the state does not change then.
	said chan struct{}
}

// Serve speaks with one client until it says exit or hangs up, and returns the
// exit status that the protocol prescribes: 0 after shutdown, else 1. It closes
// conn, and no goroutine that it has started outlives it, unless a handler pays
// no heed to its context. The service is made for the connection by open, which must
// not use the connection yet.
func Serve(ctx context.Context, conn io.ReadWriteCloser, log *slog.Logger, open func(*Connection) Service) (status int) {
	ctx, cancel := context.WithCancel(ctx)
	defer cancel()
	c := &Connection{
		log:     log,
		stream:  newStream(conn, log),
		ctx:     ctx,
		running: running{byID: map[ID]*Request{}},
		turns:   make(chan struct{}, turns),
		said:    make(chan struct{}),
	}
	c.stream.beforeEnd = c.drain
	c.service = open(c)
	ready := make(chan struct{})
	c.conn = jsonrpc2.NewConn(ctx, c.stream, &readLoop{Connection: c, ready: ready}, jsonrpc2.SetLogger(printer{log}))
	close(ready)

	<-c.conn.DisconnectNotify()
	cancel()
	c.answering.close()
	c.background.close()
	for _, t := range []*tasks{&c.answering, &c.background} {
		if !t.wait(patience) {
			log.Error("the server's work does not end")
		}
	}
	// Neither a terminal nor a pipe on standard input can be stopped from reading;
	// do not wait for one.
	select {
	case <-c.said:
		return c.exit()
	default:
	}
	select {
	case <-c.stream.readEnded:
		status = c.state.exitStatus()
	case <-time.After(patience):
		status = 1
	}
	c.written()
	return status
}

// exit returns the status after the client has said exit.
func (c *Connection) exit() int {
	c.written()
	return c.state.exitStatus()
}

// written waits until all messages are written, but not without end.
func (c *Connection) written() {
	select {
	case <-c.stream.outbox.ended:
	case <-time.After(patience):
	}
}

// drain lets the requests under way be answered and the answers be written.
func (c *Connection) drain() {
	c.answering.wait(patience)
	c.stream.outbox.flush(patience)
}

// Notify sends a notification to the client. Notifications arrive in the order
// of the calls.
func (c *Connection) Notify(method string, params any) {
	if err := c.stream.notify(method, params); err != nil && err != errClosed {
		c.log.Error("a notification that cannot be encoded", "method", method, "error", err)
	}
}

// Call asks the client and waits for its answer, which is decoded into result
// (nil: not wanted). When ctx ends first the client is told.
func (c *Connection) Call(ctx context.Context, method string, params, result any) error {
	id := c.calls.Add(1)
	call, err := c.conn.DispatchCall(ctx, method, params, jsonrpc2.PickID(jsonrpc2.ID{Num: id}))
	if err != nil {
		return err
	}
	err = call.Wait(ctx, result)
	if ctx.Err() != nil && errors.Is(err, ctx.Err()) {
		c.Notify(lsp.MethodCancelRequest, lsp.CancelParams{ID: lsp.IntegerOrString{Value: id}})
	}
	return err
}

// Go runs work beside the read loop. The context ends with the connection,
// which waits for the work to return. A panic is logged.
func (c *Connection) Go(work func(ctx context.Context)) {
	if !c.background.begin() {
		return
	}
	go func() {
		defer c.background.end()
		defer func() {
			if p := recover(); p != nil {
				c.log.Error("a defect in the server", "panic", p, "stack", string(debug.Stack()))
			}
		}()
		work(c.ctx)
	}()
}

// printer lets jsonrpc2 write to the log.
type printer struct{ log *slog.Logger }

func (p printer) Printf(format string, arguments ...any) {
	p.log.Warn(strings.TrimSpace(fmt.Sprintf(format, arguments...)))
}
