package laminate

import (
	"math"
	"math/rand/v2"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"gonum.org/v1/gonum/mat"
)

func randomBand(n int, seed uint64) (*band, []float64) {
	random := rand.New(rand.NewPCG(seed, 1))
	m, rhs := newBand(n), make([]float64, n)
	for r := range n {
		rhs[r] = random.NormFloat64()
		from, to := m.span(r)
		for c := from; c < to; c++ {
			m.set(r, c, random.NormFloat64()*math.Pow(10, float64(r%5)))
		}
	}
	return m, rhs
}

// The banded solver agrees with a dense one on matrices that need pivoting.
func TestBandAgainstDense(t *testing.T) {
	for _, n := range []int{1, 2, 5, 6, 11, 40} {
		m, rhs := randomBand(n, uint64(n))
		dense := mat.NewDense(n, n, nil)
		for r := range n {
			from, to := m.span(r)
			for c := from; c < to; c++ {
				dense.Set(r, c, m.entries[r*width+c-r+lower])
			}
		}
		var want mat.VecDense
		require.NoError(t, want.SolveVec(dense, mat.NewVecDense(n, append([]float64(nil), rhs...))))
		got := m.solveRefined(rhs)
		for i := range got {
			assert.InEpsilon(t, want.AtVec(i), got[i], 1e-10, "n = %d", n)
		}
	}
}

// Residuals keep digits that cancel in working precision.
func TestResidualInTwicePrecision(t *testing.T) {
	m := newBand(2)
	m.set(0, 0, 1+0x1p-30)
	m.set(0, 1, -1)
	m.set(1, 1, 1)
	x := []float64{1 + 0x1p-30, 1 + 0x1p-29}
	r := make([]float64, 2)
	m.residual(r, []float64{0, 0}, x)
	assert.Equal(t, -0x1p-60, r[0]) // 1 + 2⁻²⁹ − (1 + 2⁻³⁰)²
}

// Refinement recovers the digits that an ill-conditioned matrix costs: the
// solution of a Hilbert matrix is right to the last bit but one.
func TestRefinement(t *testing.T) {
	const n = 6
	m, rhs := newBand(n), make([]float64, n)
	for r := range n {
		for c := range n {
			v := float64(27720 / (r + c + 1)) // all entries are whole numbers
			m.set(r, c, v)
			rhs[r] += v
		}
	}
	for _, x := range m.solveRefined(rhs) {
		assert.InDelta(t, 1, x, 3e-16)
	}
}

// The uncertainty is what a rounding of the entries does to the solution.
func TestUncertaintyFollowsTheCondition(t *testing.T) {
	for _, e := range []float64{1, 1e-3, 1e-6} {
		m := newBand(2)
		m.set(0, 0, 1)
		m.set(0, 1, 1)
		m.set(1, 0, -1)
		m.set(1, 1, -1-e)
		x := m.solveRefined([]float64{1, -2})
		d := m.uncertainty(x)
		size := math.Max(math.Abs(d[0]), math.Abs(d[1])) / math.Max(math.Abs(x[0]), math.Abs(x[1]))
		assert.Greater(t, size, 0.3*epsilon/e)
		assert.Less(t, size, 30*epsilon/e)
	}
}
