package stability

import (
	"errors"
	"fmt"
	"math"
	"slices"
	"sort"
)

// A Stack is a pile of layers of viscous fluids that do not mix and do not
// diffuse, under gravity, without inertia: what is heavy above and light below
// overturns at the growth rates of Rayleigh-Taylor instability. All its numbers
// are in one consistent set of units, SI or dimensionless.
//
// At each interface velocity and stress are continuous but for the weight of
// the bump, Δρ g ζ with ζ the displacement and Δρ the density above minus that
// below, and the surface tension; and σζ = w. The growth rates of N interfaces
// are the N eigenvalues of a symmetrisable problem, and real.
type Stack struct {
	// Layers from the bottom to the top, at least one.
	Layers []Stratum

	// Bottom and Top are Free or Rigid. A nil one means Free.
	Bottom, Top Boundary

	// Open makes the top a free surface that moves, with nothing above it,
	// instead of a flat boundary. Its tension is that of the top layer.
	Open Surface

	// Gravity, > 0.
	Gravity float64
}

// Surface says whether the top of a [Stack] can move.
type Surface int

const (
	// Flat keeps the top in place.
	Flat Surface = iota
	// Deformable lets it move.
	Deformable
)

// A Stratum is one layer of a [Stack].
type Stratum struct {
	Thickness float64 // > 0
	Density   float64 // ≥ 0
	Viscosity float64 // > 0

	// Tension is the surface tension of the interface on top of the layer, ≥ 0.
	Tension float64
}

// A StackGrowth is a disturbance of a stack.
type StackGrowth struct {
	// Rate is the growth rate, per unit of time; negative for decay.
	Rate float64

	// Wavenumber is in radians per unit of length.
	Wavenumber float64

	// Error estimates the errors of the rate and of the wavenumber.
	Error StackError

	// Displacements are the relative displacements of the interfaces, from
	// the lowest up, the largest being 1.
	Displacements []float64
}

// StackError holds estimates of absolute errors.
type StackError struct{ Rate, Wavenumber float64 }

// Time returns the time in which the disturbance grows by a factor.
func (g StackGrowth) Time(factor float64) float64 { return math.Log(factor) / g.Rate }

// check finds what a stack cannot have.
func (s Stack) check() error {
	if len(s.Layers) == 0 {
		return errors.New("stability: stack has no layers, want at least one")
	}
	for i, l := range s.Layers {
		for _, c := range []struct {
			name  string
			value float64
			ok    bool
			want  string
		}{
			{"thickness", l.Thickness, finiteFrom(l.Thickness, 0) && l.Thickness > 0, "finite and > 0"},
			{"density", l.Density, finiteFrom(l.Density, 0), "finite and ≥ 0"},
			{"viscosity", l.Viscosity, finiteFrom(l.Viscosity, 0) && l.Viscosity > 0, "finite and > 0"},
			{"tension", l.Tension, finiteFrom(l.Tension, 0), "finite and ≥ 0"},
		} {
			if !c.ok {
				return &InputError{fmt.Sprintf("%s of layer %d", c.name, i), c.value, c.want}
			}
		}
	}
	if !(finiteFrom(s.Gravity, 0) && s.Gravity > 0) {
		return &InputError{"Stack.Gravity", s.Gravity, "finite and > 0"}
	}
	if s.Open == Flat && len(s.Layers) == 1 {
		return errors.New("stability: stack has one layer and a flat top, so that nothing can move")
	}
	if err := conditionsOf(s.Bottom).check("bottom", false); err != nil {
		return err
	}
	return conditionsOf(s.Top).check("top", false)
}

// stackScales are the units in which a stack is computed: its depth, its largest
// viscosity, and the largest density step.
type stackScales struct {
	depth, viscosity, density, time float64
}

func (s Stack) scales() stackScales {
	var u stackScales
	for i, l := range s.Layers {
		u.depth += l.Thickness
		u.viscosity = max(u.viscosity, l.Viscosity)
		u.density = max(u.density, math.Abs(s.step(i)))
	}
	if u.density == 0 {
		u.density = 1
	}
	u.time = u.viscosity / (u.density * s.Gravity * u.depth)
	return u
}

// step returns the density above a layer minus its own.
func (s Stack) step(i int) float64 {
	switch {
	case i+1 < len(s.Layers):
		return s.Layers[i+1].Density - s.Layers[i].Density
	case s.Open == Deformable:
		return -s.Layers[i].Density
	}
	return 0
}

// engine builds the equations of a stack.
func (s Stack) engine() (*engine, stackScales, error) {
	if err := s.check(); err != nil {
		return nil, stackScales{}, err
	}
	u := s.scales()
	sys := newSystem(1, false)
	s.interfaces(sys, u)
	sys.stokes(&Layer{Bottom: s.Bottom, Top: s.Top}, sys.coefficient(s.profile(sys.nodes, u.viscosity)))
	if s.Open == Deformable {
		sys.fields[sys.velocity].Fixed[1] = 0
	}
	b := &stackBound{open: s.Open == Deformable, least: math.Inf(1)}
	for _, l := range s.Layers {
		b.least = min(b.least, l.Viscosity/u.viscosity)
	}
	for _, i := range sys.interfaces {
		b.excess += max(0, i.excess)
	}
	e := &engine{
		moving: &ladder{system: sys}, bound: b,
		from: leastWavenumber, tolerance: DefaultTolerance, maxUnknowns: DefaultMaxUnknowns,
	}
	return e, u, nil
}

// interfaces sets the nodes and the interfaces of a system.
func (s Stack) interfaces(sys *system, u stackScales) {
	z := 0.0
	sys.nodes = []float64{0}
	for i, l := range s.Layers {
		z += l.Thickness
		sys.nodes = append(sys.nodes, z/u.depth)
		if i == len(s.Layers)-1 && s.Open == Flat {
			break
		}
		sys.interfaces = append(sys.interfaces, bump{
			z: sys.nodes[i+1], excess: s.step(i) / u.density,
			tension: l.Tension / (u.density * s.Gravity * u.depth * u.depth),
		})
	}
	sys.nodes[len(sys.nodes)-1] = 1
	if s.Open == Deformable {
		sys.interfaces[len(sys.interfaces)-1].z = 1
	}
}

// profile returns the relative viscosity at a height.
func (s Stack) profile(nodes []float64, viscosity float64) func(z float64) float64 {
	values := make([]float64, len(s.Layers))
	for i, l := range s.Layers {
		values[i] = l.Viscosity / viscosity
	}
	tops := nodes[1 : len(nodes)-1]
	return func(z float64) float64 { return values[sort.SearchFloat64s(tops, z)] }
}

// A stackBound limits the growth rates of a stack of depth 1. A force F at an
// interface moves it at a velocity w = c F at most, since w² ≤ c a(w,w) with a
// the dissipation.
type stackBound struct {
	least  float64 // viscosity
	excess float64 // sum of the unstable ones
	open   bool
}

func (b *stackBound) lower(float64, Number, [3]float64) float64 { return 0 }

func (b *stackBound) growth(k float64, _ [3]float64) float64 {
	compliance := 1 / (math.Sqrt2 * k * k * k) // w² ≤ 2‖w‖‖w'‖
	if b.open {
		compliance = min(compliance, 1/(2*k*k)) // w² ≤ ‖w'‖²
	} else {
		compliance = min(compliance, 1.0/48) // a hinged beam under a load
	}
	return k * k * b.excess * compliance / b.least
}

// Growth returns the disturbances of wavenumber k > 0, the fastest-growing
// first: one for each interface.
func (s Stack) Growth(k float64) ([]StackGrowth, error) {
	if err := checkWavenumber(k); err != nil {
		return nil, err
	}
	e, u, err := s.engine()
	if err != nil {
		return nil, err
	}
	g := growing{engine: e}
	out := make([]StackGrowth, len(e.moving.system.interfaces))
	for i := range out {
		a, err := g.at(k*u.depth, i)
		if err != nil && !errors.Is(err, ErrNotConverged) {
			return nil, err
		}
		out[i] = newStackGrowth(&a, u)
	}
	return out, nil
}

// Fastest returns the disturbance that grows fastest of all wavenumbers. The
// error is [ErrStable] if none grows.
func (s Stack) Fastest() (StackGrowth, error) {
	e, u, err := s.engine()
	if err != nil {
		return StackGrowth{}, err
	}
	g := growing{engine: e}
	a, err := g.fastest()
	if err != nil && !errors.Is(err, ErrNotConverged) {
		return StackGrowth{}, err
	}
	return newStackGrowth(&a, u), err
}

func newStackGrowth(a *answer, u stackScales) StackGrowth {
	n := a.layout.Size() // the displacements come after all fields
	d := slices.Clone(a.re[n:])
	largest := 0.0
	for _, v := range d {
		if math.Abs(v) > math.Abs(largest) {
			largest = v
		}
	}
	for i := range d {
		d[i] /= largest
	}
	return StackGrowth{
		Rate: real(a.Sigma) / u.time, Wavenumber: a.K / u.depth, Displacements: d,
		Error: StackError{Rate: a.valueError / u.time, Wavenumber: a.kError / u.depth},
	}
}
