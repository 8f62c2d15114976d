package exact

import "math"

// A Material conducts and stores heat. Zero fields mean 1, so that the zero
// Material has the diffusivity 1; one with Conductivity κ and HeatCapacity 1 has
// the diffusivity κ, and its fluxes are divided by ρ·cp.
type Material struct {
	Conductivity float64 // k; default 1
	HeatCapacity float64 // C = ρ·cp, per volume; default 1
}

// Diffusivity returns k/C.
func (m Material) Diffusivity() float64 { return m.conductivity() / m.capacity() }

// Effusivity returns √(k·C), which says how much a body resists a change of its
// surface temperature.
func (m Material) Effusivity() float64 { return math.Sqrt(m.conductivity() * m.capacity()) }

func (m Material) conductivity() float64 { return orOne(m.Conductivity) }
func (m Material) capacity() float64     { return orOne(m.HeatCapacity) }

// medium returns the material at rest and without sources.
func (m Material) medium() Medium {
	return Medium{Conductivity: m.conductivity(), HeatCapacity: m.capacity()}
}

func (m Material) check(of string) error {
	return first(
		notNegative(of+".Conductivity", m.Conductivity),
		notNegative(of+".HeatCapacity", m.HeatCapacity),
	)
}
