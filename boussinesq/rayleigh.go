package boussinesq

import (
	"fmt"

	"example.org/overturn/units"
)

// Rayleigh returns the Rayleigh number of heating from below between
// isothermal walls (Rayleigh 1916),
//
//	Ra = ρ α g ΔT d³/(κ μ),   ΔT = T(bottom) − T(top).
//
// Where the bottom is not hotter than the top it returns an error that wraps
// [ErrStable]; where the bottom is not isothermal, ask
// [Layer.RayleighFlux].
func (l Layer) Rayleigh() (float64, error) {
	if err := l.Check(); err != nil {
		return 0, err
	}
	if !l.isothermalBottom() {
		return 0, &FieldError{
			Field: "Layer.Bottom", Value: fmt.Sprint(l.Bottom),
			Want: "the temperature of an isothermal bottom",
		}
	}
	if !(l.Bottom > l.Top) {
		return 0, l.stable()
	}
	return l.rayleigh(l.Bottom.Sub(l.Top))
}

// RayleighInternal returns the Rayleigh number of internal heating, built on
// the temperature H d²/k (Roberts 1967, from memory),
//
//	Ra_H = ρ α g H d⁵/(k κ μ).
//
// The conductive drop over an insulating bottom is half of that temperature,
// so the number built on the drop is Ra_H/2.
func (l Layer) RayleighInternal() (float64, error) {
	if err := l.Check(); err != nil {
		return 0, err
	}
	theta, err := l.internalScale()
	if err != nil {
		return 0, err
	}
	return l.rayleigh(theta)
}

// RayleighFlux returns the Rayleigh number of a layer over a bottom of given
// flux, built on the flux that leaves the top (Sparrow, Goldstein & Jonsson
// 1964, from memory, for a layer without heating),
//
//	Ra_q = ρ α g q d⁴/(k κ μ),   q = BottomFlux + H d.
//
// Over an insulating bottom it equals [Layer.RayleighInternal].
func (l Layer) RayleighFlux() (float64, error) {
	if _, err := l.TopFlux(); err != nil {
		return 0, err
	}
	theta, err := l.fluxScale()
	if err != nil {
		return 0, err
	}
	return l.rayleigh(theta)
}

// RayleighOf returns the Rayleigh number of this layer built on another
// temperature difference, such as the superadiabatic one. It may be zero or
// negative.
func (l Layer) RayleighOf(dt units.TemperatureDifference) (float64, error) {
	if err := first(l.Check(), finite("temperature difference", dt)); err != nil {
		return 0, err
	}
	return l.rayleigh(dt)
}

// Prandtl returns Pr = ν/κ = μ c_p/k.
func (l Layer) Prandtl() (float64, error) { return l.Material.Prandtl() }

// Peclet returns the Péclet number v d/κ of a speed: advection against
// conduction of heat.
func (l Layer) Peclet(v units.Velocity) (float64, error) {
	if err := first(l.Check(), notNegative("speed", v)); err != nil {
		return 0, err
	}
	return inRange("Péclet number", float64(v)*float64(l.Depth)/float64(l.Material.diffusivity()))
}

// Reynolds returns the Reynolds number ρ v d/μ of a speed: inertia against
// viscous stress.
func (l Layer) Reynolds(v units.Velocity) (float64, error) {
	if err := first(l.Check(), notNegative("speed", v)); err != nil {
		return 0, err
	}
	m := l.Material
	return inRange("Reynolds number", float64(v)*float64(l.Depth)*float64(m.Density)/float64(m.Viscosity))
}

// Expansion returns α θ, the relative change of density over the layer's
// temperature scale.
func (l Layer) Expansion() (float64, error) {
	theta, err := l.TemperatureScale()
	if err != nil {
		return 0, err
	}
	return inRange("thermal expansion", float64(l.Material.Expansivity)*float64(theta))
}

// FrankKamenetskii returns E ΔT/(R T²), the logarithm of the viscosity
// contrast that the layer's temperature scale makes in a thermally activated
// viscosity linearised at t, commonly the interior temperature (Solomatov
// 1995). The energy is that of activation.
func (l Layer) FrankKamenetskii(energy units.MolarEnergy, t units.Temperature) (float64, error) {
	theta, err := l.TemperatureScale()
	if err != nil {
		return 0, err
	}
	scale, err := ViscousTemperatureScale(energy, t)
	if err != nil {
		return 0, err
	}
	return inRange("Frank-Kamenetskii parameter", float64(theta)/float64(scale))
}

// rayleigh is for a layer that is checked.
func (l Layer) rayleigh(theta units.TemperatureDifference) (float64, error) {
	m, d := l.Material, float64(l.Depth)
	buoyancy := float64(m.Density) * float64(m.Expansivity) * float64(l.Gravity) * float64(theta)
	return inRange("Rayleigh number", buoyancy*d*d*d/(float64(m.diffusivity())*float64(m.Viscosity)))
}
