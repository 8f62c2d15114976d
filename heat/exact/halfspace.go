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
		anyFinite("Initial of HalfSpace", s.Initial),
		anyFinite("Surface of HalfSpace", s.Surface),
	)
}

// HalfSpaceFlux is a body above z = 0 into whose surface a constant flux is
// conducted from t = 0 on:
//
//	T = Initial + (2 Flux/k) √(κt) ierfc(z/(2√(κt)))
//
// (Carslaw & Jaeger 1959, 2.9; section from memory).
type HalfSpaceFlux struct {
	Material
	Initial float64 // temperature
	Flux    float64 // into the body
}

func (s HalfSpaceFlux) profile(z, t float64) (float64, float64) {
	kt := s.Diffusivity() * t
	x := similarity(z, kt)
	once, _, _ := integrals(x)
	return s.Initial + 2*s.Flux/s.conductivity()*math.Sqrt(kt)*once, s.Flux * math.Erfc(x)
}

// At implements [Solution].
func (s HalfSpaceFlux) At(x, z, t float64) State { return along(s, x, z, t) }

// Medium implements [Solution].
func (s HalfSpaceFlux) Medium(_, _, _ float64) Medium { return s.medium() }

// Domain implements [Solution]: z ≥ 0, t ≥ 0.
func (s HalfSpaceFlux) Domain() Domain { return above(0) }

// Validate implements [Solution].
func (s HalfSpaceFlux) Validate() error {
	return first(
		s.check("HalfSpaceFlux"),
		anyFinite("Initial of HalfSpaceFlux", s.Initial),
		anyFinite("Flux of HalfSpaceFlux", s.Flux),
	)
}

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
		anyFinite("Initial of HalfSpaceRobin", s.Initial),
		anyFinite("Ambient of HalfSpaceRobin", s.Ambient),
		notNegative("Coefficient of HalfSpaceRobin", s.Coefficient),
	)
}

// PeriodicSurface is a body above z = 0 whose surface temperature has always
// swung about a mean:
//
//	T = Mean + Amplitude exp(−z/δ) cos(ωt − z/δ),  δ = √(2κ/ω)
//
// (Carslaw & Jaeger 1959, 2.6; section from memory). The flux into the surface
// leads its temperature by an eighth of a period.
type PeriodicSurface struct {
	Material
	Mean      float64 // temperature
	Amplitude float64 // of temperature; default 1
	Period    float64 // 2π/ω; default 1
}

func (s PeriodicSurface) profile(z, t float64) (float64, float64) {
	amplitude, delta := orOne(s.Amplitude), s.SkinDepth()
	decay := math.Exp(-z / delta)
	sin, cos := math.Sincos(s.frequency()*t - z/delta)
	return s.Mean + amplitude*decay*cos, s.conductivity() * amplitude / delta * decay * (cos - sin)
}

func (s PeriodicSurface) frequency() float64 { return 2 * math.Pi / orOne(s.Period) }

// SkinDepth returns δ, the depth at which the swing is down by a factor e.
func (s PeriodicSurface) SkinDepth() float64 {
	return math.Sqrt(2 * s.Diffusivity() / s.frequency())
}

// FluxAmplitude returns the amplitude of the flux through the surface,
// k Amplitude √(ω/κ).
func (s PeriodicSurface) FluxAmplitude() float64 {
	return s.conductivity() * math.Abs(orOne(s.Amplitude)) * math.Sqrt(s.frequency()/s.Diffusivity())
}

// At implements [Solution].
func (s PeriodicSurface) At(x, z, t float64) State { return along(s, x, z, t) }

// Medium implements [Solution].
func (s PeriodicSurface) Medium(_, _, _ float64) Medium { return s.medium() }

// Domain implements [Solution]: z ≥ 0, all times.
func (s PeriodicSurface) Domain() Domain { return above(forever) }

// Validate implements [Solution].
func (s PeriodicSurface) Validate() error {
	return first(
		s.check("PeriodicSurface"),
		anyFinite("Mean of PeriodicSurface", s.Mean),
		anyFinite("Amplitude of PeriodicSurface", s.Amplitude),
		notNegative("Period of PeriodicSurface", s.Period),
	)
}
