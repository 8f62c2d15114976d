package scaling

import (
	"fmt"
	"math"
	"strings"

	"example.org/overturn/scaling/internal/check"
)

// Law is a scaling law as a value: what it says, where it holds and who says
// so. Take one from a constructor such as [HowardCycle], find some with [Find],
// or write a literal for a law of your own. A Law is not changed by its methods
// and is safe for concurrent use.
type Law struct {
	Name    string // the name of the trade
	Formula string // as text, in the symbols of [Groups]

	Quantity Quantity // what the formula gives
	Geometry Geometry
	Walls    Walls
	Heating  Heating
	Rheology Rheology
	Flow     Flow

	// Basis is the Rayleigh number that the exponent belongs to.
	Basis Group

	// Needs lists the groups that the formula uses.
	Needs []Group

	// Limits is the range of validity. A limit on a group that the formula does
	// not use is tested where that group is given.
	Limits []Limit

	Source string // author, year
	Status Status // how well the source is known to us
	Note   string // accuracy, cautions; may be empty

	// A law that is a product of powers is Prefactor · Π group^exponent; no
	// Value is needed then. A law that is a power of Basis with a prefactor
	// that depends on other groups in another way lists the powers and has a
	// Value. A law with neither Prefactor nor Value is known by its exponent
	// only.
	Prefactor float64
	Powers    []Power

	// Value is the formula, without any check.
	Value func(Groups) float64
}

// Power is one factor group^Exponent.
type Power struct {
	Group    Group
	Exponent float64
}

// Limit is a range of one group; Max may be +Inf.
type Limit struct {
	Group    Group
	Min, Max float64
}

func (l Limit) interval() string {
	switch {
	case math.IsInf(l.Max, 1):
		return fmt.Sprintf(">= %.4g", l.Min)
	case l.Min == 0:
		return fmt.Sprintf("<= %.4g", l.Max)
	default:
		return fmt.Sprintf("%.4g to %.4g", l.Min, l.Max)
	}
}

func (l Limit) holds(x float64) bool { return x >= l.Min && x <= l.Max }

// At evaluates the law. Outside its range it returns the value together with an
// error that wraps [ErrOutOfRange]; a group that is needed and not given is an
// error that wraps [ErrMissing]; a formula without a finite value, one that
// wraps [ErrNoValue].
func (l Law) At(v Groups) (float64, error) {
	if err := l.check(v); err != nil {
		return 0, err
	}
	x := l.Evaluate(v)
	if math.IsNaN(x) || math.IsInf(x, 0) {
		return 0, fmt.Errorf("scaling: %s: %w", l.Name, ErrNoValue)
	}
	return x, l.InRange(v)
}

// check tests everything but the range.
func (l Law) check(v Groups) error {
	if l.exponentOnly() {
		return fmt.Errorf("scaling: %s: %w", l.Name, ErrExponentOnly)
	}
	if err := v.Check(); err != nil {
		return err
	}
	for _, g := range l.Needs {
		if g.Of(v) == 0 && g != Inclination {
			return &FieldError{Package: string(pkg), Field: "Groups: " + g.String(), Value: "0", Want: "> 0 for " + l.Name, Err: ErrMissing}
		}
	}
	return nil
}

func (l Law) exponentOnly() bool { return l.Value == nil && l.Prefactor == 0 }

// Evaluate returns the bare value of the formula: no check, no allocation, for
// use in loops whose input is known to be good. It is NaN where a group that it
// needs makes no sense, and for a law of which only the exponent is known.
func (l Law) Evaluate(v Groups) float64 {
	if l.Value != nil {
		return l.Value(v)
	}
	if l.Prefactor == 0 {
		return math.NaN()
	}
	x := l.Prefactor
	for _, p := range l.Powers {
		x *= power(p.Group.Of(v), p.Exponent)
	}
	return x
}

// power is math.Pow with the roots that have functions of their own, which are
// several times faster and correctly rounded.
func power(x, exponent float64) float64 {
	switch exponent {
	case 1.0 / 3:
		return math.Cbrt(x)
	case 0.5:
		return math.Sqrt(x)
	case 0.25:
		return math.Sqrt(math.Sqrt(x))
	}
	return math.Pow(x, exponent)
}

// InRange returns nil, or a [*RangeError] with all groups that are outside the
// range of the law.
func (l Law) InRange(v Groups) error {
	var out []Violation
	for _, limit := range l.Limits {
		x := limit.Group.Of(v)
		if x == 0 && limit.Group != Inclination {
			continue // not given
		}
		if !limit.holds(x) {
			out = append(out, Violation{limit, x})
		}
	}
	if out == nil {
		return nil
	}
	return &RangeError{Law: l.Name, Violations: out}
}

// Holds reports whether InRange would return nil, without allocating.
func (l Law) Holds(v Groups) bool {
	for _, limit := range l.Limits {
		x := limit.Group.Of(v)
		if (x != 0 || limit.Group == Inclination) && !limit.holds(x) {
			return false
		}
	}
	return true
}

// Exponent returns the exponent of Basis in a law that is a power of it.
func (l Law) Exponent() (exponent float64, ok bool) {
	for _, p := range l.Powers {
		if p.Group == l.Basis {
			return p.Exponent, true
		}
	}
	return 0, false
}

// Local returns the power law, value = prefactor · Basis^exponent, that touches
// the law at v: the law itself where it is a power of Basis, a tangent in
// logarithms elsewhere. Range errors are as in [Law.At].
func (l Law) Local(v Groups) (prefactor, exponent float64, err error) {
	x, err := l.At(v)
	if x == 0 {
		return 0, 0, err
	}
	basis := l.Basis.Of(v)
	exponent, ok := l.Exponent()
	if !ok {
		const step = 1e-4
		up := l.Evaluate(v.with(l.Basis, basis*math.Exp(step)))
		down := l.Evaluate(v.with(l.Basis, basis*math.Exp(-step)))
		exponent = math.Log(up/down) / (2 * step)
	}
	prefactor = x / math.Pow(basis, exponent)
	if e := check.First(check.Finite(pkg, "local exponent of "+l.Name, exponent), check.Positive(pkg, "local prefactor of "+l.Name, prefactor)); e != nil {
		return 0, 0, e
	}
	return prefactor, exponent, err
}

// String returns name, formula, range and source on one line.
func (l Law) String() string {
	var b strings.Builder
	fmt.Fprintf(&b, "%s: %s", l.Name, l.Formula)
	for i, limit := range l.Limits {
		sep := "; "
		if i > 0 {
			sep = ", "
		}
		fmt.Fprintf(&b, "%s%v %s", sep, limit.Group, limit.interval())
	}
	fmt.Fprintf(&b, "; %s (%v)", l.Source, l.Status)
	return b.String()
}
