package stability

import (
	"math"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// Counting growth of the square over physical depth (Darcy): the values are in
// the definitions of testdata/README.md, section H2, to the digits given there.
func TestExponentOfHalfSpace(t *testing.T) {
	o, err := CoolingHalfSpace{Porous: Darcy, Exponent: -0.25}.Critical()
	require.NoError(t, err)
	assert.InDelta(t, 11.2086, o.R, 5e-5)
	assert.InDelta(t, 0.81800, o.Wavenumber, 5e-6)
	// In units where R = √t this is the time 125.6, and 167.5 with s = 0.
	assert.InDelta(t, 125.6, o.R*o.R, 0.05)
}

// Neutral values of the viscous half-space with a frozen base fall with k_δ to 4 k_δ
// below a free surface, and to √π below a rigid one.
func TestFrozenViscousHalfSpace(t *testing.T) {
	for _, k := range []float64{1e-3, 1e-4} {
		free, err := CoolingHalfSpace{Measure: FrozenBase}.Neutral(k)
		require.NoError(t, err)
		assert.InEpsilon(t, 4*k, free.R, 4*k)
		rigid, err := CoolingHalfSpace{Measure: FrozenBase, Top: Rigid}.Neutral(k)
		require.NoError(t, err)
		assert.InEpsilon(t, math.Sqrt(math.Pi), rigid.R, 4*k)
	}
}

// A layer that is deep against its boundary layer is a half-space: the frozen
// porous one at t = 1e-3 differs by what the bottom does to wide rolls.
func TestDeepLayerIsAHalfSpace(t *testing.T) {
	h := CoolingHalfSpace{Porous: Darcy, Measure: FrozenBase}
	const time = 1e-4
	l := Layer{Porous: Darcy, Bottom: Impermeable.FixedFlux(), Base: CoolingFromAbove(time)}
	for _, k := range []float64{0.3, 0.5, 1} {
		half, err := h.Neutral(k)
		require.NoError(t, err)
		deep, err := l.Neutral(k / math.Sqrt(time))
		require.NoError(t, err)
		assert.InEpsilon(t, half.R, deep.Rayleigh*math.Sqrt(time), 1e-11)
	}
	viscous := CoolingHalfSpace{Measure: FrozenBase, Top: Rigid}
	fluid := Layer{Bottom: Rigid.FixedFlux(), Top: Rigid, Base: CoolingFromAbove(time)}
	half, err := viscous.Neutral(0.4)
	require.NoError(t, err)
	deep, err := fluid.Neutral(0.4 / math.Sqrt(time))
	require.NoError(t, err)
	assert.InEpsilon(t, half.R, deep.Rayleigh*math.Pow(time, 1.5), 1e-11)
}

func TestTimeOfOnset(t *testing.T) {
	viscous, err := CoolingHalfSpace{Top: Rigid}.Critical()
	require.NoError(t, err)
	const ra = 1e7
	at := viscous.Time(ra)
	assert.InEpsilon(t, viscous.R, ra*math.Pow(at, 1.5), 1e-12)
	porous, err := CoolingHalfSpace{Porous: Darcy}.Critical()
	require.NoError(t, err)
	assert.InEpsilon(t, porous.R, 1000*math.Sqrt(porous.Time(1000)), 1e-12)
	assert.Less(t, viscous.Error.R, 1e-9)
	assert.Less(t, viscous.Error.Wavenumber, 1e-9)
}

// A disturbance that has to grow faster needs a larger R.
func TestFasterGrowthNeedsMore(t *testing.T) {
	skipIfShort(t)
	last := 0.0
	for _, s := range []float64{-0.4, -0.25, 0, 1, 5} {
		o, err := CoolingHalfSpace{Exponent: s}.Critical()
		require.NoError(t, err)
		assert.Greater(t, o.R, last)
		last = o.R
	}
}
