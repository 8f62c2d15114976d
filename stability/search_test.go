package stability

import (
	"errors"
	"math"
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
		for k := 0.7; k < 50; k *= 1.08 {
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
		assert.InEpsilon(t, ks[best], o.Wavenumber, 0.09)
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
