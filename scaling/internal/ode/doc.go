// Package ode integrates small systems of ordinary differential equations,
// stiff or not, forward or backward in time, with dense output.
//
// The method is Radau IIA with five stages: collocation at the Radau points,
// order nine at the ends of steps, L-stable (Hairer and Wanner 1996, section
// IV.5 and IV.8). The polynomial through the start of a step and its stages is
// the dense output, with an error of order six in between; it is this error
// that the step size controls, so that every value read from a [Path], not only
// those at the ends of steps, has the accuracy asked for.
//
// The systems are meant to have a handful of unknowns: the stages are solved
// together by a dense factorisation.
package ode
