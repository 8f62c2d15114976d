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
		notNegative("Thickness of Throughflow", s.Thickness),
		anyFinite("Velocity of Throughflow", s.Velocity),
		anyFinite("Low of Throughflow", s.Low),
		anyFinite("High of Throughflow", s.High),
	)
}

// Inflow is a body above z = 0, at first of one temperature, into which fluid
// of another flows through z = 0 from t = 0 on:
//
//	T = Initial + ½ (Surface − Initial) [erfc((z − ut)/(2√(κt))) + exp(uz/κ) erfc((z + ut)/(2√(κt)))]
//
// (Ogata & Banks 1961, USGS Prof. Paper 411-A). A negative velocity u flows out
// through z = 0.
type Inflow struct {
	Material
	Velocity         float64 // u, along z
	Initial, Surface float64 // temperatures
}

func (s Inflow) profile(z, t float64) (float64, float64) {
	kappa := s.Diffusivity()
	kt, step := kappa*t, s.Surface-s.Initial
	a, b := similarity(z-s.Velocity*t, kt), similarity(z+s.Velocity*t, kt)
	if math.IsInf(a, 1) {
		return s.Initial, 0
	}
	second := erfcTimesExp(b, a)
	slope := s.Velocity/(2*kappa)*second - kernel(a, kt)
	return s.Initial + step*(math.Erfc(a)+second)/2, -s.conductivity() * step * slope
}

// At implements [Solution].
func (s Inflow) At(x, z, t float64) State { return along(s, x, z, t) }

// Medium implements [Solution].
func (s Inflow) Medium(_, _, _ float64) Medium {
	m := s.medium()
	m.VZ = s.Velocity
	return m
}

// Domain implements [Solution]: z ≥ 0, t ≥ 0.
func (s Inflow) Domain() Domain { return above(0) }

// Validate implements [Solution].
func (s Inflow) Validate() error {
	return first(
		s.check("Inflow"),
		anyFinite("Velocity of Inflow", s.Velocity),
		anyFinite("Initial of Inflow", s.Initial),
		anyFinite("Surface of Inflow", s.Surface),
	)
}

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
		notNegative("Speed of Upflow", s.Speed),
		anyFinite("Surface of Upflow", s.Surface),
		anyFinite("Deep of Upflow", s.Deep),
	)
}

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
		notNegative("Rate of StagnationFlow", s.Rate),
		anyFinite("Surface of StagnationFlow", s.Surface),
		anyFinite("Far of StagnationFlow", s.Far),
	)
}

// CouetteHeating is the steady layer between a wall at rest, z = 0, and one that
// slides along x with Speed, z = Thickness, heated by the friction of the fluid
// between them:
//
//	T = Low + (High − Low) z/L + Viscosity Speed²/(2k) (z/L)(1 − z/L)
//
// (elementary). The Brinkman number is Viscosity Speed²/(k (High − Low)).
type CouetteHeating struct {
	Material
	Thickness float64 // L; default 1
	Viscosity float64 // default 1
	Speed     float64
	Low, High float64 // temperatures of z = 0 and z = L
}

func (s CouetteHeating) profile(z, _ float64) (float64, float64) {
	l, k := orOne(s.Thickness), s.conductivity()
	zeta, step := z/l, s.High-s.Low
	friction := orOne(s.Viscosity) * s.Speed * s.Speed / (2 * k)
	return s.Low + step*zeta + friction*zeta*(1-zeta), -k / l * (step + friction*(1-2*zeta))
}

// At implements [Solution].
func (s CouetteHeating) At(x, z, t float64) State { return along(s, x, z, t) }

// Medium implements [Solution].
func (s CouetteHeating) Medium(_, z, _ float64) Medium {
	m := s.medium()
	shear := s.Speed / orOne(s.Thickness)
	m.VX, m.Source = shear*z, orOne(s.Viscosity)*shear*shear
	return m
}

// Domain implements [Solution]: 0 ≤ z ≤ Thickness.
func (s CouetteHeating) Domain() Domain { return layer(orOne(s.Thickness), forever) }

// Validate implements [Solution].
func (s CouetteHeating) Validate() error {
	return first(
		s.check("CouetteHeating"),
		notNegative("Thickness of CouetteHeating", s.Thickness),
		notNegative("Viscosity of CouetteHeating", s.Viscosity),
		anyFinite("Speed of CouetteHeating", s.Speed),
		anyFinite("Low of CouetteHeating", s.Low),
		anyFinite("High of CouetteHeating", s.High),
	)
}
