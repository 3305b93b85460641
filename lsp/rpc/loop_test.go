package rpc

import (
	"context"
	"errors"
	"fmt"
	"strconv"
	"sync/atomic"
	"testing"
	"time"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"github.com/tliron/glsp"
	lsp "github.com/tliron/glsp/protocol_3_16"
)

func TestLifeOfAConnection(t *testing.T) {
	c := connect(t, greeting(map[string]Method{"ping": echo}))
	c.send(`{"jsonrpc":"2.0","id":1,"method":"ping"}`)
	assert.Equal(t, CodeServerNotInitialized, c.failure("1"))
	c.send(`{"jsonrpc":"2.0","id":2,"method":"shutdown"}`)
	assert.Equal(t, CodeServerNotInitialized, c.failure("2"))
	c.initialize()
	c.send(`{"jsonrpc":"2.0","id":3,"method":"initialize","params":{}}`)
	assert.Equal(t, -32600, c.failure("3"))
	c.send(`{"jsonrpc":"2.0","id":4,"method":"nothing"}`)
	assert.Equal(t, -32601, c.failure("4"))
	c.send(`{"jsonrpc":"2.0","id":5,"method":"$/nothing"}`)
	assert.Equal(t, -32601, c.failure("5"))
	c.send(`{"jsonrpc":"2.0","method":"$/nothing"}`)
	c.send(`{"jsonrpc":"2.0","id":6,"method":"shutdown"}`)
	assert.Equal(t, "null", c.result("6"))
	c.send(`{"jsonrpc":"2.0","id":7,"method":"ping"}`)
	assert.Equal(t, -32600, c.failure("7"))
	c.send(`{"jsonrpc":"2.0","id":8,"method":"shutdown"}`)
	assert.Equal(t, -32600, c.failure("8"))
	c.send(`{"jsonrpc":"2.0","method":"exit"}`)
	assert.Equal(t, 0, c.ended())
}

func TestExitStatus(t *testing.T) {
	t.Run("exit at once", func(t *testing.T) {
		c := connect(t, greeting(nil))
		c.send(`{"jsonrpc":"2.0","method":"exit"}`)
		assert.Equal(t, 1, c.ended())
	})
	t.Run("exit without shutdown", func(t *testing.T) {
		c := connect(t, greeting(nil))
		c.initialize()
		c.send(`{"jsonrpc":"2.0","method":"exit"}`)
		assert.Equal(t, 1, c.ended())
	})
	t.Run("the client hangs up", func(t *testing.T) {
		c := connect(t, greeting(nil))
		c.initialize()
		c.conn.Close()
		assert.Equal(t, 1, c.ended())
	})
	t.Run("the client hangs up in a message", func(t *testing.T) {
		c := connect(t, greeting(nil))
		c.initialize()
		c.raw("Content-Length: 100\r\n\r\n{")
		c.conn.Close()
		assert.Equal(t, 1, c.ended())
	})
}

func TestAFailedInitializeMayBeTriedAgain(t *testing.T) {
	tries := 0
	c := connect(t, func(*Connection) Service {
		return Service{Initialize: func(*Request) (any, error) {
			if tries++; tries == 1 {
				return nil, Refuse("not today")
			}
			return "hello", nil
		}}
	})
	c.send(`{"jsonrpc":"2.0","id":1,"method":"initialize","params":{}}`)
	assert.Equal(t, CodeRequestFailed, c.failure("1"))
	c.initialize()
}

// A request sees the state as of its place among the messages, though the
// changes behind it are taken before it is answered.
func TestRequestsSeeTheStateOfTheirPlace(t *testing.T) {
	text := 0 // touched by the read loop alone
	hold := make(chan struct{})
	c := connect(t, func(c *Connection) Service {
		s := greeting(map[string]Method{"text": func(r *Request) (any, error) {
			<-hold
			return r.Prepared, nil
		}})(c)
		s.Prepare = func(string) any { return text }
		s.Protocol = &lsp.Handler{TextDocumentDidChange: func(*glsp.Context, *lsp.DidChangeTextDocumentParams) error {
			text++
			return nil
		}}
		return s
	})
	c.initialize()
	for i := range 20 {
		c.send(`{"jsonrpc":"2.0","id":%d,"method":"text"}`, i)
		c.send(`{"jsonrpc":"2.0","method":"textDocument/didChange","params":{"textDocument":{"uri":"a","version":1},"contentChanges":[]}}`)
	}
	close(hold)
	for range 20 {
		r := c.read()
		assert.Equal(t, string(r.ID), string(r.Result))
	}
}

func TestCancellation(t *testing.T) {
	started := make(chan struct{}, 100)
	var worked atomic.Int32
	c := connect(t, greeting(map[string]Method{
		"wait": func(r *Request) (any, error) {
			worked.Add(1)
			started <- struct{}{}
			<-r.Context.Done()
			return nil, fmt.Errorf("waiting: %w", r.Context.Err())
		},
		"give up": func(r *Request) (any, error) { return nil, context.Canceled },
		"outdated": func(r *Request) (any, error) {
			return nil, fmt.Errorf("tokens: %w", ErrContentModified)
		},
	}))
	c.initialize()
	for id := range turns + 10 {
		c.send(`{"jsonrpc":"2.0","id":%d,"method":"wait"}`, id)
	}
	for range turns {
		<-started
	}
	// Those that wait for their turn first: they do no work.
	for id := turns; id < turns+10; id++ {
		c.send(`{"jsonrpc":"2.0","method":"$/cancelRequest","params":{"id":%d}}`, id)
	}
	// Which of them have their turn is open; all are answered.
	for id := range turns {
		c.send(`{"jsonrpc":"2.0","method":"$/cancelRequest","params":{"id":%d}}`, id)
	}
	answered := map[string]bool{}
	for range turns + 10 {
		r := c.read()
		require.NotNil(t, r.Error)
		assert.Equal(t, CodeRequestCancelled, r.Error.Code)
		answered[string(r.ID)] = true
	}
	assert.Len(t, answered, turns+10)
	assert.Less(t, int(worked.Load()), turns+10, "cancelled work is dropped before it starts")

	c.send(`{"jsonrpc":"2.0","id":"a","method":"wait"}`)
	c.send(`{"jsonrpc":"2.0","method":"$/cancelRequest","params":{"id":"nobody"}}`)
	c.send(`{"jsonrpc":"2.0","method":"$/cancelRequest","params":{"id":null}}`)
	c.send(`{"jsonrpc":"2.0","method":"$/cancelRequest","params":[]}`)
	c.send(`{"jsonrpc":"2.0","method":"$/cancelRequest","params":{"id":"\u0061"}}`)
	assert.Equal(t, CodeRequestCancelled, c.failure(`"a"`))

	c.send(`{"jsonrpc":"2.0","id":1,"method":"give up"}`)
	assert.Equal(t, CodeServerCancelled, c.failure("1"), "the client has not cancelled it")
	c.send(`{"jsonrpc":"2.0","id":2,"method":"outdated"}`)
	assert.Equal(t, CodeContentModified, c.failure("2"))
}

func TestErrorsHaveTheirCodes(t *testing.T) {
	c := connect(t, func(c *Connection) Service {
		s := greeting(map[string]Method{
			"typed":   Typed(func(r *Request, params *struct{ N int }) (any, error) { return params.N, nil }),
			"refused": func(*Request) (any, error) { return nil, Refuse("%s is a unit", "kN") },
			"failed":  func(*Request) (any, error) { return nil, errors.New("it broke") },
			"panics":  func(r *Request) (any, error) { return r.Prepared.(int), nil },
			"unfit":   func(*Request) (any, error) { return make(chan int), nil },
		})(c)
		s.Prepare = func(method string) any {
			if method == "unprepared" {
				panic("no snapshot")
			}
			return nil
		}
		s.Protocol = &lsp.Handler{
			TextDocumentHover: func(context *glsp.Context, params *lsp.HoverParams) (*lsp.Hover, error) {
				return &lsp.Hover{Contents: c.Request(context).Method}, nil
			},
			TextDocumentDidClose: func(*glsp.Context, *lsp.DidCloseTextDocumentParams) error { panic("closed") },
		}
		return s
	})
	c.initialize()
	tests := []struct {
		method, params string
		code           int
	}{
		{"typed", `{"n":"three"}`, -32602},
		{"typed", `[1]`, -32602},
		{"refused", `{}`, CodeRequestFailed},
		{"failed", `{}`, -32603},
		{"panics", `{}`, -32603},
		{"unfit", `{}`, -32603},
		{"unprepared", `{}`, -32603},
		{"textDocument/hover", `{"position":"here"}`, -32602},
		{"textDocument/definition", `{}`, -32601},
		{"codeLens/resolve", `{}`, -32601},
	}
	for i, test := range tests {
		c.send(`{"jsonrpc":"2.0","id":%d,"method":%q,"params":%s}`, i, test.method, test.params)
		assert.Equal(t, test.code, c.failure(strconv.Itoa(i)), test.method)
	}
	c.send(`{"jsonrpc":"2.0","method":"textDocument/didClose","params":{}}`)
	c.send(`{"jsonrpc":"2.0","id":50,"method":"typed","params":{"n":3}}`)
	assert.Equal(t, "3", c.result("50"))
	c.send(`{"jsonrpc":"2.0","id":51,"method":"textDocument/hover","params":{}}`)
	assert.JSONEq(t, `{"contents":"textDocument/hover"}`, c.result("51"))
	assert.Contains(t, c.log.String(), "interface conversion")
	assert.Contains(t, c.log.String(), "loop_test.go")
}

// A client that writes everything before it reads anything gets all answers.
func TestAClientThatReadsLate(t *testing.T) {
	c := connect(t, greeting(map[string]Method{"ping": echo}))
	c.initialize()
	for i := range 300 {
		c.send(`{"jsonrpc":"2.0","id":%d,"method":"ping"}`, i)
		c.send(`{"jsonrpc":"2.0","id":1.5,"method":"ping"}`)
	}
	answered := map[string]int{}
	for range 600 {
		answered[string(c.read().ID)]++
	}
	assert.Len(t, answered, 301)
}

// A script that is piped in at once still gets the answers of what is under way
// when exit, or the end of the input, is read.
func TestAnswersBeforeTheEnd(t *testing.T) {
	slow := func(r *Request) (any, error) {
		select {
		case <-time.After(100 * time.Millisecond):
		case <-r.Context.Done():
		}
		return "late", r.Context.Err()
	}
	c := connect(t, greeting(map[string]Method{"slow": slow}))
	c.initialize()
	c.send(`{"jsonrpc":"2.0","id":1,"method":"slow"}`)
	c.send(`{"jsonrpc":"2.0","id":2,"method":"shutdown"}`)
	c.send(`{"jsonrpc":"2.0","method":"exit"}`)
	assert.Equal(t, "null", c.result("2"))
	assert.Equal(t, `"late"`, c.result("1"))
	assert.Equal(t, 0, c.ended())
}
