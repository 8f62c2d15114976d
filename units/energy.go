package units

import "gonum.org/v1/gonum/unit"

// Energy is work or heat. Its value is in joules (J).
type Energy float64

// Units of energy.
const (
	Joule        Energy = 1
	Kilojoule    Energy = 1e3
	Megajoule    Energy = 1e6
	Erg          Energy = 1e-7
	Calorie      Energy = 4.184           // thermochemical
	Electronvolt Energy = 1.602176634e-19 // exact in the SI of 2019
)

// In returns the energy as a multiple of u.
func (q Energy) In(u Energy) float64 { return float64(q / u) }

// String returns the energy in its SI unit.
func (q Energy) String() string { return text(q) }

// AppendText appends String to b. It refuses NaN and infinities.
func (q Energy) AppendText(b []byte) ([]byte, error) { return appendText(b, q) }

// MarshalText is AppendText to nothing.
func (q Energy) MarshalText() ([]byte, error) { return appendText(nil, q) }

// UnmarshalText is [Parse].
func (q *Energy) UnmarshalText(b []byte) error { return unmarshal(q, b) }

// Dimension implements [Quantity].
func (Energy) Dimension() Dimension { return Dimension{Mass: 1, Length: 2, Time: -2} }

// Unit implements gonum's unit.Uniter.
func (q Energy) Unit() *unit.Unit { return gonum(q) }

// Power is energy per time, such as the heat loss of a body. Its value is in watts
// (W).
type Power float64

// Units of power.
const (
	Watt     Power = 1
	Kilowatt Power = 1e3
	Megawatt Power = 1e6
	Gigawatt Power = 1e9
	Terawatt Power = 1e12
)

// In returns the power as a multiple of u.
func (q Power) In(u Power) float64 { return float64(q / u) }

// String returns the power in its SI unit.
func (q Power) String() string { return text(q) }

// AppendText appends String to b. It refuses NaN and infinities.
func (q Power) AppendText(b []byte) ([]byte, error) { return appendText(b, q) }

// MarshalText is AppendText to nothing.
func (q Power) MarshalText() ([]byte, error) { return appendText(nil, q) }

// UnmarshalText is [Parse].
func (q *Power) UnmarshalText(b []byte) error { return unmarshal(q, b) }

// Dimension implements [Quantity].
func (Power) Dimension() Dimension { return Dimension{Mass: 1, Length: 2, Time: -3} }

// Unit implements gonum's unit.Uniter.
func (q Power) Unit() *unit.Unit { return gonum(q) }

// SpecificEnergy is energy per mass, such as a latent heat. Its value is in joules per
// kilogram (J/kg).
type SpecificEnergy float64

// Units of specific energy.
const (
	JoulePerKilogram     SpecificEnergy = 1
	KilojoulePerKilogram SpecificEnergy = 1e3
)

// In returns the specific energy as a multiple of u.
func (q SpecificEnergy) In(u SpecificEnergy) float64 { return float64(q / u) }

// String returns the specific energy in its SI unit.
func (q SpecificEnergy) String() string { return text(q) }

// AppendText appends String to b. It refuses NaN and infinities.
func (q SpecificEnergy) AppendText(b []byte) ([]byte, error) { return appendText(b, q) }

// MarshalText is AppendText to nothing.
func (q SpecificEnergy) MarshalText() ([]byte, error) { return appendText(nil, q) }

// UnmarshalText is [Parse].
func (q *SpecificEnergy) UnmarshalText(b []byte) error { return unmarshal(q, b) }

// Dimension implements [Quantity].
func (SpecificEnergy) Dimension() Dimension { return Dimension{Length: 2, Time: -2} }

// Unit implements gonum's unit.Uniter.
func (q SpecificEnergy) Unit() *unit.Unit { return gonum(q) }

// MolarEnergy is energy per amount of substance, such as an activation energy. Its
// value is in joules per mole (J/mol).
type MolarEnergy float64

// Units of molar energy.
const (
	JoulePerMole            MolarEnergy = 1
	KilojoulePerMole        MolarEnergy = 1e3
	ElectronvoltPerParticle MolarEnergy = ElementaryCharge * AvogadroConstant // about 96 485 J/mol
)

// In returns the molar energy as a multiple of u.
func (q MolarEnergy) In(u MolarEnergy) float64 { return float64(q / u) }

// String returns the molar energy in its SI unit.
func (q MolarEnergy) String() string { return text(q) }

// AppendText appends String to b. It refuses NaN and infinities.
func (q MolarEnergy) AppendText(b []byte) ([]byte, error) { return appendText(b, q) }

// MarshalText is AppendText to nothing.
func (q MolarEnergy) MarshalText() ([]byte, error) { return appendText(nil, q) }

// UnmarshalText is [Parse].
func (q *MolarEnergy) UnmarshalText(b []byte) error { return unmarshal(q, b) }

// Dimension implements [Quantity].
func (MolarEnergy) Dimension() Dimension { return Dimension{Mass: 1, Length: 2, Time: -2, Amount: -1} }

// Unit implements gonum's unit.Uniter.
func (q MolarEnergy) Unit() *unit.Unit { return gonum(q) }

// MolarVolume is volume per amount of substance, such as an activation volume. Its
// value is in cubic metres per mole (m³/mol).
type MolarVolume float64

// Units of molar volume.
const (
	CubicMetrePerMole      MolarVolume = 1
	CubicCentimetrePerMole MolarVolume = 1e-6
)

// In returns the molar volume as a multiple of u.
func (q MolarVolume) In(u MolarVolume) float64 { return float64(q / u) }

// String returns the molar volume in its SI unit.
func (q MolarVolume) String() string { return text(q) }

// AppendText appends String to b. It refuses NaN and infinities.
func (q MolarVolume) AppendText(b []byte) ([]byte, error) { return appendText(b, q) }

// MarshalText is AppendText to nothing.
func (q MolarVolume) MarshalText() ([]byte, error) { return appendText(nil, q) }

// UnmarshalText is [Parse].
func (q *MolarVolume) UnmarshalText(b []byte) error { return unmarshal(q, b) }

// Dimension implements [Quantity].
func (MolarVolume) Dimension() Dimension { return Dimension{Length: 3, Amount: -1} }

// Unit implements gonum's unit.Uniter.
func (q MolarVolume) Unit() *unit.Unit { return gonum(q) }
