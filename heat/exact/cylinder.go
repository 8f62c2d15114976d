package exact

import (
	"math"
	"sync"
)

// Cylinder is a long cylinder about the origin of the plane, at first of one
// temperature, whose surface is held at another from t = 0 on (Carslaw & Jaeger
// 1959, 7.6; section from memory):
//
//	T = Surface + (Initial − Surface) Σ 2 J₀(jr/R)/(j J₁(j)) exp(−j²κt/R²)
//
// over the zeros j of J₀. Below κt/R² = 4e-4 it is evaluated by the expansion
// for a thin boundary layer (Carslaw & Jaeger 13.3, from memory), whose error
// is below rounding there. The sum takes some 2/√(κt/R²) terms.
type Cylinder struct {
	Material
	Radius           float64 // R; default 1
	Initial, Surface float64 // temperatures
}

// earlyCylinder is the κt/R² below which the boundary layer is thin.
const earlyCylinder = 4e-4

func (s Cylinder) state(x, z, t float64) State {
	radius := orOne(s.Radius)
	r := math.Hypot(x, z)
	tau, rho := s.Diffusivity()*t/(radius*radius), r/radius
	var theta, slope float64
	switch {
	case !(rho <= 1):
		return nowhere
	case tau < earlyCylinder:
		theta, slope = thinLayer(rho, tau)
	default:
		theta, slope = lateCylinder(rho, tau)
	}
	step := s.Initial - s.Surface
	flux := -s.conductivity() * step * slope / radius
	state := State{Temperature: s.Surface + step*theta}
	if r > 0 {
		state.FluxX, state.FluxZ = flux*x/r, flux*z/r
	}
	return state
}

// lateCylinder sums the harmonics until they are below rounding.
func lateCylinder(rho, tau float64) (theta, slope float64) {
	for _, h := range cylinderHarmonics() {
		amplitude := 2 * math.Exp(-h.zero*h.zero*tau) / h.slope
		theta += amplitude / h.zero * math.J0(h.zero*rho)
		slope -= amplitude * math.J1(h.zero*rho)
		if h.zero*h.zero*tau > 42 {
			break
		}
	}
	return theta, slope
}

// A harmonic is a zero of J₀ with the value of J₁ there.
type harmonic struct{ zero, slope float64 }

// cylinderHarmonics are enough for times from earlyCylinder on.
var cylinderHarmonics = sync.OnceValue(func() []harmonic {
	all := make([]harmonic, 104)
	for i := range all {
		j := besselZero(i + 1)
		all[i] = harmonic{j, math.J1(j)}
	}
	return all
})

// besselZero returns zero number n = 1, 2, … of J₀: McMahon's expansion and
// three steps of Newton's method.
func besselZero(n int) float64 {
	b := (float64(n) - 0.25) * math.Pi
	y := 1 / (8 * b)
	j := b + y*(1-y*y*(124.0/3-y*y*120928.0/15))
	for range 3 {
		j += math.J0(j) / math.J1(j)
	}
	return j
}

// thinOrder is the number of terms of the expansion.
const thinOrder = 9

// thinRatio has the coefficients aₖ of I₀(x) ~ eˣ/√(2πx) Σ aₖ/xᵏ,
// aₖ = aₖ₋₁ (2k−1)²/(8k).
var thinRatio = func() (a [thinOrder]float64) {
	a[0] = 1
	for k := 1; k < thinOrder; k++ {
		a[k] = a[k-1] * float64((2*k-1)*(2*k-1)) / float64(8*k)
	}
	return a
}()

// thinLayer inverts the transform I₀(qρ)/(s I₀(q)), s = q², of the part of the
// step that has got in: with the asymptotic series of both Bessel functions it
// is ρ^(−½) exp(−q(1−ρ)) Σ cₘ(ρ)/qᵐ, and 1/(s qᵐ) exp(−qd) is the transform of
// (2√τ)ᵐ times the m-fold integral of erfc.
func thinLayer(rho, tau float64) (theta, slope float64) {
	x := similarity(1-rho, tau)
	if x > 13 {
		return 1, 0
	}
	c, cSlope := thinCoefficients(rho)
	// Fold −1 of erfc is 2/√π exp(−x²), fold m = (fold m−2 − 2x fold m−1)/2m.
	before, fold := 2/sqrtPi*gauss(x), math.Erfc(x)
	scale, root := 1.0, 2*math.Sqrt(tau)
	front := 1 / math.Sqrt(rho)
	in := 0.0
	for m := range thinOrder {
		if m > 0 {
			before, fold = fold, (before-2*x*fold)/(2*float64(m))
			scale *= root
		}
		in += c[m] * scale * fold
		// The argument of the fold is (1−ρ)/root: its slope is fold m−1 /root.
		if tau > 0 {
			slope -= front * (cSlope[m]*scale*fold + c[m]*scale*before/root)
		}
	}
	if tau == 0 {
		slope = -kernel(x, 0)
	}
	return 1 - front*in, slope + front*in/(2*rho)
}

// thinCoefficients divides the two series; c and its slope in ρ.
func thinCoefficients(rho float64) (c, slope [thinOrder]float64) {
	power := 1.0
	for m := range thinOrder {
		c[m] = thinRatio[m] * power
		slope[m] = -float64(m) * thinRatio[m] * power / rho
		for k := 1; k <= m; k++ {
			c[m] -= thinRatio[k] * c[m-k]
			slope[m] -= thinRatio[k] * slope[m-k]
		}
		power /= rho
	}
	return c, slope
}

// Solve implements [Problem].
func (s Cylinder) Solve() (Solution, error) { return checked(s) }

// At implements [Solution].
func (s Cylinder) At(x, z, t float64) State { return inside(s, x, z, t) }

// Medium implements [Solution].
func (s Cylinder) Medium(_, _, _ float64) Medium { return s.medium() }

// Domain implements [Solution]: the square about the cylinder, t ≥ 0. Outside
// of the cylinder itself At is NaN.
func (s Cylinder) Domain() Domain {
	r := orOne(s.Radius)
	return Domain{-r, r, -r, r, 0}
}

// Validate implements [Solution].
func (s Cylinder) Validate() error {
	return first(
		s.check("Cylinder"),
		notNegative("Cylinder.Radius", s.Radius),
		anyFinite("Cylinder.Initial", s.Initial),
		anyFinite("Cylinder.Surface", s.Surface),
	)
}
