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

// ours solves with implicit conduction.
func ours(ctx context.Context, p heattest.Problem) (heattest.Answer, error) {
	return adapter{settings: heat.Settings{Scheme: heat.Implicit}}.solve(ctx, p)
}

// implicitly says of what order our implicit scheme is: it documents a flux of
// first order through walls whose temperature changes.
func implicitly(c exact.Case) heattest.Orders {
	o := heattest.Expected(c)
	for side, kind := range [4]exact.Wall{c.Walls.Left, c.Walls.Right, c.Walls.Bottom, c.Walls.Top} {
		for _, s := range []float64{0.1, 0.3} {
			side := exact.Side(side)
			if kind == exact.Isothermal && c.WallAt(side, s, c.Start) != c.WallAt(side, s, c.End) {
				o.Flux = min(o.Flux, 1)
			}
		}
	}
	return o
}

func TestOurImplicitSchemeConforms(t *testing.T) {
	set := &heattest.Settings{Expect: implicitly}
	if testing.Short() {
		set.Cells = []int{12, 24}
		set.Slack = 0.4
		set.Cases = cases(t, "slab", "throughflow", "geotherm", "box mode", "manufactured, mixed", "manufactured, periodic")
	}
	r, err := heattest.Run(t.Context(), ours, set)
	require.NoError(t, err)
	t.Logf("\n%v", r)
	require.NoError(t, r.Err())
	if !testing.Short() {
		require.Len(t, r.Results, len(exact.All()))
	}
	for _, res := range r.Results {
		require.NoError(t, res.Skipped)
		require.GreaterOrEqual(t, len(res.Checks), 6, res.Name)
	}
}

// The explicit schemes have the full order of the flux, too.
func TestOurExplicitSchemesConform(t *testing.T) {
	if testing.Short() {
		t.Skip("takes seconds")
	}
	solve := adapter{settings: heat.Settings{Scheme: heat.RungeKutta3}}.solve
	for _, set := range []heattest.Settings{
		{Cells: []int{5, 10, 20}, Cases: cases(t, "periodic surface", "manufactured, mixed")},
		{Cells: []int{16, 32, 64}, Cases: cases(t, "gaussian in rotation", "gaussian in shear")},
	} {
		r, err := heattest.Run(t.Context(), solve, &set)
		require.NoError(t, err)
		t.Logf("\n%v", r)
		require.NoError(t, r.Err())
	}
}

// The bounded scheme makes no new extrema at all.
func TestOurBoundedSchemeKeepsTheMaximumPrinciple(t *testing.T) {
	strict := heattest.Settings{Cells: []int{12, 24}, Slack: 1, Overshoot: 1e-12, Cases: cases(t, "gaussian in rotation", "gaussian in shear")}
	bounded := adapter{settings: heat.Settings{Advection: heat.Bounded}}.solve
	require.NoError(t, heattest.Check(t.Context(), bounded, &strict))
	central := adapter{}.solve
	require.ErrorContains(t, heattest.Check(t.Context(), central, &strict), "gaussian in rotation: maximum principle")
}

func TestOurSolverConformsOnStretchedGrids(t *testing.T) {
	if testing.Short() {
		t.Skip("takes seconds")
	}
	r, err := heattest.Run(t.Context(), ours, &heattest.Settings{Cells: []int{24, 48}, Stretch: 4, Slack: 0.5, Expect: implicitly,
		Cases: cases(t, "layers", "hot top", "throughflow", "manufactured, isothermal", "manufactured, periodic")})
	require.NoError(t, err)
	t.Logf("\n%v", r)
	require.NoError(t, r.Err())
}

// cases picks exact solutions by name.
func cases(t testing.TB, names ...string) []exact.Case {
	t.Helper()
	var list []exact.Case
	for _, name := range names {
		n := len(list)
		for _, c := range exact.All() {
			if c.Name == name {
				list = append(list, c)
			}
		}
		require.Len(t, list, n+1, name)
	}
	return list
}
