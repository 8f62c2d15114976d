package units

import (
	"errors"
	"fmt"
	"reflect"
	"strings"
	"unicode"
)

// What can be wrong with a text. The error is always a [*ParseError] that wraps
// one of these.
var (
	// ErrSyntax reports a text that is not a number followed by a unit. Usual
	// causes are a decimal comma, a product after a slash without parentheses
	// (write W/(m K)), and a stray sign.
	ErrSyntax = errors.New("syntax error")

	// ErrUnknownUnit reports a symbol that the table does not have, or does not
	// have with that prefix. Usual causes are a missing space (Pas) and upper
	// and lower case (KM).
	ErrUnknownUnit = errors.New("unknown unit")

	// ErrDimension reports a unit of another kind of quantity: kilograms for a
	// length. A number without a unit is dimensionless.
	ErrDimension = errors.New("wrong dimension")

	// ErrRange reports a number too large for a float64, a number other than
	// zero too small for one, NaN or an infinity, or an exponent of a unit
	// that is too large.
	ErrRange = errors.New("out of range")
)

// ParseError says what is wrong with a text, where, and what was expected there.
type ParseError struct {
	Text string // what was parsed
	Pos  int    // offset in bytes of what is wrong

	// Found is the piece of Text that is wrong, "" at its end.
	Found string

	// Expected says what should have stood there.
	Expected string

	// Got and Want are the two dimensions that clash, if Err is ErrDimension.
	Got, Want Dimension

	// Err is ErrSyntax, ErrUnknownUnit, ErrDimension or ErrRange.
	Err error
}

// longestQuote is how many bytes of a text an error repeats.
const longestQuote = 80

func quote(s string) string {
	if len(s) > longestQuote {
		return fmt.Sprintf("%.*q…", longestQuote, s)
	}
	return fmt.Sprintf("%q", s)
}

// Error returns one line, such as
//
//	units: "5 kg": mass (kg), want length (m)
//	units: "5 kg//m" at offset 5: syntax error: found "/", want a unit
func (e *ParseError) Error() string {
	if e.Err == ErrDimension {
		return fmt.Sprintf("units: %s: %s, want %s", quote(e.Text), e.Got.describe(), e.Expected)
	}
	found := "the end"
	if e.Found != "" {
		found = quote(e.Found)
	}
	s := fmt.Sprintf("units: %s at offset %d: %v: found %s", quote(e.Text), e.Pos, e.Err, found)
	if e.Expected != "" {
		s += ", want " + e.Expected
	}
	return s
}

// Unwrap returns Err.
func (e *ParseError) Unwrap() error { return e.Err }

// wrongDimension returns the error of the unit that s stands before, which does
// not measure a Q.
func wrongDimension[Q Quantity](s scanner, got Dimension) *ParseError {
	var q Q
	want := q.Dimension()
	expected := words(reflect.TypeFor[Q]().Name())
	if u := want.siUnit(); u != "" {
		expected += " (" + u + ")"
	}
	return &ParseError{
		Text: s.text, Pos: s.pos, Found: s.rest(),
		Expected: expected, Got: got, Want: want, Err: ErrDimension,
	}
}

// words spells the name of a type: KinematicViscosity is a kinematic viscosity.
func words(camel string) string {
	var b strings.Builder
	for i, r := range camel {
		if i > 0 && unicode.IsUpper(r) {
			b.WriteByte(' ')
		}
		b.WriteRune(unicode.ToLower(r))
	}
	return b.String()
}
