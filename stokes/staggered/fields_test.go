package staggered_test

import (
	"fmt"
	"math"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"example.org/overturn/stokes/staggered"
)

// graded returns the grid on which most tests run: no two spacings alike.
func graded(t testing.TB, nx, nz int) *staggered.Grid {
	t.Helper()
	g, err := staggered.Graded(nx, nz, 2, 1.5, staggered.Grading{Left: 3, Bottom: 2, Top: 5})
	require.NoError(t, err)
	return g
}

// order returns the observed order of convergence of err(n) under doubling.
func order(err func(n int) float64, n int) float64 { return math.Log2(err(n) / err(2*n)) }

func TestStorageIsRowMajor(t *testing.T) {
	g, err := staggered.Uniform(3, 2, 3, 2)
	require.NoError(t, err)
	position := func(x, z float64) float64 { return x + 100*z }

	s := staggered.NewScalar(g)
	s.Fill(position)
	assert.Equal(t, []float64{50.5, 51.5, 52.5, 150.5, 151.5, 152.5}, s.Values)
	assert.Equal(t, 152.5, s.At(2, 1))
	assert.Equal(t, []float64{150.5, 151.5, 152.5}, s.Row(1))
	s.Set(2, 0, 7)
	assert.Equal(t, 7.0, s.Values[2])

	n := staggered.NewNodal(g)
	n.Fill(position)
	assert.Equal(t, []float64{0, 1, 2, 3, 100, 101, 102, 103, 200, 201, 202, 203}, n.Values)
	assert.Equal(t, 103.0, n.At(3, 1))
	n.Set(3, 1, 9)
	assert.Equal(t, 9.0, n.Values[7])
	n.SetAll(4)
	assert.Equal(t, 4.0, n.Values[11])

	v := staggered.NewVector(g)
	v.Fill(position, position)
	assert.Equal(t, []float64{50, 51, 52, 53, 150, 151, 152, 153}, v.X)
	assert.Equal(t, []float64{0.5, 1.5, 2.5, 100.5, 101.5, 102.5, 200.5, 201.5, 202.5}, v.Z)
	v.Fill(nil, func(_, _ float64) float64 { return 1 })
	assert.Equal(t, 50.0, v.X[0])
	v.SetAll(5, 6)
	assert.Equal(t, [2]float64{5, 6}, [2]float64{v.X[7], v.Z[8]})
}

// The plotting interface of gonum's plot library, copied here so that the
// library need not be imported: plotter.GridXYZ.
type gridXYZ interface {
	Dims() (c, r int)
	Z(c, r int) float64
	X(c int) float64
	Y(r int) float64
}

func TestFieldsArePlottable(t *testing.T) {
	g := graded(t, 5, 4)
	s, n := staggered.NewScalar(g), staggered.NewNodal(g)
	f := func(x, z float64) float64 { return 3*x - z }
	s.Fill(f)
	n.Fill(f)
	for _, field := range []gridXYZ{s, n} {
		c, r := field.Dims()
		assert.InDelta(t, f(field.X(c-1), field.Y(r-1)), field.Z(c-1, r-1), 1e-15)
		assert.InDelta(t, f(field.X(1), field.Y(2)), field.Z(1, 2), 1e-15)
	}
	c, r := s.Dims()
	assert.Equal(t, [2]int{5, 4}, [2]int{c, r})
	c, r = n.Dims()
	assert.Equal(t, [2]int{6, 5}, [2]int{c, r})
}

func TestWrappedFieldsShareMemory(t *testing.T) {
	g, err := staggered.Uniform(2, 2, 1, 1)
	require.NoError(t, err)
	values := make([]float64, 4)
	s, err := staggered.WrapScalar(g, values)
	require.NoError(t, err)
	s.SetAll(3)
	assert.Equal(t, []float64{3, 3, 3, 3}, values)

	corners := make([]float64, 9)
	n, err := staggered.WrapNodal(g, corners)
	require.NoError(t, err)
	n.SetAll(2)
	assert.Equal(t, 2.0, corners[8])

	x, z, p := make([]float64, 6), make([]float64, 6), make([]float64, 4)
	f, err := staggered.WrapFlow(g, x, z, p)
	require.NoError(t, err)
	f.Velocity().SetAll(1, 2)
	f.Pressure().SetAll(5)
	assert.Equal(t, [3]float64{1, 2, 5}, [3]float64{x[5], z[5], p[3]})

	_, err = staggered.WrapScalar(g, values[:3])
	assert.EqualError(t, err, "staggered: values holds 3 numbers, want 4 for 2x2 cells")
	_, err = staggered.WrapNodal(g, values)
	assert.EqualError(t, err, "staggered: values holds 4 numbers, want 9 for 2x2 cells")
	_, err = staggered.WrapVector(g, x[:5], z)
	assert.EqualError(t, err, "staggered: x holds 5 numbers, want 6 for 2x2 cells")
	_, err = staggered.WrapVector(g, x, z[:5])
	assert.EqualError(t, err, "staggered: z holds 5 numbers, want 6 for 2x2 cells")
	_, err = staggered.WrapFlow(g, x, z, z)
	assert.EqualError(t, err, "staggered: p holds 6 numbers, want 4 for 2x2 cells")
	_, err = staggered.WrapFlow(g, x, p, p)
	assert.Error(t, err)
	_, err = staggered.WrapScalar(nil, values)
	assert.EqualError(t, err, "staggered: values: grid is nil, want a grid")
	_, err = staggered.WrapFlow(nil, x, z, p)
	assert.ErrorContains(t, err, "grid is nil")
}

func TestCopiesAreIndependent(t *testing.T) {
	s := staggered.NewScalar(graded(t, 3, 3))
	s.SetAll(1)
	c := s.Clone()
	s.SetAll(2)
	assert.Equal(t, 1.0, c.Values[0])
	require.NoError(t, c.CopyFrom(s))
	assert.Equal(t, 2.0, c.Values[8])
	assert.Error(t, c.CopyFrom(staggered.NewScalar(graded(t, 3, 4))))
	assert.Error(t, c.CopyFrom(staggered.NewScalar(graded(t, 9, 1))), "as many cells, in other rows")

	f := staggered.NewFlow(s.Grid)
	f.Velocity().SetAll(1, 2)
	f.Pressure().SetAll(3)
	h := f.Clone()
	f.Velocity().SetAll(0, 0)
	f.Pressure().SetAll(0)
	assert.Equal(t, [3]float64{1, 2, 3}, [3]float64{h.VX[0], h.VZ[0], h.P[0]})
	require.NoError(t, f.CopyFrom(h))
	assert.Equal(t, h, f)
	assert.Error(t, f.CopyFrom(staggered.NewFlow(graded(t, 3, 4))))
}

func TestMeansAreExactForLinearFields(t *testing.T) {
	g := graded(t, 9, 7)
	s := staggered.NewScalar(g)
	s.Fill(func(x, z float64) float64 { return 1 + 2*x + 3*z })
	// The midpoint rule is exact on each cell.
	assert.InEpsilon(t, 1+2*1+3*0.75, s.Mean(), 1e-14)
	assert.InEpsilon(t, 3*(1+2*1+3*0.75), s.Integral(), 1e-14)
	for k, m := range s.HorizontalMeans(nil) {
		assert.InEpsilon(t, 3+3*g.ZCentres()[k], m, 1e-14)
	}
	dst := make([]float64, 7)
	assert.Same(t, &dst[0], &s.HorizontalMeans(dst)[0])
	s.SetAll(-3)
	assert.InEpsilon(t, 3, s.RMS(), 1e-15)
}

func TestExtrema(t *testing.T) {
	g, err := staggered.Uniform(4, 4, 4, 4)
	require.NoError(t, err)
	s := staggered.NewScalar(g)
	s.Set(1, 2, -5)
	s.Set(3, 0, 8)
	s.Set(3, 3, 8)
	lowest, highest := s.Extrema()
	assert.Equal(t, staggered.Extremum{Value: -5, X: 1.5, Z: 2.5}, lowest)
	assert.Equal(t, staggered.Extremum{Value: 8, X: 3.5, Z: 0.5}, highest)
	s.Set(2, 2, math.NaN())
	lowest, highest = s.Extrema()
	assert.True(t, math.IsNaN(lowest.Value) && math.IsNaN(highest.Value))
	assert.Equal(t, 2.5, lowest.X)

	n := staggered.NewNodal(g)
	n.Set(4, 1, 2)
	_, highest = n.Extrema()
	assert.Equal(t, staggered.Extremum{Value: 2, X: 4, Z: 1}, highest)
}

// Bilinear interpolation and linear extrapolation reproduce 1, x, z and xz.
func TestInterpolationIsExactForBilinearFields(t *testing.T) {
	g := graded(t, 6, 5)
	f := func(x, z float64) float64 { return 2 - x + 4*z + 3*x*z }
	s, n, v := staggered.NewScalar(g), staggered.NewNodal(g), staggered.NewFlow(g)
	s.Fill(f)
	n.Fill(f)
	v.FillVelocity(f, func(x, z float64) float64 { return -f(x, z) })
	for _, p := range [][2]float64{{0, 0}, {2, 1.5}, {0.001, 1.49}, {1, 0.7}, {1.9, 0.2}, {0.31, 1.1}} {
		x, z := p[0], p[1]
		assert.InDelta(t, f(x, z), s.ValueAt(x, z), 1e-13)
		assert.InDelta(t, f(x, z), n.ValueAt(x, z), 1e-13)
		vx, vz := v.VelocityAt(x, z)
		assert.InDelta(t, f(x, z), vx, 1e-13)
		assert.InDelta(t, -f(x, z), vz, 1e-13)
	}
	assert.InDelta(t, f(2, 0), s.ValueAt(17, -3), 1e-13, "outside: the nearest point of the box")
	one, err := staggered.Uniform(1, 1, 1, 1)
	require.NoError(t, err)
	c := staggered.NewScalar(one)
	c.SetAll(6)
	assert.Equal(t, 6.0, c.ValueAt(0.9, 0.1))
}

func TestInterpolationIsSecondOrder(t *testing.T) {
	f := func(x, z float64) float64 { return math.Sin(2*x) * math.Exp(z) }
	worst := func(n int) float64 {
		s := staggered.NewScalar(graded(t, n, n))
		s.Fill(f)
		e := 0.0
		for j := range 200 {
			x, z := 2*math.Mod(0.618*float64(j), 1), 1.5*math.Mod(0.414*float64(j), 1)
			e = math.Max(e, math.Abs(s.ValueAt(x, z)-f(x, z)))
		}
		return e
	}
	assert.InDelta(t, 2, order(worst, 64), 0.2)
}

func TestFlowFromStreamIsFreeOfDivergence(t *testing.T) {
	g := graded(t, 13, 11)
	psi := func(x, z float64) float64 { return math.Sin(x*z) + x*x - 3*z }
	f := staggered.NewFlow(g)
	f.FillFromStream(psi)
	div := staggered.NewScalar(g)
	f.DivergenceTo(div)
	assert.Less(t, div.RMS(), 1e-12)

	back := staggered.NewNodal(g)
	f.StreamFunctionTo(back)
	want := staggered.NewNodal(g)
	want.Fill(func(x, z float64) float64 { return psi(x, z) - psi(0, 0) })
	assert.InDeltaSlice(t, want.Values, back.Values, 1e-13)
}

func TestVelocityOfStreamFunction(t *testing.T) {
	worst := func(n int) float64 {
		g := graded(t, n, n)
		f, want := staggered.NewFlow(g), staggered.NewFlow(g)
		f.FillFromStream(func(x, z float64) float64 { return math.Sin(x) * math.Cos(z) })
		want.FillVelocity(
			func(x, z float64) float64 { return -math.Sin(x) * math.Sin(z) },
			func(x, z float64) float64 { return -math.Cos(x) * math.Cos(z) })
		e := 0.0
		for j := range f.VX {
			e = math.Max(e, math.Abs(f.VX[j]-want.VX[j]))
		}
		for j := range f.VZ {
			e = math.Max(e, math.Abs(f.VZ[j]-want.VZ[j]))
		}
		return e
	}
	assert.InDelta(t, 2, order(worst, 32), 0.1)
}

func TestDivergence(t *testing.T) {
	g := graded(t, 5, 6)
	f := staggered.NewFlow(g)
	f.FillVelocity(func(x, _ float64) float64 { return 3 * x }, func(_, z float64) float64 { return 4 * z })
	div := staggered.NewScalar(g)
	f.DivergenceTo(div)
	for _, v := range div.Values {
		assert.InEpsilon(t, 7, v, 1e-13)
	}
}

func TestSpeeds(t *testing.T) {
	g := graded(t, 8, 8)
	f := staggered.NewFlow(g)
	f.Velocity().SetAll(3, -4)
	assert.InEpsilon(t, 5, f.RMS(), 1e-14)
	assert.InEpsilon(t, 5, f.MaxSpeed(), 1e-14)

	// mean of (πcos πx sin πz)² + (π sin πx cos πz)² over the unit box: π²/2
	rms := func(n int) float64 {
		g, err := staggered.Graded(n, n, 1, 1, staggered.Grading{Left: 3, Top: 5})
		require.NoError(t, err)
		f := staggered.NewFlow(g)
		f.FillVelocity(
			func(x, z float64) float64 { return math.Pi * math.Cos(math.Pi*x) * math.Sin(math.Pi*z) },
			func(x, z float64) float64 { return math.Pi * math.Sin(math.Pi*x) * math.Cos(math.Pi*z) })
		return math.Abs(f.RMS() - math.Pi/math.Sqrt2)
	}
	assert.InDelta(t, 2, order(rms, 32), 0.1)
}

func TestCellVelocityIsTheMeanOfTwoFaces(t *testing.T) {
	g := graded(t, 4, 3)
	f := staggered.NewFlow(g)
	f.FillVelocity(func(x, z float64) float64 { return x + z }, func(x, z float64) float64 { return x * z })
	vx, vz := staggered.NewScalar(g), staggered.NewScalar(g)
	f.CellVelocityTo(vx, vz)
	for k, z := range g.ZCentres() {
		for i, x := range g.XCentres() {
			assert.InDelta(t, x+z, vx.At(i, k), 1e-14)
			assert.InDelta(t, x*z, vz.At(i, k), 1e-14)
		}
	}
}

func TestBuoyancyOnFaces(t *testing.T) {
	g := graded(t, 3, 6)
	s, v := staggered.NewScalar(g), staggered.NewVector(g)
	s.Fill(func(x, z float64) float64 { return x + 10*z })
	v.SetAll(1, 1)
	v.FillVertical(s, 2)
	assert.Equal(t, make([]float64, len(v.X)), v.X)
	for k, z := range g.ZNodes() {
		switch k {
		case 0:
			z = g.ZCentres()[0]
		case 6:
			z = g.ZCentres()[5]
		}
		for i, x := range g.XCentres() {
			assert.InDelta(t, 2*(x+10*z), v.Z[k*3+i], 1e-13)
		}
	}
}

func TestDotWeighsFacesByTheirVolume(t *testing.T) {
	v, w := staggered.NewVector(graded(t, 5, 4)), staggered.NewVector(graded(t, 5, 4))
	v.SetAll(2, 3)
	w.SetAll(5, 7)
	assert.InEpsilon(t, 3*(2*5+3*7), v.Dot(w), 1e-14)
	w.Fill(func(x, _ float64) float64 { return x }, func(_, z float64) float64 { return z })
	assert.InEpsilon(t, 2*2*1.5+3*2*1.125, v.Dot(w), 1e-14, "trapezoidal rule, exact for linear fields")
}

// A parabola is reproduced exactly; the order is asked for on a sine.
func TestTangentialVelocity(t *testing.T) {
	g := graded(t, 7, 6)
	f := staggered.NewFlow(g)
	vx := func(x, z float64) float64 { return x + 2*z - z*z }
	vz := func(x, z float64) float64 { return z - 3*x + x*x }
	f.FillVelocity(vx, vz)
	for _, tt := range []struct {
		side staggered.Side
		want func(s float64) float64
	}{
		{staggered.Bottom, func(s float64) float64 { return vx(s, 0) }},
		{staggered.Top, func(s float64) float64 { return vx(s, 1.5) }},
		{staggered.Left, func(s float64) float64 { return vz(0, s) }},
		{staggered.Right, func(s float64) float64 { return vz(2, s) }},
	} {
		along := g.XNodes()
		if !tt.side.Horizontal() {
			along = g.ZNodes()
		}
		got := f.TangentialTo(nil, tt.side)
		require.Len(t, got, len(along))
		for j, s := range along {
			assert.InDelta(t, tt.want(s), got[j], 1e-12, "%v", tt.side)
		}
	}
	thin, err := staggered.Uniform(2, 1, 1, 1)
	require.NoError(t, err)
	h := staggered.NewFlow(thin)
	h.Velocity().SetAll(2, 0)
	assert.Equal(t, []float64{2, 2, 2}, h.TangentialTo(nil, staggered.Top), "one row: a constant")
}

func TestLoopsOverFieldsDoNotAllocate(t *testing.T) {
	g := graded(t, 16, 16)
	s, f, n, v := staggered.NewScalar(g), staggered.NewFlow(g), staggered.NewNodal(g), staggered.NewVector(g)
	means, wall := make([]float64, 16), make([]float64, 17)
	assert.Zero(t, testing.AllocsPerRun(10, func() {
		v.FillVertical(s, 1)
		f.DivergenceTo(s)
		f.StreamFunctionTo(n)
		f.TangentialTo(wall, staggered.Top)
		s.HorizontalMeans(means)
		_, _ = s.Extrema()
		f.VelocityAt(0.3, s.ValueAt(0.1, 0.2))
		_ = f.RMS() + f.MaxSpeed() + s.Mean() + s.RMS()
	}))
}

func ExampleScalar() {
	g, err := staggered.Uniform(40, 20, 2, 1)
	if err != nil {
		fmt.Println(err)
		return
	}
	t := staggered.NewScalar(g)
	t.Fill(func(x, z float64) float64 { return 1 - z + 0.1*math.Cos(math.Pi*x)*math.Sin(math.Pi*z) })
	_, hottest := t.Extrema()
	fmt.Printf("%v: mean %.3f, hottest %.3f near x = %.2f\n", g, t.Mean(), hottest.Value, hottest.X)
	// Output: 40x20 cells, 2 x 1: mean 0.500, hottest 0.983 near x = 0.03
}

func ExampleFlow_FillFromStream() {
	g, err := staggered.Graded(64, 64, 1, 1, staggered.Grading{Bottom: 4, Top: 4})
	if err != nil {
		fmt.Println(err)
		return
	}
	f := staggered.NewFlow(g)
	f.FillFromStream(func(x, z float64) float64 { return math.Sin(math.Pi*x) * math.Sin(math.Pi*z) / math.Pi })
	div := staggered.NewScalar(g)
	f.DivergenceTo(div)
	fmt.Printf("rms speed %.3f, divergence below 1e-12: %v\n", f.RMS(), div.RMS() < 1e-12)
	// Output: rms speed 0.707, divergence below 1e-12: true
}
