package stability

import (
	"errors"
	"fmt"
	"math"

	"example.org/overturn/stability/internal/element"
	"example.org/overturn/stability/internal/pencil"
)

// A CoolingHalfSpace is a deep fluid or porous medium, at uniform temperature
// until its surface is suddenly cooled by ΔT. After the time t the cold boundary
// layer is √(κt) thick. In the depth ζ over that thickness, T₀ falls towards
// the surface with the gradient exp(-ζ²/4)/√π, and a disturbance of the
// wavenumber k_δ = k√(κt) obeys
//
//	(D²-k_δ²)²w = R k_δ²θ,  R = g α ΔT (κt)^(3/2)/(ν κ)    viscous
//	(D²-k_δ²)w = -R k_δ²θ,  R = g α ΔT K (κt)^(1/2)/(ν κ)  porous
//
// The base state changes as fast as disturbances do near onset, so what onset
// means is a convention; Measure and Exponent say which. The zero
// CoolingHalfSpace is a viscous one with a free surface in which a disturbance
// just keeps its amplitude at given ζ.
type CoolingHalfSpace struct {
	// Top is Free or Rigid, or Impermeable for a porous medium, where Free
	// means the same.
	Top Wall

	// Porous says whether the medium is porous.
	Porous Porosity

	// Measure is the frame in which the disturbance is judged.
	Measure Measure

	// Exponent is s for a disturbance that grows like t^s at given ζ. Counting
	// the square of the disturbance over physical depth, zero growth is
	// s = -1/4. It applies to SelfSimilar only.
	Exponent float64
}

// A Measure says how a disturbance of a changing base state is judged.
type Measure int

const (
	// SelfSimilar disturbances keep their shape in ζ as the layer thickens:
	// s θ = (D² + (ζ/2)D - k_δ²)θ + f w.
	SelfSimilar Measure = iota
	// FrozenBase ignores the thickening: 0 = (D² - k_δ²)θ + f w at given depth.
	// For viscous flow it has no onset, since its neutral curve falls to
	// zero with k_δ.
	FrozenBase
)

// A HalfSpaceOnset is a neutral state of a [CoolingHalfSpace].
type HalfSpaceOnset struct {
	// R is the neutral value of the boundary layer's Rayleigh number.
	R float64

	// Wavenumber is k_δ, per thickness √(κt) of the boundary layer.
	Wavenumber float64

	// Error estimates the errors of R and of the wavenumber.
	Error HalfSpaceError

	porous Porosity
}

// HalfSpaceError holds estimates of absolute errors.
type HalfSpaceError struct{ R, Wavenumber float64 }

// Time returns when the boundary layer reaches R in a layer of depth d whose
// Rayleigh number, on ΔT and d, is given: in d²/κ. It holds while the boundary
// layer is much thinner than the layer, for times below 0.05 or so.
func (o HalfSpaceOnset) Time(rayleigh float64) float64 {
	if o.porous == Darcy {
		return math.Pow(o.R/rayleigh, 2)
	}
	return math.Pow(o.R/rayleigh, 2.0/3)
}

// Critical returns the neutral state with the smallest R: the first onset as
// time goes on.
func (h CoolingHalfSpace) Critical() (HalfSpaceOnset, error) {
	q, err := h.question()
	if err != nil {
		return HalfSpaceOnset{}, err
	}
	if h.Porous == Fluid && h.Measure == FrozenBase {
		return HalfSpaceOnset{}, fmt.Errorf("stability: viscous half-space with a frozen base state: %w",
			&NoOnsetError{Wavenumber: [2]float64{0, largestWavenumber}})
	}
	a, err := q.stationaryMinimum()
	if err != nil && !errors.Is(err, ErrNotConverged) {
		return HalfSpaceOnset{}, err
	}
	return h.onset(&a), err
}

// Neutral returns the neutral state of a wavenumber k_δ > 0.
func (h CoolingHalfSpace) Neutral(k float64) (HalfSpaceOnset, error) {
	q, err := h.question()
	if err != nil {
		return HalfSpaceOnset{}, err
	}
	if err := checkWavenumber(k); err != nil {
		return HalfSpaceOnset{}, err
	}
	a, err := q.stationaryNeutral(k)
	if err != nil && !errors.Is(err, ErrNotConverged) {
		return HalfSpaceOnset{}, err
	}
	if math.IsInf(a.value, 1) {
		return HalfSpaceOnset{}, &NoOnsetError{Wavenumber: [2]float64{k, k}}
	}
	return h.onset(&a), err
}

func (h CoolingHalfSpace) onset(a *answer) HalfSpaceOnset {
	return HalfSpaceOnset{a.value, a.K, HalfSpaceError{a.valueError, a.kError}, h.Porous}
}

func (h CoolingHalfSpace) question() (*question, error) {
	if h.Porous != Fluid && h.Porous != Darcy {
		return nil, &InputError{"porosity", float64(h.Porous), "Fluid or Darcy"}
	}
	if err := h.Top.conditions().check("top", h.Porous == Darcy); err != nil {
		return nil, err
	}
	if h.Top == Permeable {
		return nil, fmt.Errorf("stability: top of a half-space is %v, want Impermeable", h.Top)
	}
	if h.Measure != SelfSimilar && h.Measure != FrozenBase {
		return nil, &InputError{"CoolingHalfSpace.Measure", float64(h.Measure), "SelfSimilar or FrozenBase"}
	}
	if !finiteFrom(h.Exponent, -0.5) || h.Exponent == -0.5 {
		return nil, &InputError{"CoolingHalfSpace.Exponent", h.Exponent, "finite and > -1/2"}
	}
	e := &engine{bound: halfSpaceBound{h}, from: leastWavenumber, tolerance: DefaultTolerance, maxUnknowns: DefaultMaxUnknowns}
	e.still = &ladder{system: h.system()}
	return &question{engine: e, number: ThermalRayleigh}, nil
}

// A halfSpaceBound knows that neutral states of large k_δ need a large R: the
// dissipation is at least k⁴ (k² porous), and the heat equation gives
// (k² + 1/4 + s)‖θ‖ ≤ ‖f w‖.
type halfSpaceBound struct{ h CoolingHalfSpace }

func (b halfSpaceBound) lower(k float64, _ Number, _ [3]float64) float64 {
	k2, decay := k*k, 0.0
	if b.h.Measure == SelfSimilar {
		decay = max(0.25+b.h.Exponent, 0)
	}
	stiffness := k2
	if b.h.Porous == Fluid {
		stiffness = k2 * k2
	}
	if k < 1 { // at small k it says nothing of use
		return 0
	}
	return stiffness * (k2 + decay) / k2 * math.Sqrt(math.Pi)
}

func (b halfSpaceBound) growth(float64, [3]float64) float64 { return 0 }

// deep is the depth, in units of the boundary layer, below which the base
// state is uniform to round-off: exp(-deep²/4) = 1e-55.
const deep = 22

// system builds the equations on 0 < ζ < deep, downwards. Below, solutions are
// known: θ and w decay like polynomials times exp(-k ζ). What they do to the
// part above are end terms.
func (h CoolingHalfSpace) system() *system {
	s := newSystem(1, true)
	s.nodes = []float64{0, 1, 2, 4, 8, 14, deep}
	s.operator.Excess = 16
	flow := element.Field{Class: element.C0, Fixed: [2]int{1, 0}}
	if h.Porous == Fluid {
		flow.Class = element.C1
		if h.Top == Rigid {
			flow.Fixed[0] = 2
		}
	}
	s.velocity = s.field(flow)
	heat := element.Field{Class: element.C0, Fixed: [2]int{1, 0}}
	if h.Measure == SelfSimilar {
		heat.Fixed[1] = 1 // decays like exp(-ζ²/4)
	}
	s.temperature = s.field(heat)
	h.flow(s)
	h.heat(s)
	return s
}

// flow adds the operator on w and the buoyancy. Below the mesh, without
// buoyancy, w = (a + b ζ)exp(-kζ), or a exp(-kζ) in a porous medium, stores the
// dissipation 2k w'² + 2k³w², or k w².
func (h CoolingHalfSpace) flow(s *system) {
	w, t := s.velocity, s.temperature
	drive := integral{pencil.FirstDrive, 2, w, t, 0}
	s.add(drive, 0, 0, -1)
	base := func(power int) integral { return integral{pencil.Base, power, w, w, 0} }
	if h.Porous == Darcy {
		s.diffusion(w, 0, 1, 0)
		s.addEnd(base(1), 1, 0, 0, 1)
		if h.Measure == FrozenBase { // θ = θ₁exp(-kζ) below drives a part kζ/2 θ₁exp(-kζ)
			drive.power = 1
			s.addEnd(drive, 1, 0, 0, -0.5)
		}
		return
	}
	s.add(base(0), 2, 2, 1)
	s.add(base(2), 1, 1, 2)
	s.add(base(4), 0, 0, 1)
	s.addEnd(base(2), 1, 1, 0, 1)
	s.addEnd(base(2), 1, 0, 1, 1)
	s.addEnd(base(1), 1, 1, 1, 2)
	s.addEnd(base(3), 1, 0, 0, 2)
	if h.Measure == FrozenBase { // a part ζ²/8 θ₁exp(-kζ)
		drive.power = 0
		s.addEnd(drive, 1, 1, 0, -0.25)
		drive.power = 1
		s.addEnd(drive, 1, 0, 0, -0.75)
	}
}

// heat adds s θ = (D² + (ζ/2)D - k²)θ + f w.
func (h CoolingHalfSpace) heat(s *system) {
	w, t := s.velocity, s.temperature
	s.diffusion(t, 0, 1, 0)
	f := s.coefficient(func(z float64) float64 { return math.Exp(-z*z/4) / math.Sqrt(math.Pi) })
	s.add(integral{pencil.Base, 0, t, w, f}, 0, 0, -1)
	if h.Measure == FrozenBase {
		s.addEnd(integral{pencil.Base, 1, t, t, 0}, 1, 0, 0, 1)
		return
	}
	half := s.coefficient(func(z float64) float64 { return z / 2 })
	s.add(integral{pencil.Base, 0, t, t, half}, 0, 1, -1)
	s.add(integral{pencil.Base, 0, t, t, 0}, 0, 0, h.Exponent)
}
