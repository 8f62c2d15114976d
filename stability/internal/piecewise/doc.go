// Package piecewise represents a function of one variable by Legendre series on
// panels that it chooses itself.
//
// [Resolve] halves panels until the series has converged on each of them, and
// looks for jumps and kinks where halving does not help. The result says where
// a Galerkin method needs element boundaries and how many quadrature points,
// and it can be integrated and differentiated without loss.
package piecewise
