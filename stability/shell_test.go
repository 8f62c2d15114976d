package stability

import (
	"math"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// A thin shell is a plane layer: Ra differs by the order of its thickness over
// its radius.
func TestThinShellIsALayer(t *testing.T) {
	for _, l := range []Layer{{}, {Bottom: Rigid}, {Bottom: Rigid, Top: Rigid}, {Bottom: Rigid.Robin(3), Top: Rigid}} {
		plane := critical(t, l)
		last := math.Inf(1)
		for _, ratio := range []float64{0.9, 0.95, 0.975} {
			o, err := Shell{RadiusRatio: ratio, Inner: l.Bottom, Outer: l.Top}.Critical()
			require.NoError(t, err)
			off := math.Abs(o.Rayleigh/plane.Rayleigh - 1)
			assert.Less(t, off, 0.6*last, "halving the thickness")
			last = off
			_, outer := Shell{RadiusRatio: ratio}.Radii()
			assert.InEpsilon(t, plane.Wavenumber*outer, float64(o.Degree), 0.1)
		}
		assert.Less(t, last, 0.03)
	}
}

// The neutral state neither grows nor decays, at any Prandtl number, and growth
// has the sign of what is left.
func TestShellGrowth(t *testing.T) {
	for _, s := range []Shell{
		{RadiusRatio: 0.5, Inner: Rigid}, {RadiusRatio: 0.35, Prandtl: 1, Outer: Rigid.Robin(4)}, {Prandtl: 0.3, Outer: Rigid},
		{
			RadiusRatio: 0.6, Inner: Rigid.FixedFlux(), Viscosity: func(r float64) float64 { return math.Exp(3 * (r - 1.5)) },
			Gravity: func(r float64) float64 { return 2.5 * 2.5 / (r * r) },
		},
	} {
		n, err := s.Neutral(3)
		require.NoError(t, err)
		for _, d := range []float64{-0.01, 0, 0.01} {
			g, err := s.Growth(n.Rayleigh*(1+d), 3)
			require.NoError(t, err)
			if d == 0 {
				assert.InDelta(t, 0, g.Rate, 1e-9)
			} else {
				assert.Positive(t, g.Rate*d)
			}
		}
	}
}

// A shell's Rayleigh number goes as its viscosity, whose break is found.
func TestShellViscosity(t *testing.T) {
	plain, err := Shell{RadiusRatio: 0.5}.Critical()
	require.NoError(t, err)
	thick, err := Shell{RadiusRatio: 0.5, Viscosity: func(float64) float64 { return 4 }}.Critical()
	require.NoError(t, err)
	assert.InEpsilon(t, 4*plain.Rayleigh, thick.Rayleigh, 1e-12)
	step := func(r float64) float64 {
		if r < 1.4 {
			return 1
		}
		return 20
	}
	a, err := Shell{RadiusRatio: 0.5, Viscosity: step, Breaks: []float64{1.4}}.Critical()
	require.NoError(t, err)
	b, err := Shell{RadiusRatio: 0.5, Viscosity: step}.Critical()
	require.NoError(t, err)
	assert.InEpsilon(t, a.Rayleigh, b.Rayleigh, 1e-10)
	assert.Greater(t, a.Rayleigh, plain.Rayleigh)
}

// The radial functions of a mode solve the equations of a shell of uniform
// viscosity: D_l θ = -f W/r and D_l² W = Ra l(l+1) (g/r) θ.
func TestShellModeSolvesTheEquations(t *testing.T) {
	s := Shell{RadiusRatio: 0.4, Inner: Rigid, Outer: Free}
	inner, outer := s.Radii()
	o, err := s.Neutral(3)
	require.NoError(t, err)
	const l = 12.0
	dl := func(f func(float64) float64) func(float64) float64 {
		return func(r float64) float64 { return second(f, r) + 2/r*first(f, r) - l/(r*r)*f(r) }
	}
	w := func(r float64) float64 { return r * o.Mode.RadialVelocity(r) }
	for _, r := range []float64{inner + 0.3, inner + 0.5, inner + 0.75} {
		assert.InDelta(t, -inner*outer/(r*r)*w(r)/r, dl(o.Mode.Temperature)(r), 1e-7)
		assert.InEpsilon(t, o.Rayleigh*l/r*o.Mode.Temperature(r), dl(dl(w))(r), 1e-3)
	}
	assert.InDelta(t, 0, w(inner), 1e-13)
	assert.InDelta(t, 0, w(outer), 1e-13)
}

// Gravity like r and a gradient like r make a self-adjoint problem whose shell
// goes over into the full sphere as the core vanishes.
func TestSphereIsALimitOfShells(t *testing.T) {
	linear := func(r float64) float64 { return r }
	sphere, err := Shell{Outer: Rigid}.Neutral(2)
	require.NoError(t, err)
	last := math.Inf(1)
	for _, ratio := range []float64{0.1, 0.05, 0.025} {
		_, outer := Shell{RadiusRatio: ratio}.Radii()
		gravity := func(r float64) float64 { return r / outer }
		s := Shell{RadiusRatio: ratio, Outer: Rigid, Gravity: gravity, Gradient: linear}
		o, err := s.Neutral(2)
		require.NoError(t, err)
		// C is built on the radius: Ra = g α ΔT d³/(κν) with f = r/d.
		c := o.Rayleigh * math.Pow(outer, 5)
		off := math.Abs(c/sphere.Rayleigh - 1)
		assert.Less(t, off, last)
		last = off
	}
	assert.Less(t, last, 1e-3)
}

func TestShellBound(t *testing.T) {
	for _, s := range []Shell{{}, {RadiusRatio: 0.55}, {RadiusRatio: 0.9, Inner: Rigid, Outer: Rigid}, {RadiusRatio: 0.3, Outer: Rigid.Robin(1)}} {
		q, err := s.question()
		require.NoError(t, err)
		for _, degree := range []int{1, 2, 5, 20} {
			o, err := s.Neutral(degree)
			require.NoError(t, err)
			k := wavenumberOfDegree(degree)
			assert.Less(t, q.lowerBound(k), o.Rayleigh, "%+v, degree %d", s, degree)
			g, err := s.Growth(5*o.Rayleigh, degree)
			require.NoError(t, err)
			assert.Less(t, g.Rate, q.bound.growth(k, [3]float64{5 * o.Rayleigh}))
		}
	}
}
