package lsptest

import (
	"bytes"
	"context"
	"encoding/json"
	"errors"
	"io"
	"log/slog"
	"net"
	"sync"
	"testing"
	"time"

	"github.com/sourcegraph/jsonrpc2"
	"github.com/stretchr/testify/require"

	"spanwright/lang/source"
)

// Patience is how long anything is waited for.
const Patience = 15 * time.Second

// Serve runs a server on one end of a connection and returns its exit status.
type Serve func(ctx context.Context, conn io.ReadWriteCloser, log *slog.Logger) int

// Options say what kind of client it is.
type Options struct {
	// Capabilities are what the client says it can do; nil stands for
	// [Capabilities].
	Capabilities map[string]any
	// Folders are the URIs of the workspace's folders.
	Folders []string
	// InitializationOptions go to the server with initialize.
	InitializationOptions any
	// Configuration is the answer to workspace/configuration, by section.
	Configuration map[string]any
}

// Client is one client with its server. Its methods are for the goroutine of
// the test; they fail the test where something goes wrong.
type Client struct {
	t      testing.TB
	conn   *jsonrpc2.Conn
	status chan int
	closed bool
	log    *log

	// ServerCapabilities is what the server said it can do.
	ServerCapabilities map[string]any

	mu            sync.Mutex
	changed       *sync.Cond // whenever something below has changed
	encoding      source.Encoding
	configuration map[string]any
	documents     map[string]*document
	received      []Message
	gone          bool // the connection has ended
}

// Start starts a server and initializes it. The server is shut down at the end
// of the test, which fails if the server does not end well.
func Start(t testing.TB, serve Serve, options Options) *Client {
	t.Helper()
	c := Connect(t, serve)
	c.configuration = options.Configuration
	capabilities := options.Capabilities
	if capabilities == nil {
		capabilities = Capabilities()
	}
	folders := []map[string]any{}
	for _, uri := range options.Folders {
		folders = append(folders, map[string]any{"uri": uri, "name": uri})
	}
	var result struct {
		Capabilities map[string]any `json:"capabilities"`
	}
	err := c.Call("initialize", map[string]any{
		"processId": nil, "rootUri": nil, "clientInfo": map[string]any{"name": "lsptest", "version": "1"},
		"capabilities": capabilities, "workspaceFolders": folders,
		"initializationOptions": options.InitializationOptions,
	}, &result)
	require.NoError(t, err)
	c.ServerCapabilities = result.Capabilities
	if result.Capabilities["positionEncoding"] == "utf-8" {
		c.encoding = source.UTF8
	}
	c.Notify("initialized", map[string]any{})
	return c
}

// Connect starts a server without a word to it.
func Connect(t testing.TB, serve Serve) *Client {
	t.Helper()
	near, far := net.Pipe()
	c := &Client{t: t, status: make(chan int, 1), log: &log{}, documents: map[string]*document{}}
	c.changed = sync.NewCond(&c.mu)
	ctx, cancel := context.WithCancel(context.Background())
	go func() {
		c.status <- serve(ctx, far, slog.New(slog.NewTextHandler(c.log, nil)))
	}()
	stream := jsonrpc2.NewBufferedStream(near, jsonrpc2.VSCodeObjectCodec{})
	c.conn = jsonrpc2.NewConn(ctx, stream, handler{c}, jsonrpc2.SetLogger(silent{}))
	go func() {
		<-c.conn.DisconnectNotify()
		c.update(func() { c.gone = true })
	}()
	t.Cleanup(func() {
		if !c.closed {
			c.shutDown()
		}
		cancel()
		if t.Failed() {
			t.Logf("the server's log:\n%s", c.log)
		}
	})
	return c
}

// Call sends a request and waits for the answer; an error of the server is a
// *jsonrpc2.Error.
func (c *Client) Call(method string, params, result any) error {
	c.t.Helper()
	ctx, cancel := context.WithTimeout(context.Background(), Patience)
	defer cancel()
	err := c.conn.Call(ctx, method, params, result)
	var answered *jsonrpc2.Error
	if err != nil && !errors.As(err, &answered) {
		require.Fail(c.t, "no answer", "%s: %v\nthe server's log:\n%s", method, err, c.log)
	}
	return err
}

// Pending is a request that is not answered yet.
type Pending struct {
	ID     uint64
	waiter jsonrpc2.Waiter
}

// Send sends a request and does not wait.
func (c *Client) Send(id uint64, method string, params any) Pending {
	c.t.Helper()
	waiter, err := c.conn.DispatchCall(context.Background(), method, params, jsonrpc2.PickID(jsonrpc2.ID{Num: id}))
	require.NoError(c.t, err)
	return Pending{id, waiter}
}

// Wait waits for the answer of a request that was sent.
func (c *Client) Wait(p Pending, result any) error {
	c.t.Helper()
	ctx, cancel := context.WithTimeout(context.Background(), Patience)
	defer cancel()
	err := p.waiter.Wait(ctx, result)
	require.NotErrorIs(c.t, err, context.DeadlineExceeded)
	return err
}

// Cancel cancels a request that was sent.
func (c *Client) Cancel(p Pending) { c.Notify("$/cancelRequest", map[string]any{"id": p.ID}) }

// Notify sends a notification.
func (c *Client) Notify(method string, params any) {
	c.t.Helper()
	require.NoError(c.t, c.conn.Notify(context.Background(), method, params))
}

// Ask sends a request that must succeed, and decodes its result.
func Ask[T any](c *Client, method string, params any) T {
	c.t.Helper()
	var result T
	require.NoError(c.t, c.Call(method, params, &result), method)
	return result
}

// Refused sends a request that must fail, and returns the error.
func (c *Client) Refused(method string, params any) *jsonrpc2.Error {
	c.t.Helper()
	var result json.RawMessage
	err := c.Call(method, params, &result)
	var answered *jsonrpc2.Error
	require.ErrorAs(c.t, err, &answered, "%s was answered: %s", method, result)
	return answered
}

// Exit ends the server with exit and returns its status, without shutdown
// before it.
func (c *Client) Exit() int {
	c.t.Helper()
	c.closed = true
	c.Notify("exit", nil)
	return c.ended()
}

// HangUp closes the connection and returns the server's status.
func (c *Client) HangUp() int {
	c.t.Helper()
	c.closed = true
	c.conn.Close()
	return c.ended()
}

// Log returns what the server has logged so far.
func (c *Client) Log() string { return c.log.String() }

func (c *Client) shutDown() {
	c.t.Helper()
	c.closed = true
	ctx, cancel := context.WithTimeout(context.Background(), Patience)
	defer cancel()
	if err := c.conn.Call(ctx, "shutdown", nil, nil); err != nil {
		c.t.Errorf("shutdown: %v", err)
	}
	c.conn.Notify(ctx, "exit", nil)
	if status := c.ended(); status != 0 {
		c.t.Errorf("the server's exit status is %d", status)
	}
}

func (c *Client) ended() int {
	c.t.Helper()
	select {
	case status := <-c.status:
		c.conn.Close()
		return status
	case <-time.After(Patience):
		require.Fail(c.t, "the server does not end")
		return -1
	}
}

// log gathers what the server logs.
type log struct {
	mu   sync.Mutex
	text bytes.Buffer
}

func (l *log) Write(p []byte) (int, error) {
	l.mu.Lock()
	defer l.mu.Unlock()
	return l.text.Write(p)
}

func (l *log) String() string {
	l.mu.Lock()
	defer l.mu.Unlock()
	return l.text.String()
}

type silent struct{}

func (silent) Printf(string, ...any) {}
