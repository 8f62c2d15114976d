// Package stokes computes slow viscous flow in a rectangular box.
//
// It solves, for velocity v and dynamic pressure P,
//
//	−∇P + div(2ηε) + b = 0,  div v = 0,  ε = ½(∇v + ∇vᵀ)
//
// with a viscosity η that may vary from cell to cell by many orders of
// magnitude and a body force b per volume, on the staggered grid of package
// [example.org/overturn/stokes/staggered]:
//
//	sv, err := stokes.NewSolver(g, stokes.Walls{Bottom: stokes.NoSlip}, nil)
//	report, err := sv.Solve(ctx, flow, viscosity, force)
//
// Each side is a [Wall]: free slip, no slip, moving along itself, crossed by a
// prescribed flow, or periodic. [Solver.StrainRateTo], [Solver.StressTo],
// [Solver.DissipationTo] and [Solver.NormalStressTo] evaluate the answer;
// [Solver.ApplyTo] is the momentum operator alone.
//
// # Conventions
//
// x points right, z up, the origin is at the lower left. All numbers are in any
// one consistent set of units. Forces and velocities sit at faces, viscosity
// and pressure at centres of cells, shear stress at their corners. The pressure
// has zero mean over the box.
//
// # Method
//
// The equations are integrated over the control volumes of the staggered grid
// of Harlow & Welch (1965), second order accurate where the viscosity is smooth
// and first order at jumps. They are solved by generalised conjugate residuals
// (Eisenstat, Elman & Schultz 1983) in a norm of dissipations. The
// preconditioner is one multigrid F-cycle with the distributive Gauss-Seidel
// smoother of Brandt & Dinar (1979), its corrections weighted by the inverse
// diagonal of the momentum equations; cells near jumps of viscosity are
// relaxed as Vanka (1986) does. Thin cells are coarsened first, so that flat
// cells and graded grids cost few iterations. Time and memory are proportional
// to the number of cells: about six cycles to 1e-8 at any size, for smooth
// viscosities of any contrast. The first of them is full multigrid: from rest,
// it alone brings the velocity of an isoviscous flow to the accuracy of the
// discretisation. Where the viscosity depends on depth alone, [Transform] is
// several times as fast and taken without being asked for.
//
// # Concurrency
//
// A [Solver] serves one goroutine at a time; two of them share nothing. The
// answer is the same to the bit for any number of [Settings].Workers. The
// goroutines of a solver sleep between solves and end when it is garbage.
//
// # Limits
//
// The box is two-dimensional, inertia is neglected, the fluid is Newtonian
// during one solve; a viscosity that depends on the flow needs an outer loop.
// At jumps of viscosity that do not follow the lines of the grid, stresses next
// to the jump are wrong by a fixed fraction however fine the grid.
package stokes
