package exact

import (
	"fmt"
	"math"
)

// StefanOnePhase is a melt at its freezing temperature above z = 0 that freezes
// from its surface, which is held at another from t = 0 on, with a front at
// 2λ√(κt):
//
//	T = Surface + (Melting − Surface) erf(z/(2√(κt)))/erf λ below the front,
//	√π λ exp(λ²) erf λ = Stefan number = C (Melting − Surface)/LatentHeat
//
// (Carslaw & Jaeger 1959, 11.2; section from memory). With Surface above Melting
// it is a solid that melts.
type StefanOnePhase struct {
	Material           // of the growing phase
	LatentHeat float64 // per volume; default 1
	Surface    float64 // temperature of z = 0
	Melting    float64 // temperature of the front and beyond
}

// StefanNumber returns C |Melting − Surface|/LatentHeat.
func (s StefanOnePhase) StefanNumber() float64 {
	return s.capacity() * math.Abs(s.Melting-s.Surface) / orOne(s.LatentHeat)
}

// Lambda returns λ.
func (s StefanOnePhase) Lambda() float64 { return onePhaseLambda(s.StefanNumber()) }

// onePhaseLambda solves the equation in logarithms, which cannot overflow. The
// left side is at least 2λ², which bounds λ from above.
func onePhaseLambda(stefan float64) float64 {
	want := math.Log(stefan)
	return root(0, math.Sqrt(stefan/2), func(l float64) (value, slope float64) {
		erf := math.Erf(l)
		return want - math.Log(sqrtPi*l*erf) - l*l, -1/l - 2*gauss(l)/(sqrtPi*erf) - 2*l
	})
}

// Front returns the position of the front.
func (s StefanOnePhase) Front(t float64) float64 {
	return 2 * s.Lambda() * math.Sqrt(s.Diffusivity()*t)
}

func (s StefanOnePhase) found() stefanOnePhase { return stefanOnePhase{s, s.Lambda()} }

func (s StefanOnePhase) profile(z, t float64) (float64, float64) { return s.found().profile(z, t) }

// A stefanOnePhase knows its λ.
type stefanOnePhase struct {
	StefanOnePhase
	lambda float64
}

func (s stefanOnePhase) At(x, z, t float64) State { return along(s, x, z, t) }

func (s stefanOnePhase) profile(z, t float64) (float64, float64) {
	kt, lambda := s.Diffusivity()*t, s.lambda
	x := similarity(z, kt)
	if x > lambda {
		return s.Melting, 0
	}
	scale := (s.Melting - s.Surface) / math.Erf(lambda)
	return s.Surface + scale*math.Erf(x), -s.conductivity() * scale * kernel(x, kt)
}

// Solve implements [Problem]. The Solution it returns knows λ.
func (s StefanOnePhase) Solve() (Solution, error) {
	if err := s.Validate(); err != nil {
		return nil, err
	}
	return s.found(), nil
}

// At implements [Solution]. It finds λ at each call; Solve does so once.
func (s StefanOnePhase) At(x, z, t float64) State { return along(s, x, z, t) }

// Medium implements [Solution]; latent heat is not in it.
func (s StefanOnePhase) Medium(_, _, _ float64) Medium { return s.medium() }

// Domain implements [Solution]: z ≥ 0, t ≥ 0. The equation holds on either side
// of the front, not on it.
func (s StefanOnePhase) Domain() Domain { return above(0) }

// Validate implements [Solution].
func (s StefanOnePhase) Validate() error {
	if err := first(
		s.check("StefanOnePhase"),
		notNegative("StefanOnePhase.LatentHeat", s.LatentHeat),
		anyFinite("StefanOnePhase.Surface", s.Surface),
		anyFinite("StefanOnePhase.Melting", s.Melting),
	); err != nil {
		return err
	}
	if s.Surface == s.Melting {
		return fmt.Errorf("exact: StefanOnePhase.Surface is %g, want other than Melting", s.Surface)
	}
	return nil
}
