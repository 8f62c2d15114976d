package rolls

import (
	"math"
	"testing"

	"github.com/stretchr/testify/require"
)

// Values to 12 digits: an Abel integral equation, solved by spectral
// collocation with 30 digits by another program than this one.
func TestHeatExchangeReference(t *testing.T) {
	for r, want := range map[float64]float64{
		0.5: 0.78884900451571,
		1:   0.7534091303404,
		2:   0.71387174478722,
		100: 0.58662110569542,
	} {
		q, err := HeatExchange(r)
		require.NoError(t, err)
		require.InEpsilon(t, want, q, 1e-13, "r = %g", r)
	}
}

func TestHeatExchangeLimits(t *testing.T) {
	q, err := HeatExchange(math.Inf(1))
	require.NoError(t, err)
	require.Equal(t, 1/math.Sqrt(math.Pi), q)

	// Far plumes: the memory is the first term of the series, of order r^(-1/2).
	big, err := HeatExchange(1e10)
	require.NoError(t, err)
	require.InDelta(t, q, big, 1e-5)
	require.Greater(t, big, q)

	// No plume: heat alternates between the plates, Q = 4η(-1/2)/√π. The
	// approach is linear in r, so extrapolate from two small values.
	const eta = 0.380104812609684 // η(-1/2) = (1-2√2) ζ(-1/2)
	q1, err := HeatExchange(0.005)
	require.NoError(t, err)
	q2, err := HeatExchange(0.01)
	require.NoError(t, err)
	require.InDelta(t, 4*eta/math.Sqrt(math.Pi), 2*q1-q2, 1e-4)
}

func TestHeatExchangeFallsWithPlumeLength(t *testing.T) {
	prev := math.Inf(1)
	for r := MinPlumeRatio; r < 1e6; r *= 1.7 {
		q, err := HeatExchange(r)
		require.NoError(t, err)
		require.Less(t, q, prev)
		prev = q
	}
}

func TestHeatExchangeRefuses(t *testing.T) {
	for _, r := range []float64{0, -1, 1e-4, math.NaN()} {
		q, err := HeatExchange(r)
		require.ErrorContains(t, err, "plume ratio")
		require.True(t, math.IsNaN(q))
	}
}

// Σ_{m≥1} (-1)^m/√m = -η(1/2).
func TestMemoryIsDirichletEta(t *testing.T) {
	require.InEpsilon(t, -0.604898643421630370, memory(0, 1), 1e-15)
	// The sum from m = 2 on is minus the sum shifted by one period.
	require.InEpsilon(t, memory(0.3, 2)+1/math.Sqrt(2.3), -memory(2.3, 2), 1e-14)
}

func BenchmarkHeatExchange(b *testing.B) {
	for b.Loop() {
		if _, err := HeatExchange(1); err != nil {
			b.Fatal(err)
		}
	}
}
