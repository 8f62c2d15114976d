package exact

import (
	"fmt"
	"math"
)

// A Case is a solution with a box and a span of time in which a solver can find
// it: the coefficients of the equation are those of the Solution's Medium, the
// temperature at Start is that of its At, and the Walls are as given, with the
// numbers of [Case.WallAt].
type Case struct {
	Name   string // lower case, different for each case
	Source string // where the solution comes from
	Solution
	Box   Box
	Walls Walls

	// Start and End are the span of time. They are equal where the solution
	// is steady.
	Start, End float64

	// Transfer is the coefficient of heat transfer of walls that are [Robin].
	Transfer float64

	// XLines and ZLines are the vertical and horizontal lines within the box
	// on which the coefficients jump. A scheme loses accuracy where they run
	// through its cells.
	XLines, ZLines []float64

	// Expect is what a second-order scheme should show.
	Expect Orders
}

// Orders are the powers with which errors fall, of the width of cells and, where
// the solution is not steady, of the time step with it; zero where there is
// nothing to measure. A scheme may do better: linear and parabolic profiles (of
// layers, geotherm and couette heating) come out to rounding in many, and
// rounding errors have no order.
type Orders struct {
	Temperature, Flux float64 // root mean square, over the box and over its walls
}

// Steady reports whether the solution does not change with time.
func (c Case) Steady() bool { return c.Start == c.End }

// side returns the wall on a side, the point of it with coordinate s (x along
// Bottom and Top, z along Left and Right), and the unit vector into the box.
func (c Case) side(side Side, s float64) (w Wall, x, z, nx, nz float64) {
	switch side {
	case Left:
		return c.Walls.Left, c.Box.Left, s, 1, 0
	case Right:
		return c.Walls.Right, c.Box.Right, s, -1, 0
	case Bottom:
		return c.Walls.Bottom, s, c.Box.Bottom, 0, 1
	case Top:
		return c.Walls.Top, s, c.Box.Top, 0, -1
	}
	return -1, 0, 0, 0, 0
}

// WallAt returns the number that a wall needs at the coordinate s along it (x on
// Bottom and Top, z on Left and Right) and the time t: the temperature of an
// [Isothermal] wall, the flux into the box of a [Flux] wall, the temperature of
// the surroundings of a [Robin] wall, and 0 for others.
func (c Case) WallAt(side Side, s, t float64) float64 {
	w, x, z, nx, nz := c.side(side, s)
	if w == Insulating || w == Periodic {
		return 0
	}
	f := c.At(x, z, t)
	flux := nx*f.FluxX + nz*f.FluxZ
	switch w {
	case Isothermal:
		return f.Temperature
	case Flux:
		return flux
	case Robin:
		return f.Temperature + flux/c.Transfer
	}
	return math.NaN()
}

// Validate reports what is wrong with a case, its Solution included.
func (c Case) Validate() error {
	if c.Solution == nil {
		return fmt.Errorf("exact: Case.Solution of %q is nil", c.Name)
	}
	if err := first(
		c.Solution.Validate(),
		c.Walls.check("Case"),
		positive("Case.Box.Width", c.Box.Width()),
		positive("Case.Box.Height", c.Box.Height()),
		anyFinite("Case.Start", c.Start),
		notNegative("Case.End less Start", c.End-c.Start),
		notNegative("Case.Transfer", c.Transfer),
	); err != nil {
		return err
	}
	d := c.Domain()
	if !d.Contains(c.Box.Left, c.Box.Bottom, c.Start) || !d.Contains(c.Box.Right, c.Box.Top, c.Start) {
		return fmt.Errorf("exact: Case.Box is %+v from %g on, want inside the domain %+v", c.Box, c.Start, d)
	}
	return nil
}
