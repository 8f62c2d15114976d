// Package rheology gives the viscosity of a layer from its temperature and
// depth.
//
// A [Law] fills one row of cells, all at one depth, at a time:
//
//	var law rheology.Law = rheology.FrankKamenetskii{ThermalExponent: math.Log(1000)}
//	law.ViscosityTo(viscosity, temperature, depth)
//
// The laws, from the simplest to the one nearest the laboratory:
//
//	[Constant]           η
//	[Profile]            η(depth)
//	[FrankKamenetskii]   η₀ exp(-b (T - T₀)/ΔT + c depth/D)
//	[Arrhenius]          η₀ exp((E + P V)/(R T) - (E + P₀ V)/(R T₀))
//	[VogelFulcher]       A exp(B/(T - C))
//	[LogPolynomial]      exp(Σ cₖ ((T - T₀)/ΔT)ᵏ)
//	[Glycerol]           Cheng (2008)
//	[Composite]          creep of several mechanisms at one strain rate or stress
//	[Func]               any function of temperature and depth
//
// [Limits] bounds any of them between two viscosities and [Scaled] multiplies
// one by a function of depth. A law of a user's own needs the one method of
// [Law]; [Probe] tries it as the solvers will.
//
// # Conventions
//
// Depth is measured downwards from the top of the layer. Numbers are plain
// float64s in any one consistent set of units, SI or dimensionless, and where
// a law has constants of nature in it (the gas constant) they are fields with
// their SI values as defaults. Only the creep laws and [Glycerol] are tied to
// SI, because their published constants are. Zero fields mean the defaults
// that their comments state; Validate names the first field that makes no
// sense, and [Check] calls it for any law.
//
// Laws are values. They may be shared by goroutines, and ViscosityTo does not
// allocate. A temperature that is not a number gives a viscosity that is none.
//
// # Method
//
// The exponential law is Frank-Kamenetskii's (1955) approximation, in the form
// of Blankenbach et al. (1989), eq. 7 (equation number from memory). Creep of
// polycrystals follows rate = A σⁿ d⁻ᵖ Cʳ exp(-(E + P V)/(R T)), with constants
// of Hirth & Kohlstedt (2003) for olivine and of Goldsby & Kohlstedt (2001) for
// ice, and the conversion from the laboratory's uniaxial test to second
// invariants by [Creep.Invariants].
//
// # Limits
//
// A law sees temperature and depth only. Creep with a stress exponent above 1
// is evaluated at one given strain rate or stress for the whole layer; a model
// that iterates on its own strain-rate field calls [Composite.ViscosityAtStrainRate]
// in each cell. No plasticity, no elasticity, no melt. Published creep constants
// carry uncertainties of an order of magnitude in viscosity: run the range, not
// the central value alone.
package rheology
