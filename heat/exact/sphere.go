package exact

import (
	"math"

	"gonum.org/v1/gonum/integrate/quad"
)

// Sphere is a ball, at first of one temperature, whose surface is held at
// another from t = 0 on (Carslaw & Jaeger 1959, 9.3; section from memory):
//
//	T = Surface + (Initial − Surface) 2 Σ (−1)ⁿ⁺¹ sin(nπr/R)/(nπr/R) exp(−n²π²κt/R²)
//
// At early times, where this sum converges slowly, it is evaluated by images.
// It is no [Solution], because it is not a plane field.
type Sphere struct {
	Material
	Radius           float64 // R; default 1
	Initial, Surface float64 // temperatures
}

// At returns temperature and outward flux at a distance r from the centre, NaN
// for r < 0, r > Radius or t < 0.
func (s Sphere) At(r, t float64) (temperature, flux float64) {
	radius := orOne(s.Radius)
	if !(r >= 0 && r <= radius && t >= 0) {
		return math.NaN(), math.NaN()
	}
	tau, rho := s.Diffusivity()*t/(radius*radius), r/radius
	var theta, slope float64
	switch {
	case tau >= earlySlab:
		theta, slope = lateSphere(rho, tau)
	case rho <= math.Sqrt(tau):
		theta, slope = earlySphereCentre(rho, tau)
	default:
		theta, slope = earlySphere(rho, tau)
	}
	step := s.Initial - s.Surface
	return s.Surface + step*theta, -s.conductivity() * step * slope / radius
}

// lateSphere sums harmonics. sin x/x and its slope are the spherical Bessel
// functions j₀ and −j₁.
func lateSphere(rho, tau float64) (theta, slope float64) {
	sign := 2.0
	for n := 1.0; n <= slabHarmonics; n++ {
		k := n * math.Pi
		amplitude := sign * math.Exp(-k*k*tau)
		j0, j1 := sphericalBessel(k * rho)
		theta += amplitude * j0
		slope -= amplitude * k * j1
		sign = -sign
	}
	return theta, slope
}

// sphericalBessel returns j₀ and j₁; near zero, where the closed form of j₁
// cancels, by their series.
func sphericalBessel(x float64) (j0, j1 float64) {
	if x < 0.5 {
		y := x * x / 2
		j0 = 1 - y/3*(1-y/10*(1-y/21*(1-y/36*(1-y/55*(1-y/78)))))
		j1 = x / 3 * (1 - y/5*(1-y/14*(1-y/27*(1-y/44*(1-y/65*(1-y/90))))))
		return j0, j1
	}
	sin, cos := math.Sincos(x)
	return sin / x, (sin/x - cos) / x
}

// earlySphere sums images of the surface: 1 − images/ρ, where the nearest one
// enters as erf, so that the temperature near the surface keeps its digits.
func earlySphere(rho, tau float64) (theta, slope float64) {
	x := similarity(1-rho, tau)
	nearest, rest, slopes := math.Erfc(x), 0.0, kernel(x, tau)
	for n := 0.0; n < slabImages; n++ {
		if n > 0 {
			x = similarity(2*n+1-rho, tau)
			rest += math.Erfc(x)
			slopes += kernel(x, tau)
		}
		y := similarity(2*n+1+rho, tau)
		rest -= math.Erfc(y)
		slopes += kernel(y, tau)
	}
	theta = math.Erf(similarity(1-rho, tau)) - (nearest*(1-rho)+rest)/rho
	return theta, (nearest+rest)/(rho*rho) - slopes/rho
}

// Nodes and weights of Gauss's rule on (−1, 1), enough to integrate a Gaussian
// over one diffusion length to rounding.
var chordNodes, chordWeights = func() (x, w [24]float64) {
	quad.Legendre{}.FixedLocations(x[:], w[:], -1, 1)
	return x, w
}()

// earlySphereCentre is earlySphere near the centre, where its differences
// cancel: images/ρ is the integral over u from −1 to 1 of the kernel of the
// distance image − ρu.
func earlySphereCentre(rho, tau float64) (theta, slope float64) {
	theta = 1
	for n := 0.0; n < slabImages; n++ {
		image := 2*n + 1
		if similarity(image-rho, tau) > 27 {
			break
		}
		for i, u := range chordNodes {
			distance := image - rho*u
			weighted := chordWeights[i] * kernel(similarity(distance, tau), tau)
			theta -= weighted
			slope -= weighted * u * distance / (2 * tau)
		}
	}
	return theta, slope
}

// Validate returns an error that names the first field that makes no sense.
func (s Sphere) Validate() error {
	return first(
		s.check("Sphere"),
		notNegative("Sphere.Radius", s.Radius),
		anyFinite("Sphere.Initial", s.Initial),
		anyFinite("Sphere.Surface", s.Surface),
	)
}
