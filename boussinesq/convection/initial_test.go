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

func TestConductingState(t *testing.T) {
	g := square(t, 8)
	c, err := Conducting(context.Background(), Problem{Grid: g, Rayleigh: 1e9})
	require.NoError(t, err)
	for k, z := range g.ZCentres() {
		assert.InDelta(t, 1-z, c.At(3, k), 1e-12)
	}
	// Heated from within above an insulating bottom: (1 − z²)/2, to which the
	// cells add the error of a parabola, h²/8 everywhere but at the walls.
	c, err = Conducting(context.Background(), Problem{Grid: g, Heating: 1, Thermal: &heat.Walls{Top: heat.Isothermal(0)}})
	require.NoError(t, err)
	for k, z := range g.ZCentres() {
		assert.InDelta(t, 0.5*(1-z*z), c.At(0, k), 1.0/64/4)
	}
}

func TestModeIsAdded(t *testing.T) {
	g, err := staggered.NewGrid([]float64{1, 2, 3, 4}, []float64{-1, 0, 1})
	require.NoError(t, err)
	m, err := New(Problem{Grid: g, Initial: func(_, _ float64) float64 { return 7 }}, nil)
	require.NoError(t, err)
	require.NoError(t, m.Perturb(Mode{Amplitude: 2, Wavenumber: 0.3, Shape: func(z float64) float64 { return z * z }}))
	for k, z := range []float64{0.5, 1.5} {
		for i, x := range []float64{0.5, 1.5, 2.5} {
			assert.InDelta(t, 7+2*math.Cos(0.3*x)*z*z, m.Temperature().At(i, k), 1e-14)
		}
	}
	assert.ErrorContains(t, m.Perturb(Mode{Amplitude: math.NaN()}), "Mode.Amplitude is NaN")
	assert.ErrorContains(t, m.Perturb(Mode{Amplitude: 1, Wavenumber: math.Inf(1)}), "Mode.Wavenumber is +Inf")
	before := m.Temperature().Clone()
	assert.Error(t, m.Perturb(Mode{Amplitude: 1, Shape: func(float64) float64 { return math.NaN() }}))
	assert.Equal(t, before.Values, m.Temperature().Values, "nothing is lost")
}

// Rolls about as wide as the layer is deep: half waves between walls, whole
// waves on a ring.
func TestDefaultWavenumbers(t *testing.T) {
	for _, tt := range []struct {
		width  float64
		sides  stokes.Wall
		halves float64
	}{
		{1, stokes.FreeSlip, 1},
		{0.3, stokes.FreeSlip, 1},
		{2.6, stokes.FreeSlip, 3},
		{4, stokes.Periodic, 4},
		{0.5, stokes.Periodic, 2},
		{5, stokes.Periodic, 6},
	} {
		g, err := staggered.Uniform(8, 8, tt.width, 1)
		require.NoError(t, err)
		p, err := Problem{Grid: g, Walls: stokes.Walls{Left: tt.sides, Right: tt.sides}}.withDefaults()
		require.NoError(t, err)
		conducting := staggered.NewScalar(g)
		conducting.Fill(func(_, z float64) float64 { return 3 - 2*z })
		d, err := Mode{}.resolve(&p, conducting)
		require.NoError(t, err)
		assert.InEpsilon(t, tt.halves*math.Pi/tt.width, d.Wavenumber, 1e-14, "%v", tt)
		assert.InDelta(t, 0.05*2*7/8, d.Amplitude, 1e-14)
		assert.InDelta(t, 1, d.Shape(0.5), 1e-15)
	}
}

func TestSetTemperature(t *testing.T) {
	m, err := New(Problem{Grid: square(t, 16), Rayleigh: 1e4}, &Settings{MaxSteps: 3})
	require.NoError(t, err)
	_, err = m.Run(context.Background())
	require.NoError(t, err)
	f := func(x, z float64) float64 { return 1 - z + 0.1*x }
	coarse := staggered.NewScalar(square(t, 5))
	coarse.Fill(f)
	require.NoError(t, m.SetTemperature(coarse))
	assert.InDelta(t, f(m.sys.Grid.XCentres()[2], m.sys.Grid.ZCentres()[11]), m.Temperature().At(2, 11), 1e-14)
	assert.False(t, m.solved || m.hasPrevious)

	wide, err := staggered.Uniform(4, 4, 2, 1)
	require.NoError(t, err)
	assert.ErrorContains(t, m.SetTemperature(staggered.NewScalar(wide)), "box of 2x1, want 1x1")
	coarse.Values[7] = math.NaN()
	assert.ErrorContains(t, m.SetTemperature(coarse), "cell (2, 1) is NaN")
}

// A ring of fluid turns with its rolls: a shifted start gives the shifted run.
func TestPeriodicSidesKnowNoOrigin(t *testing.T) {
	g, err := staggered.Uniform(32, 16, 2, 1)
	require.NoError(t, err)
	at := func(shift float64) *Model {
		return run(t, Problem{
			Grid: g, Rayleigh: 1e4, Walls: stokes.Walls{Left: stokes.Periodic, Right: stokes.Periodic, Bottom: stokes.NoSlip},
			Initial: func(x, z float64) float64 {
				x -= shift
				return 1 - z + 0.1*math.Sin(math.Pi*z)*(math.Cos(math.Pi*x)+0.4*math.Sin(2*math.Pi*x))
			},
		}, &Settings{MaxSteps: 30, Stokes: &stokes.Settings{Tolerance: 1e-11}})
	}
	a, b := at(0), at(5*2.0/32)
	for k := range 16 {
		for i := range 32 {
			assert.InDelta(t, a.Temperature().At(i, k), b.Temperature().At((i+5)%32, k), 1e-9)
		}
	}
}

func TestFieldsThatDoNotFitAreErrors(t *testing.T) {
	g := square(t, 8)
	wide, err := staggered.Uniform(8, 8, 2, 1)
	require.NoError(t, err)
	m, err := New(Problem{Grid: g}, nil)
	require.NoError(t, err)
	for want, field := range map[string]*staggered.Scalar{
		"has no grid":                    {},
		"holds 5 values, want 64":        {Grid: g, Values: make([]float64, 5)},
		"a box of 2x1, want 1x1":         staggered.NewScalar(wide),
		"cell (1, 0) is NaN, want a fin": {Grid: g, Values: append([]float64{0, math.NaN()}, make([]float64, 62)...)},
	} {
		assert.ErrorContains(t, m.SetTemperature(field), "convection: temperature")
		assert.ErrorContains(t, m.SetTemperature(field), want)
		_, err = Steady(context.Background(), Problem{Grid: g}, &SteadySettings{Guess: field})
		assert.ErrorContains(t, err, "convection: SteadySettings.Guess")
		assert.ErrorContains(t, err, want)
	}
	assert.ErrorContains(t, m.SetTemperature(nil), "has no grid")
}
