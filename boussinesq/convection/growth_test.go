package convection

import (
	"context"
	"math"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"example.org/overturn/heat"
	"example.org/overturn/stokes"
	"example.org/overturn/stokes/staggered"
)

// The growth rates of infinitesimal modes between no-slip walls, and above a
// no-slip and below a free-slip wall, at infinite Prandtl number, computed apart
// by shooting in 50-digit arithmetic. The start is not the mode's own shape: the
// rate is measured once other shapes have decayed.
func TestModesBetweenRigidWallsGrowAsPredicted(t *testing.T) {
	if testing.Short() {
		t.Skip("slow")
	}
	both := stokes.Walls{Bottom: stokes.NoSlip, Top: stokes.NoSlip}
	for _, tt := range []struct {
		walls        stokes.Walls
		ra, k, sigma float64
	}{
		{both, 1000, 3.116, -8.132200857947356},
		{both, 5000, 3.116, 38.02741100720178},
		{both, 10000, 4, 112.8881599804409},
		{stokes.Walls{Bottom: stokes.NoSlip}, 10000, 3.5, 161.0895879114063},
	} {
		g, err := staggered.Uniform(64, 64, math.Pi/tt.k, 1)
		require.NoError(t, err)
		m, err := New(Problem{Grid: g, Rayleigh: tt.ra, Walls: tt.walls, Initial: func(_, z float64) float64 { return 1 - z }},
			&Settings{MaxStep: 0.02 / math.Abs(tt.sigma), Courant: 1, Heat: &heat.Settings{Scheme: heat.Implicit}})
		require.NoError(t, err)
		require.NoError(t, m.Perturb(Mode{Amplitude: 1e-9, Wavenumber: tt.k}))
		var time, speed float64
		for s, err := range m.Steps(context.Background()) {
			require.NoError(t, err)
			if time == 0 && s.Time > 0.06 {
				time, speed = s.Time, s.RMSVelocity
			}
			if time > 0 && s.Time > time+0.5/math.Abs(tt.sigma) {
				assert.InEpsilon(t, tt.sigma, math.Log(s.RMSVelocity/speed)/(s.Time-time), 0.01, "Ra = %v", tt.ra)
				break
			}
		}
	}
}
