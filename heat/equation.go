package heat

import (
	"errors"
	"fmt"
	"math"

	"example.org/overturn/stokes/staggered"
)

// An Equation is the problem that a [Stepper] solves,
//
//	C (∂T/∂t + v·∇T) = ∇·(k ∇T) + Source,
//
// on the cells of a grid. Its fields must live on that grid.
type Equation struct {
	Grid  *staggered.Grid
	Walls Walls

	// Conductivity is k, not negative; nil means 1 everywhere. It is read
	// by NewStepper only. Through a face between two cells heat passes as
	// through two layers in series.
	Conductivity *staggered.Scalar

	// HeatCapacity is C = ρ·cp, per volume, positive; nil means 1 everywhere.
	// It is read by NewStepper only.
	HeatCapacity *staggered.Scalar

	// Source is the heat produced per volume and time; nil means none. It is
	// read at every step and may change between steps; the values of the
	// middle of the next step keep it at second order.
	Source *staggered.Scalar
}

// check reports what is wrong with the equation.
func (eq *Equation) check() error {
	if eq.Grid == nil {
		return errors.New("heat: Equation.Grid is nil, want a grid")
	}
	if err := eq.Walls.check(); err != nil {
		return err
	}
	for _, f := range []struct {
		name  string
		field *staggered.Scalar
		valid func(v float64) bool
		want  string
	}{
		{"Conductivity", eq.Conductivity, func(v float64) bool { return v >= 0 && v <= math.MaxFloat64 }, "finite and >= 0"},
		{"HeatCapacity", eq.HeatCapacity, func(v float64) bool { return v > 0 && v <= math.MaxFloat64 }, "finite and > 0"},
		{"Source", eq.Source, func(v float64) bool { return math.Abs(v) <= math.MaxFloat64 }, "finite"},
	} {
		if f.field == nil {
			continue
		}
		if err := checkScalar(eq.Grid, f.name, f.field); err != nil {
			return err
		}
		for c, v := range f.field.Values {
			if !f.valid(v) {
				nx := eq.Grid.NX()
				return fmt.Errorf("heat: %s of cell (%d, %d) is %v, want %s", f.name, c%nx, c/nx, v, f.want)
			}
		}
	}
	return nil
}

// checkScalar reports whether a field fits a grid.
func checkScalar(g *staggered.Grid, name string, s *staggered.Scalar) error {
	nx, nz := g.Cells()
	switch {
	case s == nil:
		return fmt.Errorf("heat: %s is nil, want a field of %dx%d cells: %w", name, nx, nz, ErrSize)
	case len(s.Values) != nx*nz:
		return fmt.Errorf("heat: %s has %d values, want %d: %w", name, len(s.Values), nx*nz, ErrSize)
	case s.Grid != nil && s.Grid != g && !s.Grid.Equal(g):
		return fmt.Errorf("heat: %s lives on another grid, want that of the equation: %w", name, ErrSize)
	}
	return nil
}

// checkFlow reports whether a flow fits a grid. A nil flow is at rest.
func checkFlow(g *staggered.Grid, f *staggered.Flow) error {
	if f == nil {
		return nil
	}
	nx, nz := g.Cells()
	switch {
	case len(f.VX) != (nx+1)*nz:
		return fmt.Errorf("heat: flow has %d values of VX, want %d: %w", len(f.VX), (nx+1)*nz, ErrSize)
	case len(f.VZ) != nx*(nz+1):
		return fmt.Errorf("heat: flow has %d values of VZ, want %d: %w", len(f.VZ), nx*(nz+1), ErrSize)
	case f.Grid != nil && f.Grid != g && !f.Grid.Equal(g):
		return fmt.Errorf("heat: flow lives on another grid, want that of the equation: %w", ErrSize)
	}
	return nil
}
