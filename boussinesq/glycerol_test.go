package boussinesq

import (
	"math"
	"testing"

	"example.org/overturn/units"
	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

func TestGlycerolViscosity(t *testing.T) {
	for _, tt := range []struct {
		t         units.Temperature
		want, tol float64
		source    string
	}{
		{293.15, 1.413831, 5e-7, "Cheng (2008), law from memory; computed apart"},
		{333.15, 8.222598e-2, 1e-7, "same"},
		{293.15, 1.412, 2e-3, "Segur & Oberstar (1951), from memory"},
		{273.15, 12.1, 1e-12, "exact at 0 °C"},
	} {
		mu, err := GlycerolViscosity(tt.t)
		require.NoError(t, err)
		inRelative(t, tt.want, float64(mu), tt.tol, tt.source)
	}
}

func TestGlycerolViscosityOutside(t *testing.T) {
	for _, x := range []units.Temperature{273.1, 373.2} {
		mu, err := GlycerolViscosity(x)
		assert.ErrorIs(t, err, ErrOutOfRange)
		wantField(t, err, "temperature")
		assert.Positive(t, float64(mu))
	}
	for _, x := range []units.Temperature{273.15, 373.15} {
		_, err := GlycerolViscosity(x)
		assert.NoError(t, err)
	}
	for _, x := range []units.Temperature{0, -3, units.Temperature(math.NaN())} {
		_, err := GlycerolViscosity(x)
		wantField(t, err, "temperature")
	}
	_, err := GlycerolViscosity(131.72) // the exponent diverges
	wantField(t, err, "viscosity of glycerol")
}

// The sensitivity of the preset is the slope of the law.
func TestGlycerolSensitivity(t *testing.T) {
	cold, err := GlycerolViscosity(293.05)
	require.NoError(t, err)
	warm, err := GlycerolViscosity(293.25)
	require.NoError(t, err)
	p, err := ByName("glycerol-20C")
	require.NoError(t, err)
	assert.InDelta(t, math.Log(float64(warm)/float64(cold))/0.2, float64(p.Sensitivity.Viscosity), 5e-4)
}
