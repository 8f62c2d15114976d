// Package exact gives exact solutions of the heat equation.
//
// Temperature T, conductivity k, heat capacity per volume C, velocity v and heat
// production per volume satisfy
//
//	C (∂T/∂t + v·∇T) = ∇·(k ∇T) + Source
//
// at every point and time. A problem is a struct with the parameters by their
// names; its Solve method checks them and returns a [Solution]:
//
//	s, err := exact.HalfSpace{Initial: 1623, Surface: 273, Material: rock}.Solve()
//	f := s.At(0, 50e3, age) // f.Temperature, f.FluxX, f.FluxZ
//
// [All] lists cases of the problems with a box and a span of time to solve them
// in, the walls of the box and the order at which a second-order scheme should
// converge: what a test of one's own solver needs.
//
// # The problems
//
//	HalfSpace                 surface held at a temperature: cooling lithosphere
//	HalfSpaceFlux             surface of given flux
//	HalfSpaceRobin            surface that exchanges heat with surroundings
//	PeriodicSurface           surface whose temperature swings
//	Slab, SlabInsulated       two faces held, or one; sources: cooling plate
//	SlabRobin                 face that exchanges heat with surroundings
//	Sphere, Cylinder          surface held
//	Contact                   two bodies brought together
//	StefanOnePhase, StefanTwoPhase, StefanContact   freezing and melting
//	Gaussian, GaussianRotation, GaussianShear, LineSource   spots in moving fluid
//	Inflow                    front that moves into a body
//	Throughflow, Upflow, StagnationFlow, Leveque   steady boundary layers
//	CouetteHeating            friction in a sheared layer
//	Geotherm, GeothermExponential   crust that produces heat
//	ConductivityLinear, ConductivityInverse, ConductivityExponential, Layers
//	BoxMode, HotTop           boxes
//	Cell, Manufactured        temperature and flow chosen first, source after them
//
// # Conventions
//
// x points right and z up; a body lies above its surface z = 0, so that z is
// the depth of a problem that is thought of from the top. All numbers are in
// any one consistent set of units. Where the comment of a field says so, zero
// means 1: the zero [Material] has the diffusivity 1. Fluxes are conducted heat
// as a vector; [Case.WallAt] counts them into the box. Methods beside those of
// [Solution] take parameters that Validate finds good.
//
// # Method
//
// Closed forms and series. Where a Fourier series converges slowly, at early
// times, it gives way to one of images, so that a few terms reach rounding at
// any time; products of large exponentials and small error functions are
// evaluated together. Nothing overflows at large Péclet or Biot numbers. At
// allocates nothing and costs from some tens of nanoseconds to a few
// microseconds, or ten in a cylinder that is young.
//
// Section numbers of Carslaw & Jaeger (1959, Conduction of Heat in Solids) are
// from memory; the tests substitute each formula into the equation.
//
// # Accuracy
//
// Temperatures and fluxes are right to about 1e-13 of themselves, or, where
// they are a small difference, to a few units in the last place of the largest
// temperature of the problem and of the flux that it drives. On an interface a
// solution has the conductivity of the upper side (Contact) or of the lower
// one (Layers, and the growing phase of the problems of freezing).
//
// # Limits
//
// At t = 0 temperatures that jump are those of the surface there, and fluxes
// there are infinite. Outside its domain a solution is NaN.
package exact
