package exact

import "math"

// Geotherm is the steady temperature below the surface z = 0 of a crust that
// produces heat everywhere alike, with z for depth:
//
//	T = Surface + HeatFlow z/k − Source z²/(2k)
//
// (elementary).
type Geotherm struct {
	Material
	Surface  float64 // temperature of z = 0
	HeatFlow float64 // out through z = 0
	Source   float64 // heat produced per volume and time
}

func (s Geotherm) profile(z, _ float64) (float64, float64) {
	return s.Surface + z*(s.HeatFlow-s.Source*z/2)/s.conductivity(), s.Source*z - s.HeatFlow
}

// Solve implements [Problem].
func (s Geotherm) Solve() (Solution, error) { return checked(s) }

// At implements [Solution]. FluxZ is negative where heat rises to the surface.
func (s Geotherm) At(x, z, t float64) State { return along(s, x, z, t) }

// Medium implements [Solution].
func (s Geotherm) Medium(_, _, _ float64) Medium {
	m := s.medium()
	m.Source = s.Source
	return m
}

// Domain implements [Solution]: z ≥ 0.
func (s Geotherm) Domain() Domain { return above(forever) }

// Validate implements [Solution].
func (s Geotherm) Validate() error {
	return first(
		s.check("Geotherm"),
		anyFinite("Geotherm.Surface", s.Surface),
		anyFinite("Geotherm.HeatFlow", s.HeatFlow),
		anyFinite("Geotherm.Source", s.Source),
	)
}

// GeothermExponential is the steady temperature below the surface z = 0 of a
// crust whose heat production falls exponentially with the depth z:
//
//	T = Surface + MantleFlow z/k + (Source h²/k) (1 − exp(−z/h)),  h = Depth
//
// (Lachenbruch 1970). Its surface heat flow is the linear relation of Roy,
// Blackwell & Birch (1968), MantleFlow + Source h.
type GeothermExponential struct {
	Material
	Surface    float64 // temperature of z = 0
	MantleFlow float64 // from far below
	Source     float64 // heat produced per volume and time at z = 0
	Depth      float64 // h, in which production falls by a factor e; default 1
}

// SurfaceFlow returns the heat flow out through z = 0.
func (s GeothermExponential) SurfaceFlow() float64 {
	return s.MantleFlow + s.Source*orOne(s.Depth)
}

func (s GeothermExponential) profile(z, _ float64) (float64, float64) {
	h, k := orOne(s.Depth), s.conductivity()
	temperature := s.Surface + (s.MantleFlow*z-s.Source*h*h*math.Expm1(-z/h))/k
	return temperature, -s.MantleFlow - s.Source*h*math.Exp(-z/h)
}

// Solve implements [Problem].
func (s GeothermExponential) Solve() (Solution, error) { return checked(s) }

// At implements [Solution]. FluxZ is negative where heat rises to the surface.
func (s GeothermExponential) At(x, z, t float64) State { return along(s, x, z, t) }

// Medium implements [Solution].
func (s GeothermExponential) Medium(_, z, _ float64) Medium {
	m := s.medium()
	m.Source = s.Source * math.Exp(-z/orOne(s.Depth))
	return m
}

// Domain implements [Solution]: z ≥ 0.
func (s GeothermExponential) Domain() Domain { return above(forever) }

// Validate implements [Solution].
func (s GeothermExponential) Validate() error {
	return first(
		s.check("GeothermExponential"),
		anyFinite("GeothermExponential.Surface", s.Surface),
		anyFinite("GeothermExponential.MantleFlow", s.MantleFlow),
		anyFinite("GeothermExponential.Source", s.Source),
		notNegative("GeothermExponential.Depth", s.Depth),
	)
}
