package stokestest_test

import (
	"context"
	"testing"

	"example.org/overturn/stokes"
	"example.org/overturn/stokes/exact"
	"example.org/overturn/stokes/staggered"
	"example.org/overturn/stokes/stokestest"
	"github.com/stretchr/testify/require"
)

// Ours adapts the solver of package stokes.
func ours(ctx context.Context, p stokestest.Problem) (stokestest.Answer, error) {
	return adapter{}.solve(ctx, p)
}

// An adapter of our solver. Plant changes the problem before it is solved,
// spoil the answer afterwards: the tests' bugs.
type adapter struct {
	settings stokes.Settings
	plant    func(eta *staggered.Scalar, force *staggered.Vector)
	spoil    func(flow *staggered.Flow)
}

func (a adapter) solve(ctx context.Context, p stokestest.Problem) (stokestest.Answer, error) {
	g, err := staggered.NewGrid(p.X, p.Z)
	if err != nil {
		return stokestest.Answer{}, err
	}
	a.settings.Workers = 1
	if a.settings.Tolerance == 0 {
		a.settings.Tolerance = 1e-10
	}
	sv, err := stokes.NewSolver(g, walls(p), &a.settings)
	if err != nil {
		return stokestest.Answer{}, err
	}
	flow, eta, force := staggered.NewFlow(g), staggered.NewScalar(g), staggered.NewVector(g)
	eta.Fill(p.Viscosity)
	force.Fill(p.ForceX, p.ForceZ)
	if a.plant != nil {
		a.plant(eta, force)
	}
	if _, err := sv.Solve(ctx, flow, eta, force); err != nil {
		return stokestest.Answer{}, err
	}
	if a.spoil != nil {
		a.spoil(flow)
	}
	stress := stokes.NewTensor(g)
	if err := sv.StressTo(stress, flow, eta); err != nil {
		return stokestest.Answer{}, err
	}
	dissipation, err := sv.DissipationTo(nil, flow, eta)
	xc, zc := p.XCentres(), p.ZCentres()
	return stokestest.Answer{
		VX: stokestest.Lattice(p.X, zc, flow.VX), VZ: stokestest.Lattice(xc, p.Z, flow.VZ), P: stokestest.Lattice(xc, zc, flow.P),
		XX: stokestest.Lattice(xc, zc, stress.XX.Values), ZZ: stokestest.Lattice(xc, zc, stress.ZZ.Values),
		XZ:   stokestest.Lattice(p.X, p.Z, stress.XZ.Values),
		Work: force.Dot(flow.Velocity()), Dissipation: dissipation,
	}, err
}

// walls translates the conditions on the sides.
func walls(p stokestest.Problem) stokes.Walls {
	width, height := p.Size()
	vx := func(x, z float64) float64 { v, _ := p.WallVelocity(x, z); return v }
	vz := func(x, z float64) float64 { _, v := p.WallVelocity(x, z); return v }
	along := func(at float64, v func(x, z float64) float64) func(float64) float64 {
		return func(x float64) float64 { return v(x, at) }
	}
	up := func(at float64, v func(x, z float64) float64) func(float64) float64 {
		return func(z float64) float64 { return v(at, z) }
	}
	wall := func(kind exact.Wall, tangential, normal func(float64) float64) stokes.Wall {
		switch kind {
		case exact.NoSlip:
			return stokes.NoSlip
		case exact.Driven:
			return stokes.NoSlip.Moving(tangential).Through(normal)
		case exact.Periodic:
			return stokes.Periodic
		}
		return stokes.FreeSlip
	}
	return stokes.Walls{
		Left:   wall(p.Walls.Left, up(0, vz), up(0, vx)),
		Right:  wall(p.Walls.Right, up(width, vz), up(width, vx)),
		Bottom: wall(p.Walls.Bottom, along(0, vx), along(0, vz)),
		Top:    wall(p.Walls.Top, along(height, vx), along(height, vz)),
	}
}

func TestOurSolverConforms(t *testing.T) {
	set := &stokestest.Settings{}
	if testing.Short() {
		set.Cells, set.Slack = []int{16, 32}, 0.4
		set.Cases = cases(t, "box mode", "column jump", "channel", "film on a slope", "manufactured, no slip", "manufactured, periodic")
	}
	r, err := stokestest.Run(t.Context(), ours, set)
	require.NoError(t, err)
	t.Logf("\n%v", r)
	require.NoError(t, r.Err())
	if !testing.Short() {
		require.Len(t, r.Results, len(exact.All()))
	}
	for _, res := range r.Results {
		require.NoError(t, res.Skipped)
		require.GreaterOrEqual(t, len(res.Checks), 4, res.Name)
	}
}

// Where no wall drags and the viscosity is smooth, stress has the full order.
func TestOurStressIsSecondOrderBetweenFreeSlipWalls(t *testing.T) {
	err := stokestest.Check(t.Context(), ours, &stokestest.Settings{
		Cases:  cases(t, "box mode", "exponential viscosity", "manufactured, free slip"),
		Cells:  []int{24, 48},
		Slack:  0.1,
		Expect: func(exact.Case) stokestest.Orders { return stokestest.Orders{Velocity: 2, Pressure: 2, Stress: 2} },
	})
	require.NoError(t, err)
}

func TestOurSolverConformsOnStretchedGrids(t *testing.T) {
	if testing.Short() {
		t.Skip("takes seconds")
	}
	r, err := stokestest.Run(t.Context(), ours, &stokestest.Settings{Cells: []int{24, 48}, Stretch: 4, Slack: 0.4,
		Cases: cases(t, "box mode", "columns", "layers", "exponential viscosity between plates", "spreading plates", "manufactured, no slip", "manufactured, periodic")})
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
