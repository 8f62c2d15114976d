package scaling

import (
	"errors"
	"fmt"
	"strings"

	"example.org/overturn/scaling/internal/check"
)

// Errors that a caller can act on.
var (
	// ErrOutOfRange reports that a law was used outside the range it was made
	// for. The value comes with the error. The error that wraps it is a
	// [*RangeError].
	ErrOutOfRange = errors.New("outside the range of the law")

	// ErrMissing reports that a law needs a group that was not given. The
	// error that wraps it is a [*FieldError], which names the group.
	ErrMissing = errors.New("not given")

	// ErrExponentOnly reports a law of which only the exponent is published,
	// or known to us.
	ErrExponentOnly = errors.New("only the exponent of this law is known")

	// ErrNoValue reports that a formula has no finite value for its input.
	ErrNoValue = errors.New("no finite value")
)

// FieldError reports a field, or an argument, whose value makes no sense: its
// fields Package, Field, Value and Want say which, where and what is allowed,
// and Err holds a sentinel such as [ErrMissing] or nil.
type FieldError = check.FieldError

// RangeError says in which groups a law was used outside its range.
type RangeError struct {
	Law        string
	Violations []Violation
}

// Violation is one group outside its range.
type Violation struct {
	Limit Limit
	Value float64
}

// Error lists every group that is out of range.
func (e *RangeError) Error() string {
	var b strings.Builder
	fmt.Fprintf(&b, "scaling: %s: ", e.Law)
	for i, v := range e.Violations {
		if i > 0 {
			b.WriteString(", ")
		}
		fmt.Fprintf(&b, "%v is %.4g, want %s", v.Limit.Group, v.Value, v.Limit.interval())
	}
	return b.String()
}

// Unwrap returns [ErrOutOfRange].
func (e *RangeError) Unwrap() error { return ErrOutOfRange }

// pkg names this package in the errors of its checks.
const pkg = check.In("scaling")
