package boussinesq

import (
	"math"

	"example.org/overturn/units"
)

// DissipationNumber returns Di = α g d/c_p: the depth of the layer in
// adiabatic scale heights, and the share of the heat flow that viscous heating
// reaches (Spiegel & Veronis 1960; Jarvis & McKenzie 1980). The Boussinesq
// approximation takes it for zero.
func (l Layer) DissipationNumber() (float64, error) {
	if err := l.Check(); err != nil {
		return 0, err
	}
	return inRange("dissipation number", l.dissipationNumber())
}

// AdiabaticGradient returns α g T/c_p, the rate at which temperature rises
// with depth in a well-mixed layer, where it is t.
func (l Layer) AdiabaticGradient(t units.Temperature) (units.TemperatureGradient, error) {
	if err := first(l.Check(), positive("temperature", t)); err != nil {
		return 0, err
	}
	return inRange("adiabatic gradient", units.TemperatureGradient(float64(t)*l.adiabaticRate()))
}

// Adiabat returns the temperature at a depth below the top on the adiabat that
// starts there at t: t exp(α g z/c_p), with constant properties. The depth is
// measured downwards and may be outside the layer.
func (l Layer) Adiabat(t units.Temperature, depth units.Length) (units.Temperature, error) {
	if err := first(l.Check(), positive("temperature", t), finite("depth", depth)); err != nil {
		return 0, err
	}
	return inRange("adiabat", units.Temperature(float64(t)*math.Exp(float64(depth)*l.adiabaticRate())))
}

// AdiabaticDrop returns how much temperature rises from top to bottom on the
// adiabat that starts at t, the potential temperature of the interior.
func (l Layer) AdiabaticDrop(t units.Temperature) (units.TemperatureDifference, error) {
	if err := first(l.Check(), positive("temperature", t)); err != nil {
		return 0, err
	}
	return inRange("adiabatic drop", l.adiabaticDrop(t))
}

// SuperadiabaticDrop returns the part of the drop between isothermal walls
// that drives convection: ΔT minus the adiabatic drop of an interior of
// potential temperature t (Jeffreys 1930). Where it is negative the layer is
// stable. [Layer.RayleighOf] makes it a Rayleigh number.
func (l Layer) SuperadiabaticDrop(t units.Temperature) (units.TemperatureDifference, error) {
	adiabatic, err := l.AdiabaticDrop(t)
	if err != nil {
		return 0, err
	}
	drop, err := l.TemperatureDrop()
	if err != nil {
		return 0, err
	}
	return drop - adiabatic, nil
}

// What follows is for layers that are checked.

func (l Layer) dissipationNumber() float64 { return l.adiabaticRate() * float64(l.Depth) }

// adiabaticRate returns α g/c_p, per metre.
func (l Layer) adiabaticRate() float64 {
	return float64(l.Material.Expansivity) * float64(l.Gravity) / float64(l.Material.SpecificHeat)
}

// adiabaticDrop uses Expm1 to keep the digits of a drop that is a small part
// of t.
func (l Layer) adiabaticDrop(t units.Temperature) units.TemperatureDifference {
	return units.TemperatureDifference(float64(t) * math.Expm1(l.dissipationNumber()))
}
