package pencil

import (
	"math"
	"math/cmplx"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// block makes a block of a full matrix of two unknowns.
func block(part, power int, data ...float64) Block {
	n := int(math.Sqrt(float64(len(data))))
	return Block{Part: part, Power: power, Rows: n, Cols: n, Data: data}
}

// parabola has the single neutral value R = (4 + k⁴)/k², smallest at k = √2.
func parabola() *Pencil {
	return New(1, []Block{block(Base, 0, 4), block(Base, 4, 1), block(FirstDrive, 2, -1), block(Mass, 0, -1)})
}

// spiral is [σ + 2 + k² - R, 3; -3, σ + 1 + 1/…]: with b = 1 it oscillates from
// R = 3 + k² on at the frequency √8. An offset makes R smallest at k = 2.
func spiral() *Pencil {
	return New(2, []Block{
		block(Base, 0, 6, 3, -3, 1),
		block(Base, 1, -4, 0, 0, 0),
		block(Base, 2, 1, 0, 0, 0),
		block(Mass, 0, -1, 0, 0, -1),
		block(FirstDrive, 0, -1, 0, 0, 0),
	})
}

// dense is a coupled problem without any symmetry, of four unknowns.
func dense() *Pencil {
	full := func(part, power int, seed uint64) Block {
		data := make([]float64, 16)
		for i := range data {
			seed = seed*6364136223846793005 + 1442695040888963407
			data[i] = float64(int64(seed>>33)%1000) / 500
			if i%5 == 0 && part == Base {
				data[i] += 4
			}
		}
		return block(part, power, data...)
	}
	return New(4, []Block{
		full(Base, 0, 1), full(Base, 2, 2), full(Base, 3, 3), full(Mass, 0, 4), full(Mass, 1, 5),
		full(FirstDrive, 1, 6), full(FirstDrive+1, 2, 7),
	})
}

func TestDriveEigenvalues(t *testing.T) {
	w := NewWorkspace(parabola())
	for _, k := range []float64{0.3, 1, 2.5} {
		found, err := w.DriveEigenvalues(Point{K: k}, 0)
		require.NoError(t, err)
		require.Len(t, found, 1)
		assert.InEpsilon(t, (4+k*k*k*k)/(k*k), found[0], 1e-14)
	}
}

func TestDriveEigenvaluesDropsNegativeAndComplexOnes(t *testing.T) {
	p := New(4, []Block{
		block(Base, 0, 1, 0, 0, 0, 0, 1, 0, 0, 0, 0, 1, 0, 0, 0, 0, 1),
		// singular at R = 1/2, R = -1 and R = 1/(1 ± i)
		block(FirstDrive, 0, -2, 0, 0, 0, 0, 1, 0, 0, 0, 0, -1, -1, 0, 0, 1, -1),
	})
	found, err := NewWorkspace(p).DriveEigenvalues(Point{K: 1}, 0)
	require.NoError(t, err)
	require.Len(t, found, 1)
	assert.InEpsilon(t, 0.5, found[0], 1e-14)
}

func TestGrowthEigenvaluesWithoutInertia(t *testing.T) {
	// σ y = -2 y + x with x = 3 y, which has no mass: one eigenvalue, 1.
	p := New(2, []Block{block(Base, 0, 1, -3, -1, 2), block(Mass, 0, 0, 0, 0, -1)})
	found, err := NewWorkspace(p).GrowthEigenvalues(Point{K: 1, Sigma: 7})
	require.NoError(t, err)
	require.Len(t, found, 1, "the unknown without mass has no growth rate")
	assert.InDelta(t, 1, real(found[0]), 1e-13)
	assert.Zero(t, imag(found[0]))
}

// Only the equations that a part occurs in are kept for its eigenvalues.
func TestReducedProblemIsSmall(t *testing.T) {
	w := NewWorkspace(New(3, []Block{
		block(Base, 0, 3, 1, 0, 1, 4, 1, 0, 1, 5),
		{Part: Mass, Row: 2, Rows: 1, Col: 2, Cols: 1, Data: []float64{-1}},
		{Part: FirstDrive, Row: 0, Rows: 1, Col: 1, Cols: 2, Data: []float64{-1, -2}},
	}))
	_, err := w.GrowthEigenvalues(Point{K: 1, Sigma: 3})
	require.NoError(t, err)
	assert.Equal(t, []int{2}, w.eigen.where)
	_, err = w.DriveEigenvalues(Point{K: 1}, 0)
	require.NoError(t, err)
	assert.Equal(t, []int{0}, w.eigen.where)
}

func TestGrowthEigenvaluesOfASpiral(t *testing.T) {
	w := NewWorkspace(spiral())
	found, err := w.GrowthEigenvalues(Point{K: 2, Sigma: 20, Drive: [3]float64{5}})
	require.NoError(t, err)
	require.Len(t, found, 2)
	// trace 5 - 2 - 1, determinant (2 - 5)·1 + 9
	want := complex(1, math.Sqrt(6-1))
	assert.InDelta(t, 0, cmplx.Abs(found[0]-want), 1e-12)
	assert.InDelta(t, 0, cmplx.Abs(found[1]-cmplx.Conj(want)), 1e-12)
}

func TestSingularMatrixIsReported(t *testing.T) {
	p := New(2, []Block{block(Base, 0, 1, 1, 1, 1), block(FirstDrive, 0, 1, 0, 0, 0)})
	_, err := NewWorkspace(p).DriveEigenvalues(Point{K: 1}, 0)
	assert.ErrorIs(t, err, ErrSingular)
	_, err = NewWorkspace(p).SolveLinear(Point{K: 1}, []float64{1, 2})
	assert.ErrorIs(t, err, ErrSingular)
}

func TestSolveMarginal(t *testing.T) {
	w := NewWorkspace(parabola())
	s, err := w.Solve(Curve{Kind: Marginal}, Point{K: 1, Drive: [3]float64{4}})
	require.NoError(t, err)
	assert.InEpsilon(t, 5, s.Drive[0], 1e-14)
	assert.InEpsilon(t, -8+2, s.Slope, 1e-13) // -8/k³ + 2k
	w.Bend(Curve{Kind: Marginal}, &s)
	assert.InEpsilon(t, 24+2, s.Curvature, 1e-12)      // 24/k⁴ + 2
	assert.InEpsilon(t, 1, real(s.Sensitivity), 1e-13) // σ = R k² - 4 - k⁴
}

func TestExtremumOfParabola(t *testing.T) {
	w := NewWorkspace(parabola())
	s, err := w.Extremum(Curve{Kind: Marginal}, Point{K: 1.2, Drive: [3]float64{4.3}}, 0.5, 3)
	require.NoError(t, err)
	assert.InEpsilon(t, math.Sqrt2, s.K, 1e-15)
	assert.InEpsilon(t, 4, s.Drive[0], 1e-15)
	assert.InEpsilon(t, 8, s.Curvature, 1e-12)
	_, err = w.Extremum(Curve{Kind: Marginal}, Point{K: 0.7, Drive: [3]float64{8.6}}, 0.5, 1)
	assert.ErrorIs(t, err, ErrDiverged, "the minimum is outside")
}

func TestExtremumOfOscillation(t *testing.T) {
	w := NewWorkspace(spiral())
	c := Curve{Kind: MarginalOscillation}
	s, err := w.Extremum(c, Point{K: 2.3, Sigma: 2.5i, Drive: [3]float64{3.3}}, 1, 4)
	require.NoError(t, err)
	assert.InEpsilon(t, 2, s.K, 1e-14)
	assert.InEpsilon(t, 3, s.Drive[0], 1e-14) // trace: R = 2 + (k-2)² + 1
	assert.InEpsilon(t, math.Sqrt(8), imag(s.Sigma), 1e-14)
	assert.Zero(t, real(s.Sigma))
	assert.InEpsilon(t, 2, s.Curvature, 1e-12)
	assert.InEpsilon(t, 0.5, real(s.Sensitivity), 1e-12) // half the trace
}

func TestExtremumOfGrowth(t *testing.T) {
	w := NewWorkspace(spiral())
	s, err := w.Extremum(Curve{Kind: GrowingOscillation}, Point{K: 1.8, Sigma: 1 + 2i, Drive: [3]float64{5}}, 1, 3)
	require.NoError(t, err)
	assert.InEpsilon(t, 2, s.K, 1e-14)
	assert.InDelta(t, 0, cmplx.Abs(s.Sigma-complex(1, math.Sqrt(5))), 1e-13)
	assert.Less(t, s.Curvature, 0.0)
	w = NewWorkspace(parabola())
	s, err = w.Extremum(Curve{Kind: Growth}, Point{K: 1.5, Sigma: 3, Drive: [3]float64{6}}, 1, 3)
	require.NoError(t, err)
	assert.InEpsilon(t, math.Sqrt(3), s.K, 1e-14) // σ = 6k² - 4 - k⁴
	assert.InEpsilon(t, 5, real(s.Sigma), 1e-13)
}

// The derivatives of g are compared with differences of g itself, for real and
// for complex σ.
func TestJetAgainstDifferences(t *testing.T) {
	const h = 1e-4
	for _, sigma := range []complex128{0.3, 0.3 + 0.7i} {
		w := NewWorkspace(dense())
		w.prepare(imag(sigma) != 0)
		w.startBorder()
		at := Point{K: 1.3, Sigma: sigma, Drive: [3]float64{0.8, -0.4}}
		j := *w.jet(&at, 1, true)
		shifted := func(a Direction, d float64) Point {
			pt := at
			switch a {
			case AlongK:
				pt.K += d
			case AlongSigma:
				pt.Sigma += complex(d, 0)
			default:
				pt.Drive[1] += d
			}
			return pt
		}
		for a := range Direction(directions) {
			up, down := shifted(a, h), shifted(a, -h)
			plus := *w.jet(&up, 1, true)
			minus := *w.jet(&down, 1, true)
			d := (plus.G - minus.G) / (2 * h)
			assert.InDelta(t, 0, cmplx.Abs(d-j.First[a]), 1e-6*(1+cmplx.Abs(d)), "first derivative %d at σ = %v", a, sigma)
			for b := range Direction(directions) {
				d2 := (plus.First[b] - minus.First[b]) / (2 * h)
				assert.InDelta(t, 0, cmplx.Abs(d2-j.Second[a][b]), 1e-6*(1+cmplx.Abs(d2)),
					"second derivative %d, %d at σ = %v", a, b, sigma)
			}
		}
	}
}

func TestVectorSolvesTheProblem(t *testing.T) {
	// In the unscaled basis, (4 + k⁴ - R k²) x = 0 leaves x free; of the spiral,
	// (σ + 1) y = 3 x.
	w := NewWorkspace(spiral())
	s, err := w.Solve(Curve{Kind: GrowingOscillation}, Point{K: 2, Sigma: 1 + 2i, Drive: [3]float64{5}})
	require.NoError(t, err)
	re, im := w.Vector()
	x, y := complex(re[0], im[0]), complex(re[1], im[1])
	assert.InDelta(t, 0, cmplx.Abs((s.Sigma+1)*y-3*x), 1e-12*cmplx.Abs(x))
}

func TestSolveLinear(t *testing.T) {
	w := NewWorkspace(spiral())
	x, err := w.SolveLinear(Point{K: 1, Sigma: 0.5, Drive: [3]float64{1}}, []float64{5, -2})
	require.NoError(t, err)
	// [6 - 4 + 1 - 1 + 0.5, 3; -3, 1.5] x = b
	assert.InDelta(t, 5, 2.5*x[0]+3*x[1], 1e-13)
	assert.InDelta(t, -2, -3*x[0]+1.5*x[1], 1e-13)
}

func TestSlowestDecay(t *testing.T) {
	p := New(3, []Block{
		block(Base, 0, 2, -1, 0, -1, 2, -1, 0, -1, 2), block(Base, 2, 1, 0, 0, 0, 1, 0, 0, 0, 1),
		block(Mass, 0, -2, 0, 0, 0, -2, 0, 0, 0, -2),
	})
	w := NewWorkspace(p)
	want := (2 - math.Sqrt2 + 9) / 2
	assert.InEpsilon(t, want, w.SlowestDecay(3), 1e-3)
	assert.GreaterOrEqual(t, w.SlowestDecay(3), want*(1-1e-12))
}

// The eigenvalue routine for matrices without symmetry allocates a little by
// itself; nothing else does.
func TestSteadyUseAllocatesNothing(t *testing.T) {
	w := NewWorkspace(dense())
	symmetric := NewWorkspace(New(2, []Block{
		block(Base, 0, 3, -1, -1, 2), block(FirstDrive, 0, -2, 1, 1, -4), block(Mass, 0, -1, 0, 0, -1),
	}))
	use := func() {
		_, _ = w.Solve(Curve{Kind: Growth}, Point{K: 1, Sigma: 1})
		_, _ = w.Solve(Curve{Kind: GrowingOscillation}, Point{K: 1, Sigma: 1 + 1i})
		_, _ = symmetric.DriveEigenvalues(Point{K: 1}, 0)
		_, _ = symmetric.GrowthEigenvalues(Point{K: 1, Sigma: 50})
	}
	use()
	assert.Zero(t, testing.AllocsPerRun(20, use))
}

// Both ways to the eigenvalues of a self-adjoint problem agree, and the
// symmetric one is taken.
func TestSelfAdjointProblems(t *testing.T) {
	blocks := func() []Block {
		return []Block{block(Base, 0, 3, -1, -1, 2), block(FirstDrive, 0, -2, 1, 1, -4), block(Mass, 0, -1, 0.5, 0.5, -3)}
	}
	w := NewWorkspace(New(2, blocks()))
	found, err := w.DriveEigenvalues(Point{K: 1}, 0)
	require.NoError(t, err)
	assert.True(t, w.symmetrise(), "the reduced matrix is left as it was")
	// det(A + R B) = (3 - 2R)(2 - 4R) - (1 - R)² = 5 - 14R + 7R²
	root := math.Sqrt(14*14 - 4*5*7)
	require.Len(t, found, 2)
	assert.InEpsilon(t, (14-root)/14, found[0], 1e-13)
	assert.InEpsilon(t, (14+root)/14, found[1], 1e-13)
	rates, err := w.GrowthEigenvalues(Point{K: 1, Sigma: 10})
	require.NoError(t, err)
	for _, sigma := range rates { // det(A - σM) = (3+σ)(2+3σ) - (1+σ/2)²
		assert.Zero(t, imag(sigma))
		x := real(sigma)
		assert.InDelta(t, 0, (3+x)*(2+3*x)-(1+x/2)*(1+x/2), 1e-12)
	}
	assert.Greater(t, real(rates[0]), real(rates[1]))
}
