package stability

import (
	"errors"
	"math"
	"math/cmplx"
	"runtime"
	"sync"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

func critical(t *testing.T, l Layer) Onset {
	t.Helper()
	o, err := l.Critical()
	require.NoError(t, err, "%v", l)
	return o
}

// Upside down, a layer of uniform gradient and viscosity has the same onset, and
// one of variable viscosity that of the mirrored viscosity.
func TestMirrorImages(t *testing.T) {
	for _, pair := range [][2]Layer{
		{{Bottom: Rigid.Robin(2), Top: Free.FixedFlux()}, {Bottom: Free.FixedFlux(), Top: Rigid.Robin(2)}},
		{{Porous: Darcy, Top: Permeable.Robin(3)}, {Porous: Darcy, Bottom: Permeable.Robin(3)}},
		{
			{Bottom: Rigid, Viscosity: ViscosityLaw(func(z, _ float64) float64 { return math.Exp(4 * z * z) })},
			{Top: Rigid, Viscosity: ViscosityLaw(func(z, _ float64) float64 { return math.Exp(4 * (1 - z) * (1 - z)) })},
		},
		{{Bottom: Rigid, Taylor: 500}, {Top: Rigid, Taylor: 500}},
	} {
		a, b := critical(t, pair[0]), critical(t, pair[1])
		assert.InEpsilon(t, a.Rayleigh, b.Rayleigh, 1e-13, "%v", pair[0])
		assert.InEpsilon(t, a.Wavenumber, b.Wavenumber, 1e-13, "%v", pair[0])
		assert.InEpsilon(t, a.Mode.Peak(), 1-b.Mode.Peak(), 1e-11, "%v", pair[0])
	}
}

// The Rayleigh number goes as the viscosity and as one over the gradient.
func TestScaling(t *testing.T) {
	plain := critical(t, Layer{Bottom: Rigid})
	thick := critical(t, Layer{Bottom: Rigid, Viscosity: ViscosityLaw(func(_, _ float64) float64 { return 8 })})
	steep := critical(t, Layer{Bottom: Rigid, Base: Gradient(func(float64) float64 { return 4 })})
	assert.InEpsilon(t, 8*plain.Rayleigh, thick.Rayleigh, 1e-13)
	assert.InEpsilon(t, plain.Rayleigh/4, steep.Rayleigh, 1e-13)
	assert.InEpsilon(t, plain.Wavenumber, thick.Wavenumber, 1e-13)
	assert.InEpsilon(t, plain.Wavenumber, steep.Wavenumber, 1e-13)
}

// The rigid-free layer is the lower half of the odd mode of the rigid one.
func TestHalfOfTheOddMode(t *testing.T) {
	odd, err := Layer{Bottom: Rigid, Top: Rigid}.Find(Search{Order: 1})
	require.NoError(t, err)
	half := critical(t, Layer{Bottom: Rigid})
	assert.InEpsilon(t, odd.Rayleigh/16, half.Rayleigh, 1e-12)
	assert.InEpsilon(t, odd.Wavenumber/2, half.Wavenumber, 1e-12)
}

// The Biot number joins fixed flux and isothermal boundaries.
func TestBiotNumberIsContinuous(t *testing.T) {
	for _, w := range []Wall{Free, Rigid} {
		isothermal := critical(t, Layer{Bottom: w, Top: w})
		nearly := critical(t, Layer{Bottom: w.Robin(1e15), Top: w.Robin(1e15)})
		assert.InEpsilon(t, isothermal.Rayleigh, nearly.Rayleigh, 1e-13)
		flux := critical(t, Layer{Bottom: w.FixedFlux(), Top: w.FixedFlux()})
		require.True(t, flux.LongWave())
		last := flux.Rayleigh
		for _, bi := range []float64{1e-16, 1e-12, 1e-8, 1e-4, 1, 1e4} {
			o := critical(t, Layer{Bottom: w.Robin(bi), Top: w.Robin(bi)})
			assert.Greater(t, o.Rayleigh, last, "Bi = %g", bi)
			assert.False(t, o.LongWave(), "Bi = %g", bi)
			last = o.Rayleigh
		}
		// Two terms of the expansion in Bi: Ra = R₀ + 2 √(2 R₀R₂Bi), k⁴ = 2 Bi R₀/R₂.
		const bi = 1e-12
		o := critical(t, Layer{Bottom: w.Robin(bi), Top: w.Robin(bi)})
		r2 := flux.Curvature / 2
		assert.InEpsilon(t, 2*math.Sqrt(2*flux.Rayleigh*r2*bi), o.Rayleigh-flux.Rayleigh, 1e-5)
		assert.InEpsilon(t, math.Pow(2*bi*flux.Rayleigh/r2, 0.25), o.Wavenumber, 1e-5)
	}
}

// The growth rate vanishes at the critical point and has the sign of Ra - Ra_c;
// stationary onset does not depend on the Prandtl number.
func TestGrowthChangesSignAtOnset(t *testing.T) {
	for _, pr := range []float64{0.01, 0.3, 1, 40, 1e6, 0} {
		l := Layer{Bottom: Rigid, Top: Rigid.Robin(2), Prandtl: pr}
		o := critical(t, l)
		assert.InEpsilon(t, critical(t, Layer{Bottom: Rigid, Top: Rigid.Robin(2)}).Rayleigh, o.Rayleigh, 1e-13)
		for _, d := range []float64{-1e-3, 0, 1e-3} {
			g, err := l.Growth(o.Rayleigh*(1+d), o.Wavenumber)
			require.NoError(t, err)
			if d == 0 {
				assert.InDelta(t, 0, g.Rate, 1e-11, "Pr = %g", pr)
				continue
			}
			assert.Greater(t, g.Rate*d, 0.0, "Pr = %g", pr)
		}
	}
}

// Free boundaries have closed solutions, sin(nπz); every vertical mode of the
// spectrum must be one of them, and none may be missing.
func TestSpectrumOfFreeLayer(t *testing.T) {
	const ra, k, pr = 3e4, 3.0, 0.8
	var want []float64
	for n := 1; n <= 8; n++ {
		a := float64(n*n)*math.Pi*math.Pi + k*k
		b, c := a*(1+pr), a*a*pr-ra*k*k*pr/a // σ² + bσ + c = 0
		root := math.Sqrt(b*b - 4*c)
		want = append(want, (-b+root)/2, (-b-root)/2)
	}
	s, err := NewSolver(Layer{Prandtl: pr}, nil)
	require.NoError(t, err)
	modes, err := s.Spectrum(ra, k, 5)
	require.NoError(t, err)
	for i, m := range modes {
		nearest := math.Inf(1)
		for _, w := range want {
			nearest = min(nearest, math.Abs(w-m.Rate))
		}
		assert.Less(t, nearest, 1e-9*(1+math.Abs(m.Rate)), "mode %d", i)
		assert.LessOrEqual(t, nearest, m.Error.Rate+1e-12*math.Abs(m.Rate), "error estimate of mode %d", i)
		faster := 0
		for _, w := range want {
			if w > m.Rate+1e-6 {
				faster++
			}
		}
		assert.Equal(t, i, faster, "modes faster than mode %d", i)
	}
}

// Oscillations between free boundaries have closed solutions too.
func TestFreeOscillations(t *testing.T) {
	const k, pr = 2.7, 0.4
	a := math.Pi*math.Pi + k*k
	tests := []struct {
		name  string
		layer Layer
		drive func(sigma complex128) complex128 // Ra at growth rate σ
	}{
		{"rotation", Layer{Prandtl: pr, Taylor: 4e4}, func(sigma complex128) complex128 {
			d := sigma/pr + complex(a, 0)
			return (sigma + complex(a, 0)) * (d*complex(a, 0) + complex(4e4*math.Pi*math.Pi, 0)/d) / (k * k)
		}},
		{"solute", Layer{Prandtl: pr, Solute: Solute{Rayleigh: 8000, Diffusivity: 0.2}}, func(sigma complex128) complex128 {
			d := sigma/pr + complex(a, 0)
			return (sigma+complex(a, 0))*complex(a, 0)*d/(k*k) + (sigma+complex(a, 0))/(sigma+complex(0.2*a, 0))*8000
		}},
		{
			"magnetic field", Layer{Prandtl: pr, Magnetic: Magnetic{
				Chandrasekhar: 400, Diffusivity: 0.1, Bottom: VerticalField, Top: VerticalField,
			}}, func(sigma complex128) complex128 {
				d := sigma/pr + complex(a, 0)
				lorentz := complex(400*math.Pi*math.Pi*a, 0) / (complex(a, 0) + 10*sigma)
				return (sigma + complex(a, 0)) * (d*complex(a, 0) + lorentz) / (k * k)
			},
		},
		{
			"rotation and magnetic field", Layer{Prandtl: pr, Taylor: 1e6, Magnetic: Magnetic{
				Chandrasekhar: 50, Diffusivity: 2, Bottom: VerticalField, Top: VerticalField,
			}}, func(sigma complex128) complex128 {
				const q, ta = 50, 1e6
				d, e := sigma/pr+complex(a, 0), complex(a, 0)+sigma/2 // viscous, magnetic
				p2 := complex(math.Pi*math.Pi, 0)
				vortex := d + q*p2/e
				return (sigma + complex(a, 0)) * (d*complex(a, 0) + q*p2*complex(a, 0)/e + ta*p2/vortex) / (k * k)
			},
		},
	}
	for _, tt := range tests {
		t.Run(tt.name, func(t *testing.T) {
			s, err := NewSolver(tt.layer, nil)
			require.NoError(t, err)
			o, err := s.Neutral(Search{}, k)
			require.NoError(t, err)
			require.True(t, o.Oscillates())
			ra := tt.drive(complex(0, o.Frequency))
			assert.InEpsilon(t, real(ra), o.Rayleigh, 1e-12)
			assert.InDelta(t, 0, imag(ra)/real(ra), 1e-12)
			assert.Less(t, cmplx.Abs(ra-complex(o.Rayleigh, 0)), 2*o.Error.Value+1e-12*o.Rayleigh+2*cmplx.Abs(ra)*o.Error.Frequency)
			// A little above, the oscillation grows; a little below, all decays.
			for _, d := range []float64{-1e-3, 1e-3} {
				g, err := s.Growth(o.Rayleigh*(1+d), k)
				require.NoError(t, err)
				assert.Greater(t, g.Rate*d, 0.0)
				assert.InEpsilon(t, o.Frequency, g.Frequency, 0.05)
			}
		})
	}
}

// rotatingFreeOnset minimises the closed forms of the stationary and the
// oscillatory neutral curve between free boundaries over a fine grid.
func rotatingFreeOnset(ta, pr float64) (least float64, oscillates bool) {
	least = math.Inf(1)
	p2 := math.Pi * math.Pi
	for k := 0.5; k < 60; k *= 1.0005 {
		a := p2 + k*k
		if ra := (a*a*a + ta*p2) / (k * k); ra < least {
			least, oscillates = ra, false
		}
		// The imaginary part of Ra vanishes for d = ω²/Pr² + a².
		d := ta * p2 * (1/pr - 1) / (a * (1 + 1/pr))
		omega2 := (d - a*a) * pr * pr
		if omega2 <= 0 {
			continue
		}
		if ra := (a*(a*a-omega2/pr) + ta*p2*(a*a+omega2/pr)/d) / (k * k); ra < least {
			least, oscillates = ra, true
		}
	}
	return least, oscillates
}

// The first onset of a rotating layer is the right one of two branches, over
// five decades of the Taylor number and two of the Prandtl number.
func TestFirstOnsetOfRotatingLayers(t *testing.T) {
	skipIfShort(t)
	for _, ta := range []float64{30, 900, 4e3, 2e4, 1.1e5} {
		for _, pr := range []float64{0.01, 0.06, 0.3, 0.62, 0.68, 3} {
			want, oscillates := rotatingFreeOnset(ta, pr)
			o := critical(t, Layer{Taylor: ta, Prandtl: pr})
			assert.InEpsilon(t, want, o.Value, 1e-6, "Ta = %g, Pr = %g", ta, pr)
			assert.Equal(t, oscillates, o.Oscillates(), "Ta = %g, Pr = %g", ta, pr)
			assert.LessOrEqual(t, o.Value, want*(1+1e-12), "a grid is not below the minimum")
		}
	}
}

// The oscillatory branch is found by name where the stationary one comes first.
func TestOscillatoryBranchByName(t *testing.T) {
	const ta, pr = 1e4, 0.66
	want, at := math.Inf(1), 0.0
	p2 := math.Pi * math.Pi
	for k := 0.5; k < 20; k *= 1.0002 {
		a := p2 + k*k
		d := ta * p2 * (1/pr - 1) / (a * (1 + 1/pr))
		omega2 := (d - a*a) * pr * pr
		if omega2 <= 0 {
			continue
		}
		if ra := (a*(a*a-omega2/pr) + ta*p2*(a*a+omega2/pr)/d) / (k * k); ra < want {
			want, at = ra, k
		}
	}
	l := Layer{Taylor: ta, Prandtl: pr}
	o, err := l.Find(Search{Branch: OscillatoryOnset})
	require.NoError(t, err)
	assert.True(t, o.Oscillates())
	assert.InEpsilon(t, want, o.Value, 1e-6)
	assert.InEpsilon(t, at, o.Wavenumber, 1e-2)
	stationary, err := l.Find(Search{Branch: StationaryOnset})
	require.NoError(t, err)
	first := critical(t, l)
	assert.Less(t, stationary.Value, o.Value)
	assert.Equal(t, stationary.Value, first.Value)
	s, err := NewSolver(l, nil)
	require.NoError(t, err)
	n, err := s.Neutral(Search{Branch: OscillatoryOnset}, o.Wavenumber)
	require.NoError(t, err)
	assert.InEpsilon(t, o.Value, n.Value, 1e-12)
}

// A slowly diffusing solute makes thin layers at rigid walls, which the coarse
// level of the search does not resolve: the answer comes from finer ones.
func TestThinSoluteLayers(t *testing.T) {
	l := Layer{Bottom: Rigid, Top: Rigid, Prandtl: 7, Solute: Solute{Rayleigh: 1e5, Diffusivity: 0.003}}
	s, err := NewSolver(l, nil)
	require.NoError(t, err)
	o, err := s.Critical()
	require.NoError(t, err)
	require.True(t, o.Oscillates())
	q, err := s.question(Search{})
	require.NoError(t, err)
	rough, err := q.oscillation(o.Wavenumber, 3*o.Value)
	require.NoError(t, err)
	assert.Greater(t, rough.level, checkLevel)
	assert.InEpsilon(t, o.Value, rough.value, 1e-2)
	for _, d := range []float64{-1e-4, 1e-4} {
		g, err := s.Growth(o.Value*(1+d), o.Wavenumber)
		require.NoError(t, err)
		assert.Positive(t, g.Rate*d)
		assert.InEpsilon(t, o.Frequency, g.Frequency, 1e-2)
	}
}

// A solute whose gradient is a function is one with the number it always gives;
// where it varies, its part in the buoyancy is that of its mean to first order.
func TestGradientOfTheSolute(t *testing.T) {
	layer := func(h func(float64) float64) Layer {
		return Layer{Bottom: Rigid, Top: Rigid, Prandtl: 7, Solute: Solute{Rayleigh: 300, Diffusivity: 0.5, Gradient: h}}
	}
	plain := critical(t, layer(nil))
	same := critical(t, layer(func(float64) float64 { return 1 }))
	assert.InEpsilon(t, plain.Value, same.Value, 1e-13)
	tilted := critical(t, layer(func(z float64) float64 { return 1 + 0.2*(z-0.5) }))
	assert.InEpsilon(t, plain.Value, tilted.Value, 1e-3)
	assert.Greater(t, math.Abs(plain.Value-tilted.Value), 1e-6)
	doubled := critical(t, layer(func(float64) float64 { return 2 }))
	rigid := critical(t, Layer{Bottom: Rigid, Top: Rigid})
	assert.InEpsilon(t, 2*(plain.Value-rigid.Value), doubled.Value-rigid.Value, 1e-10)
	_, err := layer(func(z float64) float64 { return math.NaN() }).Critical()
	var input *InputError
	require.ErrorAs(t, err, &input)
	assert.Equal(t, "solute gradient at z = 0", input.Name)
}

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

// What stabilises raises the critical number.
func TestStabilisingEffects(t *testing.T) {
	plain := critical(t, Layer{Bottom: Rigid, Top: Rigid}).Rayleigh
	for _, l := range []Layer{
		{Bottom: Rigid, Top: Rigid, Taylor: 10},
		{Bottom: Rigid, Top: Rigid, Magnetic: Magnetic{Chandrasekhar: 1}},
		{Bottom: Rigid, Top: Rigid, Solute: Solute{Rayleigh: 10, Diffusivity: 0.5}},
	} {
		assert.Greater(t, critical(t, l).Rayleigh, plain, "%v", l)
	}
	helped := critical(t, Layer{Bottom: Rigid, Top: Rigid, Solute: Solute{Rayleigh: -10, Diffusivity: 0.5}})
	assert.InEpsilon(t, plain-10/0.5, helped.Rayleigh, 1e-12)
}

// Salt fingers: a stable temperature, and a solute of the same Rayleigh number
// over diffusivity as heat alone would need.
func TestSoluteRayleighNumber(t *testing.T) {
	l := Layer{Bottom: Rigid, Top: Rigid, Prandtl: 7, Solute: Solute{Diffusivity: 0.01}}
	s, err := NewSolver(l, nil)
	require.NoError(t, err)
	o, err := s.Find(Search{Number: SoluteRayleigh, Rayleigh: -5000})
	require.NoError(t, err)
	plain := critical(t, Layer{Bottom: Rigid, Top: Rigid})
	assert.InEpsilon(t, -(plain.Rayleigh+5000)*0.01, o.Value, 1e-12)
	assert.Equal(t, o.Value, o.SoluteRayleigh)
	assert.Equal(t, -5000.0, o.Rayleigh)
	assert.InEpsilon(t, plain.Wavenumber, o.Wavenumber, 1e-12)
}

func TestUnstableWithoutTheNumber(t *testing.T) {
	s, err := NewSolver(Layer{Bottom: Rigid, Top: Free.Robin(1)}, nil)
	require.NoError(t, err)
	_, err = s.Find(Search{Number: MarangoniNumber, Rayleigh: 5000})
	assert.ErrorIs(t, err, ErrUnstable)
	_, err = Layer{Solute: Solute{Rayleigh: -2000, Diffusivity: 0.5}, Prandtl: 1}.Critical()
	assert.ErrorIs(t, err, ErrUnstable)
}

// A porous layer open on both sides, with fixed flux on both, has nothing to
// stop wide rolls.
func TestBottomlessPorousLayer(t *testing.T) {
	open := Permeable.FixedFlux()
	o := critical(t, Layer{Porous: Darcy, Bottom: open, Top: open})
	assert.True(t, o.LongWave())
	assert.Zero(t, o.Rayleigh)
	n, err := Layer{Porous: Darcy, Bottom: open, Top: open}.Neutral(0.1)
	require.NoError(t, err)
	assert.InEpsilon(t, 0.01, n.Rayleigh, 1e-12) // w and θ uniform: Ra = k²
}

// Long waves are found where the equations are regular at zero wavenumber, and
// where they are not: with free boundaries, rotation and conducting walls.
func TestLongWavesWithRotationAndField(t *testing.T) {
	walls := []MagneticWall{Insulating, Conducting, VerticalField}
	for _, w := range []Wall{Free, Rigid} {
		var values []float64
		for _, bottom := range walls {
			for _, top := range walls {
				o := critical(t, Layer{
					Bottom: w.FixedFlux(), Top: w.FixedFlux(), Taylor: 5,
					Magnetic: Magnetic{Chandrasekhar: 3, Bottom: bottom, Top: top},
				})
				assert.True(t, o.LongWave(), "%v, %v, %v", w, bottom, top)
				values = append(values, o.Value)
			}
		}
		// At k → 0 the currents of rolls do not reach the walls.
		for _, v := range values {
			assert.InEpsilon(t, values[0], v, 0.2)
		}
		plain := critical(t, Layer{Bottom: w.FixedFlux(), Top: w.FixedFlux()})
		assert.Greater(t, values[0], plain.Value)
	}
	// A gradient without a mean has no long waves.
	flux := Free.FixedFlux()
	assert.False(t, critical(t, Layer{Bottom: flux, Top: flux, Base: InternalHeatingBetween()}).LongWave())
}

// Modes that other fields than the temperature make up alone are resolved as
// well: here a uniform magnetic field that decays by diffusion.
func TestDecayOfAUniformField(t *testing.T) {
	l := Layer{
		Bottom: Free.FixedFlux(), Top: Free.FixedFlux(), Prandtl: 7,
		Magnetic: Magnetic{Chandrasekhar: 9, Diffusivity: 0.1, Bottom: VerticalField, Top: VerticalField},
	}
	g, err := l.Growth(1, 0.8)
	require.NoError(t, err)
	assert.InEpsilon(t, -0.1*0.64, g.Rate, 1e-12)
}

// At infinite Prandtl number and finite magnetic diffusivity, the equations of
// motion have a mass matrix without an inertia: no growth rate is infinite.
func TestInductionWithoutInertia(t *testing.T) {
	l := Layer{Bottom: Rigid, Base: MixedHeating(3), Magnetic: Magnetic{Chandrasekhar: 50, Diffusivity: 0.1}}
	o := critical(t, l)
	g, err := l.Growth(o.Rayleigh, o.Wavenumber)
	require.NoError(t, err)
	assert.InDelta(t, 0, g.Rate, 1e-9)
}

// A jump of viscosity and a kink of the gradient that are not listed are found.
func TestUnlistedJump(t *testing.T) {
	step := func(z, _ float64) float64 {
		if z < 0.37 {
			return 1
		}
		return 50
	}
	listed := critical(t, Layer{Viscosity: ViscosityLaw(step, 0.37)})
	found := critical(t, Layer{Viscosity: ViscosityLaw(step)})
	assert.InEpsilon(t, listed.Rayleigh, found.Rayleigh, 1e-11)
	assert.InEpsilon(t, listed.Rayleigh, critical(t, Layer{Viscosity: Layered([]float64{0.37}, []float64{1, 50})}).Rayleigh, 1e-13)
	kinked := func(z float64) float64 { return math.Abs(z-0.3) + 0.2 }
	a := critical(t, Layer{Base: Gradient(kinked, 0.3)})
	b := critical(t, Layer{Base: Gradient(kinked)})
	assert.InEpsilon(t, a.Rayleigh, b.Rayleigh, 1e-11)
}

// A base state given by its temperature is as good as one given by its gradient.
func TestTemperatureAndGradientAgree(t *testing.T) {
	t0 := func(z float64) float64 { return math.Exp(-2*z) + 0.3*z }
	f := func(z float64) float64 { return 2*math.Exp(-2*z) - 0.3 }
	law := Exponential(3, 0.5)
	byT := critical(t, Layer{Base: Temperature(t0)})
	byF := critical(t, Layer{Base: Gradient(f)})
	assert.InEpsilon(t, byF.Rayleigh, byT.Rayleigh, 1e-11)
	// For a viscosity law the zero of temperature matters: Gradient puts it at the top.
	shifted := Temperature(func(z float64) float64 { return t0(z) - t0(1) })
	byT = critical(t, Layer{Base: shifted, Viscosity: law})
	byF = critical(t, Layer{Base: Gradient(f), Viscosity: law})
	assert.InEpsilon(t, byF.Rayleigh, byT.Rayleigh, 1e-11)
}

// The same question has the same answer to the bit, whatever else a solver was
// asked before and on however many threads.
func TestAnswersDoNotDependOnHistory(t *testing.T) {
	l := Layer{Bottom: Rigid, Top: Free.Robin(2), Base: MixedHeating(3), Viscosity: Exponential(5, 0.5), Prandtl: 2}
	fresh := func() *Solver {
		s, err := NewSolver(l, nil)
		require.NoError(t, err)
		return s
	}
	first, err := fresh().Critical()
	require.NoError(t, err)
	used := fresh()
	_, err = used.Fastest(1e6)
	require.NoError(t, err)
	_, err = used.Neutral(Search{}, 17)
	require.NoError(t, err)
	again, err := used.Critical()
	require.NoError(t, err)
	assert.Equal(t, math.Float64bits(first.Rayleigh), math.Float64bits(again.Rayleigh))
	assert.Equal(t, math.Float64bits(first.Wavenumber), math.Float64bits(again.Wavenumber))
	assert.Equal(t, math.Float64bits(first.Mode.Temperature(0.3)), math.Float64bits(again.Mode.Temperature(0.3)))

	stiff := Layer{Viscosity: Exponential(18, 0.5), Taylor: 1e5} // large enough for parallel kernels
	parallel := critical(t, stiff)
	defer runtime.GOMAXPROCS(runtime.GOMAXPROCS(1))
	alone, err := fresh().Critical()
	require.NoError(t, err)
	assert.Equal(t, math.Float64bits(first.Rayleigh), math.Float64bits(alone.Rayleigh))
	serial := critical(t, stiff)
	require.Greater(t, parallel.Mode.layout.Size(), 200)
	assert.Equal(t, math.Float64bits(parallel.Rayleigh), math.Float64bits(serial.Rayleigh))
	assert.Equal(t, math.Float64bits(parallel.Wavenumber), math.Float64bits(serial.Wavenumber))
}

func TestLayersAreSafeForConcurrentUse(t *testing.T) {
	l := Layer{Bottom: Rigid, Base: InternalHeating(), Viscosity: Exponential(4, 0.5)}
	want := critical(t, l)
	var wg sync.WaitGroup
	for range 4 {
		wg.Go(func() {
			o, err := l.Critical()
			assert.NoError(t, err)
			assert.Equal(t, want.Rayleigh, o.Rayleigh)
			assert.Equal(t, want.Mode.Velocity(0.2), want.Mode.Velocity(0.2))
		})
	}
	wg.Wait()
}
