package heat_test

import (
	"context"
	"math"
	"testing"

	"example.org/overturn/heat"
	"example.org/overturn/heat/exact"
	"example.org/overturn/stokes/staggered"
	"github.com/stretchr/testify/require"
)

// window is a part of the domain of an exact solution, and a span of time.
type window struct{ left, right, bottom, top, start, end float64 }

// errorOf runs a scheme from the start to the end of the window, with
// walls of the given kinds whose values follow the solution, and returns the
// largest errors of temperature and of wall flux.
func errorOf(t *testing.T, s exact.Solution, w window, n int, bottom string, scheme heat.Scheme) (temperature, flux float64) {
	t.Helper()
	x, z := make([]float64, n/4+1), make([]float64, n+1)
	for i := range x {
		x[i] = (w.right - w.left) * float64(i) / float64(n/4)
	}
	for k := range z { // finer towards the bottom
		u := float64(k) / float64(n)
		z[k] = (w.top - w.bottom) * u * (1 + u) / 2
	}
	g, err := staggered.NewGrid(x, z)
	require.NoError(t, err)
	medium := s.Medium(w.left, w.bottom, w.start)
	k, c, source := staggered.NewScalar(g), staggered.NewScalar(g), staggered.NewScalar(g)
	k.SetAll(medium.Conductivity)
	c.SetAll(medium.HeatCapacity)
	at := func(x, z, time float64) exact.State { return s.At(w.left+x, w.bottom+z, time) }
	walls := func(time float64) heat.Walls {
		held := func(x, z func(s float64) float64) heat.Wall {
			return heat.Profile(func(s float64) float64 { return at(x(s), z(s), time).Temperature })
		}
		fixed := func(v float64) func(float64) float64 { return func(float64) float64 { return v } }
		along := func(s float64) float64 { return s }
		all := heat.Walls{
			Left: held(fixed(0), along), Right: held(fixed(g.Width()), along),
			Bottom: held(along, fixed(0)), Top: held(along, fixed(g.Height())),
		}
		if bottom == "flux" {
			all.Bottom = heat.FluxProfile(func(x float64) float64 { return at(x, 0, time).FluxZ })
		}
		return all
	}
	st, err := heat.NewStepper(heat.Equation{Grid: g, Walls: walls(w.start), Conductivity: k, HeatCapacity: c, Source: source},
		&heat.Settings{Scheme: scheme})
	require.NoError(t, err)
	flow, field := staggered.NewFlow(g), staggered.NewScalar(g)
	field.Fill(func(x, z float64) float64 { return at(x, z, w.start).Temperature })
	flow.FillVelocity(
		func(x, z float64) float64 { return s.Medium(w.left+x, w.bottom+z, w.start).VX },
		func(x, z float64) float64 { return s.Medium(w.left+x, w.bottom+z, w.start).VZ })
	steps := 2 * n
	if scheme != heat.Implicit {
		steps = int((w.end-w.start)/st.StableStep(flow)) + 1
	}
	dt := (w.end - w.start) / float64(steps)
	for j := range steps {
		middle := w.start + (float64(j)+0.5)*dt
		require.NoError(t, st.MoveWalls(walls(w.start+float64(j+1)*dt)))
		source.Fill(func(x, z float64) float64 { return s.Medium(w.left+x, w.bottom+z, middle).Source })
		_, err := st.Step(context.Background(), field, flow, dt)
		require.NoError(t, err)
	}
	for k, z := range g.ZCentres() {
		for i, x := range g.XCentres() {
			temperature = math.Max(temperature, math.Abs(field.At(i, k)-at(x, z, w.end).Temperature))
		}
	}
	q, err := st.WallFluxTo(nil, staggered.Bottom, field, nil)
	require.NoError(t, err)
	for i, x := range g.XCentres() {
		flux = math.Max(flux, math.Abs(q[i]-at(x, 0, w.end).FluxZ))
	}
	return temperature, flux
}

// The exact solutions of the conduction and advection of heat, with walls whose
// temperature or flux changes in time: second order in the cell size and the
// step together.
func TestExactSolutionsConverge(t *testing.T) {
	rock := exact.Material{}
	for name, tt := range map[string]struct {
		solution exact.Solution
		window   window
		bottom   string
		scheme   heat.Scheme
	}{
		"half-space":                 {exact.HalfSpace{Material: rock, Surface: 0, Initial: 1}, window{0, 1, 0, 2, 0.05, 0.25}, "held", heat.Implicit},
		"half-space with flux":       {exact.HalfSpaceFlux{Material: rock, Flux: 1}, window{0, 1, 0, 2, 0.05, 0.25}, "flux", heat.Implicit},
		"half-space, Robin":          {exact.HalfSpaceRobin{Material: rock, Coefficient: 1, Ambient: 1}, window{0, 1, 0, 2, 0.05, 0.25}, "flux", heat.Implicit},
		"periodic surface":           {exact.PeriodicSurface{Material: rock}, window{0, 1, 0, 2, 0, 0.5}, "held", heat.Implicit},
		"periodic surface, explicit": {exact.PeriodicSurface{Material: rock}, window{0, 1, 0, 2, 0, 0.5}, "held", heat.RungeKutta2},
	} {
		t.Run(name, func(t *testing.T) {
			require.NoError(t, tt.solution.Validate())
			coarse, coarseFlux := errorOf(t, tt.solution, tt.window, 32, tt.bottom, tt.scheme)
			fine, fineFlux := errorOf(t, tt.solution, tt.window, 64, tt.bottom, tt.scheme)
			t.Logf("temperature %.2e, %.2e: order %.2f", coarse, fine, math.Log2(coarse/fine))
			require.GreaterOrEqual(t, math.Log2(coarse/fine), 1.85)
			// Implicit steps that grow with the cell size leave a flux of
			// first order where the temperature of the wall changes.
			if tt.bottom == "held" && name != "periodic surface" {
				t.Logf("flux %.2e, %.2e: order %.2f", coarseFlux, fineFlux, math.Log2(coarseFlux/fineFlux))
				require.GreaterOrEqual(t, math.Log2(coarseFlux/fineFlux), 1.85)
			}
		})
	}
}
