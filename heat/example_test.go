package heat_test

import (
	"context"
	"fmt"
	"log"
	"math"

	"example.org/overturn/heat"
	"example.org/overturn/stokes/staggered"
)

// A rigid plate cools from above for a while.
func Example() {
	g, err := staggered.Uniform(1, 100, 1, 1)
	if err != nil {
		log.Fatal(err)
	}
	st, err := heat.NewStepper(heat.Equation{
		Grid:  g,
		Walls: heat.Walls{Bottom: heat.Isothermal(1), Top: heat.Isothermal(0)},
	}, &heat.Settings{Scheme: heat.Implicit})
	if err != nil {
		log.Fatal(err)
	}
	temperature := staggered.NewScalar(g)
	temperature.SetAll(1)
	var lost float64
	for range 1000 {
		rep, err := st.Step(context.Background(), temperature, nil, 1e-4)
		if err != nil {
			log.Fatal(err)
		}
		lost -= rep.Step * rep.Conducted[staggered.Top]
	}
	fmt.Printf("heat lost through the top: %.3f\n", lost)
	fmt.Printf("half-space cooling says:   %.3f\n", 2*math.Sqrt(0.1/math.Pi))
	// Output:
	// heat lost through the top: 0.357
	// half-space cooling says:   0.357
}

// The steady temperature in a convection cell, and the heat it carries.
func ExampleStepper_Steady() {
	g, err := staggered.Uniform(64, 64, 1, 1)
	if err != nil {
		log.Fatal(err)
	}
	flow := staggered.NewFlow(g)
	flow.FillFromStream(func(x, z float64) float64 {
		return 20 * math.Sin(math.Pi*x) * math.Sin(math.Pi*z)
	})
	st, err := heat.NewStepper(heat.Equation{
		Grid:  g,
		Walls: heat.Walls{Bottom: heat.Isothermal(1), Top: heat.Isothermal(0)},
	}, nil)
	if err != nil {
		log.Fatal(err)
	}
	temperature := staggered.NewScalar(g)
	rep, err := st.Steady(context.Background(), temperature, flow)
	if err != nil {
		log.Fatal(err)
	}
	fmt.Printf("in at the bottom %.2f, out at the top %.2f\n",
		rep.Conducted[staggered.Bottom], -rep.Conducted[staggered.Top])
	// Output:
	// in at the bottom 4.80, out at the top 4.80
}

// The flux along a wall, cell by cell.
func ExampleStepper_WallFluxTo() {
	g, err := staggered.Uniform(4, 8, 1, 1)
	if err != nil {
		log.Fatal(err)
	}
	st, err := heat.NewStepper(heat.Equation{
		Grid: g,
		Walls: heat.Walls{
			Bottom: heat.FluxProfile(func(x float64) float64 { return 2 * x }),
			Top:    heat.Isothermal(0),
		},
	}, nil)
	if err != nil {
		log.Fatal(err)
	}
	temperature := staggered.NewScalar(g)
	if _, err := st.Steady(context.Background(), temperature, nil); err != nil {
		log.Fatal(err)
	}
	top, err := st.WallFluxTo(nil, staggered.Top, temperature, nil)
	if err != nil {
		log.Fatal(err)
	}
	fmt.Printf("into the box through the top: %.3f\n", top)
	// Output:
	// into the box through the top: [-0.931 -0.971 -1.029 -1.069]
}
