package multigrid

import (
	"testing"

	"github.com/stretchr/testify/require"
)

func TestAxis(t *testing.T) {
	a := NewAxis([]float64{1, 2, 5}, Slip, Stick)
	require.Equal(t, []float64{1, 1, 2, 5, 5}, a.H)
	require.Equal(t, []float64{0.5, 0.5, 1.5, 3.5, 2.5}, a.D, "half cells at walls")
	require.Equal(t, 2, a.firstFree())
	a = NewAxis([]float64{1, 2, 5}, Wrap, Wrap)
	require.Equal(t, []float64{5, 1, 2, 5, 1}, a.H)
	require.Equal(t, []float64{3, 3, 1.5, 3.5, 3}, a.D)
	require.Equal(t, 1, a.firstFree())
	for i := range a.H {
		require.InDelta(t, 1, a.H[i]*a.RH[i], 1e-15)
		require.InDelta(t, 1, a.D[i]*a.RD[i], 1e-15)
	}
}

func TestShearVanishesOnFreeSlipWalls(t *testing.T) {
	l := newProblem(box{hx: equal(4, 1), hz: equal(3, 1), bot: Stick}, func(x, z float64) float64 { return 3 }).sv.Finest()
	want := [][]float64{{0, 3, 3, 3, 0}, {0, 3, 3, 3, 0}, {0, 3, 3, 3, 0}, {0, 0, 0, 0, 0}}
	for j := 1; j <= 4; j++ {
		for i := 1; i <= 5; i++ {
			require.InDelta(t, want[j-1][i-1], l.Shear(i, j), 1e-15, "corner %d, %d", i, j)
		}
	}
}
