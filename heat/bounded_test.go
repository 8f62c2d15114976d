package heat

import (
	"context"
	"math"
	"math/rand/v2"
	"testing"

	"example.org/overturn/stokes/staggered"
	"github.com/stretchr/testify/require"
)

// frozen returns a conductivity of zero.
func frozen(g *staggered.Grid) *staggered.Scalar { return staggered.NewScalar(g) }

// spin is solid rotation about the centre of the unit square, one turn per unit
// of time. It passes through the walls.
func spin(g *staggered.Grid) *staggered.Flow {
	flow := staggered.NewFlow(g)
	flow.FillFromStream(func(x, z float64) float64 {
		return -math.Pi * ((x-0.5)*(x-0.5) + (z-0.5)*(z-0.5))
	})
	return flow
}

// notchedCylinder is the shape of Zalesak (1979): a disc of radius 0.15 about
// (0.5, 0.75) with a slot of width 0.05 up to 0.85.
func notchedCylinder(x, z float64) float64 {
	if math.Hypot(x-0.5, z-0.75) <= 0.15 && !(math.Abs(x-0.5) < 0.025 && z < 0.85) {
		return 1
	}
	return 0
}

// turn carries a temperature through one turn and returns its largest and
// smallest value on the way.
func turn(t *testing.T, st *Stepper, temperature *staggered.Scalar, flow *staggered.Flow, time float64) (low, high float64) {
	t.Helper()
	steps := int(math.Ceil(time / st.StableStep(flow)))
	low, high = math.Inf(1), math.Inf(-1)
	for range steps {
		_, err := st.Step(context.Background(), temperature, flow, time/float64(steps))
		require.NoError(t, err)
		for _, v := range temperature.Values {
			low, high = math.Min(low, v), math.Max(high, v)
		}
	}
	return low, high
}

// The notched cylinder keeps its bounds to rounding through a turn, on uniform
// and graded grids; the error falls with the cell size.
func TestBoundedKeepsNotchedCylinderInBounds(t *testing.T) {
	if testing.Short() {
		t.Skip("takes seconds")
	}
	for scheme, grading := range map[Scheme]staggered.Grading{
		RungeKutta2: {}, RungeKutta3: {Left: 3, Bottom: 2, Top: 4},
	} {
		t.Run(scheme.String(), func(t *testing.T) {
			g, err := staggered.Graded(100, 100, 1, 1, grading)
			require.NoError(t, err)
			st, err := NewStepper(Equation{
				Grid: g, Conductivity: frozen(g),
				Walls: Walls{Left: Isothermal(0), Right: Isothermal(0), Bottom: Isothermal(0)},
			}, &Settings{Advection: Bounded, Scheme: scheme})
			require.NoError(t, err)
			temperature := staggered.NewScalar(g)
			temperature.Fill(notchedCylinder)
			start := temperature.Clone()
			low, high := turn(t, st, temperature, spin(g), 1)
			t.Logf("%v, %v: %.3g to 1%+.3g", scheme, grading, low, high-1)
			require.GreaterOrEqual(t, low, -1e-13)
			require.LessOrEqual(t, high, 1+1e-13)
			_, mean := differences(temperature.Values, start.Values)
			t.Logf("mean error %.4f of %.4f", mean, start.Mean())
			require.Less(t, mean, 0.45*start.Mean())
			require.Greater(t, high, 0.9)
		})
	}
}

// Noise keeps within its bounds too, next to every kind of wall, with diffusion
// and the flow of a closed box or through its walls.
func TestBoundedKeepsNoiseInBounds(t *testing.T) {
	for name, walls := range map[string]Walls{
		"isothermal": {Left: Isothermal(0.2), Right: Isothermal(1), Bottom: Isothermal(0), Top: Isothermal(0.5)},
		"insulated":  {},
		"periodic":   {Left: Periodic, Right: Periodic, Top: Isothermal(1)},
		"Robin":      {Left: Robin(3, 0.5), Bottom: Robin(1e3, 1), Top: Robin(0.1, 0)},
	} {
		for _, conductivity := range []float64{0, 1e-3, 1} {
			for _, through := range []bool{false, true} {
				g, err := staggered.Graded(33, 27, 1, 1, staggered.Grading{Bottom: 3})
				require.NoError(t, err)
				k := staggered.NewScalar(g)
				k.SetAll(conductivity)
				st, err := NewStepper(Equation{Grid: g, Walls: walls, Conductivity: k}, &Settings{Advection: Bounded})
				require.NoError(t, err)
				flow := staggered.NewFlow(g)
				flow.FillFromStream(func(x, z float64) float64 {
					if through {
						return 3 * z * math.Cos(5*x)
					}
					return 30 * math.Sin(2*math.Pi*x) * math.Sin(3*math.Pi*z)
				})
				if through && name == "periodic" {
					continue
				}
				r := rand.New(rand.NewPCG(1, 2))
				temperature := staggered.NewScalar(g)
				for c := range temperature.Values {
					temperature.Values[c] = float64(r.IntN(2))
				}
				// A wall that a fluid of unknown temperature enters by
				// may extrapolate: it is not covered.
				if through && name == "insulated" {
					continue
				}
				for range 40 {
					_, err := st.Step(context.Background(), temperature, flow, st.StableStep(flow))
					require.NoError(t, err)
					for c, v := range temperature.Values {
						if !(v >= -1e-13 && v <= 1+1e-13) {
							t.Fatalf("%s, k = %g, through = %v: %v at %d", name, conductivity, through, v, c)
						}
					}
				}
			}
		}
	}
}

// A smooth hill on its way round: second order in the mean.
func TestBoundedIsSecondOrderInTheMean(t *testing.T) {
	if testing.Short() {
		t.Skip("takes seconds")
	}
	for _, grading := range []staggered.Grading{{}, {Left: 2, Top: 2}} {
		for _, scheme := range []Scheme{RungeKutta2} {
			var errs []float64
			for _, n := range []int{32, 64, 128} {
				g, err := staggered.Graded(n, n, 1, 1, grading)
				require.NoError(t, err)
				st, err := NewStepper(Equation{Grid: g, Conductivity: frozen(g)}, &Settings{Advection: Bounded, Scheme: scheme})
				require.NoError(t, err)
				hill := func(x, z float64) float64 {
					return math.Exp(-((x-0.5)*(x-0.5) + (z-0.65)*(z-0.65)) / 0.015)
				}
				temperature, exact := staggered.NewScalar(g), staggered.NewScalar(g)
				temperature.Fill(hill)
				turn(t, st, temperature, spin(g), 0.25)
				exact.Fill(func(x, z float64) float64 { return hill(z, 1-x) })
				_, mean := differences(temperature.Values, exact.Values)
				errs = append(errs, mean)
			}
			requireOrder(t, scheme.String(), 1.9, errs)
		}
	}
}
