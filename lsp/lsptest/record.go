package lsptest

import (
	"encoding/json"
	"fmt"
	"slices"
	"time"

	"github.com/stretchr/testify/require"

	"spanwright/lsp/protocol"
)

// Message is a notification or request of the server.
type Message struct {
	Method string
	Params json.RawMessage
}

// update changes the client's state and wakes those who wait.
func (c *Client) update(change func()) {
	c.mu.Lock()
	defer c.mu.Unlock()
	change()
	c.changed.Broadcast()
}

// Received returns the server's notifications and requests of a method so far.
func (c *Client) Received(method string) []Message {
	c.mu.Lock()
	defer c.mu.Unlock()
	return c.receivedLocked(method)
}

// Forget drops what was received so far, which a long session would pile up.
func (c *Client) Forget() {
	c.update(func() { c.received = nil })
}

func (c *Client) receivedLocked(method string) []Message {
	var all []Message
	for _, m := range c.received {
		if m.Method == method {
			all = append(all, m)
		}
	}
	return all
}

// WaitReceived waits until the server has sent n messages of a method, and
// returns them all.
func (c *Client) WaitReceived(method string, n int) []Message {
	c.t.Helper()
	var all []Message
	c.wait(fmt.Sprintf("message %d of %s", n, method), func() (bool, string) {
		all = c.receivedLocked(method)
		return len(all) >= n, ""
	})
	return all
}

// Published is the last word of the server on a document.
type Published struct {
	Version     *int32
	Diagnostics []protocol.Diagnostic
}

// Published returns what the server has published about a document, in order.
func (c *Client) Published(uri string) []Published {
	c.mu.Lock()
	defer c.mu.Unlock()
	return c.publishedLocked(uri)
}

func (c *Client) publishedLocked(uri string) []Published {
	var all []Published
	for _, m := range c.receivedLocked("textDocument/publishDiagnostics") {
		var p protocol.PublishDiagnosticsParams
		if err := json.Unmarshal(m.Params, &p); err == nil && p.URI == uri {
			all = append(all, Published{p.Version, p.Diagnostics})
		}
	}
	return all
}

// WaitDiagnostics waits until the server has published diagnostics of the
// document's present version, and returns them.
func (c *Client) WaitDiagnostics(uri string) []protocol.Diagnostic {
	c.t.Helper()
	return c.WaitDiagnosticsThat(uri, "come", func([]protocol.Diagnostic) bool { return true })
}

// WaitDiagnosticsThat waits until the last diagnostics published are of the
// document's present version and meet a condition.
func (c *Client) WaitDiagnosticsThat(uri, condition string, meet func([]protocol.Diagnostic) bool) []protocol.Diagnostic {
	c.t.Helper()
	version := c.Version(uri)
	var list []protocol.Diagnostic
	c.wait(fmt.Sprintf("diagnostics of %s, version %d, that %s", uri, version, condition), func() (bool, string) {
		all := c.publishedLocked(uri)
		if len(all) == 0 {
			return false, ""
		}
		last := all[len(all)-1]
		list = last.Diagnostics
		if last.Version == nil {
			return false, "" // of the file, from before it was opened
		}
		if *last.Version > version {
			return false, fmt.Sprintf("diagnostics came of version %d: %+v", *last.Version, list)
		}
		return *last.Version == version && meet(list), ""
	})
	return list
}

// WaitDiagnostic waits for a diagnostic of a name on the present version.
func (c *Client) WaitDiagnostic(uri, name string) protocol.Diagnostic {
	c.t.Helper()
	named := func(d protocol.Diagnostic) bool { return d.Code == name }
	list := c.WaitDiagnosticsThat(uri, "have "+name, func(list []protocol.Diagnostic) bool {
		return slices.ContainsFunc(list, named)
	})
	return list[slices.IndexFunc(list, named)]
}

// wait waits until a condition is met. It fails at once when the condition says
// why it cannot be met any more, or when the server has gone.
func (c *Client) wait(what string, met func() (met bool, impossible string)) {
	c.t.Helper()
	expired := false
	timer := time.AfterFunc(Patience, func() { c.update(func() { expired = true }) })
	defer timer.Stop()
	reason := func() string {
		c.mu.Lock()
		defer c.mu.Unlock()
		for {
			done, impossible := met()
			switch {
			case done:
				return ""
			case impossible != "":
				return impossible
			case c.gone:
				return "the server has gone"
			case expired:
				return "it did not come in time; received so far:" + c.summary()
			}
			c.changed.Wait()
		}
	}()
	if reason != "" {
		require.Fail(c.t, "waiting in vain", "for %s: %s", what, reason)
	}
}

// summary lists the last messages received.
func (c *Client) summary() string {
	text := ""
	for _, m := range c.received[max(0, len(c.received)-10):] {
		text += fmt.Sprintf("\n%s %.300s", m.Method, m.Params)
	}
	return text
}
