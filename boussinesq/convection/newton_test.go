package convection

import (
	"context"
	"math"
	"slices"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// brittle is a law that has no viscosity for temperatures beyond 2.
type brittle struct{}

func (brittle) ViscosityTo(dst, temperature []float64, _ float64) {
	for i, t := range temperature {
		dst[i] = 1
		if t > 2 {
			dst[i] = math.NaN()
		}
	}
}

// A trial that is turned down, for its residual or for want of a flow, leaves
// temperature, flow and rate as they were: shorter steps and the way back to
// steps in time start from them.
func TestRejectedTrialsLeaveNoTrace(t *testing.T) {
	p := Problem{Grid: square(t, 8), Rayleigh: 1e4, Viscosity: brittle{}}
	settings, err := (*SteadySettings)(nil).withDefaults()
	require.NoError(t, err)
	sys, err := newSystem(p, Settings{Stokes: settings.Stokes})
	require.NoError(t, err)
	n, err := newNewton(sys, settings)
	require.NoError(t, err)
	n.temperature, err = sys.start(context.Background())
	require.NoError(t, err)
	require.NoError(t, n.evaluate(context.Background(), n.temperature, n.flow))
	temperature, rate, flow := slices.Clone(n.temperature.Values), slices.Clone(n.rate.Values), n.flow.Clone()

	for change, bound := range map[float64]float64{0.1: 0, 5: math.Inf(1)} {
		n.step.SetAll(change)
		n.step.Values[3] = -change
		accepted, err := n.try(context.Background(), 1, bound)
		require.NoError(t, err)
		assert.False(t, accepted)
		assert.Equal(t, temperature, n.temperature.Values)
		assert.Equal(t, rate, n.rate.Values)
		assert.Equal(t, flow.VX, n.flow.VX)
	}
	accepted, err := n.try(context.Background(), 0.01, math.Inf(1))
	require.NoError(t, err)
	assert.True(t, accepted)
	assert.InDelta(t, temperature[0]+0.05, n.temperature.Values[0], 0.1)
	assert.NotEqual(t, rate, n.rate.Values)
}
