// Package boussinesq turns a material and a layer into the dimensionless
// groups of thermal convection, and results back into units.
//
// The Boussinesq approximation treats a fluid as incompressible and of
// constant properties, except that warm fluid is buoyant:
//
//	ρ = ρ₀ (1 − α (T − T₀))
//	−∇P + ∇·(2 η ε) + ρ₀ α g (T − T₀) e_z = 0        ∇·v = 0
//	ρ₀ c_p (∂T/∂t + v·∇T) = ∇·(k ∇T) + H
//
// A [Material] holds the constants, a [Layer] adds depth, gravity and walls:
//
//	layer := boussinesq.Layer{Material: m, Depth: 24 * units.Kilometre, Gravity: g, Top: t1, Bottom: t0}
//	ra, err := layer.Rayleigh()
//
// From there, [Layer.Scales] converts every quantity between units and
// dimensionless numbers, in both directions; [Layer.Validity] says where the
// approximation is strained; [Uncertain] carries ranges of the parameters
// through any of this; [Presets] lists materials with their sources.
//
// # Conventions
//
// z points up, gravity down. Lengths are scaled with the depth d, times with
// d²/κ, velocities with κ/d, stresses with μκ/d² and temperature differences
// with θ, the temperature scale of [Layer.TemperatureScale]:
//
//	bottom wall      θ                      Rayleigh number ρ α g θ d³/(κ μ)
//	isothermal       T(bottom) − T(top)     [Layer.Rayleigh]
//	prescribed flux  q_top d/k              [Layer.RayleighFlux]
//	insulating       H d²/k                 [Layer.RayleighInternal]
//
// where κ = k/(ρ c_p), H is the heating per volume and q_top = q_bottom + H d
// is the flux that leaves the top in steady state. Dimensionless temperature
// is 0 at the top.
//
// # Errors
//
// Input that makes no sense is a [FieldError], which names the field, its value
// and what is allowed. Functions that derive a number check what they use, so
// that no NaN or infinity leaves the package in silence; the methods of
// [Scales], which was checked when it was made, return bare values.
//
// # Concurrency
//
// All types are values that no method changes; all functions and methods are
// safe for concurrent use.
//
// # Limits
//
// One dimension of parameters, no fields: viscosity that varies through the
// layer enters as its reference value only. Expansivity is positive; layers
// that expand on cooling (water below 4 °C) are not covered.
package boussinesq
