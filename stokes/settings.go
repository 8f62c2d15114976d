package stokes

import (
	"fmt"
	"runtime"
)

// Settings tunes a [Solver]. A nil *Settings, or a zero field, means the
// default.
type Settings struct {
	// Tolerance is the ratio of the weighted residual of the answer to that of
	// the fluid at rest, at which Solve stops; see [Report]. Default
	// [DefaultTolerance].
	Tolerance float64

	// MaxIterations bounds the iterations of one Solve. Default
	// [DefaultMaxIterations].
	MaxIterations int

	// Method is how to solve. Default [Automatic]: the fastest that applies.
	Method Method

	// MaxBasis bounds the search directions that are kept when convergence is
	// slow, each of which takes 48 bytes a cell. Default [DefaultMaxBasis].
	MaxBasis int

	// CornerMean is how the viscosity at the corners of cells, where shear
	// stress lives, follows from that of the cells around. Default
	// [Geometric]. On sharp jumps it decides the size of the error. Where jumps
	// lie on grid lines [Harmonic] is second order accurate, the others first;
	// where they do not, all are first order, and Harmonic is the more accurate
	// for bodies stiffer than their surroundings, [Arithmetic] for weaker ones.
	CornerMean Mean

	// Workers is the number of goroutines. It changes the time a solve
	// takes, never its result. Default runtime.GOMAXPROCS(0).
	Workers int

	// Monitor, if not nil, is called before the first and after every
	// iteration with the relative residual.
	Monitor func(iteration int, residual float64)
}

// Defaults of [Settings].
const (
	DefaultTolerance     = 1e-8
	DefaultMaxIterations = 200
	DefaultMaxBasis      = 200
)

// A Mean is a kind of average of viscosities.
type Mean int

// The kinds of mean.
const (
	Geometric Mean = iota
	Arithmetic
	Harmonic
)

// String returns the name of the mean in lower case.
func (m Mean) String() string {
	switch m {
	case Geometric:
		return "geometric"
	case Arithmetic:
		return "arithmetic"
	case Harmonic:
		return "harmonic"
	}
	return fmt.Sprintf("Mean(%d)", int(m))
}

// withDefaults returns a copy of s in which nothing is zero, or an error that
// names the field that makes no sense.
func (s *Settings) withDefaults() (Settings, error) {
	var c Settings
	if s != nil {
		c = *s
	}
	switch {
	case c.Tolerance == 0:
		c.Tolerance = DefaultTolerance
	case !(c.Tolerance > 0 && c.Tolerance < 1):
		return c, fmt.Errorf("stokes: Tolerance is %v, want more than 0 and less than 1", c.Tolerance)
	}
	for _, f := range []struct {
		name     string
		value    *int
		standard int
	}{
		{"MaxIterations", &c.MaxIterations, DefaultMaxIterations},
		{"MaxBasis", &c.MaxBasis, DefaultMaxBasis},
		{"Workers", &c.Workers, runtime.GOMAXPROCS(0)},
	} {
		if *f.value == 0 {
			*f.value = f.standard
		}
		if *f.value < 0 {
			return c, fmt.Errorf("stokes: %s is %d, want at least 1", f.name, *f.value)
		}
	}
	if c.Method < Automatic || c.Method > Transform {
		return c, fmt.Errorf("stokes: Method is %v, want Automatic, Multigrid or Transform", c.Method)
	}
	if c.CornerMean < Geometric || c.CornerMean > Harmonic {
		return c, fmt.Errorf("stokes: CornerMean is %v, want Geometric, Arithmetic or Harmonic", c.CornerMean)
	}
	return c, nil
}
