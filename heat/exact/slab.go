package exact

import "math"

// Slab lies between z = 0 and z = Thickness, at first of one temperature. From
// t = 0 on its faces are held at two others and heat is produced inside. It is
// the cooling plate of the ocean floor (Low: surface, Initial and High: mantle)
// and the quenched slab (Low and High: bath); Carslaw & Jaeger 1959, 3.3, 3.4
// and 3.14 (sections from memory):
//
//	T = steady + Σ 2/(nπ) [Initial − Low − (−1)ⁿ(Initial − High)] sin(nπz/L) exp(−n²π²κt/L²)
//	           − (Source L²/k) Σ 4/(nπ)³ sin(nπz/L) exp(−n²π²κt/L²), second sum over odd n.
//
// At early times, where these sums converge slowly, it is evaluated by images
// with repeated integrals of erfc: a few terms suffice at any time.
type Slab struct {
	Material
	Thickness float64 // L; default 1
	Initial   float64 // temperature
	Low, High float64 // temperatures of the faces z = 0 and z = L
	Source    float64 // heat produced per volume and time
}

// earlySlab is the κt/L² below which the images are used: there four of them,
// and above it eight harmonics, reach rounding.
const (
	earlySlab     = 0.1
	slabImages    = 4
	slabHarmonics = 8
)

func (s Slab) profile(z, t float64) (float64, float64) {
	l := orOne(s.Thickness)
	tau, zeta := s.Diffusivity()*t/(l*l), z/l
	heating := s.Source * l * l / s.conductivity()
	var temperature, slope float64
	if tau < earlySlab {
		temperature, slope = s.early(zeta, tau, heating)
	} else {
		temperature, slope = s.late(zeta, tau, heating)
	}
	return temperature, -s.conductivity() * slope / l
}

// early starts from the nearer face as if the body had no other, so that the
// temperature there keeps its digits, and adds what the other face, the images
// and the source do.
func (s Slab) early(zeta, tau, heating float64) (temperature, slope float64) {
	low, high := s.Low-s.Initial, s.High-s.Initial
	other := 1 - zeta
	x, y := similarity(zeta, tau), similarity(other, tau)
	if zeta <= 0.5 {
		temperature = s.Low - low*math.Erf(x) + high*math.Erfc(y)
	} else {
		temperature = s.High - high*math.Erf(y) + low*math.Erfc(x)
	}
	slope = high*kernel(y, tau) - low*kernel(x, tau)
	for n := 1.0; n < slabImages; n++ {
		fromLow, slopeLow := slabImage(n, zeta, tau)
		fromHigh, slopeHigh := slabImage(n, other, tau)
		temperature += low*fromLow + high*fromHigh
		slope += low*slopeLow - high*slopeHigh
	}
	theta, thetaSlope := earlyHeating(zeta, tau)
	return temperature + heating*theta, slope + heating*thetaSlope
}

// slabImage is the pair of images n of a face at distance 0 that is held at 1,
// and its slope.
func slabImage(n, distance, tau float64) (theta, slope float64) {
	x, y := similarity(2*n+distance, tau), similarity(2*n-distance, tau)
	return math.Erfc(x) - math.Erfc(y), -kernel(x, tau) - kernel(y, tau)
}

// earlyHeating is the response to a unit source between faces at 0.
func earlyHeating(zeta, tau float64) (theta, slope float64) {
	if tau == 0 {
		return 0, 0
	}
	missing, sign := 0.0, 1.0
	for n := 0.0; n < slabImages; n++ {
		one, two, _ := integrals(similarity(n+zeta, tau))
		oneHigh, twoHigh, _ := integrals(similarity(n+1-zeta, tau))
		missing += sign * 4 * (two + twoHigh)
		slope += sign * (one - oneHigh)
		sign = -sign
	}
	return tau * (1 - missing), 2 * math.Sqrt(tau) * slope
}

// late sums the harmonics about the steady state.
func (s Slab) late(zeta, tau, heating float64) (temperature, slope float64) {
	temperature = s.Low*(1-zeta) + s.High*zeta + heating*zeta*(1-zeta)/2
	slope = s.High - s.Low + heating*(0.5-zeta)
	sign := -1.0 // (−1)ⁿ
	for n := 1.0; n <= slabHarmonics; n++ {
		k := n * math.Pi
		amplitude := s.amplitude(k, sign, heating) * math.Exp(-k*k*tau)
		sin, cos := math.Sincos(k * zeta)
		temperature += amplitude * sin
		slope += amplitude * k * cos
		sign = -sign
	}
	return temperature, slope
}

// amplitude returns that of sin kζ at t = 0.
func (s Slab) amplitude(k, sign, heating float64) float64 {
	return 2/k*(s.Initial-s.Low-sign*(s.Initial-s.High)) - (1-sign)*2/(k*k*k)*heating
}

// Mean returns the mean temperature of the slab.
func (s Slab) Mean(t float64) float64 {
	l := orOne(s.Thickness)
	tau, heating := s.Diffusivity()*t/(l*l), s.Source*l*l/s.conductivity()
	if tau < earlySlab {
		faces, source := earlyMeans(tau)
		return s.Initial + (s.Low-s.Initial+s.High-s.Initial)*faces + heating*source
	}
	mean := (s.Low+s.High)/2 + heating/12
	for n := 1.0; n <= slabHarmonics; n += 2 { // even harmonics have no mean
		k := n * math.Pi
		mean += s.amplitude(k, -1, heating) * math.Exp(-k*k*tau) * 2 / k
	}
	return mean
}

// earlyMeans are the mean responses to a unit step of one face and to a unit
// source.
func earlyMeans(tau float64) (face, source float64) {
	if tau == 0 {
		return 0, 0
	}
	root, sign := 2*math.Sqrt(tau), 1.0
	missing := 0.0
	for n := 0.0; n < 2*slabImages; n++ {
		weight := 2.0
		if n == 0 {
			weight = 1
		}
		one, _, three := integrals(n / root)
		face += sign * weight * one
		missing += sign * weight * three
		sign = -sign
	}
	return root * face, tau * (1 - 8*root*missing)
}

// Solve implements [Problem].
func (s Slab) Solve() (Solution, error) { return checked(s) }

// At implements [Solution].
func (s Slab) At(x, z, t float64) State { return along(s, x, z, t) }

// Medium implements [Solution].
func (s Slab) Medium(_, _, _ float64) Medium {
	m := s.medium()
	m.Source = s.Source
	return m
}

// Domain implements [Solution]: 0 ≤ z ≤ Thickness, t ≥ 0.
func (s Slab) Domain() Domain { return layer(orOne(s.Thickness), 0) }

// Validate implements [Solution].
func (s Slab) Validate() error {
	return first(
		s.check("Slab"),
		notNegative("Slab.Thickness", s.Thickness),
		anyFinite("Slab.Initial", s.Initial),
		anyFinite("Slab.Low", s.Low),
		anyFinite("Slab.High", s.High),
		anyFinite("Slab.Source", s.Source),
	)
}
