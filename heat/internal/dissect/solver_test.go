package dissect

import (
	"errors"
	"fmt"
	"math"
	"math/rand/v2"
	"runtime"
	"testing"

	"github.com/stretchr/testify/require"
)

// random returns a nonsymmetric, diagonally dominant matrix.
func random(nx, nz int, seed uint64) Matrix {
	r := rand.New(rand.NewPCG(seed, 7))
	n := nx * nz
	m := Matrix{make([]float64, n), make([]float64, n), make([]float64, n), make([]float64, n), make([]float64, n)}
	for c := range n {
		m.South[c], m.West[c], m.East[c], m.North[c] = -r.Float64(), -r.Float64(), -r.Float64(), r.Float64()
		m.Centre[c] = 4 + r.Float64()
	}
	return m
}

// product multiplies m with x.
func product(m Matrix, x []float64, nx, nz int, ring bool) []float64 {
	p := planner{nx: nx, nz: nz, ring: ring}
	y := make([]float64, len(x))
	for c := range y {
		y[c] = m.Centre[c] * x[c]
		for d, a := range m.coefficients() {
			if nb := p.neighbour(int32(c), int32(d)); d != int(centre) && nb >= 0 {
				y[c] += a[c] * x[nb]
			}
		}
	}
	return y
}

func TestSolveInvertsProduct(t *testing.T) {
	for _, size := range [][2]int{{1, 1}, {1, 7}, {9, 1}, {2, 2}, {2, 5}, {3, 3}, {5, 4}, {6, 7}, {16, 16}, {31, 12}, {7, 64}, {41, 63}} {
		for _, ring := range []bool{false, true} {
			nx, nz := size[0], size[1]
			t.Run(fmt.Sprintf("%dx%d/ring=%v", nx, nz, ring), func(t *testing.T) {
				m := random(nx, nz, 3)
				s := New(nx, nz, ring)
				want := make([]float64, nx*nz)
				for c := range want {
					want[c] = math.Sin(float64(3 * c))
				}
				require.NoError(t, s.Factor(m, 2))
				got := product(m, want, nx, nz, ring)
				s.SolveTo(got, got)
				require.InDeltaSlice(t, want, got, 1e-13)
			})
		}
	}
}

// The factors hold the right matrix also after a second one has passed
// through, and whatever the number of workers.
func TestFactorAgainAndWorkers(t *testing.T) {
	const nx, nz = 37, 29
	rhs := make([]float64, nx*nz)
	for c := range rhs {
		rhs[c] = float64(c%11) - 5
	}
	first, second := random(nx, nz, 1), random(nx, nz, 2)
	want, got := make([]float64, nx*nz), make([]float64, nx*nz)
	s := New(nx, nz, false)
	require.NoError(t, s.Factor(first, 1))
	s.SolveTo(want, rhs)
	require.NoError(t, s.Factor(second, 2))
	require.NoError(t, s.Factor(first, 3))
	s.SolveTo(got, rhs)
	for c := range want {
		require.Equal(t, math.Float64bits(want[c]), math.Float64bits(got[c]), "cell %d", c)
	}
}

func TestSingular(t *testing.T) {
	const nx, nz = 9, 8
	m := random(nx, nz, 1)
	clear(m.Centre)
	clear(m.South)
	clear(m.West)
	clear(m.East)
	clear(m.North)
	err := New(nx, nz, false).Factor(m, 1)
	require.True(t, errors.Is(err, ErrSingular))
}

func TestSolveAllocatesNothing(t *testing.T) {
	const nx, nz = 40, 40
	s := New(nx, nz, true)
	require.NoError(t, s.Factor(random(nx, nz, 1), 1))
	x := make([]float64, nx*nz)
	require.Zero(t, testing.AllocsPerRun(5, func() { s.SolveTo(x, x) }))
}

func BenchmarkFactor(b *testing.B) {
	for _, n := range []int{64, 128, 256} {
		for _, workers := range []int{1, 2} {
			b.Run(fmt.Sprintf("cells=%dx%d/workers=%d", n, n, workers), func(b *testing.B) {
				defer runtime.GOMAXPROCS(runtime.GOMAXPROCS(workers))
				s, m := New(n, n, false), random(n, n, 1)
				for b.Loop() {
					if err := s.Factor(m, workers); err != nil {
						b.Fatal(err)
					}
				}
				b.ReportMetric(float64(b.Elapsed().Nanoseconds())/float64(b.N*n*n), "ns/cell")
			})
		}
	}
}

func BenchmarkSolve(b *testing.B) {
	for _, n := range []int{64, 128, 256} {
		b.Run(fmt.Sprintf("cells=%dx%d", n, n), func(b *testing.B) {
			s := New(n, n, false)
			if err := s.Factor(random(n, n, 1), 2); err != nil {
				b.Fatal(err)
			}
			x := make([]float64, n*n)
			x[0] = 1
			for b.Loop() {
				s.SolveTo(x, x)
			}
			floats := 0
			for i := range s.fronts {
				floats += len(s.fronts[i].lu) + 2*len(s.fronts[i].upper)
			}
			b.ReportMetric(float64(b.Elapsed().Nanoseconds())/float64(b.N*n*n), "ns/cell")
			b.ReportMetric(float64(8*floats)/float64(n*n), "B/cell")
		})
	}
}
