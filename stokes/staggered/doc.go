// Package staggered holds the grid on which overturn's kernels work and the
// fields that live on it.
//
// The box is cut into nx by nz rectangular cells. Scalars sit at cell centres,
// velocity components at the centres of the faces they are normal to, so that
// the divergence of a cell is made of its own four faces and pressure and
// velocity never decouple (Harlow & Welch 1965):
//
//	corner ──── vz ──── corner
//	  │                   │
//	  vx     T, P, η      vx        z up, x to the right
//	  │                   │
//	corner ──── vz ──── corner
//
// A grid is made once and shared; a field is a slice with a grid:
//
//	g, err := staggered.Uniform(128, 64, 2, 1)
//	t := staggered.NewScalar(g)
//	t.Fill(func(x, z float64) float64 { return 1 - z })
//
// # Conventions
//
// Storage is row-major with x fastest and without ghost cells, so that a
// caller can wrap arrays of its own without a copy:
//
//	[Scalar]   cell centres      nx·nz          Values[k*nx+i]
//	[Nodal]    corners           (nx+1)·(nz+1)  Values[k*(nx+1)+i]
//	[Vector]   X on x-faces      (nx+1)·nz      X[k*(nx+1)+i]
//	           Z on z-faces      nx·(nz+1)      Z[k*nx+i]
//	[Flow]     VX, VZ as Vector, P as Scalar
//
// i counts columns from the left, k rows from the bottom. Lengths and values
// are plain float64 numbers in any one consistent set of units. On a box that
// is periodic in x the last column of VX repeats the first.
//
// Methods that fill a destination or combine two fields want them on grids of
// as many columns and rows, as indexing a slice wants an index in range: they
// return no error and may panic otherwise. Fields that come from outside are
// checked once, by the Wrap functions.
//
// # Accuracy
//
// Means, integrals, interpolation and extrapolation to the walls are second
// order in the cell size on uniform grids and on grids whose spacing varies
// smoothly, such as those of [Graded].
//
// # Concurrency
//
// A [Grid] is immutable and safe for concurrent use. Fields are plain memory:
// concurrent reading is safe, writing is not. Sums run in a fixed order, so
// that equal fields have equal means to the bit.
package staggered
