package stability

import (
	"fmt"
	"math"
	"slices"

	"example.org/overturn/stability/internal/piecewise"
)

// A Base is the temperature of the layer at rest, T₀(z), in any unit of
// temperature: the same that the Rayleigh number is built on. What drives the
// motion is its downward gradient f = -dT₀/dz; f > 0 is unstable. The zero Base
// is a layer heated from below: T₀ = 1 - z, f = 1.
//
// When a boundary is not isothermal, the Rayleigh number is built on the
// gradient of the base state (f = 1 is a temperature difference of 1 over the
// depth), not on the temperatures that convection leaves there.
type Base struct {
	temperature, gradient func(z float64) float64
	breaks                []float64
	name                  string
}

// String describes the base state.
func (b Base) String() string {
	if b.name == "" {
		return "heated from below"
	}
	return b.name
}

// InternalHeating is a layer heated uniformly from within, insulated below and
// cooled from above: T₀ = (1 - z²)/2, f = z. The unit of temperature is
// H d²/k, with H the heating in W/m³, d the depth and k the conductivity, so
// that the Rayleigh number is Ra_H = ρ g α H d⁵/(k κ μ). The temperature drop
// across the layer is half that unit.
func InternalHeating() Base {
	return Base{
		temperature: func(z float64) float64 { return (1 - z*z) / 2 },
		gradient:    func(z float64) float64 { return z },
		name:        "heated within, insulated below",
	}
}

// InternalHeatingBetween is a layer heated uniformly from within between two
// walls of the same temperature: T₀ = z(1 - z)/2, f = z - 1/2, in the unit of
// [InternalHeating].
func InternalHeatingBetween() Base {
	return Base{
		temperature: func(z float64) float64 { return z * (1 - z) / 2 },
		gradient:    func(z float64) float64 { return z - 0.5 },
		name:        "heated within, cooled from both sides",
	}
}

// MixedHeating is a layer between isothermal walls, heated from below and from
// within: f = 1 + h (z - 1/2), with h = H d²/(k ΔT) and ΔT, the difference of
// the wall temperatures, as the unit.
func MixedHeating(h float64) Base {
	return Base{
		temperature: func(z float64) float64 { return 1 - z + h*z*(1-z)/2 },
		gradient:    func(z float64) float64 { return 1 + h*(z-0.5) },
		name:        fmt.Sprintf("heated from below and, with h = %g, within", h),
	}
}

// MixedFlux is a layer with a fixed flux q_b from below, heated uniformly from
// within: f = 1 - r + r z, with q_s = q_b + H d the flux through the top and
// r = H d/q_s. The unit of temperature is q_s d/k. With r = 1 it is
// [InternalHeating], with r = 0 it is heated from below.
func MixedFlux(r float64) Base {
	return Base{
		temperature: func(z float64) float64 { return (1-r)*(1-z) + r*(1-z*z)/2 },
		gradient:    func(z float64) float64 { return 1 - r + r*z },
		name:        fmt.Sprintf("heated by a flux from below and, with share %g, within", r),
	}
}

// CoolingFromAbove is a layer of temperature 1 whose top has been held at 0
// for the time t, in d²/κ, frozen at that instant: T₀ = erf((1-z)/(2√t)). The
// profile is that of a half-space; as long as t < 0.05 the bottom does not matter.
// A frozen profile gives growth rates that hold while they are large against 1/t.
func CoolingFromAbove(t float64) Base {
	return Base{
		temperature: func(z float64) float64 { return math.Erf((1 - z) / (2 * math.Sqrt(t))) },
		gradient:    func(z float64) float64 { return math.Exp(-(1-z)*(1-z)/(4*t)) / math.Sqrt(math.Pi*t) },
		name:        fmt.Sprintf("cooling from above for a time of %g", t),
	}
}

// Gradient is a base state given by f = -dT₀/dz at height z, 0 ≤ z ≤ 1. Breaks
// are the heights at which f jumps or has a kink; one that is not listed is
// looked for. The temperature, which a viscosity may depend on, is zero at the top.
func Gradient(f func(z float64) float64, breaks ...float64) Base {
	return Base{gradient: f, breaks: breaks, name: "given gradient"}
}

// Temperature is a base state given by T₀ at height z, 0 ≤ z ≤ 1. Breaks are
// the heights at which T₀ or its slope is not smooth. The slope is that of a
// piecewise polynomial fitted to round-off, good to some 11 digits.
func Temperature(t func(z float64) float64, breaks ...float64) Base {
	return Base{temperature: t, breaks: breaks, name: "given temperature"}
}

// A baseState is a base made ready for computation.
type baseState struct {
	gradient, temperature func(z float64) float64
	resolved              *piecewise.Function // gradient
	uniform               bool                // gradient
	solute                *piecewise.Function // gradient of the solute, nil for 1
	largest               float64             // |f|, a safe upper bound
}

func (b Base) resolve() (*baseState, error) {
	s := &baseState{gradient: b.gradient, temperature: b.temperature}
	if s.gradient == nil && s.temperature == nil {
		s.gradient = func(float64) float64 { return 1 }
		s.temperature = func(z float64) float64 { return 1 - z }
	}
	if s.gradient == nil {
		t, err := piecewise.Resolve(s.temperature, 0, 1, b.breaks, piecewise.Global)
		if err != nil {
			return nil, valueError("base temperature", "finite", err)
		}
		slope := t.Derivative()
		s.gradient = func(z float64) float64 { return -slope.At(z) }
	}
	var err error
	if s.resolved, err = piecewise.Resolve(s.gradient, 0, 1, b.breaks, piecewise.Global); err != nil {
		return nil, valueError("base temperature gradient", "finite", err)
	}
	if s.temperature == nil {
		s.temperature = s.resolved.FromRight().At
	}
	s.uniform = s.resolved.Constant()
	s.largest = largest(s.resolved)
	return s, nil
}

// resolveSolute does the same for the gradient of a solute.
func (s *baseState) resolveSolute(h func(z float64) float64) error {
	if h == nil {
		return nil
	}
	var err error
	if s.solute, err = piecewise.Resolve(h, 0, 1, nil, piecewise.Global); err != nil {
		return valueError("solute gradient", "finite", err)
	}
	return nil
}

// nodes returns the ends of all panels, and degree the largest degree on any.
func (s *baseState) nodes() []float64 {
	if s.solute == nil {
		return slices.Clone(s.resolved.Nodes)
	}
	return slices.Concat(s.resolved.Nodes, s.solute.Nodes)
}

func (s *baseState) degree() int {
	if s.solute == nil {
		return s.resolved.Degree()
	}
	return max(s.resolved.Degree(), s.solute.Degree())
}

// bounding samples a panel closely enough for a bound on a polynomial of its
// degree; the factor makes it safe.
const (
	boundSamples = 64
	boundFactor  = 1.01
)

// largest returns an upper bound of |f|.
func largest(f *piecewise.Function) float64 {
	m := 0.0
	for i := range len(f.Nodes) - 1 {
		a, h := f.Nodes[i], f.Nodes[i+1]-f.Nodes[i]
		for j := range boundSamples + 1 {
			m = max(m, math.Abs(f.At(a+h*float64(j)/boundSamples)))
		}
	}
	if f.Constant() {
		return m
	}
	return m * boundFactor
}
