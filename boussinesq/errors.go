package boussinesq

import (
	"errors"
	"fmt"
	"math"

	"example.org/overturn/units"
)

// ErrStable reports a layer whose top is at least as hot as its bottom, so
// that it has no Rayleigh number for heating from below. It does not convect,
// unless it is heated inside. The error that wraps it is a [*FieldError].
var ErrStable = errors.New("heated from above")

// ErrUnknownPreset reports a name that is in no preset. [Presets] lists those
// that are.
var ErrUnknownPreset = errors.New("unknown preset")

// FieldError reports a field, or an argument, whose value makes no sense.
type FieldError struct {
	Field string // for example "Layer.Depth"
	Value string // as it prints, with its unit
	Want  string // what is allowed
	Err   error  // a sentinel such as [ErrStable], or nil
}

// Error names the field, its value and what is allowed.
func (e *FieldError) Error() string {
	text := fmt.Sprintf("boussinesq: %s is %s, want %s", e.Field, e.Value, e.Want)
	if e.Err != nil {
		text += ": " + e.Err.Error()
	}
	return text
}

// Unwrap returns the sentinel, if there is one.
func (e *FieldError) Unwrap() error { return e.Err }

// positive returns an error unless q is positive and finite.
func positive[Q units.Quantity](field string, q Q) error {
	if q > 0 && !math.IsInf(float64(q), 0) {
		return nil
	}
	return &FieldError{Field: field, Value: fmt.Sprint(q), Want: "> 0 and finite"}
}

// notNegative returns an error unless q is finite and zero or more.
func notNegative[Q units.Quantity](field string, q Q) error {
	if q >= 0 && !math.IsInf(float64(q), 0) {
		return nil
	}
	return &FieldError{Field: field, Value: fmt.Sprint(q), Want: ">= 0 and finite"}
}

// finite returns an error if q is NaN or infinite.
func finite[Q units.Quantity](field string, q Q) error {
	if !math.IsNaN(float64(q)) && !math.IsInf(float64(q), 0) {
		return nil
	}
	return &FieldError{Field: field, Value: fmt.Sprint(q), Want: "a finite number"}
}

// inRange passes a derived value on, unless the input, though each of its
// fields is allowed, made it overflow.
func inRange[Q ~float64](name string, q Q) (Q, error) {
	if !math.IsNaN(float64(q)) && !math.IsInf(float64(q), 0) {
		return q, nil
	}
	return 0, &FieldError{Field: name, Value: fmt.Sprint(float64(q)), Want: "a number within the range of float64"}
}

// first returns the first error that is not nil.
func first(errs ...error) error {
	for _, err := range errs {
		if err != nil {
			return err
		}
	}
	return nil
}
