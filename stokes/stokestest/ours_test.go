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
	plant    func(sv *staggered.Grid, eta *staggered.Scalar, force *staggered.Vector)
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
		a.plant(g, eta, force)
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
	r, err := stokestest.Run(t.Context(), ours, nil)
	require.NoError(t, err)
	t.Logf("\n%v", r)
	for _, res := range r.Results {
		t.Log(res)
	}
	require.NoError(t, r.Err())
}
