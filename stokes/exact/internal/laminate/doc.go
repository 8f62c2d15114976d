// Package laminate solves slow viscous flow in parallel layers whose loads are
// harmonic along the layers.
//
// With z across and t along the layers, each field is a function of z, its
// amplitude, times cos kt or sin kt:
//
//	velocity across   W(z) cos kt        velocity along  U(z) sin kt
//	stress across     R(z) cos kt        shear stress    T(z) sin kt
//	force across      b(z) cos kt        force along     a(z) sin kt
//
// The Stokes equations become
//
//	W′ = −kU,  U′ = kW + T/η,  T′ = kR + 4k²ηU − a,  R′ = −kT − b,
//
// and the pressure is −R − 2ηkU.
//
// # Method
//
// In a layer the viscosity is η₀exp(2Bz), B = 0 included. The homogeneous
// solutions are exp(λz) with λ = −B ± √(B² + k² ± 2ikB) (the problem class of
// Revenaugh & Parsons 1987), in real form exp((−B±α)z) times cos βz and
// sin(βz)/β, which tend to the four solutions of uniform viscosity as B tends
// to zero. Each is anchored at the face where it is largest, so that nothing
// overflows however thick the layer is. Harmonic loads have particular
// solutions of the same form.
//
// Where a layer is thinner than its wavelength these functions become nearly
// dependent. There power series about the middle of the layer serve instead,
// one for each component of the state at the middle: their values keep all
// their digits however thin the layer is. Layers with a steep viscosity are
// split until the series converge fast.
//
// The amplitudes of all layers together follow from the conditions at walls
// and interfaces: a banded linear system, solved with pivoting and refined
// with residuals in twice the working precision. Time and memory are
// proportional to the number of layers.
package laminate
