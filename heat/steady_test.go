package heat

import (
	"context"
	"errors"
	"fmt"
	"math"
	"testing"

	"example.org/overturn/stokes/staggered"
	"github.com/stretchr/testify/require"
)

func uniform(t testing.TB, nx, nz int, width, height float64) *staggered.Grid {
	t.Helper()
	g, err := staggered.Uniform(nx, nz, width, height)
	require.NoError(t, err)
	return g
}

// cellFlow is a closed convection cell of the given top speed.
func cellFlow(g *staggered.Grid, speed float64) *staggered.Flow {
	flow := staggered.NewFlow(g)
	w, h := g.Width(), g.Height()
	flow.FillFromStream(func(x, z float64) float64 {
		return speed * h / math.Pi * math.Sin(math.Pi*x/w) * math.Sin(math.Pi*z/h)
	})
	return flow
}

// Where a long run in time ends is what Steady finds at once.
func TestSteadyEqualsLongTransient(t *testing.T) {
	if testing.Short() {
		t.Skip("takes seconds")
	}
	everyMethod(t, func(t *testing.T, s Settings) {
		for _, sides := range []string{"TF", "PP"} {
			m := newManufactured()
			m.sides, m.ends, m.graded = sides, "RT", true
			st, temperature, flow := m.problem(t, 12, &s)
			steady := temperature.Clone()
			rep, err := st.Steady(context.Background(), steady, flow)
			require.NoError(t, err)
			require.InDelta(t, 0, rep.Power(), 1e-8)
			dt := math.Min(st.StableStep(flow), 5e-3)
			steps := int(6/dt) + 1
			integrate(t, st, temperature, flow, 6, steps)
			worst, _ := differences(steady.Values, temperature.Values)
			require.Less(t, worst, 1e-7)
		}
	})
}

// T + A⁻¹·RateTo(T) is the steady state of the central scheme, whatever T is.
func TestSolveToCorrectsToSteadyState(t *testing.T) {
	m := newManufactured()
	m.sides, m.ends, m.graded = "TF", "RT", true
	st, temperature, flow := m.problem(t, 24, nil)
	temperature.Fill(func(x, z float64) float64 { return math.Cos(9 * x * z) })
	rate := staggered.NewScalar(st.Grid())
	require.Error(t, st.SolveTo(rate, rate), "without factors")
	require.NoError(t, st.Factor(flow))
	require.NoError(t, st.RateTo(rate, temperature, flow))
	require.NoError(t, st.SolveTo(rate, rate))
	for c, d := range rate.Values {
		temperature.Values[c] += d
	}
	require.NoError(t, st.RateTo(rate, temperature, flow))
	require.InDelta(t, 0, rate.RMS(), 1e-8)
}

// (C/dt + A)⁻¹ applied to C·T/dt is an implicit Euler step: C (T⁺ − T)/dt is
// the rate at T⁺.
func TestFactorShiftedIsImplicitEuler(t *testing.T) {
	m := newManufactured()
	m.sides, m.ends, m.graded = "PP", "FF", true
	st, temperature, flow := m.problem(t, 16, nil)
	const dt = 0.01
	require.NoError(t, st.FactorShifted(flow, 1/dt), "insulated walls do no harm with a shift")
	rate, delta := temperature.Clone(), temperature.Clone()
	require.NoError(t, st.RateTo(rate, temperature, flow))
	require.NoError(t, st.SolveTo(delta, rate))
	for c, d := range delta.Values {
		temperature.Values[c] += d
	}
	require.NoError(t, st.RateTo(rate, temperature, flow))
	g := st.Grid()
	for c, d := range delta.Values {
		capacity, _, _, _ := m.capacity(g.XCentres()[c%g.NX()], g.ZCentres()[c/g.NX()])
		require.InDelta(t, capacity*d/dt, rate.Values[c], 1e-9)
	}
}

// Fast flow on a coarse grid: the bounded scheme converges, within bounds.
func TestBoundedSteadyStaysInBounds(t *testing.T) {
	g := uniform(t, 32, 32, 1, 1)
	st, err := NewStepper(Equation{Grid: g, Walls: Walls{Bottom: Isothermal(1), Top: Isothermal(0)}}, &Settings{Advection: Bounded})
	require.NoError(t, err)
	for _, speed := range []float64{50, 500, 5000} {
		temperature := staggered.NewScalar(g)
		rep, err := st.Steady(context.Background(), temperature, cellFlow(g, speed))
		require.NoError(t, err)
		require.InDelta(t, 0, rep.Power(), 1e-8*rep.Conducted[staggered.Bottom])
		low, high := temperature.Extrema()
		t.Logf("speed %g: %d iterations, %.4f to %.4f, flux %.4f", speed, rep.Iterations, low.Value, high.Value, rep.Conducted[staggered.Bottom])
		require.GreaterOrEqual(t, low.Value, 0.0)
		require.LessOrEqual(t, high.Value, 1.0)
	}
}

// A boundary layer thinner than a cell: the bounded scheme keeps to the walls'
// temperatures where the central one overshoots them.
func TestUnresolvedBoundaryLayer(t *testing.T) {
	g := uniform(t, 20, 3, 1, 1)
	flow := staggered.NewFlow(g)
	flow.FillVelocity(func(x, z float64) float64 { return 200 }, func(x, z float64) float64 { return 0 })
	for _, advection := range []Advection{Central, Bounded} {
		st, err := NewStepper(Equation{Grid: g, Walls: Walls{Left: Isothermal(0), Right: Isothermal(1)}}, &Settings{Advection: advection})
		require.NoError(t, err)
		temperature := staggered.NewScalar(g)
		_, err = st.Steady(context.Background(), temperature, flow)
		require.NoError(t, err)
		low, high := temperature.Extrema()
		require.Equal(t, advection == Bounded, low.Value >= -1e-9 && high.Value <= 1+1e-9, "%v: %v to %v", advection, low, high)
	}
}

func TestBoundedSteadyIsSecondOrderInTheMean(t *testing.T) {
	var means []float64
	for _, n := range []int{16, 32, 64} {
		m := newManufactured()
		m.sides, m.graded = "TF", true
		st, exact, flow := m.problem(t, n, &Settings{Advection: Bounded})
		got := staggered.NewScalar(st.Grid())
		_, err := st.Steady(context.Background(), got, flow)
		require.NoError(t, err)
		_, mean := differences(got.Values, exact.Values)
		means = append(means, mean)
	}
	requireOrder(t, "mean error", 1.9, means)
}

func TestSteadyNotConverged(t *testing.T) {
	g := uniform(t, 24, 24, 1, 1)
	st, err := NewStepper(Equation{Grid: g, Walls: Walls{Bottom: Isothermal(1), Top: Isothermal(0)}},
		&Settings{Advection: Bounded, MaxIterations: 3})
	require.NoError(t, err)
	temperature := staggered.NewScalar(g)
	rep, err := st.Steady(context.Background(), temperature, cellFlow(g, 500))
	require.ErrorIs(t, err, ErrNotConverged)
	var ce *ConvergenceError
	require.True(t, errors.As(err, &ce))
	require.Equal(t, 3, ce.Iterations)
	require.Equal(t, rep.Residual, ce.Residual)
	require.Greater(t, ce.Residual, ce.Tolerance)
	require.NotZero(t, temperature.RMS(), "the last answer is there")
	require.Error(t, st.SolveTo(temperature, temperature), "its factors are not those of Factor")
}

func TestSteadyStopsWhenCancelled(t *testing.T) {
	g := uniform(t, 8, 8, 1, 1)
	st, err := NewStepper(Equation{Grid: g, Walls: Walls{Bottom: Isothermal(1)}}, nil)
	require.NoError(t, err)
	ctx, cancel := context.WithCancel(context.Background())
	cancel()
	_, err = st.Steady(ctx, staggered.NewScalar(g), nil)
	require.ErrorIs(t, err, context.Canceled)
	_, err = st.Step(ctx, staggered.NewScalar(g), nil, 1e-4)
	require.ErrorIs(t, err, context.Canceled)
}

// Two layers in series, whatever the grid does inside them: temperatures and
// fluxes are exact. heat.csv of the check list: interface at 10/11, flux 20/11.
func TestTwoLayersAreExact(t *testing.T) {
	for name, z := range map[string][]float64{
		"uniform":   {0, 0.1, 0.2, 0.3, 0.4, 0.5, 0.6, 0.7, 0.8, 0.9, 1},
		"graded":    {0, 0.05, 0.2, 0.5, 0.75, 0.95, 1},
		"one cell":  {0, 0.5, 0.6, 0.9, 1},
		"two cells": {0, 0.5, 1},
	} {
		for _, upright := range []bool{true, false} {
			t.Run(fmt.Sprintf("%s/upright=%v", name, upright), func(t *testing.T) {
				x := []float64{0, 0.4, 1}
				walls := Walls{Bottom: Isothermal(0), Top: Isothermal(1)}
				hot, cold := staggered.Top, staggered.Bottom
				if !upright {
					x, z = z, x
					walls = Walls{Left: Isothermal(0), Right: Isothermal(1)}
					hot, cold = staggered.Right, staggered.Left
				}
				g, err := staggered.NewGrid(x, z)
				require.NoError(t, err)
				along := func(x, z float64) float64 {
					if upright {
						return z
					}
					return x
				}
				k := staggered.NewScalar(g)
				k.Fill(func(x, z float64) float64 {
					if along(x, z) < 0.5 {
						return 1
					}
					return 10
				})
				st, err := NewStepper(Equation{Grid: g, Walls: walls, Conductivity: k}, nil)
				require.NoError(t, err)
				got, want := staggered.NewScalar(g), staggered.NewScalar(g)
				_, err = st.Steady(context.Background(), got, nil)
				require.NoError(t, err)
				const q = 2 / (1 + 0.1)
				want.Fill(func(x, z float64) float64 {
					if s := along(x, z); s < 0.5 {
						return q * s
					} else {
						return 1 - q*(1-s)/10
					}
				})
				require.InDeltaSlice(t, want.Values, got.Values, 1e-13)
				for side, flux := range map[staggered.Side]float64{hot: q, cold: -q} {
					f, err := st.WallFluxTo(nil, side, got, nil)
					require.NoError(t, err)
					for _, v := range f {
						require.InDelta(t, flux, v, 1e-12)
					}
				}
			})
		}
	}
}

// Straight lines are exact on any grid, with every kind of wall.
func TestLinearProfileIsExact(t *testing.T) {
	g, err := staggered.NewGrid([]float64{0, 0.1, 0.15, 0.4, 1}, []float64{0, 0.3, 0.35, 0.8, 1.5})
	require.NoError(t, err)
	line := func(x, z float64) float64 { return 2 + 3*x - 1.5*z }
	for _, left := range []Wall{Profile(func(z float64) float64 { return line(0, z) }), Flux(-3)} {
		for _, top := range []Wall{
			Profile(func(x float64) float64 { return line(x, 1.5) }),
			RobinProfile(2, func(x float64) float64 { return line(x, 1.5) - 1.5/2 }),
		} {
			st, err := NewStepper(Equation{Grid: g, Walls: Walls{Left: left, Right: Flux(3), Bottom: Flux(1.5), Top: top}}, nil)
			require.NoError(t, err)
			got, want := staggered.NewScalar(g), staggered.NewScalar(g)
			want.Fill(line)
			_, err = st.Steady(context.Background(), got, nil)
			require.NoError(t, err)
			require.InDeltaSlice(t, want.Values, got.Values, 1e-12)
		}
	}
}

func TestSingularSteadyState(t *testing.T) {
	for _, walls := range []Walls{{}, {Bottom: Flux(1), Top: Flux(-1)}, {Left: Periodic, Right: Periodic}, {Top: Robin(0, 1)}} {
		g := uniform(t, 6, 5, 1, 1)
		st, err := NewStepper(Equation{Grid: g, Walls: walls}, nil)
		require.NoError(t, err)
		_, err = st.Steady(context.Background(), staggered.NewScalar(g), nil)
		require.ErrorIs(t, err, ErrSingular)
		require.ErrorIs(t, st.Factor(nil), ErrSingular)
	}
	g := uniform(t, 6, 5, 1, 1)
	st, err := NewStepper(Equation{Grid: g, Conductivity: frozen(g), Walls: Walls{Top: Isothermal(1)}}, nil)
	require.NoError(t, err)
	require.ErrorIs(t, st.Factor(nil), ErrSingular, "nothing conducts")
}
