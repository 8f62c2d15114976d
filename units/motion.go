package units

import "gonum.org/v1/gonum/unit"

// secondsPerYear is the length of the Julian year.
const secondsPerYear = 365.25 * 86400

// Time is an age or a duration. Its value is in seconds (s).
//
// A [Year] is the Julian year of 365.25 days, 31 557 600 s, as the IAU uses it;
// the tropical year is shorter by 2e-5 of itself, 365 days by 7e-4.
type Time float64

// Units of time.
const (
	Second   Time = 1
	Minute   Time = 60
	Hour     Time = 3600
	Day      Time = 86400
	Year     Time = secondsPerYear
	Kiloyear Time = 1e3 * Year
	Megayear Time = 1e6 * Year
	Gigayear Time = 1e9 * Year
)

// In returns the time as a multiple of u.
func (q Time) In(u Time) float64 { return float64(q / u) }

// String returns the time in its SI unit.
func (q Time) String() string { return text(q) }

// AppendText appends String to b. It refuses NaN and infinities.
func (q Time) AppendText(b []byte) ([]byte, error) { return appendText(b, q) }

// MarshalText is AppendText to nothing.
func (q Time) MarshalText() ([]byte, error) { return appendText(nil, q) }

// UnmarshalText is [Parse].
func (q *Time) UnmarshalText(b []byte) error { return unmarshal(q, b) }

// Dimension implements [Quantity].
func (Time) Dimension() Dimension { return Dimension{Time: 1} }

// Unit implements gonum's unit.Uniter.
func (q Time) Unit() *unit.Unit { return gonum(q) }

// Velocity is a speed or one component of a velocity. Its value is in metres per
// second (m/s).
type Velocity float64

// Units of velocity.
const (
	MetrePerSecond       Velocity = 1
	CentimetrePerSecond  Velocity = 1e-2
	MillimetrePerSecond  Velocity = 1e-3
	MicrometrePerSecond  Velocity = 1e-6
	MetrePerYear         Velocity = 1 / secondsPerYear
	CentimetrePerYear    Velocity = 1e-2 / secondsPerYear
	MillimetrePerYear    Velocity = 1e-3 / secondsPerYear
	KilometrePerMegayear Velocity = 1e-3 / secondsPerYear // equal to [MillimetrePerYear]
)

// In returns the velocity as a multiple of u.
func (q Velocity) In(u Velocity) float64 { return float64(q / u) }

// String returns the velocity in its SI unit.
func (q Velocity) String() string { return text(q) }

// AppendText appends String to b. It refuses NaN and infinities.
func (q Velocity) AppendText(b []byte) ([]byte, error) { return appendText(b, q) }

// MarshalText is AppendText to nothing.
func (q Velocity) MarshalText() ([]byte, error) { return appendText(nil, q) }

// UnmarshalText is [Parse].
func (q *Velocity) UnmarshalText(b []byte) error { return unmarshal(q, b) }

// Dimension implements [Quantity].
func (Velocity) Dimension() Dimension { return Dimension{Length: 1, Time: -1} }

// Unit implements gonum's unit.Uniter.
func (q Velocity) Unit() *unit.Unit { return gonum(q) }

// Acceleration is a rate of change of velocity, gravity above all. Its value is in
// metres per second squared (m/s²).
type Acceleration float64

// Units of acceleration.
const (
	MetrePerSecondSquared Acceleration = 1
	Gal                   Acceleration = 1e-2 // of gravimetry, 1 cm/s²
	Milligal              Acceleration = 1e-5
)

// In returns the acceleration as a multiple of u.
func (q Acceleration) In(u Acceleration) float64 { return float64(q / u) }

// String returns the acceleration in its SI unit.
func (q Acceleration) String() string { return text(q) }

// AppendText appends String to b. It refuses NaN and infinities.
func (q Acceleration) AppendText(b []byte) ([]byte, error) { return appendText(b, q) }

// MarshalText is AppendText to nothing.
func (q Acceleration) MarshalText() ([]byte, error) { return appendText(nil, q) }

// UnmarshalText is [Parse].
func (q *Acceleration) UnmarshalText(b []byte) error { return unmarshal(q, b) }

// Dimension implements [Quantity].
func (Acceleration) Dimension() Dimension { return Dimension{Length: 1, Time: -2} }

// Unit implements gonum's unit.Uniter.
func (q Acceleration) Unit() *unit.Unit { return gonum(q) }

// StrainRate is a rate of deformation, or any other rate. Its value is per second
// (1/s).
type StrainRate float64

// Units of strain rate.
const (
	PerSecond   StrainRate = 1
	PerYear     StrainRate = 1 / secondsPerYear
	PerMegayear StrainRate = 1e-6 / secondsPerYear
)

// In returns the strain rate as a multiple of u.
func (q StrainRate) In(u StrainRate) float64 { return float64(q / u) }

// String returns the strain rate in its SI unit.
func (q StrainRate) String() string { return text(q) }

// AppendText appends String to b. It refuses NaN and infinities.
func (q StrainRate) AppendText(b []byte) ([]byte, error) { return appendText(b, q) }

// MarshalText is AppendText to nothing.
func (q StrainRate) MarshalText() ([]byte, error) { return appendText(nil, q) }

// UnmarshalText is [Parse].
func (q *StrainRate) UnmarshalText(b []byte) error { return unmarshal(q, b) }

// Dimension implements [Quantity].
func (StrainRate) Dimension() Dimension { return Dimension{Time: -1} }

// Unit implements gonum's unit.Uniter.
func (q StrainRate) Unit() *unit.Unit { return gonum(q) }

// Diffusivity is a thermal diffusivity; a stream function in two dimensions has the
// same unit. Its value is in square metres per second (m²/s).
type Diffusivity float64

// Units of diffusivity.
const (
	SquareMetrePerSecond      Diffusivity = 1
	SquareMillimetrePerSecond Diffusivity = 1e-6
)

// In returns the diffusivity as a multiple of u.
func (q Diffusivity) In(u Diffusivity) float64 { return float64(q / u) }

// String returns the diffusivity in its SI unit.
func (q Diffusivity) String() string { return text(q) }

// AppendText appends String to b. It refuses NaN and infinities.
func (q Diffusivity) AppendText(b []byte) ([]byte, error) { return appendText(b, q) }

// MarshalText is AppendText to nothing.
func (q Diffusivity) MarshalText() ([]byte, error) { return appendText(nil, q) }

// UnmarshalText is [Parse].
func (q *Diffusivity) UnmarshalText(b []byte) error { return unmarshal(q, b) }

// Dimension implements [Quantity].
func (Diffusivity) Dimension() Dimension { return Dimension{Length: 2, Time: -1} }

// Unit implements gonum's unit.Uniter.
func (q Diffusivity) Unit() *unit.Unit { return gonum(q) }

// KinematicViscosity is a dynamic viscosity divided by a density. Its value is in
// square metres per second (m²/s), so KinematicViscosity(1e-6) is 1e-6 m²/s.
type KinematicViscosity float64

// Units of kinematic viscosity.
const (
	Stokes      KinematicViscosity = 1e-4
	Centistokes KinematicViscosity = 1e-6 // 1 mm²/s
)

// In returns the kinematic viscosity as a multiple of u.
func (q KinematicViscosity) In(u KinematicViscosity) float64 { return float64(q / u) }

// String returns the kinematic viscosity in its SI unit.
func (q KinematicViscosity) String() string { return text(q) }

// AppendText appends String to b. It refuses NaN and infinities.
func (q KinematicViscosity) AppendText(b []byte) ([]byte, error) { return appendText(b, q) }

// MarshalText is AppendText to nothing.
func (q KinematicViscosity) MarshalText() ([]byte, error) { return appendText(nil, q) }

// UnmarshalText is [Parse].
func (q *KinematicViscosity) UnmarshalText(b []byte) error { return unmarshal(q, b) }

// Dimension implements [Quantity].
func (KinematicViscosity) Dimension() Dimension { return Dimension{Length: 2, Time: -1} }

// Unit implements gonum's unit.Uniter.
func (q KinematicViscosity) Unit() *unit.Unit { return gonum(q) }
