package exact

import "math"

// A Solution is a temperature field that satisfies
//
//	C (∂T/∂t + v·∇T) = ∇·(k ∇T) + Source
//
// exactly. Solutions do not change and are safe for concurrent use.
type Solution interface {
	// At returns temperature and flux. Outside the domain of the solution
	// all three numbers are NaN. A steady solution does not look at t.
	At(x, z, t float64) State

	// Medium returns the coefficients of the equation.
	Medium(x, z, t float64) Medium

	// Domain returns where and from when on the solution holds.
	Domain() Domain

	// Validate returns an error that names the first parameter that makes no
	// sense, its value and what is allowed; nil for a Solution that a
	// Problem returned.
	Validate() error
}

// A Problem is a set of parameters that has an exact solution. Solve fails if
// a parameter makes no sense. The problems of this package are Solutions
// themselves, which may be used without Solve once Validate has returned nil;
// what Solve returns has the constants computed that must be found first.
type Problem interface {
	Solve() (Solution, error)
}

// A State is the temperature at a point and a time, and the heat that is
// conducted there per area and time: −k∇T by components.
type State struct{ Temperature, FluxX, FluxZ float64 }

// A Medium is what the equation says of a point and a time beside its
// temperature.
type Medium struct {
	Conductivity float64 // k
	HeatCapacity float64 // C = ρ·cp, per volume
	Source       float64 // heat produced per volume and time
	VX, VZ       float64 // velocity
}

// A Domain is the region of the plane where a solution holds, and the time from
// which on it does. Its ends belong to it unless they are infinite.
type Domain struct{ Left, Right, Bottom, Top, Start float64 }

// Contains reports whether a point and a time lie in the domain.
func (d Domain) Contains(x, z, t float64) bool {
	return x >= d.Left && x <= d.Right && z >= d.Bottom && z <= d.Top && t >= d.Start
}

var (
	forever = math.Inf(-1) // start of a domain without beginning
	far     = math.Inf(1)  // end of a domain without end
)

// plane, above, layer and rectangle are the usual domains.

func plane(start float64) Domain { return Domain{-far, far, -far, far, start} }

func above(start float64) Domain { return Domain{-far, far, 0, far, start} }

func layer(thickness, start float64) Domain { return Domain{-far, far, 0, thickness, start} }

func rectangle(width, height, start float64) Domain { return Domain{0, width, 0, height, start} }

// nowhere is the state outside a domain.
var nowhere = State{math.NaN(), math.NaN(), math.NaN()}

// checked returns a solution that has good parameters.
func checked(s Solution) (Solution, error) {
	if err := s.Validate(); err != nil {
		return nil, err
	}
	return s, nil
}

// A column is a solution that depends on z and t only.
type column interface {
	Domain() Domain

	// profile returns temperature and flux along z, inside the domain.
	profile(z, t float64) (temperature, flux float64)
}

// along gives a column to the plane.
func along[C column](c C, x, z, t float64) State {
	if !c.Domain().Contains(x, z, t) {
		return nowhere
	}
	temperature, flux := c.profile(z, t)
	return State{Temperature: temperature, FluxZ: flux}
}

// A picture is a solution that depends on both coordinates.
type picture interface {
	Domain() Domain

	// state returns temperature and flux inside the domain.
	state(x, z, t float64) State
}

// inside cuts a picture out along its domain.
func inside[P picture](p P, x, z, t float64) State {
	if !p.Domain().Contains(x, z, t) {
		return nowhere
	}
	return p.state(x, z, t)
}
