// Package element turns a system of coupled linear boundary-value problems in
// one variable into matrices, by Galerkin's method on high-order elements.
//
// An interval is cut into elements. On each of them a [Field] is a polynomial
// of degree p; where elements meet, a field is continuous, and a field of class
// [C1] has a continuous slope too. The basis consists of functions of the nodes
// (values, slopes) and of bubbles, integrated Legendre polynomials that vanish
// with their slope (C1) at the ends of their element:
//
//	C0: ψₙ' ∝ Pₙ₋₁, n = 2 … p      C1: χₙ'' ∝ Pₙ₋₂, n = 4 … p
//
// so that the matrices of ∫ψ'ψ' and ∫χ″χ″ are diagonal on the bubbles and the
// condition numbers stay small at any degree (Szabó and Babuška, Finite Element
// Analysis, 1991, ch. 3, from memory). Conditions on values and slopes are met
// by leaving functions out; fluxes and stresses are natural conditions. No row
// of a matrix is a boundary condition, so no eigenvalue comes from one.
//
// A [Term] is an integral ∫ c(z) Dⁱu Dʲv dz and an [EndTerm] a product of
// values or slopes at an end, each with a power of the wavenumber k in front.
// [Assemble] adds them up into the blocks of a [pencil.Pencil].
package element
