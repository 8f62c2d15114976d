package boussinesq

import (
	"math"
	"testing"

	"example.org/overturn/units"
	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// water is the preset that most tests work on.
func water(t testing.TB) Material {
	t.Helper()
	p, err := ByName("water-20C")
	require.NoError(t, err)
	return p.Material()
}

// inRelative asserts a relative tolerance that may be zero.
func inRelative(t testing.TB, want, got, tolerance float64, source string) {
	t.Helper()
	if !(math.Abs(got-want) <= tolerance*math.Abs(want)) {
		t.Errorf("got %.15g, want %.15g within %.1e: %s", got, want, tolerance, source)
	}
}

func TestDensityIsLinear(t *testing.T) {
	m := Material{Density: 1000, ReferenceTemperature: 300, Expansivity: 1e-3}
	for _, tt := range []struct {
		t    units.Temperature
		want units.Density
	}{
		{300, 1000}, // at the reference
		{400, 900},  // α (T − T₀) = 0.1
		{200, 1100},
	} {
		rho, err := m.DensityAt(tt.t)
		require.NoError(t, err)
		assert.InDelta(t, float64(tt.want), float64(rho), 1e-9)
	}
	rho, err := m.DensityAt(1300)
	wantField(t, err, "temperature")
	assert.Zero(t, rho)
	_, err = m.DensityAt(1299)
	assert.NoError(t, err)
}

func TestDensityNeedsItsReference(t *testing.T) {
	good := Material{Density: 1000, ReferenceTemperature: 300, Expansivity: 1e-3}
	for field, spoil := range map[string]func(*Material){
		"Material.Density":              func(m *Material) { m.Density = 0 },
		"Material.ReferenceTemperature": func(m *Material) { m.ReferenceTemperature = 0 },
		"Material.Expansivity":          func(m *Material) { m.Expansivity = 0 },
	} {
		m := good
		spoil(&m)
		_, err := m.DensityAt(310)
		wantField(t, err, field)
	}
	for _, bad := range []units.Temperature{0, -1, units.Temperature(math.NaN()), units.Temperature(math.Inf(1))} {
		_, err := good.DensityAt(bad)
		wantField(t, err, "temperature")
	}
}

func TestDerivedConstants(t *testing.T) {
	m := Material{Density: 2, Conductivity: 12, SpecificHeat: 3, Viscosity: 8}
	kappa, err := m.Diffusivity()
	require.NoError(t, err)
	assert.Equal(t, units.Diffusivity(2), kappa)
	nu, err := m.KinematicViscosity()
	require.NoError(t, err)
	assert.Equal(t, units.KinematicViscosity(4), nu)
	pr, err := m.Prandtl()
	require.NoError(t, err)
	assert.Equal(t, 2.0, pr) // = ν/κ
}

func TestDerivedConstantsCheckWhatTheyUse(t *testing.T) {
	derive := map[string]func(Material) (float64, error){
		"κ":  func(m Material) (float64, error) { x, err := m.Diffusivity(); return float64(x), err },
		"ν":  func(m Material) (float64, error) { x, err := m.KinematicViscosity(); return float64(x), err },
		"Pr": Material.Prandtl,
	}
	for _, tt := range []struct {
		field string
		spoil func(*Material)
		hurts string
	}{
		{"Material.Density", func(m *Material) { m.Density = -1 }, "κ ν"},
		{"Material.Conductivity", func(m *Material) { m.Conductivity = 0 }, "κ Pr"},
		{"Material.SpecificHeat", func(m *Material) { m.SpecificHeat = units.SpecificHeat(math.NaN()) }, "κ Pr"},
		{"Material.Viscosity", func(m *Material) { m.Viscosity = units.DynamicViscosity(math.Inf(1)) }, "ν Pr"},
	} {
		m := water(t)
		tt.spoil(&m)
		for name, f := range derive {
			x, err := f(m)
			if contains(tt.hurts, name) {
				wantField(t, err, tt.field)
				assert.Zero(t, x)
			} else {
				assert.NoError(t, err, "%s does not depend on %s", name, tt.field)
			}
		}
	}
}

func TestOverflowIsAnError(t *testing.T) {
	tiny := Material{Density: 1e-200, SpecificHeat: 1e-200, Conductivity: 1, Viscosity: 1e300}
	_, err := tiny.Diffusivity()
	wantField(t, err, "diffusivity")
	_, err = tiny.KinematicViscosity()
	wantField(t, err, "kinematic viscosity")
	_, err = tiny.Prandtl()
	assert.NoError(t, err)
	tiny.SpecificHeat = 1e200
	_, err = tiny.Prandtl()
	wantField(t, err, "Prandtl number")
}

func TestCheckNamesTheField(t *testing.T) {
	require.NoError(t, water(t).Check())
	nan := math.NaN()
	for _, tt := range []struct {
		field string
		spoil func(*Material)
	}{
		{"Material.Density", func(m *Material) { m.Density = 0 }},
		{"Material.Conductivity", func(m *Material) { m.Conductivity = -2 }},
		{"Material.SpecificHeat", func(m *Material) { m.SpecificHeat = 0 }},
		{"Material.Expansivity", func(m *Material) { m.Expansivity = 0 }},
		{"Material.Viscosity", func(m *Material) { m.Viscosity = -1e21 }},
		{"Material.ReferenceTemperature", func(m *Material) { m.ReferenceTemperature = -1 }},
		{"Material.BulkModulus", func(m *Material) { m.BulkModulus = units.Pressure(math.Inf(1)) }},
		{"Material.Sensitivity.Viscosity", func(m *Material) { m.Sensitivity.Viscosity = units.Expansivity(nan) }},
		{"Material.Sensitivity.Expansivity", func(m *Material) { m.Sensitivity.Expansivity = units.Expansivity(nan) }},
		{"Material.Sensitivity.Conductivity", func(m *Material) { m.Sensitivity.Conductivity = units.Expansivity(math.Inf(-1)) }},
		{"Material.Sensitivity.SpecificHeat", func(m *Material) { m.Sensitivity.SpecificHeat = units.Expansivity(nan) }},
	} {
		m := water(t)
		tt.spoil(&m)
		wantField(t, m.Check(), tt.field)
	}
	m := water(t)
	m.ReferenceTemperature, m.BulkModulus, m.Sensitivity = 0, 0, Sensitivity{}
	assert.NoError(t, m.Check(), "these are optional")
}

func TestViscousTemperatureScale(t *testing.T) {
	scale, err := ViscousTemperatureScale(300e3, 1600)
	require.NoError(t, err)
	inRelative(t, 70.9500810069, float64(scale), 1e-10, "R T²/E, Davaille & Jaupart (1993); computed apart")
	_, err = ViscousTemperatureScale(0, 1600)
	wantField(t, err, "activation energy")
	_, err = ViscousTemperatureScale(300e3, -1)
	wantField(t, err, "temperature")

	// It is what the definition says: T² over the change of E/(R T).
	mu := func(t float64) float64 { return math.Exp(300e3 / (float64(units.MolarGasConstant) * t)) }
	slope := (math.Log(mu(1600.01)) - math.Log(mu(1599.99))) / 0.02
	inRelative(t, -1/slope, float64(scale), 1e-8, "numerical derivative")
}
