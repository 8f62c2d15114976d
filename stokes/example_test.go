package stokes_test

import (
	"context"
	"fmt"
	"log"
	"math"

	"example.org/overturn/stokes"
	"example.org/overturn/stokes/staggered"
)

// A warm column rises in a fluid a hundred times stiffer at the top.
func ExampleSolver_Solve() {
	g, err := staggered.Uniform(64, 64, 1, 1)
	if err != nil {
		log.Fatal(err)
	}
	viscosity, force, flow := staggered.NewScalar(g), staggered.NewVector(g), staggered.NewFlow(g)
	viscosity.Fill(func(x, z float64) float64 { return math.Pow(100, z+0.1*x) })
	force.Fill(nil, func(x, z float64) float64 { return 1e4 * math.Cos(math.Pi*x) * math.Sin(math.Pi*z) })

	sv, err := stokes.NewSolver(g, stokes.Walls{Bottom: stokes.NoSlip}, nil)
	if err != nil {
		log.Fatal(err)
	}
	report, err := sv.Solve(context.Background(), flow, viscosity, force)
	if err != nil {
		log.Fatal(err)
	}
	heating, err := sv.DissipationTo(nil, flow, viscosity)
	if err != nil {
		log.Fatal(err)
	}
	fmt.Printf("converged: %v\n", report.Residual <= stokes.DefaultTolerance)
	fmt.Printf("rms velocity %.2f, dissipation %.0f\n", flow.RMS(), heating)
	// Output:
	// converged: true
	// rms velocity 7.46, dissipation 23701
}

// A river of lava in a channel: it enters and leaves with the same profile.
func ExampleWall_Through() {
	g, err := staggered.Uniform(30, 20, 3, 1)
	if err != nil {
		log.Fatal(err)
	}
	profile := func(z float64) float64 { return 6 * z * (1 - z) }
	sv, err := stokes.NewSolver(g, stokes.Walls{
		Left:   stokes.NoSlip.Through(profile),
		Right:  stokes.NoSlip.Through(profile),
		Bottom: stokes.NoSlip,
		Top:    stokes.NoSlip,
	}, nil)
	if err != nil {
		log.Fatal(err)
	}
	flow := staggered.NewFlow(g)
	if _, err := sv.Solve(context.Background(), flow, nil, nil); err != nil {
		log.Fatal(err)
	}
	drop := flow.Pressure().At(0, 10) - flow.Pressure().At(29, 10)
	fmt.Printf("pressure gradient %.1f\n", drop/2.9)
	// Output: pressure gradient 12.0
}
