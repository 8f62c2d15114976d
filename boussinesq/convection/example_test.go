package convection_test

import (
	"context"
	"fmt"
	"math"

	"example.org/overturn/boussinesq/convection"
	"example.org/overturn/stokes/rheology"
	"example.org/overturn/stokes/staggered"
)

// A run in time, until nothing changes any more.
func ExampleModel_Steps() {
	g, err := staggered.Uniform(16, 16, 1, 1)
	if err != nil {
		fmt.Println(err)
		return
	}
	m, err := convection.New(convection.Problem{Grid: g, Rayleigh: 1e4}, &convection.Settings{SteadyTolerance: 1e-3})
	if err != nil {
		fmt.Println(err)
		return
	}
	var last convection.Sample
	for s, err := range m.Steps(context.Background()) {
		if err != nil {
			fmt.Println(err)
			return
		}
		last = s
	}
	fmt.Printf("%v: Nu %.2f, v_rms %.1f\n", last.Stop, last.NuTop, last.RMSVelocity)
	// Output: steady: Nu 4.82, v_rms 42.5
}

// A steady state of a layer whose viscosity falls a hundredfold with
// temperature, by Newton's method.
func ExampleSteady() {
	g, err := staggered.Graded(32, 32, 1, 1, staggered.Grading{Left: 4, Right: 4, Bottom: 4, Top: 4})
	if err != nil {
		fmt.Println(err)
		return
	}
	sol, err := convection.Steady(context.Background(), convection.Problem{
		Grid: g, Rayleigh: 1e4,
		Viscosity: rheology.FrankKamenetskii{ThermalExponent: math.Log(100)},
	}, nil)
	if err != nil {
		fmt.Println(err)
		return
	}
	fmt.Printf("Nu %.2f at the top and %.2f at the bottom\n", sol.NuTop, sol.NuBottom)
	// Output: Nu 8.72 at the top and 8.72 at the bottom
}

// The first benchmark case of Blankenbach et al. (1989) with its numerical
// uncertainty. Their best value is 4.884409.
func ExampleRefine() {
	g, err := staggered.Graded(64, 64, 1, 1, staggered.Grading{Left: 8, Right: 8, Bottom: 8, Top: 8})
	if err != nil {
		fmt.Println(err)
		return
	}
	study, err := convection.Refine(context.Background(), convection.Problem{Grid: g, Rayleigh: 1e4}, 3, nil)
	if err != nil {
		fmt.Println(err)
		return
	}
	nu, _ := study.Get("NuTop")
	fmt.Printf("Nu = %.4f, observed order %.1f, uncertain by less than 0.001: %v\n", nu.Value, nu.Order, nu.Uncertainty < 1e-3)
	// Output: Nu = 4.8844, observed order 1.9, uncertain by less than 0.001: true
}
