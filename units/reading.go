package units

import (
	"math"
	"math/big"
	"strconv"
)

// reading returns the finite x as a number of units, rounded to n significant
// digits, or with n <= 0 with as many as it takes for value to return x.
func (u *parsedUnit) reading(x float64, n int) decimal {
	switch y, _ := u.value(decimal{}); {
	case u.zero == 0 && (x == 0 || u.decimal()):
		d := fromScientific(strconv.FormatFloat(x, 'e', max(n, 0)-1, 64))
		d.exp -= u.tenExponent()
		return d
	case u.zero != 0 && x == y:
		return decimal{} // 0 °C: the float64 next to 273.15 K is a little off it
	}
	if d, ok := u.quickReading(x, n); ok {
		return d
	}
	r := u.quotient(x)
	if n > 0 {
		return fromScientific(r.Text('e', n-1))
	}
	for n = u.fewestDigits(x); ; n = more(n) {
		d := fromScientific(r.Text('e', n-1))
		if y, _ := u.value(d); y == x || n > maxDigits {
			return d
		}
	}
}

// quickReading is reading by float64 arithmetic, where that is sure to give the
// same digits.
func (u *parsedUnit) quickReading(x float64, n int) (decimal, bool) {
	const large = 0x1p500 // no intermediate result overflows or is subnormal
	num, den, ok := u.smallRatio()
	exp, size := u.tenExponent(), math.Abs(x)
	if !ok || n > fewDigits || size > large || size < 1/large || max(exp, -exp) > 100 {
		return decimal{}, false
	}
	r := x * float64(den) / float64(num)
	if exp >= 0 {
		r /= math.Pow10(exp)
	} else {
		r *= math.Pow10(-exp)
	}
	if n <= 0 {
		if u.zero != 0 {
			return decimal{}, false
		}
		d := fromScientific(strconv.FormatFloat(r, 'e', fewDigits-1, 64))
		y, _ := u.value(d)
		return d, y == x
	}
	zero := float64(u.zero) / 100
	slack := (math.Abs(r) + zero) * 0x1p-49 // eleven roundings, of at most 2⁻⁵³ each
	r -= zero
	low := strconv.FormatFloat(r-slack, 'e', n-1, 64)
	high := strconv.FormatFloat(r+slack, 'e', n-1, 64)
	return fromScientific(low), low == high
}

// fewDigits is how many digits decimals may have and yet lie no closer than
// float64s: one that parses to x is the only one, and any shorter one is the
// same with zeros at its end.
const fewDigits = 15

// fewestDigits returns the number of digits to try first: fewDigits, but one
// where float64s lie closer (a scale whose zero is elsewhere) or wider apart
// (subnormal).
func (u *parsedUnit) fewestDigits(x float64) int {
	const smallestNormal = 0x1p-1022
	if u.zero != 0 || math.Abs(x) < smallestNormal {
		return 1
	}
	return fewDigits
}

// maxDigits ends the search for digits: -273.15 °C plus the smallest float64
// takes 1077.
const maxDigits = 1200

// more returns the number of digits to try after n: one more up to 17, which
// settles all but temperatures close to absolute zero.
func more(n int) int {
	if n < 17 {
		return n + 1
	}
	return 2 * n
}

// quotient returns x as a number of units, to far more digits than anyone asks.
func (u *parsedUnit) quotient(x float64) *big.Float {
	prec := uint(320)
	if _, exp := math.Frexp(x); u.zero != 0 && exp < 0 {
		prec += uint(-exp) // so that -273.15 °C plus next to nothing stays apart
	}
	num, den := u.ratio()
	if exp := u.tenExponent(); exp >= 0 {
		num.Mul(num, pow10(exp))
	} else {
		den.Mul(den, pow10(-exp))
	}
	float := func() *big.Float { return new(big.Float).SetPrec(prec) }
	r := float().SetFloat64(x)
	r.Mul(r, float().SetInt(den))
	r.Quo(r, float().SetInt(num))
	zero := float().Quo(float().SetInt64(int64(u.zero)), float().SetInt64(100))
	return r.Sub(r, zero)
}
