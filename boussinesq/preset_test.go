package boussinesq

import (
	"encoding/csv"
	"fmt"
	"math"
	"os"
	"strconv"
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

// The table agrees with a list of the same values, made apart from the same
// sources.
func TestPresetsAgreeWithTheirSources(t *testing.T) {
	file, err := os.Open("testdata/materials.csv")
	require.NoError(t, err)
	defer file.Close()
	rows, err := csv.NewReader(file).ReadAll()
	require.NoError(t, err)
	listed := map[string]int{}
	for _, row := range rows[1:] {
		what := row[0] + " " + row[1]
		p, err := ByName(row[0])
		require.NoError(t, err)
		f, ok := properties(p)[row[1]]
		require.True(t, ok, what)
		inRelative(t, number(t, row[2]), f.value, 1e-12, what)
		assert.Equal(t, number(t, row[3]), f.low, what)
		assert.Equal(t, number(t, row[4]), f.high, what)
		assert.Equal(t, row[5], strconv.Itoa(f.digits), what)
		assert.Equal(t, row[6], f.status.String(), what)
		listed[row[0]]++
	}
	assert.Len(t, listed, 21)
	for _, p := range Presets() {
		known := 0
		for name, f := range properties(p) {
			if f.status != Unknown && name != "bulk modulus" {
				known++
			}
		}
		assert.Equal(t, known, listed[p.Name], p.Name)
	}
}

// number parses a field that may be empty.
func number(t *testing.T, text string) float64 {
	if text == "" {
		return 0
	}
	x, err := strconv.ParseFloat(text, 64)
	require.NoError(t, err)
	return x
}

// facts are a property, its type forgotten.
type facts struct {
	value, low, high float64
	shape            Shape
	digits           int
	status           Status
	source           string
	hasRange         bool
}

func factsOf[Q units.Quantity](p Property[Q]) facts {
	return facts{
		float64(p.Value), float64(p.Range.Low), float64(p.Range.High), p.Range.Shape,
		p.Digits, p.Status, p.Source, !p.Range.IsZero(),
	}
}

func properties(p Preset) map[string]facts {
	return map[string]facts{
		"density":       factsOf(p.Density),
		"expansivity":   factsOf(p.Expansivity),
		"conductivity":  factsOf(p.Conductivity),
		"specific heat": factsOf(p.SpecificHeat),
		"viscosity":     factsOf(p.Viscosity),
		"bulk modulus":  factsOf(p.BulkModulus),
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
		for name, f := range properties(p) {
			what := p.Name + " " + name
			if f.status == Unknown {
				complete = complete && name == "bulk modulus"
				assert.Zero(t, f, what)
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

// ρ c² with a speed of sound from memory, or what PREM (Dziewonski & Anderson
// 1981, from memory) has in the layer.
func TestBulkModuli(t *testing.T) {
	for name, speed := range map[string]float64{
		"water-20C": 1482, "air-20C": 343.2, "air-300K": 347.2, "glycerol-20C": 1920,
		"silicone-oil-1000cSt": 990, "mercury-273K": 1450,
	} {
		p, err := ByName(name)
		require.NoError(t, err)
		inRelative(t, float64(p.Density.Value)*speed*speed, float64(p.BulkModulus.Value), 0.02, name)
	}
	for name, gpa := range map[string][2]float64{
		"upper-mantle": {127, 174}, "upper-mantle-rounded": {127, 174}, "lithosphere": {127, 132},
		"lower-mantle": {300, 656}, "outer-core": {644, 1305},
		"ice-273K": {8.4, 9}, "ice-260K": {8.6, 9.2}, "halite": {24, 26},
	} {
		p, err := ByName(name)
		require.NoError(t, err)
		k := p.BulkModulus.Value.In(units.Gigapascal)
		assert.True(t, gpa[0] <= k && k <= gpa[1], "%s: %v GPa", name, k)
	}
}

// d ln x/dT from what is known of each property otherwise: powers of the
// temperature, a second preset, a law, or steam-table values from memory.
func TestSensitivities(t *testing.T) {
	byName := func(name string) Preset {
		p, err := ByName(name)
		require.NoError(t, err)
		return p
	}
	cold, warm := byName("ice-260K"), byName("ice-273K")
	interval := float64(warm.Temperature.Sub(cold.Temperature))
	expansivity := math.Log(float64(warm.Expansivity.Value)/float64(cold.Expansivity.Value)) / interval
	heat := math.Log(float64(warm.SpecificHeat.Value)/float64(cold.SpecificHeat.Value)) / interval
	for _, tt := range []struct {
		what      string
		got       units.Expansivity
		want, tol float64
	}{
		{"ice-273K k ~ 1/T", warm.Sensitivity.Conductivity, -1 / 273.15, 1e-4},
		{"ice-260K k ~ 1/T", cold.Sensitivity.Conductivity, -1 / 260., 1e-4},
		{"ice-273K α", warm.Sensitivity.Expansivity, expansivity, 2e-4},
		{"ice-260K α", cold.Sensitivity.Expansivity, expansivity, 2e-4},
		{"ice-273K c_p", warm.Sensitivity.SpecificHeat, heat, 2e-4},
		{"ice-260K c_p", cold.Sensitivity.SpecificHeat, heat, 2e-4},
		{"air-20C α ~ 1/T", byName("air-20C").Sensitivity.Expansivity, -1 / 293.15, 1e-4},
		{"air-300K α ~ 1/T", byName("air-300K").Sensitivity.Expansivity, -1 / 300., 1e-4},
		{"air-20C μ ~ T^0.76", byName("air-20C").Sensitivity.Viscosity, 0.76 / 293.15, 1e-4},
		{"air-300K μ ~ T^0.76", byName("air-300K").Sensitivity.Viscosity, 0.76 / 300., 1e-4},
		{"air-20C k ~ T^0.9", byName("air-20C").Sensitivity.Conductivity, 0.9 / 293.15, 1e-4},
		{"air-300K k ~ T^0.9", byName("air-300K").Sensitivity.Conductivity, 0.9 / 300., 1e-4},
		{"water μ, 15 and 25 °C", water(t).Sensitivity.Viscosity, math.Log(0.890/1.138) / 10, 5e-4},
		{"water α, 15 and 25 °C", water(t).Sensitivity.Expansivity, math.Log(2.57/1.51) / 10, 3e-3},
		{"water k, 15 and 25 °C", water(t).Sensitivity.Conductivity, math.Log(0.6065/0.589) / 10, 1e-4},
		{"water c_p, 15 and 25 °C", water(t).Sensitivity.SpecificHeat, math.Log(4181.3/4188.5) / 10, 1e-5},
		{"halite k ~ 1/T", byName("halite").Sensitivity.Conductivity, -1 / 300., 1e-4},
		{"silicone oil μ, factor 0.4 from 311 to 372 K", byName("silicone-oil-1000cSt").Sensitivity.Viscosity, math.Log(0.4) / 61, 6e-3},
	} {
		assert.InDelta(t, tt.want, float64(tt.got), tt.tol, tt.what)
	}
}

// The temperature of each preset is the one in its conditions.
func TestPresetTemperatures(t *testing.T) {
	want := map[string]units.Temperature{
		"water-20C": 293.15, "air-20C": 293.15, "air-300K": 300, "ice-273K": 273.15, "ice-260K": 260,
		"glycerol-20C": 293.15, "silicone-oil-1000cSt": 298, "syrup-20C": 293.15, "basalt-melt": 1473.15,
		"halite": 300, "mercury-273K": 273, "mercury-600K": 600, "sodium-366K": 366, "sodium-977K": 977,
		"nak56-366K": 366, "gallium-303K": 302.9,
	}
	for _, p := range Presets() {
		assert.Equal(t, want[p.Name], p.Temperature, p.Name)
	}
}
