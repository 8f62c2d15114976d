package anderson

import (
	"math"
	"testing"

	"github.com/stretchr/testify/require"
	"gonum.org/v1/gonum/floats"
)

// slow is x ← x + f(x) that contracts towards 1/(j+1) at a rate of its own in
// each unknown, or even diverges.
func slow(rates []float64, bend float64) func(f, x []float64) {
	return func(f, x []float64) {
		for j, rate := range rates {
			d := 1/float64(j+1) - x[j]
			f[j] = (1-rate)*d + bend*d*d
		}
	}
}

func iterations(residual func(f, x []float64), n, depth int) int {
	x, f := make([]float64, n), make([]float64, n)
	m := NewMixer(n, depth)
	for it := range 500 {
		residual(f, x)
		if floats.Norm(f, math.Inf(1)) < 1e-11 {
			return it
		}
		m.Next(x, f)
	}
	return 500
}

// A linear iteration with as many rates as differences are remembered ends after
// one more step than there are rates, even if it diverges by itself.
func TestEndsLikeKrylov(t *testing.T) {
	rates := []float64{0.99, 0.5, -0.9, -3}
	require.Equal(t, 500, iterations(slow(rates, 0), 4, 0), "without memory it must not converge")
	require.LessOrEqual(t, iterations(slow(rates, 0), 4, 4), 6)
	require.LessOrEqual(t, iterations(slow(rates, 0), 4, 9), 6)
}

func TestHelpsNonlinear(t *testing.T) {
	rates := []float64{0.97, 0.95, 0.3, -0.96, 0.9, -0.2}
	plain, mixed := iterations(slow(rates, 0.02), 6, 0), iterations(slow(rates, 0.02), 6, 5)
	require.Less(t, mixed, 40)
	require.Greater(t, plain, 4*mixed)
}

func TestResetForgets(t *testing.T) {
	m := NewMixer(1, 2)
	x := []float64{3}
	m.Next(x, []float64{1})
	m.Next(x, []float64{0.5})
	m.Reset()
	x[0] = 7
	m.Next(x, []float64{2})
	require.Equal(t, 9.0, x[0])
}
