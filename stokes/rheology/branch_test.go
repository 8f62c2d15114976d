package rheology

import (
	"math"
	"math/rand/v2"
	"testing"
)

// bisected finds the viscosity at a logarithm of strain rate the slow way.
func bisected(branches []branch, want float64) float64 {
	lo, hi := -1e4, 1e4
	for range 100 {
		middle := 0.5 * (lo + hi)
		if log, _ := logRate(branches, middle, 1); log < want {
			lo = middle
		} else {
			hi = middle
		}
	}
	return 0.5 * math.Exp(lo-want)
}

func TestSearchAgreesWithBisection(t *testing.T) {
	random := rand.New(rand.NewPCG(1, 2))
	for range 2000 {
		branches := make([]branch, 2+random.IntN(4))
		for i := range branches {
			branches[i] = branch{
				athermal: 10 * random.NormFloat64(),
				exponent: math.Exp(1.2 * random.NormFloat64()),
				ends:     i == len(branches)-1 || random.IntN(2) == 0,
			}
		}
		want := 10 * random.NormFloat64()
		near(t, bisected(branches, want), atStrainRate(branches, want, 1), 1e-11, "viscosity")
	}
}

// Newton's method alone goes round in a circle between the steep and the flat
// mechanism of this chain.
func TestSearchSurvivesWhereNewtonCycles(t *testing.T) {
	branches := []branch{
		{athermal: 0, exponent: 1.0 / 16, ends: true},
		{athermal: 1, exponent: 0.5},
		{athermal: 9, exponent: 32, ends: true},
	}
	const want = 1
	near(t, bisected(branches, want), atStrainRate(branches, want, 1), 1e-11, "viscosity")

	x, _, _ := easiest(branches, want, 1)
	for range 60 {
		log, slope := logRate(branches, x, 1)
		x += (want - log) / slope
	}
	if log, _ := logRate(branches, x, 1); math.Abs(log-want) < 0.1 {
		t.Error("Newton's method alone converges: the case no longer tests the safeguard")
	}
}
