package boussinesq

import (
	"math"
	"testing"

	"example.org/overturn/units"
	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// round is a layer whose every number can be worked out by hand: κ = 1/8.
func round() Layer {
	return Layer{
		Material: Material{
			Density: 4, ReferenceTemperature: 300, Expansivity: 0.25,
			Conductivity: 1, SpecificHeat: 2, Viscosity: 16,
		},
		Depth: 2, Gravity: 8, Top: 300, Bottom: 304,
	}
}

// ofFlux is the same over a bottom that lets in a flux.
func ofFlux(q units.HeatFlux, h units.VolumetricHeating) Layer {
	l := round()
	l.Bottom, l.BottomFlux, l.Heating = 0, q, h
	return l
}

func TestLayerCheckNamesTheField(t *testing.T) {
	require.NoError(t, round().Check())
	for _, tt := range []struct {
		field string
		spoil func(*Layer)
	}{
		{"Material.Viscosity", func(l *Layer) { l.Material.Viscosity = -1 }},
		{"Layer.Depth", func(l *Layer) { l.Depth = 0 }},
		{"Layer.Gravity", func(l *Layer) { l.Gravity = units.Acceleration(math.NaN()) }},
		{"Layer.Top", func(l *Layer) { l.Top = 0 }},
		{"Layer.Bottom", func(l *Layer) { l.Bottom = units.Temperature(math.NaN()) }},
		{"Layer.Bottom", func(l *Layer) { l.Bottom = -1 }},
		{"Layer.BottomFlux", func(l *Layer) { l.BottomFlux = units.HeatFlux(math.Inf(1)) }},
		{"Layer.BottomFlux", func(l *Layer) { l.BottomFlux = 1 }}, // beside a bottom temperature
		{"Layer.Heating", func(l *Layer) { l.Heating = units.VolumetricHeating(math.NaN()) }},
	} {
		l := round()
		tt.spoil(&l)
		wantField(t, l.Check(), tt.field)

		// Whatever derives a number from a layer checks it.
		for name, f := range numbers() {
			x, err := f(l)
			wantField(t, err, tt.field)
			assert.Zero(t, x, name)
		}
		_, err := l.Scales()
		wantField(t, err, tt.field)
		_, err = l.Validity()
		wantField(t, err, tt.field)
	}
}

// numbers lists everything that a layer has a number for.
func numbers() map[string]Number {
	quantity := func(q float64, err error) (float64, error) { return q, err }
	return map[string]Number{
		"Rayleigh":           Layer.Rayleigh,
		"RayleighInternal":   Layer.RayleighInternal,
		"RayleighFlux":       Layer.RayleighFlux,
		"RayleighOf":         func(l Layer) (float64, error) { return l.RayleighOf(1) },
		"Peclet":             func(l Layer) (float64, error) { return l.Peclet(1) },
		"Reynolds":           func(l Layer) (float64, error) { return l.Reynolds(1) },
		"Expansion":          Layer.Expansion,
		"DissipationNumber":  Layer.DissipationNumber,
		"FrankKamenetskii":   func(l Layer) (float64, error) { return l.FrankKamenetskii(1e5, 300) },
		"TemperatureScale":   func(l Layer) (float64, error) { q, err := l.TemperatureScale(); return quantity(float64(q), err) },
		"TopFlux":            func(l Layer) (float64, error) { q, err := l.TopFlux(); return quantity(float64(q), err) },
		"AdiabaticGradient":  func(l Layer) (float64, error) { q, err := l.AdiabaticGradient(300); return quantity(float64(q), err) },
		"Adiabat":            func(l Layer) (float64, error) { q, err := l.Adiabat(300, 1); return quantity(float64(q), err) },
		"AdiabaticDrop":      func(l Layer) (float64, error) { q, err := l.AdiabaticDrop(300); return quantity(float64(q), err) },
		"SuperadiabaticDrop": func(l Layer) (float64, error) { q, err := l.SuperadiabaticDrop(300); return quantity(float64(q), err) },
	}
}

func TestTemperatureDrop(t *testing.T) {
	l := round()
	l.Top, l.Bottom = 310, 300
	drop, err := l.TemperatureDrop()
	require.NoError(t, err)
	assert.Equal(t, units.TemperatureDifference(-10), drop)
	l.Bottom = 0
	drop, err = l.TemperatureDrop()
	wantField(t, err, "Layer.Bottom")
	assert.Zero(t, drop)
	l.Top = 0
	_, err = l.TemperatureDrop()
	wantField(t, err, "Layer.Top")
}

func TestTemperatureScaleFollowsTheBottom(t *testing.T) {
	warm := round()
	warm.Heating = 5
	same := round()
	same.Bottom, same.Heating = same.Top, 3
	for _, tt := range []struct {
		name string
		l    Layer
		want units.TemperatureDifference
	}{
		{"isothermal walls", round(), 4},
		{"isothermal walls and heating", warm, 4},
		{"flux q d/k", ofFlux(5, 0), 10},
		{"insulated, H d²/k", ofFlux(0, 3), 12},
		{"flux and heating, (q + H d) d/k", ofFlux(5, 3), 22},
		{"cooled at the bottom, heated inside", ofFlux(-1, 3), 10},
		{"one temperature, heated inside, H d²/k", same, 12},
	} {
		got, err := tt.l.TemperatureScale()
		require.NoError(t, err, tt.name)
		assert.Equal(t, tt.want, got, tt.name)
	}
}

func TestNothingDrivesIt(t *testing.T) {
	cold := round()
	cold.Bottom = 299
	same := round()
	same.Bottom = same.Top
	sink := same
	sink.Heating = -1
	warmTop := cold
	warmTop.Heating = 1
	for _, l := range []Layer{cold, same, sink, warmTop} {
		_, err := l.TemperatureScale()
		assert.ErrorIs(t, err, ErrStable)
		wantField(t, err, "Layer.Bottom")
		_, err = l.Scales()
		assert.ErrorIs(t, err, ErrStable)
		_, err = l.Rayleigh()
		assert.ErrorIs(t, err, ErrStable)
		wantField(t, err, "Layer.Bottom")
	}
	for _, l := range []Layer{ofFlux(0, 0), ofFlux(-1, 0), ofFlux(-6, 3)} {
		_, err := l.TemperatureScale()
		wantField(t, err, "heat flux through the top")
		_, err = l.RayleighFlux()
		wantField(t, err, "heat flux through the top")
	}
}

func TestTopFluxIsForGivenFluxes(t *testing.T) {
	q, err := ofFlux(5, 3).TopFlux()
	require.NoError(t, err)
	assert.Equal(t, units.HeatFlux(11), q)
	_, err = round().TopFlux()
	wantField(t, err, "Layer.Bottom")
}
