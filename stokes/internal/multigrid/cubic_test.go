package multigrid

import (
	"math"
	"testing"

	"github.com/stretchr/testify/require"
)

// Each interpolation reproduces the cubics that it is meant for, up to the
// ends.
func TestInterpolationOfSolutionsIsCubic(t *testing.T) {
	graded := []float64{.3, .4, .5, .7, .8, .8, .9, 1.1, 1.2, 1, .8, .6, .5}
	const length = 9.6
	any := func(x float64) float64 { return 1 + 2*x - 0.5*x*x + 0.1*x*x*x }
	for _, tt := range []struct {
		name   string
		lo, hi End
		which  func(c *cubics) *cubic
		nodes  bool
		f      func(x float64) float64
		from   float64 // part of the axis that is tested
		to     float64
	}{
		{"nodes", Stick, Slip, func(c *cubics) *cubic { return &c.nodes }, true, any, 0, length},
		{"pressure", Stick, Slip, func(c *cubics) *cubic { return &c.pressure }, false, any, 0, length},
		{"tangential between no-slip walls", Stick, Stick, func(c *cubics) *cubic { return &c.centres }, false, func(x float64) float64 { return x * (length - x) * (x + 1) }, 0, length},
		{"tangential at a free-slip wall below", Slip, Stick, func(c *cubics) *cubic { return &c.centres }, false, func(x float64) float64 { return 3 - x*x }, 0, length / 2},
		{"tangential at a free-slip wall above", Stick, Slip, func(c *cubics) *cubic { return &c.centres }, false, func(x float64) float64 { return 3 - (length-x)*(length-x) }, length / 2, length},
		{"tangential far from walls", Slip, Slip, func(c *cubics) *cubic { return &c.centres }, false, any, 3, 6},
	} {
		a := NewAxis(graded, tt.lo, tt.hi)
		m := newMerge(&a, []int{2, 2, 1, 1, 2, 3, 2})
		table := tt.which(newCubics(m))
		coarse, fine := m.coarse.centres(), a.centres()
		if tt.nodes {
			coarse, fine = m.coarse.nodes(), a.nodes()
		}
		src := make([]float64, m.coarse.N+2+2*beyond)
		for i := 1; i < len(coarse); i++ {
			src[beyond+i] = tt.f(coarse[i])
		}
		dst := make([]float64, a.N+2)
		table.along(dst, src, 1)
		for i := 1; i <= a.N; i++ {
			if fine[i] >= tt.from && fine[i] <= tt.to {
				require.InDelta(t, tt.f(fine[i]), dst[i], 1e-12, "%s at %v", tt.name, fine[i])
			}
		}
	}
}

// Between periodic sides the far end counts.
func TestInterpolationOfSolutionsIsPeriodic(t *testing.T) {
	errors := func(n int) float64 {
		p := newProblem(box{hx: equal(n, 1), hz: equal(n, 1), sides: Wrap, bot: Stick}, wavy)
		l, c := p.sv.Levels[0], p.sv.Levels[1]
		l.u = newFields(l.size())
		p.sv.makeFull()
		xn, xc, zc := c.X.nodes(), c.X.centres(), c.Z.centres()
		for j := 1; j <= c.Z.N; j++ {
			for i := 1; i <= c.X.N; i++ {
				c.u.X[j*c.stride+i] = math.Sin(2*math.Pi*xn[i]) * zc[j]
				c.u.P[j*c.stride+i] = math.Cos(2*math.Pi*xc[i]) * zc[j]
			}
		}
		l.passes.interpolate(0)
		worst := 0.0
		xn, xc, zc = l.X.nodes(), l.X.centres(), l.Z.centres()
		for j := 1; j <= l.Z.N-3; j++ { // the top is a free-slip wall
			for i := 1; i <= l.X.N; i++ {
				worst = max(worst, math.Abs(l.u.X[j*l.stride+i]-math.Sin(2*math.Pi*xn[i])*zc[j]),
					math.Abs(l.u.P[j*l.stride+i]-math.Cos(2*math.Pi*xc[i])*zc[j]))
			}
			require.Equal(t, l.row(l.u.X, j)[1], l.row(l.u.X, j)[l.X.N+1])
		}
		return worst
	}
	require.InDelta(t, 4, math.Log2(errors(64)/errors(128)), 0.1)
}
