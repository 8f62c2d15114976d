package exact

import (
	"fmt"
	"slices"
)

// Layers is a steady stack of layers of different conductivity, the first at
// z = 0, through which one flux passes as through resistances in series. (A
// scheme on a grid whose faces lie on the interfaces reproduces it exactly if it
// takes the harmonic mean of the conductivities at faces.)
type Layers struct {
	Thicknesses    []float64
	Conductivities []float64
	Low, High      float64 // temperatures of z = 0 and of the top
}

// Flux returns the flux along z, the same everywhere.
func (s Layers) Flux() float64 {
	resistance := 0.0
	for j, h := range s.Thicknesses {
		resistance += h / s.Conductivities[j]
	}
	return (s.Low - s.High) / resistance
}

// Interface returns the temperature between layers j and j+1, counted from 0.
func (s Layers) Interface(j int) float64 {
	temperature, flux := s.Low, s.Flux()
	for i := range j + 1 {
		temperature -= flux * s.Thicknesses[i] / s.Conductivities[i]
	}
	return temperature
}

// find returns the layer of a point, the position of its base and the
// temperature there.
func (s Layers) find(z, flux float64) (j int, base, temperature float64) {
	temperature = s.Low
	for j < len(s.Thicknesses)-1 && z > base+s.Thicknesses[j] {
		base += s.Thicknesses[j]
		temperature -= flux * s.Thicknesses[j] / s.Conductivities[j]
		j++
	}
	return j, base, temperature
}

func (s Layers) profile(z, _ float64) (float64, float64) {
	flux := s.Flux()
	j, base, temperature := s.find(z, flux)
	return temperature - flux*(z-base)/s.Conductivities[j], flux
}

// Solve implements [Problem].
func (s Layers) Solve() (Solution, error) {
	s.Thicknesses = slices.Clone(s.Thicknesses)
	s.Conductivities = slices.Clone(s.Conductivities)
	return checked(s)
}

// At implements [Solution].
func (s Layers) At(x, z, t float64) State { return along(s, x, z, t) }

// Medium implements [Solution]. Its heat capacity is 1.
func (s Layers) Medium(_, z, _ float64) Medium {
	j, _, _ := s.find(z, 0)
	return Medium{Conductivity: s.Conductivities[j], HeatCapacity: 1}
}

// Domain implements [Solution]: from z = 0 to the top of the stack.
func (s Layers) Domain() Domain {
	top := 0.0
	for _, h := range s.Thicknesses {
		top += h
	}
	return layer(top, forever)
}

// Validate implements [Solution].
func (s Layers) Validate() error {
	if len(s.Thicknesses) == 0 || len(s.Thicknesses) != len(s.Conductivities) {
		return fmt.Errorf("exact: Layers.Thicknesses has %d values and Conductivities %d, want as many, and at least one", len(s.Thicknesses), len(s.Conductivities))
	}
	for j := range s.Thicknesses {
		if err := first(
			positive(fmt.Sprintf("Layers.Thicknesses[%d]", j), s.Thicknesses[j]),
			positive(fmt.Sprintf("Layers.Conductivities[%d]", j), s.Conductivities[j]),
		); err != nil {
			return err
		}
	}
	return first(anyFinite("Layers.Low", s.Low), anyFinite("Layers.High", s.High))
}
