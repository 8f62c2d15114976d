package stability

import (
	"fmt"
	"math"

	"example.org/overturn/boussinesq"
	"example.org/overturn/units"
)

// Conditions are what the stability of a layer of material depends on and a
// [boussinesq.Layer] does not say. The zero Conditions are free boundaries, a
// uniform viscosity and no sides.
type Conditions struct {
	// Bottom and Top are Free or Rigid. What holds for the temperature there
	// is for the layer to say.
	Bottom, Top Wall

	// RelativeViscosity is a law of the absolute temperature: viscosity over
	// that of the material, which stays the one in the Rayleigh number and may
	// be a range. nil means 1.
	RelativeViscosity func(units.Temperature) float64

	// TopExchange is the heat-transfer coefficient between the top and what
	// is above, > 0. Zero means a top that keeps its temperature.
	TopExchange units.HeatTransferCoefficient

	// Width cuts the layer off sideways by the given Sides, > 0. Zero means
	// a layer that is wide against its depth. Sides of a real tank, which the
	// fluid sticks to and which conduct heat, delay the onset further.
	Width units.Length
	Sides Sides
}

// A problem is all that the critical Rayleigh number of a layer depends on. Two
// layers with equal problems have the same.
type problem struct {
	heating  heating
	flux     bool    // through the bottom is given, not its temperature
	biot     float64 // of the top, +Inf if isothermal
	prandtl  float64 // where it matters
	aspect   float64 // width over depth, 0 for a wide layer
	hot, top float64 // scale and zero of temperature, where a law of viscosity needs them
}

// A heating is a base state: the gradient is uniform + slope (z - 1/2).
type heating struct{ uniform, slope float64 }

func (h heating) base() Base {
	switch h {
	case heating{1, 0}:
		return Base{}
	case heating{0.5, 1}:
		return InternalHeating()
	case heating{0, 1}:
		return InternalHeatingBetween()
	}
	return Base{
		temperature: func(z float64) float64 { return h.uniform*(1-z) + h.slope*z*(1-z)/2 },
		gradient:    func(z float64) float64 { return h.uniform + h.slope*(z-0.5) },
		name:        fmt.Sprintf("base gradient from %.3g at the bottom to %.3g at the top", h.uniform-h.slope/2, h.uniform+h.slope/2),
	}
}

// pose returns the stability problem of a layer, and its Rayleigh number, which
// is not positive for a layer that nothing drives.
func (c Conditions) pose(l boussinesq.Layer) (problem, float64, error) {
	if err := l.Check(); err != nil {
		return problem{}, 0, err
	}
	if err := c.check(); err != nil {
		return problem{}, 0, err
	}
	scale, h, err := heatingOf(l)
	if err != nil {
		return problem{}, 0, err
	}
	rayleigh, err := l.RayleighOf(scale)
	if err != nil {
		return problem{}, 0, err
	}
	p := problem{heating: h, flux: l.Bottom == 0, biot: math.Inf(1)}
	if c.TopExchange > 0 {
		p.biot = float64(c.TopExchange) * float64(l.Depth) / float64(l.Material.Conductivity)
	}
	if c.Width > 0 {
		p.aspect = float64(c.Width) / float64(l.Depth)
	}
	if h.slope != 0 {
		if p.prandtl, err = l.Prandtl(); err != nil {
			return problem{}, 0, err
		}
	}
	if c.RelativeViscosity != nil {
		p.hot, p.top = float64(scale), float64(l.Top)
	}
	return p, rayleigh, nil
}

func (c Conditions) check() error {
	if !(c.TopExchange >= 0) || math.IsInf(float64(c.TopExchange), 1) {
		return &InputError{"Conditions.TopExchange", float64(c.TopExchange), "finite and ≥ 0 W/(m² K)"}
	}
	if !(c.Width >= 0) || math.IsInf(float64(c.Width), 1) {
		return &InputError{"Conditions.Width", float64(c.Width), "finite and > 0 m, or 0 for a wide layer"}
	}
	return nil
}

// layer returns the layer that a problem is about.
func (c Conditions) layer(p problem) Layer {
	l := Layer{Bottom: c.Bottom, Top: c.Top.Robin(p.biot), Base: p.heating.base(), Prandtl: p.prandtl}
	if p.flux {
		l.Bottom = c.Bottom.FixedFlux()
	}
	if c.RelativeViscosity != nil {
		l.Viscosity = ViscosityLaw(func(_, t float64) float64 {
			return c.RelativeViscosity(units.Temperature(p.top + t*p.hot))
		})
	}
	return l
}

// heatingOf returns the unit of temperature of a layer, and its base state in
// that unit. The unit is the drop across the layer if that drives it, else the
// scale of the flux or of the heating; it is zero if there is nothing.
func heatingOf(l boussinesq.Layer) (units.TemperatureDifference, heating, error) {
	internal := float64(l.Heating) * math.Pow(float64(l.Depth), 2) / float64(l.Material.Conductivity)
	if l.Bottom == 0 {
		scale, err := l.TemperatureScale()
		if err != nil {
			return 0, heating{}, err
		}
		if l.BottomFlux == 0 {
			return scale, heating{0.5, 1}, nil
		}
		r := internal / float64(scale)
		return scale, heating{1 - r/2, r}, nil
	}
	drop := float64(l.Bottom.Sub(l.Top))
	if internal == 0 || drop > 0 {
		if drop == 0 {
			return 0, heating{1, 0}, nil
		}
		return units.TemperatureDifference(drop), heating{1, internal / drop}, nil
	}
	scale := math.Abs(internal)
	return units.TemperatureDifference(scale), heating{drop / scale, internal / scale}, nil
}
