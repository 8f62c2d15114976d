package exact

import "math"

// StagnationFlow is the steady boundary layer above the surface z = 0 of a
// fluid that comes down on it and parts, v = Rate (x, −z):
//
//	T = Surface + (Far − Surface) erf(z √(Rate/(2κ))).
//
// The temperature does not depend on x.
type StagnationFlow struct {
	Material
	Rate         float64 // default 1
	Surface, Far float64 // temperatures of z = 0 and far above it
}

func (s StagnationFlow) profile(z, _ float64) (float64, float64) {
	scale, step := math.Sqrt(orOne(s.Rate)/(2*s.Diffusivity())), s.Far-s.Surface
	x := z * scale
	return s.Surface + step*math.Erf(x), -s.conductivity() * step * 2 / sqrtPi * scale * gauss(x)
}

// Solve implements [Problem].
func (s StagnationFlow) Solve() (Solution, error) { return checked(s) }

// At implements [Solution].
func (s StagnationFlow) At(x, z, t float64) State { return along(s, x, z, t) }

// Medium implements [Solution].
func (s StagnationFlow) Medium(x, z, _ float64) Medium {
	m := s.medium()
	m.VX, m.VZ = orOne(s.Rate)*x, -orOne(s.Rate)*z
	return m
}

// Domain implements [Solution]: z ≥ 0.
func (s StagnationFlow) Domain() Domain { return above(forever) }

// Validate implements [Solution].
func (s StagnationFlow) Validate() error {
	return first(
		s.check("StagnationFlow"),
		notNegative("StagnationFlow.Rate", s.Rate),
		anyFinite("StagnationFlow.Surface", s.Surface),
		anyFinite("StagnationFlow.Far", s.Far),
	)
}
