package stability

import (
	"fmt"
	"math"
)

// A Layer is a horizontal layer of depth 1 that is at rest and may convect.
// The zero Layer is heated from below between free isothermal boundaries, of
// uniform viscosity and infinite Prandtl number. A Layer is a value: methods
// never change it, and it is safe for concurrent use.
type Layer struct {
	// Bottom and Top are the boundaries. nil means Free.Isothermal().
	Bottom, Top Boundary

	// Base is the temperature at rest. The zero Base is heated from below.
	Base Base

	// Viscosity is relative to that in the Rayleigh number. The zero
	// Viscosity is uniform.
	Viscosity Viscosity

	// Prandtl is ν/κ, the ratio of viscosity to thermal diffusivity, > 0.
	// Zero stands for infinity, as +Inf does: no inertia.
	Prandtl float64

	// Porous makes the layer a porous medium saturated with fluid, where
	// Darcy's law holds. Its Rayleigh number is ρ g α ΔT K d/(μ κ).
	Porous Porosity

	// Taylor is 4 Ω² d⁴/ν² for a rotation Ω about the vertical, ≥ 0.
	Taylor float64

	// Magnetic is a uniform vertical magnetic field. The zero Magnetic is none.
	Magnetic Magnetic

	// Solute is a second component that diffuses. The zero Solute is none.
	Solute Solute

	// Marangoni is (-dγ/dT) ΔT d/(μ κ), for a surface tension γ that falls
	// with temperature at a free top: D²w = -k² Ma θ there.
	Marangoni float64
}

// Porosity says whether a layer is a fluid or a porous medium.
type Porosity int

const (
	// Fluid is a layer of fluid.
	Fluid Porosity = iota
	// Darcy is a porous medium saturated with fluid.
	Darcy
)

// Magnetic is a uniform vertical magnetic field through a conducting fluid.
type Magnetic struct {
	// Chandrasekhar is σ B² d²/(ρ ν), with σ the electrical conductivity, ≥ 0.
	Chandrasekhar float64

	// Diffusivity is that of the magnetic field divided by that of heat,
	// Pr/Pm, > 0. Zero stands for infinity: the field of the currents follows
	// the flow at once, as in a liquid metal in the laboratory. It matters to
	// growth rates and to oscillations, not to stationary onset.
	Diffusivity float64

	// Bottom and Top are the electrical conditions, for a finite Diffusivity
	// or with rotation. Default Insulating.
	Bottom, Top MagneticWall
}

// A MagneticWall is the electrical condition at a boundary.
type MagneticWall int

const (
	// Insulating surroundings carry no current: the field continues into
	// them as a potential field.
	Insulating MagneticWall = iota
	// Conducting walls conduct perfectly: the normal field does not change.
	Conducting
	// VerticalField holds the field vertical at the boundary: an idealisation
	// that has closed solutions between free boundaries.
	VerticalField
)

func (w MagneticWall) known() bool { return w >= Insulating && w <= VerticalField }

// Solute is a component whose gradient contributes to buoyancy and which
// diffuses more slowly, or faster, than heat.
type Solute struct {
	// Rayleigh is g β ΔS d³/(ν κ), with ΔS the concentration at the bottom
	// minus that at the top, β > 0 for a heavy solute and κ the diffusivity
	// of heat. Positive values stabilise. In a porous layer it is
	// g β ΔS K d/(ν κ).
	Rayleigh float64

	// Diffusivity is that of the solute divided by that of heat, > 0. Zero
	// means that there is no solute.
	Diffusivity float64

	// Gradient is -dS₀/dz in units of ΔS/d at height z. nil means 1.
	Gradient func(z float64) float64

	// Bottom and Top are the conditions on the concentration. Default FixedConcentration.
	Bottom, Top SoluteWall
}

// A SoluteWall is the condition on a solute at a boundary.
type SoluteWall int

const (
	// FixedConcentration keeps the boundary at its concentration.
	FixedConcentration SoluteWall = iota
	// NoFlux lets no disturbance of the flux of solute through.
	NoFlux
)

func (w SoluteWall) known() bool { return w == FixedConcentration || w == NoFlux }

// A Number is a dimensionless number that drives, or hinders, motion.
type Number int

const (
	// ThermalRayleigh is the Rayleigh number.
	ThermalRayleigh Number = iota
	// SoluteRayleigh is the Rayleigh number of the solute.
	SoluteRayleigh
	// MarangoniNumber is the Marangoni number.
	MarangoniNumber
)

var numberNames = [...]string{"Rayleigh", "solute Rayleigh", "Marangoni"}

// String returns the name of the number, to be followed by the word number.
func (n Number) String() string {
	if n < 0 || int(n) >= len(numberNames) {
		return fmt.Sprintf("Number(%d)", int(n))
	}
	return numberNames[n]
}

// String describes the layer in one line.
func (l Layer) String() string {
	kind := "fluid layer"
	if l.Porous == Darcy {
		kind = "porous layer"
	}
	s := fmt.Sprintf("%s, bottom %v, top %v, %v, %v", kind,
		conditionsOf(l.Bottom), conditionsOf(l.Top), l.Base, l.Viscosity)
	for _, extra := range []struct {
		name  string
		value float64
	}{
		{"Pr", l.Prandtl}, {"Ta", l.Taylor}, {"Q", l.Magnetic.Chandrasekhar},
		{"Ra_S", l.Solute.Rayleigh}, {"Ma", l.Marangoni},
	} {
		if extra.value != 0 {
			s += fmt.Sprintf(", %s = %g", extra.name, extra.value)
		}
	}
	return s
}

// inertia returns 1/Pr.
func (l Layer) inertia() float64 {
	if l.Prandtl == 0 || l.Porous == Darcy {
		return 0
	}
	return 1 / l.Prandtl
}

// induction returns the time scale of the magnetic field over that of heat.
func (m Magnetic) induction() float64 {
	if m.Diffusivity == 0 || m.Chandrasekhar == 0 {
		return 0
	}
	return 1 / m.Diffusivity
}

// check finds every number that a layer cannot have.
func (l Layer) check() error {
	porous := l.Porous == Darcy
	bottom, top := conditionsOf(l.Bottom), conditionsOf(l.Top)
	if err := bottom.check("bottom", porous); err != nil {
		return err
	}
	if err := top.check("top", porous); err != nil {
		return err
	}
	for _, c := range []struct {
		name  string
		value float64
		ok    bool
		want  string
	}{
		{"Prandtl number", l.Prandtl, l.Prandtl >= 0, "> 0, or 0 for infinity"},
		{"Taylor number", l.Taylor, finiteFrom(l.Taylor, 0), "finite and ≥ 0"},
		{"Chandrasekhar number", l.Magnetic.Chandrasekhar, finiteFrom(l.Magnetic.Chandrasekhar, 0), "finite and ≥ 0"},
		{"magnetic diffusivity", l.Magnetic.Diffusivity, l.Magnetic.Diffusivity >= 0, "> 0, or 0 for infinity"},
		{"solute diffusivity", l.Solute.Diffusivity, finiteFrom(l.Solute.Diffusivity, 0), "finite and > 0, or 0 for no solute"},
		{"solute Rayleigh number", l.Solute.Rayleigh, finiteFrom(l.Solute.Rayleigh, math.Inf(-1)), "finite"},
		{"Marangoni number", l.Marangoni, finiteFrom(l.Marangoni, math.Inf(-1)), "finite"},
		{"electrical condition at the bottom", float64(l.Magnetic.Bottom), l.Magnetic.Bottom.known(), "one of the declared ones"},
		{"electrical condition at the top", float64(l.Magnetic.Top), l.Magnetic.Top.known(), "one of the declared ones"},
		{"condition on the solute at the bottom", float64(l.Solute.Bottom), l.Solute.Bottom.known(), "one of the declared ones"},
		{"condition on the solute at the top", float64(l.Solute.Top), l.Solute.Top.known(), "one of the declared ones"},
	} {
		if !c.ok {
			return &InputError{c.name, c.value, c.want}
		}
	}
	return l.checkCombination(top)
}

func finiteFrom(v, least float64) bool { return v >= least && !math.IsInf(v, 0) }

// checkCombination finds numbers that do not go together.
func (l Layer) checkCombination(top conditions) error {
	if l.Porous != Fluid && l.Porous != Darcy {
		return &InputError{"porosity", float64(l.Porous), "Fluid or Darcy"}
	}
	if l.Solute.Rayleigh != 0 && l.Solute.Diffusivity == 0 {
		return &InputError{"solute diffusivity", 0, "> 0, since the solute has a Rayleigh number"}
	}
	if l.Porous == Darcy {
		for _, c := range []struct {
			name  string
			value float64
		}{
			{"Taylor number", l.Taylor}, {"Chandrasekhar number", l.Magnetic.Chandrasekhar},
			{"Marangoni number", l.Marangoni},
		} {
			if c.value != 0 {
				return &InputError{c.name + " of a porous layer", c.value, "0"}
			}
		}
	}
	if l.Marangoni != 0 && top.wall != Free {
		return &InputError{"Marangoni number below a " + top.wall.String() + " top", l.Marangoni, "0, or a free top"}
	}
	return nil
}
