// Package multigrid solves the variable-viscosity Stokes equations on a
// staggered grid by geometric multigrid inside a Krylov method.
//
// # Layout
//
// An [Axis] is the spacing of one direction, a [Level] the operator on one
// grid, a [Hierarchy] the levels with the cycle that visits them, a [Solver]
// the Krylov method around the cycle. All arrays of a level are padded by one
// ring and share stride and index, see [Fields]. The ring makes boundaries
// disappear from the kernels:
//
//   - on a wall without shear stress the viscosity of the corners is zero;
//   - beside a no-slip wall the ring holds the velocity of the wall, half a cell
//     away;
//   - the inverse diagonal of a face on a wall is zero, so that no smoother moves
//     it;
//   - between periodic sides the ring repeats the far columns, and each row
//     function that changes a row repeats them again.
//
// # Method
//
// The smoother is distributive Gauss-Seidel (Brandt & Dinar 1979), red-black,
// with corrections of the velocity weighted by the inverse diagonal of the
// momentum equations and, near jumps of viscosity only, cell by cell relaxation
// (Vanka 1986). Coarse viscosities are geometric means of the cells below and
// 1-2-1 log averages of the corners below; coarse operators are those of the
// coarse grid. Only the thinnest cells are coarsened, which spares flat and
// graded grids line relaxation. Coarsening ends on a few cells or, where the
// viscosity jumps, while stiff bodies are still resolved; that level is solved
// by elimination. Faces at the surface of a stiff body interpolate from inside
// the body, not from across its surface. The cycle is F(1,1); the Krylov method is generalised
// conjugate residuals (Eisenstat, Elman & Schultz 1983) in a norm of
// dissipations, with two passes over memory an iteration. Where the viscosity is
// smooth, its first direction is that of full multigrid with cubic
// interpolation.
//
// # Parallelism
//
// Sweeps, restriction, prolongation and the operator are pipelines of row
// functions, see [Hierarchy] and the unexported pipeline: rows are in cache from
// one stage to the next, and blocks of rows run on several goroutines with the
// same bits. Sums are kept by row and added in the order of rows.
package multigrid
