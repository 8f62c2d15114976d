package heattest_test

import (
	"context"
	"errors"
	"fmt"
	"math"
	"testing"

	"example.org/overturn/heat"
	"example.org/overturn/heat/exact"
	"example.org/overturn/heat/heattest"
	"example.org/overturn/stokes/staggered"
	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// failures runs the kit on some cases and returns what it found.
func failures(t *testing.T, solve heattest.Solver, s heattest.Settings, names ...string) []string {
	t.Helper()
	s.Cases = cases(t, names...)
	if s.Cells == nil {
		s.Cells = []int{12, 24}
	}
	r, err := heattest.Run(t.Context(), solve, &s)
	require.NoError(t, err)
	var list []string
	for _, res := range r.Results {
		for _, f := range res.Failures() {
			list = append(list, f.Case+": "+f.What)
		}
	}
	return list
}

// firstOrderFlux replaces the flux by the difference between wall and first
// cell.
func firstOrderFlux(ctx context.Context, p heattest.Problem) (heattest.Answer, error) {
	a, err := ours(ctx, p)
	if err != nil {
		return a, err
	}
	s, err := a.Temperature.Sample(p.Grid)
	x := p.XCentres()
	q := make([]float64, len(x))
	for i := range q {
		q[i] = p.Conductivity(x[i], 0) * (p.WallValue(exact.Bottom, x[i], p.Duration) - s.Value[i]) / (0.5 * p.Z[1])
	}
	a.Flux = [4]heattest.Field{exact.Bottom: heattest.Profile(x, q)}
	return a, err
}

// Bugs as they happen, planted around our own solver, and what the kit says.
func TestPlantedBugsAreCaught(t *testing.T) {
	const cell, still, mixed = "cell between insulating sides", "half-space", "manufactured, mixed"
	implicit := heat.Settings{Scheme: heat.Implicit}
	change := func(edit func(p *heattest.Problem)) heattest.Solver {
		return func(ctx context.Context, p heattest.Problem) (heattest.Answer, error) {
			edit(&p)
			return ours(ctx, p)
		}
	}
	tests := map[string]struct {
		solver heattest.Solver
		cases  []string
		want   []string
	}{
		"none": {ours, []string{cell, still, mixed}, nil},
		"flow backwards": {
			adapter{settings: implicit, plant: func(_ *heat.Equation, flow *staggered.Flow) {
				for _, v := range [][]float64{flow.VX, flow.VZ} {
					for i := range v {
						v[i] = -v[i]
					}
				}
			}}.solve, []string{cell},
			[]string{cell + ": order of temperature", cell + ": order of flux"},
		},
		"flow with sinks": {
			adapter{settings: implicit, plant: func(_ *heat.Equation, flow *staggered.Flow) {
				g := flow.Grid
				for k := range g.NZ() {
					for i := range g.NX() + 1 {
						flow.VX[k*(g.NX()+1)+i] *= 1 + 0.1*g.ZCentres()[k]/g.Height()
					}
				}
			}}.solve, []string{cell},
			[]string{cell + ": order of temperature", cell + ": order of flux", cell + ": mirrored in z",
				cell + ": warmer by a constant", cell + ": uniform temperature"},
		},
		"heat leaks": {
			adapter{settings: implicit, spoil: func(temperature *staggered.Scalar) {
				for i := range temperature.Values {
					temperature.Values[i] *= 0.9999
				}
			}}.solve, []string{still},
			[]string{still + ": order of temperature", still + ": order of flux", still + ": warmer by a constant",
				still + ": uniform temperature", still + ": heat budget"},
		},
		"flux of first order": {firstOrderFlux, []string{"throughflow"}, []string{"throughflow: order of flux"}},
		"flux of the wrong sign": {
			change(func(p *heattest.Problem) {
				value := p.WallValue
				p.WallValue = func(side exact.Side, s, t float64) float64 {
					if side == exact.Top {
						return -value(side, s, t)
					}
					return value(side, s, t)
				}
			}), []string{"geotherm"},
			[]string{"geotherm: order of temperature", "geotherm: order of flux", "geotherm: mirrored in z"},
		},
		"capacity left out": {
			change(func(p *heattest.Problem) { p.HeatCapacity = func(_, _ float64) float64 { return 1 } }),
			[]string{mixed}, []string{mixed + ": order of temperature", mixed + ": order of flux", mixed + ": in other units"},
		},
		"conductivity of the neighbour": {
			adapter{settings: implicit, plant: func(eq *heat.Equation, _ *staggered.Flow) {
				for k := range eq.Grid.NZ() {
					row := eq.Conductivity.Row(k)
					copy(row[1:], row)
				}
			}}.solve, []string{mixed},
			[]string{mixed + ": order of temperature", mixed + ": order of flux", mixed + ": mirrored in x"},
		},
		"insulation for surroundings": {
			change(func(p *heattest.Problem) { p.Transfer = 0 }), []string{"half-space in surroundings"},
			[]string{"half-space in surroundings: order of temperature", "half-space in surroundings: order of flux"},
		},
		"budget without sources": {
			func(ctx context.Context, p heattest.Problem) (heattest.Answer, error) {
				a, err := ours(ctx, p)
				if err == nil {
					a.Budget.Gained -= p.Source(0.5, 0.5, 0)
				}
				return a, err
			}, []string{"geotherm"}, []string{"geotherm: heat budget"},
		},
		"wiggles": {
			func(ctx context.Context, p heattest.Problem) (heattest.Answer, error) {
				a, err := ours(ctx, p)
				if err != nil {
					return a, err
				}
				s, err := a.Temperature.Sample(p.Grid)
				s.Value[0] *= 1.1
				return a, err
			}, []string{"contact"},
			[]string{"contact: order of temperature", "contact: mirrored in x", "contact: mirrored in z", "contact: warmer by a constant",
				"contact: uniform temperature", "contact: maximum principle"},
		},
	}
	for name, tt := range tests {
		t.Run(name, func(t *testing.T) {
			assert.Equal(t, tt.want, failures(t, tt.solver, heattest.Settings{Slack: 0.4}, tt.cases...))
		})
	}
}

// Sources from the start of each step instead of its middle cost an order in
// time, which shows when steps are long.
func TestFirstOrderInTimeIsCaught(t *testing.T) {
	late := func(ctx context.Context, p heattest.Problem) (heattest.Answer, error) {
		source, step := p.Source, p.Duration/float64(max(1, p.Steps))
		p.Source = func(x, z, t float64) float64 { return source(x, z, t-0.5*step) }
		return ours(ctx, p)
	}
	long := heattest.Settings{Cells: []int{24, 48}, StepsPerCell: 0.25}
	const name = "cell between isothermal sides"
	assert.Empty(t, failures(t, ours, long, name))
	assert.Contains(t, failures(t, late, long, name), name+": order of temperature")
	first := long
	first.Expect = func(c exact.Case) heattest.Orders { return heattest.Expected(c).AtMost(1) }
	assert.Empty(t, failures(t, late, first, name))
}

func TestDeclinedCasesAreSkipped(t *testing.T) {
	stepsOnly := func(ctx context.Context, p heattest.Problem) (heattest.Answer, error) {
		if p.Steady() {
			return heattest.Answer{}, fmt.Errorf("time steps only: %w", errors.ErrUnsupported)
		}
		return ours(ctx, p)
	}
	set := &heattest.Settings{Cells: []int{12, 24}, Cases: cases(t, "geotherm", "box mode")}
	r, err := heattest.Run(t.Context(), stepsOnly, set)
	require.NoError(t, err)
	require.NoError(t, r.Err())
	require.ErrorIs(t, r.Results[0].Skipped, errors.ErrUnsupported)
	set.Cases = cases(t, "geotherm")
	require.ErrorContains(t, heattest.Check(t.Context(), stepsOnly, set), "heattest: the solver declined every case")
}

func TestDeclinedTwinsAreLeftOut(t *testing.T) {
	asked := 0
	twiceOnly := func(ctx context.Context, p heattest.Problem) (heattest.Answer, error) {
		if asked++; asked > 2 {
			return heattest.Answer{}, errors.ErrUnsupported
		}
		return ours(ctx, p)
	}
	r, err := heattest.Run(t.Context(), twiceOnly, &heattest.Settings{Cells: []int{12, 24}, Cases: cases(t, "box mode")})
	require.NoError(t, err)
	require.NoError(t, r.Err())
	assert.Len(t, r.Results[0].Checks, 2) // budget and maximum principle
}

func TestBadAnswersAreErrors(t *testing.T) {
	broken := errors.New("out of memory")
	for want, change := range map[string]func(a *heattest.Answer, p heattest.Problem) error{
		"box mode: on 6x6 cells: out of memory":      func(*heattest.Answer, heattest.Problem) error { return broken },
		"mirrored in x: on 6x6 cells: out of memory": func(_ *heattest.Answer, p heattest.Problem) error { return afterTwo(p, broken) },
		"Answer.Temperature: not given":              func(a *heattest.Answer, _ heattest.Problem) error { a.Temperature = heattest.Field{}; return nil },
		"Answer.Flux[bottom]: 2 values at 3 coordinates": func(a *heattest.Answer, _ heattest.Problem) error {
			a.Flux[exact.Bottom] = heattest.Profile([]float64{0.1, 0.2, 0.3}, []float64{1, 2})
			return nil
		},
		"Answer.Flux[left]: a field in the box, want a profile": func(a *heattest.Answer, _ heattest.Problem) error {
			a.Flux[exact.Left] = a.Temperature
			return nil
		},
		"Answer.Temperature: NaN at (0.5, 0.5), want a finite number": func(a *heattest.Answer, _ heattest.Problem) error {
			a.Temperature = heattest.Points([]float64{0.5}, []float64{0.5}, []float64{math.NaN()})
			return nil
		},
	} {
		asks = 0
		solve := func(ctx context.Context, p heattest.Problem) (heattest.Answer, error) {
			a, err := ours(ctx, p)
			return a, errors.Join(err, change(&a, p))
		}
		err := heattest.Check(t.Context(), solve, &heattest.Settings{Cells: []int{6, 12}, Cases: cases(t, "box mode")})
		require.ErrorContains(t, err, want)
		f, ok := errors.AsType[*heattest.Failure](err)
		require.True(t, ok)
		assert.Equal(t, "box mode", f.Case)
	}
}

// asks counts problems for afterTwo, which fails from the third on.
var asks int

func afterTwo(_ heattest.Problem, err error) error {
	if asks++; asks > 2 {
		return err
	}
	return nil
}

func TestSettingsAreChecked(t *testing.T) {
	for want, s := range map[string]heattest.Settings{
		"Settings.Cells is [16], want two or more":         {Cells: []int{16}},
		"Settings.Cells is [16 16]":                        {Cells: []int{16, 16}},
		"Settings.Cells is [0 16]":                         {Cells: []int{0, 16}},
		"Settings.Cells is [32 16]":                        {Cells: []int{32, 16}},
		"Settings.Stretch is 0.5, want between 1 and 1000": {Stretch: 0.5},
		"Settings.StepsPerCell is -1, want > 0":            {StepsPerCell: -1},
		"Settings.Slack is +Inf, want > 0 and finite":      {Slack: math.Inf(1)},
		"Settings.Tolerance is NaN, want > 0":              {Tolerance: math.NaN()},
		"Settings.Overshoot is -1, want > 0":               {Overshoot: -1},
		"Settings.Cases: exact: Case.Solution of \"x\"":    {Cases: []exact.Case{{Name: "x"}}},
	} {
		require.ErrorContains(t, heattest.Check(t.Context(), ours, &s), "heattest: "+want)
	}
	require.ErrorContains(t, heattest.Check(t.Context(), nil, nil), "heattest: the solver is nil")
}

// The settings written out are the same as none.
func TestDefaults(t *testing.T) {
	two := cases(t, "box mode", "geotherm")
	var seen []string
	written := heattest.Settings{
		Cases: two, Cells: heattest.DefaultCells(), StepsPerCell: heattest.DefaultStepsPerCell, Stretch: 1,
		Expect: heattest.Expected, Slack: heattest.DefaultSlack, Tolerance: heattest.DefaultTolerance,
		Overshoot: heattest.DefaultOvershoot,
		Monitor:   func(r heattest.Result) { seen = append(seen, r.Name) },
	}
	a, err := heattest.Run(t.Context(), ours, &written)
	require.NoError(t, err)
	b, err := heattest.Run(t.Context(), ours, &heattest.Settings{Cases: two})
	require.NoError(t, err)
	assert.Equal(t, a.String(), b.String())
	assert.Equal(t, []string{"box mode", "geotherm"}, seen)
	assert.Equal(t, []string{"12x12", "24x24", "48x48"}, a.Results[0].Grids)
}

func TestCancellationKeepsWhatIsFinished(t *testing.T) {
	ctx, cancel := context.WithCancel(t.Context())
	set := &heattest.Settings{Cells: []int{6, 12}, Cases: cases(t, "box mode", "geotherm"),
		Monitor: func(heattest.Result) { cancel() }}
	r, err := heattest.Run(ctx, ours, set)
	require.ErrorIs(t, err, context.Canceled)
	require.ErrorContains(t, err, "heattest: stopped at geotherm")
	require.Len(t, r.Results, 1)
}
