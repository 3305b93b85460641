package rpc

import (
	"bytes"
	"encoding/json"
	"errors"
	"fmt"
	"strconv"

	"github.com/sourcegraph/jsonrpc2"
)

// ID identifies a request: a JSON string or integer, as the client wrote it.
// jsonrpc2's own type turns negative numbers into huge ones.
type ID string

// nullID stands in the answer to a message whose identity could not be read.
const nullID ID = "null"

// message is one JSON-RPC message as it came. A field that was not there is
// nil; one that was null is the text "null".
type message struct {
	ID     json.RawMessage `json:"id"`
	Method json.RawMessage `json:"method"`
	Params json.RawMessage `json:"params"`
	Result json.RawMessage `json:"result"`
	Error  json.RawMessage `json:"error"`

	method string
	id     ID // empty for a notification
}

// refusal is a mistake in a message that is answered at once, without anybody
// else seeing the message.
type refusal struct {
	id      ID
	code    int64
	message string
}

func (r *refusal) Error() string { return r.message }

// readMessage reads the body of a message.
func readMessage(body []byte) (*message, *refusal) {
	body = bytes.TrimSpace(body)
	var m message
	if err := json.Unmarshal(body, &m); err != nil {
		var notObject *json.UnmarshalTypeError
		switch {
		case !errors.As(err, &notObject):
			return nil, &refusal{nullID, jsonrpc2.CodeParseError, "this is not JSON: " + err.Error()}
		case body[0] == '[':
			return nil, &refusal{nullID, jsonrpc2.CodeInvalidRequest, "batches are no part of the Language Server Protocol: send one message at a time"}
		}
		return nil, &refusal{nullID, jsonrpc2.CodeInvalidRequest, "a message is a JSON object"}
	}
	if isAbsent(m.Params) {
		m.Params = json.RawMessage("{}")
	}
	if refused := m.readID(); refused != nil {
		return nil, refused
	}
	if m.isResponse() {
		return &m, nil
	}
	if m.Method == nil || json.Unmarshal(m.Method, &m.method) != nil || m.method == "" {
		id := m.id
		if id == "" {
			id = nullID
		}
		return nil, &refusal{id, jsonrpc2.CodeInvalidRequest, "a message needs a method"}
	}
	return &m, nil
}

// isResponse reports whether the message answers a call of the server.
func (m *message) isResponse() bool {
	return m.Method == nil && (m.Result != nil || m.Error != nil)
}

func (m *message) readID() *refusal {
	if isAbsent(m.ID) {
		return nil
	}
	id, err := readID(m.ID)
	if err != nil {
		return &refusal{id, jsonrpc2.CodeInvalidRequest, err.Error()}
	}
	m.id = id
	return nil
}

// readID reads an identity: a string or an integer. With an error it returns
// what to put into the answer.
func readID(raw json.RawMessage) (ID, error) {
	switch c := raw[0]; {
	case c == '"':
		var text string
		if err := json.Unmarshal(raw, &text); err != nil {
			return nullID, err
		}
		// Written anew, so that two spellings of one string are one identity.
		canonical, err := json.Marshal(text)
		return ID(canonical), err
	case c == '-' || '0' <= c && c <= '9':
		if _, err := strconv.ParseInt(string(raw), 10, 64); err != nil {
			return ID(raw), fmt.Errorf("the id %.40s is not an integer", raw)
		}
		return ID(raw), nil
	}
	return nullID, errors.New("an id is a string or an integer")
}

func isAbsent(raw json.RawMessage) bool { return raw == nil || string(raw) == "null" }

// The messages that are written.
type (
	result struct {
		Version string          `json:"jsonrpc"`
		ID      json.RawMessage `json:"id"`
		Result  any             `json:"result"`
	}
	failure struct {
		Version string          `json:"jsonrpc"`
		ID      json.RawMessage `json:"id"`
		Error   *jsonrpc2.Error `json:"error"`
	}
	notification struct {
		Version string `json:"jsonrpc"`
		Method  string `json:"method"`
		Params  any    `json:"params,omitempty"`
	}
)

// encodeFrame encodes a message with its header.
func encodeFrame(message any) ([]byte, error) {
	var body bytes.Buffer
	encoder := json.NewEncoder(&body)
	encoder.SetEscapeHTML(false) // "A -> B" stays short
	if err := encoder.Encode(message); err != nil {
		return nil, err
	}
	text := bytes.TrimSuffix(body.Bytes(), []byte("\n"))
	frame := make([]byte, 0, len(text)+32)
	frame = fmt.Appendf(frame, "Content-Length: %d\r\n\r\n", len(text))
	return append(frame, text...), nil
}
