package units_test

import (
	"errors"
	"fmt"
	"strings"
	"testing"

	"example.org/overturn/units"
	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// All spellings in a row mean the same, to the bit.
func TestSpellings(t *testing.T) {
	rows := [][]string{
		{"3300 kg/m^3", "3300 kg m-3", "3300kg/m3", "3300 kg m^-3", "3300 kg·m⁻³", "3300 kg*m**-3", "3300 kg.m-3",
			"3300 kg/m³", " 3300\u00a0kg/m³\t", "+3300 kg/m^3", "3.3e3 kg/m³", "3.3E+3 kg/m³", "3.3×10^3 kg/m³", "3.3x10^3 kg/m³",
			"3.3 · 10³ kg/m³", "3.3*10**3 kg/m³", "3.3 g/cm3", "3.3 kg/L", "3.3 t/m3", "3300 (kg)/(m^3)", "3300 kg×m⁻³",
			"3300 kg m^(-3)", "3300 kg m^(−3)", "3300 kg/(m m m)", "3300 kg/m/m/m", "3300 kg (m^-1)^3", "03300.0 kg/m3", "3300. kg m^(-6/2)",
			"3.3 10^3 kg/m3", "3.3 (10^3 kg)/m3", "33000 10⁻¹kg/m3", "3300 1 kg/m3"},
		{"3.1 W/(m K)", "3.1 W m^-1 K^-1", "3.1 W/m/K", "3.1 W/(m·K)", "3.1 W/(m.K)", "3.1 W·m⁻¹·K⁻¹", "3.1 W/(m degC)", "3.1 W/(m °C)",
			"3.1 W/(K)/m", "3.1 W K-1/m", "3.1 W/((m) (K))", "3.1 J s-1 m-1 K-1", "3.1 kg m s^-3 K^-1", "31e-1 W/(m ℃)", "3.1 N K^-1 s^-1"},
		{"65 mW/m²", "65 mW m-2", "0.065 W/m^2", "65e-3 W/m2", "65 uW/(10^-3 m²)", "65 erg/(s cm2)"},
		{"1e21 Pa s", "1e21 Pa·s", "1E21 Pa*s", "1e22 P", "1e21 N s/m2", "1e24 mPa s", "1e24 cP", "10^21 Pa s", "10²¹ Pa s", "10**21 Pa s", "1 ZPa s", "1e21 (Pa s)"},
		{"5 µm", "5 μm", "5 um", "5e-6 m", ".005 mm", "5000 nm", "0.5e-3 cm"},
		{"3e-5 1/K", "3e-5 K-1", "3e-5 K^-1", "3e-5 /K", "3e-5/K", "3e-5 / K", "3e-5 K⁻¹", "3e-5 1/degC", "3×10⁻⁵ K⁻¹", "3 x 10^-5 K^−1", "30 ppm/K", "3e-5 (1/K)"},
		{"100 Myr", "100 Ma", "0.1 Gyr", "0.1 Ga", "1e5 kyr", "1e5 ka", "1e8 yr", "1e8 a", "1e8 years", "3155760000000000 s", "36525e6 d"},
		{"50 %", "0.5", "50%", "500 ‰", "500000 ppm", "5e8 ppb", "50 wt%", "0.5 m/m", "500 m/km", "0.5 1", "0.5 1/1", "0.5 rad"},
		{"0 m", "0e99999 m", "0.0e-99999 m", "0×10^99999 m", "0 yr m/s", "0e9999999999999999999999 km"},
		{"-1 m", "−1 m", "-1e0 m", "-1 km/10^3"},
		{"7 m^3.5", "7 m^(7/2)", "7 m³ m^0.5", "7 (m^7)^0.5", "7 m^4/m^(1/2)", "7 m^3.50", "7 m^(3.5/1)"},
	}
	for _, row := range rows {
		first := readAny(t, row[0])
		for _, text := range row[1:] {
			assert.Equal(t, first, readAny(t, text), "%q like %q", text, row[0])
		}
	}
}

// value is a quantity whose dimension is known only once it is read.
type value struct {
	si float64
	of units.Dimension
}

// readAny reads a text of any dimension: it asks for a length, and takes what the
// error says it got.
func readAny(t *testing.T, text string) value {
	t.Helper()
	_, err := units.Parse[anything](text)
	e, ok := errors.AsType[*units.ParseError](err)
	require.True(t, ok, "%q: %v", text, err)
	require.Equal(t, units.ErrDimension, e.Err, "%v", err)
	wanted = e.Got
	defer func() { wanted = units.Dimension{} }()
	q, err := units.Parse[whatever](text)
	require.NoError(t, err)
	return value{float64(q), e.Got}
}

// anything clashes with every unit.
type anything float64

func (anything) Dimension() units.Dimension {
	return units.Dimension{LuminousIntensity: 99}
}

// whatever takes the dimension that was found out before.
type whatever float64

var wanted units.Dimension

func (whatever) Dimension() units.Dimension { return wanted }

// reads parses a text as a Q and compares to the bit with a float64 that the
// compiler rounded.
func reads[Q units.Quantity](text string, want float64) func(*testing.T) {
	return func(t *testing.T) {
		t.Helper()
		q, err := units.Parse[Q](text)
		require.NoError(t, err)
		assert.Equal(t, want, float64(q), text)
	}
}

// Definitions and conversions with their sources. "UCUM" is version 2.2 (2024).
func TestConversions(t *testing.T) {
	const year = 365.25 * 86400 // Julian year of the IAU; UCUM a_j
	tests := []func(*testing.T){
		// The prefixes, the four of the 27th CGPM (2022) included.
		reads[units.Length]("1 qm", 1e-30), reads[units.Length]("1 rm", 1e-27), reads[units.Length]("1 ym", 1e-24),
		reads[units.Length]("1 zm", 1e-21), reads[units.Length]("1 am", 1e-18), reads[units.Length]("1 fm", 1e-15),
		reads[units.Length]("1 pm", 1e-12), reads[units.Length]("1 nm", 1e-9), reads[units.Length]("1 µm", 1e-6),
		reads[units.Length]("1 mm", 1e-3), reads[units.Length]("1 cm", 1e-2), reads[units.Length]("1 dm", 1e-1),
		reads[units.Length]("1 dam", 10), reads[units.Length]("1 hm", 100), reads[units.Length]("1 km", 1e3),
		reads[units.Length]("1 Mm", 1e6), reads[units.Length]("1 Gm", 1e9), reads[units.Length]("1 Tm", 1e12),
		reads[units.Length]("1 Pm", 1e15), reads[units.Length]("1 Em", 1e18), reads[units.Length]("1 Zm", 1e21),
		reads[units.Length]("1 Ym", 1e24), reads[units.Length]("1 Rm", 1e27), reads[units.Length]("1 Qm", 1e30),
		reads[units.Mass]("1 Rg", 1e24), reads[units.Mass]("1 mg", 1e-6), reads[units.Mass]("1 dag", 1e-2),

		// Symbols that a guesser of prefixes gets wrong (UCUM).
		reads[units.Pressure]("1 Pa", 1), reads[units.Time]("1 min", 60), reads[units.Length]("1 dam", 10),
		reads[units.Energy]("1 cal", 4.184), reads[units.Acceleration]("1 Gal", 1e-2), reads[units.Time]("1 Ps", 1e15),
		reads[units.Time]("1 as", 1e-18), reads[units.Pressure]("1 daPa", 10), reads[units.Length]("1 ft", 0.3048),
		reads[units.Time]("1 h", 3600), reads[units.Time]("2 hr", 7200), reads[units.Time]("1 d", 86400), reads[units.Time]("3 days", 259200),

		// Years.
		reads[units.Time]("1 yr", year), reads[units.Time]("1 a", 31557600), reads[units.Time]("1 year", year),
		reads[units.Time]("4.5 Gyr", 4.5e9*year), reads[units.Time]("66 Ma", 66e6*year),
		reads[units.Velocity]("1 cm/yr", 3.168808781402895e-10), // computed from the definition
		reads[units.Velocity]("1 mm/yr", 3.168808781402895e-11), // the same
		reads[units.StrainRate]("1 %/Myr", 1e-8/year),           //
		reads[units.StrainRate]("3e-15 s^-1", 3e-15),            //
		reads[units.Velocity]("10 km/Ma", 1e-2/year),            //
		reads[units.Diffusivity]("31.5576 m2/yr", 1e-6),         //
		reads[units.Diffusivity]("31.5576 km^2/Myr", 1e-6),      //
		reads[units.Acceleration]("980665 mGal", 9.80665),       // UCUM [g]
		reads[units.Acceleration]("5 µGal", 5e-8),               //
		reads[units.TemperatureGradient]("25 K/km", 0.025),      //
		reads[units.TemperatureGradient]("25 degC/km", 0.025),   //
		reads[units.TemperatureGradient]("18 degF/km", 0.01),    //
		reads[units.ForceDensity]("3 kbar/km", 3e5),             //
		reads[units.Length]("12 in", 0.3048),                    // international yard, 1959
		reads[units.Mass]("1 lb", 0.45359237),                   // the same
		reads[units.Volume]("2 L", 2e-3), reads[units.Volume]("2 ml", 2e-6), reads[units.Volume]("1 hl", 0.1),
		reads[units.Mass]("3 Mt", 3e9),

		// Pressure and viscosity.
		reads[units.Pressure]("1 bar", 1e5), reads[units.Pressure]("3 kbar", 3e8), reads[units.Pressure]("5 mbar", 500),
		reads[units.Pressure]("1 Mbar", 1e11), reads[units.Pressure]("1 atm", 101325), // UCUM
		reads[units.Pressure]("1 psi", 0.45359237*9.80665/(0.0254*0.0254)),
		reads[units.DynamicViscosity]("1 P", 0.1), reads[units.DynamicViscosity]("1.002 cP", 1.002e-3), // UCUM
		reads[units.DynamicViscosity]("10 mPa s", 0.01), reads[units.DynamicViscosity]("7 kP", 700),
		reads[units.KinematicViscosity]("1 St", 1e-4), reads[units.KinematicViscosity]("1000 cSt", 1e-3), // UCUM
		reads[units.Permeability]("1 darcy", 1e-7/101325.), reads[units.Permeability]("5 mD", 5e-10/101325.),

		// Energy. UCUM: cal_th = 4.184 J, cal_IT = 4.1868 J, both exact.
		reads[units.Energy]("1 cal_th", 4.184), reads[units.Energy]("1 cal_IT", 4.1868), reads[units.Energy]("3 kcal", 12552),
		reads[units.Energy]("1 Btu", 1055.05585262), // Btu_IT, from memory
		reads[units.Energy]("1 BTU", 1055.05585262), reads[units.Energy]("1 erg", 1e-7),
		reads[units.Energy]("1 eV", 1.602176634e-19), reads[units.Energy]("5 keV", 5*1.602176634e-16),
		reads[units.MolarEnergy]("300 kJ/mol", 3e5), reads[units.MolarEnergy]("125 kcal/mol", 523000),
		reads[units.MolarEnergy]("375 kJ mol-1", 375e3), reads[units.MolarVolume]("4 cm3/mol", 4e-6),
		reads[units.MolarVolume]("11 cm³ mol⁻¹", 11e-6), reads[units.SpecificEnergy]("333.4 kJ/kg", 333400),
		reads[units.SpecificEnergy]("80 cal/g", 334720), reads[units.Power]("47 TW", 47e12),

		// Heat. HFU and HGU by the thermochemical calorie; HGU from memory.
		reads[units.HeatFlux]("1 HFU", 41.84e-3), reads[units.HeatFlux]("1.5 HFU", 62.76e-3),
		reads[units.HeatFlux]("1 µcal_IT/(cm2 s)", 41.868e-3), reads[units.HeatFlux]("101 mW/m²", 0.101),
		reads[units.VolumetricHeating]("1 HGU", 0.4184e-6), reads[units.VolumetricHeating]("2.5 uW/m3", 2.5e-6),
		reads[units.VolumetricHeating]("1 µW/m³", 1e-6), reads[units.SpecificHeating]("7.4 pW/kg", 7.4e-12),
		reads[units.SpecificHeating]("1e-8 erg/(g s)", 1e-12),
		reads[units.Conductivity]("6 10^-3 cal/(cm s K)", 6*0.4184), reads[units.Conductivity]("1 mcal/(cm s degC)", 0.4184),
		reads[units.Conductivity]("1 Btu/(h ft degF)", 1.7307346663713912), // 1055.05585262·1.8/(3600·0.3048)
		reads[units.SpecificHeat]("1 cal/(g K)", 4184), reads[units.SpecificHeat]("1.2 kJ/kg/K", 1200),
		reads[units.SpecificHeat]("1 Btu/(lb degF)", 4186.8),
		reads[units.HeatTransferCoefficient]("1 Btu/(h ft^2 degF)", 5.678263341113488), // the above over 0.3048
		reads[units.HeatTransferCoefficient]("5 W/(m2 K)", 5), reads[units.Expansivity]("1.8e-5 /degF", 3.24e-5),

		// Numbers.
		reads[units.Dimensionless]("3 %", 0.03), reads[units.Dimensionless]("3 wt%", 0.03), reads[units.Dimensionless]("7 ‰", 0.007),
		reads[units.Dimensionless]("1000 ppm", 1e-3), reads[units.Dimensionless]("3 ppb", 3e-9), reads[units.Dimensionless]("1e6", 1e6),
		reads[units.Dimensionless]("180 deg", 3.141592653589793), reads[units.Dimensionless]("45 °", 0.7853981633974483),
		reads[units.Dimensionless]("90°", 1.5707963267948966), reads[units.Dimensionless]("5 mrad", 5e-3),
		reads[units.Dimensionless]("1 Hz s", 1), reads[units.Dimensionless]("1 C/(A s)", 1),
	}
	for _, test := range tests {
		test(t)
	}
}

// A point and an interval on a scale of temperature are not the same thing.
func TestTemperatures(t *testing.T) {
	for _, test := range []func(*testing.T){
		reads[units.Temperature]("1350 degC", 1623.15), reads[units.Temperature]("20 °C", 293.15), reads[units.Temperature]("20 ℃", 293.15),
		reads[units.Temperature]("-459.67 degF", 0), reads[units.Temperature]("68 °F", 293.15), reads[units.Temperature]("98.6 ℉", 310.15),
		reads[units.Temperature]("-273.15 Celsius", 0), reads[units.Temperature]("0 Fahrenheit", 255.3722222222222222),
		reads[units.Temperature]("527.67 degR", 293.15), reads[units.Temperature]("527.67 °R", 293.15),
		reads[units.Temperature]("300 K", 300), reads[units.Temperature]("300 kelvin", 300), reads[units.Temperature]("5 mK", 5e-3),
		reads[units.Temperature]("1.35×10³ degC ", 1623.15), reads[units.Temperature]("1e-30 degC", 273.15),
		reads[units.Temperature]("1e-19999 degC", 273.15), reads[units.Temperature]("0e99 degC", 273.15),
		reads[units.Temperature]("-0 degC", 273.15), reads[units.Temperature]("1e300 degC", 1e300), reads[units.Temperature]("-1e300 degF", -1e300/1.8),
		reads[units.Temperature]("10 degC", 283.15), reads[units.TemperatureDifference]("10 degC", 10),
		reads[units.TemperatureDifference]("10 K", 10), reads[units.TemperatureDifference]("9 degF", 5), reads[units.TemperatureDifference]("9 °R", 5),
		reads[units.TemperatureDifference]("2 degC m/m", 2),
	} {
		test(t)
	}

	// Two scales by themselves, and in units of something else.
	u, err := units.ParseUnit("degF")
	require.NoError(t, err)
	assert.Equal(t, units.Unit{Scale: 5. / 9, Dimension: units.Dimension{Temperature: 1}, Zero: 255.3722222222222222}, u)
	u, err = units.ParseUnit(" °C ")
	require.NoError(t, err)
	assert.Equal(t, units.Unit{Scale: 1, Dimension: units.Dimension{Temperature: 1}, Zero: 273.15}, u)
	for _, text := range []string{"K", "degR", "degC degC/K", "degC^1", "(degC)", "degC^2"} {
		u, err = units.ParseUnit(text)
		require.NoError(t, err)
		assert.Zero(t, u.Zero, text)
	}
}

func TestParseErrors(t *testing.T) {
	tests := []struct {
		text     string
		err      error
		pos      int
		found    string
		expected string // at least
	}{
		{"", units.ErrSyntax, 0, "", "a number"},
		{"  ", units.ErrSyntax, 2, "", "a number"},
		{"km", units.ErrSyntax, 0, "km", "a number"},
		{".", units.ErrSyntax, 0, ".", "a number"},
		{"- km", units.ErrSyntax, 0, "-", "a number"},
		{"e5 km", units.ErrSyntax, 0, "e", "a number"},
		{"--5 km", units.ErrSyntax, 0, "-", "a number"},
		{"-+5 km", units.ErrSyntax, 0, "-", "a number"},
		{"3,5 km", units.ErrSyntax, 1, ",", "decimal comma"},
		{"5 km,", units.ErrSyntax, 4, ",", "a unit"},
		{"3 300 km", units.ErrSyntax, 2, "3", "a unit"},
		{"5 11 km", units.ErrSyntax, 2, "1", "a unit"},
		{"5 10 km", units.ErrSyntax, 2, "1", "a unit"},
		{"5 01 km", units.ErrSyntax, 2, "0", "a unit"},
		{"5 × 10 km", units.ErrSyntax, 2, "×", "a unit"},
		{"5 × km", units.ErrSyntax, 2, "×", "a unit"},
		{"2.5.3 km", units.ErrSyntax, 3, ".", "a unit"},
		{"0x10 km", units.ErrUnknownUnit, 1, "x", "known"},
		{"1_000 km", units.ErrUnknownUnit, 1, "_", "known"},
		{"5 ± 1 km", units.ErrSyntax, 2, "±", "a unit"},
		{"6.67(15) km", units.ErrSyntax, 5, "1", "a unit"},
		{"10^- km", units.ErrSyntax, 2, "^", "a unit"},
		{"5×10^- km", units.ErrSyntax, 1, "×", "a unit"},
		{"10⁻ km", units.ErrSyntax, 2, "⁻", "a unit"},
		{"5 km/", units.ErrSyntax, 5, "", "a unit"},
		{"5 /", units.ErrSyntax, 3, "", "a unit"},
		{"5 km//s", units.ErrSyntax, 5, "/", "a unit"},
		{"5 km·", units.ErrSyntax, 6, "", "a unit"},
		{"5 km * * s", units.ErrSyntax, 7, "*", "a unit"},
		{"5 (km", units.ErrSyntax, 5, "", "closing parenthesis"},
		{"5 (", units.ErrSyntax, 3, "", "a unit"},
		{"5 ()", units.ErrSyntax, 3, ")", "a unit"},
		{"5 km)", units.ErrSyntax, 4, ")", "opening parenthesis"},
		{"5 (km))", units.ErrSyntax, 6, ")", "opening parenthesis"},
		{"5 m/s km", units.ErrSyntax, 6, "km", "parentheses"},
		{"5 m/s·km", units.ErrSyntax, 5, "·", "parentheses"},
		{"5 m/(s) (km)", units.ErrSyntax, 8, "(", "parentheses"},
		{"5 1/s m", units.ErrSyntax, 6, "m", "parentheses"},
		{"5 m-", units.ErrSyntax, 4, "", "digits of an exponent"},
		{"5 m^", units.ErrSyntax, 4, "", "digits of an exponent"},
		{"5 m^x", units.ErrSyntax, 4, "x", "digits of an exponent"},
		{"5 m^-", units.ErrSyntax, 5, "", "digits of an exponent"},
		{"5 m^(2", units.ErrSyntax, 6, "", "closing parenthesis"},
		{"5 m^(2 )", units.ErrSyntax, 6, " ", "closing parenthesis"},
		{"5 m^(1/)", units.ErrSyntax, 7, ")", "digits of an exponent"},
		{"5 m^()", units.ErrSyntax, 5, ")", "digits of an exponent"},
		{"5 m^1/2", units.ErrSyntax, 6, "2", "a unit"},
		{"5 m^2^2", units.ErrSyntax, 5, "^", "a unit"},
		{"5 m+2", units.ErrSyntax, 3, "+", "a unit"},
		{"5 m⁻", units.ErrSyntax, 3, "⁻", "a unit"},
		{"5 m²⁻¹", units.ErrSyntax, 5, "⁻", "a unit"},
		{"5 1^2", units.ErrSyntax, 3, "^", "a unit"},
		{"5 m\x80", units.ErrSyntax, 3, "\x80", "a unit"},
		{"\xff", units.ErrSyntax, 0, "\xff", "a number"},
		{"5 m\x00", units.ErrSyntax, 3, "\x00", "a unit"},

		{"5 furlong", units.ErrUnknownUnit, 2, "furlong", "known"},
		{"5 Pas", units.ErrUnknownUnit, 2, "Pas", `"Pa s"`},
		{"5 kgm-3", units.ErrUnknownUnit, 2, "kgm", `"kg m"`},
		{"5 KM", units.ErrUnknownUnit, 2, "KM", "known"},
		{"5 kkm", units.ErrUnknownUnit, 2, "kkm", "known"},
		{"5 kkg", units.ErrUnknownUnit, 2, "kkg", "known"},
		{"5 kd", units.ErrUnknownUnit, 2, "kd", "known"}, // UCUM: no prefix
		{"5 ma", units.ErrUnknownUnit, 2, "ma", "known"},
		{"5 mdegC", units.ErrUnknownUnit, 2, "mdegC", `"m degC"`},
		{"5 Dm", units.ErrUnknownUnit, 2, "Dm", "known"},
		{"5 daD", units.ErrUnknownUnit, 2, "daD", "known"},
		{"5 k", units.ErrUnknownUnit, 2, "k", "known"},
		{"5 da", units.ErrUnknownUnit, 2, "da", "known"},
		{"5 µ", units.ErrUnknownUnit, 2, "µ", "known"},
		{"5 e", units.ErrUnknownUnit, 2, "e", "known"},
		{"5e km", units.ErrUnknownUnit, 1, "e", "known"},
		{"5 SIm", units.ErrUnknownUnit, 2, "SIm", "known"},
		{"5 Sbar", units.ErrUnknownUnit, 2, "Sbar", "known"},
		{"5 m/ s^2 / x", units.ErrUnknownUnit, 11, "x", "known"},

		{"1e999 km", units.ErrRange, 0, "1e999", "float64"},
		{" -1e306 km", units.ErrRange, 1, "-1e306", "float64"},
		{"1e-999 km", units.ErrRange, 0, "1e-999", "float64"},
		{"2e-324 m", units.ErrRange, 0, "2e-324", "float64"},
		{"1e300 Gyr m/s", units.ErrRange, 0, "1e300", "float64"},

		{"1e20001 nm", units.ErrRange, 0, "1e20001", "float64"},
		{"1e99999999999999999999 nm", units.ErrRange, 0, "1e99999999999999999999", "float64"},
		{"10^20001 nm", units.ErrRange, 0, "10^20001", "float64"},
		{"NaN km", units.ErrRange, 0, "NaN", "finite"},
		{"-Inf km", units.ErrRange, 0, "-", "finite"},
		{"infinity", units.ErrRange, 0, "infinity", "finite"},
		{"5 m^101", units.ErrRange, 3, "^101", "exponents"},
		{"5 m^-101", units.ErrRange, 3, "^-101", "exponents"},
		{"5 m-101", units.ErrRange, 3, "-101", "exponents"},
		{"5 m¹⁰¹", units.ErrRange, 3, "¹⁰¹", "exponents"},
		{"5 m^100.01", units.ErrRange, 3, "^100.01", "exponents"},
		{"5 m^999999999", units.ErrRange, 3, "^999999999", "exponents"},
		{"5 m^99999999999999999999999999", units.ErrRange, 3, "^99999999999999999999999999", "exponents"},
		{"5 m^(1/99999999999999999999999999)", units.ErrRange, 3, "^(1/99999999999999999999999999", "exponents"},
		{"5 m^(1/0)", units.ErrRange, 3, "^(1/0", "exponents"},
		{"5 m^(1/7)", units.ErrRange, 3, "^(1/7", "exponents"},
		{"5 m^0.001", units.ErrRange, 3, "^0.001", "exponents"},
		{"5 (m^0.1)^0.01", units.ErrRange, 2, "(", "exponents"},
		{"5 (m^60)^60", units.ErrRange, 2, "(", "exponents"},
		{"5 m^60 m^41", units.ErrRange, 7, "m", "exponents"},
		{"5 m^60/m^-41", units.ErrRange, 6, "/", "exponents"},
		{"5 (((ppb^100)^100)^100)", units.ErrRange, 4, "(", "exponents"},
	}
	for _, tt := range tests {
		q, err := units.Parse[units.Length](tt.text)
		assert.Zero(t, q, "%q", tt.text)
		e, ok := errors.AsType[*units.ParseError](err)
		if !assert.True(t, ok, "%q: %v", tt.text, err) {
			continue
		}
		assert.ErrorIs(t, err, tt.err, "%q: %v", tt.text, err)
		assert.Equal(t, tt.text, e.Text)
		assert.Equal(t, tt.pos, e.Pos, "position in %v", err)
		assert.Equal(t, tt.found, e.Found, "found in %v", err)
		assert.Contains(t, e.Expected, tt.expected, "%v", err)
		assert.Contains(t, err.Error(), fmt.Sprintf("units: %q at offset %d: %v: found ", tt.text, tt.pos, tt.err))
		assert.Contains(t, err.Error(), "want "+e.Expected)
	}
}

func TestDimensionErrors(t *testing.T) {
	_, length := units.Parse[units.Length]("5 kg")
	assert.EqualError(t, length, `units: "5 kg": mass (kg), want length (m)`)
	e, _ := errors.AsType[*units.ParseError](length)
	assert.Equal(t, &units.ParseError{
		Text: "5 kg", Pos: 2, Found: "kg", Expected: "length (m)",
		Got: units.Dimension{Mass: 1}, Want: units.Dimension{Length: 1}, Err: units.ErrDimension,
	}, e)

	_, bare := units.Parse[units.KinematicViscosity]("5")
	assert.EqualError(t, bare, `units: "5": a pure number, want kinematic viscosity (m²/s)`)
	_, number := units.Parse[units.Dimensionless]("5 W/m")
	assert.EqualError(t, number, `units: "5 W/m": kg m/s³, want dimensionless`)
	_, charge := units.Parse[units.Temperature]("5 C")
	assert.EqualError(t, charge, `units: "5 C": electric charge (C), want temperature (K)`)
	_, product := units.Parse[units.Temperature]("5 degC m/m")
	assert.EqualError(t, product, `units: "5 degC m/m" at offset 2: syntax error: found "degC", want it alone, or K: in a product it counts differences`)
	for _, text := range []string{"5 m degC/m", "5 (degC)", "5 degC^1", "5 degF 1", "5 degC degC/K", "5 10^1 degC"} {
		_, err := units.Parse[units.Temperature](text)
		assert.ErrorIs(t, err, units.ErrSyntax, text)
	}
}

// An error repeats the first 80 bytes of a text.
func TestErrorsStayShort(t *testing.T) {
	text := "1 " + strings.Repeat("x", 78)
	_, err := units.Parse[units.Length](text)
	assert.ErrorContains(t, err, fmt.Sprintf("units: %q at", text))
	_, err = units.Parse[units.Length](text + "x")
	assert.ErrorContains(t, err, fmt.Sprintf("units: %q… at", text))
}

// Long and deep texts are errors, not work.
func TestHostileTexts(t *testing.T) {
	const deep = 1000
	for _, text := range []string{
		"1 " + strings.Repeat("(", deep) + "m" + strings.Repeat(")", deep),
		"1 " + strings.Repeat("(", 1e6),
		strings.Repeat("9", 1e6) + " m",
		"1e" + strings.Repeat("9", 1e6) + " m",
		"0." + strings.Repeat("0", 1e6) + "1 m",
		"1 " + strings.Repeat("m", 1e6),
		"1 " + strings.Repeat("m m^-1 ", 1e5),
		"1 " + strings.Repeat("m-", 1e6),
		"1 m^" + strings.Repeat("1", 1e6),
		"1 m" + strings.Repeat("¹", 1e5),
		strings.Repeat(" ", 1e6),
	} {
		_, err := units.Parse[units.Length](text)
		assert.Error(t, err)
		assert.Less(t, len(err.Error()), 1000)
		_, err = units.ParseUnit(text)
		assert.Error(t, err)
	}

	q, err := units.Parse[units.Length]("1 " + strings.Repeat("(", 16) + "m" + strings.Repeat(")", 16))
	assert.Equal(t, units.Metre, q, "%v", err)
	_, err = units.Parse[units.Length]("1 " + strings.Repeat("(", 17) + "m" + strings.Repeat(")", 17))
	assert.ErrorIs(t, err, units.ErrSyntax)
	q, err = units.Parse[units.Length]("1 (m)" + strings.Repeat(" (m) (m^-1)", 200))
	assert.Equal(t, units.Metre, q, "parentheses one after the other are not deep: %v", err)
	_, err = units.Parse[units.Length](strings.Repeat("0", 4094) + " m")
	assert.NoError(t, err)
	_, err = units.Parse[units.Length](strings.Repeat("0", 4095) + " m")
	assert.ErrorIs(t, err, units.ErrSyntax)
	e, _ := errors.AsType[*units.ParseError](err)
	assert.Equal(t, 4097, e.Pos)
	assert.Empty(t, e.Found)

	// The largest powers of everything at once.
	for _, text := range []string{"Qm^100", "qm^-100", "deg^100/(yr^100 s^-100)", "(cal/erg)^100 (eV/erg)^100 (lb/kg)^100"} {
		_, err = units.ParseUnit(text)
		if err != nil {
			assert.ErrorIs(t, err, units.ErrRange, text)
		}
	}
	_, err = units.ParseUnit("Qm^100")
	assert.EqualError(t, err, `units: "Qm^100" at offset 0: out of range: found "Qm^100", want a size that a float64 holds`)
}

func TestParseUnit(t *testing.T) {
	tests := []struct {
		text string
		want units.Unit
	}{
		{"", units.Unit{Scale: 1}},
		{" ", units.Unit{Scale: 1}},
		{"1", units.Unit{Scale: 1}},
		{"%", units.Unit{Scale: 0.01}},
		{"cm/yr", units.Unit{Scale: 0.01 / 31557600, Dimension: units.Dimension{Length: 1, Time: -1}}},
		{"MPa^-3.5 s^-1", units.Unit{Scale: 1e-21, Dimension: units.Dimension{Mass: -3.5, Length: 3.5, Time: 6}}},
		{"µm^3/(MPa s)", units.Unit{Scale: 1e-24, Dimension: units.Dimension{Mass: -1, Length: 4, Time: 1}}},
		{"10^-5/K", units.Unit{Scale: 1e-5, Dimension: units.Dimension{Temperature: -1}}},
		{"10⁻⁵ K⁻¹", units.Unit{Scale: 1e-5, Dimension: units.Dimension{Temperature: -1}}},

		{"m^0", units.Unit{Scale: 1}},
		{"km^(1/3)", units.Unit{Scale: 10, Dimension: units.Dimension{Length: 1. / 3}}},
		{"cd mol A", units.Unit{Scale: 1, Dimension: units.Dimension{LuminousIntensity: 1, Amount: 1, Current: 1}}},
	}
	for _, tt := range tests {
		u, err := units.ParseUnit(tt.text)
		require.NoError(t, err)
		assert.Equal(t, tt.want, u, tt.text)
	}
	_, err := units.ParseUnit("5 m")
	assert.ErrorIs(t, err, units.ErrSyntax)
}

// Powers that are not rational are as good as math.Pow. The expected values were
// computed with 40 digits.
func TestFractionalPowersOfNumbers(t *testing.T) {
	tests := []struct {
		text string
		want float64
	}{
		{"MPa^1.8", 6.309573444801932e10}, // 10^10.8
		{"MPa^-1.8", 1.584893192461114e-11},
		{"yr^0.5", 5617.615152357804583}, // √31557600
		{"yr^-0.5", 1.7801148225333373e-4},
		{"yr^1.5", 177278451932.04665},
		{"min^(1/3)", 3.9148676411688634},
		{"(cm/yr)^0.5", 1.7801148225333373e-5},
	}
	for _, tt := range tests {
		u, err := units.ParseUnit(tt.text)
		require.NoError(t, err)
		assert.InEpsilon(t, tt.want, u.Scale, 4*0x1p-52, tt.text)
	}
}
