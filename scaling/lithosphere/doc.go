// Package lithosphere computes how a lithosphere cools with age: temperature,
// heat flux, thickness and subsidence, and the age that goes with a heat flux or
// a depth.
//
// Two models share one interface. A [HalfSpace] of temperature T_m that is
// suddenly cooled to T_s at its surface has, with κ = k/(ρc) and z counted
// downwards,
//
//	T = T_s + (T_m-T_s) erf(z/(2√(κt))),  q = k (T_m-T_s)/√(πκt),
//	subsidence = 2ρα (T_m-T_s)/(ρ-ρ_w) √(κt/π).
//
// A [Plate] of thickness a has T_m at its base, so that it stops cooling:
//
//	T = T_s + (T_m-T_s) [z/a + Σ 2/(nπ) sin(nπz/a) exp(-n²π²κt/a²)],
//	q = k (T_m-T_s)/a [1 + 2 Σ exp(-n²π²κt/a²)],
//	subsidence = ρα (T_m-T_s) a/(2(ρ-ρ_w)) [1 - (8/π²) Σ_odd exp(-n²π²κt/a²)/n²].
//
// In two lines:
//
//	plate := lithosphere.SteinStein()
//	q, err := plate.HeatFlux(50 * units.Megayear)
//
// # Conventions
//
// Depths count down from the surface. Subsidence counts from age zero, under
// water or whatever fluid Overburden is the density of; zero is vacuum or air.
// Ages are positive.
//
// # Method
//
// The half-space is exact. The plate is summed as given for large ages and by
// images, the same function, for small ones, to round-off at any age (Carslaw &
// Jaeger 1959; McKenzie 1967; Parsons & Sclater 1977). With a spreading rate the
// plate also conducts horizontally. Inverses are found by bracketing.
//
// [SteinSteinFit] and [ParsonsSclaterFit] are the rounded curves that those
// authors fitted to data.
//
// # Limits
//
// Constant properties; no sediment, no hydrothermal flow, no radioactivity. The
// first two lower the heat flux that is measured on young sea floor.
//
// All types are values that no method changes, and safe for concurrent use.
package lithosphere
