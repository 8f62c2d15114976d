package convection

import (
	"errors"
	"fmt"
	"math"

	"example.org/overturn/heat"
	"example.org/overturn/stokes"
	"example.org/overturn/stokes/rheology"
	"example.org/overturn/stokes/staggered"
)

// A Problem is a layer that may convect. Zero fields mean the classical case:
// uniform viscosity 1, free slip on all walls, insulating sides, T = 1 at the
// bottom and 0 at the top.
type Problem struct {
	// Grid is the box and its cells. Required.
	Grid *staggered.Grid

	// Rayleigh is the buoyancy force per volume and temperature: the Rayleigh
	// number when everything is scaled, ρ₀gα in dimensional units.
	Rayleigh float64

	// Viscosity gives the viscosity from temperature and depth below the top.
	// Nil means 1 everywhere.
	Viscosity rheology.Law

	// Walls are the mechanical conditions. The zero value is free slip.
	Walls stokes.Walls

	// Thermal are the conditions on the temperature. Nil means
	// [HeatedFromBelow], with periodic sides where Walls has them.
	Thermal *heat.Walls

	// Heating is the heat produced per volume and time. Default 0.
	Heating float64

	// Conductivity and HeatCapacity (density times specific heat) are uniform.
	// Default 1.
	Conductivity, HeatCapacity float64

	// Initial is the temperature at the start. Nil means [Conducting] plus the
	// zero [Mode].
	Initial func(x, z float64) float64
}

// HeatedFromBelow returns the classical thermal walls: T = 1 at the bottom, 0
// at the top, no heat through the sides.
func HeatedFromBelow() heat.Walls {
	return heat.Walls{Bottom: heat.Isothermal(1), Top: heat.Isothermal(0)}
}

// withDefaults checks the problem and fills in what was left at zero.
func (p Problem) withDefaults() (Problem, error) {
	if p.Grid == nil {
		return p, errors.New("convection: Problem.Grid is nil, want a grid")
	}
	if p.Conductivity == 0 {
		p.Conductivity = 1
	}
	if p.HeatCapacity == 0 {
		p.HeatCapacity = 1
	}
	if p.Thermal == nil {
		w := HeatedFromBelow()
		if p.Walls.Left.IsPeriodic() {
			w.Left, w.Right = heat.Periodic, heat.Periodic
		}
		p.Thermal = &w
	}
	for _, f := range []struct {
		name  string
		value float64
		valid bool
		want  string
	}{
		{"Rayleigh", p.Rayleigh, true, "a finite number"},
		{"Heating", p.Heating, true, "a finite number"},
		{"Conductivity", p.Conductivity, p.Conductivity > 0, "a finite number > 0"},
		{"HeatCapacity", p.HeatCapacity, p.HeatCapacity > 0, "a finite number > 0"},
	} {
		if !f.valid || math.IsNaN(f.value) || math.IsInf(f.value, 0) {
			return p, fmt.Errorf("convection: Problem.%s is %v, want %s", f.name, f.value, f.want)
		}
	}
	if p.Viscosity != nil {
		if err := rheology.Check(p.Viscosity); err != nil {
			return p, fmt.Errorf("convection: Problem.Viscosity: %w", err)
		}
	}
	if p.Walls.Left.IsPeriodic() != p.Thermal.Left.IsPeriodic() {
		return p, errors.New("convection: the sides are periodic for the flow or for the temperature only, want both or neither")
	}
	return p, nil
}

// diffusivity returns conductivity over heat capacity.
func (p *Problem) diffusivity() float64 { return p.Conductivity / p.HeatCapacity }

// rate returns the reciprocal of the diffusion time across the layer.
func (p *Problem) rate() float64 {
	h := p.Grid.Height()
	return p.diffusivity() / (h * h)
}
