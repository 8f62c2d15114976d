package units_test

import (
	"encoding/json"
	"errors"
	"flag"
	"fmt"
	"log"

	"example.org/overturn/units"
)

func Example() {
	depth := 24 * units.Kilometre
	viscosity := 1e14 * units.PascalSecond
	bottom := units.Celsius(-2)
	top := units.Celsius(-170)

	fmt.Println(depth, "of", viscosity)
	fmt.Println(bottom.Sub(top), "hotter at the bottom")
	fmt.Printf("%.1f miles\n", depth.In(1609.344*units.Metre))
	// Output:
	// 24000 m of 1e14 Pa s
	// 168 K hotter at the bottom
	// 14.9 miles
}

func ExampleParse() {
	for _, text := range []string{"4.2 cm/yr", "42 km/Myr", "1.33×10⁻⁹ m s⁻¹", "5 kg", "4.2 cm/y"} {
		v, err := units.Parse[units.Velocity](text)
		if err != nil {
			fmt.Println(err)
			continue
		}
		fmt.Printf("%s is %.2f cm/yr\n", text, v.In(units.CentimetrePerYear))
	}
	// Output:
	// 4.2 cm/yr is 4.20 cm/yr
	// 42 km/Myr is 4.20 cm/yr
	// 1.33×10⁻⁹ m s⁻¹ is 4.20 cm/yr
	// units: "5 kg": mass (kg), want velocity (m/s)
	// units: "4.2 cm/y" at offset 7: unknown unit: found "y", want a known one
}

func ExampleParse_temperature() {
	point, _ := units.Parse[units.Temperature]("10 degC")
	difference, _ := units.Parse[units.TemperatureDifference]("10 degC")
	expansivity, _ := units.Parse[units.Expansivity]("3e-5 /degC")
	fmt.Println(point)
	fmt.Println(difference)
	fmt.Println(expansivity)
	fmt.Println(point.Add(difference))
	// Output:
	// 283.15 K
	// 10 K
	// 3e-5 1/K
	// 293.15 K
}

func ExampleFormat() {
	q := 0.065 * units.WattPerSquareMetre
	for _, unit := range []string{"mW/m²", "HFU", "", "W/m"} {
		s, err := units.Format(q, unit, 3)
		fmt.Println(s, err)
	}
	// Output:
	// 65.0 mW/m² <nil>
	// 1.55 HFU <nil>
	// 0.0650 W/m² <nil>
	//  units: "W/m": kg m/s³, want heat flux (W/m²)
}

func ExampleParseUnit() {
	// The prefactor of a creep law, 1.1e5 MPa^-3.5 s^-1, in SI units.
	u, err := units.ParseUnit("MPa^-3.5 s^-1")
	if err != nil {
		log.Fatal(err)
	}
	fmt.Printf("%.2g in %v\n", 1.1e5*u.Scale, u.Dimension)
	// Output: 1.1e-16 in m^3.5 s⁶/kg^3.5
}

func ExampleParseError() {
	_, err := units.Parse[units.Conductivity]("3.1 W/m K")
	if e, ok := errors.AsType[*units.ParseError](err); ok && errors.Is(err, units.ErrSyntax) {
		fmt.Println(e.Text)
		fmt.Printf("%*s %s\n", e.Pos+1, "^", e.Expected)
	}
	// Output:
	// 3.1 W/m K
	//         ^ parentheses around what is divided by, as in a/(b c)
}

func ExampleDensity_json() {
	var layer struct {
		Density units.Density
		Bottom  units.Temperature
		Age     units.Time
	}
	err := json.Unmarshal([]byte(`{"Density": "3.3 g/cm3", "Bottom": "1350 °C", "Age": "100 Ma"}`), &layer)
	if err != nil {
		log.Fatal(err)
	}
	b, err := json.Marshal(layer)
	fmt.Println(string(b), err)
	fmt.Println(json.Unmarshal([]byte(`{"Density": 3300}`), &layer))
	// Output:
	// {"Density":"3300 kg/m³","Bottom":"1623.15 K","Age":"3.15576e15 s"} <nil>
	// json: cannot unmarshal number into Go struct field .Density of type units.Density
}

func ExampleLength_flag() {
	flags := flag.NewFlagSet("layer", flag.ContinueOnError)
	depth := 660 * units.Kilometre
	flags.TextVar(&depth, "depth", depth, "depth of the layer, with its unit")
	if err := flags.Parse([]string{"-depth", "2890 km"}); err != nil {
		log.Fatal(err)
	}
	fmt.Println(depth.In(units.Kilometre))
	// Output: 2890
}

// Fluidity is a quantity that the package does not have.
type Fluidity float64

// Dimension makes it one that Parse and Format know.
func (Fluidity) Dimension() units.Dimension {
	return units.Dimension{Length: 1, Time: 1, Mass: -1}
}

func ExampleQuantity() {
	f, err := units.Parse[Fluidity]("31.6 /(kbar yr)")
	if err != nil {
		log.Fatal(err)
	}
	fmt.Println(units.Format(f, "1/(Pa s)", 3))
	_, err = units.Parse[Fluidity]("31.6 Pa s")
	fmt.Println(err)
	// Output:
	// 1.00e-14 1/(Pa s) <nil>
	// units: "31.6 Pa s": dynamic viscosity (Pa s), want fluidity (m s/kg)
}
