package convection_test

import (
	"context"
	"math"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"example.org/overturn/boussinesq/convection"
	"example.org/overturn/heat"
	"example.org/overturn/stokes"
	"example.org/overturn/stokes/staggered"
)

// Fields of our own: T = 1 − z + a cos πx sin πz and the flow with stream
// function sin πx sin πz, whose integrals are known.
func TestDiagnoseOwnFields(t *testing.T) {
	const a = 0.1
	numbers := func(n int) convection.Diagnostics {
		g := grid(t, n, 1)
		temperature, flow := staggered.NewScalar(g), staggered.NewFlow(g)
		temperature.Fill(func(x, z float64) float64 { return 1 - z + a*math.Cos(math.Pi*x)*math.Sin(math.Pi*z) })
		flow.FillFromStream(func(x, z float64) float64 { return math.Sin(math.Pi*x) * math.Sin(math.Pi*z) })
		d, err := convection.Diagnose(context.Background(),
			convection.Problem{Grid: g, Rayleigh: 7, Conductivity: 3}, temperature, flow)
		require.NoError(t, err)
		return d
	}
	pi := math.Pi
	want := convection.Diagnostics{
		NuTop: 1, NuBottom: 1, HeatFlowTop: 3, HeatFlowBottom: 3, MeanTemperature: 0.5,
		// −∂T/∂z = 1 − aπ cos πx cos πz at the corners.
		CornerGradients: [4]float64{1 + a*pi, 1 - a*pi, 1 + a*pi, 1 - a*pi},
		RMSVelocity:     pi / math.Sqrt2, SurfaceVelocity: pi / math.Sqrt2,
		// ∫2η ε:ε = ∫ω² = π⁴ for stress-free walls; ∫Ra T w = −7aπ/4.
		Dissipation: pi * pi * pi * pi, BuoyancyWork: -7 * a * pi / 4,
	}
	coarse, fine := map[string]float64{}, map[string]float64{}
	for name, v := range numbers(32).All() {
		coarse[name] = v
	}
	for name, v := range numbers(64).All() {
		fine[name] = v
	}
	for name, v := range want.All() {
		assert.InDelta(t, v, fine[name], 4e-3*math.Max(1, math.Abs(v)), name)
		if e := math.Abs(coarse[name] - v); e > 1e-9 {
			assert.InDelta(t, 2, math.Log2(e/math.Abs(fine[name]-v)), 0.2, name)
		}
	}
}

func TestDiagnoseFindsTheFlow(t *testing.T) {
	p := convection.Problem{Grid: grid(t, 24, 1), Rayleigh: 1e4}
	sol, err := convection.Steady(context.Background(), p, nil)
	require.NoError(t, err)
	d, err := convection.Diagnose(context.Background(), p, sol.Temperature, nil)
	require.NoError(t, err)
	assert.InEpsilon(t, sol.RMSVelocity, d.RMSVelocity, 1e-6)
	assert.Less(t, d.WorkError(), 1e-6)
}

// The speed along the top is the wall's own where fluid sticks to it.
func TestSurfaceVelocityOfWalls(t *testing.T) {
	p := convection.Problem{Grid: grid(t, 16, 1), Rayleigh: 1e4, Walls: stokes.Walls{Top: stokes.NoSlip}}
	m, err := convection.Conducting(context.Background(), p)
	require.NoError(t, err)
	d, err := convection.Diagnose(context.Background(), p, m, nil)
	require.NoError(t, err)
	assert.Zero(t, d.SurfaceVelocity)
	p.Walls.Top = stokes.NoSlip.Moving(func(x float64) float64 { return 3 * x * (1 - x) })
	d, err = convection.Diagnose(context.Background(), p, m, nil)
	require.NoError(t, err)
	assert.InDelta(t, 3/math.Sqrt(30), d.SurfaceVelocity, 2e-3)
}

func TestHeatFlowOfEquallyWarmWalls(t *testing.T) {
	p := convection.Problem{
		Grid: grid(t, 16, 1), Heating: 2,
		Thermal: &heat.Walls{Bottom: heat.Isothermal(0), Top: heat.Isothermal(0)},
	}
	c, err := convection.Conducting(context.Background(), p)
	require.NoError(t, err)
	d, err := convection.Diagnose(context.Background(), p, c, nil)
	require.NoError(t, err)
	assert.InDelta(t, 1, d.HeatFlowTop, 1e-9)
	assert.InDelta(t, -1, d.HeatFlowBottom, 1e-9)
}

func TestDiagnoseRefusesWhatDoesNotFit(t *testing.T) {
	p := convection.Problem{Grid: grid(t, 8, 1)}
	fit := staggered.NewScalar(p.Grid)
	_, err := convection.Diagnose(context.Background(), p, staggered.NewScalar(grid(t, 9, 1)), nil)
	assert.ErrorContains(t, err, "temperature lives on 9x9 cells")
	_, err = convection.Diagnose(context.Background(), p, fit, staggered.NewFlow(grid(t, 9, 1)))
	assert.ErrorContains(t, err, "flow lives on another grid")
	short := staggered.NewFlow(p.Grid)
	short.VZ = short.VZ[1:]
	_, err = convection.Diagnose(context.Background(), p, fit, short)
	assert.ErrorContains(t, err, "flow: staggered: z holds 71 numbers")
	bad := staggered.NewFlow(p.Grid)
	bad.P[3] = math.NaN()
	_, err = convection.Diagnose(context.Background(), p, fit, bad)
	assert.ErrorContains(t, err, "NaN")
	_, err = convection.Diagnose(context.Background(), convection.Problem{}, fit, nil)
	assert.ErrorContains(t, err, "Grid is nil")
}

// A box that no wall ties to a temperature has no one steady state.
func TestSteadyOfUndeterminedBoxes(t *testing.T) {
	_, err := convection.Steady(context.Background(), convection.Problem{
		Grid: grid(t, 8, 1), Rayleigh: 1e4, Thermal: &heat.Walls{},
		Initial: func(x, z float64) float64 { return x * z },
	}, nil)
	assert.ErrorIs(t, err, heat.ErrSingular)
}
