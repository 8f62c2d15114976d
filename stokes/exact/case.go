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

	// Sheets are forces concentrated on horizontal lines, which Force leaves
	// out.
	Sheets []Sheet

	// Expect is what a second-order scheme should show.
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

// Orders are the powers of the width of cells with which errors fall.
type Orders struct {
	Velocity, Pressure float64 // root mean square over the box
}
