// Package dissect factors the sparse matrices that five-point stencils leave on
// a rectangle of cells, by nested dissection.
//
// A line of cells cuts the rectangle in two halves that know nothing of each
// other; each half is cut again, until a handful of cells is left. Eliminated
// from the inside out, an n-by-n square takes O(n³) operations and O(n² log n)
// memory (George 1973), both optimal for a direct method:
//
//	s := dissect.New(nx, nz, false)
//	err := s.Factor(m)     // again whenever the coefficients change
//	s.SolveTo(x, b)        // as often as needed
//
// # Method
//
// Multifrontal elimination (Duff and Reid 1983): each cut assembles a dense
// matrix of its own cells and of those that surround its half, eliminates its
// own, and hands the Schur complement of the rest to the next cut. Rows are
// exchanged within the cells of a cut, never across cuts: the matrix must be
// one that factors block by block, such as a diagonally dominant one or one
// with a positive definite symmetric part.
//
// # Limits
//
// A [Solver] serves one goroutine at a time.
package dissect
