// Package convection couples the Stokes and heat kernels: thermal convection of
// a fluid without inertia in a two-dimensional box.
//
//	−∇P + ∇·(2 η ε) + Ra T ẑ = 0,   ∇·v = 0
//	∂T/∂t + v·∇T = ∇²T + H
//
// A [Problem] is the layer, a [Model] is a run:
//
//	m, err := convection.New(convection.Problem{Grid: g, Rayleigh: 1e5}, nil)
//	for s, err := range m.Steps(ctx) {
//		... // s: time, heat flow at each wall, rms velocity, budget errors
//	}
//
// [Steady] finds a steady state by Newton's method without stepping in time,
// and [Refine] does so on a sequence of grids and returns every diagnostic with
// its numerical uncertainty. [Diagnose] takes the diagnostics of fields from
// elsewhere.
//
// # Conventions
//
// The equations above are scaled: lengths in the depth d of the layer, time in
// d²/κ, velocity in κ/d, temperature in the drop ΔT across the layer, stress in
// η₀κ/d². The same code runs in SI or any other consistent set of units: then
// [Problem.Rayleigh] is the buoyancy per volume and temperature ρ₀gα, and
// Conductivity, HeatCapacity (ρ₀cp), Heating (per volume) and the viscosity law
// carry their units. [FromLayer] and [FromLayerSI] make either from a
// [boussinesq.Layer].
//
// x runs to the right, z up, and gravity points along −z. Pressures are dynamic,
// what is left without the weight of fluid at temperature zero, with zero mean.
//
// # Method
//
// Conservative finite volumes on a staggered grid, second order in space
// (packages stokes and heat). In time the temperature is carried by the flow
// extrapolated to the middle of the step from the two latest Stokes solutions,
// one Stokes and one heat step for each time step, second order together; the
// first step finds its middle by a predictor. Steady states come from an
// inexact Newton method (Dembo, Eisenstat & Steihaug 1982) in the temperature
// alone: the linearised Stokes problem is solved inside each product of a
// Krylov method (GMRES, Saad & Schultz 1986), preconditioned by the exact
// factorisation of advection and conduction.
//
// # Limits
//
// Infinite Prandtl number, uniform and constant conductivity, heat capacity and
// heating, walls that do not change in time, no viscous or adiabatic heating:
// the Boussinesq approximation. [boussinesq.Layer.Validity]
// says what that leaves out. Two dimensions.
package convection
