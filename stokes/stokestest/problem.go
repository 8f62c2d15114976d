package stokestest

import (
	"context"

	"example.org/overturn/stokes/exact"
	"example.org/overturn/stokes/stokestest/trial"
)

// A Solver is the code to be tested: it finds the flow of a problem. An error
// that wraps [errors.ErrUnsupported] declines the case.
type Solver func(ctx context.Context, p Problem) (Answer, error)

// A Problem is what a solver is asked for. The functions serve points of the
// box, its sides included, and may be called by any number of goroutines.
type Problem struct {
	// Name is that of the case.
	Name string

	// Grid has the edges of the cells, X and Z, both starting at 0. A solver
	// that makes its own mesh should make it as fine.
	trial.Grid

	// Viscosity is η. Where it jumps, on lines that are always edges of
	// cells, it is that of the right or upper side.
	Viscosity func(x, z float64) float64

	// Force is the body force per volume.
	Force func(x, z float64) (bx, bz float64)

	// Walls are the kinds of the four sides; the zero value is free slip
	// all round.
	Walls exact.Walls

	// WallVelocity is the velocity of the fluid on sides that are
	// [exact.Driven]. What flows into the box flows out of it up to the
	// error of your quadrature.
	WallVelocity func(x, z float64) (vx, vz float64)
}

// ForceX and ForceZ are the components of Force.

func (p Problem) ForceX(x, z float64) float64 { bx, _ := p.Force(x, z); return bx }

func (p Problem) ForceZ(x, z float64) float64 { _, bz := p.Force(x, z); return bz }

// Tabulate returns f at the points (x[i], z[k]), row-major with x fastest:
//
//	eta := p.Tabulate(p.Viscosity, p.XCentres(), p.ZCentres())
func (p Problem) Tabulate(f func(x, z float64) float64, x, z []float64) []float64 {
	return trial.Tabulate(f, x, z)
}

// AtRest reports whether no side is driven.
func (p Problem) AtRest() bool {
	w := p.Walls
	return w.Left != exact.Driven && w.Right != exact.Driven && w.Bottom != exact.Driven && w.Top != exact.Driven
}

// An Answer is what a solver returns. VX, VZ are required; the rest may
// be left out.
type Answer struct {
	VX, VZ Field // velocity
	P      Field // pressure, up to a constant

	// XX, ZZ and XZ are the stress σ = −P + 2ηε, positive in tension. XX and
	// ZZ are up to the same constant as −P.
	XX, ZZ, XZ Field

	// Divergence is div v as the code understands it, for schemes that make it
	// zero.
	Divergence Field

	// Work is the work of the body force and Dissipation the viscous
	// dissipation ∫2ηε:ε, per time over the whole box. Both zero means
	// not given.
	Work, Dissipation float64
}

// A Field is a quantity as a solver found it; the zero Field is one that it
// does not give. Slices are not copied.
type Field = trial.Field

// Lattice is a field given where the lines x and z cross, both strictly
// increasing: values[k*len(x)+i] belongs to (x[i], z[k]).
func Lattice(x, z, values []float64) Field { return trial.Lattice(x, z, values) }

// Points is a field given at any points (x[i], z[i]), which all count the same
// in errors.
func Points(x, z, values []float64) Field { return trial.Points(x, z, values) }

// Function is a field that can be evaluated anywhere in the box. It is looked
// at in the middles of the cells.
func Function(f func(x, z float64) float64) Field { return trial.Function(f) }
