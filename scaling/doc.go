// Package scaling gives what is worked out before, beside and instead of a
// convection run: scaling laws with their ranges and sources, boundary-layer
// balances, regimes of variable viscosity, onset times, plumes and sinking
// bodies, and fits of power laws to runs.
//
// A [Law] is a value. Take one, or find those that apply to a layer, and see how
// far apart they are:
//
//	nu, err := scaling.HowardCycle(1100.65, scaling.FreeOverRigid).At(scaling.Groups{Rayleigh: 1e7})
//	c := scaling.Compare(scaling.Find(scaling.Query{Quantity: scaling.Nusselt, Walls: scaling.Free, Heating: scaling.FromBelow}), groups)
//
// Outside its range a law returns its value together with an error that wraps
// [ErrOutOfRange]. [GroupsOf] makes the groups of a [boussinesq.Layer].
//
// Beside the laws:
//
//	Cell         one convection roll: heat flux, speeds, thickness, stress
//	LidLaw       lid, interior and flux of a layer under a stagnant lid
//	RegimeOf     small contrast, transitional, stagnant lid
//	Criterion    when a cooling layer starts to convect, and how wide the drips are
//	Body         Stokes velocities of spheres, drops, cylinders and sheets
//	ConduitOf    fluxes of plume conduits; StartingPlume, their heads
//	FitPowerLaw  exponents with confidence intervals, from runs
//
// Sub-packages: lithosphere cools with age, history integrates thermal
// histories, uncertainty carries distributions through any of this.
//
// # Conventions
//
// Groups and balances are dimensionless: lengths in d, times in d²/κ, speeds in
// κ/d, stresses in ηκ/d², temperatures in the drop ΔT or, where heat comes from
// within, in H d²/k. Nu is the heat flux over that of conduction, q d/(kΔT). A
// cell of width a is one roll, half a wavelength. Typed functions take and
// return units.
//
// # The boundary-layer balance
//
// Fluid that moves along a wall at speed u over a length L cools as a half-space
// does, q = 2k(ΔT/2)√(u/(πκL)); the plume that it turns into drives the flow. Per
// volume, buoyancy works at the rate Ra Nu, and viscosity dissipates the mean
// square of the vorticity. The two give Nu ~ Ra^(1/3), u ~ Ra^(2/3) between free
// walls; [Cell.Balance] has the prefactors, for a sine-shaped core and for the
// cores that rolls approach as Ra → ∞, with the heat that a layer keeps from
// plate to plate ([Exchange]).
//
// # Sources
//
// Every law names author and year, and how well the source is known to us
// ([Status]): derived and computed here, read, read in the abstract, from memory.
// Laws that could not be confirmed are in [Unconfirmed] only. Correlations of
// the handbooks for enclosures and hot surfaces are engineering approximations:
// where people or equipment depend on the result, local codes and licensed
// practice decide.
//
// # Errors and concurrency
//
// Bad input is a [FieldError] that names the field; no NaN leaves the package in
// silence. All types are values that no method changes; all functions and
// methods are safe for concurrent use.
package scaling
