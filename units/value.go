package units

import (
	"math"
	"math/big"
	"strconv"
)

// value returns the float64 nearest to d units, and whether there is one: it
// must be finite, and zero only if d is.
func (u *parsedUnit) value(d decimal) (float64, bool) {
	d = d.plusHundredths(u.zero)
	x, ok := 0.0, true
	if d.digits != "" {
		x = u.magnitude(d)
		ok = x != 0 && !math.IsInf(x, 0)
	}
	if d.neg {
		x = -x
	}
	return x, ok
}

// magnitude returns the float64 nearest to the digits of d in units.
func (u *parsedUnit) magnitude(d decimal) float64 {
	if u.decimal() {
		x, _ := strconv.ParseFloat(d.digits+"e"+strconv.Itoa(d.exp+u.tenExponent()), 64)
		return x
	}
	if x, ok := u.quick(d); ok {
		return x
	}
	return u.exact(d)
}

// exactInteger bounds the integers that float64 holds exactly.
const exactInteger = 1 << 53

// quick divides two integers that float64 holds exactly: the quotient is then
// rounded once. It reports whether there are such integers.
func (u *parsedUnit) quick(d decimal) (float64, bool) {
	num, den, ok := u.smallRatio()
	mantissa, err := strconv.ParseUint(d.digits, 10, 53)
	exp := d.exp + u.tenExponent()
	if !ok || err != nil || !multiply(&num, mantissa) {
		return 0, false
	}
	scaled := &num
	if exp < 0 {
		scaled, exp = &den, -exp
	}
	for ; exp > 0; exp-- {
		if !multiply(scaled, 10) {
			return 0, false
		}
	}
	return float64(num) / float64(den), den <= exactInteger && num <= exactInteger
}

// multiply multiplies x by f > 0 and reports whether it stays an exact integer.
func multiply(x *uint64, f uint64) bool {
	if *x > exactInteger/f {
		return false
	}
	*x *= f
	return true
}

// exact is magnitude for all other cases.
func (u *parsedUnit) exact(d decimal) float64 {
	num, den := u.ratio()
	num.Mul(num, d.integer())
	if exp := d.exp + u.tenExponent(); exp >= 0 {
		num.Mul(num, pow10(exp))
	} else {
		den.Mul(den, pow10(-exp))
	}
	x, _ := new(big.Rat).SetFrac(num, den).Float64()
	return x
}
