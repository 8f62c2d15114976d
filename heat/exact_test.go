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

// window is a part of the domain of an exact solution, and a span of time. In
// a plane one the solution depends on x.
type window struct {
	left, right, bottom, top, start, end float64
	plane                                bool
}

// errorOf runs a scheme from the start to the end of the window, with
// walls of the given kinds whose values follow the solution, and returns the
// largest error of the temperature and that of the flux in the middle of the
// bottom.
func errorOf(t *testing.T, s exact.Solution, w window, n int, bottom string, scheme heat.Scheme) (temperature, flux float64) {
	t.Helper()
	x, z := make([]float64, n/2+1), make([]float64, n+1)
	for i := range x {
		x[i] = (w.right - w.left) * float64(i) / float64(n/2)
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
			Left: heat.Periodic, Right: heat.Periodic,
			Bottom: held(along, fixed(0)), Top: held(along, fixed(g.Height())),
		}
		if w.plane {
			all.Left, all.Right = held(fixed(0), along), held(fixed(g.Width()), along)
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
	steps := max(2*n, int((w.end-w.start)/st.StableStep(flow))+1)
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
	middle := len(q) / 2
	return temperature, math.Abs(q[middle] - at(g.XCentres()[middle], 0, w.end).FluxZ)
}

// The exact solutions of the conduction and advection of heat, with walls whose
// temperature or flux changes in time: second order in the cell size and the
// step together.
func TestExactSolutionsConverge(t *testing.T) {
	if testing.Short() {
		t.Skip("takes seconds")
	}
	rock, weak := exact.Material{}, exact.Material{Conductivity: 0.02}
	for name, tt := range map[string]struct {
		solution exact.Solution
		window   window
		bottom   string
		scheme   heat.Scheme
	}{
		"half-space":                 {exact.HalfSpace{Material: rock, Surface: 0, Initial: 1}, window{0, 1, 0, 2, 0.05, 0.25, false}, "held", heat.Implicit},
		"half-space with flux":       {exact.HalfSpaceFlux{Material: rock, Flux: 1}, window{0, 1, 0, 2, 0.05, 0.25, false}, "flux", heat.Implicit},
		"half-space, Robin":          {exact.HalfSpaceRobin{Material: rock, Coefficient: 1, Ambient: 1}, window{0, 1, 0, 2, 0.05, 0.25, false}, "flux", heat.Implicit},
		"periodic surface":           {exact.PeriodicSurface{Material: rock}, window{0, 1, 0, 2, 0, 0.5, true}, "held", heat.Implicit},
		"slab":                       {exact.Slab{Initial: 1, High: 0.5, Source: 2}, window{0, 1, 0, 1, 0.02, 0.1, true}, "held", heat.Implicit},
		"insulated slab":             {exact.SlabInsulated{Initial: 1, Source: 1}, window{0, 1, 0, 1, 0.02, 0.1, true}, "held", heat.Implicit},
		"Robin slab":                 {exact.SlabRobin{Initial: 1}, window{0, 1, 0, 1, 0.05, 0.25, true}, "flux", heat.Implicit},
		"carried spot":               {exact.Gaussian{Material: weak, Width: 0.15, VX: 1, VZ: 0.5}, window{-0.5, 1, -0.6, 0.9, 0, 0.4, true}, "held", heat.Implicit},
		"turning spot":               {exact.GaussianRotation{Material: weak, Width: 0.2, X: 0.3, Rate: 3}, window{-0.8, 0.7, -0.7, 0.8, 0, 0.4, true}, "held", heat.Implicit},
		"sheared spot":               {exact.GaussianShear{Material: weak, Width: 0.15, Rate: 2}, window{-0.7, 0.8, -0.6, 0.7, 0, 0.4, true}, "held", heat.Implicit},
		"line source":                {exact.LineSource{X: 0.1, Z: 0.2}, window{-0.5, 0.9, 0, 1, 0.05, 0.15, true}, "held", heat.Implicit},
		"inflow":                     {exact.Inflow{Material: weak, Velocity: 1, Surface: 1}, window{0, 1, 0, 1, 0.2, 0.6, false}, "held", heat.Implicit},
		"through flow":               {exact.Throughflow{Velocity: 5, High: 1}, window{0, 1, 0, 1, 0, 0.5, false}, "held", heat.Implicit},
		"through flow, down":         {exact.Throughflow{Velocity: -5, High: 1}, window{0, 1, 0, 1, 0, 0.5, false}, "held", heat.Implicit},
		"upflow":                     {exact.Upflow{Speed: 4, Deep: 1}, window{0, 1, 0, 1, 0, 0.5, false}, "held", heat.Implicit},
		"stagnation flow":            {exact.StagnationFlow{Rate: 3, Far: 1}, window{0, 1, 0, 1, 0, 0.5, true}, "held", heat.Implicit},
		"periodic surface, explicit": {exact.PeriodicSurface{Material: rock}, window{0, 1, 0, 2, 0, 0.5, false}, "held", heat.RungeKutta2},
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
				require.GreaterOrEqual(t, math.Log2(coarseFlux/fineFlux), 1.8)
			}
		})
	}
}
