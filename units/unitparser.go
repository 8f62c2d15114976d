package units

import (
	"fmt"
	"strconv"
)

// Limits of a text. Both are far beyond what a quantity needs: the exact
// decimal form of a float64 has at most 1077 digits.
const (
	maxText  = 4096 // bytes
	maxDepth = 16   // nested parentheses
)

// A unitParser reads a unit by recursive descent.
//
//	unit   = [ "/" ] factor { ( [ times ] | "/" ) factor }
//	factor = ( symbol | "1" | "10" | "(" unit ")" ) [ exponent ]
//
// A "1" takes no exponent and a "10" must have one.
type unitParser struct {
	scanner
	symbols symbolTable
	numbers bool // take numbers as factors, as the table does
	depth   int

	// The last scale of temperature read that has a zero of its own, and where
	// it starts and ends.
	zero            int
	zeroAt, zeroEnd int
}

// unit reads the rest of the text, all of which must be one unit.
func (p *unitParser) unit() (parsedUnit, error) {
	p.space()
	start := p.pos
	m, err := p.product()
	if err != nil {
		return parsedUnit{}, err
	}
	if !p.end() { // product stops at a ) only
		return parsedUnit{}, p.fail(ErrSyntax, "an opening parenthesis before it")
	}
	u := parsedUnit{monomial: m, inProduct: -1}
	if p.zero != 0 {
		alone := p.zeroAt == start && trimSpace(p.text[p.zeroEnd:]) == ""
		if alone {
			u.zero = p.zero
		} else {
			u.inProduct = p.zeroAt
		}
	}
	return u, nil
}

// product reads factors up to the end or a closing parenthesis.
func (p *unitParser) product() (monomial, error) {
	var m monomial
	for n, slash := 0, false; ; n++ {
		p.space()
		if n > 0 && (p.end() || p.text[p.pos] == ')') {
			return m, nil
		}
		start, sign := p.pos, int32(1)
		switch {
		case p.take("/"):
			slash, sign = true, -1
		case slash:
			return m, p.fail(ErrSyntax, "parentheses around what is divided by, as in a/(b c)")
		case n > 0:
			p.take("*", "·", "⋅", "×", ".")
		}
		p.space()
		f, err := p.factor()
		if err != nil {
			return m, err
		}
		if !m.mul(&f, sign) {
			p.pos = start
			return m, p.fail(ErrRange, rangeOfExponents)
		}
	}
}

// factor reads one symbol, number or parenthesis, with its exponent.
func (p *unitParser) factor() (monomial, error) {
	start := p.pos
	m, takesExponent, err := p.base()
	if err != nil || !takesExponent {
		return m, err
	}
	e, err := p.exponent()
	if err != nil {
		return m, err
	}
	if !m.pow(e) {
		p.pos = start
		return m, p.fail(ErrRange, rangeOfExponents)
	}
	return m, nil
}

// base reads a factor without its exponent, and reports whether it may have one.
func (p *unitParser) base() (m monomial, takesExponent bool, err error) {
	switch start := p.pos; {
	case p.take("("):
		m, err = p.group()
		return m, true, err
	case p.symbol() != "":
		m, err = p.symbolFactor()
		return m, true, err
	case p.numbers:
		m, err = p.number()
		return m, false, err
	case p.powerOfTenFollows():
		p.take("10")
		m[ten] = exponentGrain
		return m, true, nil
	case p.digits() == "1":
		return m, false, nil
	default:
		p.pos = start
		return m, false, p.fail(ErrSyntax, "a unit")
	}
}

func (p *unitParser) symbolFactor() (monomial, error) {
	s := p.symbol()
	sym, ok := p.symbols.lookup(s)
	if !ok {
		expected := "a known one"
		if a, b, ok := p.symbols.split(s); ok {
			expected += fmt.Sprintf(", perhaps %q", a+" "+b)
		}
		return monomial{}, p.fail(ErrUnknownUnit, expected)
	}
	start := p.pos
	p.pos += len(s)
	if sym.zero != 0 {
		p.zero, p.zeroAt, p.zeroEnd = sym.zero, start, p.pos
	}
	return sym.is, nil
}

// group reads what follows an opening parenthesis, the closing one included.
func (p *unitParser) group() (monomial, error) {
	if p.depth++; p.depth > maxDepth {
		return monomial{}, p.fail(ErrSyntax, fmt.Sprintf("at most %d nested parentheses", maxDepth))
	}
	m, err := p.product()
	if err != nil {
		return m, err
	}
	if !p.take(")") {
		return m, p.fail(ErrSyntax, "a closing parenthesis")
	}
	p.depth--
	return m, nil
}

// number reads a number of the table.
func (p *unitParser) number() (monomial, error) {
	start := p.pos
	d, err := p.decimal()
	if err != nil {
		return monomial{}, err
	}
	m, ok := numeral(d)
	if !ok {
		p.pos = start
		return m, p.fail(ErrSyntax, "a number made of one of the factors")
	}
	return m, nil
}

// powerOfTenFollows reports whether the text goes on with 10 and an exponent.
func (p *unitParser) powerOfTenFollows() bool {
	ahead := p.scanner
	return ahead.digits() == "10" && (ahead.take("^", "**") || ahead.superscripts() != "")
}

// exponent reads what follows a symbol, in multiples of 1/exponentGrain: ^-3,
// **2, -3, ³, ⁻³, ^0.5, ^(1/3), or nothing.
func (p *unitParser) exponent() (int32, error) {
	start := p.pos
	if p.take("^", "**") {
		if !p.take("(") {
			return p.rational(start, false)
		}
		e, err := p.rational(start, true)
		if err == nil && !p.take(")") {
			return 0, p.fail(ErrSyntax, "a closing parenthesis")
		}
		return e, err
	}
	if whole := p.superscripts(); whole != "" {
		return p.grains(start, whole, "", "1")
	}
	sign := p.minus()
	whole := p.digits()
	switch {
	case whole != "":
		return p.grains(start, sign+whole, "", "1")
	case sign != "":
		return 0, p.fail(ErrSyntax, digitsOfExponent)
	}
	return exponentGrain, nil
}

// rational reads -3, 3.5 or, with a quotient allowed, 1/3.
func (p *unitParser) rational(start int, quotient bool) (int32, error) {
	sign := p.minus()
	whole, fraction, den := p.digits(), "", "1"
	if ahead := p.scanner; ahead.take(".") {
		if fraction = ahead.digits(); fraction != "" { // else the point multiplies
			p.scanner = ahead
		}
	}
	if quotient && p.take("/") {
		den = p.digits()
	}
	if whole == "" || den == "" {
		return 0, p.fail(ErrSyntax, digitsOfExponent)
	}
	return p.grains(start, sign+whole, fraction, den)
}

// grains returns whole.fraction/den in multiples of 1/exponentGrain.
func (p *unitParser) grains(start int, whole, fraction, den string) (int32, error) {
	const longest = 9 // digits, so that no product overflows
	n, errN := strconv.ParseInt(whole+fraction, 10, 64)
	d, errD := strconv.ParseInt(den, 10, 64)
	ok := errN == nil && errD == nil && len(whole+fraction) <= longest && len(den) <= longest
	for range fraction {
		d *= 10
	}
	if !ok || d == 0 || n*exponentGrain%d != 0 || max(n, -n) > maxExponent*d {
		return 0, &ParseError{Text: p.text, Pos: start, Found: p.text[start:p.pos], Expected: rangeOfExponents, Err: ErrRange}
	}
	return int32(n * exponentGrain / d), nil
}

// What errors say about exponents.
const (
	digitsOfExponent = "the digits of an exponent"
	rangeOfExponents = "exponents of at most 100, in steps of 1/300"
)
