package feature

import "fmt"

// Refusal is an error in words for the user: why something that was asked for
// can not be done.
type Refusal string

// Error returns the words.
func (r Refusal) Error() string { return string(r) }

func refuse(format string, arguments ...any) error {
	return Refusal(fmt.Sprintf(format, arguments...))
}
