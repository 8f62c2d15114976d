package stokes_test

import (
	"context"
	"testing"

	"example.org/overturn/stokes"
	"example.org/overturn/stokes/staggered"
	"github.com/stretchr/testify/require"
)

// The first iteration of multigrid from rest, which is full multigrid, brings
// the error of an isoviscous flow to that of the discretisation: to go on to
// convergence would hardly bring the exact flow nearer. Only beside no-slip
// walls on coarse grids the pressure takes another iteration.
func TestOneIterationReachesTheAccuracyOfDiscretisation(t *testing.T) {
	// Driven by a buoyancy cos πx sin πz alone.
	slip := manufactured{X: wave(pi, 0), Z: wave(pi, 0), PX: series{terms: [][3]float64{{2 * pi * pi, pi, pi / 2}}}, PZ: wave(pi, pi/2)}
	stick := manufactured{X: sine2(pi), Z: sine2(pi), PX: series{terms: [][3]float64{{20, 2, 1}}}, PZ: wave(3, 0.5)}
	around := manufactured{X: wave(2*pi, 0.3), Z: sine2(pi), PX: series{terms: [][3]float64{{20, 2 * pi, 1}}}, PZ: wave(3, 0.5)}
	solid := stokes.Walls{Left: stokes.NoSlip, Right: stokes.NoSlip, Bottom: stokes.NoSlip, Top: stokes.NoSlip}
	layer := stokes.Walls{Left: stokes.Periodic, Right: stokes.Periodic, Bottom: stokes.NoSlip, Top: stokes.NoSlip}
	sizes := []int{32, 64, 100, 128}
	if !testing.Short() {
		sizes = append(sizes, 256)
	}
	for _, tt := range []struct {
		name  string
		flow  manufactured
		walls stokes.Walls
		from  int // least size from which the pressure is as good as the velocity
	}{
		{"free slip", slip, stokes.Walls{}, 32},
		{"no slip", stick, solid, 256},
		{"periodic", around, layer, 64},
	} {
		for _, n := range sizes {
			g := uniform(t, n, n, 1, 1)
			exact, force := tt.flow.exact(g), tt.flow.force(g)
			converged, _ := solve(t, g, tt.walls, nil, force, &stokes.Settings{Method: stokes.Multigrid, Tolerance: 1e-9})
			sv, err := stokes.NewSolver(g, tt.walls, &stokes.Settings{Method: stokes.Multigrid, MaxIterations: 1})
			require.NoError(t, err)
			once := staggered.NewFlow(g)
			_, err = sv.Solve(context.Background(), once, nil, force)
			require.ErrorIs(t, err, stokes.ErrNotConverged)
			v, p := difference(converged, exact)
			v1, p1 := difference(once, exact)
			t.Logf("%s, %d: total error / discretisation error %.2f of velocity, %.2f of pressure", tt.name, n, v1/v, p1/p)
			require.Less(t, v1, 1.05*v, "%s, %d: velocity", tt.name, n)
			if n >= tt.from {
				require.Less(t, p1, 1.2*p, "%s, %d: pressure", tt.name, n)
			}
		}
	}
}
