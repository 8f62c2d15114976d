package stokes_test

import (
	"context"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"example.org/overturn/stokes"
	"example.org/overturn/stokes/staggered"
)

// A force whose square overflows has no norm: an error, not a fluid at rest.
func TestOverflowIsAnError(t *testing.T) {
	g, err := staggered.Uniform(8, 8, 1, 1)
	require.NoError(t, err)
	for _, method := range []stokes.Method{stokes.Multigrid, stokes.Transform} {
		sv, err := stokes.NewSolver(g, stokes.Walls{}, &stokes.Settings{Method: method})
		require.NoError(t, err)
		force, flow := staggered.NewVector(g), staggered.NewFlow(g)
		for size, wrong := range map[float64]bool{1e120: false, 1e200: true, 1e300: true} {
			force.Fill(nil, func(x, _ float64) float64 { return size * (x - 0.5) })
			_, err = sv.Solve(context.Background(), flow, nil, force)
			if wrong {
				assert.ErrorContains(t, err, "overflow")
				continue
			}
			require.NoError(t, err)
			assert.Positive(t, flow.RMS())
		}
	}
}
