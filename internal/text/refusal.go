package text

import (
	"errors"
	"fmt"
)

// Why a document is not read, for errors.Is; the error itself says what is wrong
// where, and the remedy.
var (
	ErrFormat     = errors.New("no such format")
	ErrUnreadable = errors.New("not a document of its format")
	ErrTooLarge   = errors.New("larger than is read")
)

// refusal is an error of one of these kinds.
type refusal struct {
	error
	kind error
}

func (r refusal) Unwrap() []error { return []error{r.error, r.kind} }

// unreadable is fmt.Errorf for a document that is none of its format.
func unreadable(format string, args ...any) error {
	return refusal{fmt.Errorf(format, args...), ErrUnreadable}
}

// TooLarge is fmt.Errorf for a document beyond the bounds of its format.
func TooLarge(format string, args ...any) error {
	return refusal{fmt.Errorf(format, args...), ErrTooLarge}
}
