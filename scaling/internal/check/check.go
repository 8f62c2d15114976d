// Package check tests arguments and names those without sense.
package check

import (
	"fmt"
	"math"
)

// FieldError reports a field, or an argument, whose value makes no sense.
type FieldError struct {
	Package string // "scaling", "history", ...
	Field   string // for example "Groups.Prandtl"
	Value   string // as it prints, with its unit
	Want    string // what is allowed
	Err     error  // a sentinel, or nil
}

// Error names the field, its value and what is allowed.
func (e *FieldError) Error() string {
	text := fmt.Sprintf("%s: %s is %s, want %s", e.Package, e.Field, e.Value, e.Want)
	if e.Err != nil {
		text += ": " + e.Err.Error()
	}
	return text
}

// Unwrap returns the sentinel, if there is one.
func (e *FieldError) Unwrap() error { return e.Err }

// In checks the arguments of the package of that name.
type In string

// First returns the first error that is not nil.
func First(errs ...error) error {
	for _, err := range errs {
		if err != nil {
			return err
		}
	}
	return nil
}

// Positive wants q > 0 and finite.
func Positive[Q ~float64](in In, field string, q Q) error {
	return want(in, field, q, q > 0 && !math.IsInf(float64(q), 0), "> 0 and finite")
}

// NotNegative wants q >= 0 and finite.
func NotNegative[Q ~float64](in In, field string, q Q) error {
	return want(in, field, q, q >= 0 && !math.IsInf(float64(q), 0), ">= 0 and finite")
}

// Finite wants a number that is neither NaN nor infinite.
func Finite[Q ~float64](in In, field string, q Q) error {
	return want(in, field, q, finite(float64(q)), "a finite number")
}

// Within wants low <= q <= high.
func Within[Q ~float64](in In, field string, q, low, high Q) error {
	if q >= low && q <= high {
		return nil // before the text is made: checks stand in loops
	}
	return want(in, field, q, false, fmt.Sprintf("%v to %v", low, high))
}

// Above wants q > low and finite.
func Above[Q ~float64](in In, field string, q, low Q) error {
	if q > low && !math.IsInf(float64(q), 0) {
		return nil
	}
	return want(in, field, q, false, fmt.Sprintf("> %v and finite", low))
}

// Result passes a derived value on, unless the input, though each of its
// fields is allowed, made it overflow or vanish into NaN.
func Result[Q ~float64](in In, name string, q Q) (Q, error) {
	if finite(float64(q)) {
		return q, nil
	}
	return 0, &FieldError{Package: string(in), Field: name, Value: fmt.Sprint(float64(q)), Want: "a number within the range of float64"}
}

func want[Q ~float64](in In, field string, q Q, ok bool, allowed string) error {
	if ok {
		return nil
	}
	return &FieldError{Package: string(in), Field: field, Value: fmt.Sprint(q), Want: allowed}
}

func finite(x float64) bool { return !math.IsNaN(x) && !math.IsInf(x, 0) }
