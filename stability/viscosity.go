package stability

import (
	"errors"
	"fmt"
	"math"
	"slices"
	"sort"

	"example.org/overturn/stability/internal/piecewise"
)

// A Viscosity is the viscosity of the layer at rest, relative to the one that
// the Rayleigh and the Prandtl number are built on, as a function of height and
// base temperature. In a porous layer it is the viscosity divided by the
// permeability, relative to that of the Rayleigh number. The zero Viscosity is 1
// everywhere.
//
// The layer at rest does not deform, so a change of viscosity with the
// disturbance of temperature has no linear effect: a viscosity that depends on
// temperature acts like the viscosity of the base state at each height.
type Viscosity struct {
	law    func(z, t float64) float64
	breaks []float64
	name   string
}

// String describes the law.
func (v Viscosity) String() string {
	if v.name == "" {
		return "uniform viscosity"
	}
	return v.name
}

// ViscosityLaw is any positive function of the height z, from 0 to 1, and of
// the base temperature t. Breaks are heights at which it jumps or has a kink.
func ViscosityLaw(law func(z, t float64) float64, breaks ...float64) Viscosity {
	return Viscosity{law: law, breaks: breaks, name: "given viscosity law"}
}

// Exponential is exp(γ (t₀ - t)), the law that Frank-Kamenetskii's expansion
// of an Arrhenius law about the temperature t₀ gives. At t₀ it is 1. Between
// isothermal walls of a layer heated from below, exp(γ) is the ratio of the
// viscosities at the top and at the bottom, and t₀ = 1/2 refers everything to
// the middle of the layer, t₀ = 1 to its bottom.
func Exponential(gamma, t0 float64) Viscosity {
	return Viscosity{
		law:  func(_, t float64) float64 { return math.Exp(gamma * (t0 - t)) },
		name: fmt.Sprintf("exponential viscosity law, γ = %g, 1 at t = %g", gamma, t0),
	}
}

// Arrhenius is exp(E/(t + T₁) - E/(t₀ + T₁)), with the activation energy E
// divided by the gas constant and by the unit of temperature, and T₁ the
// absolute temperature of t = 0 in the same unit. At t₀ it is 1.
func Arrhenius(energy, t1, t0 float64) Viscosity {
	return Viscosity{
		law: func(_, t float64) float64 {
			if t+t1 <= 0 {
				return math.NaN()
			}
			return math.Exp(energy/(t+t1) - energy/(t0+t1))
		},
		name: fmt.Sprintf("Arrhenius viscosity law, E = %g, T₁ = %g, 1 at t = %g", energy, t1, t0),
	}
}

// Layered is a viscosity that is uniform between given heights: values[0]
// below tops[0], values[1] from there to tops[1], and so on; the last value
// holds up to the top of the layer and has no height.
func Layered(tops, values []float64) Viscosity {
	tops, values = slices.Clone(tops), slices.Clone(values)
	v := Viscosity{breaks: tops, name: fmt.Sprintf("viscosity in %d layers", len(values))}
	ok := len(values) == len(tops)+1 && sort.Float64sAreSorted(tops)
	v.law = func(z, _ float64) float64 {
		if !ok {
			return math.NaN()
		}
		return values[sort.SearchFloat64s(tops, z)]
	}
	return v
}

// A viscosityState is a viscosity made ready for computation.
type viscosityState struct {
	at       func(z float64) float64
	resolved *piecewise.Function
	one      bool    // 1 everywhere
	least    float64 // a safe lower bound
}

func (v Viscosity) resolve(base *baseState, breaks []float64) (*viscosityState, error) {
	s := &viscosityState{at: func(float64) float64 { return 1 }, one: true, least: 1}
	if v.law == nil {
		return s, nil
	}
	s.one = false
	s.at = func(z float64) float64 { return v.law(z, base.temperature(z)) }
	for i := range 201 { // what lies between quadrature points should be good too
		if err := s.check(float64(i) / 200); err != nil {
			return nil, err
		}
	}
	var err error
	s.resolved, err = piecewise.Resolve(s.at, 0, 1, append(slices.Clone(v.breaks), breaks...), piecewise.Local)
	if err != nil {
		return nil, valueError("viscosity", "finite and > 0", err)
	}
	return s, s.bound()
}

func (s *viscosityState) check(z float64) error {
	if v := s.at(z); !(v > 0) || math.IsInf(v, 1) {
		return &InputError{fmt.Sprintf("viscosity at z = %g", z), v, "finite and > 0"}
	}
	return nil
}

// bound sets the lower bound from samples of each panel.
func (s *viscosityState) bound() error {
	s.least = math.Inf(1)
	nodes := s.resolved.Nodes
	for i := range len(nodes) - 1 {
		a, h := nodes[i], nodes[i+1]-nodes[i]
		for j := range boundSamples {
			z := a + h*(float64(j)+0.5)/boundSamples
			if err := s.check(z); err != nil {
				return err
			}
			s.least = min(s.least, s.at(z))
		}
		s.least = min(s.least, s.at(a), s.at(a+h))
	}
	if !s.resolved.Constant() {
		s.least /= boundFactor
	}
	return nil
}

// valueError turns the error of a profile into one that names it.
func valueError(name, want string, err error) error {
	var v *piecewise.ValueError
	if errors.As(err, &v) {
		return &InputError{fmt.Sprintf("%s at z = %g", name, v.Z), v.Value, want}
	}
	return fmt.Errorf("stability: %s: %w", name, err)
}
