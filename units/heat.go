package units

import "gonum.org/v1/gonum/unit"

// TemperatureGradient is a difference of temperature per distance. Its value is in
// kelvins per metre (K/m).
type TemperatureGradient float64

// Units of temperature gradient.
const (
	KelvinPerMetre     TemperatureGradient = 1
	KelvinPerKilometre TemperatureGradient = 1e-3
)

// In returns the temperature gradient as a multiple of u.
func (q TemperatureGradient) In(u TemperatureGradient) float64 { return float64(q / u) }

// String returns the temperature gradient in its SI unit.
func (q TemperatureGradient) String() string { return text(q) }

// AppendText appends String to b. It refuses NaN and infinities.
func (q TemperatureGradient) AppendText(b []byte) ([]byte, error) { return appendText(b, q) }

// MarshalText is AppendText to nothing.
func (q TemperatureGradient) MarshalText() ([]byte, error) { return appendText(nil, q) }

// UnmarshalText is [Parse].
func (q *TemperatureGradient) UnmarshalText(b []byte) error { return unmarshal(q, b) }

// Dimension implements [Quantity].
func (TemperatureGradient) Dimension() Dimension { return Dimension{Temperature: 1, Length: -1} }

// Unit implements gonum's unit.Uniter.
func (q TemperatureGradient) Unit() *unit.Unit { return gonum(q) }

// Expansivity is the relative change of volume per change of temperature. Its value
// is per kelvin (1/K).
type Expansivity float64

// Units of expansivity.
const (
	PerKelvin Expansivity = 1
)

// In returns the expansivity as a multiple of u.
func (q Expansivity) In(u Expansivity) float64 { return float64(q / u) }

// String returns the expansivity in its SI unit.
func (q Expansivity) String() string { return text(q) }

// AppendText appends String to b. It refuses NaN and infinities.
func (q Expansivity) AppendText(b []byte) ([]byte, error) { return appendText(b, q) }

// MarshalText is AppendText to nothing.
func (q Expansivity) MarshalText() ([]byte, error) { return appendText(nil, q) }

// UnmarshalText is [Parse].
func (q *Expansivity) UnmarshalText(b []byte) error { return unmarshal(q, b) }

// Dimension implements [Quantity].
func (Expansivity) Dimension() Dimension { return Dimension{Temperature: -1} }

// Unit implements gonum's unit.Uniter.
func (q Expansivity) Unit() *unit.Unit { return gonum(q) }

// Conductivity is a thermal conductivity. Its value is in watts per metre and kelvin
// (W/(m K)).
type Conductivity float64

// Units of conductivity.
const (
	WattPerMetreKelvin Conductivity = 1
)

// In returns the conductivity as a multiple of u.
func (q Conductivity) In(u Conductivity) float64 { return float64(q / u) }

// String returns the conductivity in its SI unit.
func (q Conductivity) String() string { return text(q) }

// AppendText appends String to b. It refuses NaN and infinities.
func (q Conductivity) AppendText(b []byte) ([]byte, error) { return appendText(b, q) }

// MarshalText is AppendText to nothing.
func (q Conductivity) MarshalText() ([]byte, error) { return appendText(nil, q) }

// UnmarshalText is [Parse].
func (q *Conductivity) UnmarshalText(b []byte) error { return unmarshal(q, b) }

// Dimension implements [Quantity].
func (Conductivity) Dimension() Dimension {
	return Dimension{Mass: 1, Length: 1, Time: -3, Temperature: -1}
}

// Unit implements gonum's unit.Uniter.
func (q Conductivity) Unit() *unit.Unit { return gonum(q) }

// SpecificHeat is the heat capacity of a unit of mass. Its value is in joules per
// kilogram and kelvin (J/(kg K)).
type SpecificHeat float64

// Units of specific heat.
const (
	JoulePerKilogramKelvin     SpecificHeat = 1
	KilojoulePerKilogramKelvin SpecificHeat = 1e3
	CaloriePerGramKelvin       SpecificHeat = 4184 // thermochemical
)

// In returns the specific heat as a multiple of u.
func (q SpecificHeat) In(u SpecificHeat) float64 { return float64(q / u) }

// String returns the specific heat in its SI unit.
func (q SpecificHeat) String() string { return text(q) }

// AppendText appends String to b. It refuses NaN and infinities.
func (q SpecificHeat) AppendText(b []byte) ([]byte, error) { return appendText(b, q) }

// MarshalText is AppendText to nothing.
func (q SpecificHeat) MarshalText() ([]byte, error) { return appendText(nil, q) }

// UnmarshalText is [Parse].
func (q *SpecificHeat) UnmarshalText(b []byte) error { return unmarshal(q, b) }

// Dimension implements [Quantity].
func (SpecificHeat) Dimension() Dimension { return Dimension{Length: 2, Time: -2, Temperature: -1} }

// Unit implements gonum's unit.Uniter.
func (q SpecificHeat) Unit() *unit.Unit { return gonum(q) }

// HeatFlux is heat flow through a unit of area. Its value is in watts per square
// metre (W/m²).
type HeatFlux float64

// Units of heat flux.
const (
	WattPerSquareMetre      HeatFlux = 1
	MilliwattPerSquareMetre HeatFlux = 1e-3
	HeatFlowUnit            HeatFlux = 41.84e-3 // HFU, 1e-6 cal/(cm² s), thermochemical
)

// In returns the heat flux as a multiple of u.
func (q HeatFlux) In(u HeatFlux) float64 { return float64(q / u) }

// String returns the heat flux in its SI unit.
func (q HeatFlux) String() string { return text(q) }

// AppendText appends String to b. It refuses NaN and infinities.
func (q HeatFlux) AppendText(b []byte) ([]byte, error) { return appendText(b, q) }

// MarshalText is AppendText to nothing.
func (q HeatFlux) MarshalText() ([]byte, error) { return appendText(nil, q) }

// UnmarshalText is [Parse].
func (q *HeatFlux) UnmarshalText(b []byte) error { return unmarshal(q, b) }

// Dimension implements [Quantity].
func (HeatFlux) Dimension() Dimension { return Dimension{Mass: 1, Time: -3} }

// Unit implements gonum's unit.Uniter.
func (q HeatFlux) Unit() *unit.Unit { return gonum(q) }

// VolumetricHeating is heat released in a unit of volume, by radioactivity or by
// viscous dissipation. Its value is in watts per cubic metre (W/m³).
type VolumetricHeating float64

// Units of volumetric heating.
const (
	WattPerCubicMetre      VolumetricHeating = 1
	MicrowattPerCubicMetre VolumetricHeating = 1e-6
	HeatGenerationUnit     VolumetricHeating = 0.4184e-6 // HGU, 1e-13 cal/(cm³ s), thermochemical; definition from memory
)

// In returns the volumetric heating as a multiple of u.
func (q VolumetricHeating) In(u VolumetricHeating) float64 { return float64(q / u) }

// String returns the volumetric heating in its SI unit.
func (q VolumetricHeating) String() string { return text(q) }

// AppendText appends String to b. It refuses NaN and infinities.
func (q VolumetricHeating) AppendText(b []byte) ([]byte, error) { return appendText(b, q) }

// MarshalText is AppendText to nothing.
func (q VolumetricHeating) MarshalText() ([]byte, error) { return appendText(nil, q) }

// UnmarshalText is [Parse].
func (q *VolumetricHeating) UnmarshalText(b []byte) error { return unmarshal(q, b) }

// Dimension implements [Quantity].
func (VolumetricHeating) Dimension() Dimension { return Dimension{Mass: 1, Length: -1, Time: -3} }

// Unit implements gonum's unit.Uniter.
func (q VolumetricHeating) Unit() *unit.Unit { return gonum(q) }

// SpecificHeating is heat released in a unit of mass. Its value is in watts per
// kilogram (W/kg).
type SpecificHeating float64

// Units of specific heating.
const (
	WattPerKilogram     SpecificHeating = 1
	NanowattPerKilogram SpecificHeating = 1e-9
	PicowattPerKilogram SpecificHeating = 1e-12
)

// In returns the specific heating as a multiple of u.
func (q SpecificHeating) In(u SpecificHeating) float64 { return float64(q / u) }

// String returns the specific heating in its SI unit.
func (q SpecificHeating) String() string { return text(q) }

// AppendText appends String to b. It refuses NaN and infinities.
func (q SpecificHeating) AppendText(b []byte) ([]byte, error) { return appendText(b, q) }

// MarshalText is AppendText to nothing.
func (q SpecificHeating) MarshalText() ([]byte, error) { return appendText(nil, q) }

// UnmarshalText is [Parse].
func (q *SpecificHeating) UnmarshalText(b []byte) error { return unmarshal(q, b) }

// Dimension implements [Quantity].
func (SpecificHeating) Dimension() Dimension { return Dimension{Length: 2, Time: -3} }

// Unit implements gonum's unit.Uniter.
func (q SpecificHeating) Unit() *unit.Unit { return gonum(q) }

// HeatTransferCoefficient is a heat flux per difference of temperature. Its value is
// in watts per square metre and kelvin (W/(m² K)).
type HeatTransferCoefficient float64

// Units of heat-transfer coefficient.
const (
	WattPerSquareMetreKelvin HeatTransferCoefficient = 1
)

// In returns the heat-transfer coefficient as a multiple of u.
func (q HeatTransferCoefficient) In(u HeatTransferCoefficient) float64 { return float64(q / u) }

// String returns the heat-transfer coefficient in its SI unit.
func (q HeatTransferCoefficient) String() string { return text(q) }

// AppendText appends String to b. It refuses NaN and infinities.
func (q HeatTransferCoefficient) AppendText(b []byte) ([]byte, error) { return appendText(b, q) }

// MarshalText is AppendText to nothing.
func (q HeatTransferCoefficient) MarshalText() ([]byte, error) { return appendText(nil, q) }

// UnmarshalText is [Parse].
func (q *HeatTransferCoefficient) UnmarshalText(b []byte) error { return unmarshal(q, b) }

// Dimension implements [Quantity].
func (HeatTransferCoefficient) Dimension() Dimension {
	return Dimension{Mass: 1, Time: -3, Temperature: -1}
}

// Unit implements gonum's unit.Uniter.
func (q HeatTransferCoefficient) Unit() *unit.Unit { return gonum(q) }
