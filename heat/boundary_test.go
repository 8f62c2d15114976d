package heat

import (
	"math"
	"testing"

	"example.org/overturn/stokes/staggered"
	"github.com/stretchr/testify/require"
)

// The flux through a wall is the slope, in resistance from the wall, of the
// parabola through three temperatures; the resistance of the first half cell is
// that of the conductivity at its middle, continued by the flatter of the next
// two slopes of its logarithm.
func TestWallFluxIsSlopeOfParabola(t *testing.T) {
	nodes := []float64{0, 0.2, 0.3, 0.7}
	mirrored := []float64{0, 0.4, 0.5, 0.7}
	for name, tt := range map[string]struct {
		k     [3]float64 // from the wall inwards
		slope float64    // of log k next to the wall
	}{
		"exponential":  {[3]float64{math.Exp(0.2), math.Exp(0.5), math.Exp(1)}, 2}, // at 0.1, 0.25, 0.5
		"flattening":   {[3]float64{1, math.Exp(0.3), math.Exp(0.4)}, 0.4},
		"steepening":   {[3]float64{1, math.Exp(-0.15), math.Exp(-1)}, -1},
		"extremum":     {[3]float64{1, 2, 1}, 0},
		"jump at once": {[3]float64{1, 7, 7}, 0},
		"jump behind":  {[3]float64{2, 2, 9}, 0},
		"insulator":    {[3]float64{2, 3, 0}, 0},
	} {
		k := tt.k
		r1 := 0.1 / (k[0] * math.Exp(-0.05*tt.slope))
		r2 := r1 + 0.1/k[0] + 0.05/k[1]
		const wall, t1, t2 = 5.0, 3.0, 2.5
		// The parabola through (0, wall), (r1, t1), (r2, t2).
		slope := (t1-wall)/r1 - ((t2-t1)/(r2-r1)-(t1-wall)/r1)/r2*r1
		for _, side := range staggered.Sides() {
			x, z, reverse := nodes, []float64{0, 1}, false
			if side == staggered.Right || side == staggered.Top {
				x, reverse = mirrored, true
			}
			if side.Horizontal() {
				x, z = z, x
			}
			g, err := staggered.NewGrid(x, z)
			require.NoError(t, err)
			conductivity, temperature := staggered.NewScalar(g), staggered.NewScalar(g)
			for c := range 3 {
				from := c
				if reverse {
					from = 2 - c
				}
				conductivity.Values[c] = k[from]
				temperature.Values[c] = []float64{t1, t2, -9}[from]
			}
			held := Isothermal(wall)
			st, err := NewStepper(Equation{Grid: g, Conductivity: conductivity, Walls: Walls{held, held, held, held}}, nil)
			require.NoError(t, err)
			q, err := st.WallFluxTo(nil, side, temperature, nil)
			require.NoError(t, err)
			require.InDelta(t, -slope, q[0], 1e-12, "%s, %v", name, side)
		}
	}
}

// Behind a first cell that conducts, one that does not: a straight line to the
// wall. A first cell that does not conduct lets nothing pass.
func TestWallFluxBesideInsulators(t *testing.T) {
	g := uniform(t, 1, 3, 1, 1.5)
	for _, tt := range []struct {
		k    [3]float64
		want float64
	}{
		{[3]float64{2, 0, 1}, 2 * (5 - 3) / 0.25},
		{[3]float64{0, 1, 1}, 0},
	} {
		k, temperature := staggered.NewScalar(g), staggered.NewScalar(g)
		copy(k.Values, tt.k[:])
		copy(temperature.Values, []float64{3, 1, 4})
		for _, wall := range []Wall{Isothermal(5), Robin(1e15, 5)} {
			st, err := NewStepper(Equation{Grid: g, Conductivity: k, Walls: Walls{Bottom: wall}}, nil)
			require.NoError(t, err)
			q, err := st.WallFluxTo(nil, staggered.Bottom, temperature, nil)
			require.NoError(t, err)
			require.InDelta(t, tt.want, q[0], 1e-9)
		}
	}
}

// What flows in brings the temperature of the wall, of the surroundings, or the
// one extrapolated to the wall; what flows out takes the wall's along.
func TestThroughFlowTemperatures(t *testing.T) {
	g := uniform(t, 1, 4, 1, 2)
	temperature := staggered.NewScalar(g)
	copy(temperature.Values, []float64{3, 2, 1.5, 1})
	const h, t1, t2 = 0.5, 3.0, 2.0
	a0, a1, a2 := 8/(3*h), 3/h, 1/(3*h)
	for _, tt := range []struct {
		name     string
		wall     Wall
		in, out  float64
		boundOut float64
	}{
		{"isothermal", Isothermal(3.2), 3.2, 3.2, 3.2},
		{"isothermal, far", Isothermal(5), 5, 5, 4}, // no farther than from the second cell
		{"isothermal, below", Isothermal(1), 1, 1, 3},
		{"Robin", Robin(2, 7), 7, (2*7 + a1*t1 - a2*t2) / (2 + a0), 3},
		{"flux", Flux(1), (1 + a1*t1 - a2*t2) / a0, (1 + a1*t1 - a2*t2) / a0, 3},
		{"insulating", Insulating, (a1*t1 - a2*t2) / a0, (a1*t1 - a2*t2) / a0, 3},
	} {
		for _, advection := range []Advection{Central, Bounded} {
			for _, v := range []float64{2, -2} {
				st, err := NewStepper(Equation{Grid: g, Walls: Walls{Bottom: tt.wall}}, &Settings{Advection: advection})
				require.NoError(t, err)
				flow := staggered.NewFlow(g)
				flow.FillVelocity(func(x, z float64) float64 { return 0 }, func(x, z float64) float64 { return v })
				all, err := st.WallFluxTo(nil, staggered.Bottom, temperature, flow)
				require.NoError(t, err)
				still, err := st.WallFluxTo(nil, staggered.Bottom, temperature, nil)
				require.NoError(t, err)
				want := tt.in
				if v < 0 {
					want = tt.out
					if advection == Bounded {
						want = tt.boundOut
					}
				}
				require.InDelta(t, want, (all[0]-still[0])/v, 1e-12, "%s, %v, v = %g", tt.name, advection, v)
			}
		}
	}
}
