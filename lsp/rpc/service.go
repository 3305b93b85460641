package rpc

import (
	"encoding/json"

	"github.com/tliron/glsp"
	lsp "github.com/tliron/glsp/protocol_3_16"
)

// Service is what the server does on one connection. Every field but Initialize
// may be left out.
type Service struct {
	// Initialize answers the request of that name, on the read loop. With an
	// error the connection stays uninitialized.
	Initialize Method
	// Methods are consulted first: what is younger than glsp, and what glsp
	// would decode with losses.
	Methods map[string]Method
	// Protocol answers and takes all else. Its handlers find what belongs to
	// their request with [Connection.Request].
	Protocol *lsp.Handler

	// Prepare runs on the read loop for each request and returns what the answer
	// shall be taken from: a snapshot of the state as of this message.
	Prepare func(method string) any
}

// Method answers one request. What it returns is encoded as the result.
type Method func(r *Request) (any, error)

// Typed returns a method that decodes its parameters; where they do not fit,
// the answer is an error of the code "invalid params".
func Typed[P any](method func(r *Request, params *P) (any, error)) Method {
	return func(r *Request) (any, error) {
		var params P
		if err := json.Unmarshal(r.Params, &params); err != nil {
			return nil, InvalidParams("%s: %v", r.Method, err)
		}
		return method(r, &params)
	}
}

// dispatch finds who answers a request or takes a notification.
func (c *Connection) dispatch(r *Request) (value any, found bool, err error) {
	if method, ok := c.service.Methods[r.Method]; ok {
		value, err = method(r)
		return value, true, err
	}
	protocol := c.service.Protocol
	if protocol == nil || r.Method == lsp.MethodCodeLensResolve && protocol.CodeLensResolve == nil {
		return nil, false, nil // glsp asks for the wrong field of the two
	}
	// glsp's context has no room for anything of ours: it is a key to the rest.
	context := &glsp.Context{
		Method: r.Method,
		Params: r.Params,
		Notify: func(method string, params any) { c.Notify(method, params) },
		Call: func(method string, params any, result any) {
			if err := c.Call(r.Context, method, params, result); err != nil {
				c.log.Warn("a call of the client failed", "method", method, "error", err)
			}
		},
	}
	c.requests.Store(context, r)
	defer c.requests.Delete(context)
	value, found, fits, err := protocol.Handle(context)
	if found && !fits {
		err = InvalidParams("%s: %v", r.Method, err)
	}
	return value, found, err
}
