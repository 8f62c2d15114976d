package exact

import "math"

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

// Solve implements [Problem].
func (s Inflow) Solve() (Solution, error) { return checked(s) }

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
		anyFinite("Inflow.Velocity", s.Velocity),
		anyFinite("Inflow.Initial", s.Initial),
		anyFinite("Inflow.Surface", s.Surface),
	)
}
