package exact

import "math"

// HalfSpaceRobin is a body above z = 0 whose surface exchanges heat with
// surroundings from t = 0 on, the flux into it being Coefficient (Ambient − T):
//
//	T = Initial + (Ambient − Initial) [erfc(x) − exp(hz + h²κt) erfc(x + h√(κt))]
//
// with x = z/(2√(κt)) and h = Coefficient/k (Carslaw & Jaeger 1959, 2.7;
// section from memory). It is evaluated with the scaled erfc and does not
// overflow.
type HalfSpaceRobin struct {
	Material
	Initial, Ambient float64 // temperatures
	Coefficient      float64 // of heat transfer; default 1
}

func (s HalfSpaceRobin) profile(z, t float64) (float64, float64) {
	theta, slope := robinStep(z, s.Diffusivity()*t, orOne(s.Coefficient)/s.conductivity())
	step := s.Ambient - s.Initial
	return s.Initial + step*theta, -s.conductivity() * step * slope
}

// robinStep is the response at a distance from a surface that exchanges heat
// with surroundings of temperature 1, and its slope. The second exponential is
// exp((x + h√(κt))² − x²).
func robinStep(distance, kt, h float64) (theta, slope float64) {
	x := similarity(distance, kt)
	if math.IsInf(x, 1) {
		return 0, 0
	}
	second := erfcTimesExp(x+h*math.Sqrt(kt), x)
	return math.Erfc(x) - second, -h * second
}

// Solve implements [Problem].
func (s HalfSpaceRobin) Solve() (Solution, error) { return checked(s) }

// At implements [Solution].
func (s HalfSpaceRobin) At(x, z, t float64) State { return along(s, x, z, t) }

// Medium implements [Solution].
func (s HalfSpaceRobin) Medium(_, _, _ float64) Medium { return s.medium() }

// Domain implements [Solution]: z ≥ 0, t ≥ 0.
func (s HalfSpaceRobin) Domain() Domain { return above(0) }

// Validate implements [Solution].
func (s HalfSpaceRobin) Validate() error {
	return first(
		s.check("HalfSpaceRobin"),
		anyFinite("HalfSpaceRobin.Initial", s.Initial),
		anyFinite("HalfSpaceRobin.Ambient", s.Ambient),
		notNegative("HalfSpaceRobin.Coefficient", s.Coefficient),
	)
}
