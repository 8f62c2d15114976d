package units

import "fmt"

// Unit is what the text of a unit means: a reading of x stands for x·Scale in SI
// units.
type Unit struct {
	// Scale is the size of the unit in SI base units, as the nearest float64.
	Scale float64

	// Dimension is that of the quantities measured in the unit.
	Dimension Dimension

	// Zero is the absolute temperature at which the unit reads zero: 273.15 K
	// for "degC", and 0 for all but Celsius and Fahrenheit by themselves. Points
	// on the scale are x·Scale + Zero, differences x·Scale.
	Zero Temperature
}

// ParseUnit reads the text of a unit, such as "mW/m²" or "MPa^-3.5 s^-1". The
// package comment lists the forms it takes. An empty text is the unit of pure
// numbers. The error is a [*ParseError].
func ParseUnit(text string) (Unit, error) {
	u, err := readUnit(scanner{text: text})
	if err != nil {
		return Unit{}, err
	}
	zero, _ := u.value(decimal{})
	u.zero = 0
	scale, ok := u.value(decimal{digits: "1"})
	if !ok {
		return Unit{}, &ParseError{Text: text, Found: text, Expected: "a size that a float64 holds", Err: ErrRange}
	}
	return Unit{Scale: scale, Dimension: u.dimension(), Zero: Temperature(zero)}, nil
}

// A parsedUnit is the exact meaning of the text of a unit.
type parsedUnit struct {
	monomial

	// zero is that of symbol, if the unit is a scale of temperature by itself.
	zero int

	// inProduct is where, in bytes, such a scale stands in a larger unit; -1
	// if nowhere.
	inProduct int
}

// readUnit reads the rest of a text, which must be one unit or nothing.
func readUnit(s scanner) (parsedUnit, error) {
	if len(s.text) > maxText {
		s.pos = len(s.text)
		return parsedUnit{}, s.fail(ErrSyntax, fmt.Sprintf("at most %d bytes", maxText))
	}
	s.space()
	if s.end() {
		return parsedUnit{inProduct: -1}, nil
	}
	p := unitParser{scanner: s, symbols: table()}
	return p.unit()
}
