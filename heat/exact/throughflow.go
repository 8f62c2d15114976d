package exact

import "math"

// Throughflow is the steady layer between z = 0 and z = Thickness through which
// fluid flows with a uniform velocity along z:
//
//	T = Low + (High − Low) (exp(Pe z/L) − 1)/(exp(Pe) − 1),  Pe = Velocity L/κ
//
// (elementary). It is evaluated without overflow at any Péclet number of either
// sign.
type Throughflow struct {
	Material
	Thickness float64 // L; default 1
	Velocity  float64 // along z, of either sign
	Low, High float64 // temperatures of z = 0 and z = L
}

// Peclet returns Velocity·Thickness/κ.
func (s Throughflow) Peclet() float64 { return s.Velocity * orOne(s.Thickness) / s.Diffusivity() }

func (s Throughflow) profile(z, _ float64) (float64, float64) {
	l := orOne(s.Thickness)
	pe, zeta, step := s.Peclet(), z/l, s.High-s.Low
	flux := -s.conductivity() * step / l
	if pe < 0 { // the mirror image
		theta, slope := throughflow(-pe, 1-zeta)
		return s.High - step*theta, flux * slope
	}
	theta, slope := throughflow(pe, zeta)
	return s.Low + step*theta, flux * slope
}

// throughflow is the solution from 0 to 1 for pe ≥ 0 and its slope: the
// fraction multiplied by exp(−pe), so that every exponent is negative.
func throughflow(pe, zeta float64) (theta, slope float64) {
	if pe == 0 {
		return zeta, 1
	}
	all := -math.Expm1(-pe)
	rest := math.Exp(pe * (zeta - 1))
	return rest * -math.Expm1(-pe*zeta) / all, pe * rest / all
}

// Solve implements [Problem].
func (s Throughflow) Solve() (Solution, error) { return checked(s) }

// At implements [Solution].
func (s Throughflow) At(x, z, t float64) State { return along(s, x, z, t) }

// Medium implements [Solution].
func (s Throughflow) Medium(_, _, _ float64) Medium {
	m := s.medium()
	m.VZ = s.Velocity
	return m
}

// Domain implements [Solution]: 0 ≤ z ≤ Thickness.
func (s Throughflow) Domain() Domain { return layer(orOne(s.Thickness), forever) }

// Validate implements [Solution].
func (s Throughflow) Validate() error {
	return first(
		s.check("Throughflow"),
		notNegative("Throughflow.Thickness", s.Thickness),
		anyFinite("Throughflow.Velocity", s.Velocity),
		anyFinite("Throughflow.Low", s.Low),
		anyFinite("Throughflow.High", s.High),
	)
}
