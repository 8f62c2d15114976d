package exact

import (
	"fmt"
	"math"
)

// StefanContact is a magma at its freezing temperature, z > 0, that freezes
// against cold rock with the properties of the frozen magma, z < 0:
//
//	T = Rock + (Melting − Rock) (1 + erf(z/(2√(κt))))/(1 + erf λ) below the front 2λ√(κt),
//	exp(−λ²)/(λ (1 + erf λ)) = √π LatentHeat/(C (Melting − Rock))
//
// (Carslaw & Jaeger 1959, 11.2; section from memory).
type StefanContact struct {
	Material
	LatentHeat float64 // per volume; default 1
	Rock       float64 // temperature of the rock at first
	Melting    float64 // temperature of the magma, above that of the rock
}

// Lambda returns λ. As exp(−λ²) < 1 < 1 + erf λ, the right side bounds 1/λ.
func (s StefanContact) Lambda() float64 {
	want := sqrtPi * orOne(s.LatentHeat) / (s.capacity() * (s.Melting - s.Rock))
	log := math.Log(want)
	return root(0, 1/want, func(l float64) (value, slope float64) {
		side := 1 + math.Erf(l)
		return -l*l - math.Log(l*side) - log, -2*l - 1/l - 2*gauss(l)/(sqrtPi*side)
	})
}

// Front returns the position of the front.
func (s StefanContact) Front(t float64) float64 {
	return 2 * s.Lambda() * math.Sqrt(s.Diffusivity()*t)
}

// Interface returns the temperature of the contact z = 0, the same at all
// times.
func (s StefanContact) Interface() float64 {
	return s.Rock + (s.Melting-s.Rock)/(1+math.Erf(s.Lambda()))
}

func (s StefanContact) found() stefanContact { return stefanContact{s, s.Lambda()} }

func (s StefanContact) profile(z, t float64) (float64, float64) { return s.found().profile(z, t) }

// A stefanContact knows its λ.
type stefanContact struct {
	StefanContact
	lambda float64
}

func (s stefanContact) At(x, z, t float64) State { return along(s, x, z, t) }

func (s stefanContact) profile(z, t float64) (float64, float64) {
	kt, lambda := s.Diffusivity()*t, s.lambda
	x := similarity(z, kt)
	if x > lambda {
		return s.Melting, 0
	}
	scale := (s.Melting - s.Rock) / (1 + math.Erf(lambda))
	return s.Rock + scale*math.Erfc(-x), -s.conductivity() * scale * kernel(x, kt)
}

// Solve implements [Problem]. The Solution it returns knows λ.
func (s StefanContact) Solve() (Solution, error) {
	if err := s.Validate(); err != nil {
		return nil, err
	}
	return s.found(), nil
}

// At implements [Solution]. It finds λ at each call; Solve does so once.
func (s StefanContact) At(x, z, t float64) State { return along(s, x, z, t) }

// Medium implements [Solution]; latent heat is not in it.
func (s StefanContact) Medium(_, _, _ float64) Medium { return s.medium() }

// Domain implements [Solution]: the plane, t ≥ 0. The equation holds on either
// side of the front, not on it.
func (s StefanContact) Domain() Domain { return plane(0) }

// Validate implements [Solution].
func (s StefanContact) Validate() error {
	if err := first(
		s.check("StefanContact"),
		notNegative("StefanContact.LatentHeat", s.LatentHeat),
		anyFinite("StefanContact.Rock", s.Rock),
		anyFinite("StefanContact.Melting", s.Melting),
	); err != nil {
		return err
	}
	if !(s.Rock < s.Melting) {
		return fmt.Errorf("exact: StefanContact.Rock is %g, want below Melting, %g", s.Rock, s.Melting)
	}
	return nil
}
