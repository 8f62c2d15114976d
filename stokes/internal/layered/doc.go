// Package layered solves the Stokes equations directly where the viscosity
// depends on depth alone, columns are equally wide and the sides are periodic
// or closed and free of shear stress.
//
// The velocity comes from a stream function ψ at the corners of cells, so that
// it has no divergence. Sine or, between periodic sides, Fourier modes of ψ along x
// do not see each other; each
// obeys a symmetric pentadiagonal system along z, that of the quadratic form
//
//	Σ 4ηκ²U²dz + Σ η_n [dz] ((U − U below)/[dz] + κ²ψ)²,  U = (ψ above − ψ)/dz,
//
// which is the dissipation of the staggered scheme for a mode with
// κ = 2 sin(mπ/2nx)/dx, or 2 sin(mπ/nx)/dx between periodic sides. One solve costs two real transforms and one elimination
// per row.
//
// The condition number grows like the fourth power of the number of rows, so
// that one solve on a thousand rows has an error of 1e-4: the caller has to
// refine the answer with the residual of the primitive equations.
package layered
