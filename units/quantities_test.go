package units_test

import (
	"encoding"
	"encoding/json"
	"flag"
	"fmt"
	"io"
	"math"
	"reflect"
	"strings"
	"testing"

	"example.org/overturn/units"
	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"gonum.org/v1/gonum/unit"
)

// full is what every quantity of the package can do. The methods with pointer
// receivers are checked by conversion.
type full interface {
	units.Quantity
	fmt.Stringer
	encoding.TextMarshaler
	encoding.TextAppender
	unit.Uniter
}

// quantities are the tests of each type, by name, each with the unit it prints.
var quantities = map[string]func(*testing.T){
	"Length":                  conforms[units.Length]("m"),
	"Area":                    conforms[units.Area]("m²"),
	"Volume":                  conforms[units.Volume]("m³"),
	"Permeability":            conforms[units.Permeability]("m²"),
	"Mass":                    conforms[units.Mass]("kg"),
	"Time":                    conforms[units.Time]("s"),
	"Velocity":                conforms[units.Velocity]("m/s"),
	"Acceleration":            conforms[units.Acceleration]("m/s²"),
	"StrainRate":              conforms[units.StrainRate]("1/s"),
	"Temperature":             conforms[units.Temperature]("K"),
	"TemperatureDifference":   conforms[units.TemperatureDifference]("K"),
	"TemperatureGradient":     conforms[units.TemperatureGradient]("K/m"),
	"Density":                 conforms[units.Density]("kg/m³"),
	"Pressure":                conforms[units.Pressure]("Pa"),
	"ForceDensity":            conforms[units.ForceDensity]("N/m³"),
	"DynamicViscosity":        conforms[units.DynamicViscosity]("Pa s"),
	"KinematicViscosity":      conforms[units.KinematicViscosity]("m²/s"),
	"Diffusivity":             conforms[units.Diffusivity]("m²/s"),
	"Conductivity":            conforms[units.Conductivity]("W/(m K)"),
	"Expansivity":             conforms[units.Expansivity]("1/K"),
	"SpecificHeat":            conforms[units.SpecificHeat]("J/(kg K)"),
	"HeatFlux":                conforms[units.HeatFlux]("W/m²"),
	"VolumetricHeating":       conforms[units.VolumetricHeating]("W/m³"),
	"SpecificHeating":         conforms[units.SpecificHeating]("W/kg"),
	"HeatTransferCoefficient": conforms[units.HeatTransferCoefficient]("W/(m² K)"),
	"Energy":                  conforms[units.Energy]("J"),
	"Power":                   conforms[units.Power]("W"),
	"SpecificEnergy":          conforms[units.SpecificEnergy]("J/kg"),
	"MolarEnergy":             conforms[units.MolarEnergy]("J/mol"),
	"MolarVolume":             conforms[units.MolarVolume]("m³/mol"),
	"Dimensionless":           conforms[units.Dimensionless](""),
}

func TestQuantities(t *testing.T) {
	for name, test := range quantities {
		t.Run(name, test)
	}
}

// awkward are numbers that a conversion may get wrong.
var awkward = []float64{
	0, math.Copysign(0, -1), 1, -1, 0.1, -1. / 3, 1e21, 1e22, 1e23, 999999, 1e6, 1e-4, 9.9e-5, 123456.7,
	5e-324, -1.5e-323, 0x1p-1022, 0x1.fffffffffffffp-1023, math.MaxFloat64, -math.MaxFloat64,
	math.Nextafter(1, 2), math.Nextafter(1, 0), math.Pi, 9007199254740993,
}

func conforms[Q full](si string) func(*testing.T) {
	return func(t *testing.T) {
		assert.Equal(t, "TestQuantities/"+reflect.TypeFor[Q]().Name(), t.Name())
		assert.Equal(t, strings.TrimSpace("1500 "+si), Q(1500).String())
		u, err := units.ParseUnit(si)
		require.NoError(t, err)
		assert.Equal(t, units.Unit{Scale: 1, Dimension: Q(0).Dimension()}, u)
		assert.True(t, unit.DimensionsMatch(Q(3), unit.New(1, gonumDimensions(u.Dimension))))
		assert.Equal(t, 3.0, Q(3).Unit().Value())

		for _, x := range awkward {
			roundTrips(t, Q(x))
		}
		for _, x := range []float64{math.NaN(), math.Inf(1), math.Inf(-1)} {
			refusesToWrite(t, Q(x), si)
		}
		refusesBadText[Q](t)
	}
}

// roundTrips checks that all ways out and back keep the bits.
func roundTrips[Q full](t *testing.T, q Q) {
	t.Helper()
	same := func(way string, got Q, err error) {
		t.Helper()
		require.NoError(t, err, way)
		assert.Equal(t, math.Float64bits(float64(q)), math.Float64bits(float64(got)), "%s of %v", way, q)
	}
	parsed, err := units.Parse[Q](q.String())
	same("String", parsed, err)

	text, err := q.MarshalText()
	require.NoError(t, err)
	assert.Equal(t, q.String(), string(text))
	var back Q
	err = any(&back).(encoding.TextUnmarshaler).UnmarshalText(text)
	same("MarshalText", back, err)

	appended, err := q.AppendText([]byte("= "))
	require.NoError(t, err)
	assert.Equal(t, "= "+q.String(), string(appended))

	quoted, err := json.Marshal(q)
	require.NoError(t, err)
	back = 0
	err = json.Unmarshal(quoted, &back)
	same("JSON", back, err)

	flags := flag.NewFlagSet("", flag.ContinueOnError)
	flags.SetOutput(io.Discard)
	back = 0
	flags.TextVar(any(&back).(encoding.TextUnmarshaler), "q", q, "")
	same("default of a flag", back, nil)
	err = flags.Parse([]string{"-q", string(text)})
	same("flag", back, err)
}

func refusesToWrite[Q full](t *testing.T, q Q, si string) {
	t.Helper()
	assert.Equal(t, strings.TrimSpace(fmt.Sprintf("%g %s", float64(q), si)), q.String(), "for a message it prints")
	_, err := q.MarshalText()
	assert.ErrorIs(t, err, units.ErrRange)
	assert.ErrorContains(t, err, reflect.TypeFor[Q]().Name())
	b, err := q.AppendText([]byte("x"))
	assert.ErrorIs(t, err, units.ErrRange)
	assert.Equal(t, "x", string(b))
	_, err = json.Marshal(q)
	assert.Error(t, err)
	_, err = units.Format(q, "", 3)
	assert.ErrorIs(t, err, units.ErrRange)
	_, err = units.Parse[Q](q.String())
	assert.ErrorIs(t, err, units.ErrRange)
}

func refusesBadText[Q full](t *testing.T) {
	t.Helper()
	for _, bad := range []string{`1500`, `"1500 furlong"`, `"1500 cd"`, `true`, `{}`} {
		q := Q(7)
		assert.Error(t, json.Unmarshal([]byte(bad), &q), "JSON %s", bad)
		assert.Equal(t, Q(7), q, "a failure leaves the value alone")
	}
}

// In divides by the unit. Temperature counts in differences.
func TestIn(t *testing.T) {
	tests := []struct {
		name      string
		got, want float64
	}{
		{"Length", (2890 * units.Kilometre).In(units.Metre), 2.89e6},
		{"Area", (2 * units.SquareKilometre).In(units.SquareCentimetre), 2e10},
		{"Volume", (2 * units.CubicMetre).In(units.Litre), 2000},
		{"Permeability", (2 * units.Darcy).In(units.Millidarcy), 2000},
		{"Mass", (2 * units.Tonne).In(units.Gram), 2e6},
		{"Time", (2 * units.Gigayear).In(units.Day), 7.305e11},
		{"Velocity", (2 * units.CentimetrePerYear).In(units.KilometrePerMegayear), 20},
		{"Acceleration", (2 * units.MetrePerSecondSquared).In(units.Milligal), 2e5},
		{"StrainRate", (2 * units.PerYear).In(units.PerMegayear), 2e6},
		{"Temperature", units.Temperature(300).In(units.Millikelvin), 3e5},
		{"TemperatureDifference", (2 * units.Kelvin).In(units.Millikelvin), 2000},
		{"TemperatureGradient", (0.025 * units.KelvinPerMetre).In(units.KelvinPerKilometre), 25},
		{"Density", (3300 * units.KilogramPerCubicMetre).In(units.GramPerCubicCentimetre), 3.3},
		{"Pressure", (3 * units.Gigapascal).In(units.Kilobar), 30},
		{"ForceDensity", (3 * units.MegapascalPerKilometre).In(units.PascalPerMetre), 3000},
		{"DynamicViscosity", (1 * units.PascalSecond).In(units.Centipoise), 1000},
		{"KinematicViscosity", (1 * units.Stokes).In(units.Centistokes), 100},
		{"Diffusivity", (1e-6 * units.SquareMetrePerSecond).In(units.SquareMillimetrePerSecond), 1},
		{"Conductivity", (3 * units.WattPerMetreKelvin).In(2 * units.WattPerMetreKelvin), 1.5},
		{"Expansivity", (3e-5 * units.PerKelvin).In(1e-5 * units.PerKelvin), 3},
		{"SpecificHeat", (2 * units.CaloriePerGramKelvin).In(units.KilojoulePerKilogramKelvin), 8.368},
		{"HeatFlux", (1 * units.HeatFlowUnit).In(units.MilliwattPerSquareMetre), 41.84},
		{"VolumetricHeating", (10 * units.HeatGenerationUnit).In(units.MicrowattPerCubicMetre), 4.184},
		{"SpecificHeating", (7 * units.PicowattPerKilogram).In(units.NanowattPerKilogram), 0.007},
		{"HeatTransferCoefficient", (3 * units.WattPerSquareMetreKelvin).In(2 * units.WattPerSquareMetreKelvin), 1.5},
		{"Energy", (1 * units.Kilojoule).In(units.Erg), 1e10},
		{"Power", (47 * units.Terawatt).In(units.Gigawatt), 47000},
		{"SpecificEnergy", (333.4 * units.KilojoulePerKilogram).In(units.JoulePerKilogram), 333400},
		{"MolarEnergy", (300 * units.KilojoulePerMole).In(units.JoulePerMole), 3e5},
		{"MolarVolume", (1 * units.CubicMetrePerMole).In(units.CubicCentimetrePerMole), 1e6},
		{"Dimensionless", (3 * units.Percent).In(units.PartsPerMillion), 3e4},
	}
	for _, tt := range tests {
		assert.InEpsilon(t, tt.want, tt.got, 2*0x1p-52, tt.name)
	}
	assert.Len(t, tests, len(quantities))
}
