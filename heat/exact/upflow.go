package exact

import "math"

// Upflow is the steady body above z = 0 of fluid that flows towards its cold
// or hot surface and out through it:
//
//	T = Surface + (Deep − Surface) (1 − exp(−Speed z/κ))
//
// (elementary).
type Upflow struct {
	Material
	Speed         float64 // towards z = 0; default 1
	Surface, Deep float64 // temperatures of z = 0 and far from it
}

func (s Upflow) profile(z, _ float64) (float64, float64) {
	c, step := orOne(s.Speed)/s.Diffusivity(), s.Deep-s.Surface
	return s.Surface - step*math.Expm1(-c*z), -s.conductivity() * step * c * math.Exp(-c*z)
}

// Solve implements [Problem].
func (s Upflow) Solve() (Solution, error) { return checked(s) }

// At implements [Solution].
func (s Upflow) At(x, z, t float64) State { return along(s, x, z, t) }

// Medium implements [Solution].
func (s Upflow) Medium(_, _, _ float64) Medium {
	m := s.medium()
	m.VZ = -orOne(s.Speed)
	return m
}

// Domain implements [Solution]: z ≥ 0.
func (s Upflow) Domain() Domain { return above(forever) }

// Validate implements [Solution].
func (s Upflow) Validate() error {
	return first(
		s.check("Upflow"),
		notNegative("Upflow.Speed", s.Speed),
		anyFinite("Upflow.Surface", s.Surface),
		anyFinite("Upflow.Deep", s.Deep),
	)
}
