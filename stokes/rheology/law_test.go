package rheology

import (
	"math"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

func TestSimplestLaws(t *testing.T) {
	dst := []float64{0, 0, 0}
	Constant(7).ViscosityTo(dst, nil, 3)
	assert.Equal(t, []float64{7, 7, 7}, dst)
	Profile(func(d float64) float64 { return 2 * d }).ViscosityTo(dst, nil, 3)
	assert.Equal(t, []float64{6, 6, 6}, dst)
	Func(func(t, d float64) float64 { return t + 10*d }).ViscosityTo(dst, []float64{1, 2, 3}, 4)
	assert.Equal(t, []float64{41, 42, 43}, dst)
}

func TestSteps(t *testing.T) {
	depths, values := []float64{100, 660}, []float64{10, 1, 30}
	f, err := Steps(depths, values)
	require.NoError(t, err)
	depths[0], values[0] = 0, 0 // the function has copies
	for depth, want := range map[float64]float64{-1: 10, 0: 10, 99.9: 10, 100: 1, 659: 1, 660: 30, 3000: 30} {
		assert.Equal(t, want, f(depth), "depth %g", depth)
	}
	for _, bad := range []struct {
		depths, values []float64
		want           string
	}{
		{[]float64{1}, []float64{1}, "1 values for 1 depths"},
		{[]float64{1, 1}, []float64{1, 1, 1}, "depth 1 is 1"},
		{[]float64{math.NaN()}, []float64{1, 1}, "depth 0 is NaN"},
		{[]float64{1}, []float64{1, 0}, "value 1 is 0"},
		{[]float64{1}, []float64{math.Inf(1), 1}, "value 0 is +Inf"},
	} {
		_, err := Steps(bad.depths, bad.values)
		assert.ErrorContains(t, err, bad.want)
	}
}

func TestFrankKamenetskii(t *testing.T) {
	// exp(-bT) with b = ln 1000: Blankenbach et al. (1989), case 2a, from memory.
	law := FrankKamenetskii{ThermalExponent: math.Log(1000)}
	near(t, 1, at(law, 0, 0.7), 1e-15, "cold")
	near(t, 1e-3, at(law, 1, 0.7), 1e-14, "hot")
	// exp(-bT + c(1-z)) with b = ln 16384, c = ln 64: their case 2b, from memory.
	law = FrankKamenetskii{ThermalExponent: math.Log(16384), DepthExponent: math.Log(64)}
	near(t, 64.0/128, at(law, 0.5, 1), 1e-14, "half hot at the bottom")
	near(t, 8, at(law, 0, 0.5), 1e-14, "cold at half depth")
	near(t, 8, at(FrankKamenetskii{DepthExponent: math.Log(64)}, 5, 0.5), 1e-14, "no temperature")

	law = FrankKamenetskii{
		Reference: 3e20, ThermalExponent: 2, DepthExponent: 3,
		ReferenceTemperature: 1000, TemperatureScale: 500, DepthScale: 600e3,
	}
	near(t, 3e20*math.Exp(-1.4+1), at(law, 1350, 200e3), 1e-14, "in SI")
}

// Arrhenius at its reference, off it by hand, and in two sets of units.
func TestArrhenius(t *testing.T) {
	law := Arrhenius{
		Reference: 1e20, ActivationEnergy: 300e3, ActivationVolume: 5e-6, PressureGradient: 3.2e4,
		SurfacePressure: 1e5, ReferenceTemperature: 1600, ReferenceDepth: 100e3,
	}
	near(t, 1e20, at(law, 1600, 100e3), 1e-14, "at the reference")
	e := (300e3+5e-6*(1e5+3.2e4*200e3))/(8.314462618*1500) - (300e3+5e-6*(1e5+3.2e4*100e3))/(8.314462618*1600)
	near(t, 1e20*math.Exp(e), at(law, 1500, 200e3), 1e-13, "off the reference")

	celsius := law
	celsius.TemperatureOffset, celsius.ReferenceTemperature = 273.15, 1600-273.15
	near(t, at(law, 1500, 200e3), at(celsius, 1500-273.15, 200e3), 1e-13, "in °C")

	// T = 273 + 1300 T', depth in units of 600 km, viscosity of 1e20.
	free := Arrhenius{
		ActivationEnergy: 300e3 / (GasConstant * 1300), ActivationVolume: 5e-6 / (GasConstant * 1300),
		PressureGradient: 3.2e4 * 600e3, SurfacePressure: 1e5, GasConstant: 1,
		TemperatureOffset: 273.0 / 1300, ReferenceTemperature: 1327.0 / 1300, ReferenceDepth: 100.0 / 600,
	}
	near(t, at(law, 1500, 200e3)/1e20, at(free, 1227.0/1300, 200.0/600), 1e-12, "dimensionless")

	near(t, 5, at(Arrhenius{Reference: 5, ReferenceTemperature: 1}, 0, 0), 0, "no activation, at absolute zero")
	law.Min, law.Max = 1e18, 1e25
	assert.Equal(t, 1e18, at(law, 4000, 0))
	assert.Equal(t, 1e25, at(law, 500, 0))
}

// The tangent law agrees with the law and its two slopes, so that its error
// shrinks fourfold when the distance halves.
func TestLinearised(t *testing.T) {
	law := Arrhenius{
		Reference: 1e20, ActivationEnergy: 300e3, ActivationVolume: 5e-6, PressureGradient: 3.2e4,
		ReferenceTemperature: 1600, Min: 2e20, Max: 3e20,
	}
	tangent := law.Linearised(1500, 100e3)
	soft := law.Linearised(1700, 100e3)
	law.Min, law.Max = 0, 0 // which the tangents left out
	near(t, at(law, 1700, 100e3), at(soft, 1700, 100e3), 1e-13, "at a softer point")
	near(t, at(law, 1500, 100e3), at(tangent, 1500, 100e3), 1e-13, "at the point")
	wrong := func(h float64) float64 {
		return math.Log(at(tangent, 1500+100*h, (100+30*h)*1e3) / at(law, 1500+100*h, (100+30*h)*1e3))
	}
	assert.InDelta(t, 4, wrong(0.02)/wrong(0.01), 0.02)
	assert.InDelta(t, 300e3/(GasConstant*1500*1500), Arrhenius{ActivationEnergy: 300e3, ReferenceTemperature: 1500}.Linearised(1500, 0).ThermalExponent, 1e-15)
}

func TestLimitsAndScaled(t *testing.T) {
	fk := FrankKamenetskii{ThermalExponent: math.Log(1e6)}
	dst := make([]float64, 3)
	Limits{fk, 1e-4, 0.1}.ViscosityTo(dst, []float64{0, 0.5, 1}, 0)
	assert.InDeltaSlice(t, []float64{0.1, 1e-3, 1e-4}, dst, 1e-16)
	Limits{Law: fk, Max: 0.1}.ViscosityTo(dst, []float64{0, 0.5, 1}, 0)
	assert.InDeltaSlice(t, []float64{0.1, 1e-3, 1e-6}, dst, 1e-16)
	Limits{Law: fk, Min: 0.1}.ViscosityTo(dst, []float64{0, 0.5, 1}, 0)
	assert.InDeltaSlice(t, []float64{1, 0.1, 0.1}, dst, 1e-15)
	Scaled{fk, func(d float64) float64 { return 1 + d }}.ViscosityTo(dst, []float64{0, 0.5, 1}, 29)
	assert.InDeltaSlice(t, []float64{30, 30e-3, 30e-6}, dst, 1e-14)
}

func TestLiquids(t *testing.T) {
	// Computed apart with 40 digits from the law of Cheng (2008).
	near(t, 1.413831, at(Glycerol{}, 293.15, 0), 5e-7, "glycerol at 20 °C")
	near(t, 12.1, at(Glycerol{}, 273.15, 0), 1e-15, "glycerol at 0 °C")
	assert.Equal(t, at(Glycerol{}, 273.15, 0), at(Glycerol{}, 120, 0), "holds its end value")
	assert.Equal(t, at(Glycerol{}, 373.15, 0), at(Glycerol{}, 500, 0), "holds its end value")
	assert.Less(t, at(Glycerol{}, 373.15, 0), at(Glycerol{}, 372, 0))

	vf := VogelFulcher{Reference: 2, Slope: 900, Pole: 600, Min: 3}
	near(t, 2*math.Exp(9), at(vf, 700, 0), 1e-14, "Vogel-Fulcher")
	near(t, math.Exp(9), at(VogelFulcher{Slope: 900, Pole: 600}, 700, 0), 1e-14, "reference 1")
	assert.Equal(t, 3.0, at(vf, 1e6, 0))

	syrup := LogPolynomial{
		Coefficients: []float64{2, -0.5, 0.25}, ReferenceTemperature: 293, TemperatureScale: 10,
		MinTemperature: 283, MaxTemperature: 313,
	}
	near(t, math.Exp(2-0.5*1.5+0.25*1.5*1.5), at(syrup, 308, 0), 1e-15, "polynomial")
	near(t, math.Exp(2.75), at(syrup, 200, 0), 1e-15, "held below")
	near(t, math.Exp(2), at(syrup, 400, 0), 1e-15, "held above")
	near(t, math.Exp(3), at(LogPolynomial{Coefficients: []float64{1, 1}, MaxTemperature: 2}, 2, 0), 1e-15, "scale 1")
}
