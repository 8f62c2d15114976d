package convection

import (
	"context"
	"testing"

	"github.com/stretchr/testify/require"

	"example.org/overturn/stokes/staggered"
)

func TestScratch(t *testing.T) {
	g, err := staggered.Uniform(32, 32, 1, 1)
	require.NoError(t, err)
	m, err := New(Problem{Grid: g, Rayleigh: 1e4}, &Settings{EndTime: 0.5, Every: 200, SteadyTolerance: 1e-6})
	require.NoError(t, err)
	for s, err := range m.Steps(context.Background()) {
		require.NoError(t, err)
		t.Log(s, s.WorkError(), s.HeatBudgetError, s.CornerGradients, s.StokesIterations, s.Stop)
	}
}
