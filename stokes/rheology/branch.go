package rheology

import "math"

// A branch is a mechanism at one pressure, grain size and water content, in
// second invariants: ln rate = athermal - enthalpy/T + exponent ln τ. The
// branches of a composite lie in one slice; ends marks the last of each path.
type branch struct {
	athermal, enthalpy, exponent float64
	ends                         bool
}

func appendBranches(dst []branch, paths []Path, s State) []branch {
	for _, path := range paths {
		for j, m := range path {
			m = m.Invariants()
			dst = append(dst, branch{m.logAthermal(s), m.enthalpy(s.Pressure), m.StressExponent, j == len(path)-1})
		}
	}
	return dst
}

// atStress returns the viscosity at a logarithm of stress.
func atStress(branches []branch, logStress, temperature float64) float64 {
	rate, _ := logRate(branches, logStress, temperature)
	return 0.5 * math.Exp(logStress-rate)
}

// maxStressSteps bounds the search for the stress. Newton's method needs about
// five steps from where it starts; its safeguard, bisection, some sixty.
const maxStressSteps = 100

// atStrainRate returns the viscosity at a logarithm of strain rate. It finds
// the stress by Newton's method: in logarithms the rate rises with a slope
// that lies between the smallest and the largest exponent, so the two bracket
// the root and Newton's step is near it. A step out of the bracket gives way
// to bisection. The last step is quadratically smaller than the one before,
// so that stopping at 1e-9 leaves rounding error only.
func atStrainRate(branches []branch, want, temperature float64) float64 {
	x, least, most := easiest(branches, want, temperature)
	log, slope := logRate(branches, x, temperature)
	lo, hi := x+(want-log)/most, x+(want-log)/least
	if lo > hi {
		lo, hi = hi, lo
	}
	for range maxStressSteps {
		next := x + (want-log)/slope
		if !(next >= lo && next <= hi) {
			next = lo + 0.5*(hi-lo)
		}
		moved := math.Abs(next - x)
		x = next
		if !(moved > 1e-9*(1+math.Abs(x))) {
			break
		}
		log, slope = logRate(branches, x, temperature)
		if log < want {
			lo = x
		} else {
			hi = x
		}
	}
	return 0.5 * math.Exp(x-want)
}

// easiest returns the stress at which the easiest path alone would give the
// wanted rate, a chain being as hard as its hardest link, and the extremes of
// the exponents.
func easiest(branches []branch, want, temperature float64) (x, least, most float64) {
	x, least, most = math.Inf(1), math.Inf(1), 0
	hardest := math.Inf(-1)
	for _, b := range branches {
		hardest = max(hardest, (want-b.athermal+b.enthalpy/temperature)/b.exponent)
		least, most = min(least, b.exponent), max(most, b.exponent)
		if b.ends {
			x, hardest = min(x, hardest), math.Inf(-1)
		}
	}
	return x, least, most
}

// logRate returns the logarithm of the total strain rate at a logarithm of
// stress, and its slope.
func logRate(branches []branch, logStress, temperature float64) (log, slope float64) {
	log = math.Inf(-1)
	slowness, chain := math.Inf(-1), 0.0
	for _, b := range branches {
		l := b.athermal - b.enthalpy/temperature + b.exponent*logStress
		slowness, chain = logAdd(slowness, chain, -l, b.exponent)
		if b.ends {
			log, slope = logAdd(log, slope, -slowness, chain)
			slowness = math.Inf(-1)
		}
	}
	return log, slope
}

// logAdd returns ln(eᵃ + eᵇ) and the mean of the slopes weighted by the terms.
func logAdd(a, slopeA, b, slopeB float64) (log, slope float64) {
	if b > a {
		a, slopeA, b, slopeB = b, slopeB, a, slopeA
	}
	if math.IsInf(b, -1) {
		return a, slopeA
	}
	small := math.Exp(b - a)
	return a + math.Log1p(small), (slopeA + small*slopeB) / (1 + small)
}
