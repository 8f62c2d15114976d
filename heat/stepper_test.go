package heat

import (
	"context"
	"errors"
	"math"
	"testing"

	"example.org/overturn/stokes/staggered"
	"github.com/stretchr/testify/require"
)

func TestDefaultsAreTheNamedConstants(t *testing.T) {
	var none *Settings
	c, err := none.withDefaults()
	require.NoError(t, err)
	require.Equal(t, Central, c.Advection)
	require.Equal(t, RungeKutta3, c.Scheme)
	require.Equal(t, Enforced, c.Limit)
	require.Equal(t, DefaultTolerance, c.Tolerance)
	require.Equal(t, DefaultMaxIterations, c.MaxIterations)
	require.Positive(t, c.Workers)
	mine := Settings{}
	_, err = mine.withDefaults()
	require.NoError(t, err)
	require.Equal(t, Settings{}, mine, "the caller's settings stay as they are")
}

func TestNewStepperRefuses(t *testing.T) {
	g, other := uniform(t, 4, 3, 1, 1), uniform(t, 3, 4, 1, 1)
	with := func(v float64) *staggered.Scalar {
		s := staggered.NewScalar(g)
		s.SetAll(1)
		s.Values[6] = v
		return s
	}
	for message, eq := range map[string]Equation{
		"heat: Equation.Grid is nil, want a grid":                                   {},
		"heat: Conductivity of cell (2, 1) is -1, want finite and >= 0":             {Grid: g, Conductivity: with(-1)},
		"heat: Conductivity of cell (2, 1) is NaN, want finite and >= 0":            {Grid: g, Conductivity: with(math.NaN())},
		"heat: Conductivity of cell (2, 1) is +Inf, want finite and >= 0":           {Grid: g, Conductivity: with(math.Inf(1))},
		"heat: HeatCapacity of cell (2, 1) is 0, want finite and > 0":               {Grid: g, HeatCapacity: with(0)},
		"heat: HeatCapacity of cell (2, 1) is +Inf, want finite and > 0":            {Grid: g, HeatCapacity: with(math.Inf(1))},
		"heat: Source of cell (2, 1) is -Inf, want finite":                          {Grid: g, Source: with(math.Inf(-1))},
		"heat: Source lives on another grid, want that of the equation: wrong size": {Grid: g, Source: staggered.NewScalar(other)},
		"heat: Source has 2 values, want 12: wrong size":                            {Grid: g, Source: &staggered.Scalar{Values: make([]float64, 2)}},
		"heat: bottom wall is periodic, want that of Left and Right only":           {Grid: g, Walls: Walls{Bottom: Periodic, Top: Periodic}},
		"heat: left wall is periodic and right wall insulating, want both periodic or neither": {
			Grid: g, Walls: Walls{Left: Periodic}},
		"heat: coefficient of the top wall is -2, want finite and >= 0": {Grid: g, Walls: Walls{Top: Robin(-2, 0)}},
		"heat: left wall (isothermal NaN) has the value NaN at 0.16666666666666666, want a finite number": {
			Grid: g, Walls: Walls{Left: Isothermal(math.NaN())}},
		"heat: top wall (flux profile) has the value NaN at 0.125, want a finite number": {
			Grid: g, Walls: Walls{Top: FluxProfile(nil)}},
	} {
		_, err := NewStepper(eq, nil)
		require.EqualError(t, err, message)
	}
	for message, s := range map[string]Settings{
		"heat: Settings.Advection is Advection(7), want Central or Bounded":              {Advection: 7},
		"heat: Settings.Scheme is Scheme(-1), want RungeKutta3, RungeKutta2 or Implicit": {Scheme: -1},
		"heat: Settings.Limit is 2, want Enforced or Unenforced":                         {Limit: 2},
		"heat: Settings.Tolerance is -1, want between 0 and 1":                           {Tolerance: -1},
		"heat: Settings.MaxIterations is -1, want >= 0":                                  {MaxIterations: -1},
		"heat: Settings.Workers is -1, want >= 0":                                        {Workers: -1},
	} {
		_, err := NewStepper(Equation{Grid: g}, &s)
		require.EqualError(t, err, message)
	}
}

func TestStepRefuses(t *testing.T) {
	everyMethod(t, func(t *testing.T, s Settings) {
		g, other := uniform(t, 5, 4, 1, 1), uniform(t, 4, 5, 1, 1)
		source := staggered.NewScalar(g)
		st, err := NewStepper(Equation{Grid: g, Source: source}, &s)
		require.NoError(t, err)
		ctx := context.Background()
		temperature, flow := staggered.NewScalar(g), cellFlow(g, 10)
		temperature.Fill(func(x, z float64) float64 { return x })
		start := temperature.Clone()
		dt := st.StableStep(flow)

		_, err = st.Step(ctx, nil, flow, dt)
		require.ErrorIs(t, err, ErrSize)
		_, err = st.Step(ctx, staggered.NewScalar(other), flow, dt)
		require.ErrorIs(t, err, ErrSize)
		_, err = st.Step(ctx, temperature, staggered.NewFlow(other), dt)
		require.ErrorIs(t, err, ErrSize)
		_, err = st.Step(ctx, temperature, &staggered.Flow{Grid: g, VX: flow.VX, VZ: flow.VX}, dt)
		require.EqualError(t, err, "heat: flow has 24 values of VZ, want 25: wrong size")
		require.Zero(t, st.StableStep(staggered.NewFlow(other)))
		for _, bad := range []float64{0, -1, math.NaN(), math.Inf(1)} {
			_, err = st.Step(ctx, temperature, flow, bad)
			require.ErrorContains(t, err, "want finite and > 0")
		}

		_, err = st.Step(ctx, temperature, flow, 1.01*dt)
		require.ErrorIs(t, err, ErrUnstable)
		var se *StepError
		require.True(t, errors.As(err, &se))
		require.Equal(t, StepError{Step: 1.01 * dt, Stable: dt}, *se)
		require.ErrorContains(t, err, "want <= ")
		_, err = st.Step(ctx, temperature, flow, dt)
		require.NoError(t, err, "the stable step itself is none too long")
		copy(temperature.Values, start.Values)

		for _, bad := range []float64{math.NaN(), math.Inf(1), math.Inf(-1)} {
			for _, v := range [][]float64{temperature.Values, flow.VX, flow.VZ, source.Values} {
				for _, c := range []int{0, 7, 13, len(v) - 1} {
					kept := v[c]
					v[c] = bad
					_, err = st.Step(ctx, temperature, flow, dt/2)
					require.ErrorIs(t, err, ErrNotFinite)
					require.ErrorIs(t, st.RateTo(staggered.NewScalar(g), temperature, flow), ErrNotFinite)
					v[c] = kept
				}
			}
			flow.VX[7] = bad
			require.Zero(t, st.StableStep(flow))
			require.ErrorIs(t, st.FactorShifted(flow, 1), ErrNotFinite)
			flow.VX[7] = 0
			flow.FillFromStream(func(x, z float64) float64 { return 0 })
		}
		require.Equal(t, start.Values, temperature.Values, "errors leave the temperature alone")
	})
}

func TestErrorNamesTheNumber(t *testing.T) {
	g := uniform(t, 5, 4, 1, 1)
	st, err := NewStepper(Equation{Grid: g}, nil)
	require.NoError(t, err)
	flow := staggered.NewFlow(g)
	flow.VX[8] = math.NaN()
	_, err = st.Step(context.Background(), staggered.NewScalar(g), flow, 1e-4)
	require.EqualError(t, err, "heat: VX at (2, 1) is NaN: not finite")
	_, err = st.Step(context.Background(), staggered.NewScalar(g), nil, 1e-4)
	require.NoError(t, err, "a bad flow is forgotten")
}

func TestUnenforcedLimitLetsPass(t *testing.T) {
	g := uniform(t, 8, 8, 1, 1)
	st, err := NewStepper(Equation{Grid: g}, &Settings{Limit: Unenforced})
	require.NoError(t, err)
	_, err = st.Step(context.Background(), staggered.NewScalar(g), cellFlow(g, 1), 10)
	require.NoError(t, err)
}

func TestOtherMethodsRefuse(t *testing.T) {
	g, other := uniform(t, 5, 4, 1, 1), uniform(t, 4, 5, 1, 1)
	st, err := NewStepper(Equation{Grid: g, Walls: Walls{Top: Isothermal(0)}}, nil)
	require.NoError(t, err)
	good, bad := staggered.NewScalar(g), staggered.NewScalar(other)
	_, err = st.HeatContent(bad)
	require.ErrorIs(t, err, ErrSize)
	require.ErrorIs(t, st.RateTo(bad, good, nil), ErrSize)
	require.ErrorIs(t, st.RateTo(good, bad, nil), ErrSize)
	require.ErrorContains(t, st.RateTo(good, good, nil), "want another field")
	_, err = st.WallFluxTo(make([]float64, 4), staggered.Top, good, nil)
	require.EqualError(t, err, "heat: dst has 4 values, want 5 along the top wall: wrong size")
	_, err = st.WallFluxTo(nil, 4, good, nil)
	require.ErrorContains(t, err, "want one of the four")
	_, err = st.WallFluxTo(nil, staggered.Top, bad, nil)
	require.ErrorIs(t, err, ErrSize)
	_, err = st.CornerFluxes(bad)
	require.ErrorIs(t, err, ErrSize)
	_, err = st.Steady(context.Background(), bad, nil)
	require.ErrorIs(t, err, ErrSize)
	require.ErrorIs(t, st.Factor(staggered.NewFlow(other)), ErrSize)
	require.Error(t, st.FactorShifted(nil, -1))
	require.NoError(t, st.Factor(nil))
	require.ErrorIs(t, st.SolveTo(bad, good), ErrSize)
	require.ErrorIs(t, st.SolveTo(good, bad), ErrSize)
}

// Steps after SetWalls are those of a new stepper with the new walls.
func TestSetWalls(t *testing.T) {
	everyMethod(t, func(t *testing.T, s Settings) {
		g := uniform(t, 12, 9, 1, 1)
		walls := []Walls{
			{Bottom: Isothermal(1), Top: Isothermal(0)},
			{Bottom: Isothermal(2), Top: Profile(func(x float64) float64 { return x })},
			{Bottom: Robin(3, 2), Top: Flux(1), Left: Isothermal(4)},
			{},
		}
		st, err := NewStepper(Equation{Grid: g, Walls: walls[0]}, &s)
		require.NoError(t, err)
		flow := cellFlow(g, 5)
		for _, w := range walls {
			require.NoError(t, st.SetWalls(w))
			fresh, err := NewStepper(Equation{Grid: g, Walls: w}, &s)
			require.NoError(t, err)
			require.Equal(t, fresh.StableStep(flow), st.StableStep(flow))
			a, b := staggered.NewScalar(g), staggered.NewScalar(g)
			dt := math.Min(1e-3, st.StableStep(flow))
			integrate(t, st, a, flow, dt, 1)
			integrate(t, fresh, b, flow, dt, 1)
			require.Equal(t, b.Values, a.Values)
		}
		require.Error(t, st.SetWalls(Walls{Left: Periodic, Right: Periodic}))
		require.Error(t, st.SetWalls(Walls{Top: Periodic}))
		before, after := staggered.NewScalar(g), staggered.NewScalar(g)
		require.NoError(t, st.SetWalls(walls[2]))
		require.NoError(t, st.RateTo(before, staggered.NewScalar(g), flow))
		require.Error(t, st.SetWalls(Walls{Left: Isothermal(1), Top: Flux(math.NaN())}))
		require.NoError(t, st.RateTo(after, staggered.NewScalar(g), flow))
		require.Equal(t, before.Values, after.Values, "errors leave the walls alone")
	})
}

// Any size of grid works, down to one cell.
func TestSmallGrids(t *testing.T) {
	everyMethod(t, func(t *testing.T, s Settings) {
		for _, sides := range []Wall{Insulating, Periodic, Isothermal(1)} {
			for nx := 1; nx < 6; nx++ {
				for nz := 1; nz < 6; nz++ {
					g := uniform(t, nx, nz, 1, 1)
					st, err := NewStepper(Equation{Grid: g, Walls: Walls{Left: sides, Right: sides, Bottom: Isothermal(1), Top: Robin(1, 1)}}, &s)
					require.NoError(t, err)
					flow := staggered.NewFlow(g)
					flow.FillFromStream(func(x, z float64) float64 { return z * x * (1 - x) })
					if sides.kind == periodic {
						flow.FillFromStream(func(x, z float64) float64 { return z })
					}
					temperature := staggered.NewScalar(g)
					dt := math.Min(st.StableStep(flow), 0.05)
					for range 3 {
						before, err := st.HeatContent(temperature)
						require.NoError(t, err)
						rep, err := st.Step(context.Background(), temperature, flow, dt)
						require.NoError(t, err)
						after, err := st.HeatContent(temperature)
						require.NoError(t, err)
						require.InDelta(t, after-before, rep.Step*rep.Power(), 1e-14)
					}
					_, err = st.Steady(context.Background(), temperature, flow)
					require.NoError(t, err)
					for _, v := range temperature.Values {
						require.InDelta(t, 1, v, 1e-9, "%dx%d", nx, nz)
					}
				}
			}
		}
	})
}

func TestStrings(t *testing.T) {
	profile := func(float64) float64 { return 1 }
	for want, w := range map[string]Wall{
		"insulating": {}, "periodic": Periodic, "isothermal 2": Isothermal(2), "isothermal profile": Profile(profile),
		"flux 0.5": Flux(0.5), "flux profile": FluxProfile(profile), "Robin 2 to 1": Robin(2, 1), "Robin 2 to profile": RobinProfile(2, profile),
	} {
		require.Equal(t, want, w.String())
	}
	require.Equal(t, "Bounded Implicit RungeKutta2 RungeKutta3 Central",
		Bounded.String()+" "+Implicit.String()+" "+RungeKutta2.String()+" "+RungeKutta3.String()+" "+Central.String())
	rep := Report{Step: 0.5, Conducted: [4]float64{0, 0, 1, -2}, Heating: 3}
	require.Equal(t, "step 0.5: conducted [0 0 1 -2], advected [0 0 0 0] (left, right, bottom, top), heating 3, exchange 0", rep.String())
	require.Equal(t, 2.0, rep.Power())
	ce := &ConvergenceError{Iterations: 3, Residual: 1e-3, Tolerance: 1e-8}
	require.EqualError(t, ce, "heat: steady state not converged after 3 iterations: residual 1.0e-03, tolerance 1.0e-08")
}

// Fields on an equal grid made elsewhere fit, and so do bare arrays.
func TestEqualGridsFit(t *testing.T) {
	g, twin := uniform(t, 5, 4, 2, 1), uniform(t, 5, 4, 2, 1)
	st, err := NewStepper(Equation{Grid: g, Source: staggered.NewScalar(twin)}, nil)
	require.NoError(t, err)
	ctx := context.Background()
	for _, grid := range []*staggered.Grid{twin, nil} {
		flow := staggered.NewFlow(twin)
		flow.Grid = grid
		temperature := &staggered.Scalar{Grid: grid, Values: make([]float64, 20)}
		_, err = st.Step(ctx, temperature, flow, 1e-3)
		require.NoError(t, err)
	}
	longer := uniform(t, 5, 4, 3, 1)
	_, err = st.Step(ctx, staggered.NewScalar(longer), nil, 1e-3)
	require.ErrorIs(t, err, ErrSize)
	_, err = st.Step(ctx, staggered.NewScalar(g), staggered.NewFlow(longer), 1e-3)
	require.ErrorIs(t, err, ErrSize)
}

// Walls that move to where they are change nothing; others arrive, and the
// budget closes on the way; a step that fails leaves them at the start.
func TestMoveWalls(t *testing.T) {
	everyMethod(t, func(t *testing.T, s Settings) {
		g := uniform(t, 9, 7, 1, 1)
		from := Walls{Bottom: Isothermal(1), Top: Robin(2, 0.5), Left: Flux(1)}
		to := Walls{Bottom: Isothermal(2), Top: Robin(2, 1.5), Left: Flux(-1)}
		st, err := NewStepper(Equation{Grid: g, Walls: from}, &s)
		require.NoError(t, err)
		fresh, err := NewStepper(Equation{Grid: g, Walls: from}, &s)
		require.NoError(t, err)
		flow := throughFlow(g)
		dt := math.Min(1e-3, st.StableStep(flow))
		a, b := staggered.NewScalar(g), staggered.NewScalar(g)
		require.NoError(t, st.MoveWalls(from))
		integrate(t, st, a, flow, dt, 1)
		integrate(t, fresh, b, flow, dt, 1)
		require.InDeltaSlice(t, b.Values, a.Values, 1e-14)

		require.NoError(t, st.MoveWalls(to))
		_, err = st.Step(context.Background(), a, flow, 1e3)
		require.Error(t, err)
		before, start := make([]float64, 9), make([]float64, 9)
		_, err = fresh.WallFluxTo(start, staggered.Bottom, a, flow)
		require.NoError(t, err)
		_, err = st.WallFluxTo(before, staggered.Bottom, a, flow)
		require.NoError(t, err)
		require.InDeltaSlice(t, start, before, 1e-12, "still at the start")
		content, err := st.HeatContent(a)
		require.NoError(t, err)
		rep, err := st.Step(context.Background(), a, flow, dt)
		require.NoError(t, err)
		after, err := st.HeatContent(a)
		require.NoError(t, err)
		require.InDelta(t, rep.Step*rep.Power(), after-content, 1e-14)
		require.InDelta(t, 0, rep.Conducted[staggered.Left], 0.2, "between 1 and -1")

		require.NoError(t, fresh.SetWalls(to))
		for _, side := range staggered.Sides() {
			p, err := st.WallFluxTo(nil, side, a, flow)
			require.NoError(t, err)
			q, err := fresh.WallFluxTo(nil, side, a, flow)
			require.NoError(t, err)
			require.InDeltaSlice(t, q, p, 1e-12, "arrived")
		}
		require.ErrorContains(t, st.MoveWalls(Walls{}), "want the same kinds")
		require.Error(t, st.MoveWalls(Walls{Top: Periodic}))
		bad := to
		bad.Left = Flux(math.Inf(1))
		require.Error(t, st.MoveWalls(bad))
	})
}
