package rheology_test

import (
	"fmt"
	"log"
	"math"

	"example.org/overturn/stokes/rheology"
)

// The viscosity of one row of cells, a thousand times softer at the hot end.
func ExampleFrankKamenetskii() {
	law := rheology.FrankKamenetskii{ThermalExponent: math.Log(1000)}
	viscosity := make([]float64, 3)
	law.ViscosityTo(viscosity, []float64{0, 0.5, 1}, 0)
	fmt.Printf("%.3g\n", viscosity)
	// Output: [1 0.0316 0.001]
}

// An Arrhenius law that grows stiff without bound is cut off, and a lower
// mantle thirty times stiffer lies under it.
func ExampleScaled() {
	const km = 1e3
	jump, err := rheology.Steps([]float64{660 * km}, []float64{1, 30})
	if err != nil {
		log.Fatal(err)
	}
	law := rheology.Scaled{
		Law: rheology.Arrhenius{
			Reference: 1e21, ActivationEnergy: 300e3, ReferenceTemperature: 1600, Max: 1e25,
		},
		Factor: jump,
	}
	if err := rheology.Check(law); err != nil {
		log.Fatal(err)
	}
	viscosity := make([]float64, 2)
	law.ViscosityTo(viscosity, []float64{900, 1600}, 50*km)
	fmt.Printf("%.1e\n", viscosity)
	law.ViscosityTo(viscosity, []float64{1600, 1800}, 700*km)
	fmt.Printf("%.1e\n", viscosity)
	// Output:
	// [1.0e+25 1.0e+21]
	// [3.0e+22 2.4e+21]
}

// Dry olivine of 5 mm grains at 1400 °C and 3 GPa: which mechanism carries a
// slow deformation, and which a fast one?
func ExampleComposite_ViscosityAtStrainRate() {
	mantle := rheology.State{Temperature: 1673.15, Pressure: 3e9, GrainSize: 5e-3}
	both := rheology.Composite{Paths: rheology.Olivine()}
	diffusion := rheology.Composite{Paths: []rheology.Path{rheology.Alone(rheology.OlivineDiffusionDry())}}
	for _, rate := range []float64{1e-18, 1e-15, 1e-12} {
		eta, err := both.ViscosityAtStrainRate(rate, mantle)
		if err != nil {
			log.Fatal(err)
		}
		alone, err := diffusion.ViscosityAtStrainRate(rate, mantle)
		if err != nil {
			log.Fatal(err)
		}
		fmt.Printf("%.0e 1/s: %.1e Pa s, %2.0f %% by diffusion\n", rate, eta, 100*eta/alone)
	}
	// Output:
	// 1e-18 1/s: 5.2e+19 Pa s, 100 % by diffusion
	// 1e-15 1/s: 4.3e+19 Pa s, 83 % by diffusion
	// 1e-12 1/s: 5.1e+17 Pa s,  1 % by diffusion
}

// A law of one's own needs one method; Probe tries it as the solvers will.
func ExampleProbe() {
	softening := rheology.Func(func(temperature, _ float64) float64 { return 1 - temperature })
	err := rheology.Probe(softening, rheology.Domain{HottestTemperature: 1, Bottom: 1})
	fmt.Println(err)
	// Output: rheology: at depth 0 and temperature 1 the viscosity is 0, want finite and > 0
}
