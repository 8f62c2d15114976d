package stability

import (
	"math"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

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

// The temperature and the gradient of each base state belong together, and the
// temperature at the top is zero.
func TestBaseStatesAreConsistent(t *testing.T) {
	for _, b := range []Base{
		{}, InternalHeating(), InternalHeatingBetween(), MixedHeating(3), MixedFlux(0.3), CoolingFromAbove(0.03),
		Gradient(func(z float64) float64 { return math.Exp(z) }),
		Temperature(func(z float64) float64 { return math.Cos(z) - math.Cos(1) }),
	} {
		s, err := b.resolve()
		require.NoError(t, err)
		for _, z := range []float64{0.1, 0.4, 0.85} {
			assert.InDelta(t, -first(s.temperature, z), s.gradient(z), 1e-8, "%v at %g", b, z)
			assert.LessOrEqual(t, math.Abs(s.gradient(z)), s.largest, "%v", b)
		}
		assert.InDelta(t, 0, s.temperature(1), 1e-13, "%v", b)
		assert.Equal(t, b.String() == Base{}.String(), s.unit(), "%v", b)
	}
	uniform, err := MixedFlux(0).resolve()
	require.NoError(t, err)
	assert.True(t, uniform.unit())
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
