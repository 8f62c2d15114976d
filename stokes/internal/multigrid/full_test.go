package multigrid

import (
	"context"
	"testing"

	"github.com/stretchr/testify/require"
)

// To restrict a right-hand side is to restrict the residual of nothing.
func TestRestrictionOfLoads(t *testing.T) {
	for name, b := range boxes() {
		p := newProblem(b, wavy)
		l, c := p.sv.Levels[0], p.sv.Levels[1]
		l.u, l.f = newFields(l.size()), newFields(l.size())
		l.balance(3)
		l.u.clear()
		l.passes.restrict.run()
		want := c.f.clone()
		c.f.clear()
		p.sv.makeFull()
		l.passes.load(0)
		require.InDeltaSlice(t, want.P, c.f.P, 1e-12, name)
		for j := 1; j <= c.Z.N; j++ {
			for i := 1; i <= c.X.N; i++ {
				k := j*c.stride + i
				if c.ix[k] > 0 {
					require.InDelta(t, want.X[k], c.f.X[k], 1e-12, name)
				}
				if c.iz[k] > 0 {
					require.InDelta(t, want.Z[k], c.f.Z[k], 1e-12, name)
				}
			}
		}
	}
}

// Beginning with full multigrid, the first residual is far smaller and fewer
// iterations remain.
func TestFullMultigridSavesIterations(t *testing.T) {
	for _, tt := range []struct {
		name  string
		eta   func(x, z float64) float64
		first float64 // residual after one iteration
		most  int
	}{
		{"uniform", func(x, z float64) float64 { return 1 }, 1e-3, 6},
		{"smooth 1e6", exponential(1e6), 3e-3, 6},
		{"smooth 1e10", exponential(1e10), 3e-3, 6},
	} {
		p := newProblem(square(128), tt.eta)
		p.sv.X.clear()
		rest := p.sv.Residual(p).Weighted
		var first float64
		_, n, err := p.sv.Solve(context.Background(), p, Limits{Target: 1e-8 * rest, Iterations: 20, Basis: 20,
			Watch: func(i int, r float64) {
				if i == 1 {
					first = r / rest
				}
			}})
		require.NoError(t, err)
		t.Logf("%s: %d iterations, %.1e after the first", tt.name, n, first)
		require.Less(t, first, tt.first, tt.name)
		require.LessOrEqual(t, n, tt.most, tt.name)
	}
}

// Where the viscosity jumps a coarse solution is no good start.
func TestFullMultigridIsForSmoothViscosities(t *testing.T) {
	p := newProblem(square(64), circles(1e3))
	p.solve(t)
	require.False(t, p.sv.full)
	p = newProblem(square(64), exponential(1e3))
	p.solve(t)
	require.True(t, p.sv.full)
}
