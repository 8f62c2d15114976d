package units

import (
	"math"
	"strconv"
)

// Format writes a quantity in a unit of its dimension, to a number of significant
// digits, zeros at the end included: Format(v, "cm/yr", 2) is "4.2 cm/yr".
// With digits <= 0 it writes as few as it takes for [Parse] to return q, to the
// bit, and never more than 1200. An empty unit is the SI unit. The unit comes out
// as it was given.
//
// The error is a [*ParseError] about the unit, or one that wraps [ErrRange] if q
// is NaN or infinite.
func Format[Q Quantity](q Q, unit string, digits int) (string, error) {
	digits = min(digits, maxDigits)
	unit = trimSpace(unit)
	if unit == "" {
		unit = q.Dimension().siUnit()
	}
	s := scanner{text: unit}
	u, err := readUnit(s)
	if err != nil {
		return "", err
	}
	if err := measures(q, &u, s); err != nil {
		return "", err
	}
	if err := finite(q); err != nil {
		return "", err
	}
	return string(appendUnit(u.reading(float64(q), digits).layout(nil, digits), unit)), nil
}

// text writes a quantity in its SI unit, NaN and infinities included.
func text[Q Quantity](q Q) string {
	if x := float64(q); math.IsNaN(x) || math.IsInf(x, 0) {
		b := strconv.AppendFloat(nil, x, 'g', -1, 64)
		return string(appendUnit(b, q.Dimension().siUnit()))
	}
	return string(appendSI(nil, q))
}

// appendText appends a finite quantity in its SI unit.
func appendText[Q Quantity](b []byte, q Q) ([]byte, error) {
	if err := finite(q); err != nil {
		return b, err
	}
	return appendSI(b, q), nil
}

func appendSI[Q Quantity](b []byte, q Q) []byte {
	var si parsedUnit
	return appendUnit(si.reading(float64(q), 0).layout(b, 0), q.Dimension().siUnit())
}

func appendUnit(b []byte, unit string) []byte {
	if unit == "" {
		return b
	}
	return append(append(b, ' '), unit...)
}
