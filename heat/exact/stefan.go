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

func (s StefanOnePhase) profile(z, t float64) (float64, float64) {
	kt, lambda := s.Diffusivity()*t, s.Lambda()
	x := similarity(z, kt)
	if x > lambda {
		return s.Melting, 0
	}
	scale := (s.Melting - s.Surface) / math.Erf(lambda)
	return s.Surface + scale*math.Erf(x), -s.conductivity() * scale * kernel(x, kt)
}

// At implements [Solution]. It finds λ anew at each call, in a fraction of a
// microsecond.
func (s StefanOnePhase) At(x, z, t float64) State { return along(s, x, z, t) }

// Medium implements [Solution]; latent heat is not in it.
func (s StefanOnePhase) Medium(_, _, _ float64) Medium { return s.medium() }

// Domain implements [Solution]: z ≥ 0, t ≥ 0. The equation holds on either side
// of the front, not on it.
func (s StefanOnePhase) Domain() Domain { return above(0) }

// Validate implements [Solution].
func (s StefanOnePhase) Validate() error {
	return first(
		s.check("StefanOnePhase"),
		notNegative("LatentHeat of StefanOnePhase", s.LatentHeat),
		anyFinite("Surface of StefanOnePhase", s.Surface),
		anyFinite("Melting of StefanOnePhase", s.Melting),
		differ("StefanOnePhase", s.Surface, s.Melting),
	)
}

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

func (s StefanTwoPhase) profile(z, t float64) (float64, float64) {
	lambda, kt := s.Lambda(), s.Solid.Diffusivity()*t
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

// At implements [Solution]. It finds λ anew at each call, in about a
// microsecond.
func (s StefanTwoPhase) At(x, z, t float64) State { return along(s, x, z, t) }

// Medium implements [Solution]; latent heat is not in it.
func (s StefanTwoPhase) Medium(_, z, t float64) Medium {
	if similarity(z, s.Solid.Diffusivity()*t) <= s.Lambda() {
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
		s.Solid.check("Solid of StefanTwoPhase"),
		s.Liquid.check("Liquid of StefanTwoPhase"),
		notNegative("LatentHeat of StefanTwoPhase", s.LatentHeat),
		anyFinite("Surface of StefanTwoPhase", s.Surface),
		anyFinite("Melting of StefanTwoPhase", s.Melting),
		anyFinite("Initial of StefanTwoPhase", s.Initial),
	); err != nil {
		return err
	}
	if !(s.Surface < s.Melting) {
		return fmt.Errorf("heat/exact: Surface of StefanTwoPhase is %g, want below Melting, %g", s.Surface, s.Melting)
	}
	if !(s.Initial >= s.Melting) {
		return fmt.Errorf("heat/exact: Initial of StefanTwoPhase is %g, want at least Melting, %g", s.Initial, s.Melting)
	}
	return nil
}

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

func (s StefanContact) profile(z, t float64) (float64, float64) {
	kt, lambda := s.Diffusivity()*t, s.Lambda()
	x := similarity(z, kt)
	if x > lambda {
		return s.Melting, 0
	}
	scale := (s.Melting - s.Rock) / (1 + math.Erf(lambda))
	return s.Rock + scale*math.Erfc(-x), -s.conductivity() * scale * kernel(x, kt)
}

// At implements [Solution]. It finds λ anew at each call, in a fraction of a
// microsecond.
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
		notNegative("LatentHeat of StefanContact", s.LatentHeat),
		anyFinite("Rock of StefanContact", s.Rock),
		anyFinite("Melting of StefanContact", s.Melting),
	); err != nil {
		return err
	}
	if !(s.Rock < s.Melting) {
		return fmt.Errorf("heat/exact: Rock of StefanContact is %g, want below Melting, %g", s.Rock, s.Melting)
	}
	return nil
}

func differ(of string, surface, melting float64) error {
	if surface == melting {
		return fmt.Errorf("heat/exact: Surface of %s is %g, want other than Melting", of, surface)
	}
	return nil
}
