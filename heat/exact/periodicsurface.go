package exact

import "math"

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

// Solve implements [Problem].
func (s PeriodicSurface) Solve() (Solution, error) { return checked(s) }

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
		anyFinite("PeriodicSurface.Mean", s.Mean),
		anyFinite("PeriodicSurface.Amplitude", s.Amplitude),
		notNegative("PeriodicSurface.Period", s.Period),
	)
}
