// Package heattest tests solvers of the heat equation, yours or ours.
//
// The solver may be of any kind and in any language: the kit sees a function
// that is given a [Problem] and returns an [Answer]. It runs it on grids that
// become finer, with time steps that become shorter with them, on the exact
// solutions of package example.org/overturn/heat/exact, and reports the errors
// of temperature and wall flux, the orders with which they fall, and whether
// some properties hold that need no exact solution:
//
//	if err := heattest.Check(ctx, solve, nil); err != nil {
//		t.Error(err) // lists all that is wrong
//	}
//
// [Run] returns the [Report] behind the error, which prints as a table.
//
// # Equations
//
// Temperature T, conductivity k, heat capacity per volume C, velocity v and heat
// production per volume satisfy
//
//	C (∂T/∂t + v·∇T) = ∇·(k ∇T) + Source
//
// # Writing the adapter
//
// A problem offers edges of cells and functions of the place, which
// [Problem.Tabulate] makes into arrays at any lattice of points;
// [Problem.FaceFlow] is the velocity as a finite-volume code wants it. The box
// has its lower left corner at (0, 0), and time starts at 0. The answer is
// in samples at points that the code chooses ([Lattice], [Points]) or a
// [Function]. A code that cannot do some walls, flows, coefficients or steady
// states returns an error that wraps [errors.ErrUnsupported]:
//
//	if p.Steady() {
//		return heattest.Answer{}, fmt.Errorf("time steps only: %w", errors.ErrUnsupported)
//	}
//
// # What is tested
//
// On each case, the order of convergence between the last two grids against
// what [Expected] says of a second-order scheme or Settings.Expect of yours. On
// its coarsest grid, the last one on its finest:
//
//	mirrored in x, in z     the mirror image of the problem has the mirror image of the answer
//	in other units          so has the problem in units that differ by powers of two, as if from
//	                        numbers near 1 to those of a mantle in SI
//	warmer by a constant    nothing changes but the temperature
//	uniform temperature     stays so in any flow, if walls and sources let it
//	heat budget             what the body holds changes by what it gains, if given
//	maximum principle       without sources no temperature beyond those at the start and of walls
//
// A property is left out where the answer lacks what it needs, or where its
// points have no mirror images.
//
// # Limits
//
// Two dimensions, boxes, coefficients and flows that do not change in time.
// Errors are root mean squares over the box and over its walls: an error in a
// few cells may hide, though not for long as the grid becomes finer.
//
// # Concurrency
//
// Check and Run call the solver from one goroutine. They may themselves be
// called from several.
package heattest
