package exact

import (
	"fmt"
	"math"
)

// StefanTwoPhase is a liquid above z = 0 that freezes from its surface as in
// [StefanOnePhase], but is warmer than its freezing temperature at first: Neumann's
// problem (Carslaw & Jaeger 1959, 11.2; section from memory). Both phases have
// the same density, so that nothing flows. With λ the root of
//
//	exp(−λ²)/erf λ − (kₗ/kₛ) √(κₛ/κₗ) (Initial − Melting)/(Melting − Surface) exp(−λ²κₛ/κₗ)/erfc(λ√(κₛ/κₗ))
//	    = √π λ LatentHeat/(Cₛ (Melting − Surface))
//
// the front is at 2λ√(κₛt).
type StefanTwoPhase struct {
	Solid, Liquid Material
	LatentHeat    float64 // per volume; default 1
	Surface       float64 // temperature of z = 0, below Melting
	Melting       float64 // temperature of the front
	Initial       float64 // temperature of the liquid, at least Melting
}

// diffusivities returns √(κₛ/κₗ).
func (s StefanTwoPhase) diffusivities() float64 {
	return math.Sqrt(s.Solid.Diffusivity() / s.Liquid.Diffusivity())
}

// Lambda returns λ. The superheat slows the front, so that the λ of one phase
// is an upper bound.
func (s StefanTwoPhase) Lambda() float64 {
	step := s.Melting - s.Surface
	inverse := orOne(s.LatentHeat) / (s.Solid.capacity() * step)
	a := s.diffusivities()
	superheat := s.Liquid.conductivity() / s.Solid.conductivity() * a * (s.Initial - s.Melting) / step
	return root(0, onePhaseLambda(1/inverse), func(l float64) (value, slope float64) {
		// 1/(exp(l²) erf l) and 1/(exp(y²) erfc y) with their slopes.
		solid := gauss(l) / math.Erf(l)
		y := l * a
		liquid := 1 / scaledErfc(y)
		value = solid - superheat*liquid - sqrtPi*l*inverse
		slope = -2*solid*(l+solid/sqrtPi) - superheat*a*2*liquid*(liquid/sqrtPi-y) - sqrtPi*inverse
		return value, slope
	})
}

// Front returns the position of the front.
func (s StefanTwoPhase) Front(t float64) float64 {
	return 2 * s.Lambda() * math.Sqrt(s.Solid.Diffusivity()*t)
}

func (s StefanTwoPhase) found() stefanTwoPhase { return stefanTwoPhase{s, s.Lambda()} }

func (s StefanTwoPhase) profile(z, t float64) (float64, float64) { return s.found().profile(z, t) }

// A stefanTwoPhase knows its λ.
type stefanTwoPhase struct {
	StefanTwoPhase
	lambda float64
}

func (s stefanTwoPhase) At(x, z, t float64) State { return along(s, x, z, t) }

func (s stefanTwoPhase) profile(z, t float64) (float64, float64) {
	lambda, kt := s.lambda, s.Solid.Diffusivity()*t
	x := similarity(z, kt)
	if x <= lambda {
		scale := (s.Melting - s.Surface) / math.Erf(lambda)
		return s.Surface + scale*math.Erf(x), -s.Solid.conductivity() * scale * kernel(x, kt)
	}
	kt = s.Liquid.Diffusivity() * t
	x = similarity(z, kt)
	if math.IsInf(x, 1) {
		return s.Initial, 0
	}
	y := lambda * s.diffusivities()
	// erfc(x)/erfc(y) and exp(−x²)/erfc(y), with the exponentials taken out.
	scale := (s.Initial - s.Melting) * math.Exp((y-x)*(y+x)) / scaledErfc(y)
	return s.Initial - scale*scaledErfc(x), -s.Liquid.conductivity() * scale / (sqrtPi * math.Sqrt(kt))
}

// Solve implements [Problem]. The Solution it returns knows λ.
func (s StefanTwoPhase) Solve() (Solution, error) {
	if err := s.Validate(); err != nil {
		return nil, err
	}
	return s.found(), nil
}

// At implements [Solution]. It finds λ at each call; Solve does so once.
func (s StefanTwoPhase) At(x, z, t float64) State { return along(s, x, z, t) }

// Medium implements [Solution]; latent heat is not in it.
func (s StefanTwoPhase) Medium(x, z, t float64) Medium { return s.found().Medium(x, z, t) }

func (s stefanTwoPhase) Medium(_, z, t float64) Medium {
	if similarity(z, s.Solid.Diffusivity()*t) <= s.lambda {
		return s.Solid.medium()
	}
	return s.Liquid.medium()
}

// Domain implements [Solution]: z ≥ 0, t ≥ 0. The equation holds on either side
// of the front, not on it.
func (s StefanTwoPhase) Domain() Domain { return above(0) }

// Validate implements [Solution].
func (s StefanTwoPhase) Validate() error {
	if err := first(
		s.Solid.check("StefanTwoPhase.Solid"),
		s.Liquid.check("StefanTwoPhase.Liquid"),
		notNegative("StefanTwoPhase.LatentHeat", s.LatentHeat),
		anyFinite("StefanTwoPhase.Surface", s.Surface),
		anyFinite("StefanTwoPhase.Melting", s.Melting),
		anyFinite("StefanTwoPhase.Initial", s.Initial),
	); err != nil {
		return err
	}
	if !(s.Surface < s.Melting) {
		return fmt.Errorf("exact: StefanTwoPhase.Surface is %g, want below Melting, %g", s.Surface, s.Melting)
	}
	if !(s.Initial >= s.Melting) {
		return fmt.Errorf("exact: StefanTwoPhase.Initial is %g, want at least Melting, %g", s.Initial, s.Melting)
	}
	return nil
}
