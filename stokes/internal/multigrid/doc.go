// Package multigrid solves the variable-viscosity Stokes equations on a
// staggered grid by geometric multigrid inside a Krylov method.
package multigrid
