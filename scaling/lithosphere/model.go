package lithosphere

import (
	"fmt"

	"example.org/overturn/boussinesq"
	"example.org/overturn/scaling/internal/check"
	"example.org/overturn/units"
)

// Model is a lithosphere that cools with age: a [HalfSpace] or a [Plate].
type Model interface {
	// Temperature at a depth and an age.
	Temperature(depth units.Length, age units.Time) (units.Temperature, error)
	// HeatFlux through the surface.
	HeatFlux(age units.Time) (units.HeatFlux, error)
	// Thickness is the depth at which the given fraction of the temperature
	// drop is made up, 0.9 say.
	Thickness(fraction float64, age units.Time) (units.Length, error)
	// Subsidence of the surface since age zero.
	Subsidence(age units.Time) (units.Length, error)
	// AgeOfHeatFlux is the inverse of HeatFlux.
	AgeOfHeatFlux(units.HeatFlux) (units.Time, error)
	// AgeOfSubsidence is the inverse of Subsidence.
	AgeOfSubsidence(units.Length) (units.Time, error)
}

// FieldError reports a field, or an argument, whose value makes no sense; its
// fields Package, Field, Value and Want say which and what is allowed.
type FieldError = check.FieldError

// pkg names this package in the errors of its checks.
const pkg = check.In("lithosphere")

// rock is what both models need of a material: no viscosity.
func checkRock(m boussinesq.Material, surface, mantle units.Temperature, overburden units.Density) error {
	err := check.First(
		check.Positive(pkg, "Material.Density", m.Density),
		check.Positive(pkg, "Material.Conductivity", m.Conductivity),
		check.Positive(pkg, "Material.SpecificHeat", m.SpecificHeat),
		check.NotNegative(pkg, "Material.Expansivity", m.Expansivity),
		check.Positive(pkg, "Surface", surface),
		check.Above(pkg, "Mantle", mantle, surface),
		check.NotNegative(pkg, "Overburden", overburden),
	)
	if err == nil && !(overburden < m.Density) {
		err = &FieldError{Package: string(pkg), Field: "Overburden", Value: fmt.Sprint(overburden), Want: "less than the density of the rock"}
	}
	return err
}

func diffusivity(m boussinesq.Material) float64 {
	return float64(m.Conductivity) / (float64(m.Density) * float64(m.SpecificHeat))
}

func checkFraction(f float64) error {
	if f > 0 && f < 1 {
		return nil
	}
	return &FieldError{Package: string(pkg), Field: "fraction", Value: fmt.Sprint(f), Want: "> 0 and < 1"}
}
