package exact

import "math"

const sqrtPi = 1.772453850905516027298167483341145182797549456122387

// similarity returns distance/(2√(κt)), the variable of all that spreads by
// conduction, and 0 at distance 0 whatever the time.
func similarity(distance, kt float64) float64 {
	if distance == 0 {
		return 0
	}
	return distance / (2 * math.Sqrt(kt))
}

// kernel returns exp(−x²)/√(πκt): minus the slope of erfc(x) in the distance
// that x = distance/(2√(κt)) stands for.
func kernel(x, kt float64) float64 {
	if math.IsInf(x, 0) {
		return 0
	}
	return gauss(x) / (sqrtPi * math.Sqrt(kt))
}

// gauss returns exp(−x²) to the last digit or two, where exp(−x*x) alone loses
// x² units of it to the rounding of the square.
func gauss(x float64) float64 {
	if math.Abs(x) > 40 {
		return 0
	}
	square := x * x
	return math.Exp(-square) * (1 - math.FMA(x, x, -square))
}

// scaledErfc returns exp(x²) erfc(x) for x ≥ 0, which neither overflows nor
// underflows.
func scaledErfc(x float64) float64 {
	if x < 26 {
		square := x * x
		return math.Exp(square) * (1 + math.FMA(x, x, -square)) * math.Erfc(x)
	}
	// Asymptotic series 1 − y + 3y² − 15y³ + …, y = 1/2x². From 26 on the
	// term after these is below rounding.
	y := 1 / (2 * x * x)
	return (1 - y*(1-3*y*(1-5*y*(1-7*y*(1-9*y*(1-11*y)))))) / (x * sqrtPi)
}

// erfcTimesExp returns exp(x² − a²) erfc(x), where a² ≤ x² would let the two
// factors overflow and underflow.
func erfcTimesExp(x, a float64) float64 {
	if x < 0 {
		return math.Exp((x-a)*(x+a)) * math.Erfc(x)
	}
	return gauss(a) * scaledErfc(x)
}

// integrals returns the repeated integrals of erfc from x to infinity, once,
// twice and thrice, for x ≥ 0. Their absolute errors are below 1e-16.
func integrals(x float64) (once, twice, thrice float64) {
	if x > 30 {
		return 0, 0, 0
	}
	erfc := math.Erfc(x)
	once = gauss(x)/sqrtPi - x*erfc
	twice = (erfc - 2*x*once) / 4
	thrice = (once - 2*x*twice) / 6
	return once, twice, thrice
}
