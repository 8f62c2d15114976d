package channel

import (
	"math"
	"testing"

	"github.com/stretchr/testify/require"
)

// Computed by another program (boundary collocation with Stokeslets; two
// resolutions agreed to 1e-7) for the problem of Faxén (1946).
func TestDragReference(t *testing.T) {
	for ratio, want := range map[float64]float64{0.05: 6.0289355, 0.1: 8.950604, 0.2: 16.532547, 0.4: 52.392843} {
		f, err := Drag(ratio)
		require.NoError(t, err)
		require.InEpsilon(t, want, f, 1e-7, "ratio %g", ratio)
	}
}

// Faxén's series, 4π/(-ln k - 0.9157 + 1.7244k² - 1.7302k⁴ + ...), from memory:
// its constant has four digits.
func TestDragOfThinCylinder(t *testing.T) {
	for _, k := range []float64{1e-6, 1e-3, 1e-2} {
		f, err := Drag(k)
		require.NoError(t, err)
		require.InEpsilon(t, 4*math.Pi/(-math.Log(k)-0.9157+1.7244*k*k), f, 2e-5)
	}
}

// A cylinder that nearly fills the channel pushes the fluid through two gaps of
// width ε + x²/2R: the pressure drop of lubrication theory gives
// F/(μU) → 9√2 π (R/ε)^(5/2), with corrections of order ε.
func TestDragOfFillingCylinder(t *testing.T) {
	excess := func(k float64) float64 {
		f, err := drag(k, maxModes)
		require.NoError(t, err)
		return f/(9*math.Sqrt2*math.Pi*math.Pow(k/(1-k), 2.5)) - 1
	}
	at95, at90 := excess(0.95), excess(0.9)
	require.InDelta(t, 2, at90/at95, 0.25)
	require.Less(t, math.Abs(at95), 0.1)
}

func TestDragIsResolved(t *testing.T) {
	for ratio, tol := range map[float64]float64{0.4: 1e-12, 0.6: 1e-11, MaxRatio: 1e-8} {
		f, err := Drag(ratio)
		require.NoError(t, err)
		coarse, err := drag(ratio, modes-4)
		require.NoError(t, err)
		require.InEpsilon(t, f, coarse, tol, "ratio %g", ratio)
	}
}

func TestDragRefuses(t *testing.T) {
	for _, ratio := range []float64{0, -0.1, 0.91, 1, math.NaN()} {
		f, err := Drag(ratio)
		require.ErrorContains(t, err, "ratio of diameter to wall distance")
		require.True(t, math.IsNaN(f))
	}
}

func BenchmarkDrag(b *testing.B) {
	for b.Loop() {
		if _, err := Drag(0.3); err != nil {
			b.Fatal(err)
		}
	}
}
