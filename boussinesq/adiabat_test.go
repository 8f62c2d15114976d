package boussinesq

import (
	"math"
	"testing"

	"example.org/overturn/units"
	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// upperMantle is the layer of the reference values below: α = 3e-5 1/K,
// c_p = 1200 J/(kg K), g = 9.8 m/s², 660 km, 1300 K.
func upperMantle(t testing.TB) Layer {
	p, err := ByName("upper-mantle")
	require.NoError(t, err)
	return Layer{Material: p.Material(), Depth: 660 * units.Kilometre, Gravity: 9.8, Top: 300, Bottom: 1600}
}

func TestAdiabatAgainstReferenceValues(t *testing.T) {
	const gradient = 3e-5 * 9.8 / 1200 // per metre
	l := upperMantle(t)

	di, err := l.DissipationNumber()
	require.NoError(t, err)
	inRelative(t, 0.1617, di, 1e-14, "α g d/c_p, Spiegel & Veronis (1960); computed apart")

	slope, err := l.AdiabaticGradient(1600)
	require.NoError(t, err)
	inRelative(t, 0.000392, float64(slope), 1e-14, "α g T/c_p in K/m; computed apart")

	at, err := l.Adiabat(1600, l.Depth)
	require.NoError(t, err)
	inRelative(t, 1880.8120578512, float64(at), 1e-13, "1600 K exp(Di); computed apart")

	drop, err := l.SuperadiabaticDrop(1600)
	require.NoError(t, err)
	inRelative(t, 1019.1879421488, float64(drop), 1e-13, "1300 K less the adiabatic drop, Jeffreys (1930); computed apart")

	up, err := l.Adiabat(at, -l.Depth)
	require.NoError(t, err)
	inRelative(t, 1600, float64(up), 1e-14, "back up")

	top, err := l.Adiabat(1600, 0)
	require.NoError(t, err)
	assert.Equal(t, units.Temperature(1600), top)
	inRelative(t, 1600*gradient, float64(slope), 1e-14, "definition")
}

// A centimetre of water has an adiabatic drop of less than a microkelvin; the
// difference of two temperatures would lose it.
func TestAdiabaticDropKeepsItsDigits(t *testing.T) {
	l := tank(t)
	drop, err := l.AdiabaticDrop(293)
	require.NoError(t, err)
	di, err := l.DissipationNumber()
	require.NoError(t, err)
	inRelative(t, 293*(di+di*di/2), float64(drop), 1e-14, "series of exp(Di) − 1")
	assert.Less(t, float64(drop), 2e-6)
}

func TestAdiabatChecksItsInput(t *testing.T) {
	l := upperMantle(t)
	_, err := l.AdiabaticGradient(0)
	wantField(t, err, "temperature")
	_, err = l.Adiabat(-1, 0)
	wantField(t, err, "temperature")
	_, err = l.Adiabat(1600, units.Length(math.NaN()))
	wantField(t, err, "depth")
	_, err = l.Adiabat(1600, 1e12)
	wantField(t, err, "adiabat")
	_, err = l.AdiabaticDrop(units.Temperature(math.Inf(1)))
	wantField(t, err, "temperature")
	_, err = l.SuperadiabaticDrop(-1)
	wantField(t, err, "temperature")
	l.Bottom = 0
	_, err = l.SuperadiabaticDrop(1600)
	wantField(t, err, "Layer.Bottom")
}
