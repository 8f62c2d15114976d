package heat

import (
	"fmt"
	"runtime"
)

// Advection chooses how the temperature at a face follows from the cells
// around it.
type Advection int

const (
	// Central interpolates linearly between the two cells: second order, no
	// numerical diffusion, but oscillating where the cell Péclet number
	// |v| h/κ exceeds 2 and the temperature is rough. The default.
	Central Advection = iota

	// Bounded is the third-order upwind-biased interpolation, limited so that
	// no step within the stable one makes a new extremum (the limiter of Koren
	// 1993 on uniform grids): second order in the mean, lower at extrema only.
	Bounded
)

// String returns the name of the constant.
func (a Advection) String() string {
	switch a {
	case Central:
		return "Central"
	case Bounded:
		return "Bounded"
	}
	return fmt.Sprintf("Advection(%d)", int(a))
}

// Scheme chooses the integration in time.
type Scheme int

const (
	// RungeKutta3 is the explicit strong-stability-preserving method of third
	// order in three stages (Shu & Osher 1988). The default.
	RungeKutta3 Scheme = iota

	// RungeKutta2 is the one of second order in two stages (Shu & Osher 1988).
	// It is cheaper per step; with Central advection and little conduction its
	// stable step is much shorter.
	RungeKutta2

	// Implicit treats conduction implicitly, advection explicitly: the
	// Rosenbrock method ROS2 of second order (Verwer et al. 1999) with the
	// directions factored, one tridiagonal solve along each per stage. Only
	// the flow limits its step.
	Implicit
)

// String returns the name of the constant.
func (s Scheme) String() string {
	switch s {
	case RungeKutta3:
		return "RungeKutta3"
	case RungeKutta2:
		return "RungeKutta2"
	case Implicit:
		return "Implicit"
	}
	return fmt.Sprintf("Scheme(%d)", int(s))
}

// Limit chooses what a step longer than the stable one does.
type Limit int

const (
	// Enforced makes it an error of type [*StepError]. The default.
	Enforced Limit = iota

	// Unenforced lets it pass, for a caller that has its own bound.
	Unenforced
)

const (
	// DefaultTolerance is the default of Settings.Tolerance.
	DefaultTolerance = 1e-10

	// DefaultMaxIterations is the default of Settings.MaxIterations.
	DefaultMaxIterations = 200
)

// Settings tunes a [Stepper]. A nil *Settings, or a zero field, means the
// default.
type Settings struct {
	// Advection interpolates the temperature at faces. Default Central.
	Advection Advection

	// Scheme integrates in time. Default RungeKutta3.
	Scheme Scheme

	// Limit chooses what a step longer than the stable one does. Default
	// Enforced.
	Limit Limit

	// Tolerance is the residual at which Steady stops: the largest correction
	// of a cell in the last iteration, relative to the largest absolute
	// temperature. Default DefaultTolerance, 1e-10.
	Tolerance float64

	// MaxIterations bounds the iterations of Steady. Default
	// DefaultMaxIterations, 200.
	MaxIterations int

	// Workers is the number of goroutines. It changes the time a step takes,
	// never its result. Default runtime.GOMAXPROCS(0).
	Workers int
}

// withDefaults returns a copy of s, which may be nil, with its zero fields
// filled in.
func (s *Settings) withDefaults() (Settings, error) {
	var c Settings
	if s != nil {
		c = *s
	}
	if c.Tolerance == 0 {
		c.Tolerance = DefaultTolerance
	}
	if c.MaxIterations == 0 {
		c.MaxIterations = DefaultMaxIterations
	}
	if c.Workers == 0 {
		c.Workers = runtime.GOMAXPROCS(0)
	}
	switch {
	case c.Advection < Central || c.Advection > Bounded:
		return c, fmt.Errorf("heat: Settings.Advection is %v, want Central or Bounded", c.Advection)
	case c.Scheme < RungeKutta3 || c.Scheme > Implicit:
		return c, fmt.Errorf("heat: Settings.Scheme is %v, want RungeKutta3, RungeKutta2 or Implicit", c.Scheme)
	case c.Limit < Enforced || c.Limit > Unenforced:
		return c, fmt.Errorf("heat: Settings.Limit is %d, want Enforced or Unenforced", c.Limit)
	case !(c.Tolerance > 0 && c.Tolerance < 1):
		return c, fmt.Errorf("heat: Settings.Tolerance is %v, want between 0 and 1", c.Tolerance)
	case c.MaxIterations < 0:
		return c, fmt.Errorf("heat: Settings.MaxIterations is %d, want >= 0", c.MaxIterations)
	case c.Workers < 0:
		return c, fmt.Errorf("heat: Settings.Workers is %d, want >= 0", c.Workers)
	}
	return c, nil
}
