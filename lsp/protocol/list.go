package protocol

import (
	"bytes"
	"encoding/json"
)

// List is a slice that encodes as [] when it is nil. Clients iterate over such
// fields without asking for null. A plain slice may be assigned to it.
type List[T any] []T

// MarshalJSON writes the list as a JSON array, never as null. It leaves <, >
// and & as they are where the encoder around it does.
func (l List[T]) MarshalJSON() ([]byte, error) {
	if len(l) == 0 {
		return []byte("[]"), nil
	}
	var buffer bytes.Buffer
	encoder := json.NewEncoder(&buffer)
	encoder.SetEscapeHTML(false)
	if err := encoder.Encode([]T(l)); err != nil {
		return nil, err
	}
	return buffer.Bytes(), nil
}
