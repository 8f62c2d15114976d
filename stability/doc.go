// Package stability says whether a layer at rest convects, at which wavelength,
// and how soon, without running a model.
//
// A horizontal layer of depth d, z up, is at rest with the temperature T₀(z).
// Small disturbances of the vertical velocity w and of the temperature θ, times
// cos kx and exp(σt), obey
//
//	(D²+k²) η (D²+k²)w - 4k² Dη Dw - (σ/Pr)(D²-k²)w = Ra k²θ   momentum, viscosity η(z)
//	σθ = (D²-k²)θ + f w                                        heat, f = -dT₀/dz
//
// where D = d/dz acts on all that follows it. The smallest Rayleigh number
// Ra = ρ g α ΔT d³/(κ μ) at which any of them is neutral, σ = 0 or σ imaginary, is
// critical:
//
//	onset, err := stability.Layer{Bottom: stability.Rigid, Top: stability.Free}.Critical()
//
// The zero [Layer] is heated from below between free isothermal boundaries. Its
// fields give other walls (rigid, permeable; fixed flux, any Biot number), base
// states ([Base]), viscosities ([Viscosity]), a porous medium, rotation, a magnetic
// field, a second diffusing component, a surface tension that depends on
// temperature. They combine.
//
//	Layer.Critical, Find      onset as a number grows: Rayleigh, solute Rayleigh, Marangoni
//	Layer.Neutral             neutral state at one wavenumber
//	Layer.Growth, Fastest     growth rate at one wavenumber; the largest of all
//	Layer.InBox               onset in a box of finite width
//	Solver                    the same questions, many times, and more of them
//	Solver.NearOnset          coherence length, time constant
//	Solver.NusseltSlope       heat flow just above onset
//	Shell                     spherical shells and full spheres
//	CoolingHalfSpace          a boundary layer that grows into a deep fluid
//	Stack                     Rayleigh-Taylor instability of viscous layers
//	Judge, JudgeUncertain     verdict on a boussinesq.Layer, in its units
//
// # Conventions
//
// Everything but [Judge] is dimensionless: heights in d from 0 at the bottom to 1
// at the top, times in d²/κ, velocities in κ/d, temperatures in the unit that the
// Rayleigh number is built on (see [Base]). Wavenumbers are horizontal and in
// radians per d, wavelengths in d. Viscosity is relative to that in the Rayleigh
// and Prandtl numbers. A growth rate σ > 0 means growth.
//
// # Errors of the values
//
// Each value comes with an estimate of its error: the change from the last but
// one resolution, plus round-off. It is a generous one; true errors are near 1e-14
// where the profiles are smooth.
//
// # Method
//
// All systems are lists of coupled fields, discretised by Galerkin's method with
// integrated Legendre polynomials on a few elements (Szabó and Babuška 1991, from
// memory). Stress, flux and Robin conditions are natural conditions of the weak
// form; the others are built into the basis. So no boundary row makes an infinite
// or spurious eigenvalue, matrices stay well conditioned at any degree, and
// profiles need no derivative: viscosity may jump. Eigenvalues found by dense
// methods on coarse discretisations are polished on finer ones by Newton's method
// on bordered systems (Griewank and Reddien 1984, from memory), with analytic first
// and second derivatives in the wavenumber: critical wavenumbers are as good as
// critical numbers. The degree, then the number of elements, grows until two
// resolutions agree.
//
// The search for the critical point brackets the wavenumbers by an energy bound
// that holds for stationary and oscillatory modes alike, looks at all of them in
// between with values and slopes, and refines every minimum close to the best. The
// limit of zero wavenumber, where fixed flux puts the onset, is computed in itself
// and reported as such.
//
// The theory is that of Rayleigh (1916), Pellew and Southwell (1940) and
// Chandrasekhar (1961); other sources are with the functions.
//
// # Limits
//
// The layer is infinite sideways unless it is put into a [Box], and its boundaries
// are flat: no deformable surface but in a [Stack]. Disturbances are small, so
// subcritical onset is out of reach. Thermal conductivity, expansivity and heat
// capacity are uniform. A base state that changes with time is frozen, or see
// [CoolingHalfSpace]. [Shell] computes stationary onset only. A second local minimum
// narrower than a tenth of its own wavenumber could be missed.
//
// # Concurrency
//
// [Layer], [Shell], [Stack], [CoolingHalfSpace] and [Mode] are values, safe for
// concurrent use. A [Solver] serves one goroutine at a time.
package stability
