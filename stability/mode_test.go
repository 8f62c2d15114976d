package stability

import (
	"math"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// second is the second derivative by differences of fourth order.
func second(f func(float64) float64, z float64) float64 {
	const h = 2e-3
	return (-f(z+2*h) + 16*f(z+h) - 30*f(z) + 16*f(z-h) - f(z-2*h)) / (12 * h * h)
}

// first is the first derivative likewise.
func first(f func(float64) float64, z float64) float64 {
	const h = 2e-3
	return (-f(z+2*h) + 8*f(z+h) - 8*f(z-h) + f(z-2*h)) / (12 * h)
}

// The functions of a mode solve the equations that the package comment states.
func TestModeSolvesTheEquations(t *testing.T) {
	const ra, k = 30000.0, 3.4
	l := Layer{
		Bottom: Rigid, Top: Free.Robin(3), Base: MixedHeating(2), Prandtl: 4, Taylor: 900,
		Viscosity: ViscosityLaw(func(z, _ float64) float64 { return 1 + z }),
		Solute:    Solute{Rayleigh: 500, Diffusivity: 0.3, Top: NoFlux},
	}
	s, err := NewSolver(l, nil)
	require.NoError(t, err)
	modes, err := s.Spectrum(ra, k, 3)
	require.NoError(t, err)
	for i, g := range modes {
		if g.Frequency != 0 {
			continue
		}
		m, sigma := g.Mode, g.Rate
		stress := func(z float64) float64 { return (1 + z) * (second(m.Velocity, z) + k*k*m.Velocity(z)) }
		shear := func(z float64) float64 { return (1 + z) * first(m.Velocity, z) }
		twist := func(z float64) float64 { return (1 + z) * first(m.Vorticity, z) }
		for _, z := range []float64{0.2, 0.45, 0.8} {
			w, theta := m.Velocity(z), m.Temperature(z)
			f := 1 + 2*(z-0.5)
			assert.InDelta(t, sigma*theta, second(m.Temperature, z)-k*k*theta+f*w, 1e-6, "heat, mode %d", i)
			assert.InDelta(t, sigma*m.Solute(z), 0.3*(second(m.Solute, z)-k*k*m.Solute(z))+w, 1e-6, "solute, mode %d", i)
			assert.InDelta(t, sigma/4*m.Vorticity(z), first(twist, z)-k*k*(1+z)*m.Vorticity(z)+first(m.Velocity, z), 1e-4,
				"vorticity, mode %d", i)
			force := ra*k*k*theta - 500*k*k*m.Solute(z) + 900*first(m.Vorticity, z)
			left := second(stress, z) + k*k*stress(z) - 4*k*k*first(shear, z) - sigma/4*(second(m.Velocity, z)-k*k*w)
			assert.InDelta(t, 0, (left-force)/ra, 1e-5, "momentum, mode %d", i)
		}
		const h = 1e-6
		assert.InDelta(t, 0, m.Velocity(0), 1e-14)
		assert.InDelta(t, 0, m.Velocity(h)/h, 1e-4)
		assert.InDelta(t, 0, m.Velocity(1), 1e-14)
		slope := (m.Temperature(1) - m.Temperature(1-h)) / h
		assert.InDelta(t, -3*m.Temperature(1), slope, 1e-5)
		assert.InDelta(t, 0, (m.Solute(1)-m.Solute(1-h))/h, 1e-5)
		assert.InDelta(t, 0, m.Vorticity(0), 1e-14)
	}
}

func TestModeIsNormalised(t *testing.T) {
	m := critical(t, Layer{Bottom: Rigid, Viscosity: Exponential(8, 0.5)}).Mode
	assert.InDelta(t, 1, m.Velocity(m.Peak()), 1e-14)
	for i := range 101 {
		z := float64(i) / 100
		assert.LessOrEqual(t, m.Velocity(z), 1.0)
		assert.GreaterOrEqual(t, m.Velocity(z), 0.0)
		assert.GreaterOrEqual(t, m.Temperature(z), -1e-14)
		assert.InDelta(t, -m.Velocity(z)/m.Wavenumber(), m.StreamFunction(z), 1e-15)
	}
	for _, z := range []float64{0.1, 0.5, 0.77} { // u = ∂ψ/∂z
		assert.InDelta(t, first(m.StreamFunction, z), m.HorizontalVelocity(z), 1e-7)
	}
	assert.Zero(t, m.Solute(0.5))
	assert.Zero(t, m.Vorticity(0.5))
	assert.Same(t, m, m.AtPhase(1), "nothing oscillates")
}

// Free boundaries: w = sin πz, θ = w/(π²+k²).
func TestModeOfFreeLayer(t *testing.T) {
	m := critical(t, Layer{}).Mode
	a := 1.5 * math.Pi * math.Pi
	assert.InDelta(t, 0.5, m.Peak(), 1e-13)
	for i := range 21 {
		z := float64(i) / 20
		assert.InDelta(t, math.Sin(math.Pi*z), m.Velocity(z), 1e-13)
		assert.InDelta(t, math.Sin(math.Pi*z)/a, m.Temperature(z), 1e-14)
		assert.InDelta(t, -math.Pi*math.Cos(math.Pi*z)/m.Wavenumber(), m.HorizontalVelocity(z), 1e-12)
	}
}

// An oscillation comes back after a period, and a quarter of it is the time
// derivative over the frequency: the heat equation shows that.
func TestOscillatingMode(t *testing.T) {
	o := critical(t, Layer{Bottom: Rigid, Prandtl: 7, Solute: Solute{Rayleigh: 5000, Diffusivity: 0.1}})
	require.True(t, o.Oscillates())
	m, k := o.Mode, o.Wavenumber
	quarter, whole := m.AtPhase(math.Pi/2), m.AtPhase(2*math.Pi)
	for _, z := range []float64{0.2, 0.5, 0.9} {
		rate := o.Frequency * quarter.Temperature(z)
		assert.InDelta(t, rate, second(m.Temperature, z)-k*k*m.Temperature(z)+m.Velocity(z), 1e-7)
		assert.InDelta(t, m.Temperature(z), whole.Temperature(z), 1e-14)
		assert.InDelta(t, m.Solute(z), whole.Solute(z), 1e-14)
		assert.InDelta(t, -m.Velocity(z), m.AtPhase(math.Pi).Velocity(z), 1e-14)
	}
	assert.InDelta(t, 1, m.Velocity(m.Peak()), 1e-13)
	assert.InDelta(t, 0, quarter.Velocity(m.Peak()), 1e-13)
}

// At zero wavenumber, temperature is uniform and w = k² P with P⁗ = Ra.
func TestModeAtZeroWavenumber(t *testing.T) {
	o := critical(t, Layer{Bottom: Rigid.FixedFlux(), Top: Rigid.FixedFlux()})
	m := o.Mode
	require.True(t, o.LongWave())
	assert.True(t, math.IsInf(o.Wavelength, 1))
	theta := m.Temperature(0.5)
	for _, z := range []float64{0, 0.3, 1} {
		assert.InDelta(t, theta, m.Temperature(z), 1e-13)
		assert.InDelta(t, 16*z*z*(1-z)*(1-z), m.Velocity(z), 1e-13)
	}
	assert.InEpsilon(t, 16*24/o.Rayleigh, theta, 1e-12)
	assert.InDelta(t, -m.Velocity(0.3), m.StreamFunction(0.3), 1e-15)
	// It is the limit of modes of small wavenumber.
	n, err := Layer{Bottom: Rigid.FixedFlux(), Top: Rigid.FixedFlux()}.Neutral(1e-3)
	require.NoError(t, err)
	assert.InEpsilon(t, m.Velocity(0.3), n.Mode.Velocity(0.3), 1e-6)
	assert.InEpsilon(t, theta, n.Mode.Temperature(0.3)*1e-6, 1e-6)
	open := critical(t, Layer{Porous: Darcy, Bottom: Permeable, Top: Permeable})
	require.True(t, open.LongWave())
	assert.InDelta(t, 1, open.Mode.Velocity(0.2), 1e-13)
	assert.InEpsilon(t, 0.5*0.2*0.8, open.Mode.Temperature(0.2), 1e-12) // θ″ = -w
}
