package exact

import "math"

// A Case is a solution with a box in which a solver can find it: the viscosity
// and the force are those of the Solution, the Walls are as given, and the
// pressure may differ by a constant.
type Case struct {
	Name   string // lower case, different for each case
	Source string // author and year of the problem class
	Solution
	Box   Box
	Walls Walls

	// XLines and ZLines are the vertical and horizontal lines within the box
	// on which viscosity, force or the derivatives of the flow jump. A
	// scheme loses accuracy where they run through its cells.
	XLines, ZLines []float64

	// Circle is the radius of the circle around the origin on which the
	// viscosity jumps, zero if there is none.
	Circle float64

	// Sheets are forces concentrated on horizontal lines, which Force leaves
	// out.
	Sheets []Sheet

	// Expect is what a scheme of second order should show at least, with grid
	// lines on XLines and ZLines.
	Expect Orders
}

// A Sheet is an upward force per area on a horizontal line.
type Sheet struct {
	Z     float64
	Force float64 // amplitude
	KX    float64 // wavenumber
}

// At returns the force per area at a point of the line.
func (s Sheet) At(x float64) float64 { return s.Force * math.Cos(s.KX*x) }

// Orders are the powers of the width of cells with which the errors fall, as
// root mean squares over the box; zero if there is nothing to measure. Where
// the viscosity jumps between cells they are one for a scheme that does not
// care how viscosities are averaged there, and two if it takes the harmonic
// mean for shear along the line. Where it jumps inside cells, pressure and
// stress next to the jump are wrong by a fixed fraction however fine the grid.
type Orders struct{ Velocity, Pressure float64 }
