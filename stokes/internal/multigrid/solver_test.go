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
		{"stiff circles", circles(1e3), 64, 15},
		{"stiffer circles", circles(1e4), 64, 28},
	} {
		n, norms := newProblem(square(tt.n), tt.eta).solve(t)
		t.Logf("%s: %d iterations, weighted %.1e, momentum %.1e", tt.name, n, norms.Weighted, norms.Momentum)
		require.LessOrEqual(t, n, tt.most, tt.name)
		require.LessOrEqual(t, norms.Weighted, 1e-8, tt.name)
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
	p := newProblem(square(64), circles(1e3))
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
