package rpc

import (
	"context"
	"errors"
	"fmt"

	"github.com/sourcegraph/jsonrpc2"
)

// Error codes of the Language Server Protocol 3.17 beyond those of JSON-RPC.
const (
	CodeServerNotInitialized = -32002
	CodeRequestFailed        = -32803
	CodeServerCancelled      = -32802
	CodeContentModified      = -32801
	CodeRequestCancelled     = -32800
)

// ErrContentModified says that the text has changed so much that the answer is
// worth nothing any more.
var ErrContentModified = errors.New("the text has changed meanwhile")

// Refuse returns the error of a request that was understood and cannot be
// granted, with a reason for the user.
func Refuse(format string, arguments ...any) error {
	return &jsonrpc2.Error{Code: CodeRequestFailed, Message: fmt.Sprintf(format, arguments...)}
}

// InvalidParams returns the error of a request whose parameters make no sense.
func InvalidParams(format string, arguments ...any) error {
	return &jsonrpc2.Error{Code: jsonrpc2.CodeInvalidParams, Message: fmt.Sprintf(format, arguments...)}
}

// protocolError gives an error its place in the protocol. That a request was
// cancelled is said only if the client has cancelled it.
func protocolError(err error, byClient bool) *jsonrpc2.Error {
	var known *jsonrpc2.Error
	switch {
	case errors.As(err, &known):
		return known
	case errors.Is(err, ErrContentModified):
		return &jsonrpc2.Error{Code: CodeContentModified, Message: err.Error()}
	case errors.Is(err, context.Canceled) && byClient:
		return &jsonrpc2.Error{Code: CodeRequestCancelled, Message: "cancelled"}
	case errors.Is(err, context.Canceled):
		return &jsonrpc2.Error{Code: CodeServerCancelled, Message: "the server has dropped this request"}
	}
	return &jsonrpc2.Error{Code: jsonrpc2.CodeInternalError, Message: err.Error()}
}
