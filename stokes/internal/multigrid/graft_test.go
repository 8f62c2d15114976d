package multigrid

import (
	"math"
	"math/rand/v2"
	"testing"

	"github.com/stretchr/testify/require"
)

func TestFitReproducesLinearFunctions(t *testing.T) {
	f := func(x, z float64) float64 { return 3 + 2*x - 5*z }
	var p centredPoints
	for k, at := range [][2]float64{{1, 0}, {2, 1}, {1, 2}, {3, -1}, {2.5, 2}} {
		p.add(k, at[0], at[1])
	}
	require.True(t, p.fit())
	v := 0.0
	for k := range p.n {
		v += p.weight[k] * f(p.x[k], p.z[k])
	}
	require.InDelta(t, 3, v, 1e-12)

	for _, line := range [][2]float64{{1, 0}, {0, 1}, {1, 1}, {0.3, -2}} {
		p.n = 0
		for k := 1.0; k <= 4; k++ {
			p.add(0, 1+k*line[0], 2+k*line[1])
		}
		require.False(t, p.fit(), "%v", line)
	}
}

func disc(x, z float64) float64 {
	if math.Hypot(x-0.52, z-0.47) < 0.3 {
		return 1e6
	}
	return 1
}

// A rigid motion that the coarse grid knows only well inside a body arrives at
// all faces of the body.
func TestBodiesAreNotStrainedByInterpolation(t *testing.T) {
	for _, workers := range []int{1, 2} {
		p := newProblem(box{hx: equal(64, 1), hz: equal(64, 1), workers: workers}, disc)
		l, c := p.sv.Levels[0], p.sv.Levels[1]
		l.u, l.f = newFields(l.size()), newFields(l.size())
		vx := func(z float64) float64 { return 1 - 3*z }
		vz := func(x float64) float64 { return 3*x - 0.4 }
		c.u.clear()
		for j := 1; j <= c.Z.N; j++ {
			for i := 1; i <= c.X.N; i++ {
				k := j*c.stride + i
				if c.ix[k] < 1e-5 {
					c.u.X[k] = vx((float64(j) - 0.5) / 32)
				}
				if c.iz[k] < 1e-5 {
					c.u.Z[k] = vz((float64(i) - 0.5) / 32)
				}
			}
		}
		p.sv.prolongGrafted(0)
		for j := 2; j <= l.Z.N; j++ {
			for i := 2; i <= l.X.N; i++ {
				if k := j*l.stride + i; l.Eta[k] > 1 {
					x, z := (float64(i)-0.5)/64, (float64(j)-0.5)/64
					require.InDelta(t, vx(z), l.u.X[k], 1e-12)
					require.InDelta(t, vx(z), l.u.X[k+1], 1e-12)
					require.InDelta(t, vz(x), l.u.Z[k], 1e-12)
					require.InDelta(t, vz(x), l.u.Z[k+l.stride], 1e-12)
				}
			}
		}
	}
}

func TestCollectIsTheTransposeOfExtend(t *testing.T) {
	l := newProblem(square(64), disc).sv.Finest()
	require.False(t, l.grafts.none())
	rnd := rand.New(rand.NewPCG(1, 2))
	for _, g := range []*graft{&l.grafts.x, &l.grafts.z} {
		u, r := make([]float64, l.size()), make([]float64, l.size())
		for k := range u {
			u[k], r[k] = rnd.NormFloat64(), rnd.NormFloat64()
		}
		for _, f := range g.faces {
			u[f] = 0
		}
		dot := func(a, b []float64) (sum float64) {
			for k := range a {
				sum += a[k] * b[k]
			}
			return sum
		}
		extended, collected := append([]float64{}, u...), append([]float64{}, r...)
		g.extend(extended)
		g.collect(collected)
		require.InEpsilon(t, dot(extended, r), dot(u, collected), 1e-10)
	}
}

// Restriction with grafts hands on forces in full.
func TestGraftedRestrictionKeepsForces(t *testing.T) {
	p := newProblem(box{hx: equal(64, 1), hz: equal(64, 1), sides: Wrap, bot: Stick, top: Stick}, disc)
	l, c := p.sv.Levels[0], p.sv.Levels[1]
	require.False(t, l.grafts.none())
	l.u, l.f = newFields(l.size()), newFields(l.size())
	l.random(l.f, 9)
	sum := func(l *Level, a []float64) (s float64) {
		for j := 1; j <= l.Z.N; j++ {
			for i := 1; i <= l.X.N; i++ {
				s += a[j*l.stride+i]
			}
		}
		return s
	}
	want := sum(l, l.f.X)
	p.sv.restrictGrafted(0)
	require.InDelta(t, want, sum(c, c.f.X), 1e-9)
}

func TestGraftsAreOfJumpsAlone(t *testing.T) {
	p := newProblem(square(64), exponential(1e8))
	for _, l := range p.sv.Levels {
		require.True(t, l.grafts.none())
		require.Nil(t, l.grafts.soft, "memory is made when it is needed")
	}
	// And they are forgotten when the jumps are gone.
	p = newProblem(square(64), disc)
	l := p.sv.Finest()
	require.False(t, l.grafts.none())
	for i := range l.Eta {
		l.Eta[i], l.Corner[i] = 1, 1
	}
	p.sv.Refresh()
	require.True(t, l.grafts.none())
}
