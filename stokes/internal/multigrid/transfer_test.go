package multigrid

import (
	"math"
	"testing"

	"github.com/stretchr/testify/require"
)

// Restriction hands on forces and mass defects in full.
func TestRestrictionKeepsSums(t *testing.T) {
	for name, b := range boxes() {
		p := newProblem(b, wavy)
		l, c := p.sv.Levels[0], p.sv.Levels[1]
		l.u, l.f = newFields(l.size()), newFields(l.size())
		l.random(l.f, 1)
		l.passes.restrict.run()
		sum := func(l *Level, a []float64) float64 {
			s := 0.0
			for j := 1; j <= l.Z.N; j++ {
				for i := 1; i <= l.X.N; i++ {
					s += a[j*l.stride+i]
				}
			}
			return s
		}
		require.InDelta(t, sum(l, l.f.P), sum(c, c.f.P), 1e-11, name)
		if l.X.wraps() {
			require.InDelta(t, sum(l, l.f.X), sum(c, c.f.X), 1e-11, name)
		}
	}
}

// Velocities are prolonged exactly when they are linear between coarse
// points, pressures when they are constant.
func TestProlongationIsExactForLinearVelocities(t *testing.T) {
	for _, name := range []string{"free slip", "mixed", "no slip"} {
		p := newProblem(boxes()[name], wavy)
		l, c := p.sv.Levels[0], p.sv.Levels[1]
		l.u, l.f = newFields(l.size()), newFields(l.size())
		vx := func(x, z float64) float64 { return 2 + 3*x - z }
		vz := func(x, z float64) float64 { return 1 - x + 2*z }
		fill := func(l *Level, u Fields) {
			xs, zs := nodes(l.X.widths()), nodes(l.Z.widths())
			for j := 1; j <= l.Z.N+1; j++ {
				for i := 1; i <= l.X.N+1; i++ {
					if j <= l.Z.N {
						u.X[j*l.stride+i] = vx(xs[i-1], 0.5*(zs[j-1]+zs[j]))
					}
					if i <= l.X.N {
						u.Z[j*l.stride+i] = vz(0.5*(xs[i-1]+xs[i]), zs[j-1])
					}
					u.P[j*l.stride+i] = 7
				}
			}
		}
		fill(c, c.u)
		want := newFields(l.size())
		fill(l, want)
		l.passes.prolong.run()
		margin := 3 // where the walls bend it
		for j := 1 + margin; j <= l.Z.N-margin; j++ {
			for i := 1 + margin; i <= l.X.N-margin; i++ {
				k := j*l.stride + i
				require.InDelta(t, want.X[k], l.u.X[k], 1e-12, "%s: vx at %d, %d", name, i, j)
				require.InDelta(t, want.Z[k], l.u.Z[k], 1e-12, "%s: vz at %d, %d", name, i, j)
				require.Equal(t, 7.0, l.u.P[k])
			}
		}
	}
}

// Beside walls, the velocity along a free-slip wall is continued as it is and
// that along a no-slip wall goes to zero at the wall.
func TestProlongationBesideWalls(t *testing.T) {
	p := newProblem(box{hx: equal(8, 8), hz: equal(8, 8), bot: Stick, top: Slip}, wavy)
	l, c := p.sv.Levels[0], p.sv.Levels[1]
	l.u = newFields(l.size())
	for j := 1; j <= c.Z.N; j++ {
		for i := 2; i <= c.X.N; i++ {
			c.u.X[j*c.stride+i] = 1
		}
	}
	l.passes.prolong.run()
	require.InDelta(t, 0.5, l.row(l.u.X, 1)[5], 1e-15, "half way to the bottom")
	require.InDelta(t, 1, l.row(l.u.X, 2)[5], 1e-15)
	require.InDelta(t, 1, l.row(l.u.X, 8)[5], 1e-15, "at the top")
}

func TestCellsAreMerged(t *testing.T) {
	axis := func(h ...float64) *Axis { a := NewAxis(h, Slip, Slip); return &a }
	counts := func(m *merge) []int { return m.count[1 : m.coarse.N+1] }
	for _, tt := range []struct {
		name   string
		x, z   *Axis
		mx, mz []int
	}{
		{"square cells", axis(equal(8, 8)...), axis(equal(10, 10)...), []int{2, 2, 2, 2}, []int{2, 2, 2, 2, 2}},
		{"odd numbers have one triple in the middle", axis(equal(9, 9)...), axis(equal(11, 11)...), []int{2, 3, 2, 2}, []int{2, 2, 3, 2, 2}},
		{"the triple is of the thinnest", axis(equal(8, 8)...), axis(1, 1, 1, 1, 1, 1, 1, 1.4, 1.4), []int{2, 2, 2, 2}, []int{2, 3, 2, 2}},
		{"flat cells only in their short direction", axis(equal(8, 16)...), axis(equal(8, 8)...), []int{1, 1, 1, 1, 1, 1, 1, 1}, []int{2, 2, 2, 2}},
		{"few cells stay", axis(equal(7, 7)...), axis(equal(8, 8)...), []int{1, 1, 1, 1, 1, 1, 1}, []int{2, 2, 2, 2}},
		{"thin rows only", axis(equal(8, 16)...), axis(.5, .5, .5, .5, 2, 2, 2, 2), []int{1, 1, 1, 1, 1, 1, 1, 1}, []int{2, 2, 1, 1, 1, 1}},
	} {
		mx, mz, ok := coarsen(tt.x, tt.z)
		require.True(t, ok, tt.name)
		require.Equal(t, tt.mx, counts(mx), tt.name)
		require.Equal(t, tt.mz, counts(mz), tt.name)
	}
	_, _, ok := coarsen(axis(equal(7, 7)...), axis(1))
	require.False(t, ok)
}

func TestCoarseViscosity(t *testing.T) {
	// A log-linear viscosity is reproduced by geometric means on pairs.
	eta := func(x, z float64) float64 { return math.Exp(2*x - 3*z) }
	p := newProblem(box{hx: equal(16, 1), hz: equal(16, 1)}, eta)
	c := p.sv.Levels[1]
	for j := 1; j <= c.Z.N; j++ {
		for i := 1; i <= c.X.N; i++ {
			x, z := (float64(i)-0.5)/8, (float64(j)-0.5)/8
			require.InEpsilon(t, eta(x, z), c.Eta[j*c.stride+i], 1e-12)
			if i > 1 && j > 1 {
				require.InEpsilon(t, eta(x-1./16, z-1./16), c.Corner[j*c.stride+i], 1e-12)
			}
		}
	}
	// Triples too.
	require.InDelta(t, 2.0, (&Level{stride: 5, Eta: []float64{0, 1, 2, 4, 0, 0, 1, 2, 4, 0, 0, 1, 2, 4, 0}}).childrenMean(1, 3, 0, 3), 1e-15)
}
