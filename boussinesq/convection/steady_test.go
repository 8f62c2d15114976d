package convection

import (
	"context"
	"math"
	"testing"
	"time"

	"github.com/stretchr/testify/require"

	"example.org/overturn/stokes/rheology"
	"example.org/overturn/stokes/staggered"
)

func TestScratchSteady(t *testing.T) {
	for _, c := range []struct {
		ra  float64
		law rheology.Law
	}{{1e3, nil}, {1e4, nil}, {1e5, nil}, {1e6, nil}, {1e4, rheology.FrankKamenetskii{ThermalExponent: math.Log(1000)}}} {
		gr := staggered.Grading{Left: 4, Right: 4, Bottom: 4, Top: 4}
		g, err := staggered.Graded(96, 96, 1, 1, gr)
		require.NoError(t, err)
		start := time.Now()
		sol, err := Steady(context.Background(), Problem{Grid: g, Rayleigh: c.ra, Viscosity: c.law},
			&SteadySettings{Monitor: func(p SteadyProgress) {
				t.Logf("%v %d %d %d %g", time.Since(start), p.Grid.NX(), p.Newton, p.Krylov, p.Residual)
			}})
		t.Log(sol, sol.CornerGradients)
		require.NoError(t, err)
	}
}
