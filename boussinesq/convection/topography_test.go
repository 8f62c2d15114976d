package convection_test

import (
	"context"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"example.org/overturn/boussinesq/convection"
	"example.org/overturn/stokes"
	"example.org/overturn/stokes/staggered"
)

// The normal stress on the top of case 1a of Blankenbach et al. (1989) above the
// upwelling and above the downwelling, less its mean: 901.6092342823 and
// −1161.291541325, computed by an independent hp-Galerkin code.
func TestWallStressOfConvection(t *testing.T) {
	if testing.Short() {
		t.Skip("slow")
	}
	var h, left, right []float64
	for _, n := range []int{48, 96, 192} {
		g, err := staggered.Graded(n, n, 1, 1, staggered.Grading{Left: 4, Right: 4, Bottom: 4, Top: 4})
		require.NoError(t, err)
		sol, err := convection.Steady(context.Background(), convection.Problem{Grid: g, Rayleigh: 1e4}, nil)
		require.NoError(t, err)
		sv, err := stokes.NewSolver(g, stokes.Walls{}, nil)
		require.NoError(t, err)
		stress, err := sv.NormalStressTo(nil, staggered.Top, sol.Flow, nil)
		require.NoError(t, err)
		mean := 0.0
		for i, s := range stress {
			mean += s * g.DX()[i]
		}
		// Even about the sides: the parabola through the nearest two faces. The
		// grid is symmetric.
		a, b := g.XCentres()[0], g.XCentres()[1]
		corner := func(near, next float64) float64 { return mean - (b*b*near-a*a*next)/(b*b-a*a) }
		h = append(h, 1/float64(n))
		left = append(left, corner(stress[0], stress[1]))
		right = append(right, corner(stress[n-1], stress[n-2]))
	}
	for _, tt := range []struct {
		values []float64
		want   float64
	}{{left, 901.6092342823}, {right, -1161.291541325}} {
		e, err := convection.Extrapolate(h, tt.values)
		require.NoError(t, err)
		assert.InDelta(t, 2, e.Order, 0.2)
		assert.InEpsilon(t, tt.want, e.Value, 1e-4, "%v", e)
	}
}
