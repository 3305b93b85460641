package protocol

import (
	"encoding/json"

	glsp "github.com/tliron/glsp/protocol_3_16"
)

// ProgressToken reads a progress token from the raw parameters of a message;
// key is "workDoneToken", "partialResultToken" or, for $/progress and
// window/workDoneProgress/cancel, "token". It is nil where there is none.
// glsp's own decoder leaves every token empty. Numbers come as int64.
func ProgressToken(params json.RawMessage, key string) *glsp.ProgressToken {
	var fields map[string]json.RawMessage
	if json.Unmarshal(params, &fields) != nil || fields[key] == nil {
		return nil
	}
	var number *int64
	if json.Unmarshal(fields[key], &number) == nil && number != nil {
		return &glsp.ProgressToken{Value: *number}
	}
	var text *string
	if json.Unmarshal(fields[key], &text) == nil && text != nil {
		return &glsp.ProgressToken{Value: *text}
	}
	return nil
}
