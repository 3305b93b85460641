package rpc

import (
	"bufio"
	"context"
	"encoding/json"
	"fmt"
	"io"
	"log/slog"
	"net"
	"net/textproto"
	"strconv"
	"sync"
	"testing"
	"time"

	"github.com/stretchr/testify/require"
)

// client is the other end of a connection, which writes what it is told to,
// well-formed or not.
type client struct {
	t      *testing.T
	conn   net.Conn
	in     *bufio.Reader
	status chan int
	log    *logBuffer
}

type logBuffer struct {
	mu   sync.Mutex
	text []byte
}

func (l *logBuffer) Write(p []byte) (int, error) {
	l.mu.Lock()
	defer l.mu.Unlock()
	l.text = append(l.text, p...)
	return len(p), nil
}

func (l *logBuffer) String() string {
	l.mu.Lock()
	defer l.mu.Unlock()
	return string(l.text)
}

// connect serves a service to a new client.
func connect(t *testing.T, open func(*Connection) Service) *client {
	near, far := net.Pipe()
	c := &client{t: t, conn: near, in: bufio.NewReader(near), status: make(chan int, 1), log: &logBuffer{}}
	ctx, cancel := context.WithCancel(context.Background())
	go func() {
		c.status <- Serve(ctx, far, slog.New(slog.NewTextHandler(c.log, nil)), open)
	}()
	t.Cleanup(func() {
		near.Close()
		cancel()
	})
	near.SetDeadline(time.Now().Add(20 * time.Second))
	return c
}

// raw writes bytes as they are. It does so beside the reading, as the pipe has
// no buffer.
func (c *client) raw(text string) {
	c.t.Helper()
	_, err := io.WriteString(c.conn, text)
	require.NoError(c.t, err)
}

func frame(body string) string { return fmt.Sprintf("Content-Length: %d\r\n\r\n%s", len(body), body) }

func (c *client) send(format string, arguments ...any) {
	c.t.Helper()
	c.raw(frame(fmt.Sprintf(format, arguments...)))
}

// reply is any message of the server.
type reply struct {
	ID     json.RawMessage
	Method string
	Params json.RawMessage
	Result json.RawMessage
	Error  *struct {
		Code    int
		Message string
	}
}

func (c *client) read() reply {
	c.t.Helper()
	header, err := textproto.NewReader(c.in).ReadMIMEHeader()
	require.NoError(c.t, err)
	length, err := strconv.Atoi(header.Get("Content-Length"))
	require.NoError(c.t, err)
	body := make([]byte, length)
	_, err = io.ReadFull(c.in, body)
	require.NoError(c.t, err)
	require.Equal(c.t, "2.0", func() string {
		var v struct{ Jsonrpc string }
		require.NoError(c.t, json.Unmarshal(body, &v), "%s", body)
		return v.Jsonrpc
	}())
	var r reply
	require.NoError(c.t, json.Unmarshal(body, &r), "%s", body)
	return r
}

// result reads the answer of a request and returns its result.
func (c *client) result(id string) string {
	c.t.Helper()
	r := c.read()
	require.Equal(c.t, id, string(r.ID), "%+v", r)
	require.Nil(c.t, r.Error)
	return string(r.Result)
}

// failure reads the answer of a request and returns the code of its error.
func (c *client) failure(id string) int {
	c.t.Helper()
	r := c.read()
	require.Equal(c.t, id, string(r.ID), "%+v", r)
	require.NotNil(c.t, r.Error, "%s", r.Result)
	require.NotEmpty(c.t, r.Error.Message)
	require.Nil(c.t, r.Result)
	return r.Error.Code
}

func (c *client) initialize() {
	c.t.Helper()
	c.send(`{"jsonrpc":"2.0","id":"start","method":"initialize","params":{}}`)
	require.Equal(c.t, `"hello"`, c.result(`"start"`))
	c.send(`{"jsonrpc":"2.0","method":"initialized","params":{}}`)
}

// ended waits for the server's end and returns its status.
func (c *client) ended() int {
	c.t.Helper()
	select {
	case status := <-c.status:
		return status
	case <-time.After(10 * time.Second):
		require.Fail(c.t, "the server does not end")
		return -1
	}
}

// greeting is a service that can be initialized.
func greeting(methods map[string]Method) func(*Connection) Service {
	return func(*Connection) Service {
		return Service{
			Initialize: func(*Request) (any, error) { return "hello", nil },
			Methods:    methods,
		}
	}
}

// echo answers with its parameters.
func echo(r *Request) (any, error) { return r.Params, nil }
