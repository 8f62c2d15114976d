package stability

import (
	"math"
	"math/cmplx"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

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
