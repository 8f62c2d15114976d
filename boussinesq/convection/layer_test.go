package convection_test

import (
	"context"
	"fmt"
	"math"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"example.org/overturn/boussinesq"
	"example.org/overturn/boussinesq/convection"
	"example.org/overturn/stokes/staggered"
	"example.org/overturn/units"
)

// tank is an invented layer of oil, heated from below and a little inside.
func tank() boussinesq.Layer {
	return boussinesq.Layer{
		Material: boussinesq.Material{
			Density:      950 * units.KilogramPerCubicMetre,
			Expansivity:  8e-4 * units.PerKelvin,
			Conductivity: 0.15 * units.WattPerMetreKelvin,
			SpecificHeat: 1600 * units.JoulePerKilogramKelvin,
			Viscosity:    20 * units.PascalSecond,

			ReferenceTemperature: units.Celsius(20),
		},
		Depth:   0.08 * units.Metre,
		Gravity: units.StandardGravity,
		Top:     units.Celsius(20),
		Bottom:  units.Celsius(50),
		Heating: 200 * units.WattPerCubicMetre,
	}
}

func grid(t *testing.T, n int, height float64) *staggered.Grid {
	t.Helper()
	g, err := staggered.Uniform(n, n, height, height)
	require.NoError(t, err)
	return g
}

// One layer, scaled and in SI: the same steps, and results that the scales turn
// into one another.
func TestScaledAndDimensionalLayersAgree(t *testing.T) {
	layer := tank()
	s, err := layer.Scales()
	require.NoError(t, err)
	scaled, err := convection.FromLayer(layer, grid(t, 16, 1))
	require.NoError(t, err)
	dimensional, err := convection.FromLayerSI(layer, grid(t, 16, 0.08))
	require.NoError(t, err)
	ra, err := layer.Rayleigh()
	require.NoError(t, err)
	assert.InEpsilon(t, ra, scaled.Rayleigh, 1e-14)

	last := func(p convection.Problem) (*convection.Model, convection.Sample) {
		m, err := convection.New(p, &convection.Settings{MaxSteps: 100})
		require.NoError(t, err)
		sample, err := m.Run(context.Background())
		require.NoError(t, err)
		return m, sample
	}
	ms, a := last(scaled)
	md, b := last(dimensional)
	assert.InEpsilon(t, float64(s.Time(a.Time)), b.Time, 1e-9)
	assert.InEpsilon(t, float64(s.Velocity(a.RMSVelocity)), b.RMSVelocity, 1e-9)
	assert.InEpsilon(t, a.NuTop, b.NuTop, 1e-9)
	assert.InEpsilon(t, a.NuBottom, b.NuBottom, 1e-9)
	for j, v := range ms.Temperature().Values {
		assert.InEpsilon(t, float64(s.Temperature(v)), md.Temperature().Values[j], 1e-9)
	}
	assert.Greater(t, a.RMSVelocity, 1.0, "it convects")
}

func TestLayersOfGivenFlux(t *testing.T) {
	layer := tank()
	layer.Bottom, layer.BottomFlux = 0, 300*units.WattPerSquareMetre
	p, err := convection.FromLayer(layer, grid(t, 12, 1))
	require.NoError(t, err)
	c, err := convection.Conducting(context.Background(), p)
	require.NoError(t, err)
	// T = q_b (d − z)/k + H (d² − z²)/(2k) in units of (q_b + H d) d/k.
	heating := 200 * 0.08 / (300 + 200*0.08)
	for k, z := range c.Grid.ZCentres() {
		assert.InDelta(t, (1-heating)*(1-z)+heating*(1-z*z)/2, c.At(5, k), heating/144)
	}
	si, err := convection.FromLayerSI(layer, grid(t, 12, 0.08))
	require.NoError(t, err)
	d, err := convection.Conducting(context.Background(), si)
	require.NoError(t, err)
	s, err := layer.Scales()
	require.NoError(t, err)
	assert.InEpsilon(t, float64(s.Temperature(c.At(0, 0))), d.At(0, 0), 1e-12)
}

func TestLayersOnWrongGrids(t *testing.T) {
	_, err := convection.FromLayer(tank(), grid(t, 4, 0.08))
	assert.ErrorContains(t, err, "height 0.08, want 1")
	_, err = convection.FromLayerSI(tank(), grid(t, 4, 1))
	assert.ErrorContains(t, err, "height 1, want 0.08")
	_, err = convection.FromLayer(tank(), nil)
	assert.ErrorContains(t, err, "grid is nil")
	bad := tank()
	bad.Material.Viscosity = units.DynamicViscosity(math.NaN())
	var field *boussinesq.FieldError
	_, err = convection.FromLayer(bad, grid(t, 4, 1))
	assert.ErrorAs(t, err, &field)
	_, err = convection.FromLayerSI(bad, grid(t, 4, 0.08))
	assert.ErrorAs(t, err, &field)
}

func ExampleFromLayer() {
	layer := tank()
	ra, err := layer.Rayleigh()
	if err != nil {
		fmt.Println(err)
		return
	}
	fmt.Printf("Ra = %.3g\n", ra)
	// Output: Ra = 5.8e+04
}
