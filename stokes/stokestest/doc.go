// Package stokestest tests solvers of slow viscous flow, yours or ours.
//
// The solver may be of any kind and in any language: the kit sees a function
// that is given a [Problem] and returns an [Answer]. It runs it on grids that
// become finer, on the exact solutions of package
// example.org/overturn/stokes/exact, and reports the errors of velocity,
// pressure and stress, the orders with which they fall, and whether some
// properties hold that need no exact solution:
//
//	if err := stokestest.Check(ctx, solve, nil); err != nil {
//		t.Error(err) // lists all that is wrong
//	}
//
// [Run] returns the [Report] behind the error, which prints as a table.
//
// # Equations
//
// Velocity v, pressure P, viscosity η and body force b per volume satisfy
//
//	−∇P + div(2ηε) + b = 0,  div v = 0,  ε = ½(∇v + ∇vᵀ)
//
// # Writing the adapter
//
// A problem offers edges of cells and the functions η(x, z) and b(x, z), which
// [Problem.Tabulate] makes into arrays at any lattice of points. The box has its
// lower left corner at (0, 0). Forces that are concentrated on a line are
// spread over the cells next to it, so that sums over faces, over centres of
// cells and over Gauss points are right. The answer is in samples at points
// that the code chooses ([Lattice], [Points]) or a [Function]. The pressure may
// differ by a constant. A code that cannot do some walls, viscosities or grids
// returns an error that wraps [errors.ErrUnsupported] and is not asked for
// them again on that case:
//
//	if p.Walls != (exact.Walls{}) {
//		return stokestest.Answer{}, fmt.Errorf("free slip only: %w", errors.ErrUnsupported)
//	}
//
// # What is tested
//
// On each case, the order of convergence between the last two grids against
// what [Expected] says of a second-order scheme or Settings.Expect of yours. On
// its coarsest grid:
//
//	mirrored in x, in z    the mirror image of the problem has the mirror image of the answer
//	in other units         so has the problem in units of length, velocity and viscosity that
//	                       differ by powers of two, as if from numbers near 1 to those of a
//	                       mantle in SI: a tolerance that is not relative shows up here
//	divergence             the root mean square of div v over that of ε, if the answer gives
//	                       it or its velocities are at the faces of cells
//	work and dissipation   their relative difference between walls at rest, if given
//
// A property is left out where the answer lacks what it needs, or where its
// points have no mirror images.
//
// # Limits
//
// Two dimensions, boxes, steady flow. Orders are those of the whole box in
// root mean square: an error in a few cells may hide, though not for long as
// the grid becomes finer. Which mean of viscosities is taken at jumps changes
// errors there but not their order; see [exact.Orders].
//
// # Concurrency
//
// Check and Run call the solver from one goroutine. They may themselves be
// called from several.
package stokestest
