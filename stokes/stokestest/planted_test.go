package stokestest_test

import (
	"context"
	"errors"
	"fmt"
	"math"
	"testing"

	"example.org/overturn/stokes"
	"example.org/overturn/stokes/exact"
	"example.org/overturn/stokes/staggered"
	"example.org/overturn/stokes/stokestest"
	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// failures runs the kit on some cases and returns what it found.
func failures(t *testing.T, solve stokestest.Solver, s stokestest.Settings, names ...string) []string {
	t.Helper()
	s.Cases = cases(t, names...)
	if s.Cells == nil {
		s.Cells = []int{16, 32}
	}
	r, err := stokestest.Run(t.Context(), solve, &s)
	require.NoError(t, err)
	var list []string
	for _, res := range r.Results {
		for _, f := range res.Failures() {
			list = append(list, f.Case+": "+f.What)
		}
	}
	return list
}

// Bugs as they happen, planted in our own solver, and what the kit says.
func TestPlantedBugsAreCaught(t *testing.T) {
	const free, fixed = "manufactured, free slip", "manufactured, no slip"
	tests := map[string]struct {
		solver stokestest.Solver
		cases  []string
		want   []string
	}{
		"none": {ours, []string{free, fixed}, nil},
		"force upside down": {
			adapter{plant: func(_ *staggered.Scalar, force *staggered.Vector) {
				for i := range force.Z {
					force.Z[i] = -force.Z[i]
				}
			}}.solve, []string{free},
			[]string{free + ": order of velocity", free + ": order of pressure", free + ": order of stress"},
		},
		"viscosity of the neighbour": {
			adapter{plant: func(eta *staggered.Scalar, _ *staggered.Vector) {
				for k := range eta.Grid.NZ() {
					row := eta.Row(k)
					copy(row[1:], row)
				}
			}}.solve, []string{fixed},
			[]string{fixed + ": order of velocity", fixed + ": order of pressure", fixed + ": order of stress", fixed + ": mirrored in x"},
		},
		"viscosity averaged along rows": {
			adapter{plant: func(eta *staggered.Scalar, _ *staggered.Vector) {
				for k, mean := range eta.HorizontalMeans(nil) {
					for i := range eta.Row(k) {
						eta.Row(k)[i] = mean
					}
				}
			}}.solve, []string{free},
			[]string{free + ": order of velocity", free + ": order of pressure", free + ": order of stress"},
		},
		"every wall free": {
			func(ctx context.Context, p stokestest.Problem) (stokestest.Answer, error) {
				p.Walls = exact.Walls{}
				return ours(ctx, p)
			}, []string{fixed},
			[]string{fixed + ": order of velocity", fixed + ": order of pressure", fixed + ": order of stress"},
		},
		"absolute tolerance": {
			adapter{spoil: func(flow *staggered.Flow) {
				for i, v := range flow.VX {
					flow.VX[i] = math.Round(v*1e12) / 1e12
				}
			}}.solve, []string{fixed},
			[]string{fixed + ": in other units"},
		},
		"fluid lost": {
			adapter{spoil: func(flow *staggered.Flow) {
				nx := flow.Grid.NX()
				for i := range flow.VX {
					flow.VX[i] *= 1 + 1e-4*float64(i%(nx+1))
				}
			}}.solve, []string{"box mode"},
			[]string{"box mode: order of velocity", "box mode: order of stress", "box mode: mirrored in x", "box mode: divergence",
				"box mode: work and dissipation"},
		},
		"work in half of the box": {
			func(ctx context.Context, p stokestest.Problem) (stokestest.Answer, error) {
				a, err := ours(ctx, p)
				a.Work *= 0.5
				return a, err
			}, []string{"box mode", "spreading plates"}, // between driven walls the two differ
			[]string{"box mode: work and dissipation"},
		},
		"pressure of the wrong sign in the stress": {
			func(ctx context.Context, p stokestest.Problem) (stokestest.Answer, error) {
				a, err := ours(ctx, p)
				a.XX, a.ZZ = a.P, a.P
				return a, err
			}, []string{"box mode"},
			[]string{"box mode: order of stress"},
		},
	}
	for name, tt := range tests {
		t.Run(name, func(t *testing.T) {
			got := failures(t, tt.solver, stokestest.Settings{}, tt.cases...)
			assert.Equal(t, tt.want, got)
		})
	}
}

// Orders at jumps of viscosity do not tell one mean from another, unless the
// code claims the second order that the harmonic mean has there.
func TestWrongMeanOfViscositiesIsCaughtByTheClaim(t *testing.T) {
	claim := stokestest.Settings{
		Cells:  []int{24, 48},
		Expect: func(exact.Case) stokestest.Orders { return stokestest.Orders{Velocity: 2, Pressure: 2} },
	}
	harmonic := adapter{settings: stokes.Settings{CornerMean: stokes.Harmonic}}.solve
	arithmetic := adapter{settings: stokes.Settings{CornerMean: stokes.Arithmetic}}.solve
	const name = "column jump off centre"
	assert.Empty(t, failures(t, harmonic, claim, name))
	assert.Contains(t, failures(t, arithmetic, claim, name), name+": order of velocity")
	assert.Empty(t, failures(t, arithmetic, stokestest.Settings{}, name))
}

// What a code says in its first order it is held to.
func TestAClaimOfFirstOrderIsEnough(t *testing.T) {
	late := adapter{plant: func(eta *staggered.Scalar, _ *staggered.Vector) {
		for k := range eta.Grid.NZ() {
			row := eta.Row(k)
			copy(row[1:], row)
		}
	}}.solve
	got := failures(t, late, stokestest.Settings{
		Cells: []int{24, 48},
		Expect: func(c exact.Case) stokestest.Orders {
			return stokestest.Expected(c).AtMost(1)
		},
	}, "manufactured, no slip")
	assert.Equal(t, []string{"manufactured, no slip: mirrored in x"}, got)
}

func TestDeclinedCasesAreSkipped(t *testing.T) {
	freeSlip := func(ctx context.Context, p stokestest.Problem) (stokestest.Answer, error) {
		if p.Walls != (exact.Walls{}) {
			return stokestest.Answer{}, fmt.Errorf("%v below: %w", p.Walls.Bottom, errors.ErrUnsupported)
		}
		return ours(ctx, p)
	}
	set := &stokestest.Settings{Cells: []int{16, 32}, Cases: cases(t, "channel", "box mode")}
	r, err := stokestest.Run(t.Context(), freeSlip, set)
	require.NoError(t, err)
	require.NoError(t, r.Err())
	require.ErrorIs(t, r.Results[0].Skipped, errors.ErrUnsupported)
	assert.Contains(t, r.String(), "skipped: on 16x16 cells: no slip below: unsupported operation")
	assert.Contains(t, r.Results[0].String(), "skipped: on 16x16 cells: no slip below")

	set.Cases = cases(t, "channel")
	require.ErrorContains(t, stokestest.Check(t.Context(), freeSlip, set), "stokestest: the solver declined every case")
}

// A code that can only do numbers of a certain size is not asked for others.
func TestDeclinedTwinsAreLeftOut(t *testing.T) {
	smallOnly := func(ctx context.Context, p stokestest.Problem) (stokestest.Answer, error) {
		if width, _ := p.Size(); width > 100 {
			return stokestest.Answer{}, errors.ErrUnsupported
		}
		return ours(ctx, p)
	}
	r, err := stokestest.Run(t.Context(), smallOnly, &stokestest.Settings{Cells: []int{16, 32}, Cases: cases(t, "box mode")})
	require.NoError(t, err)
	require.NoError(t, r.Err())
	var names []string
	for _, c := range r.Results[0].Checks {
		names = append(names, c.Name)
	}
	assert.Equal(t, []string{"mirrored in x", "mirrored in z", "divergence", "work and dissipation"}, names)
}

func TestBadAnswersAreErrors(t *testing.T) {
	broken := errors.New("out of memory")
	for want, change := range map[string]func(a *stokestest.Answer, p stokestest.Problem) error{
		"box mode: on 8x8 cells: out of memory": func(*stokestest.Answer, stokestest.Problem) error { return broken },
		"Answer.VX: not given": func(a *stokestest.Answer, _ stokestest.Problem) error {
			a.VX = stokestest.Field{}
			return nil
		},
		"Answer.VZ: NaN at (0.0625, 0), want a finite number": func(a *stokestest.Answer, p stokestest.Problem) error {
			a.VZ = stokestest.Function(func(_, _ float64) float64 { return 0 })
			vz := make([]float64, 72)
			vz[0] = math.NaN()
			a.VZ = stokestest.Lattice(p.XCentres(), p.Z, vz)
			return nil
		},
		"Answer.P: 72 values on a lattice of 8 by 8, want 64": func(a *stokestest.Answer, p stokestest.Problem) error {
			a.P = stokestest.Lattice(p.XCentres(), p.ZCentres(), make([]float64, 72))
			return nil
		},
		"Answer.XZ: a point at (9, 0), want it in the box of 1 by 1": func(a *stokestest.Answer, _ stokestest.Problem) error {
			a.XZ = stokestest.Points([]float64{9}, []float64{0}, []float64{0})
			return nil
		},
		"Answer.Divergence: -Inf at": func(a *stokestest.Answer, _ stokestest.Problem) error {
			a.Divergence = stokestest.Function(func(_, _ float64) float64 { return math.Inf(-1) })
			return nil
		},
	} {
		solve := func(ctx context.Context, p stokestest.Problem) (stokestest.Answer, error) {
			a, err := ours(ctx, p)
			return a, errors.Join(err, change(&a, p))
		}
		err := stokestest.Check(t.Context(), solve, &stokestest.Settings{Cells: []int{8, 16}, Cases: cases(t, "box mode")})
		require.ErrorContains(t, err, want)
		f, ok := errors.AsType[*stokestest.Failure](err)
		require.True(t, ok)
		assert.Equal(t, "box mode", f.Case)
		assert.Equal(t, want == "box mode: on 8x8 cells: out of memory", errors.Is(err, broken))
	}
}

func TestSettingsAreChecked(t *testing.T) {
	for want, s := range map[string]stokestest.Settings{
		"Settings.Cells is [16], want two or more":         {Cells: []int{16}},
		"Settings.Cells is [16 16]":                        {Cells: []int{16, 16}},
		"Settings.Cells is [0 16]":                         {Cells: []int{0, 16}},
		"Settings.Cells is [32 16], want two or more":      {Cells: []int{32, 16}},
		"Settings.Stretch is 0.5, want between 1 and 1000": {Stretch: 0.5},
		"Settings.Stretch is NaN":                          {Stretch: math.NaN()},
		"Settings.Slack is -1, want > 0":                   {Slack: -1},
		"Settings.Tolerance is -1, want > 0":               {Tolerance: -1},
		"case \"x\" has solution <nil>":                    {Cases: []exact.Case{{Name: "x"}}},
	} {
		require.ErrorContains(t, stokestest.Check(t.Context(), ours, &s), "stokestest: "+want)
	}
	require.ErrorContains(t, stokestest.Check(t.Context(), nil, nil), "stokestest: the solver is nil")
}

// The settings written out are the same as none.
func TestDefaults(t *testing.T) {
	two := cases(t, "box mode", "film on a slope")
	var seen []string
	written := stokestest.Settings{
		Cases: two, Cells: stokestest.DefaultCells(), Stretch: 1, Expect: stokestest.Expected,
		Slack: stokestest.DefaultSlack, Tolerance: stokestest.DefaultTolerance,
		Monitor: func(r stokestest.Result) { seen = append(seen, r.Name) },
	}
	a, err := stokestest.Run(t.Context(), ours, &written)
	require.NoError(t, err)
	b, err := stokestest.Run(t.Context(), ours, &stokestest.Settings{Cases: two})
	require.NoError(t, err)
	assert.Equal(t, a.String(), b.String())
	assert.Equal(t, []string{"box mode", "film on a slope"}, seen)
	assert.Equal(t, []string{"24x24", "48x48", "96x96"}, a.Results[0].Grids)
	assert.Equal(t, 1e-6, a.Results[0].Checks[0].Limit)
}

func TestCancellationKeepsWhatIsFinished(t *testing.T) {
	ctx, cancel := context.WithCancel(t.Context())
	set := &stokestest.Settings{Cells: []int{8, 16}, Cases: cases(t, "box mode", "channel"),
		Monitor: func(stokestest.Result) { cancel() }}
	r, err := stokestest.Run(ctx, ours, set)
	require.ErrorIs(t, err, context.Canceled)
	require.ErrorContains(t, err, "stokestest: stopped at channel")
	require.Len(t, r.Results, 1)
}
