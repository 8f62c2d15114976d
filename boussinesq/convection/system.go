package convection

import (
	"context"
	"fmt"
	"slices"

	"example.org/overturn/heat"
	"example.org/overturn/stokes"
	"example.org/overturn/stokes/staggered"
)

// A system holds the kernels of one problem and what passes between them.
type system struct {
	Problem
	stokes    *stokes.Solver
	heat      *heat.Stepper
	viscosity *staggered.Scalar // nil where the problem has no law
	buoyancy  *staggered.Vector
}

func newSystem(p Problem, s Settings) (*system, error) {
	p, err := p.withDefaults()
	if err != nil {
		return nil, err
	}
	sys := &system{Problem: p, buoyancy: staggered.NewVector(p.Grid)}
	if sys.stokes, err = stokes.NewSolver(p.Grid, p.Walls, s.Stokes); err != nil {
		return nil, fmt.Errorf("convection: %w", err)
	}
	eq := heat.Equation{Grid: p.Grid, Walls: *p.Thermal}
	if p.Conductivity != 1 {
		eq.Conductivity = uniform(p.Grid, p.Conductivity)
	}
	if p.HeatCapacity != 1 {
		eq.HeatCapacity = uniform(p.Grid, p.HeatCapacity)
	}
	if p.Heating != 0 {
		eq.Source = uniform(p.Grid, p.Heating)
	}
	if sys.heat, err = heat.NewStepper(eq, s.Heat); err != nil {
		return nil, fmt.Errorf("convection: %w", err)
	}
	if p.Viscosity != nil {
		sys.viscosity = staggered.NewScalar(p.Grid)
	}
	return sys, nil
}

func uniform(g *staggered.Grid, v float64) *staggered.Scalar {
	s := staggered.NewScalar(g)
	s.SetAll(v)
	return s
}

// solveFlow finds the flow that goes with a temperature, starting from what
// flow holds.
func (sys *system) solveFlow(ctx context.Context, t *staggered.Scalar, flow *staggered.Flow) (stokes.Report, error) {
	if sys.viscosity != nil {
		sys.viscosityTo(sys.viscosity, t)
	}
	sys.buoyancy.FillVertical(t, sys.Rayleigh)
	rep, err := sys.stokes.Solve(ctx, flow, sys.viscosity, sys.buoyancy)
	if err != nil {
		return rep, fmt.Errorf("convection: %w", err)
	}
	return rep, nil
}

// viscosityTo evaluates the law for each row of cells.
func (sys *system) viscosityTo(dst, t *staggered.Scalar) {
	g := sys.Grid
	top := g.ZNodes()[g.NZ()]
	for k, z := range g.ZCentres() {
		sys.Viscosity.ViscosityTo(dst.Row(k), t.Row(k), top-z)
	}
}

// work returns the work that the buoyancy of t does on a flow, per time.
func (sys *system) work(t *staggered.Scalar, flow *staggered.Flow) float64 {
	sys.buoyancy.FillVertical(t, sys.Rayleigh)
	nx, nz := sys.Grid.Cells()
	dx, dz := sys.Grid.DX(), sys.Grid.DZ()
	total := 0.0
	for k := 1; k < nz; k++ {
		force, v := sys.buoyancy.Z[k*nx:][:nx], flow.VZ[k*nx:][:nx]
		sum := 0.0
		for i, w := range v {
			sum += force[i] * w * dx[i]
		}
		total += sum * 0.5 * (dz[k-1] + dz[k])
	}
	return total
}

// fastest returns twice the rate of diffusion across the smallest cell.
func (sys *system) fastest() float64 {
	smallest := min(slices.Min(sys.Grid.DX()), slices.Min(sys.Grid.DZ()))
	return 2 * sys.diffusivity() / (smallest * smallest)
}
