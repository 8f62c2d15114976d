package convection

import (
	"bytes"
	"context"
	"errors"
	"fmt"
	"math"
	"runtime"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"example.org/overturn/heat"
	"example.org/overturn/stokes"
	"example.org/overturn/stokes/rheology"
	"example.org/overturn/stokes/staggered"
)

func square(t testing.TB, n int) *staggered.Grid {
	t.Helper()
	g, err := staggered.Uniform(n, n, 1, 1)
	require.NoError(t, err)
	return g
}

// variable is a problem in which everything matters: a viscosity of
// temperature and depth, heating, and a start without symmetry.
func variable(g *staggered.Grid) Problem {
	return Problem{
		Grid: g, Rayleigh: 3e4, Heating: 2,
		Viscosity: rheology.FrankKamenetskii{ThermalExponent: 2, DepthExponent: 1},
		Walls:     stokes.Walls{Bottom: stokes.NoSlip},
		Initial: func(x, z float64) float64 {
			return 1 - z + 0.1*math.Sin(math.Pi*z)*(math.Cos(math.Pi*x)+0.5*math.Cos(2*math.Pi*x))
		},
	}
}

func run(t testing.TB, p Problem, s *Settings) *Model {
	t.Helper()
	m, err := New(p, s)
	require.NoError(t, err)
	_, err = m.Run(context.Background())
	require.NoError(t, err)
	return m
}

// difference returns the root mean square of a − b.
func difference(a, b *staggered.Scalar) float64 {
	d := a.Clone()
	for j, v := range b.Values {
		d.Values[j] -= v
	}
	return d.RMS()
}

// The steps are short enough that neither stability nor Settings.FlowError nor
// the growth of the first few shortens them further: all are equal.
func TestStepsAreSecondOrderInTime(t *testing.T) {
	if testing.Short() {
		t.Skip("slow")
	}
	for _, tt := range []struct {
		scheme heat.Scheme
		steps  int
	}{{heat.RungeKutta3, 160}, {heat.Implicit, 320}} {
		g := square(t, 12)
		at := func(steps int) *staggered.Scalar {
			end := 0.02
			m := run(t, variable(g), &Settings{
				EndTime: end, MaxStep: end / float64(steps) * (1 + 1e-9), FlowError: 1e9, Courant: 1,
				Heat: &heat.Settings{Scheme: tt.scheme}, Stokes: &stokes.Settings{Tolerance: 1e-11},
			})
			require.Equal(t, steps, m.StepsTaken())
			return m.Temperature()
		}
		exact := at(8 * tt.steps)
		coarse, fine := difference(at(tt.steps), exact), difference(at(2*tt.steps), exact)
		assert.InDelta(t, 2, math.Log2(coarse/fine), 0.15, "%v", tt.scheme)
		assert.Less(t, coarse, 1e-3)
	}
}

// The rate at which an infinitesimal mode grows between free-slip walls at
// infinite Prandtl number: σ = Ra k²/(π²+k²)² − (π²+k²) (Rayleigh 1916; Chandrasekhar
// 1961, ch. II, from memory).
func TestInfinitesimalModeGrowsAsPredicted(t *testing.T) {
	g, err := staggered.Uniform(64, 64, math.Sqrt2, 1)
	require.NoError(t, err)
	k := math.Pi / math.Sqrt2
	for _, ra := range []float64{400, 2000, 1e4} {
		m, err := New(Problem{Grid: g, Rayleigh: ra, Initial: func(_, z float64) float64 { return 1 - z }},
			&Settings{MaxSteps: 200})
		require.NoError(t, err)
		require.NoError(t, m.Perturb(Mode{Amplitude: 1e-6, Wavenumber: k}))
		require.NoError(t, m.ensureFlow(context.Background()))
		before := m.flow.RMS()
		_, err = m.Run(context.Background())
		require.NoError(t, err)
		a := math.Pi*math.Pi + k*k
		want := ra*k*k/(a*a) - a
		assert.InEpsilon(t, want, math.Log(m.flow.RMS()/before)/m.Time(), 0.01, "Ra = %v", ra)
	}
}

func TestHeatBudgetAndWorkClose(t *testing.T) {
	m, err := New(variable(square(t, 24)), &Settings{MaxSteps: 60})
	require.NoError(t, err)
	count := 0
	for s, err := range m.Steps(context.Background()) {
		require.NoError(t, err)
		count++
		assert.Less(t, s.HeatBudgetError, 1e-12)
		assert.Less(t, s.WorkError(), 1e-7)
		assert.Positive(t, s.Dissipation)
	}
	assert.Equal(t, 61, count)
}

// Turning the box left to right turns the answer.
func TestMirroredProblemGivesMirroredAnswer(t *testing.T) {
	g := square(t, 20)
	p := variable(g)
	settings := &Settings{MaxSteps: 40, Stokes: &stokes.Settings{Tolerance: 1e-12}}
	m := run(t, p, settings)
	initial := p.Initial
	p.Initial = func(x, z float64) float64 { return initial(1-x, z) }
	mirrored := run(t, p, settings)
	assert.InEpsilon(t, m.Time(), mirrored.Time(), 1e-12)
	for k := range 20 {
		for i := range 20 {
			assert.InDelta(t, m.Temperature().At(i, k), mirrored.Temperature().At(19-i, k), 1e-11)
		}
	}
	for k := range 20 {
		for i := range 21 {
			assert.InDelta(t, m.Flow().VX[k*21+i], -mirrored.Flow().VX[k*21+20-i], 1e-8)
		}
	}
}

// The same layer in other units: length in 1e5, temperature in 1000 K from
// 300 K up, viscosity in 1e20. Everything scales back to 1e-9.
func TestUnitsDoNotMatter(t *testing.T) {
	const (
		depth, drop, top, eta     = 1e5, 1000.0, 300.0, 1e20
		conductivity, capacity    = 3.0, 4e6
		kappa                     = conductivity / capacity
		rayleigh, heating, exp, c = 3e4, 2.0, 2.0, 1.0
	)
	scaled := variable(square(t, 16))
	g, err := staggered.Uniform(16, 16, depth, depth)
	require.NoError(t, err)
	dimensional := Problem{
		Grid:     g,
		Rayleigh: rayleigh * kappa * eta / (depth * depth * depth * drop),
		Heating:  heating * conductivity * drop / (depth * depth),
		Viscosity: rheology.FrankKamenetskii{
			Reference: eta, ThermalExponent: exp, DepthExponent: c,
			ReferenceTemperature: top, TemperatureScale: drop, DepthScale: depth,
		},
		Walls:        scaled.Walls,
		Thermal:      &heat.Walls{Bottom: heat.Isothermal(top + drop), Top: heat.Isothermal(top)},
		Conductivity: conductivity, HeatCapacity: capacity,
		Initial: func(x, z float64) float64 { return top + drop*scaled.Initial(x/depth, z/depth) },
	}
	s := &Settings{MaxSteps: 100, Stokes: &stokes.Settings{Tolerance: 1e-11}}
	a, b := run(t, scaled, s), run(t, dimensional, s)
	assert.InEpsilon(t, a.Time(), b.Time()*kappa/(depth*depth), 1e-9)
	assert.InEpsilon(t, a.Flow().RMS(), b.Flow().RMS()*depth/kappa, 1e-9)
	for j, v := range a.Temperature().Values {
		assert.InDelta(t, v, (b.Temperature().Values[j]-top)/drop, 1e-9)
	}
	da, err := a.sample(Running)
	require.NoError(t, err)
	db, err := b.sample(Running)
	require.NoError(t, err)
	assert.InEpsilon(t, da.NuTop, db.NuTop, 1e-9)
	assert.InEpsilon(t, da.NuBottom, db.NuBottom, 1e-9)
	assert.InEpsilon(t, da.Change, db.Change, 1e-6)
	assert.InEpsilon(t, da.CornerGradients[2], db.CornerGradients[2]*depth/drop, 1e-9)
}

func TestProcessorsDoNotChangeBits(t *testing.T) {
	defer runtime.GOMAXPROCS(runtime.GOMAXPROCS(1))
	p := variable(square(t, 80))
	one := run(t, p, &Settings{MaxSteps: 4})
	runtime.GOMAXPROCS(2)
	two := run(t, p, &Settings{MaxSteps: 4})
	assert.Equal(t, one.Temperature().Values, two.Temperature().Values)
	assert.Equal(t, one.Flow(), two.Flow())
}

func TestStepsDoNotAllocate(t *testing.T) {
	m := run(t, variable(square(t, 32)), &Settings{MaxSteps: 5, Stokes: &stokes.Settings{Workers: 1}, Heat: &heat.Settings{Workers: 1}})
	ctx := context.Background()
	assert.Zero(t, testing.AllocsPerRun(20, func() {
		if err := m.advance(ctx); err != nil {
			t.Fatal(err)
		}
		if _, err := m.sample(Running); err != nil {
			t.Fatal(err)
		}
	}))
}

func TestResumedRunContinuesBitForBit(t *testing.T) {
	p := variable(square(t, 16))
	whole := run(t, p, &Settings{MaxSteps: 30})
	half := run(t, p, &Settings{MaxSteps: 13})
	var file bytes.Buffer
	require.NoError(t, half.Save(&file))
	resumed, err := Resume(&file, p, &Settings{MaxSteps: 17})
	require.NoError(t, err)
	assert.Equal(t, 13, resumed.StepsTaken())
	_, err = resumed.Run(context.Background())
	require.NoError(t, err)
	assert.Equal(t, whole.Time(), resumed.Time())
	assert.Equal(t, whole.Temperature().Values, resumed.Temperature().Values)
	assert.Equal(t, whole.Flow().VX, resumed.Flow().VX)
	assert.Equal(t, whole.Flow().P, resumed.Flow().P)
}

func TestDamagedCheckpointsAreErrors(t *testing.T) {
	p := variable(square(t, 6))
	m := run(t, p, &Settings{MaxSteps: 2})
	var file bytes.Buffer
	require.NoError(t, m.Save(&file))
	good := file.Bytes()
	for n := 0; n < len(good); n += 1 + n/3 {
		_, err := Resume(bytes.NewReader(good[:n]), p, nil)
		assert.ErrorIs(t, err, ErrCheckpoint, "cut at %d", n)
		bad := bytes.Clone(good)
		bad[n] ^= 0x10
		_, err = Resume(bytes.NewReader(bad), p, nil)
		assert.ErrorIs(t, err, ErrCheckpoint, "damaged at %d", n)
	}
	other := p
	other.Grid = square(t, 7)
	_, err := Resume(bytes.NewReader(good), other, nil)
	assert.ErrorIs(t, err, ErrCheckpoint)
	assert.ErrorContains(t, err, "6x6 cells, want 7x7")
	g, err := staggered.Graded(6, 6, 1, 1, staggered.Grading{Top: 2})
	require.NoError(t, err)
	other.Grid = g
	_, err = Resume(bytes.NewReader(good), other, nil)
	assert.ErrorContains(t, err, "other cell edges")
	assert.ErrorContains(t, m.Save(brokenWriter{}), "full")
}

type brokenWriter struct{}

func (brokenWriter) Write([]byte) (int, error) { return 0, errors.New("full") }

func TestStopCriteria(t *testing.T) {
	p := Problem{Grid: square(t, 8), Rayleigh: 100}
	m, err := New(p, &Settings{EndTime: 0.01})
	require.NoError(t, err)
	s, err := m.Run(context.Background())
	require.NoError(t, err)
	assert.Equal(t, AtEndTime, s.Stop)
	assert.Equal(t, 0.01, s.Time)
	assert.Positive(t, s.Step)

	s, err = run(t, p, &Settings{SteadyTolerance: 1e-3}).sample(Running)
	require.NoError(t, err)
	assert.LessOrEqual(t, s.Change, 1e-3)
	assert.InEpsilon(t, 1, s.NuTop, 1e-3, "below onset the layer ends at rest")

	m, err = New(p, &Settings{MaxSteps: 10, Every: 4})
	require.NoError(t, err)
	var steps []int
	for s, err := range m.Steps(context.Background()) {
		require.NoError(t, err)
		steps = append(steps, s.Step)
	}
	assert.Equal(t, []int{0, 4, 8, 10}, steps)
	for s, err := range m.Steps(context.Background()) {
		require.NoError(t, err)
		steps = append(steps, s.Step)
		break
	}
	assert.Equal(t, []int{0, 4, 8, 10, 10}, steps, "a second walk goes on where the first ended")

	m, err = New(p, nil)
	require.NoError(t, err)
	_, err = m.Run(context.Background())
	assert.ErrorContains(t, err, "never ends")
	assert.Equal(t, "running end time reached steps used up steady Stop(9)",
		fmt.Sprint(Running, " ", AtEndTime, " ", AtMaxSteps, " ", AtSteadyState, " ", Stop(9)))
}

func TestCancelledRunKeepsItsLastStep(t *testing.T) {
	m, err := New(variable(square(t, 12)), nil)
	require.NoError(t, err)
	ctx, cancel := context.WithCancel(context.Background())
	var failure error
	var last Sample
	for s, err := range m.Steps(ctx) {
		last, failure = s, err
		if s.Step == 5 {
			cancel()
		}
	}
	require.ErrorIs(t, failure, context.Canceled)
	assert.Equal(t, 5, last.Step)
	assert.Equal(t, 5, m.StepsTaken())
	cancel()
	whole := run(t, variable(square(t, 12)), &Settings{MaxSteps: 5})
	assert.Equal(t, whole.Temperature().Values, m.Temperature().Values)
}

func TestBadProblemsAreErrors(t *testing.T) {
	g, nan := square(t, 4), math.NaN()
	for want, p := range map[string]Problem{
		"Grid is nil":          {},
		"Rayleigh is NaN":      {Grid: g, Rayleigh: nan},
		"Heating is +Inf":      {Grid: g, Heating: math.Inf(1)},
		"Conductivity is -1":   {Grid: g, Conductivity: -1},
		"HeatCapacity is NaN":  {Grid: g, HeatCapacity: nan},
		"Viscosity":            {Grid: g, Viscosity: rheology.Constant(-1)},
		"temperature of cell":  {Grid: g, Initial: func(_, _ float64) float64 { return nan }},
		"no conducting state":  {Grid: g, Thermal: &heat.Walls{}},
		"want both or neither": {Grid: g, Thermal: &heat.Walls{Left: heat.Periodic, Right: heat.Periodic}},
		"convection: stokes: ": {Grid: g, Walls: stokes.Walls{Top: stokes.Periodic}},
		"isothermal NaN":       {Grid: g, Thermal: &heat.Walls{Top: heat.Isothermal(nan)}},
	} {
		_, err := New(p, nil)
		if want == "isothermal NaN" {
			want = "NaN"
		}
		assert.ErrorContains(t, err, want)
	}
	for want, s := range map[string]*Settings{
		"Courant is 2":         {Courant: 2},
		"FlowError is -1":      {FlowError: -1},
		"MaxStep is NaN":       {MaxStep: nan},
		"EndTime is -1":        {EndTime: -1},
		"MaxSteps is -1":       {MaxSteps: -1},
		"SteadyTolerance is -": {SteadyTolerance: -1},
		"Every is -1":          {Every: -1},
	} {
		_, err := New(Problem{Grid: g}, s)
		assert.ErrorContains(t, err, "convection: Settings."+want)
	}
}

func TestDefaultsAreTheWrittenOnes(t *testing.T) {
	p := variable(square(t, 12))
	a := run(t, p, &Settings{MaxSteps: 10})
	b := run(t, p, &Settings{
		MaxSteps: 10, Courant: DefaultCourant, FlowError: DefaultFlowError, Every: DefaultEvery,
		MaxStep: math.Inf(1), EndTime: math.Inf(1), Stokes: &stokes.Settings{}, Heat: &heat.Settings{},
	})
	assert.Equal(t, a.Temperature().Values, b.Temperature().Values)
}

// Nothing but its own settings bounds an implicit step in a fluid at rest.
func TestImplicitStepsAtRestStayFinite(t *testing.T) {
	settings := &Settings{MaxSteps: 200, Heat: &heat.Settings{Scheme: heat.Implicit}}
	m := run(t, Problem{Grid: square(t, 8)}, settings)
	assert.Equal(t, 200, m.StepsTaken())
	assert.LessOrEqual(t, m.last, 1.0, "no step is longer than the diffusion time")
	s, err := m.sample(Running)
	require.NoError(t, err)
	assert.InDelta(t, 1, s.NuTop, 1e-9)
}

// A box without a way out for its heat warms evenly: that is no steady state.
func TestUniformWarmingIsNotSteady(t *testing.T) {
	m, err := New(Problem{
		Grid: square(t, 4), Heating: 1, Thermal: &heat.Walls{}, Initial: func(_, _ float64) float64 { return 0 },
	}, &Settings{SteadyTolerance: 1e-3, MaxSteps: 5})
	require.NoError(t, err)
	s, err := m.Run(context.Background())
	require.NoError(t, err)
	assert.Equal(t, AtMaxSteps, s.Stop)
	assert.Greater(t, s.Change, 1e3)
	assert.InEpsilon(t, m.Time(), s.MeanTemperature, 1e-12)
}
