// Package overturn is the map of a library for layers that may convect: a
// mantle, an ice shell, a salt body, a magma body, a syrup tank. It holds
// documentation only; import the packages below.
//
// # What for
//
//	material parameters in real units      [example.org/overturn/units]
//	to dimensionless groups and back       [example.org/overturn/boussinesq]
//	does it convect, at which wavelength,
//	how soon                               [example.org/overturn/stability]
//	vigour, heat flow and cooling
//	without a run                          [example.org/overturn/scaling]
//	a run, a steady state, a grid study
//	with error bars                        [example.org/overturn/boussinesq/convection]
//	the flow of a viscous fluid            [example.org/overturn/stokes]
//	advection and conduction of heat       [example.org/overturn/heat]
//	grids, fields, their files             [example.org/overturn/stokes/staggered]
//	fields as images                       [example.org/overturn/stokes/staggered/picture]
//	viscosity laws                         [example.org/overturn/stokes/rheology]
//	exact solutions to test codes with     [example.org/overturn/stokes/exact]
//	                                       [example.org/overturn/heat/exact]
//	a test kit for your own solver         [example.org/overturn/stokes/stokestest]
//	                                       [example.org/overturn/heat/heattest]
//
// # Conventions
//
// x points right, z up, gravity along −z; depth counts down from the top. The
// kernels (stokes, heat and what is below them) take plain float64 numbers in
// any one consistent set of units; typed quantities end at package boussinesq.
// Scaled problems measure lengths in the layer's depth d, times in d²/κ,
// velocities in κ/d, temperatures in the drop ΔT and stresses in η₀κ/d².
//
// Bad input is an error that names the argument, never a panic and never a NaN
// in silence. The same input gives the same bits on any number of processors.
// Every formula and check value names its source.
//
// # Limits
//
// Two dimensions; the Boussinesq approximation; no inertia in the coupled model.
// Handbook correlations for enclosures and equipment are for estimates: local
// codes and licensed practice decide where people may come to harm.
package overturn
