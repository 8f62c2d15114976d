package exact

import "math"

// HalfSpace is a body above z = 0, at first of one temperature, whose surface
// z = 0 is held at another from t = 0 on:
//
//	T = Surface + (Initial − Surface) erf(z/(2√(κt)))
//
// (Carslaw & Jaeger 1959, 2.4; section from memory). It is the cooling of an
// oceanic lithosphere, with z for depth.
type HalfSpace struct {
	Material
	Initial, Surface float64 // temperatures
}

func (s HalfSpace) profile(z, t float64) (float64, float64) {
	kt := s.Diffusivity() * t
	x := similarity(z, kt)
	step := s.Initial - s.Surface
	return s.Surface + step*math.Erf(x), -s.conductivity() * step * kernel(x, kt)
}

// Solve implements [Problem].
func (s HalfSpace) Solve() (Solution, error) { return checked(s) }

// At implements [Solution].
func (s HalfSpace) At(x, z, t float64) State { return along(s, x, z, t) }

// Medium implements [Solution].
func (s HalfSpace) Medium(_, _, _ float64) Medium { return s.medium() }

// Domain implements [Solution]: z ≥ 0, t ≥ 0.
func (s HalfSpace) Domain() Domain { return above(0) }

// SurfaceGradient returns ∂T/∂z at z = 0.
func (s HalfSpace) SurfaceGradient(t float64) float64 {
	return (s.Initial - s.Surface) / (sqrtPi * math.Sqrt(s.Diffusivity()*t))
}

// HeatLost returns the heat per area that has left through the surface:
// C (Initial − Surface) 2√(κt/π).
func (s HalfSpace) HeatLost(t float64) float64 {
	return s.capacity() * (s.Initial - s.Surface) * 2 * math.Sqrt(s.Diffusivity()*t) / sqrtPi
}

// IsothermDepth returns the z at which the temperature has gone the fraction
// of the way from Surface to Initial, 2√(κt) erf⁻¹(fraction): NaN unless the
// fraction lies between 0 and 1.
func (s HalfSpace) IsothermDepth(fraction, t float64) float64 {
	if !(fraction >= 0 && fraction <= 1) {
		return math.NaN()
	}
	return 2 * math.Sqrt(s.Diffusivity()*t) * math.Erfinv(fraction)
}

// Validate implements [Solution].
func (s HalfSpace) Validate() error {
	return first(
		s.check("HalfSpace"),
		anyFinite("HalfSpace.Initial", s.Initial),
		anyFinite("HalfSpace.Surface", s.Surface),
	)
}
