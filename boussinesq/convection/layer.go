package convection

import (
	"fmt"
	"math"

	"example.org/overturn/boussinesq"
	"example.org/overturn/heat"
	"example.org/overturn/stokes/rheology"
	"example.org/overturn/stokes/staggered"
)

// FromLayer returns the scaled problem of a layer, on a grid of height 1, with
// free slip and insulating sides, and the uniform viscosity of the material,
// which is 1 here. Set Walls, Thermal and Viscosity for other cases; the
// viscosity law is then in units of the material's viscosity. The scales of
// l.Scales turn results back into dimensional ones.
func FromLayer(l boussinesq.Layer, g *staggered.Grid) (Problem, error) {
	s, err := l.Scales()
	if err != nil {
		return Problem{}, err
	}
	if err := checkHeight(g, 1); err != nil {
		return Problem{}, err
	}
	walls := heat.Walls{Top: heat.Isothermal(s.FromTemperature(l.Top)), Bottom: heat.Flux(s.FromHeatFlux(l.BottomFlux))}
	if l.Bottom != 0 {
		walls.Bottom = heat.Isothermal(s.FromTemperature(l.Bottom))
	}
	return Problem{
		Grid:     g,
		Rayleigh: s.Rayleigh(),
		Thermal:  &walls,
		Heating:  s.FromVolumetricHeating(l.Heating),
	}, nil
}

// FromLayerSI returns the problem of a layer in SI units, on a grid as high as
// the layer is deep, in metres, otherwise as [FromLayer] does: temperatures are
// in kelvin, times in seconds, and Rayleigh is the buoyancy in N/(m³ K).
func FromLayerSI(l boussinesq.Layer, g *staggered.Grid) (Problem, error) {
	if err := l.Check(); err != nil {
		return Problem{}, err
	}
	if err := checkHeight(g, float64(l.Depth)); err != nil {
		return Problem{}, err
	}
	m := l.Material
	walls := heat.Walls{Top: heat.Isothermal(float64(l.Top)), Bottom: heat.Flux(float64(l.BottomFlux))}
	if l.Bottom != 0 {
		walls.Bottom = heat.Isothermal(float64(l.Bottom))
	}
	return Problem{
		Grid:         g,
		Rayleigh:     float64(m.Density) * float64(l.Gravity) * float64(m.Expansivity),
		Viscosity:    rheology.Constant(float64(m.Viscosity)),
		Thermal:      &walls,
		Heating:      float64(l.Heating),
		Conductivity: float64(m.Conductivity),
		HeatCapacity: float64(m.Density) * float64(m.SpecificHeat),
	}, nil
}

// extentTolerance is how far, relatively, the extent of a grid may be off.
const extentTolerance = 1e-9

func sameExtent(got, want float64) bool { return math.Abs(got-want) <= extentTolerance*want }

func checkHeight(g *staggered.Grid, want float64) error {
	if g == nil {
		return fmt.Errorf("convection: grid is nil, want one of height %v", want)
	}
	if !sameExtent(g.Height(), want) {
		return fmt.Errorf("convection: grid has height %v, want %v", g.Height(), want)
	}
	return nil
}
