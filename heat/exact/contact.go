package exact

// Contact is the plane in which two bodies of different material and
// temperature touch from t = 0 on. The interface z = 0 takes at once, and keeps,
// the mean of both temperatures weighted with the effusivities e = √(kC), and
// an error function leads from it into each body (Carslaw & Jaeger 1959, 2.15;
// section from memory).
type Contact struct {
	Lower, Upper               Material // z < 0 and z > 0
	LowerInitial, UpperInitial float64  // temperatures
}

// Interface returns the temperature of z = 0.
func (s Contact) Interface() float64 {
	lower, upper := s.Lower.Effusivity(), s.Upper.Effusivity()
	return (lower*s.LowerInitial + upper*s.UpperInitial) / (lower + upper)
}

func (s Contact) profile(z, t float64) (float64, float64) {
	if z < 0 {
		temperature, flux := HalfSpace{s.Lower, s.LowerInitial, s.Interface()}.profile(-z, t)
		return temperature, -flux
	}
	return HalfSpace{s.Upper, s.UpperInitial, s.Interface()}.profile(z, t)
}

// Solve implements [Problem].
func (s Contact) Solve() (Solution, error) { return checked(s) }

// At implements [Solution].
func (s Contact) At(x, z, t float64) State { return along(s, x, z, t) }

// Medium implements [Solution].
func (s Contact) Medium(_, z, _ float64) Medium {
	if z < 0 {
		return s.Lower.medium()
	}
	return s.Upper.medium()
}

// Domain implements [Solution]: the plane, t ≥ 0.
func (s Contact) Domain() Domain { return plane(0) }

// Validate implements [Solution].
func (s Contact) Validate() error {
	return first(
		s.Lower.check("Contact.Lower"),
		s.Upper.check("Contact.Upper"),
		anyFinite("Contact.LowerInitial", s.LowerInitial),
		anyFinite("Contact.UpperInitial", s.UpperInitial),
	)
}
