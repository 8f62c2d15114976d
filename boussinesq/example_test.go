package boussinesq_test

import (
	"encoding/json"
	"fmt"
	"log"

	"example.org/overturn/boussinesq"
	"example.org/overturn/units"
)

// A centimetre of water with a tenth of a kelvin across it is just short of
// convection: between rigid plates the critical number is 1708.
func ExampleLayer_Rayleigh() {
	water, err := boussinesq.ByName("water-20C")
	if err != nil {
		log.Fatal(err)
	}
	tank := boussinesq.Layer{
		Material: water.Material(),
		Depth:    1 * units.Centimetre,
		Gravity:  units.StandardGravity,
		Top:      units.Celsius(20),
		Bottom:   units.Celsius(20.1),
	}
	ra, err := tank.Rayleigh()
	if err != nil {
		log.Fatal(err)
	}
	pr, err := tank.Prandtl()
	if err != nil {
		log.Fatal(err)
	}
	fmt.Printf("Ra = %.0f, Pr = %.1f\n", ra, pr)
	// Output: Ra = 1412, Pr = 7.0
}

// A mantle from the core to the surface: about ten million, far above critical.
func ExampleLayer_Rayleigh_mantle() {
	rock, err := boussinesq.ByName("upper-mantle-rounded")
	if err != nil {
		log.Fatal(err)
	}
	mantle := boussinesq.Layer{
		Material: rock.Material(),
		Depth:    2890 * units.Kilometre,
		Gravity:  9.8 * units.MetrePerSecondSquared,
		Top:      units.Celsius(0),
		Bottom:   units.Celsius(3700),
	}
	mantle.Material.Viscosity = 1e22 * units.PascalSecond
	ra, err := mantle.Rayleigh()
	if err != nil {
		log.Fatal(err)
	}
	fmt.Printf("Ra = %.1e\n", ra)
	// Output: Ra = 8.7e+06
}

// Numbers of a model become quantities, and the other way round.
func ExampleLayer_Scales() {
	rock, err := boussinesq.ByName("upper-mantle-rounded")
	if err != nil {
		log.Fatal(err)
	}
	layer := boussinesq.Layer{
		Material: rock.Material(),
		Depth:    1000 * units.Kilometre,
		Gravity:  10 * units.MetrePerSecondSquared,
		Top:      units.Celsius(0),
		Bottom:   units.Celsius(1000),
	}
	s, err := layer.Scales()
	if err != nil {
		log.Fatal(err)
	}
	fmt.Printf("v_rms of 1000 is %.1f cm/yr\n", s.Velocity(1000).In(units.CentimetrePerYear))
	fmt.Printf("Nu of 10 is %.0f mW/m²\n", s.HeatFlux(10).In(units.MilliwattPerSquareMetre))
	fmt.Printf("100 Myr is a time of %.4f\n", s.FromTime(100*units.Megayear))
	// Output:
	// v_rms of 1000 is 3.2 cm/yr
	// Nu of 10 is 40 mW/m²
	// 100 Myr is a time of 0.0032
}

// Where a model of a whole upper mantle goes beyond its approximation.
func ExampleLayer_Validity() {
	rock, err := boussinesq.ByName("upper-mantle")
	if err != nil {
		log.Fatal(err)
	}
	layer := boussinesq.Layer{
		Material: rock.Material(),
		Depth:    660 * units.Kilometre,
		Gravity:  9.8 * units.MetrePerSecondSquared,
		Top:      units.Celsius(0),
		Bottom:   units.Celsius(1600),
	}
	criteria, err := layer.Validity()
	if err != nil {
		log.Fatal(err)
	}
	for _, c := range criteria {
		if c.Verdict == boussinesq.Strained {
			fmt.Println(c)
		}
	}
	// Output:
	// dissipation number: α g d/c_p = 0.16, strained (bound 0.1). Viscous heating, which is left out, comes to about 16 % of the convected heat.
	// adiabatic temperature change: T_mean (exp(Di) − 1)/ΔT = 0.12, strained (bound 0.1). Compression alone warms what sinks through the layer by 12 % of the temperature difference, and that part drives nothing.
	// compression: ρ g d/K = 0.16, strained (bound 0.1). The weight of the layer compresses its base by 16 %; the depth is that part of a density scale height.
}

// Does a tank of silicone oil convect, when the gap is known to half a
// millimetre and the temperatures to a tenth of a kelvin?
func ExampleUncertain() {
	oil, err := boussinesq.ByName("silicone-oil-1000cSt")
	if err != nil {
		log.Fatal(err)
	}
	ranges := oil.Ranges()
	ranges.Depth = boussinesq.PlusMinus(20*units.Millimetre, 0.5*units.Millimetre)
	ranges.Bottom = boussinesq.Between(units.Celsius(27.6), units.Celsius(27.8))
	tank := boussinesq.Uncertain{
		Layer: boussinesq.Layer{
			Material: oil.Material(),
			Depth:    20 * units.Millimetre,
			Gravity:  units.StandardGravity,
			Top:      units.Celsius(25),
			Bottom:   units.Celsius(27.7),
		},
		Ranges: ranges,
	}
	bounds, err := tank.Bounds(boussinesq.Layer.Rayleigh)
	if err != nil {
		log.Fatal(err)
	}
	sample, err := tank.Sample(boussinesq.Layer.Rayleigh, nil)
	if err != nil {
		log.Fatal(err)
	}
	fmt.Printf("Ra = %.0f, at least %.0f, at most %.0f\n", bounds.Best, bounds.Low, bounds.High)
	fmt.Printf("above 1708 with probability %.1f\n", sample.Above(1708))
	fmt.Println("what matters most:", sample.Influences()[0].Parameter)
	// Output:
	// Ra = 1762, at least 1413, at most 2156
	// above 1708 with probability 0.6
	// what matters most: Depth
}

// A preset says where its values come from and which ones to fill in.
func ExampleByName() {
	ice, err := boussinesq.ByName("ice-260K")
	if err != nil {
		log.Fatal(err)
	}
	fmt.Println(ice.Density.Value, "-", ice.Density.Status)
	fmt.Println(ice.Conductivity.Range.Low, "to", ice.Conductivity.Range.High, "-", ice.Conductivity.Status)
	m := ice.Material()
	fmt.Println(m.Check())
	m.Viscosity = 1e14 * units.PascalSecond
	fmt.Println(m.Check())
	// Output:
	// 918.6115 kg/m³ - computed
	// 2.18 W/(m K) to 2.5 W/(m K) - from memory
	// boussinesq: Material.Viscosity is 0 Pa s, want > 0 and finite
	// <nil>
}

// A layer and its ranges fit into a configuration file: each quantity is text
// with a unit.
func ExampleUncertain_config() {
	const config = `{
		"Layer": {
			"Material": {
				"Density": "917 kg/m^3", "Expansivity": "1.6e-4 1/K", "Conductivity": "2.2 W/(m K)",
				"SpecificHeat": "2000 J/(kg K)", "Viscosity": "1e14 Pa s"
			},
			"Depth": "24 km", "Gravity": "1.3 m/s^2", "Top": "100 K", "Bottom": "-3 degC"
		},
		"Ranges": {"Viscosity": {"Low": "1e13 Pa s", "High": "1e15 Pa s", "Shape": "log-uniform"}}
	}`
	var shell boussinesq.Uncertain
	if err := json.Unmarshal([]byte(config), &shell); err != nil {
		log.Fatal(err)
	}
	ra, err := shell.Bounds(boussinesq.Layer.Rayleigh)
	if err != nil {
		log.Fatal(err)
	}
	fmt.Printf("Ra from %.1e to %.1e\n", ra.Low, ra.High)
	// Output: Ra from 3.7e+05 to 3.7e+07
}
