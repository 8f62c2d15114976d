// Package exact gives exact solutions of the equations of slow viscous flow.
//
// Velocity v, dynamic pressure P, viscosity η and body force per volume b
// satisfy
//
//	−∇P + div(2ηε) + b = 0,  div v = 0,  ε = ½(∇v + ∇vᵀ)
//
// at every point. A problem is a struct with the parameters by their names;
// its Solve method checks them and returns a [Solution]:
//
//	s, err := exact.Inclusion{Radius: 1, Inside: 1000, Outside: 1, Stretch: 1}.Solve()
//	f := s.At(1.5, 1) // f.VX, f.VZ, f.P, f.StrainRate, f.Stress
//
// [All] lists one or more cases of every problem with a box to solve it in, the
// walls of the box and the order at which a second-order scheme should
// converge: what a test of one's own solver needs.
//
// # The problems
//
//	BoxMode                uniform viscosity, harmonic force, free-slip box
//	ColumnJump, Columns    viscosity that jumps at vertical planes
//	ExponentialViscosity   viscosity exponential in height, harmonic force
//	Layers                 any number of layers, harmonic forces and loads
//	Relaxation             decay of a harmonic surface topography
//	RayleighTaylor         growth of waves between two layers
//	Inclusion              circular inclusion in pure and simple shear
//	Channel                flow between two plates, viscosity exponential in height
//	Corner                 flow in a wedge between moving plates
//	Manufactured           smooth viscosity and flow chosen first, force after them
//
// # Conventions
//
// x points right and z up. All numbers are in any one consistent set of units.
// Stress is positive in tension, σ = −P + 2ηε. Wavenumbers are in radians per
// length. Pressures are fixed up to a constant, which each problem states.
//
// On an interface a solution has the values of the upper or right side, so
// that [math.Nextafter] reaches the other one. Outside its walls a solution
// goes on by the same formulas, which suits ghost points next to a wall.
//
// # Method
//
// Closed forms, except for layers and columns, whose amplitudes are the
// solution of a linear system found once by Solve. Their number is not
// limited, they may be much thicker or thinner than the wavelength, and the
// viscosity of each may vary exponentially. At allocates nothing, and costs
// some tens to hundreds of nanoseconds.
//
// # Accuracy
//
// Errors are a few units in the last place of the largest velocity or stress
// in the layer or box; where a field passes through zero its own relative
// error is larger. The tests substitute each solution into the equations.
//
// # Concurrency
//
// A [Solution] does not change and may be used by any number of goroutines.
package exact
