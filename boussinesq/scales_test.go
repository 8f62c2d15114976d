package boussinesq

import (
	"math"
	"math/rand/v2"
	"strings"
	"testing"

	"example.org/overturn/units"
	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"gonum.org/v1/gonum/floats/scalar"
)

// pair is one quantity of Scales, its type forgotten, with the powers in which
// it contains the units of length, time, mass and temperature.
type pair struct {
	name       string
	to         func(Scales, float64) float64
	from       func(Scales, float64) float64
	l, s, m, k int
}

func both[Q units.Quantity](name string, to func(Scales, float64) Q, from func(Scales, Q) float64, l, s, m, k int) pair {
	return pair{
		name: name,
		to:   func(x Scales, v float64) float64 { return float64(to(x, v)) },
		from: func(x Scales, q float64) float64 { return from(x, Q(q)) },
		l:    l, s: s, m: m, k: k,
	}
}

var pairs = []pair{
	both("length", Scales.Length, Scales.FromLength, 1, 0, 0, 0),
	both("time", Scales.Time, Scales.FromTime, 0, 1, 0, 0),
	both("velocity", Scales.Velocity, Scales.FromVelocity, 1, -1, 0, 0),
	both("temperature difference", Scales.TemperatureDifference, Scales.FromTemperatureDifference, 0, 0, 0, 1),
	both("heat flux", Scales.HeatFlux, Scales.FromHeatFlux, 0, -3, 1, 0),
	both("heating", Scales.VolumetricHeating, Scales.FromVolumetricHeating, -1, -3, 1, 0),
	both("heat transfer", Scales.HeatTransfer, Scales.FromHeatTransfer, 0, -3, 1, -1),
	both("stress", Scales.Stress, Scales.FromStress, -1, -2, 1, 0),
	both("strain rate", Scales.StrainRate, Scales.FromStrainRate, 0, -1, 0, 0),
	both("viscosity", Scales.Viscosity, Scales.FromViscosity, -1, -1, 1, 0),
	both("stream function", Scales.StreamFunction, Scales.FromStreamFunction, 2, -1, 0, 0),
	both("dissipation", Scales.Dissipation, Scales.FromDissipation, -1, -3, 1, 0),
	both("body force", Scales.BodyForce, Scales.FromBodyForce, -2, -2, 1, 0),
	both("density anomaly", Scales.DensityAnomaly, Scales.FromDensityAnomaly, -3, 0, 1, 0),
	both("topography", Scales.Topography, Scales.FromTopography, 1, 0, 0, 0),
}

func scalesOf(t testing.TB, l Layer) Scales {
	t.Helper()
	s, err := l.Scales()
	require.NoError(t, err)
	return s
}

// d = 2, κ = 1/8, θ = 4, k = 1, μ = 16, ρ = 4, α = 1/4, g = 8.
func TestScalesByHand(t *testing.T) {
	s := scalesOf(t, round())
	want := map[string]float64{
		"length":                 2,
		"time":                   32,
		"velocity":               1. / 16,
		"temperature difference": 4,
		"heat flux":              2,
		"heating":                1,
		"heat transfer":          0.5,
		"stress":                 0.5,
		"strain rate":            1. / 32,
		"viscosity":              16,
		"stream function":        1. / 8,
		"dissipation":            1. / 64,
		"body force":             0.25,
		"density anomaly":        -4,
		"topography":             1. / 64,
	}
	require.Len(t, want, len(pairs))
	for _, p := range pairs {
		assert.Equal(t, 3*want[p.name], p.to(s, 3), p.name)
	}
	assert.Equal(t, units.Temperature(302), s.Temperature(0.5))
	assert.Equal(t, 0.5, s.FromTemperature(302))
	assert.Equal(t, 128.0, s.Rayleigh())
}

func TestScalesGoBothWays(t *testing.T) {
	random := rand.New(rand.NewPCG(1, 2))
	for _, l := range []Layer{tank(t), upperMantle(t), ofFlux(0.3, 0.7)} {
		s := scalesOf(t, l)
		for range 2000 {
			x := math.Exp(20*random.NormFloat64()) * float64(1-2*random.IntN(2))
			for _, p := range pairs {
				back := p.from(s, p.to(s, x))
				if !scalar.EqualWithinULP(back, x, 1) {
					t.Fatalf("%s: %v came back as %v", p.name, x, back)
				}
			}
			y := random.Float64()
			back := s.FromTemperature(s.Temperature(y))
			theta := float64(s.TemperatureDifference(1))
			assert.InDelta(t, y, back, float64(s.Temperature(1))*0x1p-52/theta)
		}
	}
}

// Each unit has the dimension of its quantity: it follows a change of the
// units of length, time, mass and temperature by the right powers, to the bit
// where the factors are powers of two.
func TestScalesFollowTheUnits(t *testing.T) {
	u := unit{length: 4, time: 1. / 8, mass: 1024, temperature: 2}
	fl, fs, fm, fk := u.factors()
	heated := tank(t)
	heated.Bottom, heated.BottomFlux, heated.Heating = 0, 40, 300
	for _, l := range []Layer{tank(t), upperMantle(t), heated} {
		a, b := scalesOf(t, l), scalesOf(t, u.rescale(l))
		for _, p := range pairs {
			factor := math.Pow(fl, float64(p.l)) * math.Pow(fs, float64(p.s)) * math.Pow(fm, float64(p.m)) * math.Pow(fk, float64(p.k))
			assert.Equal(t, p.to(a, 0.7)*factor, p.to(b, 0.7), p.name)
		}
		assert.Equal(t, a.Rayleigh(), b.Rayleigh())
	}
}

// What the equations say of each other: the scales cannot be wrong one by one.
func TestScalesAgreeWithTheEquations(t *testing.T) {
	l := upperMantle(t)
	s := scalesOf(t, l)
	const tol = 1e-14
	dt := float64(s.TemperatureDifference(1))
	d := float64(s.Length(1))
	m := l.Material
	inRelative(t, float64(s.Velocity(1))*float64(s.Time(1)), d, tol, "d = v t")
	inRelative(t, float64(m.Viscosity)*float64(s.StrainRate(1)), float64(s.Stress(1)), tol, "σ = μ ε")
	inRelative(t, float64(s.Stress(1))*float64(s.StrainRate(1)), float64(s.Dissipation(1)), tol, "σ ε")
	inRelative(t, float64(s.Velocity(1))*d, float64(s.StreamFunction(1)), tol, "v d")
	inRelative(t, float64(m.Conductivity)*dt/d, float64(s.HeatFlux(1)), tol, "Fourier")
	inRelative(t, float64(s.HeatFlux(1))/dt, float64(s.HeatTransfer(1)), tol, "q = h ΔT")
	inRelative(t, float64(m.Density)*float64(m.SpecificHeat)*dt/float64(s.Time(1)), float64(s.VolumetricHeating(1)), tol, "ρ c_p ∂T/∂t")
	buoyancy := -float64(s.DensityAnomaly(1)) * float64(l.Gravity)
	inRelative(t, buoyancy, float64(s.BodyForce(s.Rayleigh())), tol, "Ra T is the buoyancy of T")
	inRelative(t, float64(s.Stress(1)), float64(s.Topography(1))*float64(m.Density)*float64(l.Gravity), tol, "ρ g h")

	di, err := l.DissipationNumber()
	require.NoError(t, err)
	inRelative(t, di/s.Rayleigh(), s.FromVolumetricHeating(s.Dissipation(1)), tol, "dissipation is Di/Ra of heating")

	rho, err := func() (units.Density, error) { m.ReferenceTemperature = l.Top; return m.DensityAt(s.Temperature(0.5)) }()
	require.NoError(t, err)
	inRelative(t, float64(rho-m.Density), float64(s.DensityAnomaly(0.5)), 1e-12, "linear law")
}

// The Rayleigh number of the scales is that of the heating.
func TestScalesRayleighNumber(t *testing.T) {
	for _, tt := range []struct {
		l Layer
		f Number
	}{
		{round(), Layer.Rayleigh},
		{ofFlux(0, 3), Layer.RayleighInternal},
		{ofFlux(0, 3), Layer.RayleighFlux},
		{ofFlux(5, 3), Layer.RayleighFlux},
	} {
		want, err := tt.f(tt.l)
		require.NoError(t, err)
		assert.Equal(t, want, scalesOf(t, tt.l).Rayleigh())
	}
}

func TestScalesOutOfRange(t *testing.T) {
	for _, tt := range []struct {
		field string
		spoil func(*Layer)
	}{
		{"scale of volumetric heating", func(l *Layer) { l.Depth = 1e-160 }},
		{"Rayleigh number", func(l *Layer) { l.Depth = 1e120 }},
		{"temperature scale", func(l *Layer) { l.Bottom, l.Heating, l.Depth = 0, 1, 1e160 }},
		{"scale of dissipation", func(l *Layer) { l.Material.Viscosity, l.Material.Expansivity, l.Depth = 1e-250, 1e-200, 1e30 }},
	} {
		l := round()
		tt.spoil(&l)
		s, err := l.Scales()
		wantField(t, err, tt.field)
		assert.Zero(t, s)
	}
}

func TestScalesPrint(t *testing.T) {
	text := scalesOf(t, round()).String()
	for _, word := range []string{"length", "time", "velocity", "temperature", "heat flux", "heating", "stress", "strain rate", "viscosity", "stream function", "dissipation", "body force"} {
		assert.Contains(t, text, word)
	}
	assert.Equal(t, 12, strings.Count(text, "\n"))
	assert.Contains(t, text, scalesOf(t, round()).Time(1).String())
}
