package rheology

import (
	"math"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// near fails unless got is within a relative distance of want.
func near(t *testing.T, want, got, tol float64, what string) {
	t.Helper()
	if !(math.Abs(got-want) <= tol*math.Abs(want)) {
		t.Errorf("%s = %.16g, want %.16g within %.0e relative", what, got, want, tol)
	}
}

// at evaluates a law at one temperature and depth.
func at(law Law, temperature, depth float64) float64 {
	var eta [1]float64
	law.ViscosityTo(eta[:], []float64{temperature}, depth)
	return eta[0]
}

// everyLaw has each law of the package with fields that make sense and a
// domain in which it does.
func everyLaw() map[string]struct {
	law    Law
	domain Domain
} {
	unit := Domain{0, 1, 0, 1}
	mantle := Domain{900, 1900, 0, 400e3}
	dry := Composite{Paths: Olivine(), StrainRate: 1e-15, GrainSize: 5e-3, PressureGradient: 3.2e4, Max: 1e26}
	stress := dry
	stress.StrainRate, stress.Stress = 0, 1e6
	ice := Composite{Paths: ColdIce(), StrainRate: 1e-12, GrainSize: 1e-3, PressureGradient: 1200}
	return map[string]struct {
		law    Law
		domain Domain
	}{
		"Constant":         {Constant(3), unit},
		"Profile":          {Profile(func(d float64) float64 { return 1 + d }), unit},
		"Func":             {Func(func(t, d float64) float64 { return 2 + d - t }), unit},
		"FrankKamenetskii": {FrankKamenetskii{ThermalExponent: 14, DepthExponent: 4}, unit},
		"Arrhenius": {Arrhenius{
			Reference: 1e20, ActivationEnergy: 300e3, ActivationVolume: 5e-6,
			PressureGradient: 3.2e4, ReferenceTemperature: 1600, Max: 1e26,
		}, mantle},
		"VogelFulcher":    {VogelFulcher{Slope: 9000, Pole: 600, Max: 1e12}, mantle},
		"LogPolynomial":   {LogPolynomial{Coefficients: []float64{1, -3, 0.5}, MaxTemperature: 1}, unit},
		"Glycerol":        {Glycerol{}, Domain{260, 390, 0, 1}},
		"Limits":          {Limits{FrankKamenetskii{ThermalExponent: 20}, 1e-6, 0.1}, unit},
		"Scaled":          {Scaled{FrankKamenetskii{ThermalExponent: 5}, func(d float64) float64 { return 1 + 29*d }}, unit},
		"Composite":       {dry, mantle},
		"CompositeStress": {stress, mantle},
		"CompositeIce":    {ice, Domain{100, 255, 0, 24e3}},
	}
}

func TestEveryLawStandsTheProbe(t *testing.T) {
	for name, c := range everyLaw() {
		t.Run(name, func(t *testing.T) { require.NoError(t, Probe(c.law, c.domain)) })
	}
}

func TestRowsDoNotAllocate(t *testing.T) {
	dst, temperature := make([]float64, 16), make([]float64, 16)
	for name, c := range everyLaw() {
		for i := range temperature {
			temperature[i] = c.domain.HottestTemperature
		}
		allocs := testing.AllocsPerRun(10, func() { c.law.ViscosityTo(dst, temperature, c.domain.Bottom) })
		assert.Zero(t, allocs, name)
	}
}

// A temperature that is not a number must be seen in the viscosity.
func TestNotANumberIsNotHidden(t *testing.T) {
	for name, c := range everyLaw() {
		switch c.law.(type) {
		case Constant, Profile:
			continue
		}
		assert.True(t, math.IsNaN(at(c.law, math.NaN(), 0)), name)
	}
}

// At absolute zero and below, where an iterate may stray, a thermally
// activated law is at its stiffest.
func TestColderThanAbsoluteZeroIsStiff(t *testing.T) {
	laws := everyLaw()
	for name, want := range map[string]float64{"Arrhenius": 1e26, "Composite": 1e26, "CompositeStress": 1e26, "VogelFulcher": 1e12} {
		assert.Equal(t, want, at(laws[name].law, 0, 0), name)
		assert.Equal(t, want, at(laws[name].law, -5, 0), name)
	}
	assert.Equal(t, math.Inf(1), at(laws["CompositeIce"].law, 0, 0))
}

func TestValidateNamesTheField(t *testing.T) {
	nan, inf := math.NaN(), math.Inf(1)
	fk := FrankKamenetskii{}
	arr := Arrhenius{ReferenceTemperature: 1600}
	vf := VogelFulcher{Slope: 1}
	poly := LogPolynomial{Coefficients: []float64{1}, MaxTemperature: 1}
	comp := Composite{Paths: WetOlivine(), StrainRate: 1e-15, GrainSize: 1e-3, Water: 1000}
	creep := OlivineDislocationWet()
	for _, v := range []Validator{fk, arr, vf, poly, comp, creep} {
		require.NoError(t, v.Validate(), "%T", v)
	}
	tests := []struct {
		v    Validator
		want string
	}{
		{Constant(0), "Constant is 0, want finite and > 0"},
		{Constant(nan), "Constant is NaN"},
		{Constant(inf), "Constant is +Inf"},
		{Constant(-1), "Constant is -1"},
		{Profile(nil), "Profile is nil"},
		{Func(nil), "Func is nil"},
		{with(fk, func(f *FrankKamenetskii) { f.Reference = -1 }), "Reference of FrankKamenetskii is -1, want finite and >= 0"},
		{with(fk, func(f *FrankKamenetskii) { f.ThermalExponent = nan }), "ThermalExponent of FrankKamenetskii is NaN, want a finite number"},
		{with(fk, func(f *FrankKamenetskii) { f.DepthExponent = inf }), "DepthExponent"},
		{with(fk, func(f *FrankKamenetskii) { f.ReferenceTemperature = nan }), "ReferenceTemperature"},
		{with(fk, func(f *FrankKamenetskii) { f.TemperatureScale = -1 }), "TemperatureScale"},
		{with(fk, func(f *FrankKamenetskii) { f.DepthScale = inf }), "DepthScale"},
		{with(arr, func(a *Arrhenius) { a.Reference = -1 }), "Reference of Arrhenius"},
		{with(arr, func(a *Arrhenius) { a.ActivationEnergy = -1 }), "ActivationEnergy"},
		{with(arr, func(a *Arrhenius) { a.ActivationVolume = nan }), "ActivationVolume"},
		{with(arr, func(a *Arrhenius) { a.PressureGradient = inf }), "PressureGradient"},
		{with(arr, func(a *Arrhenius) { a.SurfacePressure = nan }), "SurfacePressure"},
		{with(arr, func(a *Arrhenius) { a.TemperatureOffset = nan }), "TemperatureOffset"},
		{with(arr, func(a *Arrhenius) { a.TemperatureOffset = -1600 }), "ReferenceTemperature plus TemperatureOffset of Arrhenius is 0, want finite and > 0"},
		{with(arr, func(a *Arrhenius) { a.ReferenceDepth = nan }), "ReferenceDepth"},
		{with(arr, func(a *Arrhenius) { a.Min, a.Max = 2, 1 }), "Min of Arrhenius is 2, want at most its Max, 1"},
		{with(arr, func(a *Arrhenius) { a.Min = nan }), "Min of Arrhenius is NaN"},
		{with(arr, func(a *Arrhenius) { a.Max = -1 }), "Max of Arrhenius is -1"},
		{with(arr, func(a *Arrhenius) { a.GasConstant = -8 }), "GasConstant"},
		{with(vf, func(v *VogelFulcher) { v.Reference = nan }), "Reference of VogelFulcher"},
		{with(vf, func(v *VogelFulcher) { v.Slope = 0 }), "Slope"},
		{with(vf, func(v *VogelFulcher) { v.Pole = inf }), "Pole"},
		{with(vf, func(v *VogelFulcher) { v.Max = nan }), "Max of VogelFulcher"},
		{with(poly, func(p *LogPolynomial) { p.Coefficients = nil }), "Coefficients of LogPolynomial are empty"},
		{with(poly, func(p *LogPolynomial) { p.Coefficients = []float64{1, nan} }), "Coefficients[1]"},
		{with(poly, func(p *LogPolynomial) { p.ReferenceTemperature = nan }), "ReferenceTemperature"},
		{with(poly, func(p *LogPolynomial) { p.TemperatureScale = -2 }), "TemperatureScale"},
		{with(poly, func(p *LogPolynomial) { p.MinTemperature = 1 }), "MinTemperature of LogPolynomial is 1, want below MaxTemperature, 1"},
		{with(poly, func(p *LogPolynomial) { p.MinTemperature = math.Inf(-1) }), "MinTemperature"},
		{with(poly, func(p *LogPolynomial) { p.MaxTemperature = inf }), "MaxTemperature"},
		{Limits{}, "Law of Limits: rheology: law is nil"},
		{Limits{Constant(-1), 0, 0}, "Law of Limits: rheology: Constant is -1"},
		{Limits{Constant(1), 2, 1}, "Min of Limits"},
		{Scaled{Law: Constant(1)}, "Factor of Scaled is nil"},
		{Scaled{Constant(0), func(float64) float64 { return 1 }}, "Law of Scaled: rheology: Constant is 0"},
		{with(creep, func(c *Creep) { c.Prefactor = 0 }), "Prefactor of olivine dislocation creep, wet is 0"},
		{with(creep, func(c *Creep) { c.Name, c.Prefactor = "", 0 }), "Prefactor of Creep is 0"},
		{with(creep, func(c *Creep) { c.StressUnit = -1 }), "StressUnit"},
		{with(creep, func(c *Creep) { c.GrainUnit = nan }), "GrainUnit"},
		{with(creep, func(c *Creep) { c.StressExponent = 0 }), "StressExponent"},
		{with(creep, func(c *Creep) { c.GrainExponent = -3 }), "GrainExponent"},
		{with(creep, func(c *Creep) { c.WaterExponent = nan }), "WaterExponent"},
		{with(creep, func(c *Creep) { c.ActivationEnergy = -1 }), "ActivationEnergy"},
		{with(creep, func(c *Creep) { c.ActivationVolume = inf }), "ActivationVolume"},
		{with(creep, func(c *Creep) { c.MaxTemperature = -1 }), "MaxTemperature"},
		{with(creep, func(c *Creep) { c.Geometry = 7 }), "is Geometry(7), want uniaxial or invariant"},
		{with(comp, func(c *Composite) { c.StrainRate = 0 }), "StrainRate and Stress of Composite are 0 and 0, want exactly one"},
		{with(comp, func(c *Composite) { c.Stress = 1e6 }), "want exactly one"},
		{with(comp, func(c *Composite) { c.StrainRate = -1e-15 }), "StrainRate of Composite is -1e-15"},
		{with(comp, func(c *Composite) { c.StrainRate, c.Stress = 0, nan }), "Stress of Composite is NaN"},
		{with(comp, func(c *Composite) { c.PressureGradient = nan }), "PressureGradient"},
		{with(comp, func(c *Composite) { c.SurfacePressure = nan }), "SurfacePressure"},
		{with(comp, func(c *Composite) { c.Min, c.Max = 2, 1 }), "Min of Composite"},
		{with(comp, func(c *Composite) { c.Paths = nil }), "Paths of Composite are empty"},
		{with(comp, func(c *Composite) { c.Paths = []Path{{}} }), "Paths[0] of Composite is empty"},
		{with(comp, func(c *Composite) { c.Paths = []Path{Alone(creep), Alone(Creep{})} }), "Paths[1] of Composite: rheology: Prefactor of Creep is 0"},
		{with(comp, func(c *Composite) { c.GrainSize = 0 }), "GrainSize is 0"},
		{with(comp, func(c *Composite) { c.Water = nan }), "Water is NaN"},
	}
	for _, tt := range tests {
		assert.ErrorContains(t, tt.v.Validate(), tt.want, "%T", tt.v)
	}
	require.NoError(t, Glycerol{}.Validate())
	require.NoError(t, Limits{Constant(1), 2, 2}.Validate())
}

// with returns a changed copy of a value.
func with[T any](v T, change func(*T)) T {
	change(&v)
	return v
}

func TestCheckKnowsMissingAndForeignLaws(t *testing.T) {
	require.ErrorIs(t, Check(nil), ErrNoLaw)
	require.NoError(t, Check(foreign{}))
	require.Error(t, Check(Constant(-1)))
	require.ErrorIs(t, Limits{}.Validate(), ErrNoLaw)
}

// foreign is a law with no Validate method and each fault that Probe knows.
type foreign struct{ fault string }

func (f foreign) ViscosityTo(dst, temperature []float64, depth float64) {
	for i, t := range temperature {
		dst[i] = 1 + t
		switch f.fault {
		case "position":
			dst[i] += float64(i)
		case "length":
			dst[i] += float64(len(dst))
		case "negative":
			dst[i] = t - 1
		case "NaN":
			dst[i] = math.NaN()
		case "deep":
			dst[i] = 2 - depth
		case "writes":
			temperature[i] = 0.5
		}
	}
	if f.fault == "in place" && len(dst) > 1 {
		dst[0] = 1 + temperature[1]
	}
}

// fickle is a law that changes from call to call.
type fickle struct{ calls *int }

func (f fickle) ViscosityTo(dst, _ []float64, _ float64) {
	*f.calls++
	fill(dst, float64(*f.calls))
}

func TestProbeFindsFaults(t *testing.T) {
	d := Domain{0, 1, 0, 3}
	for fault, want := range map[string]string{
		"position": "a cell alone has",
		"length":   "a cell alone has",
		"negative": "at depth 0 and temperature 0 the viscosity is -1, want finite and > 0",
		"NaN":      "the viscosity is NaN",
		"deep":     "the viscosity is",
		"writes":   "the law changes temperature 0 to 0.5",
		"in place": "a cell alone has",
	} {
		assert.ErrorContains(t, Probe(foreign{fault}, d), want, fault)
	}
	require.NoError(t, Probe(foreign{}, d))
	within := Func(func(t, d float64) float64 {
		if t < 0 || t > 1 || d < 0 || d > 3 {
			return -1
		}
		return 1
	})
	require.NoError(t, Probe(within, d), "stays in the domain")
	assert.ErrorContains(t, Probe(fickle{new(int)}, d), "a second call gives 2 after 1")
	assert.ErrorContains(t, Probe(shifting{}, d), "its own destination")
	assert.ErrorContains(t, Probe(Constant(0), d), "Constant is 0")
	assert.ErrorContains(t, Probe(Constant(1), Domain{ColdestTemperature: math.NaN()}), "ColdestTemperature of Domain")
	assert.ErrorContains(t, Probe(Constant(1), Domain{HottestTemperature: math.NaN()}), "HottestTemperature of Domain")
	assert.ErrorContains(t, Probe(Constant(1), Domain{Top: math.NaN()}), "Top of Domain")
	assert.ErrorContains(t, Probe(Constant(1), Domain{Bottom: math.NaN()}), "Bottom of Domain")
	assert.ErrorContains(t, Probe(Func(func(t, _ float64) float64 { return 1 - t }), d), "temperature 1 the viscosity is 0")
	assert.ErrorContains(t, Probe(Profile(func(d float64) float64 { return 3 - d }), d), "at depth 3 ")
}

// shifting overwrites its temperatures while it still needs them.
type shifting struct{}

func (shifting) ViscosityTo(dst, temperature []float64, _ float64) {
	fill(dst, 1)
	for i, t := range temperature {
		dst[i] = 1 + t
	}
}
