package heat

import (
	"context"
	"fmt"
	"math"
	"testing"

	"example.org/overturn/stokes/staggered"
	"github.com/stretchr/testify/require"
)

// integrate steps a temperature to an end time in equal steps.
func integrate(t *testing.T, st *Stepper, temperature *staggered.Scalar, flow *staggered.Flow, end float64, steps int) {
	t.Helper()
	for range steps {
		_, err := st.Step(context.Background(), temperature, flow, end/float64(steps))
		require.NoError(t, err)
	}
}

// A temperature that decays towards a steady state, in space and time together:
// the step falls as the cell size squared, under Implicit as the cell size.
func TestTransientIsSecondOrder(t *testing.T) {
	all := []string{"TTTT", "FRTF", "PPRT", "RFFT"}
	if testing.Short() {
		all = all[:1]
	}
	for _, walls := range all {
		for _, scheme := range []Scheme{RungeKutta3, RungeKutta2, Implicit} {
			t.Run(fmt.Sprintf("%s/%v", walls, scheme), func(t *testing.T) {
				var errs []float64
				for _, n := range []int{10, 20, 40} {
					m := newManufactured()
					m.sides, m.ends, m.graded = walls[:2], walls[2:], scheme == Implicit
					errs = append(errs, transientError(t, m, n, scheme))
				}
				requireOrder(t, "temperature", 1.85, errs)
			})
		}
	}
}

func transientError(t *testing.T, m *manufactured, n int, scheme Scheme) float64 {
	const end = 0.03
	st, temperature, flow := m.problem(t, n, &Settings{Scheme: scheme, Limit: Unenforced})
	steps := n
	if scheme != Implicit {
		steps = int(math.Ceil(end / st.StableStep(flow)))
	}
	dt := end / float64(steps)
	temperature.Fill(func(x, z float64) float64 { return m.exact(x, z, 1) })
	for j := range steps {
		decay := math.Exp(-(float64(j) + 0.5) * dt)
		st.source.Fill(func(x, z float64) float64 { return m.source(x, z, decay) })
		_, err := st.Step(context.Background(), temperature, flow, dt)
		require.NoError(t, err)
	}
	exact := staggered.NewScalar(st.Grid())
	exact.Fill(func(x, z float64) float64 { return m.exact(x, z, math.Exp(-end)) })
	largest, _ := differences(temperature.Values, exact.Values)
	return largest
}

// The order in time alone, on one grid: differences between runs of which each
// takes half the step of the one before.
func TestOrderInTime(t *testing.T) {
	for scheme, want := range map[Scheme]float64{RungeKutta2: 2, RungeKutta3: 3, Implicit: 2} {
		t.Run(scheme.String(), func(t *testing.T) {
			m := newManufactured()
			m.sides, m.ends, m.graded = "TF", "RT", scheme == Implicit
			var runs [4][]float64
			for j := range runs {
				st, temperature, flow := m.problem(t, 20, &Settings{Scheme: scheme, Limit: Unenforced})
				temperature.Fill(func(x, z float64) float64 { return m.exact(x, z, 1) })
				end := 16 * st.StableStep(flow)
				if scheme == Implicit {
					end = 0.1
				}
				integrate(t, st, temperature, flow, end, 16<<j)
				runs[j] = temperature.Values
			}
			var errs []float64
			for j := range 3 {
				e, _ := differences(runs[j], runs[j+1])
				errs = append(errs, e)
			}
			requireOrder(t, "time", want-0.15, errs)
			require.LessOrEqual(t, math.Log2(errs[1]/errs[2]), want+0.4)
		})
	}
}

// One implicit step may be a hundred times as long as an explicit one.
func TestImplicitStepIsFree(t *testing.T) {
	g, err := staggered.Graded(32, 32, 1, 1, staggered.Grading{Top: 8, Bottom: 8})
	require.NoError(t, err)
	eq := Equation{Grid: g, Walls: Walls{Bottom: Isothermal(1), Top: Isothermal(0)}}
	explicit, err := NewStepper(eq, nil)
	require.NoError(t, err)
	st, err := NewStepper(eq, &Settings{Scheme: Implicit})
	require.NoError(t, err)
	require.True(t, math.IsInf(st.StableStep(nil), 1))
	temperature := staggered.NewScalar(g)
	const dt = 0.02
	require.Greater(t, dt, 100*explicit.StableStep(nil))
	integrate(t, st, temperature, nil, 200*dt, 200)
	for c, v := range temperature.Values {
		require.InDelta(t, 1-g.ZCentres()[c/g.NX()], v, 1e-9)
	}
}

// amplification returns by what a scheme multiplies the wave that conduction
// multiplies by −(ax+az) and flow by −ib per unit of its step.
func amplification(s Scheme, ax, az, b float64) complex128 {
	z := complex(-ax-az, -b)
	switch s {
	case RungeKutta2:
		return 1 + z + z*z/2
	case RungeKutta3:
		return 1 + z + z*z/2 + z*z*z/6
	}
	p := complex((1+rosenbrockGamma*ax)*(1+rosenbrockGamma*az), 0)
	return 1 + 2*z/p + (z*z/2-z)/(p*p)
}

// No wave grows at the stable step of Central advection, whatever the ratio of
// flow to conduction and their directions (von Neumann's analysis on an endless
// uniform grid).
func TestNoWaveGrowsAtStableStep(t *testing.T) {
	const waves = 48
	for _, scheme := range []Scheme{RungeKutta2, RungeKutta3, Implicit} {
		for _, aspect := range []float64{1, 5} {
			g, err := staggered.Uniform(8, 8, aspect, 1)
			require.NoError(t, err)
			hx, hz := g.DX()[0], g.DZ()[0]
			st, err := NewStepper(Equation{Grid: g, Walls: Walls{Left: Periodic, Right: Periodic}}, &Settings{Scheme: scheme})
			require.NoError(t, err)
			for _, speed := range []float64{0.1, 3, 10, 30, 100, 1e3, 1e5} {
				for _, angle := range []float64{0, 0.3, math.Pi / 4, 1.2, math.Pi / 2} {
					u, v := speed*math.Cos(angle), speed*math.Sin(angle)
					flow := staggered.NewFlow(g)
					flow.FillVelocity(func(x, z float64) float64 { return u }, func(x, z float64) float64 { return v })
					dt := st.StableStep(flow)
					require.Positive(t, dt)
					worst := 0.0
					for i := range waves {
						for k := range waves {
							p, q := 2*math.Pi*float64(i)/waves, 2*math.Pi*float64(k)/waves
							ax, az := 4*dt/(hx*hx)*sin2(p/2), 4*dt/(hz*hz)*sin2(q/2)
							b := dt * (u*math.Sin(p)/hx + v*math.Sin(q)/hz)
							r := amplification(scheme, ax, az, b)
							worst = math.Max(worst, math.Hypot(real(r), imag(r)))
						}
					}
					require.LessOrEqualf(t, worst, 1+1e-12, "%v, aspect %g, v = (%g, %g)", scheme, aspect, u, v)
				}
			}
		}
	}
}

// Conduction never grows in an implicit step, however long, and what is stiff in
// one direction only is damped away.
func TestImplicitIsStableForConduction(t *testing.T) {
	for _, ax := range []float64{0, 0.1, 1, 3, 10, 1e2, 1e4, 1e8} {
		for _, az := range []float64{0, 0.1, 1, 3, 10, 1e2, 1e4, 1e8} {
			r := real(amplification(Implicit, ax, az, 0))
			require.LessOrEqual(t, math.Abs(r), 1.0)
			if ax+az == 1e8 {
				require.Less(t, math.Abs(r), 1e-7)
			}
		}
	}
}

// A single mode shrinks by the factor of the analysis: the solver is the method.
func TestImplicitModeShrinksAsAnalysed(t *testing.T) {
	const n, dt = 16, 0.05
	g := uniform(t, n, n, 1, 1)
	st, err := NewStepper(Equation{Grid: g}, &Settings{Scheme: Implicit})
	require.NoError(t, err)
	temperature := staggered.NewScalar(g)
	temperature.Fill(func(x, z float64) float64 { return math.Cos(2*math.Pi*x) * math.Cos(3*math.Pi*z) })
	before := temperature.Values[5]
	integrate(t, st, temperature, nil, dt, 1)
	ax, az := 4*dt*n*n*sin2(math.Pi/n), 4*dt*n*n*sin2(1.5*math.Pi/n)
	require.InDelta(t, real(amplification(Implicit, ax, az, 0)), temperature.Values[5]/before, 1e-12)
}

func sin2(x float64) float64 { return math.Sin(x) * math.Sin(x) }

// The bound is not idle: where conduction alone sets it, noise explodes a
// twentieth beyond, and not a twentieth before.
func TestStableStepIsSharp(t *testing.T) {
	for _, scheme := range []Scheme{RungeKutta2, RungeKutta3} {
		for factor, grows := range map[float64]bool{0.97: false, 1.05: true} {
			g, err := staggered.Uniform(24, 24, 1, 1)
			require.NoError(t, err)
			st, err := NewStepper(Equation{Grid: g, Walls: Walls{Left: Periodic, Right: Periodic}}, &Settings{Scheme: scheme, Limit: Unenforced})
			require.NoError(t, err)
			temperature := staggered.NewScalar(g)
			for c := range temperature.Values {
				temperature.Values[c] = float64((c + c/24) % 2)
			}
			dt := factor * st.StableStep(nil)
			integrate(t, st, temperature, nil, 400*dt, 400)
			_, high := temperature.Extrema()
			require.Equal(t, grows, high.Value > 10, "%v, factor %g: %g", scheme, factor, high.Value)
		}
	}
}

// Graded grids, flow along walls and variable conductivity: the bound holds.
func TestStableStepHoldsOnGradedGrids(t *testing.T) {
	if testing.Short() {
		t.Skip("takes seconds")
	}
	everyMethod(t, func(t *testing.T, s Settings) {
		m := newManufactured()
		m.sides, m.ends, m.graded = "TF", "RT", true
		st, temperature, flow := m.problem(t, 24, &s)
		for j := range flow.VX {
			flow.VX[j] *= 20
		}
		for j := range flow.VZ {
			flow.VZ[j] *= 20
		}
		for c := range temperature.Values {
			temperature.Values[c] = float64(c * c % 7)
		}
		dt := st.StableStep(flow)
		integrate(t, st, temperature, flow, 2000*dt, 2000)
		low, high := temperature.Extrema()
		require.Less(t, high.Value-low.Value, 10.0)
	})
}

// The bounds as documented, in a uniform flow: Courant numbers and diffusion.
func TestStableStepValues(t *testing.T) {
	g := uniform(t, 10, 5, 1, 1)
	flow := staggered.NewFlow(g)
	flow.FillVelocity(func(x, z float64) float64 { return -3 }, func(x, z float64) float64 { return 2 })
	k := staggered.NewScalar(g)
	k.SetAll(0.5)
	capacity := staggered.NewScalar(g)
	capacity.SetAll(2)
	const (
		courant = 3*10 + 2*5.
		kappa   = 0.25
		own     = 2 * kappa * (100 + 25) // of a cell inside
	)
	for _, tt := range []struct {
		s        Settings
		flow     *staggered.Flow
		want     float64
		relative float64
	}{
		{Settings{Advection: Bounded}, flow, 1 / (2*courant + own), 1e-12},
		{Settings{Advection: Bounded, Scheme: RungeKutta2}, flow, 1 / (2*courant + own), 1e-12},
		{Settings{Advection: Bounded, Scheme: Implicit}, flow, 1 / (2 * courant), 1e-12},
		{Settings{}, nil, 2.5 / (2 * own), 1e-12},
		{Settings{Scheme: RungeKutta2}, nil, 2 / (2 * own), 1e-12},
		{Settings{}, flow, 1 / math.Hypot(courant/1.73, 2*own/2.5), 1e-12},
		{Settings{Scheme: Implicit}, flow, math.Min(1/courant, math.Cbrt(6*kappa/(courant*courant*13))), 1e-12},
	} {
		st, err := NewStepper(Equation{Grid: g, Conductivity: k, HeatCapacity: capacity, Walls: Walls{Left: Periodic, Right: Periodic}}, &tt.s)
		require.NoError(t, err)
		require.InEpsilon(t, tt.want, st.StableStep(tt.flow), tt.relative, "%v %v", tt.s.Scheme, tt.s.Advection)
	}
	// RungeKutta2: c² dt³ v²/κ + 3 s dt = 6.
	st, err := NewStepper(Equation{Grid: g, Conductivity: k, HeatCapacity: capacity, Walls: Walls{Left: Periodic, Right: Periodic}}, &Settings{Scheme: RungeKutta2})
	require.NoError(t, err)
	dt := st.StableStep(flow)
	require.InDelta(t, 6, courant*courant*dt*dt*dt*13/kappa+3*2*own*dt, 1e-9)
	// Without conduction the two-stage scheme has no stable step.
	st, err = NewStepper(Equation{Grid: g, Conductivity: frozen(g)}, &Settings{Scheme: RungeKutta2})
	require.NoError(t, err)
	require.Zero(t, st.StableStep(flow))
}

// Steps far beyond the explicit limit lead to the steady state also where
// conductivity or capacity, or both, vary by orders of magnitude.
func TestImplicitWithContrasts(t *testing.T) {
	for _, varying := range []string{"conductivity", "capacity", "both"} {
		g := uniform(t, 16, 14, 1, 1)
		contrast := func(sign float64) *staggered.Scalar {
			c := 3 * sign
			if varying == "both" { // what is stiff in both directions settles slowly
				c /= 2
			}
			s := staggered.NewScalar(g)
			s.Fill(func(x, z float64) float64 { return math.Exp(c * (x + z)) })
			return s
		}
		eq := Equation{Grid: g, Walls: Walls{Bottom: Isothermal(1), Top: Robin(1, 0)}}
		if varying != "capacity" {
			eq.Conductivity = contrast(1)
		}
		if varying != "conductivity" {
			eq.HeatCapacity = contrast(-1)
		}
		st, err := NewStepper(eq, &Settings{Scheme: Implicit})
		require.NoError(t, err)
		steady, temperature := staggered.NewScalar(g), staggered.NewScalar(g)
		_, err = st.Steady(context.Background(), steady, nil)
		require.NoError(t, err)
		integrate(t, st, temperature, nil, 10, 1000)
		worst, _ := differences(steady.Values, temperature.Values)
		require.Less(t, worst, 1e-6, varying)
	}
}
