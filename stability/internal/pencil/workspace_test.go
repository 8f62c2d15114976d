package pencil

import (
	"math"
	"math/cmplx"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"gonum.org/v1/gonum/floats"
)

// denseAt evaluates the matrix of a pencil from its blocks.
func denseAt(p *Pencil, pt *Point) [][]complex128 {
	c := pt.coefficients()
	a := make([][]complex128, p.n)
	for i := range a {
		a[i] = make([]complex128, p.n)
	}
	for _, b := range p.blocks {
		for i := range b.Rows {
			for j := range b.Cols {
				a[b.Row+i][b.Col+j] += c[b.Part] * complex(b.Data[i*b.Cols+j]*math.Pow(pt.K, float64(b.Power)), 0)
			}
		}
	}
	return a
}

// at returns element i of a vector of a workspace.
func (w *Workspace) at(v []float64, i int) complex128 {
	if w.complex {
		return complex(v[i], v[w.n+i])
	}
	return complex(v[i], 0)
}

// The bordered systems and their transposes are solved, for real and complex σ.
func TestBorderedSolves(t *testing.T) {
	for _, sigma := range []complex128{0.4, 0.4 - 1.1i} {
		p := dense()
		w := NewWorkspace(p)
		w.prepare(imag(sigma) != 0)
		w.startBorder()
		pt := Point{K: 0.9, Sigma: sigma, Drive: [3]float64{0.3, 1.2}}
		for range 2 { // with the first border, and with an adopted one
			w.factor(&pt)
			g := w.null()
			j := denseAt(p, &pt)
			var norm complex128
			for i := range p.n {
				right, left := w.at(w.b, i)*g, w.at(w.c, i)*g
				for l := range p.n {
					right += j[i][l] * w.at(w.x, l)
					left += w.at(w.y, l) * j[l][i]
				}
				assert.InDelta(t, 0, cmplx.Abs(right), 1e-12, "J x + b g, row %d", i)
				assert.InDelta(t, 0, cmplx.Abs(left), 1e-12, "yᵀJ + g cᵀ, column %d", i)
				norm += w.at(w.c, i) * w.at(w.x, i)
			}
			assert.InDelta(t, 0, cmplx.Abs(norm-1), 1e-12)
			assert.InDelta(t, 0, cmplx.Abs(w.last(w.y)-g), 1e-12)
			w.adoptBorder()
			assert.InDelta(t, 1, floats.Norm(w.b, 2), 1e-14)
			assert.InDelta(t, 1, floats.Norm(w.c, 2), 1e-14)
		}
	}
}

// At a solution the adopted border is the one that keeps the bordered matrix
// regular: cᵀx = xᴴx/|x|.
func TestAdoptedBorderIsParallel(t *testing.T) {
	w := NewWorkspace(spiral())
	_, err := w.Solve(Curve{Kind: GrowingOscillation}, Point{K: 2, Sigma: 1 + 2i, Drive: [3]float64{5}})
	require.NoError(t, err)
	w.adoptBorder()
	var inner complex128
	size := 0.0
	for i := range w.p.n {
		x := w.at(w.x, i)
		inner += w.at(w.c, i) * x
		size += real(x)*real(x) + imag(x)*imag(x)
	}
	assert.InDelta(t, math.Sqrt(size), real(inner), 1e-13)
	assert.InDelta(t, 0, imag(inner), 1e-13)
}

func TestStartBorder(t *testing.T) {
	w := NewWorkspace(dense())
	w.prepare(false)
	w.startBorder()
	b, c := append([]float64(nil), w.b...), append([]float64(nil), w.c...)
	assert.InDelta(t, 1, floats.Norm(b, 2), 1e-14)
	assert.InDelta(t, 1, floats.Norm(c, 2), 1e-14)
	assert.Less(t, math.Abs(floats.Dot(b, c)), 0.999)
	assert.Zero(t, b[w.n-1])
	distinct := map[float64]bool{}
	for _, v := range append(b[:w.n-1], c[:w.n-1]...) {
		assert.Greater(t, math.Abs(v), 0.1, "no element is small")
		distinct[v] = true
	}
	assert.Len(t, distinct, 2*w.p.n)
	w.prepare(true)
	w.startBorder()
	assert.Equal(t, b[:w.n-1], w.b[:w.n-1], "the same numbers each time")
	for _, v := range w.b[w.n:] {
		assert.Zero(t, v)
	}
}

// A matrix times a vector, and its derivatives in k, for complex coefficients.
func TestApply(t *testing.T) {
	p := dense()
	w := NewWorkspace(p)
	w.prepare(true)
	pt := Point{K: 1.4, Sigma: 0.2 + 0.9i, Drive: [3]float64{1, 2}}
	x := make([]float64, w.order)
	for i := range x {
		x[i] = math.Sin(float64(i + 1))
	}
	const h = 1e-5
	up, down := pt, pt
	up.K += h
	down.K -= h
	a, plus, minus := denseAt(p, &pt), denseAt(p, &up), denseAt(p, &down)
	got := make([]float64, w.order)
	for d := range 3 {
		w.apply(got, x, pt.coefficients(), pt.K, d)
		for i := range p.n {
			var want complex128
			for j := range p.n {
				e := a[i][j]
				switch d {
				case 1:
					e = (plus[i][j] - minus[i][j]) / (2 * h)
				case 2:
					e = (plus[i][j] - 2*a[i][j] + minus[i][j]) / (h * h)
				}
				want += e * w.at(x, j)
			}
			assert.InDelta(t, 0, cmplx.Abs(want-w.at(got, i)), []float64{1e-12, 1e-8, 1e-4}[d], "derivative %d, row %d", d, i)
		}
	}
}

func TestPowerDerivative(t *testing.T) {
	for _, tt := range []struct {
		k    float64
		p, d int
		want float64
	}{{2, 0, 0, 1}, {2, 3, 0, 8}, {2, 3, 1, 12}, {2, 3, 2, 12}, {2, 1, 2, 0}, {0, 0, 0, 1}, {0, 2, 2, 2}, {0, 1, 0, 0}, {5, 0, 1, 0}} {
		assert.Equal(t, tt.want, powerDerivative(tt.k, tt.p, tt.d), "%+v", tt)
	}
}

// The diagonal of A is 1 at k = 1, whatever the blocks, and Unscale undoes it.
func TestScaling(t *testing.T) {
	p := New(3, []Block{
		block(Base, 0, 4, 1, 0, 1, -9, 2, 0, 2, 0), block(Base, 2, 5, 0, 0, 0, -7, 0, 0, 0, 0), block(Mass, 0, 1, 0, 0, 0, 1, 0, 0, 0, 1),
	})
	a := denseAt(p, &Point{K: 1})
	assert.InDelta(t, 1, real(a[0][0]), 1e-15)
	assert.InDelta(t, -1, real(a[1][1]), 1e-15)
	assert.InDelta(t, 2.0/4, real(a[1][2]), 1e-15, "a row without a diagonal is left")
	assert.InDelta(t, 1.0/(3*4), real(a[0][1]), 1e-15)
	x := []float64{3, 4, 5}
	p.Unscale(x)
	assert.InDeltaSlice(t, []float64{1, 1, 5}, x, 1e-15)
}

// Eigenvalues that are zero but for round-off are not taken for huge driving
// numbers.
func TestRankOfADrive(t *testing.T) {
	u, v := []float64{0.3, -1.7, 0.9, 2.1}, []float64{-1.1, 0.4, 0.77, -0.2}
	drive := make([]float64, 0, 16)
	for _, a := range u {
		for _, b := range v {
			drive = append(drive, a*b)
		}
	}
	base := append([]float64(nil), dense().blocks[0].Data...)
	w := NewWorkspace(New(4, []Block{block(Base, 0, base...), block(FirstDrive, 0, drive...)}))
	plus, err := w.DriveEigenvalues(Point{K: 1}, 0)
	require.NoError(t, err)
	n := len(plus)
	for i := range drive {
		drive[i] = -drive[i]
	}
	w = NewWorkspace(New(4, []Block{block(Base, 0, base...), block(FirstDrive, 0, drive...)}))
	minus, err := w.DriveEigenvalues(Point{K: 1}, 0)
	require.NoError(t, err)
	assert.Equal(t, 1, n+len(minus), "a matrix of rank one has one eigenvalue: %v, %v", plus, minus)
}

func TestMoves(t *testing.T) {
	pt := Point{K: 2, Sigma: 3 + 4i, Drive: [3]float64{1, 10}}
	d := [2]float64{0.5, 0.25}
	a := pt
	assert.InDelta(t, 0.5/10.5, Curve{Kind: Marginal, Drive: 1}.move(&a, d), 1e-15)
	assert.Equal(t, Point{2, 3 + 4i, [3]float64{1, 10.5}}, a)
	a = pt
	assert.InDelta(t, 0.5/10.5+0.25/4.25, Curve{Kind: MarginalOscillation, Drive: 1}.move(&a, d), 1e-15)
	assert.Equal(t, Point{2, 3 + 4.25i, [3]float64{1, 10.5}}, a)
	a = pt
	assert.InDelta(t, 0.5/(3.5+4), Curve{Kind: Growth}.move(&a, d), 1e-15)
	assert.Equal(t, 3.5+4i, a.Sigma)
	a = pt
	assert.InDelta(t, math.Hypot(0.5, 0.25)/math.Hypot(3.5, 4.25), Curve{Kind: GrowingOscillation}.move(&a, d), 1e-15)
	assert.Equal(t, 3.5+4.25i, a.Sigma)
	assert.Equal(t, 10.0, Curve{Kind: Marginal, Drive: 1}.Objective(&pt))
	assert.Equal(t, 3.0, Curve{Kind: Growth}.Objective(&pt))
	assert.True(t, MarginalOscillation.Oscillating())
	assert.False(t, Growth.Oscillating())
}

// Newton's method converges fast from afar, and says so when there is nothing
// to converge to.
func TestSolveFromAfar(t *testing.T) {
	w := NewWorkspace(parabola())
	for _, start := range []float64{0.1, 2, 300} {
		s, err := w.Solve(Curve{Kind: Marginal}, Point{K: 1, Drive: [3]float64{start}})
		require.NoError(t, err)
		assert.InEpsilon(t, 5, s.Drive[0], 1e-14)
		assert.Less(t, s.Residual, 1e-7)
	}
	flat := New(1, []Block{block(Base, 0, 3), block(FirstDrive, 0, 0)})
	_, err := NewWorkspace(flat).Solve(Curve{Kind: Marginal}, Point{K: 1, Drive: [3]float64{1}})
	assert.ErrorIs(t, err, ErrDiverged)
	_, err = NewWorkspace(flat).Extremum(Curve{Kind: Marginal}, Point{K: 1, Drive: [3]float64{1}}, 0.5, 2)
	assert.ErrorIs(t, err, ErrDiverged)
}
