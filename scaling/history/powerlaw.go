package history

import (
	"math"

	"example.org/overturn/scaling/internal/check"
)

// PowerLawCooling returns the temperature of a body without heating and of
// constant viscosity, dT/dt = -T^(1+β), from T(0) = start, in scaled numbers:
//
//	T = T₀ (1 + β T₀^β t)^(-1/β)
//
// exp(-t) T₀ for β = 0. It is what a numerical history must reproduce.
func PowerLawCooling(start, beta, t float64) (float64, error) {
	if err := check.First(check.Positive(pkg, "start", start), check.Finite(pkg, "beta", beta), check.Finite(pkg, "time", t)); err != nil {
		return 0, err
	}
	if beta == 0 {
		return check.Result(pkg, "temperature", start*math.Exp(-t))
	}
	base := beta * math.Pow(start, beta) * t
	if !(base > -1) {
		return 0, &FieldError{Package: string(pkg), Field: "time", Value: "beyond the run", Want: "β T₀^β t > -1"}
	}
	return check.Result(pkg, "temperature", start*math.Exp(-math.Log1p(base)/beta))
}
