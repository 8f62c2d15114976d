package stability

import (
	"cmp"
	"errors"
	"math"
	"slices"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// At the first onset nothing grows just below, at any wavenumber, and something
// does just above: for layers whose neutral curves have more than one minimum, or
// whose onset oscillates.
func TestNothingGrowsBelowTheFirstOnset(t *testing.T) {
	skipIfShort(t)
	for _, l := range []Layer{
		{Bottom: Rigid, Top: Rigid, Viscosity: Exponential(math.Log(3e4), 0.5)},
		twoMinima(),
		{Bottom: Rigid, Top: Rigid, Taylor: 3e4, Prandtl: 0.1},
		{Prandtl: 5, Solute: Solute{Rayleigh: 3000, Diffusivity: 0.05}},
		{Bottom: Rigid.FixedFlux(), Top: Free, Base: CoolingFromAbove(0.005), Prandtl: 0.02},
		{Base: Gradient(func(z float64) float64 { return math.Cos(3 * math.Pi * z) }), Prandtl: 0.5},
	} {
		s, err := NewSolver(l, nil)
		require.NoError(t, err)
		o, err := s.Critical()
		require.NoError(t, err, "%v", l)
		for k := 0.3; k < 40; k *= 1.12 {
			g, err := s.Growth(o.Rayleigh*(1-1e-6), k)
			require.NoError(t, err)
			assert.Less(t, g.Rate, 0.0, "%v at k = %g, onset %v", l, k, o)
		}
		g, err := s.Growth(o.Rayleigh*(1+1e-6), o.Wavenumber)
		require.NoError(t, err)
		assert.Greater(t, g.Rate, 0.0, "%v", l)
	}
}

// twoMinima is a weak layer at the bottom of a stiff one, both of which could
// convect: narrow rolls below, wide ones throughout.
func twoMinima() Layer {
	return Layer{Bottom: Rigid, Top: Free, Viscosity: Layered([]float64{0.12}, []float64{2e-5, 1})}
}

// The search is not fooled by the wrong one of two minima: the neutral curve of
// twoMinima has both, and changing the viscosity of the weak part exchanges them.
func TestTwoMinima(t *testing.T) {
	skipIfShort(t)
	minima := func(weak float64) (ks, values []float64, o Onset) {
		l := twoMinima()
		l.Viscosity = Layered([]float64{0.12}, []float64{weak, 1})
		s, err := NewSolver(l, nil)
		require.NoError(t, err)
		var curve []Onset
		for k := 0.7; k < 40; k *= 1.15 {
			o, err := s.Neutral(Search{}, k)
			require.NoError(t, err)
			curve = append(curve, o)
		}
		for i := 1; i < len(curve)-1; i++ {
			if curve[i].Value < curve[i-1].Value && curve[i].Value < curve[i+1].Value {
				ks, values = append(ks, curve[i].Wavenumber), append(values, curve[i].Value)
			}
		}
		o, err = s.Critical()
		require.NoError(t, err)
		return ks, values, o
	}
	winners := map[int]bool{}
	for _, weak := range []float64{1e-5, 1.5e-5, 2e-5, 3.5e-5, 1e-4} {
		ks, values, o := minima(weak)
		best := 0
		for i, v := range values {
			if v < values[best] {
				best = i
			}
		}
		t.Logf("viscosity %.1e: minima at k = %.3g, Ra = %.4g; found %v", weak, ks, values, o)
		require.NotEmpty(t, ks)
		assert.LessOrEqual(t, o.Value, values[best])
		assert.InEpsilon(t, ks[best], o.Wavenumber, 0.15)
		if len(ks) == 2 {
			winners[best] = true
		}
	}
	assert.Len(t, winners, 2, "each of the minima is the lower one somewhere")
}

func TestBoundIsBelowEveryNeutralState(t *testing.T) {
	for _, l := range []Layer{
		{}, {Bottom: Rigid}, {Bottom: Rigid.Robin(0.2), Top: Rigid.FixedFlux()},
		{Base: MixedHeating(9)}, {Bottom: Rigid.FixedFlux(), Base: CoolingFromAbove(0.01)},
		{Viscosity: Exponential(9, 0.5)}, {Bottom: Rigid, Viscosity: Layered([]float64{0.3}, []float64{1, 1e-3})},
		{Porous: Darcy, Top: Permeable}, {Porous: Darcy, Bottom: Permeable, Top: Permeable.Robin(1)},
		{Taylor: 1e4, Prandtl: 0.05}, {Magnetic: Magnetic{Chandrasekhar: 50, Diffusivity: 0.1}, Prandtl: 1},
		{Prandtl: 3, Solute: Solute{Rayleigh: 2000, Diffusivity: 0.1}},
		{Prandtl: 3, Solute: Solute{Rayleigh: -20, Diffusivity: 0.1}},
		{Bottom: Rigid, Top: Free.Robin(1), Marangoni: 40},
	} {
		s, err := NewSolver(l, nil)
		require.NoError(t, err)
		for _, k := range []float64{0.1, 0.7, 2, 3, 5, 11, 30} {
			o, err := s.Neutral(Search{}, k)
			if errors.Is(err, ErrNoOnset) {
				continue
			}
			require.NoError(t, err, "%v at k = %g", l, k)
			bound := s.bound.lower(k, ThermalRayleigh, s.drives(0))
			assert.Less(t, bound, o.Value, "%v at k = %g", l, k)
			if l.Solute.Rayleigh >= 0 && l.Marangoni == 0 {
				assert.Positive(t, bound, "%v at k = %g", l, k)
			}
			g, err := s.Growth(3*o.Value, k)
			require.NoError(t, err)
			assert.Less(t, g.Rate, s.bound.growth(k, s.drives(3*o.Value)), "%v at k = %g", l, k)
		}
	}
}

// curve is a search on a function with its slope, without any bound.
func curve(value, slope func(k float64) float64) *search {
	at := func(k float64) (sample, error) { return sample{k: k, value: value(k), slope: slope(k)}, nil }
	return &search{
		from: leastWavenumber, sample: at,
		lower: func(float64) float64 { return math.Inf(-1) },
		extremum: func(guess sample, lo, hi float64) (answer, error) {
			return answer{}, errors.New("left to bisection")
		},
		point: func(guess sample) (answer, error) {
			var a answer
			a.K, a.value = guess.k, value(guess.k)
			return a, nil
		},
	}
}

// A search without Newton's method and without bounds: two minima of nearly the
// same depth, a corner where branches cross, a curve with gaps.
func TestSearchOnFunctions(t *testing.T) {
	for _, shift := range []float64{-0.01, 0.01} {
		double := func(k float64) float64 {
			x := math.Log(k)
			return 2 + (x-0.5)*(x-0.5)*(x-2.5)*(x-2.5) + shift*x
		}
		slope := func(k float64) float64 {
			x := math.Log(k)
			return (2*(x-0.5)*(x-2.5)*(2*x-3) + shift) / k
		}
		s := curve(double, slope)
		a, err := s.minimum(math.Inf(1))
		require.NoError(t, err)
		want := 0.5
		if shift < 0 {
			want = 2.5
		}
		assert.InDelta(t, want, math.Log(a.K), 0.01)
		assert.InDelta(t, 0, slope(a.K), 1e-10)
		assert.True(t, slices.IsSortedFunc(s.samples, func(a, b sample) int { return cmp.Compare(a.k, b.k) }))
		assert.Less(t, len(s.samples), 60)
	}

	corner := curve(
		func(k float64) float64 { return max(3/k, k*k) },
		func(k float64) float64 {
			if 3/k > k*k {
				return -3 / (k * k)
			}
			return 2 * k
		})
	a, err := corner.minimum(math.Inf(1))
	require.NoError(t, err)
	assert.InEpsilon(t, math.Cbrt(3), a.K, 1e-11)
	assert.LessOrEqual(t, math.Abs(a.K-math.Cbrt(3)), 2*a.kError)

	gap := curve(
		func(k float64) float64 {
			if k < 4 || k > 7 {
				return math.Inf(1)
			}
			return 1 + (k-5)*(k-5)
		},
		func(k float64) float64 {
			if k < 4 || k > 7 {
				return math.NaN()
			}
			return 2 * (k - 5)
		})
	a, err = gap.minimum(math.Inf(1))
	require.NoError(t, err)
	assert.InEpsilon(t, 5, a.K, 1e-11)

	nothing := curve(func(float64) float64 { return math.Inf(1) }, func(float64) float64 { return math.NaN() })
	a, err = nothing.minimum(math.Inf(1))
	require.NoError(t, err)
	assert.True(t, math.IsInf(a.value, 1))
	assert.Less(t, nothing.interval()[0], leastWavenumber)
	assert.Greater(t, nothing.interval()[1], largestWavenumber)
}

// A bound that is above the best value found spares the wavenumbers beyond.
func TestSearchStopsAtItsBound(t *testing.T) {
	s := curve(func(k float64) float64 { return k + 9/k }, func(k float64) float64 { return 1 - 9/(k*k) })
	s.lower = func(k float64) float64 { return 0.9 * (k + 9/k) }
	a, err := s.minimum(math.Inf(1))
	require.NoError(t, err)
	assert.InEpsilon(t, 3, a.K, 1e-11)
	assert.Less(t, len(s.samples), 14)
	assert.Greater(t, s.interval()[0], 1.0)
	assert.Less(t, s.interval()[1], 9.0)
	// Errors of samples end it.
	fail := errors.New("fails")
	s.sample = func(float64) (sample, error) { return sample{}, fail }
	_, err = s.minimum(math.Inf(1))
	assert.ErrorIs(t, err, fail)
}

func TestInterpolation(t *testing.T) {
	// A cubic in ln k is met exactly.
	f := func(k float64) float64 { x := math.Log(k); return 5 - 3*x + x*x*x }
	slope := func(k float64) float64 { x := math.Log(k); return (3*x*x - 3) / k }
	a := sample{k: 2, value: f(2), slope: slope(2), level: 1}
	b := sample{k: 4, value: f(4), slope: slope(4), level: 3}
	require.True(t, encloses(a, b))
	assert.False(t, encloses(b, a))
	m := interpolated(a, b)
	assert.InEpsilon(t, math.E, m.k, 1e-12)
	assert.InEpsilon(t, 3, m.value, 1e-12)
	assert.Equal(t, 3, m.level)
	half := middle(a, b)
	assert.InEpsilon(t, math.Sqrt(8), half.k, 1e-14)
	assert.InEpsilon(t, f(math.Sqrt(8)), half.value, 1e-12)
}

func TestMarangoniBound(t *testing.T) {
	for _, l := range []Layer{{Bottom: Rigid, Top: Free.Robin(1)}, {Top: Free.FixedFlux()}} {
		s, err := NewSolver(l, nil)
		require.NoError(t, err)
		for _, k := range []float64{0.5, 2, 6} {
			search := Search{Number: MarangoniNumber, Rayleigh: 100}
			o, err := s.Neutral(search, k)
			require.NoError(t, err)
			bound := s.bound.lower(k, MarangoniNumber, s.drives(100))
			assert.Less(t, bound, o.Value)
			assert.Positive(t, bound)
		}
	}
}
