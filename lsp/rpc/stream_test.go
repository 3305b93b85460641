package rpc

import (
	"fmt"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// Whatever comes is answered or passed over, and the next request is served.
func TestStreamLivesOn(t *testing.T) {
	const ping = `{"jsonrpc":"2.0","id":7,"method":"ping","params":{"a":1}}`
	tests := []struct {
		name string
		sent string
		id   string // of the error answered first; empty for none
		code int
	}{
		{"not JSON", frame(`{"jsonrpc":`), "null", -32700},
		{"empty body", frame(``), "null", -32700},
		{"a number", frame(`5`), "null", -32600},
		{"a text", frame(`"ping"`), "null", -32600},
		{"a batch", frame(`[` + ping + `,` + ping + `]`), "null", -32600},
		{"a broken batch", frame(`[` + ping), "null", -32700},
		{"null", frame(`null`), "null", -32600},
		{"no method", frame(`{"jsonrpc":"2.0","id":3}`), "3", -32600},
		{"neither", frame(`{}`), "null", -32600},
		{"method is a number", frame(`{"jsonrpc":"2.0","id":"x","method":5}`), `"x"`, -32600},
		{"id with a fraction", frame(`{"jsonrpc":"2.0","id":1.5,"method":"ping"}`), "1.5", -32600},
		{"id written as a float", frame(`{"jsonrpc":"2.0","id":1.0,"method":"ping"}`), "1.0", -32600},
		{"id too large", frame(`{"jsonrpc":"2.0","id":123456789012345678901,"method":"ping"}`), "123456789012345678901", -32600},
		{"id is a list", frame(`{"jsonrpc":"2.0","id":[1],"method":"ping"}`), "null", -32600},
		{"id is true", frame(`{"jsonrpc":"2.0","id":true,"method":"ping"}`), "null", -32600},
		{"nested too deeply", frame(strings.Repeat("[", 100_000)), "null", -32700},
		{"lower-case header", strings.Replace(frame(`{"jsonrpc":"2.0","method":"nothing"}`), "Content-Length: ", "content-length:", 1), "", 0},
		{"line feeds alone", strings.ReplaceAll(frame(`{"jsonrpc":"2.0","method":"nothing"}`), "\r\n", "\n"), "", 0},
		{"a content type", "Content-Type: application/vscode-jsonrpc; charset=utf-8\r\n" + frame(`{"jsonrpc":"2.0","method":"nothing"}`), "", 0},
		{"blank lines before a header", "\r\n\r\n" + frame(`{"jsonrpc":"2.0","method":"nothing"}`), "", 0},
		{"no length", "Content-Type: x\r\n\r\n" + ping, "null", -32700},
		{"negative length", "Content-Length: -5\r\n\r\n" + ping, "null", -32700},
		{"length in words", "Content-Length: many\r\n\r\n" + ping, "null", -32700},
		{"length beyond all measure", "Content-Length: 9223372036854775807\r\n\r\n" + ping, "null", -32700},
		{"length beyond numbers", "Content-Length: 99999999999999999999999\r\n\r\n" + ping, "null", -32700},
		{"garbage", "GET / HTTP/1.1\r\n\r\n", "null", -32700},
		{"much garbage", strings.Repeat("\x00\xff[}", 100_000), "null", -32700},
		{"lines of garbage", strings.Repeat("[}\n\n", 10_000), "null", -32700},
		{"a length too short", "Content-Length: 10\r\n\r\n" + ping, "null", -32700},
		{"a response to nothing", frame(`{"jsonrpc":"2.0","id":99,"result":null}`), "", 0},
		{"a response without id", frame(`{"jsonrpc":"2.0","id":null,"error":{"code":1,"message":"x"}}`), "", 0},
		{"a malformed response", frame(`{"jsonrpc":"2.0","id":99,"error":"text"}`), "", 0},
		{"too long", fmt.Sprintf("Content-Length: %d\r\n\r\n%s", maxMessage+1, strings.Repeat("x", maxMessage+1)), "null", -32600},
	}
	for _, test := range tests {
		t.Run(test.name, func(t *testing.T) {
			c := connect(t, greeting(map[string]Method{"ping": echo}))
			c.initialize()
			go c.raw(test.sent + frame(ping))
			if test.id != "" {
				assert.Equal(t, test.code, c.failure(test.id))
			}
			require.JSONEq(t, `{"a":1}`, c.result("7"))
		})
	}
}

func TestIdentitiesComeBackAsTheyWere(t *testing.T) {
	c := connect(t, greeting(map[string]Method{"ping": echo}))
	c.initialize()
	for _, id := range []string{"0", "-3", "9007199254740993", `"a"`, `"é<>"`, `"1"`} {
		c.send(`{"jsonrpc":"2.0","id":%s,"method":"ping"}`, id)
		r := c.read()
		require.JSONEq(t, id, string(r.ID))
		require.Equal(t, `{}`, string(r.Result), "missing parameters are an empty object")
	}
}

func TestTextIsWrittenPlainly(t *testing.T) {
	c := connect(t, greeting(map[string]Method{"ping": func(*Request) (any, error) { return "A -> B & C", nil }}))
	c.initialize()
	c.send(`{"jsonrpc":"2.0","id":1,"method":"ping"}`)
	require.Equal(t, `"A -> B & C"`, c.result("1"))
}

// Any bytes: the reader neither panics nor hangs, and finds a well-formed
// message behind them, unless they announce a body that reaches over it.
func FuzzStream(f *testing.F) {
	for _, seed := range []string{
		"", "\r\n", "Content-Length: 2\r\n\r\n{}", "content-length:5\n\n12345", "Content-Length: -1\r\n\r\n",
		"Content-Length: 99999999999\r\n\r\n", "x: y\r\n\r\n", "{}Content-Length: 2\r\n\r\n[]",
		frame(`{"id":1.5,"method":"x"}`), frame(`{"id":"\ud800","method":"x","params":[]}`), "Content-Length: 70000000\r\n\r\n",
	} {
		f.Add([]byte(seed))
	}
	f.Fuzz(func(t *testing.T, input []byte) {
		const last = `{"jsonrpc":"2.0","id":424242,"method":"last"}`
		frames := newFrameReader(strings.NewReader(string(input) + "\r\n" + frame(last)))
		found := false
		for range len(input) + 10 {
			body, err := frames.next()
			if err != nil {
				if _, goesOn := err.(*refusal); goesOn {
					continue
				}
				announced := strings.Contains(strings.ToLower(string(input)), "content-length")
				require.True(t, found || announced, "the last message was lost")
				return
			}
			m, refused := readMessage(body)
			require.True(t, (m == nil) != (refused == nil))
			found = found || m != nil && m.id == "424242" && m.method == "last"
		}
		require.Fail(t, "more frames than bytes")
	})
}
