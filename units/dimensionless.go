package units

import "gonum.org/v1/gonum/unit"

// Dimensionless is a pure number, a ratio or a fraction.
type Dimensionless float64

// Units of number.
const (
	Percent         Dimensionless = 1e-2
	PerMille        Dimensionless = 1e-3
	PartsPerMillion Dimensionless = 1e-6
	PartsPerBillion Dimensionless = 1e-9
)

// In returns the number as a multiple of u.
func (q Dimensionless) In(u Dimensionless) float64 { return float64(q / u) }

// String returns the number in its SI unit.
func (q Dimensionless) String() string { return text(q) }

// AppendText appends String to b. It refuses NaN and infinities.
func (q Dimensionless) AppendText(b []byte) ([]byte, error) { return appendText(b, q) }

// MarshalText is AppendText to nothing.
func (q Dimensionless) MarshalText() ([]byte, error) { return appendText(nil, q) }

// UnmarshalText is [Parse].
func (q *Dimensionless) UnmarshalText(b []byte) error { return unmarshal(q, b) }

// Dimension implements [Quantity].
func (Dimensionless) Dimension() Dimension { return Dimension{} }

// Unit implements gonum's unit.Uniter.
func (q Dimensionless) Unit() *unit.Unit { return gonum(q) }
