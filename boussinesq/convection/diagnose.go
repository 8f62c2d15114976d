package convection

import (
	"context"
	"errors"
	"fmt"

	"example.org/overturn/stokes/staggered"
)

// Diagnose returns the diagnostics of any temperature and flow on the grid of
// p: those of a model of your own, for example. The walls, the viscosity and the
// other parameters of p say how heat flow, work and dissipation are meant;
// nothing checks that the flow solves the Stokes equation for the temperature,
// but BuoyancyWork and Dissipation then differ. A nil flow is found from the
// temperature.
func Diagnose(ctx context.Context, p Problem, t *staggered.Scalar, flow *staggered.Flow) (Diagnostics, error) {
	sys, err := newSystem(p, Settings{})
	if err != nil {
		return Diagnostics{}, err
	}
	if err := sys.checkGiven("temperature", t); err != nil {
		return Diagnostics{}, err
	}
	if !t.Grid.Equal(sys.Grid) {
		return Diagnostics{}, fmt.Errorf("convection: temperature lives on %v, want %v", t.Grid, sys.Grid)
	}
	if flow == nil {
		flow = staggered.NewFlow(sys.Grid)
		if _, err := sys.solveFlow(ctx, t, flow); err != nil {
			return Diagnostics{}, err
		}
	} else if err := checkFlow(flow, sys.Grid); err != nil {
		return Diagnostics{}, err
	}
	return newSampler(sys).diagnose(t, flow)
}

// checkFlow reports whether a flow that a caller gave fits a grid.
func checkFlow(f *staggered.Flow, g *staggered.Grid) error {
	if f.Grid == nil || !f.Grid.Equal(g) {
		return fmt.Errorf("convection: flow lives on another grid, want %v", g)
	}
	if _, err := staggered.WrapFlow(g, f.VX, f.VZ, f.P); err != nil {
		return fmt.Errorf("convection: flow: %w", err)
	}
	for _, values := range [3][]float64{f.VX, f.VZ, f.P} {
		if !finite(values) {
			return errors.New("convection: flow holds a NaN or an infinity, want finite numbers")
		}
	}
	return nil
}
