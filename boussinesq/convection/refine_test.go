package convection

import (
	"context"
	"math"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"example.org/overturn/heat"
	"example.org/overturn/stokes/staggered"
)

// Between walls of one temperature there is no Nusselt number, not even one
// made of rounding, and everything else is estimated all the same.
func TestHeatedLayerBetweenEqualWalls(t *testing.T) {
	for _, wall := range []float64{0, 3, 271.3} {
		p := Problem{
			Grid: square(t, 24), Rayleigh: 1e5, Heating: 1,
			Thermal: &heat.Walls{Bottom: heat.Isothermal(wall), Top: heat.Isothermal(wall)},
		}
		study, err := Refine(context.Background(), p, 2, nil)
		require.NoError(t, err)
		for _, sol := range study.Solutions {
			assert.True(t, math.IsInf(sol.NuTop, 1), "%v", sol.NuTop)
			assert.True(t, math.IsInf(sol.NuBottom, -1), "%v", sol.NuBottom)
		}
		nu, ok := study.Get("NuTop")
		assert.True(t, ok)
		assert.True(t, math.IsNaN(nu.Value) && math.IsNaN(nu.Uncertainty) && math.IsNaN(nu.Order))
		assert.True(t, math.IsInf(nu.Finest, 1))
		v, ok := study.Get("RMSVelocity")
		assert.True(t, ok)
		assert.Greater(t, v.Value, 10*v.Uncertainty)
	}
}

// The zero of temperature is nobody's business, not even of the error bars.
func TestUncertaintyKnowsNoZeroOfTemperature(t *testing.T) {
	g, err := staggered.Graded(32, 32, 1, 1, staggered.Grading{Left: 4, Right: 4, Bottom: 4, Top: 4})
	require.NoError(t, err)
	at := func(offset float64) *Study {
		study, err := Refine(context.Background(), Problem{
			Grid: g, Rayleigh: 1e4,
			Thermal: &heat.Walls{Bottom: heat.Isothermal(1 + offset), Top: heat.Isothermal(offset)},
		}, 3, nil)
		require.NoError(t, err)
		return study
	}
	a, b := at(0), at(-0.5)
	assert.InEpsilon(t, a.Deviation, b.Deviation, 1e-3)
	for _, name := range []string{"NuTop", "RMSVelocity", "Dissipation"} {
		x, _ := a.Get(name)
		y, _ := b.Get(name)
		assert.InEpsilon(t, x.Uncertainty, y.Uncertainty, 1e-2, name)
	}
}

// studyOf is a study of made-up diagnostics on cells of size 1/8, 1/16, 1/32.
func studyOf(t *testing.T, of func(h float64) Diagnostics) *Study {
	t.Helper()
	study := &Study{}
	for _, n := range []int{8, 16, 32} {
		study.Solutions = append(study.Solutions,
			&Solution{Diagnostics: of(1 / float64(n)), Temperature: staggered.NewScalar(square(t, n))})
	}
	require.NoError(t, study.estimate(1))
	return study
}

func TestStudyEstimatesEachDiagnosticOnce(t *testing.T) {
	study := studyOf(t, func(h float64) Diagnostics {
		// The second is settled on the two finest grids, all others are zero.
		return Diagnostics{NuTop: 3 + 2*h*h, SurfaceVelocity: 7 + max(0, h-1.0/16)}
	})
	var names []string
	for name := range (Diagnostics{}).All() {
		names = append(names, name)
	}
	for i, e := range study.Estimates {
		require.Less(t, i, len(names))
		assert.Equal(t, names[i], e.Name)
	}
	assert.Len(t, study.Estimates, len(names))
	assert.InDelta(t, 0, study.Deviation, 1e-9, "what does not change has no order")
	nu, _ := study.Get("NuTop")
	assert.InDelta(t, 3, nu.Value, 1e-12)
	assert.InEpsilon(t, 0.02*2/1024, nu.Uncertainty, 1e-6)
}

// One diagnostic of order 1.6 puts the error bars of all in doubt.
func TestWorstDiagnosticCountsForAll(t *testing.T) {
	study := studyOf(t, func(h float64) Diagnostics {
		return Diagnostics{NuTop: 3 + 2*h*h, RMSVelocity: 5 + math.Pow(h, 1.6)}
	})
	assert.InDelta(t, 0.4, study.Deviation, 1e-9)
	nu, _ := study.Get("NuTop")
	assert.InEpsilon(t, 3*0.16*2/1024, nu.Uncertainty, 1e-6)
	study = studyOf(t, func(h float64) Diagnostics {
		return Diagnostics{NuTop: 3 + 2*h*h, RMSVelocity: 5 + math.Cos(16*math.Pi*h)}
	})
	assert.Equal(t, 1.0, study.Deviation, "one that does not converge")
}

func TestStudyWithoutGrid(t *testing.T) {
	_, err := Refine(context.Background(), Problem{}, 2, nil)
	assert.ErrorContains(t, err, "Grid is nil")
}

// Boundary layers of fewer than three cells on the coarsest grid: whatever the
// orders are, nothing is known.
func TestUnresolvedBoundaryLayersAreDistrusted(t *testing.T) {
	for flux, want := range map[float64]float64{2: 0, 1.2: 0, 1.4: 1, 4: 1} {
		study := &Study{}
		for _, n := range []int{8, 16, 32} {
			temperature := staggered.NewScalar(square(t, n))
			temperature.Values[0] = 1
			h := 1 / float64(n)
			study.Solutions = append(study.Solutions, &Solution{
				Diagnostics: Diagnostics{NuTop: 3 + h*h, HeatFlowTop: flux}, Temperature: temperature,
			})
		}
		// A layer of half the range over the gradient flux/k, in cells of 1/8.
		conductivity := 1.0
		if flux == 2 {
			conductivity = 2
		}
		require.NoError(t, study.estimate(conductivity))
		assert.InDelta(t, want, study.Deviation, 1e-9, "flux %v", flux)
	}
}
