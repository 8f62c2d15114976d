package history

import (
	"math"

	"example.org/overturn/boussinesq"
	"example.org/overturn/scaling"
	"example.org/overturn/scaling/internal/check"
	"example.org/overturn/units"
)

// Loss is the heat flux through the top of a reservoir. Its methods are called
// in the innermost loop, from several goroutines if histories run in parallel:
// they must not change anything.
type Loss interface {
	// Flux returns the flux from a reservoir at temperature inside to what is
	// above it at temperature outside.
	Flux(inside, outside units.Temperature) units.HeatFlux
	// Check returns an error that names the first field without sense.
	Check() error
}

// Layer is what the flux of a convecting layer rests on, beyond the flux.
type Layer struct {
	Rayleigh         float64 // on the drop, with the viscosity inside
	Nusselt          float64 // flux over conduction through the depth; may be below one for a law out of range
	FrankKamenetskii float64 // drop over viscous temperature scale
	Viscosity        units.DynamicViscosity
	Lid              units.Length // thickness of what conducts: cold boundary layer, with the lid where there is one
	InRange          bool         // whether the law is within its range
}

// Describer is a [Loss] that can describe its layer; samples then carry it, and
// [StopsConvecting] works.
type Describer interface {
	Loss
	Describe(inside, outside units.Temperature) Layer
}

// Floor says what happens where a law gives less flux than conduction.
type Floor int

const (
	// Conduct: the layer conducts, Nu = 1.
	Conduct Floor = iota
	// Extrapolate: the law is taken at its word.
	Extrapolate
)

// Convection is a layer with the Nusselt number of a law,
//
//	q = k ΔT/d · Nu(Ra, ...),  Ra = ρ g α ΔT d³/(κη(T)).
//
// The law is given all groups that a layer has: Ra, also as interior and bottom
// Rayleigh number, Pr and the Frank-Kamenetskii parameter, beside those in
// Groups.
type Convection struct {
	Layer     boussinesq.Layer // Material, Depth and Gravity; the rest is not used
	Viscosity scaling.Viscosity
	Law       scaling.Law
	Groups    scaling.Groups // further groups for the law: cell width, stress exponent ...
	Floor     Floor          // default [Conduct]
}

var _ Describer = Convection{}

// Check implements [Loss].
func (c Convection) Check() error {
	if c.Law.Quantity != scaling.Nusselt {
		return &FieldError{Package: string(pkg), Field: "Convection.Law", Value: "a law for the " + c.Law.Quantity.String(), Want: "one for the Nusselt number"}
	}
	if err := check.First(checkLayer("Convection", c.Layer), checkViscosity("Convection", c.Viscosity)); err != nil {
		return err
	}
	// Try the law on some vigorous layer: a group that is missing shows here.
	v := c.Groups
	v.Rayleigh, v.InteriorRayleigh, v.BottomRayleigh, v.Prandtl, v.FrankKamenetskii = 1e8, 1e8, 1e8, 1e3, 20
	if x, err := c.Law.At(v); err != nil && x == 0 {
		return &FieldError{Package: string(pkg), Field: "Convection.Law", Value: c.Law.Name, Want: "a law that the layer and Groups suffice for", Err: err}
	}
	return nil
}

func (c Convection) groups(inside, outside units.Temperature) scaling.Groups {
	v := c.Groups
	m, d := c.Layer.Material, float64(c.Layer.Depth)
	drop := float64(inside.Sub(outside))
	eta := float64(c.Viscosity.At(inside))
	kappa := diffusivity(m)
	v.Rayleigh = float64(m.Density) * float64(m.Expansivity) * float64(c.Layer.Gravity) * drop * d * d * d / (kappa * eta)
	v.InteriorRayleigh, v.BottomRayleigh = v.Rayleigh, v.Rayleigh
	v.Prandtl = eta / (float64(m.Density) * kappa)
	v.FrankKamenetskii = drop / float64(c.Viscosity.Scale(inside))
	return v
}

// Flux implements [Loss].
func (c Convection) Flux(inside, outside units.Temperature) units.HeatFlux {
	conduction := conductive(c.Layer, inside, outside)
	if inside <= outside {
		return conduction
	}
	nu := c.Law.Evaluate(c.groups(inside, outside))
	if c.Floor == Conduct {
		nu = math.Max(1, nu)
	}
	return conduction * units.HeatFlux(nu)
}

// Describe implements [Describer].
func (c Convection) Describe(inside, outside units.Temperature) Layer {
	v := c.groups(inside, outside)
	l := Layer{
		Rayleigh: v.Rayleigh, Nusselt: c.Law.Evaluate(v), FrankKamenetskii: v.FrankKamenetskii,
		Viscosity: c.Viscosity.At(inside), InRange: c.Law.Holds(v),
	}
	if l.Rayleigh <= 0 { // cold inside: no law
		l.Nusselt, l.InRange = 0, false
	}
	l.Lid = conducting(c.Layer, inside, outside, c.Flux(inside, outside))
	return l
}

// StagnantLid is a layer that convects under a stagnant lid, by a law of
// [scaling.LidLaw]; where that gives less than conduction through the depth, the
// layer conducts.
type StagnantLid struct {
	Layer     boussinesq.Layer // Material, Depth and Gravity; the rest is not used
	Viscosity scaling.Viscosity
	Law       scaling.LidLaw
}

var _ Describer = StagnantLid{}

// Check implements [Loss].
func (s StagnantLid) Check() error {
	return check.First(s.Law.Check(), checkLayer("StagnantLid", s.Layer), checkViscosity("StagnantLid", s.Viscosity))
}

func (s StagnantLid) convective(inside units.Temperature) units.HeatFlux {
	scale := float64(s.Viscosity.Scale(inside))
	k := float64(s.Layer.Material.Conductivity)
	return units.HeatFlux(s.Law.Prefactor * k * math.Cbrt(buoyancy(s.Layer)/float64(s.Viscosity.At(inside))) * scale * math.Cbrt(scale))
}

// Flux implements [Loss].
func (s StagnantLid) Flux(inside, outside units.Temperature) units.HeatFlux {
	conduction := conductive(s.Layer, inside, outside)
	if inside <= outside {
		return conduction
	}
	return max(conduction, s.convective(inside))
}

// Describe implements [Describer]. The lid includes the boundary layer below it.
func (s StagnantLid) Describe(inside, outside units.Temperature) Layer {
	drop, d := float64(inside.Sub(outside)), float64(s.Layer.Depth)
	l := Layer{
		Rayleigh:         buoyancy(s.Layer) * drop * d * d * d / float64(s.Viscosity.At(inside)),
		FrankKamenetskii: drop / float64(s.Viscosity.Scale(inside)),
		Viscosity:        s.Viscosity.At(inside),
		Lid:              conducting(s.Layer, inside, outside, s.Flux(inside, outside)),
	}
	if drop > 0 {
		l.Nusselt = float64(s.convective(inside)) / float64(conductive(s.Layer, inside, outside))
		l.InRange = l.Nusselt >= 1 && l.FrankKamenetskii > 2*scaling.StagnantLidBound
	}
	return l
}

// BottomLayer is the heat flux from a reservoir, a core say, into the convecting
// layer above it: a marginally stable boundary layer at the bottom of that,
//
//	q = k (ρ g α/(κη Rd))^(1/3) ΔT^(4/3),
//
// with the viscosity at the mean temperature of the boundary layer. Where the
// reservoir is the colder one, heat is conducted back through the depth.
type BottomLayer struct {
	Layer     boussinesq.Layer // of the reservoir above: Material, Depth and Gravity at its base
	Viscosity scaling.Viscosity
	Critical  float64 // Rd
}

var _ Describer = BottomLayer{}

// Check implements [Loss].
func (b BottomLayer) Check() error {
	return check.First(
		check.Positive(pkg, "BottomLayer.Critical", b.Critical),
		checkLayer("BottomLayer", b.Layer), checkViscosity("BottomLayer", b.Viscosity),
	)
}

// Flux implements [Loss].
func (b BottomLayer) Flux(inside, outside units.Temperature) units.HeatFlux {
	conduction := conductive(b.Layer, inside, outside)
	if inside <= outside {
		return conduction
	}
	drop := float64(inside.Sub(outside))
	eta := float64(b.Viscosity.At((inside + outside) / 2))
	q := float64(b.Layer.Material.Conductivity) * math.Cbrt(buoyancy(b.Layer)/(eta*b.Critical)) * drop * math.Cbrt(drop)
	return max(conduction, units.HeatFlux(q))
}

// Describe implements [Describer].
func (b BottomLayer) Describe(inside, outside units.Temperature) Layer {
	drop, d := float64(inside.Sub(outside)), float64(b.Layer.Depth)
	middle := (inside + outside) / 2
	q := b.Flux(inside, outside)
	l := Layer{
		Rayleigh:         buoyancy(b.Layer) * drop * d * d * d / float64(b.Viscosity.At(middle)),
		FrankKamenetskii: drop / float64(b.Viscosity.Scale(middle)),
		Viscosity:        b.Viscosity.At(middle),
		Lid:              conducting(b.Layer, inside, outside, q),
		InRange:          drop > 0,
	}
	if drop > 0 {
		l.Nusselt = float64(q) / float64(conductive(b.Layer, inside, outside))
	}
	return l
}

// LossFunc is a [Loss] of your own.
type LossFunc func(inside, outside units.Temperature) units.HeatFlux

// Flux implements [Loss].
func (f LossFunc) Flux(inside, outside units.Temperature) units.HeatFlux { return f(inside, outside) }

// Check implements [Loss].
func (f LossFunc) Check() error {
	if f == nil {
		return &FieldError{Package: string(pkg), Field: "LossFunc", Value: "nil", Want: "a function"}
	}
	return nil
}

func conductive(l boussinesq.Layer, inside, outside units.Temperature) units.HeatFlux {
	return units.HeatFlux(float64(l.Material.Conductivity) * float64(inside.Sub(outside)) / float64(l.Depth))
}

// conducting returns the thickness that conducts the flux, k ΔT/q.
func conducting(l boussinesq.Layer, inside, outside units.Temperature, q units.HeatFlux) units.Length {
	if q == 0 {
		return l.Depth
	}
	return units.Length(float64(l.Material.Conductivity) * float64(inside.Sub(outside)) / float64(q))
}

func diffusivity(m boussinesq.Material) float64 {
	return float64(m.Conductivity) / (float64(m.Density) * float64(m.SpecificHeat))
}

// buoyancy returns ρ g α/κ.
func buoyancy(l boussinesq.Layer) float64 {
	m := l.Material
	return float64(m.Density) * float64(l.Gravity) * float64(m.Expansivity) / diffusivity(m)
}

// checkLayer checks what the losses use of a layer.
func checkLayer(owner string, l boussinesq.Layer) error {
	m := l.Material
	return check.First(
		check.Positive(pkg, owner+".Layer.Material.Density", m.Density),
		check.Positive(pkg, owner+".Layer.Material.Expansivity", m.Expansivity),
		check.Positive(pkg, owner+".Layer.Material.Conductivity", m.Conductivity),
		check.Positive(pkg, owner+".Layer.Material.SpecificHeat", m.SpecificHeat),
		check.Positive(pkg, owner+".Layer.Depth", l.Depth),
		check.Positive(pkg, owner+".Layer.Gravity", l.Gravity),
	)
}

func checkViscosity(owner string, eta scaling.Viscosity) error {
	if eta == nil {
		return &FieldError{Package: string(pkg), Field: owner + ".Viscosity", Value: "nil", Want: "a viscosity"}
	}
	if c, ok := eta.(interface{ Check() error }); ok {
		return c.Check()
	}
	return nil
}
