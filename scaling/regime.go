package scaling

import (
	"math"

	"example.org/overturn/scaling/internal/check"
)

// Regime is a style of convection with temperature-dependent viscosity.
type Regime int

const (
	// SmallContrast flow is that of constant viscosity, with Ra at the mean of
	// the wall temperatures. (Up to contrasts of 1e5 its Nu as a function of
	// Ra/Ra_c stays within 20% of that curve: Richter, Nataf & Daly 1983,
	// abstract.)
	SmallContrast Regime = iota + 1

	// Transitional flow has a sluggish lid that still moves.
	Transitional

	// StagnantLidRegime has a lid that does not move; convection is driven by
	// the few viscous temperature scales below it.
	StagnantLidRegime
)

// String returns the name of the regime.
func (r Regime) String() string {
	return name(int(r), "unknown regime", "small contrast", "transitional", "stagnant lid")
}

// RegimeOf returns the regime of a viscosity with Frank-Kamenetskii parameter
// theta and creep exponent n, by θ/(n+1) against [SmallContrastBound] and
// [StagnantLidBound] (Solomatov 1995).
func RegimeOf(theta, n float64) (Regime, error) {
	err := check.First(check.NotNegative(pkg, "Frank-Kamenetskii parameter", theta), check.Within(pkg, "stress exponent", n, 1, maxStressExponent))
	switch {
	case err != nil:
		return 0, err
	case theta < SmallContrastBound*(n+1):
		return SmallContrast, nil
	case theta <= StagnantLidBound*(n+1):
		return Transitional, nil
	default:
		return StagnantLidRegime, nil
	}
}

// Pattern is a style of three-dimensional convection heated from below.
type Pattern int

// Patterns of Ogawa et al. (1991).
const (
	Rolls         Pattern = iota + 1 // two-dimensional
	Bimodal                          // three-dimensional, whole layer
	UnderneathLid                    // three-dimensional, below a stagnant lid
)

// String returns the name of the pattern.
func (p Pattern) String() string {
	return name(int(p), "unknown pattern", "two-dimensional rolls", "three-dimensional bimodal flow", "three-dimensional flow under a stagnant lid")
}

// PatternOf returns the pattern of three-dimensional convection heated from below
// at a Rayleigh number with the viscosity of the top and a viscosity contrast
// (top over bottom): bounds [OgawaLid] and [OgawaBimodal]. Contrasts above 1e5,
// which were not studied, are reported as [ErrOutOfRange] beside the answer.
func PatternOf(topRayleigh, contrast float64) (Pattern, error) {
	v := Groups{TopRayleigh: topRayleigh}
	err := check.First(check.Positive(pkg, "top Rayleigh number", topRayleigh), check.Above(pkg, "viscosity contrast", contrast, 0))
	if err != nil {
		return 0, err
	}
	if contrast > 1e5 {
		err = &RangeError{Law: "patterns of 3-D convection", Violations: []Violation{
			{Limit{FrankKamenetskiiParameter, 0, 5 * math.Ln10}, math.Log(contrast)}}}
	}
	switch {
	case contrast > OgawaLid().Evaluate(v):
		return UnderneathLid, err
	case contrast > OgawaBimodal().Evaluate(v):
		return Bimodal, err
	default:
		return Rolls, err
	}
}
