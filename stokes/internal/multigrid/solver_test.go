package multigrid

import (
	"context"
	"math"
	"testing"

	"github.com/stretchr/testify/require"
)

func TestIterations(t *testing.T) {
	for _, tt := range []struct {
		name string
		eta  func(x, z float64) float64
		n    int
		most int
	}{
		{"uniform", func(x, z float64) float64 { return 1 }, 64, 8},
		{"smooth 1e6", exponential(1e6), 64, 8},
		{"smooth 1e10", exponential(1e10), 64, 8},
		{"plane jump 1e6", jump(1e6, 0.5), 64, 9},
		{"plane jump 1e6 between lines", jump(1e6, 0.53), 64, 10},
		{"weak circles", circles(1e-3), 64, 10},
		{"weaker circles", circles(1e-6), 64, 13},
		{"stiff circles", circles(1e3), 64, 12},
		{"stiffer circles", circles(1e4), 64, 13},
		{"stiffest circles", circles(1e6), 128, 20},
	} {
		n, norms := newProblem(square(tt.n), tt.eta).solve(t)
		t.Logf("%s: %d iterations, weighted %.1e, momentum %.1e", tt.name, n, norms.Weighted, norms.Momentum)
		require.LessOrEqual(t, n, tt.most, tt.name)
		require.LessOrEqual(t, norms.Weighted, 1e-8, tt.name)
	}
}

// Wide layers of strongly variable viscosity: the cycle amplifies a few modes,
// which the basis must not forget.
func TestWideBoxes(t *testing.T) {
	for _, b := range []box{
		{hx: equal(320, 10), hz: equal(32, 1)},
		{hx: equal(512, 8), hz: equal(64, 1), sides: Wrap, bot: Stick, top: Stick},
		{hx: equal(64, 10), hz: equal(40, 1), bot: Stick},
	} {
		n, norms := newProblem(b, exponential(1e8)).solve(t)
		t.Logf("%dx%d: %d iterations", len(b.hx), len(b.hz), n)
		require.LessOrEqual(t, norms.Weighted, 1e-8)
		require.LessOrEqual(t, n, 16)
	}
}

// The cycle converges by itself on uniform viscosity, at less than 0.25 a
// cycle (0.16 on fine grids).
func TestCycleConvergesAlone(t *testing.T) {
	p := newProblem(square(64), func(x, z float64) float64 { return 1 })
	sv := p.sv
	sv.grow(1)
	before := sv.Residual(p).Weighted
	const cycles = 6
	for range cycles {
		sv.Precondition(sv.z[0], sv.R)
		for i := range sv.X.X {
			sv.X.X[i] += sv.z[0].X[i]
			sv.X.Z[i] += sv.z[0].Z[i]
			sv.X.P[i] += sv.z[0].P[i]
		}
		sv.Residual(p)
	}
	rate := math.Pow(sv.Residual(p).Weighted/before, 1./cycles)
	t.Logf("%.3f a cycle", rate)
	require.Less(t, rate, 0.25)
}

// A short basis starts anew, from the true residual.
func TestRestart(t *testing.T) {
	p := newProblem(square(64), circles(1e4))
	p.sv.X.clear()
	rest := p.sv.Residual(p).Weighted
	norms, n, err := p.sv.Solve(context.Background(), p, Limits{Target: 1e-8 * rest, Iterations: 100, Basis: 6})
	require.NoError(t, err)
	require.LessOrEqual(t, norms.Weighted, 1e-8*rest)
	require.Greater(t, n, 12)
	require.LessOrEqual(t, len(p.sv.z), 6)
}

func TestSlowConvergenceGrowsTheBasis(t *testing.T) {
	p := newProblem(square(48), circles(1e4))
	p.solve(t)
	require.Greater(t, len(p.sv.z), shortBasis)
	p = newProblem(square(48), exponential(1e4))
	p.solve(t)
	require.Len(t, p.sv.z, shortBasis)
}

func TestNormsOfTheResidual(t *testing.T) {
	p := newProblem(box{hx: []float64{1, 2, 3}, hz: []float64{1, 4}, bot: Stick}, func(x, z float64) float64 { return 1 + x })
	sv, l := p.sv, p.sv.Finest()
	sv.X.X[1*l.stride+2], sv.X.Z[2*l.stride+3] = 0.3, -0.7
	got := sv.Residual(p)
	var want Norms
	for j := 1; j <= 2; j++ {
		for i := 1; i <= 3; i++ {
			c := j*l.stride + i
			rx, rz, rp := sv.R.X[c], sv.R.Z[c], sv.R.P[c]
			volume := l.X.H[i] * l.Z.H[j]
			want.Weighted += rx*rx*l.ix[c] + rz*rz*l.iz[c] + rp*rp*l.Eta[c]/volume
			want.Momentum += rx*rx/(l.X.D[i]*l.Z.H[j]) + rz*rz/(l.X.H[i]*l.Z.D[j])
			want.Continuity += rp * rp / volume
		}
	}
	require.InEpsilon(t, math.Sqrt(want.Weighted), got.Weighted, 1e-13)
	require.InEpsilon(t, math.Sqrt(want.Momentum), got.Momentum, 1e-13)
	require.InEpsilon(t, math.Sqrt(want.Continuity), got.Continuity, 1e-13)
}

// The residual that the iteration carries along is the true one, with the
// operator behind the last sweep and, where there are jumps, by itself; also
// on a grid that is solved directly as a whole.
func TestRecursiveResidualIsTheTrueOne(t *testing.T) {
	for name, p := range map[string]*problem{
		"smooth":    newProblem(box{hx: equal(30, 1), hz: equal(70, 2), bot: Stick, top: Stick, workers: 2}, exponential(1e3)),
		"jumps":     newProblem(box{hx: equal(30, 1), hz: equal(70, 2), bot: Stick, top: Stick, workers: 2}, circles(100)),
		"one level": newProblem(box{hx: equal(4, 1), hz: equal(4, 1), bot: Stick}, exponential(10)),
	} {
		p.sv.X.clear()
		rest := p.sv.Residual(p).Weighted
		var last float64
		norms, n, err := p.sv.Solve(context.Background(), p, Limits{Target: 1e-6 * rest, Iterations: 20, Basis: 20,
			Watch: func(_ int, r float64) { last = r }})
		require.NoError(t, err)
		require.InDelta(t, last, norms.Weighted, 1e-10*rest, name)
		if name == "one level" {
			require.Equal(t, 1, n)
		}
	}
}
