package stokes_test

import (
	"context"
	"fmt"
	"math"
	"testing"

	"example.org/overturn/stokes"
	"example.org/overturn/stokes/staggered"
	"github.com/stretchr/testify/require"
)

// A series is c + Σ a sin(k s + φ), which is easy to differentiate.
type series struct {
	c     float64
	terms [][3]float64 // a, k, φ
}

func wave(k, phase float64) series { return series{terms: [][3]float64{{1, k, phase}}} }

// sine2 is sin²(ks): it vanishes with its slope where the sine does.
func sine2(k float64) series {
	return series{c: 0.5, terms: [][3]float64{{-0.5, 2 * k, math.Pi / 2}}}
}

// d returns derivative number n at s.
func (f series) d(n int, s float64) float64 {
	sum := 0.0
	if n == 0 {
		sum = f.c
	}
	for _, t := range f.terms {
		sum += t[0] * math.Pow(t[1], float64(n)) * math.Sin(t[1]*s+t[2]+float64(n)*math.Pi/2)
	}
	return sum
}

// A manufactured flow has the stream function X(x) Z(z), the pressure
// PX(x) PZ(z) and the viscosity exp(gx(x) + gz(z)); the force follows from
// them.
type manufactured struct {
	X, Z, PX, PZ, gx, gz series
}

func (m manufactured) vx(x, z float64) float64  { return m.X.d(0, x) * m.Z.d(1, z) }
func (m manufactured) vz(x, z float64) float64  { return -m.X.d(1, x) * m.Z.d(0, z) }
func (m manufactured) p(x, z float64) float64   { return m.PX.d(0, x) * m.PZ.d(0, z) }
func (m manufactured) eta(x, z float64) float64 { return math.Exp(m.gx.d(0, x) + m.gz.d(0, z)) }

func (m manufactured) shear(x, z float64) float64 {
	return m.X.d(0, x)*m.Z.d(2, z) - m.X.d(2, x)*m.Z.d(0, z)
}

func (m manufactured) stretch(x, z float64) float64 { return m.X.d(1, x) * m.Z.d(1, z) } // ∂vx/∂x

// With div v = 0, div(2ηε) = η∇²v + 2ε·∇η.
func (m manufactured) fx(x, z float64) float64 {
	laplace := m.X.d(2, x)*m.Z.d(1, z) + m.X.d(0, x)*m.Z.d(3, z)
	bend := 2*m.gx.d(1, x)*m.stretch(x, z) + m.gz.d(1, z)*m.shear(x, z)
	return m.PX.d(1, x)*m.PZ.d(0, z) - m.eta(x, z)*(laplace+bend)
}

func (m manufactured) fz(x, z float64) float64 {
	laplace := -m.X.d(3, x)*m.Z.d(0, z) - m.X.d(1, x)*m.Z.d(2, z)
	bend := -2*m.gz.d(1, z)*m.stretch(x, z) + m.gx.d(1, x)*m.shear(x, z)
	return m.PX.d(0, x)*m.PZ.d(1, z) - m.eta(x, z)*(laplace+bend)
}

func (m manufactured) force(g *staggered.Grid) *staggered.Vector {
	f := staggered.NewVector(g)
	f.Fill(m.fx, m.fz)
	return f
}

func (m manufactured) viscosity(g *staggered.Grid) *staggered.Scalar {
	eta := staggered.NewScalar(g)
	eta.Fill(m.eta)
	return eta
}

func (m manufactured) exact(g *staggered.Grid) *staggered.Flow {
	f := staggered.NewFlow(g)
	f.FillVelocity(m.vx, m.vz)
	p := f.Pressure()
	p.Fill(m.p)
	mean := p.Mean()
	for i := range f.P {
		f.P[i] -= mean
	}
	return f
}

// on returns a no-slip wall that moves with the exact flow and lets it
// through.
func (m manufactured) on(side staggered.Side) stokes.Wall {
	at := map[staggered.Side]float64{staggered.Left: 0, staggered.Right: 1, staggered.Bottom: 0, staggered.Top: 1}[side]
	if side.Horizontal() {
		return stokes.NoSlip.Moving(func(x float64) float64 { return m.vx(x, at) }).
			Through(func(x float64) float64 { return m.vz(x, at) })
	}
	return stokes.NoSlip.Moving(func(z float64) float64 { return m.vz(at, z) }).
		Through(func(z float64) float64 { return m.vx(at, z) })
}

// difference returns the root mean square differences of velocity and
// pressure.
func difference(a, b *staggered.Flow) (v, p float64) {
	d := staggered.NewFlow(a.Grid)
	for i := range a.VX {
		d.VX[i] = a.VX[i] - b.VX[i]
	}
	for i := range a.VZ {
		d.VZ[i] = a.VZ[i] - b.VZ[i]
	}
	for i := range a.P {
		d.P[i] = a.P[i] - b.P[i]
	}
	return d.RMS(), d.Pressure().RMS()
}

const pi = math.Pi

// smooth varies by a factor of about 60, steepest in z.
func smooth() (gx, gz series) {
	return series{terms: [][3]float64{{0.6, 2 * pi, 0.3}}}, series{terms: [][3]float64{{1.5, 2, 1}}}
}

// cases are flows in the unit box for every kind of wall.
func cases() []struct {
	name  string
	flow  manufactured
	walls stokes.Walls
} {
	gx, gz := smooth()
	slip := manufactured{wave(pi, 0), wave(2*pi, 0), wave(2, 1), wave(3, 0.5), gx, gz}
	stick := manufactured{sine2(pi), sine2(pi), wave(2, 1), wave(3, 0.5), gx, gz}
	moving := manufactured{sine2(pi), wave(pi, 0), wave(2, 1), wave(3, 0.5), gx, gz}
	through := manufactured{wave(1.3, 0.4), wave(2.1, 0.7), wave(2, 1), wave(3, 0.5), gx, gz}
	around := manufactured{wave(2*pi, 0.3), wave(pi, 0), wave(2*pi, 1), wave(3, 0.5), gx, gz}
	bed := stokes.NoSlip.Moving(func(x float64) float64 { return around.vx(x, 0) })
	return []struct {
		name  string
		flow  manufactured
		walls stokes.Walls
	}{
		{"free slip", slip, stokes.Walls{}},
		{"no slip", stick, stokes.Walls{Left: stokes.NoSlip, Right: stokes.NoSlip, Bottom: stokes.NoSlip, Top: stokes.NoSlip}},
		{"moving", moving, stokes.Walls{Left: stokes.NoSlip, Right: stokes.NoSlip,
			Bottom: stokes.NoSlip.Moving(func(x float64) float64 { return moving.vx(x, 0) }),
			Top:    stokes.NoSlip.Moving(func(x float64) float64 { return moving.vx(x, 1) })}},
		{"through-flow", through, stokes.Walls{Left: through.on(staggered.Left), Right: through.on(staggered.Right),
			Bottom: through.on(staggered.Bottom), Top: through.on(staggered.Top)}},
		{"periodic", around, stokes.Walls{Left: stokes.Periodic, Right: stokes.Periodic, Bottom: bed}},
		{"periodic, sliding", around, stokes.Walls{Left: stokes.Periodic, Right: stokes.Periodic}},
	}
}

// solve returns the answer and the number of iterations.
func solve(t testing.TB, g *staggered.Grid, walls stokes.Walls, eta *staggered.Scalar, force *staggered.Vector, s *stokes.Settings) (*staggered.Flow, stokes.Report) {
	t.Helper()
	sv, err := stokes.NewSolver(g, walls, s)
	require.NoError(t, err)
	flow := staggered.NewFlow(g)
	r, err := sv.Solve(context.Background(), flow, eta, force)
	require.NoError(t, err)
	return flow, r
}

func TestManufacturedFlowsAreSecondOrder(t *testing.T) {
	for _, c := range cases() {
		for _, graded := range []bool{false, true} {
			t.Run(fmt.Sprintf("%s/graded=%v", c.name, graded), func(t *testing.T) {
				var v, p [2]float64
				for k, n := range []int{48, 96} {
					g, err := staggered.Uniform(n, n, 1, 1)
					if graded && c.walls.Left.String() == "periodic" {
						g, err = staggered.Graded(n, n, 1, 1, staggered.Grading{Bottom: 3, Top: 2})
					} else if graded {
						g, err = staggered.Graded(n, n, 1, 1, staggered.Grading{Left: 2, Bottom: 3, Top: 2})
					}
					require.NoError(t, err)
					flow, r := solve(t, g, c.walls, c.flow.viscosity(g), c.flow.force(g), nil)
					v[k], p[k] = difference(flow, c.flow.exact(g))
					t.Logf("%dx%d: velocity error %.2e, pressure error %.2e, %v", n, n, v[k], p[k], r)
				}
				require.InDelta(t, 2, math.Log2(v[0]/v[1]), 0.15, "order of velocity")
				require.InDelta(t, 2, math.Log2(p[0]/p[1]), 0.25, "order of pressure")
			})
		}
	}
}
