package rpc

import (
	"encoding/json"
	"errors"
	"io"
	"log/slog"
	"sync/atomic"

	"github.com/sourcegraph/jsonrpc2"
)

// stream is the [jsonrpc2.ObjectStream] of a connection. It answers malformed
// messages itself, and nobody else sees them.
//
// jsonrpc2 decodes parameters into a tree and encodes them again, which for a
// large document costs more than all the rest. So it is given a request without
// them; the handler, which runs in the goroutine that reads, takes them from
// current.
type stream struct {
	conn   io.Closer
	frames *frameReader
	outbox *outbox
	log    *slog.Logger
	// beforeEnd runs when the input has ended, before the connection closes.
	beforeEnd func()

	current *message

	closed atomic.Bool
	// readEnded is closed when nothing is read any more.
	readEnded chan struct{}
}

func newStream(conn io.ReadWriteCloser, log *slog.Logger) *stream {
	s := &stream{conn: conn, frames: newFrameReader(conn), log: log, readEnded: make(chan struct{})}
	s.outbox = newOutbox(conn, func() { conn.Close() })
	return s
}

// ReadObject reads the next well-formed message.
func (s *stream) ReadObject(object any) error {
	for {
		body, err := s.next()
		var refused *refusal
		switch {
		case errors.As(err, &refused):
		case err != nil:
			s.beforeEnd()
			close(s.readEnded)
			return err
		default:
			s.current, refused = readMessage(body)
		}
		if refused != nil {
			s.frames.lost = s.frames.lost || refused.code == jsonrpc2.CodeParseError
			s.refuse(refused)
			continue
		}
		s.frames.lost = false
		if s.hand(s.current, object) {
			return nil
		}
	}
}

// next returns the next body; none once the stream is closed, though more may
// have been read into the buffer.
func (s *stream) next() ([]byte, error) {
	if s.closed.Load() {
		return nil, io.EOF
	}
	return s.frames.next()
}

// hand gives a message to jsonrpc2 and reports whether it can be used.
func (s *stream) hand(m *message, object any) bool {
	if !m.isResponse() {
		request := struct {
			ID     json.RawMessage `json:"id,omitempty"`
			Method string          `json:"method"`
		}{json.RawMessage(m.id), m.method}
		return s.transfer(request, object) == nil
	}
	if m.id == "" {
		s.log.Warn("a response without an id", "error", string(m.Error))
		return false
	}
	response := struct {
		ID     json.RawMessage `json:"id"`
		Result json.RawMessage `json:"result,omitempty"`
		Error  json.RawMessage `json:"error,omitempty"`
	}{json.RawMessage(m.id), m.Result, m.Error}
	if isAbsent(m.Error) {
		response.Error = nil
	}
	if s.transfer(response, object) == nil {
		return true
	}
	// The call it answers must not wait for ever.
	response.Result, response.Error = nil, json.RawMessage(`{"code":-32603,"message":"the client's response is malformed"}`)
	return s.transfer(response, object) == nil
}

func (s *stream) transfer(from, to any) error {
	text, err := json.Marshal(from)
	if err != nil {
		return err
	}
	return json.Unmarshal(text, to)
}

func (s *stream) refuse(r *refusal) {
	s.log.Warn("a malformed message", "answer", r.message)
	id := r.id
	if id == "" {
		id = nullID
	}
	s.fail(id, &jsonrpc2.Error{Code: r.code, Message: r.message})
}

// WriteObject writes a call of [jsonrpc2.Conn]. Results, errors and
// notifications do not come this way.
func (s *stream) WriteObject(object any) error { return s.send(object) }

// answer writes the result of a request.
func (s *stream) answer(id ID, value any) error {
	return s.send(result{"2.0", json.RawMessage(id), value})
}

// fail writes the error of a request.
func (s *stream) fail(id ID, err *jsonrpc2.Error) error {
	return s.send(failure{"2.0", json.RawMessage(id), err})
}

// notify writes a notification.
func (s *stream) notify(method string, params any) error {
	return s.send(notification{"2.0", method, params})
}

func (s *stream) send(message any) error {
	frame, err := encodeFrame(message)
	if err != nil {
		return err
	}
	return s.outbox.send(frame)
}

// Close ends reading and writing.
func (s *stream) Close() error {
	if s.closed.Swap(true) {
		return nil
	}
	s.outbox.close()
	return s.conn.Close()
}
