package units

import (
	"math"
	"math/big"
	"math/bits"
	"slices"
	"strconv"
	"strings"
)

// factors are the whole numbers that units are made of, besides powers of ten:
// a year is 315576·10² s, a calorie 4184·10⁻³ J. A unit keeps the exponent of
// each, so that products of units are exact whatever their length.
var factors = [...]uint64{
	6,                   // minute
	36,                  // hour
	864,                 // day
	315576,              // Julian year
	5,                   // degree Fahrenheit is 5/9 K
	9,                   //
	18,                  // degree of arc is π/180
	3141592653589793238, // π to 19 digits
	4184,                // thermochemical calorie
	41868,               // international calorie; with pound and °F, British thermal unit
	1602176634,          // electronvolt
	101325,              // atmosphere
	3048,                // foot
	254,                 // inch
	45359237,            // pound
	980665,              // standard gravity
}

// The places of a monomial: the base units in the order of baseUnits, ten, and
// the other factors.
const (
	ten    = len(baseUnits)
	places = ten + 1 + len(factors)
)

// A monomial is a product of powers of base units and of numbers: what the text
// of a unit means, exactly. Exponents count in 1/exponentGrain.
type monomial [places]int32

// Limits of the exponents. They keep arithmetic small whatever the text; that of
// ten leaves room for prefixes.
const (
	maxExponent    = 100
	maxTenExponent = 5000
)

// mul multiplies m by n to the power of sign, which is 1 or -1. It reports
// whether all exponents stay within their limits.
func (m *monomial) mul(n *monomial, sign int32) bool {
	for i := range m {
		m[i] += sign * n[i]
		if !within(i, int64(m[i])) {
			return false
		}
	}
	return true
}

// pow raises m to the power of e/exponentGrain. It reports whether all
// exponents stay within their limits and multiples of 1/exponentGrain.
func (m *monomial) pow(e int32) bool {
	for i := range m {
		p := int64(m[i]) * int64(e)
		if p%exponentGrain != 0 || !within(i, p/exponentGrain) {
			return false
		}
		m[i] = int32(p / exponentGrain)
	}
	return true
}

func within(place int, e int64) bool {
	limit := int64(maxExponent * exponentGrain)
	if place == ten {
		limit = maxTenExponent * exponentGrain
	}
	return -limit <= e && e <= limit
}

func (m *monomial) dimension() Dimension {
	var e [len(baseUnits)]float64
	for i := range e {
		e[i] = float64(m[i]) / exponentGrain
	}
	return dimensionOf(e)
}

// decimal reports whether the monomial is a whole power of ten, apart from its
// base units.
func (m *monomial) decimal() bool {
	for _, e := range m[ten+1:] {
		if e != 0 {
			return false
		}
	}
	return m[ten]%exponentGrain == 0
}

// tenExponent returns the whole part of the exponent of ten.
func (m *monomial) tenExponent() int { return int(m[ten] / exponentGrain) }

// smallRatio returns the number of the monomial as num/den·10^tenExponent, and
// whether that is exact and both fit.
func (m *monomial) smallRatio() (num, den uint64, ok bool) {
	num, den = 1, 1
	if m[ten]%exponentGrain != 0 {
		return 0, 0, false
	}
	for i, e := range m[ten+1:] {
		if e == 0 {
			continue
		}
		if e%exponentGrain != 0 {
			return 0, 0, false
		}
		to := &num
		if e < 0 {
			to, e = &den, -e
		}
		for ; e > 0; e -= exponentGrain {
			hi, lo := bits.Mul64(*to, factors[i])
			if hi != 0 {
				return 0, 0, false
			}
			*to = lo
		}
	}
	return num, den, true
}

// ratio returns the number of the monomial as num/den·10^tenExponent. It is
// exact but for fractional powers, which are those of math.Pow.
func (m *monomial) ratio() (num, den *big.Int) {
	num, den = big.NewInt(1), big.NewInt(1)
	rest := math.Pow(10, float64(m[ten]%exponentGrain)/exponentGrain)
	var power big.Int
	for i, e := range m[ten+1:] {
		base := new(big.Int).SetUint64(factors[i])
		whole := int64(e / exponentGrain)
		power.Exp(base, big.NewInt(max(whole, -whole)), nil)
		if whole < 0 {
			den.Mul(den, &power)
		} else {
			num.Mul(num, &power)
		}
		rest *= math.Pow(float64(factors[i]), float64(e%exponentGrain)/exponentGrain)
	}
	if rest != 1 {
		r := new(big.Rat).SetFloat64(rest)
		num.Mul(num, r.Num())
		den.Mul(den, r.Denom())
	}
	return num, den
}

// numeral returns the monomial that equals d, whose digits must be one of the
// factors and zeros.
func numeral(d decimal) (monomial, bool) {
	var m monomial
	digits := strings.TrimRight(d.digits, "0")
	m[ten] = int32(d.exp+len(d.digits)-len(digits)) * exponentGrain
	if digits == "1" {
		return m, true
	}
	i := slices.IndexFunc(factors[:], func(f uint64) bool { return strconv.FormatUint(f, 10) == digits })
	if i < 0 {
		return m, false
	}
	m[ten+1+i] = exponentGrain
	return m, true
}
