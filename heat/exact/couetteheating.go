package exact

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

// Solve implements [Problem].
func (s CouetteHeating) Solve() (Solution, error) { return checked(s) }

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
		notNegative("CouetteHeating.Thickness", s.Thickness),
		notNegative("CouetteHeating.Viscosity", s.Viscosity),
		anyFinite("CouetteHeating.Speed", s.Speed),
		anyFinite("CouetteHeating.Low", s.Low),
		anyFinite("CouetteHeating.High", s.High),
	)
}
