package root

import (
	"math"
	"testing"

	"github.com/stretchr/testify/require"
)

func TestFindReachesRoundOff(t *testing.T) {
	tests := []struct {
		name string
		f    func(float64) float64
		a, b float64
		want float64
	}{
		{"cosine", math.Cos, 0, 3, math.Pi / 2},
		{"cosine, ends exchanged", math.Cos, 3, 0, math.Pi / 2},
		{"cube root of 2", func(x float64) float64 { return x*x*x - 2 }, 0, 2, math.Cbrt(2)},
		{"flat triple root", func(x float64) float64 { return (x - 1) * (x - 1) * (x - 1) }, 0, 3, 1},
		{"steep", func(x float64) float64 { return math.Tanh(1e6 * (x - 0.3)) }, 0, 1, 0.3},
		{"root at the left end", func(x float64) float64 { return x - 2 }, 2, 5, 2},
		{"root at the right end", func(x float64) float64 { return x - 5 }, 2, 5, 5},
		{"far from one", func(x float64) float64 { return x - 3e17 }, 0, 1e18, 3e17},
	}
	for _, tt := range tests {
		t.Run(tt.name, func(t *testing.T) {
			x, err := Find(tt.f, tt.a, tt.b, 0)
			require.NoError(t, err)
			require.InEpsilon(t, tt.want, x, 1e-15)
		})
	}
}

// The number of calls is what the method needs; a fault in one of its steps
// still finds the root, but later. (One call more is allowed for another
// processor's rounding.)
func TestFindIsFast(t *testing.T) {
	tests := []struct {
		name      string
		f         func(float64) float64
		a, b, tol float64
		calls     int
	}{
		{"exponential", func(x float64) float64 { return math.Exp(x) - 5 }, 0, 10, 0, 13},
		{"cosine", math.Cos, 0, 3, 0, 8},
		{"cosine backward", math.Cos, 3, 0, 0, 8},
		{"cosine, roughly", math.Cos, 0, 3, 1e-3, 6},
		{"cube", func(x float64) float64 { return x*x*x - 2 }, 0, 2, 0, 9},
		{"flat", func(x float64) float64 { return math.Pow(x, 19) - 1e-3 }, 0, 1, 0, 15},
		{"step", func(x float64) float64 { return math.Tanh(1e6 * (x - 0.3)) }, 0, 1, 0, 25},
		{"pole", func(x float64) float64 { return 1/x - 1e3 }, 1e-6, 1, 0, 18},
		{"decades", func(x float64) float64 { return math.Log(x / 3e17) }, 1, 1e18, 0, 11},
		{"triple root", func(x float64) float64 { return (x - 1) * (x - 1) * (x - 1) }, 0, 3, 0, 156},
	}
	for _, tt := range tests {
		calls := 0
		_, err := Find(func(x float64) float64 { calls++; return tt.f(x) }, tt.a, tt.b, tt.tol)
		require.NoError(t, err)
		require.InDelta(t, tt.calls, calls, 1, tt.name)
	}
}

func TestFindToleranceSavesCalls(t *testing.T) {
	count := func(tol float64) (x float64, calls int) {
		x, err := Find(func(x float64) float64 { calls++; return math.Cos(x) - x }, 0, 1, tol)
		require.NoError(t, err)
		return x, calls
	}
	x, rough := count(1e-3)
	require.InDelta(t, 0.7390851332151607, x, 1e-3) // cos x = x
	_, fine := count(0)
	require.Less(t, rough, fine)
}

func TestFindRefuses(t *testing.T) {
	_, err := Find(math.Exp, 0, 1, 0)
	require.ErrorIs(t, err, ErrNoBracket)
	_, err = Find(math.Sqrt, -1, 1, 0)
	require.ErrorIs(t, err, ErrNoBracket)
	_, err = Find(func(x float64) float64 {
		if x > 0.1 && x < 0.9 {
			return math.NaN()
		}
		return x - 0.5
	}, 0, 1, 0)
	require.ErrorContains(t, err, "NaN at 0.5")
}
