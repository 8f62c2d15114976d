package multigrid

import (
	"testing"

	"github.com/stretchr/testify/require"
)

func TestJumpsAreFound(t *testing.T) {
	smooth := newProblem(square(32), exponential(1e3)).sv.Finest()
	require.True(t, smooth.jumps.none())
	l := newProblem(square(32), jump(21, 0.5)).sv.Finest()
	for j := 1; j <= 32; j++ {
		require.Equal(t, []int32{15, 16, 17, 18}, l.jumps.row(j))
	}
	require.Equal(t, sharpSweeps, l.jumps.sweeps)
	require.True(t, newProblem(square(32), jump(19, 0.5)).sv.Finest().jumps.none())

	l = newProblem(box{hx: equal(12, 1), hz: equal(12, 1), sides: Wrap}, func(x, z float64) float64 {
		if x < 0.4 && z < 0.4 {
			return 100
		}
		return 1
	}).sv.Finest()
	require.Equal(t, []int32{1, 2, 3, 4, 5, 6, 7, 11, 12}, l.jumps.row(4), "across the seam and the edge")
	require.Equal(t, []int32{1, 2, 3, 4, 5, 6, 7, 11, 12}, l.jumps.row(7))
	require.Empty(t, l.jumps.row(8))

	steep := newProblem(square(32), exponential(1e20)).sv.Finest()
	require.Equal(t, steepSweeps, steep.jumps.sweeps)
}
