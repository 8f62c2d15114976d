// Package trial holds what conformance kits for solvers have in common: fields
// as solvers give them, errors and orders of convergence, verdicts, and the
// report.
//
// Programs call the kits, packages example.org/overturn/stokes/stokestest and
// example.org/overturn/heat/heattest, which repeat the names that are needed
// there. A kit for another equation would start here.
//
// # Conventions
//
// A box reaches from (0, 0) to the last edges of its [Grid]; x points right, z
// up. Values on a lattice are row-major, x fastest. Errors are root mean squares
// over the box, relative to a size that the kit names.
//
// # Concurrency
//
// Values do not change once made, but for a [Report] that is still being
// filled.
package trial
