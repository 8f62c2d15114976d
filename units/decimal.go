package units

import (
	"math/big"
	"strconv"
	"strings"
)

// A decimal is a number as people write it, exactly: digits·10^exp. The digits
// have no zero in front; no digits at all are zero.
type decimal struct {
	neg    bool
	digits string
	exp    int
}

// maxDecimalExponent bounds the exponent of a number that is not zero.
const maxDecimalExponent = 20000

// decimal reads a number: 3300, -0.5, .5, 1e21, 1.5×10⁻⁵, 2 x 10^3, 10^21.
func (s *scanner) decimal() (decimal, error) {
	start := s.pos
	var d decimal
	if d.neg = s.minus() != ""; !d.neg {
		s.take("+")
	}
	exp, ok, found := s.powerOfTen()
	fraction := ""
	if found {
		d.digits = "1"
	} else {
		whole := s.digits()
		if s.take(".") {
			fraction = s.digits()
		}
		if whole+fraction == "" {
			s.pos = start
			return d, s.notNumber()
		}
		d.digits = strings.TrimLeft(whole+fraction, "0")
		exp, ok = s.decimalExponent()
	}
	if d.digits == "" { // zero, whatever the exponent
		return d, nil
	}
	if d.exp = exp - len(fraction); !ok {
		return d, outOfRange(s.text, start, s.pos)
	}
	return d, nil
}

// outOfRange returns the error of a number that no float64 is near to.
func outOfRange(text string, start, end int) *ParseError {
	return &ParseError{
		Text: text, Pos: start, Found: text[start:end],
		Expected: "a number that a float64 holds", Err: ErrRange,
	}
}

// notNumber returns the error of a text where a number should stand.
func (s *scanner) notNumber() error {
	word := strings.ToLower(strings.TrimLeft(s.rest(), "+-−"))
	if strings.HasPrefix(word, "nan") || strings.HasPrefix(word, "inf") {
		return s.fail(ErrRange, "a finite number")
	}
	return s.fail(ErrSyntax, "a number")
}

// decimalExponent reads e21, ×10^21 or ×10²¹, or nothing, and reports whether
// the exponent is one that a number may have.
func (s *scanner) decimalExponent() (exp int, ok bool) {
	start := s.pos
	if s.take("e", "E") {
		sign := s.minus()
		if sign == "" {
			s.take("+")
		}
		if digits := s.digits(); digits != "" {
			return exponentValue(sign + digits)
		}
		s.pos = start // the e begins a unit
		return 0, true
	}
	s.space()
	if s.take("×", "x", "·", "⋅", "*") {
		s.space()
		if exp, ok, found := s.powerOfTen(); found {
			return exp, ok
		}
	}
	s.pos = start
	return 0, true
}

// powerOfTen reads 10^21, 10**21 or 10²¹. It reports whether it found one, and
// whether a number may have such an exponent.
func (s *scanner) powerOfTen() (exp int, ok, found bool) {
	ahead := *s
	if ahead.digits() != "10" {
		return 0, false, false
	}
	exponent := ""
	if ahead.take("^", "**") {
		sign := ahead.minus()
		if digits := ahead.digits(); digits != "" {
			exponent = sign + digits
		}
	} else {
		exponent = ahead.superscripts()
	}
	if exponent == "" {
		return 0, false, false
	}
	*s = ahead
	exp, ok = exponentValue(exponent)
	return exp, ok, true
}

func exponentValue(s string) (int, bool) {
	n, err := strconv.Atoi(s)
	return n, err == nil && -maxDecimalExponent <= n && n <= maxDecimalExponent
}

// plusHundredths returns d + z/100. It is exact but for numbers too large or
// too small by far to tell from a float64 sum.
func (d decimal) plusHundredths(z int) decimal {
	const huge, tiny = 400, -1500
	magnitude := len(d.digits) + d.exp
	if z == 0 || magnitude > huge {
		return d
	}
	if d.digits == "" || magnitude < tiny {
		return decimal{digits: strconv.Itoa(z), exp: -2}
	}
	exp := min(d.exp, -2)
	sum := new(big.Int).Mul(d.integer(), pow10(d.exp-exp))
	if d.neg {
		sum.Neg(sum)
	}
	sum.Add(sum, new(big.Int).Mul(big.NewInt(int64(z)), pow10(-2-exp)))
	if sum.Sign() == 0 {
		return decimal{}
	}
	return decimal{neg: sum.Sign() < 0, digits: sum.Abs(sum).String(), exp: exp}
}

// integer returns the digits of a decimal that is not zero.
func (d decimal) integer() *big.Int {
	n, _ := new(big.Int).SetString(d.digits, 10)
	return n
}

func pow10(n int) *big.Int { return new(big.Int).Exp(big.NewInt(10), big.NewInt(int64(n)), nil) }

// fromScientific turns a number as strconv and big write it, d.ddde±dd, into a
// decimal without zeros at its end.
func fromScientific(s string) decimal {
	var d decimal
	s, d.neg = strings.CutPrefix(s, "-")
	mantissa, exp, _ := strings.Cut(s, "e")
	d.exp, _ = strconv.Atoi(exp)
	whole, fraction, _ := strings.Cut(mantissa, ".")
	all := whole + fraction
	d.digits = strings.TrimRight(all, "0")
	d.exp += len(all) - len(d.digits) - len(fraction)
	return d
}

// layout appends the number to b: plain from 1e-4 up to 1e6, else in powers of
// ten. It pads to n significant digits.
func (d decimal) layout(b []byte, n int) []byte {
	digits, magnitude := d.digits, len(d.digits)-1+d.exp // of the first digit
	if digits == "" {
		digits, magnitude = "0", 0
	}
	digits = padRight(digits, n)
	if d.neg {
		b = append(b, '-')
	}
	switch {
	case magnitude < -4 || magnitude >= 6:
		b = appendPoint(b, digits, 1)
		b = append(b, 'e')
		return strconv.AppendInt(b, int64(magnitude), 10)
	case magnitude < 0:
		b = append(b, "0.000"[:1-magnitude]...)
		return append(b, digits...)
	default:
		return appendPoint(b, padRight(digits, magnitude+1), magnitude+1)
	}
}

// padRight appends zeros to s up to a length of n.
func padRight(s string, n int) string {
	if len(s) >= n {
		return s
	}
	return s + strings.Repeat("0", n-len(s))
}

// appendPoint appends the digits with a decimal point behind the first few, if
// there are more.
func appendPoint(b []byte, digits string, few int) []byte {
	b = append(b, digits[:few]...)
	if len(digits) > few {
		b = append(b, '.')
		b = append(b, digits[few:]...)
	}
	return b
}
