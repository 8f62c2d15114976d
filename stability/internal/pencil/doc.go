// Package pencil solves J x = 0 for matrices that depend on a wavenumber k, on
// a growth rate σ and on driving numbers R₀, R₁, …:
//
//	J(k, σ, R) = A(k) + Σ Rᵢ Bᵢ(k) - σ M(k)
//
// A, Bᵢ and M are polynomials in k with real matrices as coefficients. They are
// the discrete form of a linear stability problem: M may be singular (a fluid
// of infinite Prandtl number has no inertia) and usually each Bᵢ is.
//
// # Finding
//
// [Workspace.DriveEigenvalues] and [Workspace.GrowthEigenvalues] compute all
// eigenvalues R or σ at one k. Both reduce to the dense eigenproblem of a
// product J⁻¹B or J⁻¹M in the unknowns where B or M lives: infinite eigenvalues,
// the other unknowns, drop out before any eigenvalue is computed.
//
// # Following
//
// Near a solution, J bordered with a column b and a row cᵀ is regular, and
//
//	J x + b g = 0,  cᵀx = 1
//
// defines a smooth function g(k, σ, R) that vanishes exactly where J is singular
// (Griewank and Reddien 1984, from memory). With the left counterpart y its
// derivatives are g' = -yᵀJ'x and g″ = -yᵀ(J″x + 2J'x'). [Workspace.Solve] and
// [Workspace.Extremum] are Newton's method on g and on its derivative in k.
package pencil
