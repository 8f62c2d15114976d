package exact

import (
	"fmt"
	"math"
)

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

// A Solution is a temperature field that satisfies
//
//	C (∂T/∂t + v·∇T) = ∇·(k ∇T) + Source
//
// exactly. Solutions are values: their methods change nothing and may be called
// by many goroutines.
type Solution interface {
	// At returns temperature and flux. Outside the domain of the solution
	// all three numbers are NaN. A steady solution does not look at t.
	At(x, z, t float64) State

	// Medium returns the coefficients of the equation.
	Medium(x, z, t float64) Medium

	// Domain returns where and from when on the solution holds.
	Domain() Domain

	// Validate returns an error that names the first field that makes no
	// sense, its value and what is allowed. At means nothing before it
	// returned nil.
	Validate() error
}

// TemperatureTo fills dst with the temperatures of a solution at the points of
// a rectangular grid: dst[k*len(x)+i] at x[i], z[k]. A point outside the domain
// is an error.
func TemperatureTo(dst []float64, s Solution, x, z []float64, t float64) error {
	if err := s.Validate(); err != nil {
		return err
	}
	if len(dst) != len(x)*len(z) {
		return fmt.Errorf("heat/exact: dst has %d values, want %d times %d", len(dst), len(x), len(z))
	}
	d := s.Domain()
	for k, zk := range z {
		row := dst[k*len(x):][:len(x)]
		for i, xi := range x {
			if !d.Contains(xi, zk, t) {
				return fmt.Errorf("heat/exact: (%g, %g) at time %g is outside the domain %+v of %T", xi, zk, t, d, s)
			}
			row[i] = s.At(xi, zk, t).Temperature
		}
	}
	return nil
}

var (
	forever = math.Inf(-1) // start of a domain without beginning
	far     = math.Inf(1)  // end of a domain without end
)

// plane, above and layer are the usual domains.

func plane(start float64) Domain { return Domain{-far, far, -far, far, start} }

func above(start float64) Domain { return Domain{-far, far, 0, far, start} }

func layer(thickness, start float64) Domain { return Domain{-far, far, 0, thickness, start} }

func box(width, height, start float64) Domain { return Domain{0, width, 0, height, start} }

// nowhere is the state outside a domain.
var nowhere = State{math.NaN(), math.NaN(), math.NaN()}

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
