package stability

import (
	"context"
	"math"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"example.org/overturn/boussinesq"
	"example.org/overturn/units"
)

// syrup is an invented fluid in a tank of 10 cm.
func syrup() boussinesq.Layer {
	return boussinesq.Layer{
		Material: boussinesq.Material{
			Density: 1400, Expansivity: 4e-4, Conductivity: 0.35, SpecificHeat: 2500, Viscosity: 60,
		},
		Depth: 10 * units.Centimetre, Gravity: units.StandardGravity,
		Top: units.Celsius(20), Bottom: units.Celsius(40),
	}
}

func judge(t *testing.T, l boussinesq.Layer, c Conditions) Verdict {
	t.Helper()
	v, err := Judge(l, c)
	require.NoError(t, err)
	return v
}

func TestVerdictInUnits(t *testing.T) {
	l := syrup()
	v := judge(t, l, Conditions{Bottom: Rigid, Top: Rigid})
	ra, err := l.Rayleigh()
	require.NoError(t, err)
	assert.InEpsilon(t, ra, v.Rayleigh, 1e-14)
	assert.InEpsilon(t, 1707.761777104718, v.Critical, 1e-12)
	assert.InEpsilon(t, v.Rayleigh/v.Critical, v.Ratio, 1e-14)
	assert.True(t, v.Convects)
	assert.InEpsilon(t, 0.1*2*math.Pi/3.116323554821122, float64(v.Wavelength), 1e-12)
	scales, err := l.Scales()
	require.NoError(t, err)
	pr, err := l.Prandtl()
	require.NoError(t, err)
	g, err := Layer{Bottom: Rigid, Top: Rigid, Prandtl: pr}.Fastest(ra)
	require.NoError(t, err)
	assert.InEpsilon(t, float64(scales.Time(1/g.Rate)), float64(v.GrowthTime), 1e-10)
	assert.InEpsilon(t, float64(scales.Length(g.Wavelength)), float64(v.FastestWavelength), 1e-10)
	assert.InEpsilon(t, math.Log(50)*float64(v.GrowthTime), float64(v.TimeToGrow(50)), 1e-14)
	assert.Contains(t, v.String(), "The layer convects. Its Rayleigh number, 1.83e+04, is 10.7 times")
	assert.Contains(t, v.String(), "times the critical one, 1708")
	assert.Contains(t, v.String(), "Convection sets in at a wavelength of 0.202 m, two rolls")
}

func TestVerdictOfLayersAtRest(t *testing.T) {
	l := syrup()
	l.Depth = units.Centimetre
	v := judge(t, l, Conditions{Bottom: Rigid, Top: Rigid})
	assert.False(t, v.Convects)
	assert.Less(t, v.Ratio, 1.0)
	assert.Zero(t, v.GrowthTime)
	assert.True(t, math.IsInf(float64(v.TimeToGrow(2)), 1))
	assert.Contains(t, v.String(), "The layer stays at rest. Its Rayleigh number, 18.3, is 0.0107 of the critical one")
	assert.Contains(t, v.String(), "Convection would set in at a wavelength of 0.0202 m")

	l.Top, l.Bottom = l.Bottom, l.Top // heated from above
	v = judge(t, l, Conditions{})
	assert.False(t, v.Convects)
	assert.Negative(t, v.Rayleigh)
	assert.Contains(t, v.String(), "nothing drives it")

	l.Top = l.Bottom // the same temperature
	v = judge(t, l, Conditions{})
	assert.False(t, v.Convects)
	assert.Zero(t, v.Rayleigh)

	l.Top, l.Heating = units.Celsius(80), units.VolumetricHeating(1) // a little heating, a hotter top
	v = judge(t, l, Conditions{})
	assert.False(t, v.Convects)
	assert.True(t, math.IsInf(v.Critical, 1))
	assert.Contains(t, v.String(), "no Rayleigh number is critical")
}

// Each way of heating has its base state and its Rayleigh number.
func TestVerdictsOfOtherHeatings(t *testing.T) {
	k := 0.35
	d := 0.1
	tests := []struct {
		name   string
		change func(*boussinesq.Layer)
		layer  Layer
		scale  float64 // of temperature
	}{
		{"flux", func(l *boussinesq.Layer) { l.Bottom, l.BottomFlux = 0, 50 }, Layer{Bottom: Rigid.FixedFlux()}, 50 * d / k},
		{"within", func(l *boussinesq.Layer) { l.Bottom, l.Heating = 0, 400 },
			Layer{Bottom: Rigid.FixedFlux(), Base: InternalHeating()}, 400 * d * d / k},
		{"flux and within", func(l *boussinesq.Layer) { l.Bottom, l.BottomFlux, l.Heating = 0, 30, 700 },
			Layer{Bottom: Rigid.FixedFlux(), Base: MixedFlux(0.7)}, 100 * d / k},
		{"walls and within", func(l *boussinesq.Layer) { l.Heating = 1400 },
			Layer{Bottom: Rigid, Base: MixedHeating(1400 * d * d / k / 20)}, 20},
		{"within, equal walls", func(l *boussinesq.Layer) { l.Bottom, l.Heating = l.Top, 4000 },
			Layer{Bottom: Rigid, Base: InternalHeatingBetween()}, 4000 * d * d / k},
		{"within, colder bottom", func(l *boussinesq.Layer) { l.Bottom, l.Heating = l.Top.Add(-5), 4000 },
			Layer{Bottom: Rigid, Base: Gradient(func(z float64) float64 { return -5/(4000*d*d/k) + z - 0.5 })}, 4000 * d * d / k},
		{"cooled within, equal walls", func(l *boussinesq.Layer) { l.Bottom, l.Heating = l.Top, -4000 },
			Layer{Bottom: Rigid, Base: Gradient(func(z float64) float64 { return 0.5 - z })}, 4000 * d * d / k},
	}
	for _, tt := range tests {
		t.Run(tt.name, func(t *testing.T) {
			l := syrup()
			tt.change(&l)
			v := judge(t, l, Conditions{Bottom: Rigid})
			pr, err := l.Prandtl()
			require.NoError(t, err)
			tt.layer.Prandtl = pr
			assert.InEpsilon(t, critical(t, tt.layer).Rayleigh, v.Critical, 1e-11)
			ra, err := l.RayleighOf(units.TemperatureDifference(tt.scale))
			require.NoError(t, err)
			assert.InEpsilon(t, ra, v.Rayleigh, 1e-12)
			assert.Equal(t, v.Ratio > 1, v.Convects)
		})
	}
}

func TestConditions(t *testing.T) {
	l := syrup()
	// An exchange coefficient is a Biot number.
	v := judge(t, l, Conditions{Bottom: Rigid, TopExchange: 7})
	assert.InEpsilon(t, critical(t, Layer{Bottom: Rigid, Top: Free.Robin(7 * 0.1 / 0.35)}).Rayleigh, v.Critical, 1e-11)

	// A viscosity law of temperature, on the viscosity of the material.
	law := func(at units.Temperature) float64 { return math.Exp(-0.09 * (at.Celsius() - 30)) }
	v = judge(t, l, Conditions{Bottom: Rigid, Top: Rigid, RelativeViscosity: law})
	want := critical(t, Layer{Bottom: Rigid, Top: Rigid, Viscosity: Exponential(0.09*20, 0.5)})
	assert.InEpsilon(t, want.Rayleigh, v.Critical, 1e-10)

	// A box: rolls that fit.
	v = judge(t, l, Conditions{Bottom: Rigid, Top: Rigid, Width: 15 * units.Centimetre})
	assert.InEpsilon(t, 1955.808432354088, v.Critical, 1e-12) // testdata/stability.csv, G01A1.5RR
	assert.Equal(t, 2, v.Rolls)
	assert.Contains(t, v.String(), "Convection sets in with 2 rolls.")
	v = judge(t, l, Conditions{Width: 5 * units.Centimetre})
	assert.Contains(t, v.String(), "Convection sets in with 1 roll.")

	// Both boundaries of fixed flux: wide rolls.
	flux := syrup()
	flux.Bottom, flux.BottomFlux = 0, 50
	v = judge(t, flux, Conditions{TopExchange: 1e-30})
	assert.Less(t, v.Onset.Wavenumber, 1e-3)

	for _, bad := range []Conditions{
		{TopExchange: -1}, {TopExchange: units.HeatTransferCoefficient(math.Inf(1))}, {Width: -1},
		{Width: units.Length(math.NaN())}, {Bottom: Permeable}, {Width: 1, Sides: 5},
		{RelativeViscosity: func(units.Temperature) float64 { return -1 }},
	} {
		_, err := Judge(l, bad)
		assert.Error(t, err, "%+v", bad)
		_, err = JudgeUncertain(context.Background(), boussinesq.Uncertain{Layer: l}, bad, nil)
		assert.Error(t, err, "%+v", bad)
	}
	l.Depth = -1
	_, err := Judge(l, Conditions{})
	assert.Error(t, err)
	l = syrup()
	l.Bottom, l.BottomFlux = 0, -5
	_, err = Judge(l, Conditions{})
	assert.Error(t, err)
}

// With all decades of viscosity alike between a and b, the probability is the
// share of decades below the critical viscosity.
func TestOddsOfConvection(t *testing.T) {
	l := syrup()
	c := Conditions{Bottom: Rigid, Top: Rigid}
	best := judge(t, l, c)
	limit := best.Ratio * 60 // viscosity at which the layer is critical
	u := boussinesq.Uncertain{Layer: l, Ranges: boussinesq.Ranges{
		Viscosity: boussinesq.Decades(units.DynamicViscosity(limit/100), units.DynamicViscosity(limit*10)),
	}}
	odds, err := JudgeUncertain(context.Background(), u, c, &boussinesq.Settings{Draws: 3000})
	require.NoError(t, err)
	assert.InDelta(t, 2.0/3, odds.Probability, 1e-3)
	assert.Equal(t, best.Ratio, odds.Best.Ratio)
	assert.Contains(t, odds.String(), "with a probability of 0.667")
	require.Len(t, odds.Ratio.Influences(), 1)
	assert.Equal(t, "Viscosity", odds.Ratio.Influences()[0].Parameter)

	// Each draw is held against its own critical number.
	u.Ranges = boussinesq.Ranges{Heating: boussinesq.Between[units.VolumetricHeating](0, 4000)}
	u.Layer.Material.Viscosity = units.DynamicViscosity(limit)
	odds, err = JudgeUncertain(context.Background(), u, c, &boussinesq.Settings{Draws: 40})
	require.NoError(t, err)
	assert.Equal(t, 1.0, odds.Probability, "at the critical viscosity, heating always helps")
	least, err := odds.Ratio.Quantiles(0, 1)
	require.NoError(t, err)
	u.Layer.Heating = 4000 * 39.5 / 40
	assert.InEpsilon(t, judge(t, u.Layer, c).Ratio, least[1], 1e-6)

	// Layers without an onset count as those that stay at rest.
	u.Layer, u.Ranges = l, boussinesq.Ranges{Bottom: boussinesq.Between(units.Celsius(-20), units.Celsius(60))}
	odds, err = JudgeUncertain(context.Background(), u, c, &boussinesq.Settings{Draws: 800})
	require.NoError(t, err)
	assert.InDelta(t, 0.5-1707.76/best.Rayleigh*20/80, odds.Probability, 2e-3)

	ctx, cancel := context.WithCancel(context.Background())
	cancel()
	_, err = JudgeUncertain(ctx, u, c, nil)
	assert.ErrorIs(t, err, context.Canceled)
}

func TestDurations(t *testing.T) {
	for _, tt := range []struct {
		t    units.Time
		want string
	}{
		{30, "30 seconds"}, {150, "2.5 minutes"}, {3 * units.Hour, "3 hours"}, {5 * units.Day, "5 days"}, {4e6 * units.Year, "4e+06 years"},
	} {
		assert.Equal(t, tt.want, duration(tt.t))
	}
}
