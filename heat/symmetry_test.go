package heat

import (
	"context"
	"math"
	"strings"
	"testing"

	"example.org/overturn/stokes/staggered"
	"github.com/stretchr/testify/require"
)

// image is a way to look at the same problem: a map of coordinates, of walls
// and of the stream function.
type image struct {
	name   string
	size   func(nx, nz int) (int, int)
	point  func(x, z float64) (float64, float64) // of the image to the original, unit square
	walls  func(w Walls) Walls
	stream float64
}

var images = []image{
	{"mirrored in x", func(nx, nz int) (int, int) { return nx, nz },
		func(x, z float64) (float64, float64) { return 1 - x, z },
		func(w Walls) Walls { w.Left, w.Right = w.Right, w.Left; return w }, -1},
	{"mirrored in z", func(nx, nz int) (int, int) { return nx, nz },
		func(x, z float64) (float64, float64) { return x, 1 - z },
		func(w Walls) Walls { w.Bottom, w.Top = w.Top, w.Bottom; return w }, -1},
	{"transposed", func(nx, nz int) (int, int) { return nz, nx },
		func(x, z float64) (float64, float64) { return z, x },
		func(w Walls) Walls { return Walls{Left: w.Bottom, Right: w.Top, Bottom: w.Left, Top: w.Right} }, -1},
}

// lookAt sets up the same problem under an image; nil is the original. A plain
// one has constant properties.
func lookAt(t *testing.T, im *image, s Settings, plain bool) (*Stepper, *staggered.Scalar, *staggered.Flow) {
	t.Helper()
	nx, nz := 32, 16
	point := func(x, z float64) (float64, float64) { return x, z }
	walls := Walls{Left: Isothermal(1), Right: Flux(0.5), Bottom: Robin(2, 0.25), Top: Isothermal(0)}
	sign := 1.0
	if im != nil {
		nx, nz = im.size(nx, nz)
		point, walls, sign = im.point, im.walls(walls), im.stream
	}
	g, err := staggered.Uniform(nx, nz, 1, 1)
	require.NoError(t, err)
	fill := func(f func(x, z float64) float64) *staggered.Scalar {
		v := staggered.NewScalar(g)
		v.Fill(func(x, z float64) float64 { return f(point(x, z)) })
		return v
	}
	eq := Equation{Grid: g, Walls: walls}
	if !plain {
		eq.Conductivity = fill(func(x, z float64) float64 { return 1 + x*x + z })
		eq.HeatCapacity = fill(func(x, z float64) float64 { return 2 - x*z })
		eq.Source = fill(func(x, z float64) float64 { return x - z*z })
	}
	st, err := NewStepper(eq, &s)
	require.NoError(t, err)
	flow := staggered.NewFlow(g)
	flow.FillFromStream(func(x, z float64) float64 {
		x, z = point(x, z)
		return sign * 20 * x * (1 - x) * (1 - x) * z * z * (1 - z)
	})
	temperature := fill(func(x, z float64) float64 { return math.Floor(4*x*x+3*z) / 4 })
	return st, temperature, flow
}

func TestImagesOfAProblemHaveImagesOfTheAnswer(t *testing.T) {
	for _, im := range images {
		t.Run(im.name, func(t *testing.T) {
			everyMethod(t, func(t *testing.T, s Settings) {
				s.Limit = Unenforced
				for _, plain := range []bool{false, true} {
					one, a, flow := lookAt(t, nil, s, plain)
					other, b, flowB := lookAt(t, &im, s, plain)
					dt := 1e-4
					tolerance := 1e-13
					if s.Scheme == Implicit && im.name == "transposed" {
						tolerance = 1e-4 // the directions are factored in one order
					}
					integrate(t, one, a, flow, 5*dt, 5)
					integrate(t, other, b, flowB, 5*dt, 5)
					g := b.Grid
					for k, z := range g.ZCentres() {
						for i, x := range g.XCentres() {
							px, pz := im.point(x, z)
							require.InDelta(t, a.ValueAt(px, pz), b.At(i, k), tolerance)
						}
					}
				}
			})
		})
	}
}

// Units of length, time and temperature that differ by powers of two change
// numbers by powers of two, to the bit.
func TestPowersOfTwoScaleToTheBit(t *testing.T) {
	const length, time, degree = 8, 0.25, 1024
	everyMethod(t, func(t *testing.T, s Settings) {
		run := func(l, tau, deg float64) *staggered.Scalar {
			g, err := staggered.Uniform(16, 8, l, l)
			require.NoError(t, err)
			k := staggered.NewScalar(g)
			k.Fill(func(x, z float64) float64 { return (1 + x*z/(l*l)) * l * l / tau })
			q := deg * l / tau
			st, err := NewStepper(Equation{
				Grid: g, Conductivity: k,
				Walls: Walls{Left: Isothermal(deg), Right: Flux(q), Bottom: Robin(l/tau, deg/2)},
			}, &s)
			require.NoError(t, err)
			flow := staggered.NewFlow(g)
			flow.FillFromStream(func(x, z float64) float64 {
				x, z = x/l, z/l
				return x * (1 - x) * z * (1 - z) * 8 * l * l / tau
			})
			temperature := staggered.NewScalar(g)
			temperature.Fill(func(x, z float64) float64 { return deg * (1 + x/l) * z / l })
			for range 3 {
				_, err := st.Step(context.Background(), temperature, flow, tau/4096)
				require.NoError(t, err)
			}
			return temperature
		}
		want, got := run(1, 1, 1), run(length, time, degree)
		for c := range want.Values {
			want.Values[c] *= degree
		}
		requireSameBits(t, want.Values, got.Values)
	})
}

func requireSameBits(t *testing.T, want, got []float64) {
	t.Helper()
	require.Len(t, got, len(want))
	for c, v := range want {
		if math.Float64bits(v) != math.Float64bits(got[c]) {
			t.Fatalf("cell %d: %v, want %v to the bit", c, got[c], v)
		}
	}
}

func TestWorkersDoNotChangeBits(t *testing.T) {
	for _, sides := range []string{"PP", "TF", "even PP", "even TF"} {
		everyMethod(t, func(t *testing.T, s Settings) {
			run := func(workers int) ([]float64, Report) {
				m := newManufactured()
				even := strings.HasPrefix(sides, "even")
				m.sides, m.graded = sides[len(sides)-2:], !even
				s.Workers = workers
				if even { // equal cells, constant properties, no source
					m.conductivity, m.capacity = constant(1.3), constant(1)
				}
				st, temperature, flow := m.problem(t, 110, &s)
				if even {
					st.source = nil
				}
				temperature.Fill(func(x, z float64) float64 { return math.Sin(9 * x * z) })
				dt := st.StableStep(flow)
				var rep Report
				for range 2 {
					var err error
					rep, err = st.Step(context.Background(), temperature, flow, dt)
					require.NoError(t, err)
				}
				steady := temperature.Clone()
				if s.Advection == Central && s.Scheme == Implicit {
					_, err := st.Steady(context.Background(), steady, flow)
					require.NoError(t, err)
				}
				return append(temperature.Values, steady.Values...), rep
			}
			want, wantReport := run(1)
			counts := []int{2, 3, 7}
			if testing.Short() {
				counts = counts[1:2]
			}
			for _, workers := range counts {
				got, report := run(workers)
				require.Equal(t, wantReport, report)
				requireSameBits(t, want, got)
			}
		})
	}
}

func TestStepAllocatesNothing(t *testing.T) {
	everyMethod(t, func(t *testing.T, s Settings) {
		m := newManufactured()
		s.Workers = 2
		st, temperature, flow := m.problem(t, 100, &s)
		dt, ctx := st.StableStep(flow), context.Background()
		require.Zero(t, testing.AllocsPerRun(5, func() {
			_, err := st.Step(ctx, temperature, flow, dt)
			require.NoError(t, err)
		}))
	})
}

func TestOperatorAllocatesNothing(t *testing.T) {
	for _, advection := range []Advection{Central, Bounded} {
		m := newManufactured()
		st, temperature, flow := m.problem(t, 32, &Settings{Advection: advection})
		rate, flux := temperature.Clone(), make([]float64, 40)
		require.NoError(t, st.Factor(flow))
		require.Zero(t, testing.AllocsPerRun(10, func() {
			require.NoError(t, st.RateTo(rate, temperature, flow))
			require.NoError(t, st.SolveTo(rate, rate))
			_, err := st.WallFluxTo(flux, staggered.Top, temperature, flow)
			require.NoError(t, err)
			_, err = st.CornerFluxes(temperature)
			require.NoError(t, err)
		}))
	}
}
