package convection

import (
	"context"
	"errors"
	"fmt"
	"math"

	"example.org/overturn/heat"
	"example.org/overturn/stokes"
	"example.org/overturn/stokes/staggered"
)

// Defaults of [SteadySettings].
const (
	DefaultSteadyTolerance = 1e-6
	DefaultMaxNewton       = 200
	DefaultMaxDirections   = 150

	// DefaultSteadyStokesTolerance is that of the Stokes solves behind the
	// residual, which can be no smaller than their error times the velocity.
	DefaultSteadyStokesTolerance = 1e-10
)

// ErrNotSteady reports that no steady state was found. Usual causes: the layer
// is time-dependent at this Rayleigh number, or the box holds more rolls than
// are stable in it. The solution returned with it is the best one met.
var ErrNotSteady = errors.New("no steady state")

// SteadySettings tunes [Steady] and [Refine]. A nil *SteadySettings, or a zero
// field, means the default.
type SteadySettings struct {
	// Tolerance is the residual at which a state counts as steady: the root
	// mean square of ∂T/∂t, in temperature ranges per diffusion time of the
	// layer. Default 1e-6.
	Tolerance float64

	// MaxNewton bounds the Newton steps on each grid, implicit steps in time
	// included. Default 200.
	MaxNewton int

	// MaxDirections bounds the Krylov directions of one Newton step, each of
	// which takes 8 bytes a cell. Default 150.
	MaxDirections int

	// Guess is a temperature near the steady state, on any grid of the same box.
	// Not nil, it replaces the approach in time and the coarser grids: Newton's
	// method starts from it on the grid of the problem, in Refine on the
	// coarsest of the study.
	Guess *staggered.Scalar

	// Monitor, if not nil, is called after every Newton step.
	Monitor func(SteadyProgress)

	// Stokes tunes the flow solver. Its Tolerance is 1e-10 by default here.
	Stokes *stokes.Settings

	// Workers is the number of goroutines of the heat kernel. Default
	// runtime.GOMAXPROCS(0).
	Workers int
}

// SteadyProgress says where a search for a steady state is.
type SteadyProgress struct {
	Grid     *staggered.Grid
	Newton   int     // steps taken on this grid
	Krylov   int     // products taken for the last step
	Residual float64 // as for SteadySettings.Tolerance
}

// A Solution is a steady state.
type Solution struct {
	Diagnostics

	Temperature *staggered.Scalar
	Flow        *staggered.Flow

	Residual float64 // as for SteadySettings.Tolerance
	Newton   int     // steps on the last grid
	Krylov   int     // products with the linearised system on the last grid
}

// String gives the solution in one line.
func (s *Solution) String() string {
	return fmt.Sprintf("steady on %v: Nu %.6f (top) %.6f (bottom), v_rms %.7g, residual %.1e after %d Newton steps",
		s.Temperature.Grid, s.NuTop, s.NuBottom, s.RMSVelocity, s.Residual, s.Newton)
}

func (s *SteadySettings) withDefaults() (SteadySettings, error) {
	var c SteadySettings
	if s != nil {
		c = *s
	}
	if c.Tolerance == 0 {
		c.Tolerance = DefaultSteadyTolerance
	}
	if c.MaxNewton == 0 {
		c.MaxNewton = DefaultMaxNewton
	}
	if c.MaxDirections == 0 {
		c.MaxDirections = DefaultMaxDirections
	}
	var inner stokes.Settings
	if c.Stokes != nil {
		inner = *c.Stokes
	}
	if inner.Tolerance == 0 {
		inner.Tolerance = DefaultSteadyStokesTolerance
	}
	c.Stokes = &inner
	switch {
	case !(c.Tolerance > 0) || math.IsInf(c.Tolerance, 1):
		return c, fmt.Errorf("convection: SteadySettings.Tolerance is %v, want > 0", c.Tolerance)
	case c.MaxNewton < 0:
		return c, fmt.Errorf("convection: SteadySettings.MaxNewton is %d, want >= 0", c.MaxNewton)
	case c.MaxDirections < 0:
		return c, fmt.Errorf("convection: SteadySettings.MaxDirections is %d, want >= 0", c.MaxDirections)
	}
	return c, nil
}

// Steady finds a steady state of the problem with central advection.
//
// Starting from the initial state it steps in time on a coarse grid, made of
// every second, fourth, ... node of the problem's. The steps are implicit, short
// while convection grows and longer as the state calms down, until they are
// Newton steps (pseudo-transient continuation, Kelley & Keyes 1998). Far above
// onset the Rayleigh number climbs to its value in stages. Then it follows the
// solution from grid to grid. Where a layer has several steady
// states, Problem.Initial decides: the damping of long steps favours a state of
// as many rolls as it has. A layer that does not convect is found at rest.
// Whether the state is stable in time is not asked.
//
// With an error of the search, such as [ErrNotSteady], comes the best solution
// met, on the grid that the search had reached; with one of the input, nil.
func Steady(ctx context.Context, p Problem, s *SteadySettings) (*Solution, error) {
	c, err := s.withDefaults()
	if err != nil {
		return nil, err
	}
	solutions, err := steadySequence(ctx, p, c, 1)
	if len(solutions) == 0 {
		return nil, err
	}
	return solutions[len(solutions)-1], err
}

// coarseRows is the number of rows or columns above which a grid is not coarse
// enough to start on.
const coarseRows = 48

// steadySequence solves on the problem's grid and at least so many coarser
// ones, coarse to fine.
func steadySequence(ctx context.Context, p Problem, s SteadySettings, grids int) ([]*Solution, error) {
	p, err := p.withDefaults()
	if err != nil {
		return nil, err
	}
	sequence := []*staggered.Grid{p.Grid}
	for len(sequence) < grids || s.Guess == nil && worthCoarsening(sequence[0]) {
		g, err := coarsen(sequence[0])
		if err != nil {
			return nil, err
		}
		sequence = append([]*staggered.Grid{g}, sequence...)
	}
	var solutions []*Solution
	guess := s.Guess
	for _, g := range sequence {
		level := p
		level.Grid = g
		sol, err := steadyOn(ctx, level, s, guess)
		if err == nil && guess != nil && s.Guess == nil && sol.atRest(&level) {
			// Rest is steady at any Rayleigh number, and a coarser grid may have
			// been below its onset: the initial state decides on each grid.
			sol, err = steadyOn(ctx, level, s, nil)
		}
		if sol != nil {
			solutions = append(solutions, sol)
		}
		if err != nil {
			return solutions, err
		}
		guess = sol.Temperature
	}
	return solutions, nil
}

// restSpeed is the speed in κ/d below which a state is at rest.
const restSpeed = 1e-3

func (s *Solution) atRest(p *Problem) bool {
	return s.RMSVelocity*p.Grid.Height() < restSpeed*p.diffusivity()
}

// worthCoarsening reports whether to start on a grid of half the cells.
func worthCoarsening(g *staggered.Grid) bool {
	nx, nz := g.Cells()
	return min(nx, nz) > coarseRows
}

// coarsen returns the grid of every second node. Nodes, not cells, are dropped,
// so that a smooth gradation stays one.
func coarsen(g *staggered.Grid) (*staggered.Grid, error) {
	return staggered.NewGrid(everySecond(g.XNodes()), everySecond(g.ZNodes()))
}

// everySecond keeps the ends; an odd last cell joins its neighbour.
func everySecond(nodes []float64) []float64 {
	n := (len(nodes) - 1) / 2
	half := make([]float64, 0, n+1)
	for i := range n {
		half = append(half, nodes[2*i])
	}
	return append(half, nodes[len(nodes)-1])
}

// steadyOn solves on one grid, from a guess or else from the initial state.
func steadyOn(ctx context.Context, p Problem, s SteadySettings, guess *staggered.Scalar) (*Solution, error) {
	if guess == nil {
		return climb(ctx, p, s)
	}
	n, err := newNewtonOn(p, s)
	if err != nil {
		return nil, err
	}
	if err := n.sys.checkGiven("SteadySettings.Guess", guess); err != nil {
		return nil, err
	}
	t := staggered.NewScalar(p.Grid)
	transfer(t, guess)
	return n.solve(ctx, t, false)
}

const (
	// gentle is the growth, per diffusion time, of a start from which no
	// overturn leads past the steady state: some ten times that of onset.
	gentle = 200
	// climbFactor is the largest ratio of one Rayleigh number to the next.
	climbFactor = 4
)

// climb solves from the initial state. A layer far above onset would overturn as
// a whole and forget how it began; so the Rayleigh number starts where the
// initial state grows gently and climbs to its value, a steady state at each
// stage the start of the next.
func climb(ctx context.Context, p Problem, s SteadySettings) (*Solution, error) {
	n, err := newNewtonOn(p, s)
	if err != nil {
		return nil, err
	}
	t, err := n.sys.start(ctx)
	if err != nil {
		return nil, err
	}
	growth, err := n.growth(ctx, t)
	if err != nil {
		return nil, err
	}
	state := t.Clone()
	for share := min(1, gentle/growth); share < 1; share *= climbFactor {
		stage := p
		stage.Rayleigh *= share
		lower, err := newNewtonOn(stage, s)
		if err != nil {
			return nil, err
		}
		sol, err := lower.solve(ctx, state, true)
		if ctx.Err() != nil {
			return sol, err
		}
		// A stage without a steady state is no loss: its last state is as good
		// a start as any. A stage at rest is none.
		if err != nil || sol.atRest(&stage) {
			copy(state.Values, t.Values)
		}
	}
	return n.solve(ctx, state, true)
}

// newNewtonOn returns the search for a steady state of p on its grid.
func newNewtonOn(p Problem, s SteadySettings) (*newton, error) {
	sys, err := newSystem(p, Settings{Stokes: s.Stokes, Heat: &heat.Settings{Advection: heat.Central, Workers: s.Workers}})
	if err != nil {
		return nil, err
	}
	if err := sys.heat.Factor(nil); err != nil {
		// No wall determines the temperature: there is no one steady state.
		return nil, fmt.Errorf("convection: %w", err)
	}
	return newNewton(sys, s)
}
