package boussinesq

import (
	"fmt"
	"strings"

	"example.org/overturn/units"
)

// Scales converts between quantities and the dimensionless numbers of a
// model of one [Layer]. For each quantity there is a pair of methods:
//
//	s.Velocity(83.2)    // a units.Velocity, from a dimensionless number
//	s.FromVelocity(v)   // the dimensionless number, from a units.Velocity
//
// With depth d, diffusivity κ, temperature scale θ, conductivity k, viscosity
// μ and density ρ of the layer, the units of the dimensionless numbers are:
//
//	length d            stress, pressure    μκ/d²    heat flux    kθ/d
//	time d²/κ           strain rate         κ/d²     heating      kθ/d²
//	velocity κ/d        viscosity           μ        dissipation  μκ²/d⁴
//	temperature θ       stream function     κ        body force   μκ/d³
//
// A number goes to its quantity and back to within one unit in the last
// place; temperature does so relative to the absolute temperature. A factor of
// two in a unit is exact.
//
// [Layer.Scales] makes the only useful Scales, and checks that each of these
// units is a positive number.
type Scales struct {
	length      units.Length
	time        units.Time
	velocity    units.Velocity
	temperature units.TemperatureDifference
	top         units.Temperature
	heatFlux    units.HeatFlux
	heating     units.VolumetricHeating
	stress      units.Pressure
	strainRate  units.StrainRate
	viscosity   units.DynamicViscosity
	diffusivity units.Diffusivity
	conductance units.HeatTransferCoefficient
	dissipation units.VolumetricHeating
	bodyForce   units.ForceDensity
	anomaly     units.Density
	topography  units.Length
	rayleigh    float64
}

// Scales returns the scales of the layer, on the temperature scale of
// [Layer.TemperatureScale].
func (l Layer) Scales() (Scales, error) {
	theta, err := l.TemperatureScale()
	if err != nil {
		return Scales{}, err
	}
	m := l.Material
	d, kappa, mu := float64(l.Depth), float64(m.diffusivity()), float64(m.Viscosity)
	rate := kappa / d / d
	stress := mu * rate
	flux := float64(m.Conductivity) * float64(theta) / d
	ra, err := l.rayleigh(theta)
	if err != nil {
		return Scales{}, err
	}
	s := Scales{
		length:      l.Depth,
		time:        units.Time(d / kappa * d),
		velocity:    units.Velocity(kappa / d),
		temperature: theta,
		top:         l.Top,
		heatFlux:    units.HeatFlux(flux),
		heating:     units.VolumetricHeating(flux / d),
		stress:      units.Pressure(stress),
		strainRate:  units.StrainRate(rate),
		viscosity:   m.Viscosity,
		diffusivity: m.diffusivity(),
		conductance: units.HeatTransferCoefficient(float64(m.Conductivity) / d),
		dissipation: units.VolumetricHeating(stress * rate),
		bodyForce:   units.ForceDensity(stress / d),
		anomaly:     m.Density * units.Density(float64(m.Expansivity)*float64(theta)),
		topography:  units.Length(stress / (float64(m.Density) * float64(l.Gravity))),
		rayleigh:    ra,
	}
	if err := s.check(); err != nil {
		return Scales{}, err
	}
	return s, nil
}

// check guards against scales that overflow or vanish though each field of the
// layer is allowed.
func (s Scales) check() error {
	return first(
		positive("scale of time", s.time),
		positive("scale of velocity", s.velocity),
		positive("scale of heat flux", s.heatFlux),
		positive("scale of volumetric heating", s.heating),
		positive("scale of stress", s.stress),
		positive("scale of strain rate", s.strainRate),
		positive("scale of diffusivity", s.diffusivity),
		positive("scale of heat transfer", s.conductance),
		positive("scale of dissipation", s.dissipation),
		positive("scale of body force", s.bodyForce),
		positive("scale of density anomaly", s.anomaly),
		positive("scale of topography", s.topography),
	)
}

// Rayleigh returns the Rayleigh number on these scales: the factor of the
// dimensionless temperature in the dimensionless buoyancy.
func (s Scales) Rayleigh() float64 { return s.rayleigh }

// Length returns x d.
func (s Scales) Length(x float64) units.Length { return units.Length(x) * s.length }

// FromLength is the inverse of [Scales.Length].
func (s Scales) FromLength(q units.Length) float64 { return float64(q / s.length) }

// Time returns x d²/κ.
func (s Scales) Time(x float64) units.Time { return units.Time(x) * s.time }

// FromTime is the inverse of [Scales.Time].
func (s Scales) FromTime(q units.Time) float64 { return float64(q / s.time) }

// Velocity returns x κ/d.
func (s Scales) Velocity(x float64) units.Velocity { return units.Velocity(x) * s.velocity }

// FromVelocity is the inverse of [Scales.Velocity].
func (s Scales) FromVelocity(q units.Velocity) float64 { return float64(q / s.velocity) }

// Temperature returns the absolute temperature T(top) + x θ.
func (s Scales) Temperature(x float64) units.Temperature {
	return s.top.Add(s.TemperatureDifference(x))
}

// FromTemperature is the inverse of [Scales.Temperature]: 0 at the top.
func (s Scales) FromTemperature(q units.Temperature) float64 {
	return s.FromTemperatureDifference(q.Sub(s.top))
}

// TemperatureDifference returns x θ.
func (s Scales) TemperatureDifference(x float64) units.TemperatureDifference {
	return units.TemperatureDifference(x) * s.temperature
}

// FromTemperatureDifference is the inverse of [Scales.TemperatureDifference].
func (s Scales) FromTemperatureDifference(q units.TemperatureDifference) float64 {
	return float64(q / s.temperature)
}

// HeatFlux returns x kθ/d. Where θ is the drop between isothermal walls, the
// dimensionless flux of the whole layer is its Nusselt number.
func (s Scales) HeatFlux(x float64) units.HeatFlux { return units.HeatFlux(x) * s.heatFlux }

// FromHeatFlux is the inverse of [Scales.HeatFlux].
func (s Scales) FromHeatFlux(q units.HeatFlux) float64 { return float64(q / s.heatFlux) }

// VolumetricHeating returns x kθ/d², the heat made per volume and time. Its
// inverse makes the source of a dimensionless model of [Layer.Heating].
func (s Scales) VolumetricHeating(x float64) units.VolumetricHeating {
	return units.VolumetricHeating(x) * s.heating
}

// FromVolumetricHeating is the inverse of [Scales.VolumetricHeating].
func (s Scales) FromVolumetricHeating(q units.VolumetricHeating) float64 {
	return float64(q / s.heating)
}

// HeatTransfer returns x k/d, the coefficient of a wall of Biot number x.
func (s Scales) HeatTransfer(x float64) units.HeatTransferCoefficient {
	return units.HeatTransferCoefficient(x) * s.conductance
}

// FromHeatTransfer is the inverse of [Scales.HeatTransfer].
func (s Scales) FromHeatTransfer(q units.HeatTransferCoefficient) float64 {
	return float64(q / s.conductance)
}

// Stress returns x μκ/d²; pressure is a stress.
func (s Scales) Stress(x float64) units.Pressure { return units.Pressure(x) * s.stress }

// FromStress is the inverse of [Scales.Stress].
func (s Scales) FromStress(q units.Pressure) float64 { return float64(q / s.stress) }

// StrainRate returns x κ/d². Growth rates have this unit too.
func (s Scales) StrainRate(x float64) units.StrainRate { return units.StrainRate(x) * s.strainRate }

// FromStrainRate is the inverse of [Scales.StrainRate].
func (s Scales) FromStrainRate(q units.StrainRate) float64 { return float64(q / s.strainRate) }

// Viscosity returns x μ, with the reference viscosity μ of the material.
func (s Scales) Viscosity(x float64) units.DynamicViscosity {
	return units.DynamicViscosity(x) * s.viscosity
}

// FromViscosity is the inverse of [Scales.Viscosity].
func (s Scales) FromViscosity(q units.DynamicViscosity) float64 { return float64(q / s.viscosity) }

// StreamFunction returns x κ: the flow between two points of a plane, as area
// per time, that is volume per time and per length along the roll.
func (s Scales) StreamFunction(x float64) units.Diffusivity {
	return units.Diffusivity(x) * s.diffusivity
}

// FromStreamFunction is the inverse of [Scales.StreamFunction].
func (s Scales) FromStreamFunction(q units.Diffusivity) float64 { return float64(q / s.diffusivity) }

// Dissipation returns x μκ²/d⁴, the mechanical power turned to heat per
// volume. Heating has another scale, [Scales.VolumetricHeating]; in terms of
// that one, dissipation is x Di/Ra.
func (s Scales) Dissipation(x float64) units.VolumetricHeating {
	return units.VolumetricHeating(x) * s.dissipation
}

// FromDissipation is the inverse of [Scales.Dissipation].
func (s Scales) FromDissipation(q units.VolumetricHeating) float64 {
	return float64(q / s.dissipation)
}

// BodyForce returns x μκ/d³, a force per volume. The buoyancy of a
// dimensionless temperature T is BodyForce(Ra T) with Ra of
// [Scales.Rayleigh].
func (s Scales) BodyForce(x float64) units.ForceDensity { return units.ForceDensity(x) * s.bodyForce }

// FromBodyForce is the inverse of [Scales.BodyForce].
func (s Scales) FromBodyForce(q units.ForceDensity) float64 { return float64(q / s.bodyForce) }

// DensityAnomaly returns −ρ α θ x, the density of fluid of dimensionless
// temperature x less that of fluid at the top temperature.
func (s Scales) DensityAnomaly(x float64) units.Density { return -units.Density(x) * s.anomaly }

// FromDensityAnomaly is the inverse of [Scales.DensityAnomaly].
func (s Scales) FromDensityAnomaly(q units.Density) float64 { return float64(-q / s.anomaly) }

// Topography returns x μκ/(d² ρ g), the height to which an upward normal
// stress x lifts a free top against its own weight under air or vacuum. Below
// another fluid, scale it by ρ over the difference of densities.
func (s Scales) Topography(x float64) units.Length { return units.Length(x) * s.topography }

// FromTopography is the inverse of [Scales.Topography].
func (s Scales) FromTopography(q units.Length) float64 { return float64(q / s.topography) }

// String returns the scales one a line, in SI units.
func (s Scales) String() string {
	var b strings.Builder
	for _, row := range []struct {
		name  string
		value fmt.Stringer
	}{
		{"length", s.length},
		{"time", s.time},
		{"velocity", s.velocity},
		{"temperature", s.temperature},
		{"heat flux", s.heatFlux},
		{"heating", s.heating},
		{"stress", s.stress},
		{"strain rate", s.strainRate},
		{"viscosity", s.viscosity},
		{"stream function", s.diffusivity},
		{"dissipation", s.dissipation},
		{"body force", s.bodyForce},
	} {
		fmt.Fprintf(&b, "%-16s %v\n", row.name, row.value)
	}
	return b.String()
}
