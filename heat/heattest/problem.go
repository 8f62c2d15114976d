package heattest

import (
	"context"

	"example.org/overturn/heat/exact"
	"example.org/overturn/stokes/stokestest/trial"
	"gonum.org/v1/gonum/integrate/quad"
)

// A Solver is the code to be tested: it finds the temperature of a problem. An
// error that wraps [errors.ErrUnsupported] declines the case.
type Solver func(ctx context.Context, p Problem) (Answer, error)

// A Problem is what a solver is asked for. The functions serve points of the
// box, its sides included, and may be called by any number of goroutines.
type Problem struct {
	// Name is that of the case.
	Name string

	// Grid has the edges of the cells, X and Z, both starting at 0. A solver
	// that makes its own mesh should make it as fine.
	trial.Grid

	// Duration is how long after the start the temperature is asked for; zero
	// asks for the steady state.
	Duration float64

	// Steps is the number of time steps that keeps to the width of cells; a
	// solver may take a fixed multiple of it, or more if it must to be stable.
	Steps int

	// Initial is the temperature at the start. Of a steady state it is zero.
	Initial func(x, z float64) float64

	// Conductivity is k and HeatCapacity C = ρ·cp. Where they jump, on lines
	// that are always edges of cells, they are those of one side or the other.
	Conductivity, HeatCapacity func(x, z float64) float64

	// Velocity is that of the fluid, free of divergence.
	Velocity func(x, z float64) (vx, vz float64)

	// Source is the heat produced per volume and time at the time t.
	Source func(x, z, t float64) float64

	// Walls are the kinds of the four sides; the zero value insulates all.
	Walls exact.Walls

	// WallValue is the number that a side needs at the coordinate s along it
	// (x on Bottom and Top, z on Left and Right) and the time t: the temperature
	// of an Isothermal wall, the flux into the box of a Flux wall, the
	// temperature of the surroundings of a Robin wall, and 0 for others.
	WallValue func(side exact.Side, s, t float64) float64

	// Transfer is the coefficient of heat transfer of Robin walls: the flux
	// into the box is Transfer times the excess of the surroundings'
	// temperature over that of the wall.
	Transfer float64
}

// Steady reports whether the steady state is asked for.
func (p Problem) Steady() bool { return p.Duration == 0 }

// VelocityX and VelocityZ are the components of Velocity.

func (p Problem) VelocityX(x, z float64) float64 { vx, _ := p.Velocity(x, z); return vx }

func (p Problem) VelocityZ(x, z float64) float64 { _, vz := p.Velocity(x, z); return vz }

// SourceAt returns the source at one time.
func (p Problem) SourceAt(t float64) func(x, z float64) float64 {
	return func(x, z float64) float64 { return p.Source(x, z, t) }
}

// Tabulate returns f at the points (x[i], z[k]), row-major with x fastest:
//
//	k := p.Tabulate(p.Conductivity, p.XCentres(), p.ZCentres())
func (p Problem) Tabulate(f func(x, z float64) float64, x, z []float64) []float64 {
	return trial.Tabulate(f, x, z)
}

// FaceFlow returns the mean normal velocity of each face of the cells, free of
// divergence to the error of quadrature, about 1e-12: vx on the vertical faces,
// (nx+1)·nz numbers, and vz on the horizontal ones, nx·(nz+1), row-major with x
// fastest.
func (p Problem) FaceFlow() (vx, vz []float64) {
	const points = 8
	nodes, weights := make([]float64, points), make([]float64, points)
	quad.Legendre{}.FixedLocations(nodes, weights, 0, 1)
	mean := func(f func(s float64) float64, start, end float64) float64 {
		sum := 0.0
		for i, u := range nodes {
			sum += weights[i] * f(start+(end-start)*u)
		}
		return sum
	}
	for k := range p.Z[1:] {
		for _, x := range p.X {
			vx = append(vx, mean(func(z float64) float64 { return p.VelocityX(x, z) }, p.Z[k], p.Z[k+1]))
		}
	}
	for _, z := range p.Z {
		for i := range p.X[1:] {
			vz = append(vz, mean(func(x float64) float64 { return p.VelocityZ(x, z) }, p.X[i], p.X[i+1]))
		}
	}
	return vx, vz
}

// An Answer is what a solver returns. The temperature is required; the rest
// may be left out.
type Answer struct {
	Temperature Field

	// Flux is the heat conducted into the box through each side, per area and
	// time, each a [Profile]; the index is an [exact.Side].
	Flux [4]Field

	// Budget is the heat as the code counts it.
	Budget *Budget
}

// A Budget is the heat of the whole box, per length perpendicular to it. The
// change of ∫CT must be what was gained. Of a steady state Gained is the power,
// which must vanish, and Before and After are equal.
type Budget struct {
	Before, After float64 // ∫CT
	Gained        float64 // from walls, flow and sources
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

// Profile is a quantity along a wall, given at the strictly increasing
// coordinates s along it: x on bottom and top, z on left and right.
func Profile(s, values []float64) Field { return trial.Profile(s, values) }
