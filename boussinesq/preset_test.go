package boussinesq

import (
	"fmt"
	"math"
	"testing"

	"example.org/overturn/units"
	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// What follows from the values of a preset, beside what its source says of the
// same: derived numbers that nobody typed into the table.
func TestPresetsDeriveWhatTheirSourcesSay(t *testing.T) {
	const (
		diffusivity = "κ"
		kinematic   = "ν"
		prandtl     = "Pr"
	)
	for _, tt := range []struct {
		preset, quantity string
		want, tolerance  float64 // relative: half a unit of the last digit, or as the remark says
		source           string
	}{
		{"water-20C", diffusivity, 1.431833e-7, 2e-6, "IAPWS-95 and transport releases, computed apart"},
		{"water-20C", kinematic, 1.003395e-6, 1e-6, "same"},
		{"water-20C", prandtl, 7.00776, 2e-6, "same"},
		{"air-20C", diffusivity, 2.13485e-5, 5e-5, "Lemmon & Jacobsen (2004), computed apart"},
		{"air-20C", kinematic, 1.51138e-5, 5e-5, "same"},
		{"air-20C", prandtl, 0.70796, 5e-5, "same"},
		{"air-300K", diffusivity, 0.2216e-4, 3e-4, "Mechanical Engineers' Handbook vol. 4, Table 7"},
		{"air-300K", prandtl, 0.708, 1e-4, "same; it is how the viscosity is made: its ν = 16.84e-6 would give 0.760"},
		{"mercury-273K", diffusivity, 4.29e-6, 3e-3, "same, Table 6"},
		{"mercury-273K", prandtl, 0.029, 7e-3, "same"},
		{"mercury-600K", diffusivity, 6.88e-6, 4e-3, "same; κ and k/(ρ c_p) of the table differ by 0.3 %"},
		{"mercury-600K", prandtl, 0.0103, 7e-3, "same"},
		{"sodium-366K", diffusivity, 6.71e-5, 3e-3, "same"},
		{"sodium-366K", prandtl, 0.011, 2e-2, "same, two digits"},
		{"sodium-977K", diffusivity, 6.12e-5, 6e-3, "same; κ and k/(ρ c_p) of the table differ by 0.6 %"},
		{"sodium-977K", prandtl, 0.0037, 2e-2, "same, two digits"},
		{"nak56-366K", diffusivity, 2.55e-5, 2e-3, "same"},
		{"nak56-366K", prandtl, 0.026, 2e-2, "same"},
		{"gallium-303K", prandtl, 0.025, 6e-2, "about 0.025: Assael et al. (2012), handbooks, from memory"},
		{"silicone-oil-1000cSt", kinematic, 1e-3, 1e-12, "1000 cSt by name"},
		{"outer-core", kinematic, 1e-6, 1e-12, "about 1e-6 m²/s, from memory"},
		{"upper-mantle", diffusivity, 7.575758e-7, 1e-6, "3/(3300 · 1200)"},
		{"upper-mantle-rounded", diffusivity, 1e-6, 1e-15, "doi 10.1186/s40645-016-0103-8, which rounds it"},
	} {
		t.Run(tt.preset+" "+tt.quantity, func(t *testing.T) {
			p, err := ByName(tt.preset)
			require.NoError(t, err)
			var got float64
			switch tt.quantity {
			case diffusivity:
				x, e := p.Material().Diffusivity()
				got, err = float64(x), e
			case kinematic:
				x, e := p.Material().KinematicViscosity()
				got, err = float64(x), e
			case prandtl:
				got, err = p.Material().Prandtl()
			}
			require.NoError(t, err)
			inRelative(t, tt.want, got, tt.tolerance, tt.source)
		})
	}
}

// The values of a source come through to the material unchanged.
func TestPresetValues(t *testing.T) {
	type row struct{ rho, alpha, k, cp, mu float64 }
	for name, want := range map[string]row{
		"water-20C":            {998.20715, 2.068062e-4, 0.598012, 4184.051, 1.001596e-3},
		"air-20C":              {1.204575, 3.420988e-3, 2.58738e-2, 1006.144, 1.820568e-5},
		"air-300K":             {1.1774, 1. / 300, 0.02624, 1005.7, 1.8473e-5},
		"ice-273K":             {916.7218, 1.59840e-4, 2.2, 2096.695, 0},
		"ice-260K":             {918.6115, 1.53275e-4, 2.34, 1999.981, 0},
		"glycerol-20C":         {1261, 5e-4, 0.285, 2400, 1.412},
		"silicone-oil-1000cSt": {970, 9.4e-4, 0.16, 1460, 0.97},
		"syrup-20C":            {1430, 4.5e-4, 0.365, 2300, 0},
		"basalt-melt":          {2700, 6e-5, 1.25, 1450, 30},
		"upper-mantle":         {3300, 3e-5, 3, 1200, 1e21},
		"upper-mantle-rounded": {3300, 3e-5, 3.96, 1200, 1e21},
		"lithosphere":          {3330, 3.1e-5, 3.138, 1171, 0},
		"lower-mantle":         {5000, 1.75e-5, 7.5, 1250, 1.7e22},
		"outer-core":           {11000, 1.5e-5, 130, 750, 1.1e-2},
		"halite":               {2165, 1.2e-4, 6, 865, 3e18},
		"mercury-273K":         {13595, 1.81e-4, 8.18, 140, 13595 * 1.240e-7},
		"mercury-600K":         {12809, 1.876e-4, 11.95, 136, 12809 * 0.711e-7},
		"sodium-366K":          {929.1, 2.6e-4, 86.2, 1380, 929.1 * 7.516e-7},
		"sodium-977K":          {778.5, 3.17e-4, 59.7, 1260, 778.5 * 2.285e-7},
		"nak56-366K":           {887.4, 0, 25.6, 1130, 887.4 * 6.522e-7},
		"gallium-303K":         {6095, 1.2e-4, 29.5, 397, 1.95e-3},
	} {
		p, err := ByName(name)
		require.NoError(t, err)
		m := p.Material()
		got := row{float64(m.Density), float64(m.Expansivity), float64(m.Conductivity), float64(m.SpecificHeat), float64(m.Viscosity)}
		if want != got {
			inRelative(t, want.rho, got.rho, 0, name+" density")
			inRelative(t, want.alpha, got.alpha, 1e-15, name+" expansivity")
			inRelative(t, want.k, got.k, 0, name+" conductivity")
			inRelative(t, want.cp, got.cp, 0, name+" specific heat")
			inRelative(t, want.mu, got.mu, 1e-15, name+" viscosity")
		}
	}
	assert.Len(t, Presets(), 21)
}

// facts are what TestPresetsAreWellFormed asks of each property.
type facts struct {
	name             string
	value, low, high float64
	shape            Shape
	digits           int
	status           Status
	source           string
	hasRange         bool
}

func factsOf[Q units.Quantity](name string, p Property[Q]) facts {
	return facts{
		name, float64(p.Value), float64(p.Range.Low), float64(p.Range.High), p.Range.Shape,
		p.Digits, p.Status, p.Source, !p.Range.IsZero(),
	}
}

func TestPresetsAreWellFormed(t *testing.T) {
	seen := map[string]bool{}
	for _, p := range Presets() {
		assert.False(t, seen[p.Name], "two presets %s", p.Name)
		seen[p.Name] = true
		assert.NotEmpty(t, p.Title, p.Name)
		assert.NotEmpty(t, p.Conditions, p.Name)
		complete := true
		for _, f := range []facts{
			factsOf("density", p.Density), factsOf("expansivity", p.Expansivity), factsOf("conductivity", p.Conductivity),
			factsOf("specific heat", p.SpecificHeat), factsOf("viscosity", p.Viscosity), factsOf("bulk modulus", p.BulkModulus),
		} {
			what := p.Name + " " + f.name
			if f.status == Unknown {
				complete = complete && f.name == "bulk modulus"
				assert.Equal(t, facts{name: f.name}, f, what)
				continue
			}
			assert.Positive(t, f.value, what)
			assert.Contains(t, []int{1, 2, 3, 4, 5, 6, 7}, f.digits, what)
			assert.NotEmpty(t, f.source, what)
			assert.NotContains(t, f.status.String(), "Status(", what)
			if f.hasRange {
				assert.True(t, f.low <= f.value && f.value <= f.high, what)
			}
			if f.high >= 10*f.low && f.hasRange {
				assert.Equal(t, LogUniform, f.shape, what)
			}
		}
		m := p.Material()
		assert.Equal(t, complete, m.Check() == nil, p.Name)
		assert.Equal(t, []string{p.Title, p.Conditions}, []string{m.Name, m.Conditions})
		assert.Equal(t, p.Temperature, m.ReferenceTemperature)
		assert.Equal(t, p.BulkModulus.Value, m.BulkModulus)
		assert.Equal(t, p.Sensitivity, m.Sensitivity)
		_, err := p.Ranges().parameters()
		assert.NoError(t, err, p.Name)
	}
}

// A preset names each value's source and says which ones to confirm.
func TestMaterialKeepsItsSources(t *testing.T) {
	p, err := ByName("ice-273K")
	require.NoError(t, err)
	assert.Equal(t, "density: IAPWS R10-06 (Feistel & Wagner 2006) (computed); "+
		"expansivity: IAPWS R10-06 (Feistel & Wagner 2006) (computed); "+
		"conductivity: handbooks (from memory); "+
		"specific heat: IAPWS R10-06 (Feistel & Wagner 2006) (computed); "+
		"viscosity: unknown", p.Material().Source)
	wantField(t, p.Material().Check(), "Material.Viscosity")
}

func TestPresetRanges(t *testing.T) {
	p, err := ByName("silicone-oil-1000cSt")
	require.NoError(t, err)
	r := p.Ranges()
	assert.Equal(t, Between[units.Expansivity](9.0e-4, 9.7e-4), r.Expansivity)
	assert.Equal(t, Between[units.SpecificHeat](1370, 1550), r.SpecificHeat)
	p, err = ByName("upper-mantle")
	require.NoError(t, err)
	r = p.Ranges()
	assert.Equal(t, Decades[units.DynamicViscosity](1e19, 1e21), r.Viscosity)
	assert.Equal(t, Between[units.Conductivity](3, 4.5), r.Conductivity)
	p, err = ByName("syrup-20C")
	require.NoError(t, err)
	assert.Equal(t, Between[units.Density](1420, 1440), p.Ranges().Density)
}

// The expansivities that are made from two densities of the same table.
func TestExpansivityFromTwoDensities(t *testing.T) {
	for _, tt := range []struct {
		name                   string
		cold, hot, interval, u float64
	}{
		{"mercury-600K", 13595, 12809, 600 - 273, 1e-3},
		{"sodium-977K", 929.1, 778.5, 977 - 366, 2e-3},
	} {
		p, err := ByName(tt.name)
		require.NoError(t, err)
		inRelative(t, (tt.cold-tt.hot)/tt.interval/tt.hot, float64(p.Expansivity.Value), tt.u, tt.name)
	}
}

// Ranges of the conductivity of ice are two published laws at its temperature.
func TestIceConductivityRange(t *testing.T) {
	for _, name := range []string{"ice-273K", "ice-260K"} {
		p, err := ByName(name)
		require.NoError(t, err)
		temperature := float64(p.Temperature)
		assert.InDelta(t, 567/temperature, float64(p.Conductivity.Range.Low), 5e-3, "Klinger (1980), from memory")
		assert.InDelta(t, 651/temperature, float64(p.Conductivity.Range.High), 5e-3, "Petrenko & Whitworth (1999), from memory")
	}
}

func TestUnknownPresetListsTheNames(t *testing.T) {
	_, err := ByName("treacle")
	require.ErrorIs(t, err, ErrUnknownPreset)
	wantField(t, err, "name")
	for _, p := range Presets() {
		assert.Contains(t, err.Error(), p.Name)
	}
}

func TestPresetsAreACopy(t *testing.T) {
	Presets()[0].Name = "spoiled"
	assert.NotEqual(t, "spoiled", Presets()[0].Name)
}

func TestStatusInWords(t *testing.T) {
	assert.Equal(t, "[unknown computed read in source from memory Status(9)]",
		fmt.Sprint([]Status{Unknown, Computed, Read, FromMemory, Status(9)}))
}

// The sensitivities of water against those of steam-table values 5 K either
// side, from memory: μ 1.138e-3 and 0.890e-3 Pa s, α 1.51e-4 and 2.57e-4 1/K.
func TestWaterSensitivity(t *testing.T) {
	s := water(t).Sensitivity
	assert.InDelta(t, math.Log(0.890/1.138)/10, float64(s.Viscosity), 5e-4)
	assert.InDelta(t, math.Log(2.57/1.51)/10, float64(s.Expansivity), 3e-3)
}
