package heat

import (
	"context"
	"math"
	"testing"

	"example.org/overturn/stokes/staggered"
	"github.com/stretchr/testify/require"
)

// The expected values of this file were evaluated from the classical series with
// 40-digit arithmetic and are good to 12 digits; section numbers of Carslaw &
// Jaeger (1959) are from memory. Each test compares on two grids and asks that
// the error fall at second order towards the value and end up small.

// approach asks that the values on grids of doubling resolution approach want at
// second order at least: the ratio of errors is four or more.
func approach(t *testing.T, want, relative float64, values ...float64) {
	t.Helper()
	n := len(values)
	coarse, fine := math.Abs(values[n-2]-want), math.Abs(values[n-1]-want)
	t.Logf("%.8f, want %.8f: order %.2f", values, want, math.Log2(coarse/fine))
	require.GreaterOrEqual(t, math.Log2(coarse/fine), 1.75)
	require.InEpsilon(t, want, values[n-1], relative)
}

// column returns a stepper for a column of n cells over the unit height.
func column(t *testing.T, n int, bottom, top Wall, source float64, s *Settings) (*Stepper, *staggered.Scalar) {
	t.Helper()
	g := uniform(t, 1, n, 1, 1)
	h := staggered.NewScalar(g)
	h.SetAll(source)
	st, err := NewStepper(Equation{Grid: g, Walls: Walls{Bottom: bottom, Top: top}, Source: h}, s)
	require.NoError(t, err)
	return st, staggered.NewScalar(g)
}

func TestPlateCoolingFromAbove(t *testing.T) {
	// z the depth, T(z,0) = 1, T = 0 on top and 1 below; t = 0.05:
	// Carslaw & Jaeger (1959, 3.4): T(0.5) = 0.8861558034293, surface
	// gradient 2.5231325324213.
	var middle, gradient []float64
	for _, n := range []int{33, 66, 132} {
		st, temperature := column(t, n, Isothermal(1), Isothermal(0), 0, &Settings{Scheme: Implicit})
		temperature.SetAll(1)
		// Short steps first: the start does not fit the wall.
		integrate(t, st, temperature, nil, 1e-4, 200)
		integrate(t, st, temperature, nil, 0.05-1e-4, 20*n)
		middle = append(middle, valueAt(temperature, 0.5))
		q, err := st.WallFluxTo(nil, staggered.Top, temperature, nil)
		require.NoError(t, err)
		gradient = append(gradient, -q[0])
	}
	approach(t, 0.8861558034293, 1e-4, middle...)
	approach(t, 2.5231325324213, 1e-4, gradient...)
}

// valueAt interpolates a column quadratically.
func valueAt(s *staggered.Scalar, z float64) float64 {
	centres := s.Grid.ZCentres()
	k := 1
	for k < len(centres)-2 && centres[k+1] < z {
		k++
	}
	sum := 0.0
	for i := k - 1; i <= k+2; i++ {
		w := 1.0
		for j := k - 1; j <= k+2; j++ {
			if j != i {
				w *= (z - centres[j]) / (centres[i] - centres[j])
			}
		}
		sum += w * s.Values[i]
	}
	return sum
}

func TestSlabCoolsThroughRobinWall(t *testing.T) {
	// Half-thickness 1, insulated middle, −T' = Bi T at the face, Bi = 1,
	// T(z,0) = 1: T = 0.77252638342381 in the middle at t = 0.5, Carslaw &
	// Jaeger (1959, 3.11).
	var values []float64
	for _, n := range []int{16, 32, 64} {
		st, temperature := column(t, n, Insulating, Robin(1, 0), 0, &Settings{Scheme: Implicit})
		temperature.SetAll(1)
		integrate(t, st, temperature, nil, 1e-3, 50)
		integrate(t, st, temperature, nil, 0.5-1e-3, 10*n)
		// The value at the insulated wall: even in z.
		values = append(values, (9*temperature.Values[0]-temperature.Values[1])/8)
	}
	approach(t, 0.77252638342381, 1e-4, values...)
}

func TestSlabWarmsFromWithin(t *testing.T) {
	// T_t = T_zz + 1, T = 0 on both faces and at t = 0: T(0.5, 0.1) =
	// 0.076919064282826, Carslaw & Jaeger (1959, 3.14).
	var values []float64
	for _, n := range []int{16, 32, 64} {
		st, temperature := column(t, n, Isothermal(0), Isothermal(0), 1, nil)
		integrate(t, st, temperature, nil, 0.1, int(0.1/st.StableStep(nil))+1)
		values = append(values, valueAt(temperature, 0.5))
	}
	approach(t, 0.076919064282826, 1e-3, values...)
}

func TestBoxModeDecays(t *testing.T) {
	// sin πx sin 2πz decays with 5π²: −0.29030906255718 at (0.3, 0.6),
	// t = 0.01, by separation of variables.
	var values []float64
	for _, n := range []int{20, 40, 80} {
		g := uniform(t, n, n, 1, 1)
		st, err := NewStepper(Equation{Grid: g, Walls: Walls{Isothermal(0), Isothermal(0), Isothermal(0), Isothermal(0)}}, nil)
		require.NoError(t, err)
		temperature := staggered.NewScalar(g)
		temperature.Fill(func(x, z float64) float64 { return math.Sin(math.Pi*x) * math.Sin(2*math.Pi*z) })
		integrate(t, st, temperature, nil, 0.01, int(0.01/st.StableStep(nil))+1)
		values = append(values, temperature.ValueAt(0.3, 0.6))
	}
	approach(t, -0.29030906255718, 5e-3, values...)
}

func TestRotatingGaussian(t *testing.T) {
	if testing.Short() {
		t.Skip("takes seconds")
	}
	// Solid rotation, one turn per unit of time, about the middle of a box of
	// side 1; centre at (0.25, 0) from there, s = 0.08, κ = 0.001: 0.71400929270484
	// at (−0.05, −0.2), t = 0.7. Isotropic diffusion commutes with rotation.
	for _, s := range []Settings{{}, {Advection: Bounded}, {Scheme: Implicit}} {
		var values []float64
		sizes := []int{50, 100}
		for _, n := range sizes {
			g := uniform(t, n, n, 1, 1)
			k := staggered.NewScalar(g)
			k.SetAll(0.001)
			cold := Isothermal(0)
			st, err := NewStepper(Equation{Grid: g, Conductivity: k, Walls: Walls{cold, cold, cold, cold}}, &s)
			require.NoError(t, err)
			temperature, flow := staggered.NewScalar(g), spin(g)
			temperature.Fill(func(x, z float64) float64 {
				return math.Exp(-((x-0.75)*(x-0.75) + (z-0.5)*(z-0.5)) / (2 * 0.08 * 0.08))
			})
			dt := math.Min(st.StableStep(flow), 0.15/float64(n))
			integrate(t, st, temperature, flow, 0.7, int(0.7/dt)+1)
			values = append(values, temperature.ValueAt(0.45, 0.3))
		}
		if s.Advection == Central {
			approach(t, 0.71400929270484, 2e-2, values...)
			continue
		}
		// The limiter clips extrema: no clean order at a point near one.
		require.Less(t, math.Abs(values[1]-0.71400929270484), math.Abs(values[0]-0.71400929270484)/2)
		require.InEpsilon(t, 0.71400929270484, values[1], 3e-2)
	}
}

func TestThroughFlowBoundaryLayer(t *testing.T) {
	// Pe T_x = T_xx, T(0) = 0, T(1) = 1: T(0.5) = 0.075858180021244 and
	// T'(1) = 5.0339182745315 at Pe = 5. The fluid enters on the left and
	// leaves on the right.
	for _, advection := range []Advection{Central, Bounded} {
		for _, sign := range []float64{1, -1} {
			var middle, gradient []float64
			for _, n := range []int{20, 40, 80} {
				g := uniform(t, n, 1, 1, 1)
				walls := Walls{Left: Isothermal(0), Right: Isothermal(1)}
				hot := staggered.Right
				if sign < 0 {
					walls, hot = Walls{Left: Isothermal(1), Right: Isothermal(0)}, staggered.Left
				}
				st, err := NewStepper(Equation{Grid: g, Walls: walls}, &Settings{Advection: advection})
				require.NoError(t, err)
				flow, temperature := staggered.NewFlow(g), staggered.NewScalar(g)
				flow.FillVelocity(func(x, z float64) float64 { return sign * 5 }, func(x, z float64) float64 { return 0 })
				rep, err := st.Steady(context.Background(), temperature, flow)
				require.NoError(t, err)
				// What is conducted in at the hot wall is carried out there.
				require.InDelta(t, 0, rep.Power(), 1e-9)
				require.InDelta(t, -5, rep.Advected[hot], 1e-12)
				q, err := st.WallFluxTo(nil, hot, temperature, nil)
				require.NoError(t, err)
				middle = append(middle, temperature.ValueAt(0.5, 0.5))
				gradient = append(gradient, q[0])
			}
			if advection == Central {
				approach(t, 0.075858180021244, 1e-2, middle...)
				approach(t, 5.0339182745315, 1e-2, gradient...)
			} else {
				require.InEpsilon(t, 0.075858180021244, middle[2], 1e-2)
				require.InEpsilon(t, 5.0339182745315, gradient[2], 1e-2)
			}
		}
	}
}

func TestConductivityGrowsExponentially(t *testing.T) {
	// (k T_x)_x = 0, k = exp(2x), T(0) = 0, T(1) = 1: T = (1 − e^(−2x))/(1 − e^(−2)),
	// 0.63686076834967 at 0.4, flux 2/(1 − e^(−2)).
	var values, fluxes []float64
	for _, n := range []int{20, 40, 80} {
		g := uniform(t, n, 3, 1, 1)
		k := staggered.NewScalar(g)
		k.Fill(func(x, z float64) float64 { return math.Exp(2 * x) })
		st, err := NewStepper(Equation{Grid: g, Conductivity: k, Walls: Walls{Left: Isothermal(0), Right: Isothermal(1)}}, nil)
		require.NoError(t, err)
		temperature := staggered.NewScalar(g)
		_, err = st.Steady(context.Background(), temperature, nil)
		require.NoError(t, err)
		values = append(values, temperature.ValueAt(0.4, 0.5))
		q, err := st.WallFluxTo(nil, staggered.Right, temperature, nil)
		require.NoError(t, err)
		fluxes = append(fluxes, q[1])
	}
	approach(t, 0.63686076834967, 1e-3, values...)
	approach(t, 2/(1-math.Exp(-2)), 1e-3, fluxes...)
}

// The flux at a corner beside insulating sides: cos πx sinh πz has the gradient
// π at the bottom on the left, −π on the right, ±π cosh π at the top.
func TestCornerFluxes(t *testing.T) {
	for _, tt := range []struct {
		grading staggered.Grading
		order   float64
	}{
		{staggered.Grading{}, 1.9},
		{staggered.Grading{Bottom: 3, Top: 2}, 1.9},
		// On cells that change width along the wall, h² log h.
		{staggered.Grading{Left: 3, Top: 3}, 1.6},
	} {
		var errs []float64
		for _, n := range []int{32, 64, 128} {
			g, err := staggered.Graded(n, n, 1, 1, tt.grading)
			require.NoError(t, err)
			st, err := NewStepper(Equation{Grid: g, Walls: Walls{
				Bottom: Isothermal(0),
				Top:    Profile(func(x float64) float64 { return math.Cos(math.Pi*x) * math.Sinh(math.Pi) }),
			}}, nil)
			require.NoError(t, err)
			temperature := staggered.NewScalar(g)
			_, err = st.Steady(context.Background(), temperature, nil)
			require.NoError(t, err)
			c, err := st.CornerFluxes(temperature)
			require.NoError(t, err)
			top := math.Pi * math.Cosh(math.Pi)
			errs = append(errs, math.Max(
				math.Max(math.Abs(c.BottomLeft+math.Pi), math.Abs(c.BottomRight-math.Pi))/math.Pi,
				math.Max(math.Abs(c.TopLeft-top), math.Abs(c.TopRight+top))/top))
		}
		requireOrder(t, "corners", tt.order, errs)
	}
}

// Beside other sides the flux is continued in a straight line; across periodic
// ones interpolated.
func TestCornerFluxesBesideOtherSides(t *testing.T) {
	g, err := staggered.NewGrid([]float64{0, 0.1, 0.4, 1}, []float64{0, 0.5, 1})
	require.NoError(t, err)
	fluxAt := func(x float64) float64 { return 1 + 2*x }
	for _, periodicSides := range []bool{false, true} {
		walls := Walls{Left: Isothermal(0), Right: Flux(1), Bottom: FluxProfile(fluxAt), Top: FluxProfile(func(x float64) float64 { return -3 * fluxAt(x) })}
		if periodicSides {
			walls.Left, walls.Right = Periodic, Periodic
		}
		st, err := NewStepper(Equation{Grid: g, Walls: walls}, nil)
		require.NoError(t, err)
		c, err := st.CornerFluxes(staggered.NewScalar(g))
		require.NoError(t, err)
		left, right := 1.0, 3.0
		if periodicSides {
			// Cells at 0.05 and 0.7, the corner 0.05 and 0.3 from them.
			left = (fluxAt(0.05)*0.3 + fluxAt(0.7)*0.05) / 0.35
			right = left
		}
		require.InDelta(t, left, c.BottomLeft, 1e-12)
		require.InDelta(t, right, c.BottomRight, 1e-12)
		require.InDelta(t, -3*left, c.TopLeft, 1e-12)
		require.InDelta(t, -3*right, c.TopRight, 1e-12)
	}
}
