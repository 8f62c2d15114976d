package units

import (
	"fmt"
	"math"
	"strconv"
	"strings"
)

// Dimension is a product of powers of the seven base quantities of the SI.
// Dimensions compare with ==, serve as keys of maps, and are written as literals:
// Dimension{Mass: 1, Length: -3} is that of a density. The zero Dimension is that
// of a pure number.
//
// Exponents may be fractions, as in the prefactor of a creep law, MPa^-3.5 s^-1.
// They are kept to multiples of 1/300, so that tenths, hundredths, thirds and
// quarters are exact and a third thrice is one.
type Dimension struct {
	Length, Mass, Time, Temperature, Amount, Current, LuminousIntensity float64
}

// exponentGrain is the reciprocal of the fraction of which all exponents are
// multiples.
const exponentGrain = 300

// grain returns the multiple of 1/exponentGrain nearest to x. Since the division
// is rounded once, it equals the literal that a user would write for it.
func grain(x float64) float64 { return math.Round(x*exponentGrain) / exponentGrain }

// exponents lists the exponents in the order of baseUnits.
func (d Dimension) exponents() [7]float64 {
	return [7]float64{d.Mass, d.Length, d.Time, d.Current, d.Temperature, d.Amount, d.LuminousIntensity}
}

// baseUnits are the symbols of the base units in the order of the SI brochure,
// but mass first: kg m/s².
var baseUnits = [7]string{"kg", "m", "s", "A", "K", "mol", "cd"}

func dimensionOf(e [7]float64) Dimension {
	return Dimension{
		Mass: e[0], Length: e[1], Time: e[2], Current: e[3],
		Temperature: e[4], Amount: e[5], LuminousIntensity: e[6],
	}
}

// Mul returns the dimension of a product.
func (d Dimension) Mul(f Dimension) Dimension {
	a, b := d.exponents(), f.exponents()
	for i := range a {
		a[i] = grain(a[i] + b[i])
	}
	return dimensionOf(a)
}

// Div returns the dimension of a quotient.
func (d Dimension) Div(f Dimension) Dimension { return d.Mul(f.Pow(-1)) }

// Pow returns the dimension of a power. An exponent that is no multiple of 1/300
// becomes the nearest one.
func (d Dimension) Pow(p float64) Dimension {
	a := d.exponents()
	for i := range a {
		a[i] = grain(a[i] * p)
	}
	return dimensionOf(a)
}

// String returns the dimension in base units, such as "kg/(m s²)", and "1" for
// that of a pure number. [ParseUnit] reads it back.
func (d Dimension) String() string {
	var over, under []string
	for i, e := range d.exponents() {
		switch {
		case e > 0:
			over = append(over, baseUnits[i]+power(e))
		case e < 0:
			under = append(under, baseUnits[i]+power(-e))
		}
	}
	s := strings.Join(over, " ")
	if s == "" {
		s = "1"
	}
	switch len(under) {
	case 0:
		return s
	case 1:
		return s + "/" + under[0]
	}
	return s + "/(" + strings.Join(under, " ") + ")"
}

// power writes a positive exponent: nothing for 1, ² for 2, ^3.5, ^(1/3).
func power(e float64) string {
	if e == 1 {
		return ""
	}
	if e == math.Trunc(e) {
		return superscript(strconv.Itoa(int(e)))
	}
	n, q := int(math.Round(e*exponentGrain)), exponentGrain
	if n*100%q == 0 {
		return "^" + strconv.FormatFloat(e, 'f', -1, 64)
	}
	for _, f := range []int{2, 2, 5, 5} { // no 3, or it would be in hundredths
		if n%f == 0 && q%f == 0 {
			n, q = n/f, q/f
		}
	}
	return fmt.Sprintf("^(%d/%d)", n, q)
}

func superscript(digits string) string {
	return strings.NewReplacer("0", "⁰", "1", "¹", "2", "²", "3", "³", "4", "⁴",
		"5", "⁵", "6", "⁶", "7", "⁷", "8", "⁸", "9", "⁹").Replace(digits)
}

// name is what a dimension is called and the SI unit it is printed in.
type name struct{ noun, unit string }

// names holds the dimensions that have a name. Where several quantities share
// one, the noun is the commonest.
var names = map[Dimension]name{
	{}:                              {"a pure number", ""},
	{Length: 1}:                     {"length", "m"},
	{Length: 2}:                     {"area", "m²"},
	{Length: 3}:                     {"volume", "m³"},
	{Mass: 1}:                       {"mass", "kg"},
	{Time: 1}:                       {"time", "s"},
	{Temperature: 1}:                {"temperature", "K"},
	{Amount: 1}:                     {"amount of substance", "mol"},
	{Current: 1}:                    {"electric current", "A"},
	{LuminousIntensity: 1}:          {"luminous intensity", "cd"},
	{Current: 1, Time: 1}:           {"electric charge", "C"},
	{Time: -1}:                      {"rate", "1/s"},
	{Length: 1, Time: -1}:           {"velocity", "m/s"},
	{Length: 1, Time: -2}:           {"acceleration", "m/s²"},
	{Length: 2, Time: -1}:           {"diffusivity", "m²/s"},
	{Mass: 1, Length: -3}:           {"density", "kg/m³"},
	{Length: 3, Amount: -1}:         {"molar volume", "m³/mol"},
	{Temperature: -1}:               {"expansivity", "1/K"},
	{Length: 2, Time: -2}:           {"specific energy", "J/kg"},
	{Length: 2, Time: -3}:           {"specific heating", "W/kg"},
	{Mass: 1, Time: -3}:             {"heat flux", "W/m²"},
	{Mass: 1, Amount: -1}:           {"molar mass", "kg/mol"},
	{Mass: 1, Time: -1}:             {"mass flow", "kg/s"},
	{Length: -1}:                    {"wavenumber", "1/m"},
	{Mass: 1, Length: -2}:           {"mass per area", "kg/m²"},
	{Mass: 1, Length: -1, Time: -2}: {"pressure", "Pa"},
	{Mass: 1, Length: 1, Time: -2}:  {"force", "N"},
	{Mass: 1, Length: -2, Time: -2}: {"force density", "N/m³"},
	{Mass: 1, Length: -1, Time: -1}: {"dynamic viscosity", "Pa s"},
	{Mass: 1, Length: 2, Time: -2}:  {"energy", "J"},
	{Mass: 1, Length: 2, Time: -3}:  {"power", "W"},
	{Mass: 1, Length: -1, Time: -3}: {"volumetric heating", "W/m³"},
	{Temperature: 1, Length: -1}:    {"temperature gradient", "K/m"},
	{Mass: 1, Length: 1, Time: -3, Temperature: -1}:             {"conductivity", "W/(m K)"},
	{Mass: 1, Time: -3, Temperature: -1}:                        {"heat-transfer coefficient", "W/(m² K)"},
	{Length: 2, Time: -2, Temperature: -1}:                      {"specific heat", "J/(kg K)"},
	{Mass: 1, Length: 2, Time: -2, Temperature: -1}:             {"heat capacity", "J/K"},
	{Mass: 1, Length: 2, Time: -2, Amount: -1}:                  {"molar energy", "J/mol"},
	{Mass: 1, Length: 2, Time: -2, Temperature: -1, Amount: -1}: {"molar heat capacity", "J/(mol K)"},
}

// siUnit returns the unit that a quantity of this dimension is printed in; it is
// empty for a pure number.
func (d Dimension) siUnit() string {
	if n, ok := names[d]; ok {
		return n.unit
	}
	return d.String()
}

// describe names the dimension for an error: "mass (kg)".
func (d Dimension) describe() string {
	n, ok := names[d]
	switch {
	case !ok:
		return d.String()
	case n.unit == "":
		return n.noun
	}
	return n.noun + " (" + n.unit + ")"
}
