package rpc

import (
	"context"
	"encoding/json"

	"github.com/sourcegraph/jsonrpc2"
	lsp "github.com/tliron/glsp/protocol_3_16"
)

// state is where a connection stands in its life.
type state int

const (
	uninitialized state = iota
	initialized
	shutDown
)

func (s state) exitStatus() int {
	if s == shutDown {
		return 0
	}
	return 1
}

// readLoop takes the messages of a connection, one after the other.
type readLoop struct {
	*Connection
	// ready is closed when the connection is set up.
	ready <-chan struct{}
	// exited is set by exit; what comes behind it is not looked at.
	exited bool
}

// Handle takes one request or notification.
func (l *readLoop) Handle(context.Context, *jsonrpc2.Conn, *jsonrpc2.Request) {
	<-l.ready
	if l.exited {
		return
	}
	m := l.stream.current
	r := &Request{Context: l.ctx, ID: m.id, Method: m.method, Params: m.Params}
	if r.ID == "" {
		l.notified(r)
		return
	}
	l.requested(r)
}

// notified takes a notification. Those that come at the wrong time are dropped,
// as the protocol demands.
func (l *readLoop) notified(r *Request) {
	switch r.Method {
	case lsp.MethodExit:
		l.exited = true
		close(l.said)
		// Beside the read loop, which goes on reading: a client that writes
		// something more before it reads the last answers must not be stuck.
		go func() {
			l.drain()
			l.conn.Close()
		}()
		return
	case lsp.MethodCancelRequest:
		l.cancelled(r)
		return
	}
	if l.state != initialized {
		return
	}
	if r.Method == lsp.MethodWindowWorkDoneProgressCancel {
		l.progress.cancel(r.Params)
		return
	}
	err := l.guard(r, func() error {
		_, _, err := l.dispatch(r)
		return err
	})
	if err != nil {
		l.log.Warn("a notification could not be used", "method", r.Method, "error", err)
	}
}

func (l *readLoop) cancelled(r *Request) {
	var params struct {
		ID json.RawMessage `json:"id"`
	}
	if json.Unmarshal(r.Params, &params) != nil || isAbsent(params.ID) {
		return
	}
	if id, err := readID(params.ID); err == nil {
		l.running.cancel(id)
	}
}

// requested takes a request.
func (l *readLoop) requested(r *Request) {
	refuse := func(code int64, message string) {
		l.stream.fail(r.ID, &jsonrpc2.Error{Code: code, Message: message})
	}
	switch {
	case l.state == shutDown:
		refuse(jsonrpc2.CodeInvalidRequest, r.Method+" came after shutdown")
	case r.Method == lsp.MethodInitialize && l.state == initialized:
		refuse(jsonrpc2.CodeInvalidRequest, "the server is initialized already")
	case r.Method == lsp.MethodInitialize:
		l.initialize(r)
	case l.state == uninitialized:
		refuse(CodeServerNotInitialized, r.Method+" came before initialize")
	case r.Method == lsp.MethodShutdown:
		// Requests under way are still answered, until exit.
		l.state = shutDown
		l.respond(r, nil, nil)
	default:
		l.start(r)
	}
}

// initialize answers on the read loop: nothing that follows may overtake it.
func (l *readLoop) initialize(r *Request) {
	var value any
	err := l.guard(r, func() (err error) {
		value, err = l.service.Initialize(r)
		return err
	})
	if err == nil {
		l.state = initialized
		if l.service.Protocol != nil {
			l.service.Protocol.SetInitialized(true)
		}
	}
	l.respond(r, value, err)
}
