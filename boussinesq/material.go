package boussinesq

import (
	"fmt"

	"example.org/overturn/units"
)

// Material holds the constants of the Boussinesq equations at one reference
// state. Make one by a literal, or take it from a [Preset].
type Material struct {
	Name       string // free text
	Conditions string // temperature, pressure, composition; free text
	Source     string // where the values come from; free text

	// Density is ρ₀, the density at ReferenceTemperature.
	Density units.Density

	// ReferenceTemperature is T₀, where Density holds. Only
	// [Material.DensityAt] needs it.
	ReferenceTemperature units.Temperature

	// Expansivity is α, the volume expansion at constant pressure: three
	// times the linear one.
	Expansivity units.Expansivity

	// Conductivity is k, of heat.
	Conductivity units.Conductivity

	// SpecificHeat is c_p, at constant pressure.
	SpecificHeat units.SpecificHeat

	// Viscosity is μ, the dynamic viscosity that enters the Rayleigh number.
	// Where viscosity varies through a layer, this is its reference value.
	Viscosity units.DynamicViscosity

	// BulkModulus is K, at constant entropy: ρ times the square of the speed
	// of sound. Only [Layer.Validity] uses it. Zero means not known.
	BulkModulus units.Pressure

	// Sensitivity says how the other properties change with temperature.
	// Only [Layer.Validity] uses it.
	Sensitivity Sensitivity
}

// Sensitivity holds relative changes of properties per kelvin, d ln x/dT, at
// the reference temperature. Zero means not known.
//
// [ViscousTemperatureScale] gives the one of a thermally activated viscosity:
// minus its inverse.
type Sensitivity struct {
	Viscosity, Expansivity, Conductivity, SpecificHeat units.Expansivity
}

// Check returns an error that names the first field without sense: a constant
// that is not positive and finite.
func (m Material) Check() error {
	return first(
		m.checkThermal(),
		positive("Material.Expansivity", m.Expansivity),
		positive("Material.Viscosity", m.Viscosity),
		notNegative("Material.ReferenceTemperature", m.ReferenceTemperature),
		notNegative("Material.BulkModulus", m.BulkModulus),
		finite("Material.Sensitivity.Viscosity", m.Sensitivity.Viscosity),
		finite("Material.Sensitivity.Expansivity", m.Sensitivity.Expansivity),
		finite("Material.Sensitivity.Conductivity", m.Sensitivity.Conductivity),
		finite("Material.Sensitivity.SpecificHeat", m.Sensitivity.SpecificHeat),
	)
}

// checkThermal checks what the diffusivity is made of.
func (m Material) checkThermal() error {
	return first(
		positive("Material.Density", m.Density),
		positive("Material.Conductivity", m.Conductivity),
		positive("Material.SpecificHeat", m.SpecificHeat),
	)
}

// Diffusivity returns κ = k/(ρ c_p), of heat.
func (m Material) Diffusivity() (units.Diffusivity, error) {
	if err := m.checkThermal(); err != nil {
		return 0, err
	}
	return inRange("diffusivity", m.diffusivity())
}

// KinematicViscosity returns ν = μ/ρ.
func (m Material) KinematicViscosity() (units.KinematicViscosity, error) {
	err := first(positive("Material.Density", m.Density), positive("Material.Viscosity", m.Viscosity))
	if err != nil {
		return 0, err
	}
	return inRange("kinematic viscosity", units.KinematicViscosity(float64(m.Viscosity)/float64(m.Density)))
}

// Prandtl returns Pr = ν/κ = μ c_p/k.
func (m Material) Prandtl() (float64, error) {
	err := first(
		positive("Material.Viscosity", m.Viscosity),
		positive("Material.SpecificHeat", m.SpecificHeat),
		positive("Material.Conductivity", m.Conductivity),
	)
	if err != nil {
		return 0, err
	}
	return inRange("Prandtl number", m.prandtl())
}

// DensityAt returns ρ = ρ₀ (1 − α (T − T₀)), the linear law of the Boussinesq
// approximation. Where it would give no positive density, it is an error.
func (m Material) DensityAt(t units.Temperature) (units.Density, error) {
	err := first(
		positive("Material.Density", m.Density),
		positive("Material.ReferenceTemperature", m.ReferenceTemperature),
		positive("Material.Expansivity", m.Expansivity),
		positive("temperature", t),
	)
	if err != nil {
		return 0, err
	}
	rise := float64(t.Sub(m.ReferenceTemperature))
	rho := m.Density * units.Density(1-float64(m.Expansivity)*rise)
	if rho <= 0 {
		return 0, &FieldError{Field: "temperature", Value: fmt.Sprint(t), Want: "α (T − T₀) < 1"}
	}
	return rho, nil
}

// ViscousTemperatureScale returns R T²/E, the temperature difference over
// which a viscosity that goes as exp(E/(R T)) changes by a factor e near t
// (Davaille & Jaupart 1993). The energy is that of activation.
func ViscousTemperatureScale(energy units.MolarEnergy, t units.Temperature) (units.TemperatureDifference, error) {
	if err := first(positive("activation energy", energy), positive("temperature", t)); err != nil {
		return 0, err
	}
	scale := float64(units.MolarGasConstant) * float64(t) * float64(t) / float64(energy)
	return inRange("viscous temperature scale", units.TemperatureDifference(scale))
}

// diffusivity and prandtl are for materials that are checked.

func (m Material) diffusivity() units.Diffusivity {
	return units.Diffusivity(float64(m.Conductivity) / (float64(m.Density) * float64(m.SpecificHeat)))
}

func (m Material) prandtl() float64 {
	return float64(m.Viscosity) * float64(m.SpecificHeat) / float64(m.Conductivity)
}
