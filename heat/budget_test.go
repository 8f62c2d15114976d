package heat

import (
	"context"
	"fmt"
	"math"
	"testing"

	"example.org/overturn/stokes/staggered"
	"github.com/stretchr/testify/require"
)

// everyMethod calls f with each combination of schemes.
func everyMethod(t *testing.T, f func(t *testing.T, s Settings)) {
	t.Helper()
	for _, scheme := range []Scheme{RungeKutta3, RungeKutta2, Implicit} {
		for _, advection := range []Advection{Central, Bounded} {
			t.Run(fmt.Sprintf("%v/%v", scheme, advection), func(t *testing.T) {
				f(t, Settings{Scheme: scheme, Advection: advection})
			})
		}
	}
}

// throughFlow enters at the left and the top and leaves elsewhere.
func throughFlow(g *staggered.Grid) *staggered.Flow {
	flow := staggered.NewFlow(g)
	flow.FillFromStream(func(x, z float64) float64 { return 2*z - 3*x*z + 0.7*x + math.Sin(3*x)*math.Sin(2*z) })
	return flow
}

// The change of heat content is the step times the reported power, whatever
// the walls, the flow and the scheme, to 1e-12 of the content.
func TestHeatContentCloses(t *testing.T) {
	type layout struct {
		name        string
		sides, ends string
		graded      bool
		uniformC    bool
		through     bool
	}
	layouts := []layout{
		{"closed", "TT", "TT", true, true, false},
		{"mixed", "FR", "TF", true, true, false},
		{"periodic", "PP", "RT", false, true, false},
		{"insulated", "FF", "FF", false, true, false},
		{"varying capacity", "TF", "RT", true, false, false},
		{"varying capacity, periodic", "PP", "TT", true, false, false},
		{"through flow", "TF", "RT", true, true, true},
		{"through flow, varying capacity", "TR", "FT", true, false, true},
	}
	for _, l := range layouts {
		t.Run(l.name, func(t *testing.T) {
			everyMethod(t, func(t *testing.T, s Settings) {
				m := newManufactured()
				m.sides, m.ends, m.graded = l.sides, l.ends, l.graded
				if l.uniformC {
					m.capacity = constant(1.7)
				}
				s.Workers = 3
				s.Limit = Unenforced
				st, temperature, flow := m.problem(t, 100, &s)
				if l.through {
					flow = throughFlow(st.Grid())
				}
				temperature.Fill(func(x, z float64) float64 { return 2 + math.Sin(5*x)*math.Cos(4*z) })
				dt := math.Min(st.StableStep(flow), 5e-3)
				if dt == 0 {
					dt = 1e-4
				}
				for range 3 {
					before, err := st.HeatContent(temperature)
					require.NoError(t, err)
					rep, err := st.Step(context.Background(), temperature, flow, dt)
					require.NoError(t, err)
					after, err := st.HeatContent(temperature)
					require.NoError(t, err)
					gain := rep.Step * rep.Power()
					require.NotZero(t, gain)
					require.InDelta(t, gain, after-before, 1e-12*math.Abs(before))
					require.Equal(t, l.through, math.Abs(rep.Advected[staggered.Left]) > 1e-3)
					require.Equal(t, l.uniformC, rep.Exchange == 0)
				}
			})
		})
	}
}

// The reported powers are the wall fluxes.
func TestPowersAreWallFluxes(t *testing.T) {
	for _, capacity := range []field{constant(1.7), wavy(2, 0.9, 0.7)} {
		m := newManufactured()
		m.sides, m.ends, m.graded, m.capacity = "TF", "RT", true, capacity
		st, temperature, _ := m.problem(t, 24, nil)
		flow := throughFlow(st.Grid())
		rep, err := st.Step(context.Background(), temperature.Clone(), flow, 1e-12)
		require.NoError(t, err)
		for _, s := range staggered.Sides() {
			all, err := st.WallFluxTo(nil, s, temperature, flow)
			require.NoError(t, err)
			still, err := st.WallFluxTo(nil, s, temperature, nil)
			require.NoError(t, err)
			h := st.Grid().DX()
			if !s.Horizontal() {
				h = st.Grid().DZ()
			}
			var total, conducted float64
			for j := range all {
				total += all[j] * h[j]
				conducted += still[j] * h[j]
			}
			require.InDelta(t, conducted, rep.Conducted[s], 1e-7, "%v", s)
			require.InDelta(t, total-conducted, rep.Advected[s], 1e-7, "%v", s)
			require.NotZero(t, rep.Advected[s], "%v", s)
		}
	}
}

// RateTo sums to the power, and is what a short step does.
func TestRateIsConservativeAndThatOfStep(t *testing.T) {
	for _, advection := range []Advection{Central, Bounded} {
		m := newManufactured()
		m.sides, m.ends, m.graded = "TF", "RT", true
		st, temperature, flow := m.problem(t, 20, &Settings{Advection: advection, Scheme: RungeKutta2})
		g := st.Grid()
		rate := staggered.NewScalar(g)
		require.NoError(t, st.RateTo(rate, temperature, flow))
		const dt = 1e-9
		after := temperature.Clone()
		rep, err := st.Step(context.Background(), after, flow, dt)
		require.NoError(t, err)
		require.InDelta(t, rep.Power(), rate.Integral(), 1e-6*math.Abs(rep.Heating))
		for c, r := range rate.Values {
			x, z := g.XCentres()[c%g.NX()], g.ZCentres()[c/g.NX()]
			capacity, _, _, _ := m.capacity(x, z)
			require.InDelta(t, r, capacity*(after.Values[c]-temperature.Values[c])/dt, 1e-3)
		}
	}
}

// A constant temperature stays constant, in any flow free of divergence.
func TestConstantStaysConstant(t *testing.T) {
	everyMethod(t, func(t *testing.T, s Settings) {
		g, err := staggered.Graded(40, 30, 1, 1, staggered.Grading{Left: 4, Top: 3})
		require.NoError(t, err)
		capacity := staggered.NewScalar(g)
		capacity.Fill(func(x, z float64) float64 { return 1 + x*z })
		for _, c := range []*staggered.Scalar{nil, capacity} {
			st, err := NewStepper(Equation{Grid: g, HeatCapacity: c, Walls: Walls{Left: Isothermal(3), Top: Robin(2, 3)}}, &s)
			require.NoError(t, err)
			flow, temperature := throughFlow(g), staggered.NewScalar(g)
			temperature.SetAll(3)
			for range 5 {
				_, err = st.Step(context.Background(), temperature, flow, st.StableStep(flow))
				require.NoError(t, err)
			}
			for _, v := range temperature.Values {
				require.InDelta(t, 3, v, 1e-12)
			}
		}
	})
}
