package exact

import "math"

// Gaussian is a hot spot that spreads in the plane while a uniform flow carries
// it away:
//
//	T = Amplitude s²/σ² exp(−r²/(2σ²)),  σ² = s² + 2κt,
//
// with r the distance from the centre (X + VX·t, Z + VZ·t) (Carslaw & Jaeger
// 1959, 10.3, section from memory, with the spot moved).
type Gaussian struct {
	Material
	Amplitude float64 // of temperature; default 1
	Width     float64 // s, the standard deviation at t = 0; default 1
	X, Z      float64 // centre at t = 0
	VX, VZ    float64 // velocity
}

func (s Gaussian) state(x, z, t float64) State {
	w := orOne(s.Width)
	return spot{
		material: s.Material, heat: orOne(s.Amplitude) * w * w,
		x: s.X + s.VX*t, z: s.Z + s.VZ*t, spread: isotropic(w, s.Diffusivity()*t),
	}.at(x, z)
}

// Solve implements [Problem].
func (s Gaussian) Solve() (Solution, error) { return checked(s) }

// At implements [Solution].
func (s Gaussian) At(x, z, t float64) State { return inside(s, x, z, t) }

// Medium implements [Solution].
func (s Gaussian) Medium(_, _, _ float64) Medium {
	m := s.medium()
	m.VX, m.VZ = s.VX, s.VZ
	return m
}

// Domain implements [Solution]: the plane, t ≥ 0.
func (s Gaussian) Domain() Domain { return plane(0) }

// Validate implements [Solution].
func (s Gaussian) Validate() error {
	return first(
		checkSpot("Gaussian", s.Material, s.Amplitude, s.Width, s.X, s.Z),
		anyFinite("Gaussian.VX", s.VX),
		anyFinite("Gaussian.VZ", s.VZ),
	)
}

// GaussianRotation is a [Gaussian] in a fluid that turns about the origin like
// a solid, v = Rate (−z, x): its centre moves on a circle and it spreads as in a
// fluid at rest, because conduction does not know of directions.
type GaussianRotation struct {
	Material
	Amplitude float64 // of temperature; default 1
	Width     float64 // standard deviation at t = 0; default 1
	X, Z      float64 // centre at t = 0
	Rate      float64 // angle per time, from x towards z
}

func (s GaussianRotation) state(x, z, t float64) State {
	w := orOne(s.Width)
	sin, cos := math.Sincos(s.Rate * t)
	return spot{
		material: s.Material, heat: orOne(s.Amplitude) * w * w,
		x: s.X*cos - s.Z*sin, z: s.X*sin + s.Z*cos, spread: isotropic(w, s.Diffusivity()*t),
	}.at(x, z)
}

// Solve implements [Problem].
func (s GaussianRotation) Solve() (Solution, error) { return checked(s) }

// At implements [Solution].
func (s GaussianRotation) At(x, z, t float64) State { return inside(s, x, z, t) }

// Medium implements [Solution].
func (s GaussianRotation) Medium(x, z, _ float64) Medium {
	m := s.medium()
	m.VX, m.VZ = -s.Rate*z, s.Rate*x
	return m
}

// Domain implements [Solution]: the plane, t ≥ 0.
func (s GaussianRotation) Domain() Domain { return plane(0) }

// Validate implements [Solution].
func (s GaussianRotation) Validate() error {
	return first(
		checkSpot("GaussianRotation", s.Material, s.Amplitude, s.Width, s.X, s.Z),
		anyFinite("GaussianRotation.Rate", s.Rate),
	)
}

// GaussianShear is a [Gaussian] in the shear flow v = (Rate·z, 0). It becomes
// an ellipse whose second moments obey ordinary equations:
//
//	σzz = s² + 2κt,  σxz = Rate (s²t + κt²),  σxx = σzz + Rate² (s²t² + ⅔κt³).
type GaussianShear struct {
	Material
	Amplitude float64 // of temperature; default 1
	Width     float64 // standard deviation at t = 0; default 1
	X, Z      float64 // centre at t = 0
	Rate      float64 // velocity per distance
}

func (s GaussianShear) state(x, z, t float64) State {
	w, kt := orOne(s.Width), s.Diffusivity()*t
	spread := isotropic(w, kt)
	spread.xz = s.Rate * t * (w*w + kt)
	spread.xx += s.Rate * s.Rate * t * t * (w*w + 2*kt/3)
	return spot{
		material: s.Material, heat: orOne(s.Amplitude) * w * w,
		x: s.X + s.Rate*s.Z*t, z: s.Z, spread: spread,
	}.at(x, z)
}

// Solve implements [Problem].
func (s GaussianShear) Solve() (Solution, error) { return checked(s) }

// At implements [Solution].
func (s GaussianShear) At(x, z, t float64) State { return inside(s, x, z, t) }

// Medium implements [Solution].
func (s GaussianShear) Medium(_, z, _ float64) Medium {
	m := s.medium()
	m.VX = s.Rate * z
	return m
}

// Domain implements [Solution]: the plane, t ≥ 0.
func (s GaussianShear) Domain() Domain { return plane(0) }

// Validate implements [Solution].
func (s GaussianShear) Validate() error {
	return first(
		checkSpot("GaussianShear", s.Material, s.Amplitude, s.Width, s.X, s.Z),
		anyFinite("GaussianShear.Rate", s.Rate),
	)
}
