package ode

import (
	"fmt"
	"math"
	"testing"

	"github.com/stretchr/testify/require"
)

type rates func(dst, y []float64, t float64)

func (f rates) Rates(dst, y []float64, t float64) { f(dst, y, t) }

// pendulum is y” = -sin y, with the integral of y'², so that the energy
// y'²/2 - cos y stays what it was.
var pendulum = rates(func(dst, y []float64, _ float64) {
	dst[0], dst[1], dst[2] = y[1], -math.Sin(y[0]), y[1]*y[1]
})

// forced is y' = -y³ + cos t, a scalar problem without a closed solution.
var forced = rates(func(dst, y []float64, t float64) {
	dst[0], dst[1] = -y[0]*y[0]*y[0]+math.Cos(t), y[0]*y[0]
})

func integrate(t testing.TB, sys System, t0 float64, y0 []float64, end float64, integrands int, tol float64) *Solver {
	t.Helper()
	s := NewSolver(len(y0), integrands)
	s.Tol = Tolerance{tol, tol}
	s.Start(sys, t0, y0, end)
	for !s.Done() {
		require.NoError(t, s.Step())
	}
	return s
}

// fixed takes equal steps: the tolerance is out of reach, the size is put back.
func fixed(t *testing.T, sys System, y0 []float64, end float64, integrands, steps int) *Solver {
	t.Helper()
	s := NewSolver(len(y0), integrands)
	s.Tol = Tolerance{1e-14, 1e-14}
	s.Start(sys, 0, y0, end)
	for i := range steps {
		s.h = (end - s.t) / float64(steps-i)
		s.jacobian()
		s.factor()
		require.True(t, s.newton())
		s.accept(1, i == steps-1)
	}
	return s
}

// harmonic is y” = -y from (0, 1) with the integral of y²: sin t and
// t/2 - sin(2t)/4.
var harmonic = rates(func(dst, y []float64, _ float64) { dst[0], dst[1], dst[2] = y[1], -y[0], y[0]*y[0] })

// harmonicErrors returns the errors of the state and of the integral at t.
func harmonicErrors(t *testing.T, s *Solver, at float64) [2]float64 {
	y, q := make([]float64, 2), make([]float64, 1)
	require.NoError(t, s.Path.At(y, q, at))
	return [2]float64{math.Abs(y[0] - math.Sin(at)), math.Abs(q[0] - at/2 + math.Sin(2*at)/4)}
}

// checkOrder compares the errors with equal steps of two numbers of them.
func checkOrder(t *testing.T, order, tol float64, n1, n2 int, e1, e2 [2]float64) {
	t.Helper()
	for k, what := range []string{"state", "integral"} {
		observed := math.Log(e1[k]/e2[k]) / math.Log(float64(n2)/float64(n1))
		require.InDelta(t, order, observed, tol, "%s, %d and %d steps: errors %.2g, %.2g", what, n1, n2, e1[k], e2[k])
	}
}

func TestOrderAtTheEndsOfSteps(t *testing.T) {
	const end = 10
	var prev [2]float64
	last := 0
	for _, steps := range []int{10, 14, 20} {
		err := harmonicErrors(t, fixed(t, harmonic, []float64{0, 1}, end, 1, steps), end)
		if last > 0 {
			checkOrder(t, Order, 0.3, last, steps, prev, err)
		}
		prev, last = err, steps
	}
}

func TestOrderBetweenTheEnds(t *testing.T) {
	const end = 10
	var prev [2]float64
	last := 0
	for _, steps := range []int{20, 40, 80} {
		s := fixed(t, harmonic, []float64{0, 1}, end, 1, steps)
		var worst [2]float64
		for j := range 4000 {
			err := harmonicErrors(t, s, end*float64(j)/4000)
			worst[0], worst[1] = math.Max(worst[0], err[0]), math.Max(worst[1], err[1])
		}
		if last > 0 {
			checkOrder(t, DenseOrder, 0.3, last, steps, prev, worst)
		}
		prev, last = worst, steps
	}
}

// The error anywhere on the path follows the tolerance, decade by decade.
func TestDenseErrorFollowsTolerance(t *testing.T) {
	for _, tol := range []float64{1e-4, 1e-6, 1e-8, 1e-10} {
		s := integrate(t, harmonic, 0, []float64{0, 1}, 20, 1, tol)
		y := make([]float64, 2)
		worst := 0.0
		for i := range 2001 {
			at := float64(i) / 100
			require.NoError(t, s.Path.At(y, nil, at))
			worst = math.Max(worst, math.Abs(y[0]-math.Sin(at)))
		}
		require.Less(t, worst, 4*tol)
		require.Greater(t, worst, tol/10)
	}
}

// Van der Pol's equation with ε = 1e-6 at t = 2; reference values of Hairer and
// Wanner (1996), test problem VDPOL. (from memory)
func TestStiffVanDerPol(t *testing.T) {
	vdp := rates(func(dst, y []float64, _ float64) {
		dst[0], dst[1] = y[1], 1e6*((1-y[0]*y[0])*y[1]-y[0])
	})
	s := integrate(t, vdp, 0, []float64{2, 0}, 2, 0, 1e-8)
	require.InEpsilon(t, 1.706167732170483, s.y[0], 1e-11)
	require.InEpsilon(t, -0.8928097010247975, s.y[1], 1e-10)
	require.Less(t, s.Steps, 600)
}

// A stiff component that has died out does not hold the steps: y follows cos t
// at a rate of 1e8 with steps of order one.
func TestStepsOutgrowStiffness(t *testing.T) {
	follow := rates(func(dst, y []float64, t float64) { dst[0] = -1e8*(y[0]-math.Cos(t)) - math.Sin(t) })
	s := integrate(t, follow, 0, []float64{1.5}, 10, 0, 1e-7)
	require.InDelta(t, math.Cos(10), s.y[0], 1e-7)
	require.Less(t, s.Steps, 100)
}

func TestBackwardUndoesForward(t *testing.T) {
	s := integrate(t, pendulum, 0, []float64{2, 0}, 9, 1, 1e-11)
	b := integrate(t, pendulum, 9, s.y, 0, 1, 1e-11)
	require.InDelta(t, 2, b.y[0], 1e-12)
	require.InDelta(t, 0, b.y[1], 1e-12)
	require.InEpsilon(t, -s.q[0], b.q[0], 1e-12)
	y := make([]float64, 2)
	z := make([]float64, 2)
	require.NoError(t, s.Path.At(y, nil, 4.321))
	require.NoError(t, b.Path.At(z, nil, 4.321))
	require.InDelta(t, y[0], z[0], 1e-10)
}

func TestPathJoinsAtTheEndsOfSteps(t *testing.T) {
	s := integrate(t, forced, 0, []float64{1}, 5, 1, 1e-8)
	y, q := []float64{0}, []float64{0}
	times := s.Path.Times()
	for i, at := range times[1 : len(times)-1] {
		require.NoError(t, s.Path.At(y, q, at))
		stride := s.Path.stride()
		require.InEpsilon(t, s.Path.data[(i+1)*stride], y[0], 1e-13)
		require.InDelta(t, s.Path.data[(i+1)*stride+1], q[0], 1e-13)
	}
	require.NoError(t, s.Path.At(y, q, 5))
	require.InEpsilon(t, s.y[0], y[0], 1e-14)
	for _, outside := range []float64{-1e-9, 5.0001, math.NaN()} {
		require.ErrorContains(t, s.Path.At(y, q, outside), "want 0 to 5")
	}
	require.Error(t, (&Path{times: []float64{0}}).At(y, q, 0))
}

func TestCloneKeepsThePath(t *testing.T) {
	s := integrate(t, forced, 0, []float64{1}, 5, 1, 1e-8)
	c := s.Path.Clone()
	y, want := []float64{0}, []float64{0}
	require.NoError(t, s.Path.At(want, nil, 3))
	s.Start(forced, 0, []float64{2}, 5)
	require.NoError(t, s.Step())
	require.NoError(t, c.At(y, nil, 3))
	require.Equal(t, want, y)
}

func TestErrors(t *testing.T) {
	run := func(f rates, maxSteps int) error {
		s := NewSolver(1, 0)
		s.Tol, s.MaxSteps = Tolerance{1e-8, 1e-8}, maxSteps
		s.Start(f, 0, []float64{1}, 2)
		for !s.Done() {
			if err := s.Step(); err != nil {
				return err
			}
		}
		return nil
	}
	// y' = y² runs away at t = 1.
	err := run(func(dst, y []float64, _ float64) { dst[0] = y[0] * y[0] }, 1e5)
	require.ErrorIs(t, err, ErrCollapsed)
	var stop *StepError
	require.ErrorAs(t, err, &stop)
	require.InDelta(t, 1, stop.Time, 1e-6)
	require.ErrorContains(t, err, "step size collapsed at time 1")

	err = run(func(dst, y []float64, t float64) { dst[0] = math.Sqrt(0.5 - t) }, 1e5)
	require.ErrorIs(t, err, ErrCollapsed)
	err = run(func(dst, y []float64, _ float64) { dst[0] = math.NaN() }, 1e5)
	require.ErrorIs(t, err, ErrCollapsed)
	err = run(func(dst, y []float64, _ float64) { dst[0] = -y[0] }, 3)
	require.ErrorIs(t, err, ErrTooManySteps)
	require.NoError(t, run(func(dst, y []float64, _ float64) { dst[0] = -y[0] }, 100))
}

// A kink in the rates costs steps but does not stop the integration.
func TestKink(t *testing.T) {
	s := integrate(t, rates(func(dst, y []float64, _ float64) {
		dst[0] = -math.Max(y[0], 0.5)
	}), 0, []float64{1}, 1, 0, 1e-10)
	require.InDelta(t, 0.5-0.5*(1-math.Ln2), s.y[0], 1e-9)
}

func TestStepsAllocateNothing(t *testing.T) {
	s := NewSolver(2, 1)
	s.Tol = Tolerance{1e-8, 1e-8}
	var sys System = pendulum
	y := []float64{2, 0}
	run := func() {
		s.Start(sys, 0, y, 9)
		for !s.Done() {
			if s.Step() != nil {
				t.Fatal("step")
			}
		}
	}
	run() // the path grows once
	require.Zero(t, testing.AllocsPerRun(10, run))
}

// The points and weights of Radau IIA: Hairer and Wanner (1996), section IV.5;
// the row sums are the points, the last row integrates polynomials of degree 8.
func TestTableau(t *testing.T) {
	tab := radau()
	require.InDelta(t, 0.05710419611451768, tab.c[0], 1e-15)
	for i := range stages {
		sum := 0.0
		for j := range stages {
			sum += tab.a[i][j]
		}
		require.InDelta(t, tab.c[i], sum, 1e-14)
	}
	for p := range Order {
		sum := 0.0
		for j := range stages {
			sum += tab.a[stages-1][j] * math.Pow(tab.c[j], float64(p))
		}
		require.InDelta(t, 1/float64(p+1), sum, 1e-14)
	}
	require.InDelta(t, 1/float64(stages*stages), tab.a[stages-1][stages-1], 1e-14)
}

// The weight of the defect is the largest value of its integral over a step,
// here by brute force.
func TestDenseWeight(t *testing.T) {
	tab := radau()
	const n = 100000
	sum, largest := 0.0, 0.0
	for i := range n {
		product := 1.0
		for _, c := range tab.c {
			product *= 1 - (float64(i)+0.5)/n/c
		}
		sum += product / n
		largest = math.Max(largest, math.Abs(sum))
	}
	require.InDelta(t, largest, tab.dense, 1e-8)
}

// The estimate of a stiff component is filtered by 1/(1 - h dense J): for
// y' = -λ(y-1) the defect of z at the start is known.
func TestDenseErrorIsFiltered(t *testing.T) {
	const lambda, h = 50.0, 0.3
	s := NewSolver(1, 0)
	s.Tol = Tolerance{0, 1}
	s.Start(rates(func(dst, y []float64, _ float64) { dst[0] = -lambda * (y[0] - 1) }), 0, []float64{2}, 1)
	s.h = h
	s.jacobian()
	s.factor()
	require.True(t, s.newton())
	slope := 0.0
	for i := range stages {
		slope += s.tab.start[i] * s.z[i]
	}
	want := math.Abs(s.tab.dense * (slope + h*lambda) / (1 + h*lambda*s.tab.dense))
	require.InEpsilon(t, want, s.denseError(), 1e-6)
}

func TestDecompose(t *testing.T) {
	a := []float64{0, 2, 1, 4, -1, 0, 2, 2, 3}
	b := []float64{7, 2, 15} // of x = 1, 2, 3
	perm := make([]int, 3)
	decompose(a, perm, 3)
	substitute(a, perm, b, 3)
	for i, want := range []float64{1, 2, 3} {
		require.InEpsilon(t, want, b[i], 1e-14)
	}
}

func BenchmarkIntegrate(b *testing.B) {
	for _, tol := range []float64{1e-6, 1e-10} {
		b.Run(fmt.Sprintf("tol=%.0e", tol), func(b *testing.B) {
			s := NewSolver(2, 1)
			s.Tol = Tolerance{tol, tol}
			y := []float64{2, 0}
			b.ReportAllocs()
			for b.Loop() {
				s.Start(pendulum, 0, y, 10)
				for !s.Done() {
					if err := s.Step(); err != nil {
						b.Fatal(err)
					}
				}
			}
			b.ReportMetric(float64(s.Steps), "steps")
			b.ReportMetric(float64(s.Evaluations), "evaluations")
		})
	}
}
