package heattest_test

import (
	"context"
	"testing"

	"example.org/overturn/heat"
	"example.org/overturn/heat/exact"
	"example.org/overturn/heat/heattest"
	"example.org/overturn/stokes/staggered"
	"github.com/stretchr/testify/require"
)

// An adapter of our solver. Plant changes the problem before it is solved,
// spoil the temperature after each step: the tests' bugs.
type adapter struct {
	settings heat.Settings
	plant    func(eq *heat.Equation, flow *staggered.Flow)
	spoil    func(temperature *staggered.Scalar)
}

func (a adapter) solve(ctx context.Context, p heattest.Problem) (heattest.Answer, error) {
	g, err := staggered.NewGrid(p.X, p.Z)
	if err != nil {
		return heattest.Answer{}, err
	}
	k, c, source := staggered.NewScalar(g), staggered.NewScalar(g), staggered.NewScalar(g)
	k.Fill(p.Conductivity)
	c.Fill(p.HeatCapacity)
	source.Fill(p.SourceAt(0))
	flow, temperature := staggered.NewFlow(g), staggered.NewScalar(g)
	flow.VX, flow.VZ = p.FaceFlow()
	temperature.Fill(p.Initial)
	eq := heat.Equation{Grid: g, Walls: walls(p, 0), Conductivity: k, HeatCapacity: c, Source: source}
	if a.plant != nil {
		a.plant(&eq, flow)
	}
	a.settings.Workers = 1
	st, err := heat.NewStepper(eq, &a.settings)
	if err != nil {
		return heattest.Answer{}, err
	}
	budget := heattest.Budget{}
	if p.Steady() {
		rep, err := st.Steady(ctx, temperature, flow)
		if err != nil {
			return heattest.Answer{}, err
		}
		budget.Gained = rep.Power()
	} else if budget, err = a.march(ctx, p, st, source, temperature, flow); err != nil {
		return heattest.Answer{}, err
	}
	answer := heattest.Answer{Temperature: heattest.Lattice(p.XCentres(), p.ZCentres(), temperature.Values), Budget: &budget}
	for _, side := range staggered.Sides() {
		q, err := st.WallFluxTo(nil, side, temperature, nil)
		if err != nil {
			return heattest.Answer{}, err
		}
		s := p.ZCentres()
		if side.Horizontal() {
			s = p.XCentres()
		}
		answer.Flux[side] = heattest.Profile(s, q)
	}
	return answer, nil
}

// march takes the time steps.
func (a adapter) march(ctx context.Context, p heattest.Problem, st *heat.Stepper, source, temperature *staggered.Scalar, flow *staggered.Flow) (b heattest.Budget, err error) {
	steps := max(p.Steps, int(p.Duration/st.StableStep(flow))+1)
	dt := p.Duration / float64(steps)
	if b.Before, err = st.HeatContent(temperature); err != nil {
		return b, err
	}
	for j := range steps {
		source.Fill(p.SourceAt((float64(j) + 0.5) * dt))
		if err := st.MoveWalls(walls(p, float64(j+1)*dt)); err != nil {
			return b, err
		}
		rep, err := st.Step(ctx, temperature, flow, dt)
		if err != nil {
			return b, err
		}
		if a.spoil != nil {
			a.spoil(temperature)
		}
		b.Gained += rep.Power() * rep.Step
	}
	b.After, err = st.HeatContent(temperature)
	return b, err
}

// walls translates the conditions on the sides at a time.
func walls(p heattest.Problem, t float64) heat.Walls {
	wall := func(kind exact.Wall, side exact.Side) heat.Wall {
		value := func(s float64) float64 { return p.WallValue(side, s, t) }
		switch kind {
		case exact.Isothermal:
			return heat.Profile(value)
		case exact.Flux:
			return heat.FluxProfile(value)
		case exact.Robin:
			return heat.RobinProfile(p.Transfer, value)
		case exact.Periodic:
			return heat.Periodic
		}
		return heat.Insulating
	}
	return heat.Walls{
		Left: wall(p.Walls.Left, exact.Left), Right: wall(p.Walls.Right, exact.Right),
		Bottom: wall(p.Walls.Bottom, exact.Bottom), Top: wall(p.Walls.Top, exact.Top),
	}
}

func TestOurSolverConforms(t *testing.T) {
	r, err := heattest.Run(t.Context(), adapter{settings: heat.Settings{Scheme: heat.Implicit}}.solve, nil)
	require.NoError(t, err)
	t.Logf("\n%v", r)
	for _, res := range r.Results {
		t.Log(res)
	}
	require.NoError(t, r.Err())
}
