package boussinesq

import (
	"math"
	"testing"

	"example.org/overturn/units"
	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// The layer of round() has ρ α g d³/(κ μ) = 4 · 0.25 · 8 · 8/(1/8 · 16) = 32
// per kelvin.
func TestRayleighNumbersByHand(t *testing.T) {
	heated := round()
	heated.Heating = 3
	for _, tt := range []struct {
		name string
		f    Number
		l    Layer
		want float64
	}{
		{"bottom", Layer.Rayleigh, round(), 32 * 4},
		{"bottom, heated inside too", Layer.Rayleigh, heated, 32 * 4},
		{"internal, isothermal walls", Layer.RayleighInternal, heated, 32 * 12},
		{"internal, insulated", Layer.RayleighInternal, ofFlux(0, 3), 32 * 12},
		{"internal, beside a flux", Layer.RayleighInternal, ofFlux(5, 3), 32 * 12},
		{"flux", Layer.RayleighFlux, ofFlux(5, 0), 32 * 10},
		{"flux and heating", Layer.RayleighFlux, ofFlux(5, 3), 32 * 22},
		{"another temperature", func(l Layer) (float64, error) { return l.RayleighOf(-0.5) }, round(), -16},
		{"Péclet", func(l Layer) (float64, error) { return l.Peclet(3) }, round(), 48},
		{"Reynolds", func(l Layer) (float64, error) { return l.Reynolds(3) }, round(), 1.5},
		{"Prandtl", Layer.Prandtl, round(), 32},
		{"expansion", Layer.Expansion, round(), 1},
		{"expansion over a flux", Layer.Expansion, ofFlux(5, 0), 2.5},
	} {
		got, err := tt.f(tt.l)
		require.NoError(t, err, tt.name)
		assert.Equal(t, tt.want, got, tt.name)
	}
}

func TestRayleighNumberOfTheWrongHeating(t *testing.T) {
	_, err := ofFlux(1, 0).Rayleigh()
	wantField(t, err, "Layer.Bottom")
	assert.NotErrorIs(t, err, ErrStable)
	_, err = round().RayleighInternal()
	wantField(t, err, "Layer.Heating")
	_, err = ofFlux(1, -1).RayleighInternal()
	wantField(t, err, "Layer.Heating")
	_, err = round().RayleighFlux()
	wantField(t, err, "Layer.Bottom")
	_, err = round().RayleighOf(units.TemperatureDifference(math.Inf(1)))
	wantField(t, err, "temperature difference")
	_, err = round().Peclet(-1)
	wantField(t, err, "speed")
	_, err = round().Reynolds(units.Velocity(math.NaN()))
	wantField(t, err, "speed")
	l := round()
	l.Depth = 1e200
	_, err = l.Rayleigh()
	wantField(t, err, "Rayleigh number")
}

// A number without dimension does not know the unit. A factor of two is exact.
func TestRayleighNumberIsInvariantToUnits(t *testing.T) {
	want, err := tank(t).Rayleigh()
	require.NoError(t, err)
	for _, unit := range []unit{{length: 1024}, {time: 1. / 64}, {mass: 1 << 20}, {temperature: 0.25}, {8, 32, 0.5, 2}} {
		got, err := unit.rescale(tank(t)).Rayleigh()
		require.NoError(t, err)
		assert.Equal(t, math.Float64bits(want), math.Float64bits(got), "%+v", unit)
	}
}

// unit is a change of units: how many of the new one are one of the old. Zero
// means one.
type unit struct{ length, time, mass, temperature float64 }

func (u unit) factors() (l, s, m, k float64) {
	or1 := func(x float64) float64 {
		if x == 0 {
			return 1
		}
		return x
	}
	return or1(u.length), or1(u.time), or1(u.mass), or1(u.temperature)
}

// rescale writes a layer's values in other units.
func (u unit) rescale(x Layer) Layer {
	l, s, m, k := u.factors()
	x.Material.Density *= units.Density(m / (l * l * l))
	x.Material.ReferenceTemperature *= units.Temperature(k)
	x.Material.Expansivity *= units.Expansivity(1 / k)
	x.Material.Conductivity *= units.Conductivity(m * l / (s * s * s * k))
	x.Material.SpecificHeat *= units.SpecificHeat(l * l / (s * s * k))
	x.Material.Viscosity *= units.DynamicViscosity(m / (l * s))
	x.Material.BulkModulus *= units.Pressure(m / (l * s * s))
	x.Material.Sensitivity.Viscosity *= units.Expansivity(1 / k)
	x.Material.Sensitivity.Expansivity *= units.Expansivity(1 / k)
	x.Material.Sensitivity.Conductivity *= units.Expansivity(1 / k)
	x.Material.Sensitivity.SpecificHeat *= units.Expansivity(1 / k)
	x.Depth *= units.Length(l)
	x.Gravity *= units.Acceleration(l / (s * s))
	x.Top *= units.Temperature(k)
	x.Bottom *= units.Temperature(k)
	x.BottomFlux *= units.HeatFlux(m / (s * s * s))
	x.Heating *= units.VolumetricHeating(m / (l * s * s * s))
	return x
}

// tank is a centimetre of water with a kelvin across it.
func tank(t testing.TB) Layer {
	return Layer{Material: water(t), Depth: 0.01, Gravity: 9.81, Top: 293, Bottom: 294}
}

func TestFrankKamenetskii(t *testing.T) {
	l := round()
	l.Top, l.Bottom = 300, 1600
	got, err := l.FrankKamenetskii(300e3, 1600)
	require.NoError(t, err)
	inRelative(t, 18.3227415889, got, 1e-10, "E ΔT/(R T²) for 300 kJ/mol, 1300 K at 1600 K, Solomatov (1995); computed apart")
	_, err = l.FrankKamenetskii(-1, 1600)
	wantField(t, err, "activation energy")
}

func BenchmarkRayleigh(b *testing.B) {
	l := tank(b)
	b.ReportAllocs()
	for b.Loop() {
		if _, err := l.Rayleigh(); err != nil {
			b.Fatal(err)
		}
	}
}

func TestRayleighDoesNotAllocate(t *testing.T) {
	l := tank(t)
	assert.Zero(t, testing.AllocsPerRun(100, func() { _, _ = l.Rayleigh() }))
}
