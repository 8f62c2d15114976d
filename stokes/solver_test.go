package stokes_test

import (
	"context"
	"errors"
	"fmt"
	"math"
	"slices"
	"testing"

	"example.org/overturn/stokes"
	"example.org/overturn/stokes/staggered"
	"github.com/stretchr/testify/require"
)

func uniform(t testing.TB, nx, nz int, width, height float64) *staggered.Grid {
	t.Helper()
	g, err := staggered.Uniform(nx, nz, width, height)
	require.NoError(t, err)
	return g
}

// plume is a buoyancy and a viscosity that falls with temperature by the given
// contrast, in a box of any size.
func plume(g *staggered.Grid, contrast float64) (*staggered.Scalar, *staggered.Vector) {
	temperature := func(x, z float64) float64 {
		x, z = x/g.Width(), z/g.Height()
		return 1 - z + 0.2*math.Cos(pi*x)*math.Sin(pi*z)
	}
	eta, force := staggered.NewScalar(g), staggered.NewVector(g)
	eta.Fill(func(x, z float64) float64 { return math.Pow(contrast, -temperature(x, z)) })
	force.Fill(nil, temperature)
	return eta, force
}

func requireSameBits(t *testing.T, want, got []float64, what string) {
	t.Helper()
	for i := range want {
		if math.Float64bits(want[i]) != math.Float64bits(got[i]) {
			t.Fatalf("%s[%d] is %v, want %v to the bit", what, i, got[i], want[i])
		}
	}
}

func requireSameFlow(t *testing.T, want, got *staggered.Flow) {
	t.Helper()
	requireSameBits(t, want.VX, got.VX, "VX")
	requireSameBits(t, want.VZ, got.VZ, "VZ")
	requireSameBits(t, want.P, got.P, "P")
}

func TestAnySize(t *testing.T) {
	sizes := [][2]int{{1, 1}, {1, 7}, {7, 1}, {2, 2}, {4, 3}, {3, 100}, {8, 200}, {200, 2}, {63, 41}, {200, 77}, {129, 65}, {47, 47}}
	walls := map[string]stokes.Walls{
		"free slip": {},
		"no slip":   {Left: stokes.NoSlip, Right: stokes.NoSlip, Bottom: stokes.NoSlip, Top: stokes.NoSlip},
		"periodic":  {Left: stokes.Periodic, Right: stokes.Periodic, Bottom: stokes.NoSlip},
		"sliding":   {Left: stokes.Periodic, Right: stokes.Periodic},
	}
	widths := []float64{1, 10}
	if testing.Short() {
		sizes, widths = sizes[:6], widths[1:]
	}
	for name, w := range walls {
		for _, n := range sizes {
			for _, width := range widths {
				g := uniform(t, n[0], n[1], width, 1)
				eta, force := plume(g, 1e4)
				_, r := solve(t, g, w, eta, force, nil)
				if r.Iterations > 12 {
					t.Errorf("%s, %dx%d cells, width %v: %v", name, n[0], n[1], width, r)
				}
			}
		}
	}
}

func TestIterationsDoNotGrowWithTheGrid(t *testing.T) {
	sizes := []int{64, 128}
	if !testing.Short() {
		sizes = append(sizes, 256, 512)
	}
	for _, contrast := range []float64{1, 1e6} {
		for _, n := range sizes {
			g := uniform(t, n, n, 1, 1)
			eta, force := plume(g, contrast)
			_, r := solve(t, g, stokes.Walls{}, eta, force, &stokes.Settings{Method: stokes.Multigrid})
			t.Logf("contrast %.0e, %dx%d cells: %v", contrast, n, n, r)
			if r.Iterations > 8 {
				t.Errorf("contrast %.0e, %dx%d cells: %v, want at most 8 iterations", contrast, n, n, r)
			}
		}
	}
}

func TestFlatAndGradedCells(t *testing.T) {
	graded := func(gr staggered.Grading) *staggered.Grid {
		g, err := staggered.Graded(96, 96, 1, 1, gr)
		require.NoError(t, err)
		return g
	}
	for name, g := range map[string]*staggered.Grid{
		"aspect 30":       uniform(t, 96, 96, 30, 1),
		"aspect 1/30":     uniform(t, 96, 96, 1, 30),
		"bottom 10":       graded(staggered.Grading{Bottom: 10}),
		"both ends 10":    graded(staggered.Grading{Bottom: 10, Top: 10}),
		"all walls 10":    graded(staggered.Grading{Left: 10, Right: 10, Bottom: 10, Top: 10}),
		"left and top 30": graded(staggered.Grading{Left: 30, Top: 30}),
	} {
		eta, force := plume(g, 1e4)
		_, r := solve(t, g, stokes.Walls{Bottom: stokes.NoSlip}, eta, force, nil)
		t.Logf("%s: %v", name, r)
		if r.Iterations > 12 {
			t.Errorf("%s: %v, want at most 12 iterations", name, r)
		}
	}
}

func TestMirroredProblemHasMirroredAnswer(t *testing.T) {
	const nx, nz = 50, 37
	g := uniform(t, nx, nz, 1.3, 1)
	mirror := func(f func(x, z float64) float64) func(x, z float64) float64 {
		return func(x, z float64) float64 { return f(1.3-x, z) }
	}
	viscosity := func(x, z float64) float64 { return math.Exp(3*math.Sin(4*x) + 2*z) }
	fz := func(x, z float64) float64 { return math.Exp(x) * math.Sin(5*z+x) }
	tight := &stokes.Settings{Tolerance: 1e-12}
	run := func(w stokes.Walls, viscosity, fz func(x, z float64) float64) *staggered.Flow {
		eta, force := staggered.NewScalar(g), staggered.NewVector(g)
		eta.Fill(viscosity)
		force.Fill(nil, fz)
		flow, _ := solve(t, g, w, eta, force, tight)
		return flow
	}
	a := run(stokes.Walls{Left: stokes.NoSlip, Top: stokes.NoSlip}, viscosity, fz)
	b := run(stokes.Walls{Right: stokes.NoSlip, Top: stokes.NoSlip}, mirror(viscosity), mirror(fz))
	v, p := a.MaxSpeed(), a.Pressure().RMS()
	for k := range nz {
		for i := range nx + 1 {
			require.InDelta(t, a.VX[k*(nx+1)+i], -b.VX[k*(nx+1)+nx-i], 1e-9*v)
		}
		for i := range nx {
			require.InDelta(t, a.P[k*nx+i], b.P[k*nx+nx-1-i], 1e-9*p)
			require.InDelta(t, a.VZ[k*nx+i], b.VZ[k*nx+nx-1-i], 1e-9*v)
		}
	}
}

func TestPowersOfTwoScaleToTheBit(t *testing.T) {
	g := uniform(t, 40, 40, 1, 1)
	eta, force := plume(g, 1e5)
	want, _ := solve(t, g, stokes.Walls{}, eta, force, nil)
	for i := range eta.Values {
		eta.Values[i] *= 0x1p71
	}
	for i := range force.Z {
		force.Z[i] *= 0x1p13
	}
	got, _ := solve(t, g, stokes.Walls{}, eta, force, nil)
	for i := range got.VX {
		got.VX[i] *= 0x1p58
	}
	for i := range got.VZ {
		got.VZ[i] *= 0x1p58
	}
	for i := range got.P {
		got.P[i] *= 0x1p-13
	}
	requireSameFlow(t, want, got)
}

func TestUnitsDoNotMatter(t *testing.T) {
	// A layer in SI units: 24 km deep, 1e14 Pa s and so on.
	g, si := uniform(t, 48, 32, 1.5, 1), uniform(t, 48, 32, 36e3, 24e3)
	eta, force := plume(g, 1e3)
	etaSI, forceSI := plume(si, 1e3)
	for i := range etaSI.Values {
		etaSI.Values[i] *= 3.7e14
	}
	for i := range forceSI.Z {
		forceSI.Z[i] *= 2.9
	}
	want, a := solve(t, g, stokes.Walls{Bottom: stokes.NoSlip}, eta, force, nil)
	got, b := solve(t, si, stokes.Walls{Bottom: stokes.NoSlip}, etaSI, forceSI, nil)
	require.Equal(t, a.Iterations, b.Iterations)
	factor := 3.7e14 / 2.9 / 24e3 / 24e3
	scale := want.MaxSpeed()
	for i := range want.VZ {
		require.InDelta(t, want.VZ[i], got.VZ[i]*factor, 1e-11*scale)
	}
}

func TestWorkersDoNotChangeBits(t *testing.T) {
	for k, w := range []stokes.Walls{{}, {Left: stokes.Periodic, Right: stokes.Periodic, Top: stokes.NoSlip}, {Bottom: stokes.NoSlip}} {
		g := uniform(t, 96, 150, 1, 1.5)
		eta, force := plume(g, 1e4)
		if k < 2 {
			for k := 44; k < 56; k++ { // jumps are relaxed in parallel too
				for i := 34; i < 46; i++ {
					eta.Values[k*96+i] = 1e4
				}
			}
		}
		var want *staggered.Flow
		for _, workers := range []int{1, 2, 3, 7} {
			got, _ := solve(t, g, w, eta, force, &stokes.Settings{Workers: workers})
			if want == nil {
				want = got
			}
			requireSameFlow(t, want, got)
		}
	}
}

func TestDissipationIsTheWorkOfTheForce(t *testing.T) {
	for _, c := range cases()[:2] {
		g, err := staggered.Graded(40, 50, 1, 1, staggered.Grading{Right: 3, Top: 2})
		require.NoError(t, err)
		eta, force := c.flow.viscosity(g), c.flow.force(g)
		sv, err := stokes.NewSolver(g, c.walls, &stokes.Settings{Tolerance: 1e-11})
		require.NoError(t, err)
		flow := staggered.NewFlow(g)
		_, err = sv.Solve(context.Background(), flow, eta, force)
		require.NoError(t, err)
		density := staggered.NewScalar(g)
		total, err := sv.DissipationTo(density, flow, eta)
		require.NoError(t, err)
		require.InEpsilon(t, force.Dot(flow.Velocity()), total, 1e-9, c.name)
		require.InEpsilon(t, density.Integral(), total, 1e-13, c.name)
		alone, err := sv.DissipationTo(nil, flow, eta)
		require.NoError(t, err)
		require.Equal(t, total, alone)
	}
}

func TestApplyIsMinusTheForceOfTheAnswer(t *testing.T) {
	for _, c := range cases() {
		g := uniform(t, 30, 40, 1, 1)
		eta, force := c.flow.viscosity(g), c.flow.force(g)
		sv, err := stokes.NewSolver(g, c.walls, &stokes.Settings{Tolerance: 1e-12})
		require.NoError(t, err)
		flow := staggered.NewFlow(g)
		_, err = sv.Solve(context.Background(), flow, eta, force)
		require.NoError(t, err)
		got := staggered.NewVector(g)
		require.NoError(t, sv.ApplyTo(got, flow, eta))
		scale := math.Sqrt(force.Dot(force))
		shift := 0.0 // what the solver takes out of a force on a sliding layer
		if c.name == "periodic, sliding" {
			shift = force.X[5*31+3] + got.X[5*31+3]
			require.Less(t, math.Abs(shift), 1e-3*scale)
		}
		for k := range 40 {
			for i := range 30 {
				if j := k*31 + i; i > 0 {
					require.InDelta(t, shift-force.X[j], got.X[j], 1e-7*scale, "%s: X at %d, %d", c.name, i, k)
				}
				if j := k*30 + i; k > 0 {
					require.InDelta(t, -force.Z[j], got.Z[j], 1e-7*scale, "%s: Z at %d, %d", c.name, i, k)
				}
			}
		}
	}
}

func TestSourceMakesDivergence(t *testing.T) {
	g := uniform(t, 32, 48, 1, 1)
	source := staggered.NewScalar(g)
	source.Fill(func(x, z float64) float64 { return math.Cos(pi*x)*math.Cos(2*pi*z) + 0.5 })
	// The net source leaves through the top.
	walls := stokes.Walls{Top: stokes.FreeSlip.Through(func(x float64) float64 { return 0.5 })}
	sv, err := stokes.NewSolver(g, walls, nil)
	require.NoError(t, err)
	flow := staggered.NewFlow(g)
	eta, force := plume(g, 100)
	r, err := sv.SolveWithSource(context.Background(), flow, eta, force, source)
	require.NoError(t, err)
	div := staggered.NewScalar(g)
	flow.DivergenceTo(div)
	for i := range div.Values {
		require.InDelta(t, source.Values[i], div.Values[i], 1e-6)
		div.Values[i] -= source.Values[i]
	}
	require.InEpsilon(t, div.RMS(), r.Divergence, 1e-3)

	source.Values[7] += 1
	_, err = sv.SolveWithSource(context.Background(), flow, eta, force, source)
	require.ErrorContains(t, err, "stokes: source makes")
}

func TestWeightAloneMovesNothing(t *testing.T) {
	g := uniform(t, 20, 30, 1, 1)
	force := staggered.NewVector(g)
	force.Fill(func(x, _ float64) float64 { return math.Sin(3 * x) }, func(_, z float64) float64 { return -1e6 * z * z })
	flow, r := solve(t, g, stokes.Walls{}, nil, force, nil)
	require.Zero(t, r.Iterations)
	require.Zero(t, flow.MaxSpeed())
	// ∂P/∂z is the weight.
	require.InEpsilon(t, -1e6*0.25, (flow.P[15*20+4]-flow.P[14*20+4])*30, 1e-9)
}

func TestSmallFlowUnderLargeWeightIsAccurate(t *testing.T) {
	g := uniform(t, 32, 32, 1, 1)
	force := staggered.NewVector(g)
	force.Fill(nil, func(x, z float64) float64 { return math.Cos(pi*x) * math.Sin(pi*z) })
	want, _ := solve(t, g, stokes.Walls{}, nil, force, nil)
	force.Fill(nil, func(x, z float64) float64 { return 1e6*z + math.Cos(pi*x)*math.Sin(pi*z) })
	got, _ := solve(t, g, stokes.Walls{}, nil, force, nil)
	v, _ := difference(want, got)
	require.Less(t, v, 1e-7*want.RMS())
}

func TestWarmStart(t *testing.T) {
	g := uniform(t, 64, 64, 1, 1)
	eta, force := plume(g, 1e3)
	sv, err := stokes.NewSolver(g, stokes.Walls{}, nil)
	require.NoError(t, err)
	flow := staggered.NewFlow(g)
	cold, err := sv.Solve(context.Background(), flow, eta, force)
	require.NoError(t, err)
	again, err := sv.Solve(context.Background(), flow, eta, force)
	require.NoError(t, err)
	require.Zero(t, again.Iterations)
	for i := range force.Z {
		force.Z[i] *= 1 + 1e-4*math.Sin(float64(i))
	}
	warm, err := sv.Solve(context.Background(), flow, eta, force)
	require.NoError(t, err)
	require.Less(t, warm.Iterations, cold.Iterations-1)
	// A guess that makes things worse is thrown away.
	for i := range flow.VX {
		flow.VX[i] = 1e6 * math.Sin(float64(i))
	}
	bad, err := sv.Solve(context.Background(), flow, eta, force)
	require.NoError(t, err)
	require.LessOrEqual(t, bad.Iterations, cold.Iterations+1)
}

func TestReport(t *testing.T) {
	g := uniform(t, 48, 48, 1, 1)
	eta, force := plume(g, 1e6)
	var seen []float64
	sv, err := stokes.NewSolver(g, stokes.Walls{}, &stokes.Settings{Tolerance: 1e-6, Monitor: func(i int, r float64) {
		require.Equal(t, len(seen), i)
		seen = append(seen, r)
	}})
	require.NoError(t, err)
	r, err := sv.Solve(context.Background(), staggered.NewFlow(g), eta, force)
	require.NoError(t, err)
	require.Len(t, r.Residuals, r.Iterations+1)
	require.Equal(t, seen, r.Residuals)
	require.True(t, slices.IsSortedFunc(r.Residuals, func(a, b float64) int { return int(math.Copysign(1, b-a)) }))
	require.LessOrEqual(t, r.Residual, 1e-6)
	require.InEpsilon(t, r.Residuals[r.Iterations], r.Residual, 1e-3, "the recursive residual is the true one")
	require.Positive(t, r.Momentum)
	require.Positive(t, r.Elapsed)
	require.Contains(t, r.String(), fmt.Sprintf("%d iterations", r.Iterations))
	require.Contains(t, sv.String(), "48x48")
}

func TestReportedResidualsAreThoseOfTheEquations(t *testing.T) {
	g, err := staggered.Graded(24, 30, 2, 1, staggered.Grading{Top: 2})
	require.NoError(t, err)
	eta, _ := plume(g, 1e3)
	force := staggered.NewVector(g)
	force.Fill(nil, func(x, z float64) float64 { return math.Cos(pi*x) * z }) // rows and columns add up to zero
	sv, err := stokes.NewSolver(g, stokes.Walls{}, &stokes.Settings{Tolerance: 1e-3})
	require.NoError(t, err)
	flow := staggered.NewFlow(g)
	r, err := sv.Solve(context.Background(), flow, eta, force)
	require.NoError(t, err)
	left := staggered.NewVector(g)
	require.NoError(t, sv.ApplyTo(left, flow, eta))
	for i := range 24 { // walls are no unknowns
		force.Z[i], force.Z[30*24+i] = 0, 0
	}
	for i, f := range force.Z {
		left.Z[i] += f
	}
	require.InEpsilon(t, math.Sqrt(left.Dot(left)/force.Dot(force)), r.Momentum, 1e-6)
}

func TestNotConverged(t *testing.T) {
	g := uniform(t, 48, 48, 1, 1)
	eta, force := plume(g, 1e6)
	sv, err := stokes.NewSolver(g, stokes.Walls{}, &stokes.Settings{MaxIterations: 3})
	require.NoError(t, err)
	flow := staggered.NewFlow(g)
	r, err := sv.Solve(context.Background(), flow, eta, force)
	require.ErrorIs(t, err, stokes.ErrNotConverged)
	failure, ok := errors.AsType[*stokes.ConvergenceError](err)
	require.True(t, ok)
	require.Equal(t, 3, failure.Iterations)
	require.Equal(t, r.Residual, failure.Residual)
	require.Equal(t, 1e-8, failure.Tolerance)
	require.Len(t, r.Residuals, 4)
	require.Positive(t, flow.MaxSpeed(), "the best answer so far")
	// It can be taken up where it was left.
	_, err = sv.Solve(context.Background(), flow, eta, force)
	if err != nil {
		_, err = sv.Solve(context.Background(), flow, eta, force)
	}
	require.NoError(t, err)
}

func TestCancelledSolve(t *testing.T) {
	g := uniform(t, 48, 48, 1, 1)
	eta, force := plume(g, 1e6)
	ctx, cancel := context.WithCancel(context.Background())
	sv, err := stokes.NewSolver(g, stokes.Walls{}, &stokes.Settings{Monitor: func(i int, _ float64) {
		if i == 2 {
			cancel()
		}
	}})
	require.NoError(t, err)
	r, err := sv.Solve(ctx, staggered.NewFlow(g), eta, force)
	require.ErrorIs(t, err, context.Canceled)
	require.Equal(t, 2, r.Iterations)
}

func TestSteadySolvesDoNotAllocate(t *testing.T) {
	g := uniform(t, 64, 64, 1, 1)
	eta, force := plume(g, 1e3)
	sv, err := stokes.NewSolver(g, stokes.Walls{}, &stokes.Settings{Workers: 2})
	require.NoError(t, err)
	flow, stress, density, applied := staggered.NewFlow(g), stokes.NewTensor(g), staggered.NewScalar(g), staggered.NewVector(g)
	topography := make([]float64, 64)
	ctx := context.Background()
	allocs := testing.AllocsPerRun(3, func() {
		for i := range eta.Values {
			eta.Values[i] *= 1.01 + 0.001*math.Sin(float64(i))
		}
		clear(flow.VX)
		if _, err := sv.Solve(ctx, flow, eta, force); err != nil {
			t.Fatal(err)
		}
		_ = sv.StressTo(stress, flow, eta)
		_ = sv.StrainRateTo(stress, flow)
		_, _ = sv.DissipationTo(density, flow, eta)
		_, _ = sv.NormalStressTo(topography, staggered.Top, flow, eta)
		_ = sv.ApplyTo(applied, flow, eta)
	})
	require.Zero(t, allocs)
}

func TestSteadySolvesWithStiffBodiesDoNotAllocate(t *testing.T) {
	g := uniform(t, 64, 64, 1, 1)
	eta, force := plume(g, 1)
	eta.Fill(circles(1e4))
	sv, err := stokes.NewSolver(g, stokes.Walls{}, &stokes.Settings{Workers: 2})
	require.NoError(t, err)
	flow := staggered.NewFlow(g)
	ctx := context.Background()
	require.Zero(t, testing.AllocsPerRun(3, func() {
		for i := range eta.Values {
			eta.Values[i] *= 1 + 0.01*math.Sin(float64(i))
		}
		clear(flow.VX)
		clear(flow.VZ)
		clear(flow.P)
		if _, err := sv.Solve(ctx, flow, eta, force); err != nil {
			t.Fatal(err)
		}
	}))
}

func TestBadInputIsAnError(t *testing.T) {
	g := uniform(t, 8, 6, 1, 1)
	other := uniform(t, 6, 8, 1, 1)
	_, err := stokes.NewSolver(nil, stokes.Walls{}, nil)
	require.ErrorContains(t, err, "stokes: grid is nil")
	for _, tt := range []struct {
		walls    stokes.Walls
		settings stokes.Settings
		want     string
	}{
		{stokes.Walls{Left: stokes.Periodic}, stokes.Settings{}, "left wall is periodic and the other side is free slip"},
		{stokes.Walls{Right: stokes.Periodic, Left: stokes.NoSlip}, stokes.Settings{}, "right wall is periodic and the other side is no slip"},
		{stokes.Walls{Top: stokes.Periodic}, stokes.Settings{}, "top wall is periodic, which only left and right can be"},
		{stokes.Walls{Left: stokes.Periodic.Through(func(float64) float64 { return 1 }), Right: stokes.Periodic}, stokes.Settings{}, "left wall is periodic and has a prescribed velocity"},
		{stokes.Walls{Top: stokes.NoSlip.Moving(math.Log)}, stokes.Settings{}, "tangential velocity of the top wall at 0 is -Inf"},
		{stokes.Walls{Left: stokes.NoSlip.Through(func(float64) float64 { return math.NaN() })}, stokes.Settings{}, "normal velocity of the left wall near"},
		{stokes.Walls{}, stokes.Settings{Tolerance: -1}, "Tolerance is -1, want more than 0 and less than 1"},
		{stokes.Walls{}, stokes.Settings{Tolerance: 1}, "Tolerance is 1"},
		{stokes.Walls{}, stokes.Settings{MaxIterations: -1}, "MaxIterations is -1"},
		{stokes.Walls{}, stokes.Settings{MaxBasis: -2}, "MaxBasis is -2"},
		{stokes.Walls{}, stokes.Settings{Workers: -3}, "Workers is -3"},
		{stokes.Walls{}, stokes.Settings{CornerMean: 7}, "CornerMean is Mean(7)"},
	} {
		_, err := stokes.NewSolver(g, tt.walls, &tt.settings)
		require.ErrorContains(t, err, "stokes: ")
		require.ErrorContains(t, err, tt.want)
	}

	sv, err := stokes.NewSolver(g, stokes.Walls{}, nil)
	require.NoError(t, err)
	ctx := context.Background()
	bad := func(v float64) *staggered.Scalar {
		s := staggered.NewScalar(g)
		s.SetAll(1)
		s.Set(3, 2, v)
		return s
	}
	for _, v := range []float64{0, -1, math.NaN(), math.Inf(1)} {
		_, err := sv.Solve(ctx, staggered.NewFlow(g), bad(v), nil)
		require.ErrorContains(t, err, fmt.Sprintf("stokes: viscosity of the cell in column 3, row 2 is %v", v))
	}
	_, err = sv.Solve(ctx, staggered.NewFlow(g), bad(1e16), nil)
	require.ErrorContains(t, err, "viscosity varies from 1 to 1e+16")
	_, err = sv.Solve(ctx, staggered.NewFlow(g), staggered.NewScalar(other), nil)
	require.ErrorContains(t, err, "viscosity is on 6x8")
	_, err = sv.Solve(ctx, nil, nil, nil)
	require.ErrorContains(t, err, "flow is nil")
	_, err = sv.Solve(ctx, staggered.NewFlow(other), nil, nil)
	require.ErrorContains(t, err, "flow is on 6x8")
	_, err = sv.Solve(ctx, staggered.NewFlow(g), nil, staggered.NewVector(other))
	require.ErrorContains(t, err, "force is on 6x8")
	force := staggered.NewVector(g)
	force.Z[5] = math.NaN()
	_, err = sv.Solve(ctx, staggered.NewFlow(g), nil, force)
	require.ErrorContains(t, err, "force.Z[5] is NaN")
	flow := staggered.NewFlow(g)
	flow.P[4] = math.Inf(-1)
	_, err = sv.Solve(ctx, flow, nil, nil)
	require.ErrorContains(t, err, "flow.P[4] is -Inf")
	flow = staggered.NewFlow(g)
	flow.VX = flow.VX[1:]
	_, err = sv.Solve(ctx, flow, nil, nil)
	require.ErrorContains(t, err, "flow.VX holds 53 numbers, want 54")

	leaky, err := stokes.NewSolver(g, stokes.Walls{Top: stokes.FreeSlip.Through(func(float64) float64 { return 1 })}, nil)
	require.NoError(t, err)
	_, err = leaky.Solve(ctx, staggered.NewFlow(g), nil, nil)
	require.ErrorContains(t, err, "stokes: normal velocities of the walls let out 1 more than they let in (of 1 in all)")

	layer, err := stokes.NewSolver(g, stokes.Walls{Left: stokes.Periodic, Right: stokes.Periodic}, nil)
	require.NoError(t, err)
	force = staggered.NewVector(g)
	force.SetAll(1, 0)
	_, err = layer.Solve(ctx, staggered.NewFlow(g), nil, force)
	require.ErrorContains(t, err, "horizontal force on a periodic layer between free-slip walls adds up to 1")
	_, err = layer.NormalStressTo(nil, staggered.Left, staggered.NewFlow(g), nil)
	require.ErrorContains(t, err, "side is left, which is periodic")
}

func TestDefaults(t *testing.T) {
	g := uniform(t, 40, 24, 1, 1)
	eta, force := plume(g, 1e4)
	want, a := solve(t, g, stokes.Walls{}, eta, force, nil)
	got, b := solve(t, g, stokes.Walls{}, eta, force, &stokes.Settings{
		Tolerance: stokes.DefaultTolerance, MaxIterations: stokes.DefaultMaxIterations,
		MaxBasis: stokes.DefaultMaxBasis, CornerMean: stokes.Geometric})
	requireSameFlow(t, want, got)
	require.Equal(t, a.Iterations, b.Iterations)
	require.Equal(t, "geometric, arithmetic, harmonic", fmt.Sprintf("%v, %v, %v", stokes.Geometric, stokes.Arithmetic, stokes.Harmonic))
}

func TestTransformAgreesWithMultigrid(t *testing.T) {
	for _, w := range []stokes.Walls{
		{},
		{Bottom: stokes.NoSlip},
		{Bottom: stokes.NoSlip, Top: stokes.NoSlip.Moving(func(x float64) float64 { return math.Sin(pi * x) })},
		{Left: stokes.Periodic, Right: stokes.Periodic},
		{Left: stokes.Periodic, Right: stokes.Periodic, Bottom: stokes.NoSlip},
		{Left: stokes.Periodic, Right: stokes.Periodic, Bottom: stokes.NoSlip, Top: stokes.NoSlip.Moving(func(x float64) float64 { return 1 })},
	} {
		g, err := staggered.Graded(36, 53, 1, 1, staggered.Grading{Bottom: 3})
		require.NoError(t, err)
		force := staggered.NewVector(g)
		force.Fill(func(x, z float64) float64 { return math.Sin(2*pi*x) * z }, func(x, z float64) float64 { return math.Cos(2*pi*x+1) * math.Sin(pi*z) })
		if w.Bottom.String() == "no slip" {
			force.Fill(func(x, z float64) float64 { return 1 + math.Sin(2*pi*x)*z }, nil)
		}
		eta := staggered.NewScalar(g)
		eta.Fill(func(_, z float64) float64 { return math.Exp(5 * math.Sin(4*z)) })
		tight := stokes.Settings{Tolerance: 1e-11, Method: stokes.Transform}
		a, ra := solve(t, g, w, eta, force, &tight)
		tight.Method = stokes.Multigrid
		b, rb := solve(t, g, w, eta, force, &tight)
		t.Log(ra, rb)
		v, p := difference(a, b)
		require.Less(t, v, 1e-9*b.RMS())
		require.Less(t, p, 1e-9*b.Pressure().RMS())
	}
}

func TestTransformReports(t *testing.T) {
	g := uniform(t, 96, 200, 1, 1)
	_, force := plume(g, 1)
	_, r := solve(t, g, stokes.Walls{}, nil, force, &stokes.Settings{Tolerance: 1e-11})
	require.Equal(t, stokes.Transform, r.Method)
	require.Greater(t, r.Iterations, 1, "refined")
	require.Len(t, r.Residuals, r.Iterations+1)
	require.Equal(t, 1.0, r.Residuals[0])
	require.Equal(t, r.Residual, r.Residuals[r.Iterations])
	ctx, cancel := context.WithCancel(context.Background())
	cancel()
	sv, err := stokes.NewSolver(g, stokes.Walls{}, nil)
	require.NoError(t, err)
	_, err = sv.Solve(ctx, staggered.NewFlow(g), nil, force)
	require.ErrorIs(t, err, context.Canceled)
}

func TestWallsHaveNames(t *testing.T) {
	f := func(float64) float64 { return 0 }
	for want, w := range map[string]stokes.Wall{
		"free slip": stokes.FreeSlip, "no slip": stokes.NoSlip, "periodic": stokes.Periodic,
		"moving": stokes.FreeSlip.Moving(f), "free slip, through-flow": stokes.FreeSlip.Through(f),
		"moving, through-flow": stokes.NoSlip.Through(f).Moving(f),
	} {
		require.Equal(t, want, w.String())
	}
}

// Gauss quadrature with four points is exact to the seventh degree.
func TestThroughFlowIsTheMeanOverEachFace(t *testing.T) {
	g := uniform(t, 2, 3, 1, 1)
	f := func(z float64) float64 { return 8 * math.Pow(z, 7) }
	sv, err := stokes.NewSolver(g, stokes.Walls{Left: stokes.NoSlip.Through(f), Right: stokes.NoSlip.Through(f)}, nil)
	require.NoError(t, err)
	flow := staggered.NewFlow(g)
	_, err = sv.Solve(context.Background(), flow, nil, nil)
	require.NoError(t, err)
	for k, z := range []float64{0, 1. / 3, 2. / 3} {
		want := 3 * (math.Pow(z+1./3, 8) - math.Pow(z, 8))
		require.InDelta(t, want, flow.VX[3*k], 1e-14)
		require.InDelta(t, want, flow.VX[3*k+2], 1e-14)
	}
}

func TestMethodIsChosen(t *testing.T) {
	g, prime := uniform(t, 32, 24, 1, 1), uniform(t, 37, 24, 1, 1)
	eta, force := plume(g, 10)
	_, r := solve(t, g, stokes.Walls{}, nil, force, nil)
	require.Equal(t, stokes.Transform, r.Method)
	_, r = solve(t, g, stokes.Walls{}, eta, force, nil)
	require.Equal(t, stokes.Multigrid, r.Method)
	_, r = solve(t, g, stokes.Walls{Left: stokes.NoSlip}, nil, force, nil)
	require.Equal(t, stokes.Multigrid, r.Method)
	_, force = plume(prime, 1)
	_, r = solve(t, prime, stokes.Walls{}, nil, force, nil)
	require.Equal(t, stokes.Multigrid, r.Method)
	sv, err := stokes.NewSolver(g, stokes.Walls{}, &stokes.Settings{Method: stokes.Transform})
	require.NoError(t, err)
	_, err = sv.Solve(context.Background(), staggered.NewFlow(g), eta, nil)
	require.ErrorContains(t, err, "stokes: Method is transform, which does not apply: the viscosity varies along x")
	require.Equal(t, "automatic, multigrid, transform", fmt.Sprintf("%v, %v, %v", stokes.Automatic, stokes.Multigrid, stokes.Transform))
}
