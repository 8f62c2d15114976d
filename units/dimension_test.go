package units_test

import (
	"math"
	"math/rand/v2"
	"testing"

	"example.org/overturn/units"
	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"gonum.org/v1/gonum/unit"
)

// gonumDimensions is the dimension in gonum's terms, for whole exponents.
func gonumDimensions(d units.Dimension) unit.Dimensions {
	return unit.Dimensions{
		unit.LengthDim: int(d.Length), unit.MassDim: int(d.Mass), unit.TimeDim: int(d.Time),
		unit.TemperatureDim: int(d.Temperature), unit.MoleDim: int(d.Amount),
		unit.CurrentDim: int(d.Current), unit.LuminousIntensityDim: int(d.LuminousIntensity),
	}
}

func randomDimension(rnd *rand.Rand) units.Dimension {
	e := func() float64 { return float64(rnd.IntN(9) - 4) }
	return units.Dimension{
		Length: e(), Mass: e(), Time: e(), Temperature: e(), Amount: e(), Current: e(), LuminousIntensity: e(),
	}
}

// gonum's unit algebra is the oracle.
func TestDimensionAlgebraIsThatOfGonum(t *testing.T) {
	rnd := rand.New(rand.NewPCG(1, 2))
	for range 500 {
		a, b := randomDimension(rnd), randomDimension(rnd)
		product := unit.New(1, gonumDimensions(a)).Mul(unit.New(1, gonumDimensions(b)))
		assert.True(t, unit.DimensionsMatch(product, unit.New(1, gonumDimensions(a.Mul(b)))), "%v times %v is %v", a, b, a.Mul(b))
		quotient := unit.New(1, gonumDimensions(a)).Div(unit.New(1, gonumDimensions(b)))
		assert.True(t, unit.DimensionsMatch(quotient, unit.New(1, gonumDimensions(a.Div(b)))), "%v over %v is %v", a, b, a.Div(b))
		assert.Equal(t, a == b, unit.DimensionsMatch(unit.New(1, gonumDimensions(a)), unit.New(1, gonumDimensions(b))))
	}
}

func TestDimensionLaws(t *testing.T) {
	rnd := rand.New(rand.NewPCG(3, 4))
	for range 200 {
		a, b := randomDimension(rnd), randomDimension(rnd)
		assert.Equal(t, a, a.Mul(b).Div(b))
		assert.Equal(t, a.Mul(b), b.Mul(a))
		assert.Equal(t, units.Dimension{}, a.Div(a))
		assert.Equal(t, a.Mul(a).Mul(a), a.Pow(3))
		assert.Equal(t, units.Dimension{}.Div(a), a.Pow(-1))
		assert.True(t, a == a.Pow(1./3).Pow(3), "%v: a third thrice", a)
		assert.True(t, a == a.Pow(0.1).Mul(a.Pow(0.2)).Mul(a.Pow(0.7)), "%v: 0.1 + 0.2 + 0.7", a)
	}
}

// Exponents computed on the way equal the literals that a user would write.
func TestFractionalExponentsEqualLiterals(t *testing.T) {
	pressure := units.Pressure(0).Dimension()
	assert.True(t, units.Dimension{Mass: -3.5, Length: 3.5, Time: 7} == pressure.Pow(-3.5))
	assert.True(t, units.Dimension{Mass: 1.8, Length: -1.8, Time: -3.6} == pressure.Pow(1.8))
	assert.True(t, units.Dimension{Length: 1. / 3} == units.Dimension{Length: 2}.Pow(1./6))
	assert.True(t, units.Dimension{Length: 0.3} == units.Dimension{Length: 0.1}.Mul(units.Dimension{Length: 0.2}))
	// An exponent that is no multiple of 1/300 becomes the nearest.
	assert.True(t, units.Dimension{Length: 43. / 300} == units.Dimension{Length: 1}.Pow(1./7))
}

func TestDimensionString(t *testing.T) {
	tests := []struct {
		d    units.Dimension
		want string
	}{
		{units.Dimension{}, "1"},
		{units.Dimension{Length: 1}, "m"},
		{units.Dimension{Mass: 1, Length: -3}, "kg/m³"},
		{units.Dimension{Mass: 1, Length: 1, Time: -3, Temperature: -1}, "kg m/(s³ K)"},
		{units.Dimension{Temperature: -1}, "1/K"},
		{units.Dimension{Temperature: -1, Time: -12}, "1/(s¹² K)"},
		{units.Dimension{Mass: 1, Current: 2, Amount: 3, LuminousIntensity: 4}, "kg A² mol³ cd⁴"},
		{units.Dimension{Length: 3.5}, "m^3.5"},
		{units.Dimension{Length: 1.85, Time: -0.5}, "m^1.85/s^0.5"},
		{units.Dimension{Length: 1. / 3}, "m^(1/3)"},
		{units.Dimension{Length: -5. / 6}, "1/m^(5/6)"},
		{units.Dimension{Length: 1. / 300}, "m^(1/300)"},
		{units.Dimension{Length: 567890}.Pow(1. / 10000), "m^56.79"},
		{units.Dimension{Length: 67}, "m⁶⁷"},
		{units.Dimension{Length: 98}, "m⁹⁸"},
	}
	for _, tt := range tests {
		assert.Equal(t, tt.want, tt.d.String())
	}
}

func TestDimensionStringParses(t *testing.T) {
	rnd := rand.New(rand.NewPCG(5, 6))
	for range 500 {
		d := randomDimension(rnd).Pow([]float64{1, 0.5, 0.1, 0.01, 1. / 3, 1. / 60}[rnd.IntN(6)])
		u, err := units.ParseUnit(d.String())
		require.NoError(t, err)
		assert.True(t, u == units.Unit{Scale: 1, Dimension: d}, "%v came back as %v", d, u.Dimension)
	}
}

// Each quantity and each product of two agrees with gonum on its dimension.
func TestUniterAgreesOnProducts(t *testing.T) {
	// Density times diffusivity is a dynamic viscosity; times specific heat, a
	// conductivity.
	rho, kappa, cp := 3300*units.KilogramPerCubicMetre, 1e-6*units.SquareMetrePerSecond, 1200*units.JoulePerKilogramKelvin
	assert.True(t, unit.DimensionsMatch(rho.Unit().Mul(kappa), units.PascalSecond))
	k := rho.Unit().Mul(kappa).Mul(cp)
	assert.True(t, unit.DimensionsMatch(k, units.WattPerMetreKelvin))
	assert.InEpsilon(t, 3.96, k.Value(), 4*0x1p-52)

	// The Rayleigh number has no dimension: ρ g α ΔT d³ / (κ μ).
	ra := rho.Unit().Mul(units.StandardGravity).Mul(3e-5 * units.PerKelvin).Mul(3000 * units.Kelvin)
	d := 2890 * units.Kilometre
	ra.Mul(d).Mul(d).Mul(d).Div(kappa).Div(1e22 * units.PascalSecond)
	assert.True(t, unit.DimensionsMatch(ra, unit.Dimless(0)))
	assert.False(t, unit.DimensionsMatch(ra, d))
	assert.InEpsilon(t, 3300*9.80665*3e-5*3000*math.Pow(2.89e6, 3)/(1e-6*1e22), ra.Value(), 1e-14)
}
