package units

import (
	"strings"
	"unicode"
)

// Parse reads a number and a unit: Parse[Velocity]("4.2 cm/yr"). The result is
// the float64 nearest to what the text says (see the package comment for what
// that means for units of irrational size). A Temperature in °C or °F is a point
// on the scale; in any other quantity they count differences. The error is a
// [*ParseError], and the result then zero.
func Parse[Q Quantity](text string) (Q, error) {
	var q Q
	s := scanner{text: text}
	s.space()
	start := s.pos
	d, err := s.decimal()
	if err != nil {
		return 0, err
	}
	end := s.pos
	u, err := readUnit(s)
	if err != nil {
		return 0, err
	}
	if err := measures(q, &u, s); err != nil {
		return 0, err
	}
	x, ok := u.value(d)
	if !ok {
		return 0, outOfRange(text, start, end)
	}
	return Q(x), nil
}

// measures checks that the unit that s stands before measures the quantity, and
// decides whether a scale of temperature means points or differences.
func measures[Q Quantity](q Q, u *parsedUnit, s scanner) error {
	if u.dimension() != q.Dimension() {
		s.space()
		return wrongDimension[Q](s, u.dimension())
	}
	if _, point := any(q).(Temperature); !point {
		u.zero = 0
		return nil
	}
	if u.inProduct >= 0 {
		s.pos = u.inProduct
		return s.fail(ErrSyntax, "it alone, or K: in a product it counts differences")
	}
	return nil
}

// unmarshal is Parse into *q, which keeps its value on failure.
func unmarshal[Q Quantity](q *Q, b []byte) error {
	parsed, err := Parse[Q](string(b))
	if err == nil {
		*q = parsed
	}
	return err
}

func trimSpace(s string) string { return strings.TrimFunc(s, unicode.IsSpace) }
