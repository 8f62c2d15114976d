package units

import "gonum.org/v1/gonum/unit"

// Mass is an amount of matter by inertia. Its value is in kilograms (kg).
type Mass float64

// Units of mass.
const (
	Gram     Mass = 1e-3
	Kilogram Mass = 1
	Tonne    Mass = 1e3
)

// In returns the mass as a multiple of u.
func (q Mass) In(u Mass) float64 { return float64(q / u) }

// String returns the mass in its SI unit.
func (q Mass) String() string { return text(q) }

// AppendText appends String to b. It refuses NaN and infinities.
func (q Mass) AppendText(b []byte) ([]byte, error) { return appendText(b, q) }

// MarshalText is AppendText to nothing.
func (q Mass) MarshalText() ([]byte, error) { return appendText(nil, q) }

// UnmarshalText is [Parse].
func (q *Mass) UnmarshalText(b []byte) error { return unmarshal(q, b) }

// Dimension implements [Quantity].
func (Mass) Dimension() Dimension { return Dimension{Mass: 1} }

// Unit implements gonum's unit.Uniter.
func (q Mass) Unit() *unit.Unit { return gonum(q) }

// Density is mass per volume. Its value is in kilograms per cubic metre (kg/m³).
type Density float64

// Units of density.
const (
	KilogramPerCubicMetre  Density = 1
	GramPerCubicCentimetre Density = 1e3
)

// In returns the density as a multiple of u.
func (q Density) In(u Density) float64 { return float64(q / u) }

// String returns the density in its SI unit.
func (q Density) String() string { return text(q) }

// AppendText appends String to b. It refuses NaN and infinities.
func (q Density) AppendText(b []byte) ([]byte, error) { return appendText(b, q) }

// MarshalText is AppendText to nothing.
func (q Density) MarshalText() ([]byte, error) { return appendText(nil, q) }

// UnmarshalText is [Parse].
func (q *Density) UnmarshalText(b []byte) error { return unmarshal(q, b) }

// Dimension implements [Quantity].
func (Density) Dimension() Dimension { return Dimension{Mass: 1, Length: -3} }

// Unit implements gonum's unit.Uniter.
func (q Density) Unit() *unit.Unit { return gonum(q) }

// Pressure is a pressure, a stress or an elastic modulus. Its value is in pascals
// (Pa).
type Pressure float64

// Units of pressure.
const (
	Pascal     Pressure = 1
	Kilopascal Pressure = 1e3
	Megapascal Pressure = 1e6
	Gigapascal Pressure = 1e9
	Bar        Pressure = 1e5
	Kilobar    Pressure = 1e8
	Atmosphere Pressure = 101325
)

// In returns the pressure as a multiple of u.
func (q Pressure) In(u Pressure) float64 { return float64(q / u) }

// String returns the pressure in its SI unit.
func (q Pressure) String() string { return text(q) }

// AppendText appends String to b. It refuses NaN and infinities.
func (q Pressure) AppendText(b []byte) ([]byte, error) { return appendText(b, q) }

// MarshalText is AppendText to nothing.
func (q Pressure) MarshalText() ([]byte, error) { return appendText(nil, q) }

// UnmarshalText is [Parse].
func (q *Pressure) UnmarshalText(b []byte) error { return unmarshal(q, b) }

// Dimension implements [Quantity].
func (Pressure) Dimension() Dimension { return Dimension{Mass: 1, Length: -1, Time: -2} }

// Unit implements gonum's unit.Uniter.
func (q Pressure) Unit() *unit.Unit { return gonum(q) }

// ForceDensity is a force per volume: a body force, or a gradient of pressure. Its
// value is in newtons per cubic metre (N/m³).
type ForceDensity float64

// Units of force density.
const (
	NewtonPerCubicMetre    ForceDensity = 1
	PascalPerMetre         ForceDensity = 1
	MegapascalPerKilometre ForceDensity = 1e3
)

// In returns the force density as a multiple of u.
func (q ForceDensity) In(u ForceDensity) float64 { return float64(q / u) }

// String returns the force density in its SI unit.
func (q ForceDensity) String() string { return text(q) }

// AppendText appends String to b. It refuses NaN and infinities.
func (q ForceDensity) AppendText(b []byte) ([]byte, error) { return appendText(b, q) }

// MarshalText is AppendText to nothing.
func (q ForceDensity) MarshalText() ([]byte, error) { return appendText(nil, q) }

// UnmarshalText is [Parse].
func (q *ForceDensity) UnmarshalText(b []byte) error { return unmarshal(q, b) }

// Dimension implements [Quantity].
func (ForceDensity) Dimension() Dimension { return Dimension{Mass: 1, Length: -2, Time: -2} }

// Unit implements gonum's unit.Uniter.
func (q ForceDensity) Unit() *unit.Unit { return gonum(q) }

// DynamicViscosity is stress divided by twice the rate of strain. Its value is in
// pascal seconds (Pa s).
type DynamicViscosity float64

// Units of dynamic viscosity.
const (
	PascalSecond      DynamicViscosity = 1
	MillipascalSecond DynamicViscosity = 1e-3
	Poise             DynamicViscosity = 1e-1
	Centipoise        DynamicViscosity = 1e-3
)

// In returns the dynamic viscosity as a multiple of u.
func (q DynamicViscosity) In(u DynamicViscosity) float64 { return float64(q / u) }

// String returns the dynamic viscosity in its SI unit.
func (q DynamicViscosity) String() string { return text(q) }

// AppendText appends String to b. It refuses NaN and infinities.
func (q DynamicViscosity) AppendText(b []byte) ([]byte, error) { return appendText(b, q) }

// MarshalText is AppendText to nothing.
func (q DynamicViscosity) MarshalText() ([]byte, error) { return appendText(nil, q) }

// UnmarshalText is [Parse].
func (q *DynamicViscosity) UnmarshalText(b []byte) error { return unmarshal(q, b) }

// Dimension implements [Quantity].
func (DynamicViscosity) Dimension() Dimension { return Dimension{Mass: 1, Length: -1, Time: -1} }

// Unit implements gonum's unit.Uniter.
func (q DynamicViscosity) Unit() *unit.Unit { return gonum(q) }
