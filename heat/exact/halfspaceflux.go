package exact

import "math"

// HalfSpaceFlux is a body above z = 0 into whose surface a constant flux is
// conducted from t = 0 on:
//
//	T = Initial + (2 Flux/k) √(κt) ierfc(z/(2√(κt)))
//
// (Carslaw & Jaeger 1959, 2.9; section from memory).
type HalfSpaceFlux struct {
	Material
	Initial float64 // temperature
	Flux    float64 // into the body
}

func (s HalfSpaceFlux) profile(z, t float64) (float64, float64) {
	kt := s.Diffusivity() * t
	x := similarity(z, kt)
	once, _, _ := integrals(x)
	return s.Initial + 2*s.Flux/s.conductivity()*math.Sqrt(kt)*once, s.Flux * math.Erfc(x)
}

// Solve implements [Problem].
func (s HalfSpaceFlux) Solve() (Solution, error) { return checked(s) }

// At implements [Solution].
func (s HalfSpaceFlux) At(x, z, t float64) State { return along(s, x, z, t) }

// Medium implements [Solution].
func (s HalfSpaceFlux) Medium(_, _, _ float64) Medium { return s.medium() }

// Domain implements [Solution]: z ≥ 0, t ≥ 0.
func (s HalfSpaceFlux) Domain() Domain { return above(0) }

// Validate implements [Solution].
func (s HalfSpaceFlux) Validate() error {
	return first(
		s.check("HalfSpaceFlux"),
		anyFinite("HalfSpaceFlux.Initial", s.Initial),
		anyFinite("HalfSpaceFlux.Flux", s.Flux),
	)
}
