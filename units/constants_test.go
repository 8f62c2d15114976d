package units_test

import (
	"go/ast"
	"go/parser"
	"go/token"
	"io/fs"
	"os"
	"strings"
	"testing"

	"example.org/overturn/units"
	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// is compares a constant with a text that says the same: two ways to write one
// unit, each rounded once, so that they agree to the bit.
func is[Q units.Quantity](constant Q, text string) func(*testing.T) {
	return func(t *testing.T) {
		t.Helper()
		parsed, err := units.Parse[Q](text)
		require.NoError(t, err)
		assert.Equal(t, constant, parsed, text)
	}
}

var constants = map[string]func(*testing.T){
	"Nanometre":                  is(units.Nanometre, "1 nm"),
	"Micrometre":                 is(units.Micrometre, "1 µm"),
	"Millimetre":                 is(units.Millimetre, "1 mm"),
	"Centimetre":                 is(units.Centimetre, "1 cm"),
	"Metre":                      is(units.Metre, "1 m"),
	"Kilometre":                  is(units.Kilometre, "1 km"),
	"SquareMillimetre":           is(units.SquareMillimetre, "1 mm2"),
	"SquareCentimetre":           is(units.SquareCentimetre, "1 cm2"),
	"SquareMetre":                is(units.SquareMetre, "1 m2"),
	"SquareKilometre":            is(units.SquareKilometre, "1 km2"),
	"CubicCentimetre":            is(units.CubicCentimetre, "1 cm3"),
	"Litre":                      is(units.Litre, "1 L"),
	"CubicMetre":                 is(units.CubicMetre, "1 m3"),
	"CubicKilometre":             is(units.CubicKilometre, "1 km3"),
	"Millidarcy":                 is(units.Millidarcy, "1 mD"),
	"Darcy":                      is(units.Darcy, "1 cP cm^2/(s atm)"),
	"Second":                     is(units.Second, "1 s"),
	"Minute":                     is(units.Minute, "1 min"),
	"Hour":                       is(units.Hour, "60 min"),
	"Day":                        is(units.Day, "24 h"),
	"Year":                       is(units.Year, "365.25 d"),
	"Kiloyear":                   is(units.Kiloyear, "1 kyr"),
	"Megayear":                   is(units.Megayear, "1 Ma"),
	"Gigayear":                   is(units.Gigayear, "1 Gyr"),
	"MetrePerSecond":             is(units.MetrePerSecond, "1 m/s"),
	"CentimetrePerSecond":        is(units.CentimetrePerSecond, "1 cm/s"),
	"MillimetrePerSecond":        is(units.MillimetrePerSecond, "1 mm/s"),
	"MicrometrePerSecond":        is(units.MicrometrePerSecond, "1 um/s"),
	"MetrePerYear":               is(units.MetrePerYear, "1 m/yr"),
	"CentimetrePerYear":          is(units.CentimetrePerYear, "1 cm/yr"),
	"MillimetrePerYear":          is(units.MillimetrePerYear, "1 mm/a"),
	"KilometrePerMegayear":       is(units.KilometrePerMegayear, "1 km/Myr"),
	"MetrePerSecondSquared":      is(units.MetrePerSecondSquared, "1 m/s2"),
	"Gal":                        is(units.Gal, "1 cm/s2"),
	"Milligal":                   is(units.Milligal, "1 mGal"),
	"StandardGravity":            is(units.StandardGravity, "980.665 Gal"),
	"PerSecond":                  is(units.PerSecond, "1 Hz"),
	"PerYear":                    is(units.PerYear, "1 /yr"),
	"PerMegayear":                is(units.PerMegayear, "1 Ma^-1"),
	"SquareMetrePerSecond":       is(units.SquareMetrePerSecond, "1 m2/s"),
	"SquareMillimetrePerSecond":  is(units.SquareMillimetrePerSecond, "1 cSt"),
	"Stokes":                     is(units.Stokes, "1 cm2/s"),
	"Centistokes":                is(units.Centistokes, "1 mm2/s"),
	"Gram":                       is(units.Gram, "1 g"),
	"Kilogram":                   is(units.Kilogram, "1 kg"),
	"Tonne":                      is(units.Tonne, "1 t"),
	"KilogramPerCubicMetre":      is(units.KilogramPerCubicMetre, "1 g/L"),
	"GramPerCubicCentimetre":     is(units.GramPerCubicCentimetre, "1 g cm-3"),
	"Pascal":                     is(units.Pascal, "1 N/m2"),
	"Kilopascal":                 is(units.Kilopascal, "1 kPa"),
	"Megapascal":                 is(units.Megapascal, "10 bar"),
	"Gigapascal":                 is(units.Gigapascal, "1 GPa"),
	"Bar":                        is(units.Bar, "1e6 dyn/cm2"),
	"Kilobar":                    is(units.Kilobar, "1 kbar"),
	"Atmosphere":                 is(units.Atmosphere, "1 atm"),
	"NewtonPerCubicMetre":        is(units.NewtonPerCubicMetre, "1 N/m3"),
	"PascalPerMetre":             is(units.PascalPerMetre, "1 Pa/m"),
	"MegapascalPerKilometre":     is(units.MegapascalPerKilometre, "1 MPa/km"),
	"PascalSecond":               is(units.PascalSecond, "1 Pa s"),
	"MillipascalSecond":          is(units.MillipascalSecond, "1 cP"),
	"Poise":                      is(units.Poise, "1 dyn s/cm2"),
	"Centipoise":                 is(units.Centipoise, "1 mPa s"),
	"Kelvin":                     is(units.Kelvin, "1 degC"),
	"Millikelvin":                is(units.Millikelvin, "1 mK"),
	"ZeroCelsius":                is(units.ZeroCelsius, "0 degC"),
	"KelvinPerMetre":             is(units.KelvinPerMetre, "1 degC/m"),
	"KelvinPerKilometre":         is(units.KelvinPerKilometre, "1 °C/km"),
	"PerKelvin":                  is(units.PerKelvin, "1 /degC"),
	"WattPerMetreKelvin":         is(units.WattPerMetreKelvin, "1 W/(m K)"),
	"JoulePerKilogramKelvin":     is(units.JoulePerKilogramKelvin, "1 J/(kg K)"),
	"KilojoulePerKilogramKelvin": is(units.KilojoulePerKilogramKelvin, "1 J/(g K)"),
	"CaloriePerGramKelvin":       is(units.CaloriePerGramKelvin, "1 cal/(g degC)"),
	"WattPerSquareMetre":         is(units.WattPerSquareMetre, "1 W/m2"),
	"MilliwattPerSquareMetre":    is(units.MilliwattPerSquareMetre, "1 mW/m2"),
	"HeatFlowUnit":               is(units.HeatFlowUnit, "1 µcal/(cm2 s)"),
	"WattPerCubicMetre":          is(units.WattPerCubicMetre, "1 W/m3"),
	"MicrowattPerCubicMetre":     is(units.MicrowattPerCubicMetre, "1 uW/m3"),
	"HeatGenerationUnit":         is(units.HeatGenerationUnit, "1e-7 µcal/(cm3 s)"),
	"WattPerKilogram":            is(units.WattPerKilogram, "1 W/kg"),
	"NanowattPerKilogram":        is(units.NanowattPerKilogram, "1 nW/kg"),
	"PicowattPerKilogram":        is(units.PicowattPerKilogram, "1 pW/kg"),
	"WattPerSquareMetreKelvin":   is(units.WattPerSquareMetreKelvin, "1 W/(m2 K)"),
	"Joule":                      is(units.Joule, "1 N m"),
	"Kilojoule":                  is(units.Kilojoule, "1 kJ"),
	"Megajoule":                  is(units.Megajoule, "1 MJ"),
	"Erg":                        is(units.Erg, "1 dyn cm"),
	"Calorie":                    is(units.Calorie, "1 cal"),
	"Electronvolt":               is(units.Electronvolt, "1 eV"),
	"Watt":                       is(units.Watt, "1 J/s"),
	"Kilowatt":                   is(units.Kilowatt, "1 kW"),
	"Megawatt":                   is(units.Megawatt, "1 MW"),
	"Gigawatt":                   is(units.Gigawatt, "1 GW"),
	"Terawatt":                   is(units.Terawatt, "1 TW"),
	"JoulePerKilogram":           is(units.JoulePerKilogram, "1 J/kg"),
	"KilojoulePerKilogram":       is(units.KilojoulePerKilogram, "1 kJ/kg"),
	"JoulePerMole":               is(units.JoulePerMole, "1 J/mol"),
	"KilojoulePerMole":           is(units.KilojoulePerMole, "1 kJ/mol"),
	"ElectronvoltPerParticle":    is(units.ElectronvoltPerParticle, "6.02214076e23 eV/mol"),
	"CubicMetrePerMole":          is(units.CubicMetrePerMole, "1 m3/mol"),
	"CubicCentimetrePerMole":     is(units.CubicCentimetrePerMole, "1 cm3/mol"),
	"Percent":                    is(units.Percent, "1 %"),
	"PerMille":                   is(units.PerMille, "1 ‰"),
	"PartsPerMillion":            is(units.PartsPerMillion, "1 ppm"),
	"PartsPerBillion":            is(units.PartsPerBillion, "1 ppb"),

	// Exact values of the SI of 2019, and CODATA 2022 as given by Tiesinga, Mohr,
	// Newell and Taylor (2024). R and σ were computed from the others to 15 and
	// 16 digits.
	"SpeedOfLight":                     isNumber(units.SpeedOfLight, 299792458),
	"PlanckConstant":                   isNumber(units.PlanckConstant, 6.62607015e-34),
	"ElementaryCharge":                 isNumber(units.ElementaryCharge, 1.602176634e-19),
	"BoltzmannConstant":                isNumber(units.BoltzmannConstant, 1.380649e-23),
	"AvogadroConstant":                 isNumber(units.AvogadroConstant, 6.02214076e23),
	"MolarGasConstant":                 isNumber(units.MolarGasConstant, 8.31446261815324),
	"StefanBoltzmannConstant":          isNumber(units.StefanBoltzmannConstant, 5.67037441918443e-8),
	"GravitationalConstant":            isNumber(units.GravitationalConstant, 6.67430e-11),
	"GravitationalConstantUncertainty": isNumber(units.GravitationalConstantUncertainty, 0.00015/6.67430),
}

// isNumber compares to the digits that the sources print: two for an
// uncertainty, all of a float64's for the rest.
func isNumber(constant, want float64) func(*testing.T) {
	return func(t *testing.T) {
		t.Helper()
		tolerance := 1e-15
		if constant == units.GravitationalConstantUncertainty {
			tolerance = 0.05
		}
		assert.InEpsilon(t, want, constant, tolerance)
	}
}

func TestConstants(t *testing.T) {
	for name, test := range constants {
		t.Run(name, test)
	}
}

// The tables of these tests know every exported constant and every quantity in
// the source.
func TestTablesAreComplete(t *testing.T) {
	files, err := fs.Glob(os.DirFS("."), "*.go")
	require.NoError(t, err)
	methods := map[string]bool{}
	for _, file := range files {
		if strings.HasSuffix(file, "_test.go") {
			continue
		}
		f, err := parser.ParseFile(token.NewFileSet(), file, nil, 0)
		require.NoError(t, err)
		for _, decl := range f.Decls {
			if d, ok := decl.(*ast.FuncDecl); ok && d.Recv != nil && d.Name.Name == "AppendText" {
				methods[d.Recv.List[0].Type.(*ast.Ident).Name] = true
			}
			d, ok := decl.(*ast.GenDecl)
			if !ok || d.Tok != token.CONST {
				continue
			}
			for _, spec := range d.Specs {
				if name := spec.(*ast.ValueSpec).Names[0]; name.IsExported() {
					assert.Contains(t, constants, name.Name)
				}
			}
		}
	}
	for name := range quantities {
		assert.True(t, methods[name], name)
		delete(methods, name)
	}
	assert.Empty(t, methods, "quantities without a test")
}
