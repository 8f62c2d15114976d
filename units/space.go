package units

import "gonum.org/v1/gonum/unit"

// Length is a distance or a thickness. Its value is in metres (m).
type Length float64

// Units of length.
const (
	Nanometre  Length = 1e-9
	Micrometre Length = 1e-6
	Millimetre Length = 1e-3
	Centimetre Length = 1e-2
	Metre      Length = 1
	Kilometre  Length = 1e3
)

// In returns the length as a multiple of u.
func (q Length) In(u Length) float64 { return float64(q / u) }

// String returns the length in its SI unit.
func (q Length) String() string { return text(q) }

// AppendText appends String to b. It refuses NaN and infinities.
func (q Length) AppendText(b []byte) ([]byte, error) { return appendText(b, q) }

// MarshalText is AppendText to nothing.
func (q Length) MarshalText() ([]byte, error) { return appendText(nil, q) }

// UnmarshalText is [Parse].
func (q *Length) UnmarshalText(b []byte) error { return unmarshal(q, b) }

// Dimension implements [Quantity].
func (Length) Dimension() Dimension { return Dimension{Length: 1} }

// Unit implements gonum's unit.Uniter.
func (q Length) Unit() *unit.Unit { return gonum(q) }

// Area is the size of a surface. Its value is in square metres (m²).
type Area float64

// Units of area.
const (
	SquareMillimetre Area = 1e-6
	SquareCentimetre Area = 1e-4
	SquareMetre      Area = 1
	SquareKilometre  Area = 1e6
)

// In returns the area as a multiple of u.
func (q Area) In(u Area) float64 { return float64(q / u) }

// String returns the area in its SI unit.
func (q Area) String() string { return text(q) }

// AppendText appends String to b. It refuses NaN and infinities.
func (q Area) AppendText(b []byte) ([]byte, error) { return appendText(b, q) }

// MarshalText is AppendText to nothing.
func (q Area) MarshalText() ([]byte, error) { return appendText(nil, q) }

// UnmarshalText is [Parse].
func (q *Area) UnmarshalText(b []byte) error { return unmarshal(q, b) }

// Dimension implements [Quantity].
func (Area) Dimension() Dimension { return Dimension{Length: 2} }

// Unit implements gonum's unit.Uniter.
func (q Area) Unit() *unit.Unit { return gonum(q) }

// Volume is the size of a body. Its value is in cubic metres (m³).
type Volume float64

// Units of volume.
const (
	CubicCentimetre Volume = 1e-6
	Litre           Volume = 1e-3
	CubicMetre      Volume = 1
	CubicKilometre  Volume = 1e9
)

// In returns the volume as a multiple of u.
func (q Volume) In(u Volume) float64 { return float64(q / u) }

// String returns the volume in its SI unit.
func (q Volume) String() string { return text(q) }

// AppendText appends String to b. It refuses NaN and infinities.
func (q Volume) AppendText(b []byte) ([]byte, error) { return appendText(b, q) }

// MarshalText is AppendText to nothing.
func (q Volume) MarshalText() ([]byte, error) { return appendText(nil, q) }

// UnmarshalText is [Parse].
func (q *Volume) UnmarshalText(b []byte) error { return unmarshal(q, b) }

// Dimension implements [Quantity].
func (Volume) Dimension() Dimension { return Dimension{Length: 3} }

// Unit implements gonum's unit.Uniter.
func (q Volume) Unit() *unit.Unit { return gonum(q) }

// Permeability says how easily a porous medium lets a fluid through. Its value is
// in square metres (m²), so Permeability(1e-14) is 1e-14 m².
type Permeability float64

// Units of permeability.
const (
	Millidarcy Permeability = 1e-10 / 101325
	Darcy      Permeability = 1e-7 / 101325 // 1 cP · 1 cm/s · 1 cm / 1 atm
)

// In returns the permeability as a multiple of u.
func (q Permeability) In(u Permeability) float64 { return float64(q / u) }

// String returns the permeability in its SI unit.
func (q Permeability) String() string { return text(q) }

// AppendText appends String to b. It refuses NaN and infinities.
func (q Permeability) AppendText(b []byte) ([]byte, error) { return appendText(b, q) }

// MarshalText is AppendText to nothing.
func (q Permeability) MarshalText() ([]byte, error) { return appendText(nil, q) }

// UnmarshalText is [Parse].
func (q *Permeability) UnmarshalText(b []byte) error { return unmarshal(q, b) }

// Dimension implements [Quantity].
func (Permeability) Dimension() Dimension { return Dimension{Length: 2} }

// Unit implements gonum's unit.Uniter.
func (q Permeability) Unit() *unit.Unit { return gonum(q) }
