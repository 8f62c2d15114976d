package heat

import (
	"context"
	"fmt"
	"math"
	"testing"

	"example.org/overturn/stokes/staggered"
	"github.com/stretchr/testify/require"
)

// field is a function with its first derivatives and its Laplacian.
type field func(x, z float64) (f, fx, fz, lap float64)

// manufactured is a temperature that solves the equation with the source that
// it asks for. A part that decays in time as exp(−t) vanishes at all walls
// together with its gradient, so that the wall conditions stay what they are.
type manufactured struct {
	width, height  float64
	temperature    field
	bump           field
	conductivity   field
	capacity       field
	stream         func(x, z float64) float64
	sides, ends    string // kinds of the walls: left and right, bottom and top
	graded, atRest bool
}

func constant(c float64) field {
	return func(x, z float64) (f, fx, fz, lap float64) { return c, 0, 0, 0 }
}

// wavy is smooth and periodic in x with the period 1.5, without symmetries.
func wavy(mean, amplitude, phase float64) field {
	const a = 2 * math.Pi / 1.5
	return func(x, z float64) (f, fx, fz, lap float64) {
		b := 1.7 + phase
		s, c := math.Sincos(a*x + phase)
		t, d := math.Sincos(b*z + 0.3)
		return mean + amplitude*s*d, amplitude * a * c * d, -amplitude * b * s * t, -amplitude * (a*a + b*b) * s * d
	}
}

// hill is sin²(πx/w) sin²(πz/h).
func hill(w, h float64) field {
	return func(x, z float64) (f, fx, fz, lap float64) {
		a, b := math.Pi/w, math.Pi/h
		sx, sz := math.Sin(a*x), math.Sin(b*z)
		p, q := sx*sx, sz*sz
		return p * q, a * math.Sin(2*a*x) * q, b * math.Sin(2*b*z) * p,
			2*a*a*math.Cos(2*a*x)*q + 2*b*b*math.Cos(2*b*z)*p
	}
}

func newManufactured() *manufactured {
	m := &manufactured{
		width: 1.5, height: 1,
		temperature: wavy(1, 0.8, 0.4), bump: hill(1.5, 1),
		conductivity: wavy(1.5, 0.7, 1.1), capacity: wavy(2, 0.9, 0.7),
		sides: "TT", ends: "TT",
	}
	// A closed cell, plus a swirl that passes through no wall.
	const a = 2 * math.Pi / 1.5
	m.stream = func(x, z float64) float64 {
		s := math.Sin(math.Pi * z)
		return 3 * s * s * (1 + 0.5*math.Cos(a*x+1)) * closing(m, x)
	}
	return m
}

// closing keeps the flow inside side walls that are not periodic.
func closing(m *manufactured, x float64) float64 {
	if m.sides == "PP" {
		return 1
	}
	return math.Sin(math.Pi * x / m.width)
}

// flow returns velocity by fourth-order differences of the stream function.
func (m *manufactured) flow(x, z float64) (u, v float64) {
	if m.atRest {
		return 0, 0
	}
	const h = 1e-3
	d := func(f func(s float64) float64) float64 {
		return (8*(f(h)-f(-h)) - (f(2*h) - f(-2*h))) / (12 * h)
	}
	return d(func(s float64) float64 { return m.stream(x, z+s) }), -d(func(s float64) float64 { return m.stream(x+s, z) })
}

// source is what the steady part and decay times the bump ask for.
func (m *manufactured) source(x, z, decay float64) float64 {
	_, tx, tz, lap := m.temperature(x, z)
	b, bx, bz, blap := m.bump(x, z)
	tx, tz, lap = tx+decay*bx, tz+decay*bz, lap+decay*blap
	k, kx, kz, _ := m.conductivity(x, z)
	c, _, _, _ := m.capacity(x, z)
	u, v := m.flow(x, z)
	return c*(-decay*b+u*tx+v*tz) - k*lap - kx*tx - kz*tz
}

func (m *manufactured) exact(x, z, decay float64) float64 {
	t, _, _, _ := m.temperature(x, z)
	b, _, _, _ := m.bump(x, z)
	return t + decay*b
}

// fluxInto returns the exact flux into the box at a wall.
func (m *manufactured) fluxInto(s staggered.Side, along float64) float64 {
	x, z := along, 0.0
	switch s {
	case staggered.Left:
		x, z = 0, along
	case staggered.Right:
		x, z = m.width, along
	case staggered.Top:
		z = m.height
	}
	_, tx, tz, _ := m.temperature(x, z)
	k, _, _, _ := m.conductivity(x, z)
	return [...]float64{-k * tx, k * tx, -k * tz, k * tz}[s]
}

func (m *manufactured) wall(s staggered.Side, kind byte) Wall {
	at := func(along float64) float64 {
		p := [...][2]float64{{0, along}, {m.width, along}, {along, 0}, {along, m.height}}[s]
		return m.exact(p[0], p[1], 0)
	}
	q := func(along float64) float64 { return m.fluxInto(s, along) }
	switch kind {
	case 'T':
		return Profile(at)
	case 'F':
		return FluxProfile(q)
	case 'R':
		const h = 2.5
		return RobinProfile(h, func(along float64) float64 { return at(along) + q(along)/h })
	}
	return Periodic
}

func (m *manufactured) grid(t testing.TB, n int) *staggered.Grid {
	t.Helper()
	g, err := staggered.Uniform(n*5/4, n, m.width, m.height)
	if m.graded {
		left := 2.5
		if m.sides == "PP" {
			left = 0
		}
		g, err = staggered.Graded(n*5/4, n, m.width, m.height, staggered.Grading{Left: left, Bottom: 3, Top: 2})
	}
	require.NoError(t, err)
	return g
}

// problem returns the stepper, the exact steady temperature and the flow.
func (m *manufactured) problem(t testing.TB, n int, s *Settings) (*Stepper, *staggered.Scalar, *staggered.Flow) {
	t.Helper()
	g := m.grid(t, n)
	eq := Equation{Grid: g, Conductivity: staggered.NewScalar(g), HeatCapacity: staggered.NewScalar(g), Source: staggered.NewScalar(g)}
	eq.Conductivity.Fill(func(x, z float64) float64 { k, _, _, _ := m.conductivity(x, z); return k })
	eq.HeatCapacity.Fill(func(x, z float64) float64 { c, _, _, _ := m.capacity(x, z); return c })
	eq.Source.Fill(func(x, z float64) float64 { return m.source(x, z, 0) })
	eq.Walls = Walls{
		Left: m.wall(staggered.Left, m.sides[0]), Right: m.wall(staggered.Right, m.sides[1]),
		Bottom: m.wall(staggered.Bottom, m.ends[0]), Top: m.wall(staggered.Top, m.ends[1]),
	}
	st, err := NewStepper(eq, s)
	require.NoError(t, err)
	exact := staggered.NewScalar(g)
	exact.Fill(func(x, z float64) float64 { return m.exact(x, z, 0) })
	if m.atRest {
		return st, exact, nil
	}
	flow := staggered.NewFlow(g)
	flow.FillFromStream(m.stream)
	return st, exact, flow
}

// largest returns the largest difference and the mean absolute one.
func differences(a, b []float64) (largest, mean float64) {
	for c := range a {
		d := math.Abs(a[c] - b[c])
		largest = math.Max(largest, d)
		mean += d / float64(len(a))
	}
	return largest, mean
}

// requireOrder asks for the observed order of the last two of errors on grids
// that halve the cell size.
func requireOrder(t *testing.T, name string, least float64, errors []float64) {
	t.Helper()
	n := len(errors)
	order := math.Log2(errors[n-2] / errors[n-1])
	t.Logf("%s: errors %.2e, order %.2f", name, errors, order)
	require.GreaterOrEqual(t, order, least, "order of %s, errors %.2e", name, errors)
}

// Every kind of wall against every other; the temperature and the fluxes
// through all walls are second order on the finest grids.
func TestSteadyIsSecondOrder(t *testing.T) {
	sizes := []int{16, 32, 64}
	for _, sides := range []string{"TT", "FT", "TR", "RF", "PP"} {
		for _, ends := range []string{"TT", "FT", "TF", "TR", "RT"} {
			if testing.Short() && sides != "TT" && ends != "TR" {
				continue
			}
			for _, graded := range []bool{false, true} {
				for _, atRest := range []bool{false, true} {
					name := fmt.Sprintf("%s-%s/graded=%v/rest=%v", sides, ends, graded, atRest)
					t.Run(name, func(t *testing.T) {
						m := newManufactured()
						m.sides, m.ends, m.graded, m.atRest = sides, ends, graded, atRest
						if ends == "TF" || ends == "TR" { // constant properties have ways of their own
							m.conductivity, m.capacity = constant(1.3), constant(0.8)
						}
						var errs, means, fluxes []float64
						for _, n := range sizes {
							st, exact, flow := m.problem(t, n, nil)
							got := staggered.NewScalar(st.Grid())
							rep, err := st.Steady(context.Background(), got, flow)
							require.NoError(t, err)
							require.LessOrEqual(t, rep.Iterations, 3)
							e, mean := differences(got.Values, exact.Values)
							errs, means = append(errs, e), append(means, mean)
							fluxes = append(fluxes, m.fluxError(t, st, got, flow))
						}
						requireOrder(t, "largest error", 1.85, errs)
						requireOrder(t, "mean error", 1.9, means)
						requireOrder(t, "wall flux", 1.85, fluxes)
					})
				}
			}
		}
	}
}

// fluxError returns the error of the flux through walls: the largest, or, where
// a wall of prescribed flux or heat transfer meets another, the root mean square.
// In the last cell before such a corner the error falls as h² log h only.
func (m *manufactured) fluxError(t *testing.T, st *Stepper, temperature *staggered.Scalar, flow *staggered.Flow) float64 {
	worst, square, cells := 0.0, 0.0, 0.0
	for _, s := range staggered.Sides() {
		if m.sides == "PP" && !s.Horizontal() {
			continue
		}
		q, err := st.WallFluxTo(nil, s, temperature, flow)
		require.NoError(t, err)
		at := st.Grid().XCentres()
		if !s.Horizontal() {
			at = st.Grid().ZCentres()
		}
		for j, got := range q {
			e := math.Abs(got - m.fluxInto(s, at[j]))
			worst, square, cells = math.Max(worst, e), square+e*e, cells+1
		}
	}
	if m.sides != "PP" && m.sides+m.ends != "TTTT" {
		return math.Sqrt(square / cells)
	}
	return worst
}
