package stokes

import (
	"context"
	"errors"
	"fmt"
	"math"
	"time"

	"example.org/overturn/stokes/internal/layered"
	"example.org/overturn/stokes/internal/multigrid"
	"example.org/overturn/stokes/internal/team"
	"example.org/overturn/stokes/staggered"
)

// A Solver finds the flow in a box. Make one with [NewSolver] and use it for
// any number of forces and viscosities on the same grid: it keeps its memory,
// and as long as the viscosity stays the same also what it derived from it.
// Apart from the first, calls of its methods allocate nothing.
//
// A Solver serves one goroutine at a time.
type Solver struct {
	grid     *staggered.Grid
	walls    Walls
	settings Settings
	motion   wallMotion

	mg    *multigrid.Solver
	level *multigrid.Level // the finest of mg

	scale float64 // a power of two that brings viscosities near one
	known bool    // the finest level holds a viscosity
	fresh bool    // and the coarser ones follow it

	direct   *layered.Solver // nil until it is needed
	suits    bool            // the grid and the sides allow direct solution
	layered  bool            // the viscosity does too
	factored bool            // direct holds the factors of this viscosity

	load    load
	history []float64
	watch   func(iteration int, residual float64)
	unit    float64 // residual at rest
}

// NewSolver makes a solver for the grid between walls. It fails when the walls
// contradict each other.
func NewSolver(g *staggered.Grid, walls Walls, s *Settings) (*Solver, error) {
	if g == nil {
		return nil, errors.New("stokes: grid is nil, want a grid")
	}
	settings, err := s.withDefaults()
	if err != nil {
		return nil, err
	}
	if err := walls.check(); err != nil {
		return nil, err
	}
	sv := &Solver{grid: g, walls: walls, settings: settings, scale: 1}
	if sv.motion, err = newWallMotion(g, walls); err != nil {
		return nil, err
	}
	sv.motion.balance(g)
	sv.mg = multigrid.NewSolver(
		multigrid.NewAxis(g.DX(), walls.Left.end(), walls.Right.end()),
		multigrid.NewAxis(g.DZ(), walls.Bottom.end(), walls.Top.end()), team.New(settings.Workers))
	sv.level = sv.mg.Finest()
	sv.suits = layered.Suits(sv.level)
	sv.load = newLoad(sv.level)
	sv.history = make([]float64, 0, settings.MaxIterations+1)
	sv.watch = sv.record
	return sv, nil
}

// end translates a wall for the kernels.
func (w Wall) end() multigrid.End {
	return [...]multigrid.End{multigrid.Slip, multigrid.Stick, multigrid.Wrap}[w.kind]
}

// Grid returns the grid the solver was made for.
func (sv *Solver) Grid() *staggered.Grid { return sv.grid }

// Solve finds velocity and pressure under a body force per volume, given at
// the faces. The flow passed in is the start guess and holds the answer
// afterwards, also when the error is a [*ConvergenceError] or that of the
// context; after any other error it is unchanged. A guess worse than the fluid
// at rest does no harm. A nil viscosity is 1 everywhere, a nil force zero. The
// pressure of the answer has zero mean over the box.
func (sv *Solver) Solve(ctx context.Context, flow *staggered.Flow, viscosity *staggered.Scalar, force *staggered.Vector) (Report, error) {
	return sv.SolveWithSource(ctx, flow, viscosity, force, nil)
}

// SolveWithSource is Solve for a fluid whose volume is not conserved:
// div v = source, per cell, in units of 1/time. The momentum equation stays
// −∇P + div(2ηε) + force = 0 with the full strain rate ε. The integral of the
// source must equal the net outflow through the walls.
func (sv *Solver) SolveWithSource(ctx context.Context, flow *staggered.Flow, viscosity *staggered.Scalar, force *staggered.Vector, source *staggered.Scalar) (Report, error) {
	start := time.Now()
	if err := sv.checkFlow(flow); err != nil {
		return Report{}, err
	}
	if err := sv.checkLoad(force, source); err != nil {
		return Report{}, err
	}
	if err := sv.setViscosity(viscosity); err != nil {
		return Report{}, err
	}
	if err := sv.load.set(sv, force, source); err != nil {
		return Report{}, err
	}
	r, err := sv.iterate(ctx, flow)
	r.Elapsed = time.Since(start)
	return r, err
}

// iterate solves for the loads and viscosity set before.
func (sv *Solver) iterate(ctx context.Context, flow *staggered.Flow) (Report, error) {
	sv.rest()
	rest := sv.mg.Residual(&sv.load)
	if !(max(rest.Weighted, rest.Momentum) <= math.MaxFloat64) {
		return Report{}, errors.New("stokes: the squares of forces or wall velocities overflow, want them in larger units")
	}
	sv.unit = rest.Weighted
	sv.history = sv.history[:0]
	method, err := sv.choose()
	if err != nil {
		return Report{}, err
	}
	if rest.Weighted == 0 || rest.Momentum <= sv.load.noise() && !sv.motion.any() && sv.load.source == nil {
		// In balance at rest, or out of it by no more than rounding.
		sv.store(flow)
		return Report{Method: method}, ctx.Err()
	}
	target := sv.settings.Tolerance * rest.Weighted
	var norms multigrid.Norms
	n := 0
	if method == Transform {
		if norms, n, err = sv.transform(ctx, rest, target); err != nil {
			return Report{}, err
		}
	} else {
		norms = sv.start(flow, rest)
	}
	if sv.settings.Method != Transform && norms.Weighted > target {
		norms, n, err = sv.cycle(ctx, n, target)
	}
	r := Report{
		Method:     method,
		Iterations: n,
		Residuals:  sv.history,
		Residual:   norms.Weighted / rest.Weighted,
		Momentum:   norms.Momentum / rest.Momentum,
		Divergence: norms.Continuity / (sv.scale * math.Sqrt(sv.grid.Area())),
	}
	sv.store(flow)
	if err == nil && !(r.Residual <= sv.settings.Tolerance) {
		err = &ConvergenceError{Iterations: n, Residual: r.Residual, Tolerance: sv.settings.Tolerance}
	}
	return r, err
}

// start takes the flow as the start guess unless the fluid at rest is a
// better one.
func (sv *Solver) start(flow *staggered.Flow, rest multigrid.Norms) multigrid.Norms {
	sv.guess(flow)
	norms := sv.mg.Residual(&sv.load)
	if !(norms.Weighted < rest.Weighted) {
		sv.rest()
		norms = rest
	}
	return norms
}

// cycle iterates with multigrid cycles, after a number of iterations of
// another kind.
func (sv *Solver) cycle(ctx context.Context, done int, target float64) (multigrid.Norms, int, error) {
	if !sv.fresh {
		sv.mg.Refresh()
		sv.fresh = true
	}
	norms, n, err := sv.mg.Solve(ctx, &sv.load, multigrid.Limits{
		Target:     target,
		Iterations: sv.settings.MaxIterations - done,
		Basis:      sv.settings.MaxBasis,
		Watch:      sv.watch,
	})
	return norms, done + n, err
}

func (sv *Solver) record(iteration int, residual float64) {
	residual /= sv.unit
	sv.history = append(sv.history, residual)
	if sv.settings.Monitor != nil {
		sv.settings.Monitor(iteration, residual)
	}
}

// String describes the solver in one line.
func (sv *Solver) String() string {
	return fmt.Sprintf("stokes solver on %v; left %v, right %v, bottom %v, top %v; %d levels",
		sv.grid, sv.walls.Left, sv.walls.Right, sv.walls.Bottom, sv.walls.Top, len(sv.mg.Levels))
}
