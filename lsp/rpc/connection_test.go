package rpc

import (
	"context"
	"encoding/json"
	"fmt"
	"runtime"
	"strings"
	"sync"
	"testing"
	"time"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// Handlers call the client and wait, many at a time, while it sends more.
func TestCallsOfTheClient(t *testing.T) {
	c := connect(t, func(c *Connection) Service {
		return greeting(map[string]Method{"ask": func(r *Request) (any, error) {
			var answer int
			err := c.Call(r.Context, "client/double", r.Params, &answer)
			return answer, err
		}})(c)
	})
	c.initialize()
	for i := range 50 {
		c.send(`{"jsonrpc":"2.0","id":"r%d","method":"ask","params":{"n":%d}}`, i, i)
	}
	for answers := 0; answers < 50; {
		r := c.read()
		if r.Method == "client/double" {
			var params struct{ N int }
			require.NoError(t, json.Unmarshal(r.Params, &params))
			c.send(`{"jsonrpc":"2.0","id":%s,"result":%d}`, r.ID, 2*params.N)
			continue
		}
		var i int
		_, err := fmt.Sscanf(string(r.ID), `"r%d"`, &i)
		require.NoError(t, err)
		require.Equal(t, fmt.Sprint(2*i), string(r.Result))
		answers++
	}
}

func TestCallsThatTheClientFails(t *testing.T) {
	outcome := make(chan error)
	c := connect(t, func(c *Connection) Service {
		return greeting(map[string]Method{"ask": func(r *Request) (any, error) {
			ctx, cancel := context.WithTimeout(r.Context, 10*time.Second)
			defer cancel()
			c.Go(func(context.Context) { outcome <- c.Call(ctx, "client/do", nil, nil) })
			return nil, nil
		}})(c)
	})
	c.initialize()
	for _, answer := range []string{
		`"error":{"code":-32601,"message":"no such thing"}`,
		`"error":"no"`,
		`"result":null,"error":{"code":1,"message":"no"}`,
	} {
		var asked reply
		c.send(`{"jsonrpc":"2.0","id":1,"method":"ask"}`)
		for range 2 {
			if r := c.read(); r.Method != "" {
				asked = r
			}
		}
		c.send(`{"jsonrpc":"2.0","id":%s,%s}`, asked.ID, answer)
		assert.Error(t, <-outcome, answer)
	}
	// Nor does it wait for a client that is gone.
	c.send(`{"jsonrpc":"2.0","id":1,"method":"ask"}`)
	c.read()
	c.read()
	c.conn.Close()
	assert.Error(t, <-outcome, "the connection is gone")
}

func TestAnAbandonedCallIsCancelled(t *testing.T) {
	c := connect(t, func(c *Connection) Service {
		return greeting(map[string]Method{"ask": func(r *Request) (any, error) {
			return nil, c.Call(r.Context, "client/do", nil, nil)
		}})(c)
	})
	c.initialize()
	c.send(`{"jsonrpc":"2.0","id":1,"method":"ask"}`)
	asked := c.read()
	require.Equal(t, "client/do", asked.Method)
	c.send(`{"jsonrpc":"2.0","method":"$/cancelRequest","params":{"id":1}}`)
	cancelled := c.read()
	assert.Equal(t, "$/cancelRequest", cancelled.Method)
	assert.JSONEq(t, fmt.Sprintf(`{"id":%s}`, asked.ID), string(cancelled.Params))
	assert.Equal(t, CodeRequestCancelled, c.failure("1"))
}

func TestNotificationsKeepTheirOrder(t *testing.T) {
	c := connect(t, func(c *Connection) Service {
		return greeting(map[string]Method{"count": func(r *Request) (any, error) {
			for i := range 200 {
				c.Notify("count", map[string]int{"n": i})
			}
			return "done", nil
		}})(c)
	})
	c.initialize()
	c.send(`{"jsonrpc":"2.0","id":1,"method":"count"}`)
	for i := range 200 {
		require.JSONEq(t, fmt.Sprintf(`{"n":%d}`, i), string(c.read().Params))
	}
	require.Equal(t, `"done"`, c.result("1"))
}

func TestProgress(t *testing.T) {
	type work struct {
		ctx      context.Context
		progress *Progress
	}
	started := make(chan work, 1)
	c := connect(t, func(c *Connection) Service {
		return greeting(map[string]Method{"work": func(r *Request) (any, error) {
			ctx, p := c.StartProgress(context.Background(), "Solving")
			p.Report("3 of 20")
			started <- work{ctx, p}
			return nil, nil
		}})(c)
	})
	c.initialize()
	c.send(`{"jsonrpc":"2.0","id":1,"method":"work"}`)
	w := <-started
	var create reply
	for range 2 {
		if r := c.read(); r.Method != "" {
			create = r
		}
	}
	require.Equal(t, "window/workDoneProgress/create", create.Method)
	require.JSONEq(t, `{"token":"spanwright-1"}`, string(create.Params))
	c.send(`{"jsonrpc":"2.0","id":%s,"result":null}`, create.ID)
	require.JSONEq(t, `{"token":"spanwright-1","value":{"kind":"begin","title":"Solving","cancellable":true,"message":"3 of 20"}}`, string(c.read().Params))
	w.progress.Report("4 of 20")
	require.JSONEq(t, `{"token":"spanwright-1","value":{"kind":"report","message":"4 of 20"}}`, string(c.read().Params))
	require.NoError(t, w.ctx.Err())
	c.send(`{"jsonrpc":"2.0","method":"window/workDoneProgress/cancel","params":{"token":"other"}}`)
	c.send(`{"jsonrpc":"2.0","method":"window/workDoneProgress/cancel","params":{"token":"spanwright-1"}}`)
	<-w.ctx.Done()
	w.progress.End("cancelled")
	w.progress.End("twice")
	require.JSONEq(t, `{"token":"spanwright-1","value":{"kind":"end","message":"cancelled"}}`, string(c.read().Params))

	// Work that is over before the client has found a place is not shown.
	c.send(`{"jsonrpc":"2.0","id":2,"method":"work"}`)
	w = <-started
	w.progress.End("")
	<-w.ctx.Done()
	for range 2 {
		if r := c.read(); r.Method != "" {
			require.Equal(t, "window/workDoneProgress/create", r.Method)
			c.send(`{"jsonrpc":"2.0","id":%s,"result":null}`, r.ID)
		}
	}
	c.send(`{"jsonrpc":"2.0","id":3,"method":"shutdown"}`)
	require.Equal(t, "null", c.result("3"))
}

// After a connection nothing is left running, whatever it ended in.
func TestNothingIsLeftRunning(t *testing.T) {
	before := runtime.NumGoroutine()
	t.Run("connections", func(t *testing.T) {
		var ended sync.WaitGroup
		for i := range 12 {
			ended.Go(func() {
				c := connect(t, func(c *Connection) Service {
					return greeting(map[string]Method{
						"wait": func(r *Request) (any, error) {
							c.StartProgress(c.ctx, "never ended")
							<-r.Context.Done()
							return nil, r.Context.Err()
						},
						"ask":    func(r *Request) (any, error) { return nil, c.Call(r.Context, "client/never", nil, nil) },
						"flood":  func(r *Request) (any, error) { return strings.Repeat("x", 1<<20), nil },
						"beside": func(*Request) (any, error) { c.Go(func(ctx context.Context) { <-ctx.Done() }); return nil, nil },
					})(c)
				})
				c.initialize()
				for id, method := range []string{"beside", "wait", "ask", "flood", "flood"} {
					c.send(`{"jsonrpc":"2.0","id":%d,"method":%q}`, id, method)
				}
				if i%2 == 0 {
					c.conn.Close()
				} else {
					c.send(`{"jsonrpc":"2.0","method":"exit"}`)
				}
				assert.Equal(t, 1, c.ended())
			})
		}
		ended.Wait()
	})
	for range 100 {
		if runtime.NumGoroutine() <= before {
			return
		}
		time.Sleep(20 * time.Millisecond)
	}
	stacks := make([]byte, 1<<20)
	require.Fail(t, "goroutines are left", "%s", stacks[:runtime.Stack(stacks, true)])
}
