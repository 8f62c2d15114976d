package rows

import (
	"math"
	"testing"

	"github.com/stretchr/testify/require"
)

func TestPeak(t *testing.T) {
	v := []float64{1, -7, 3, 2, -5, 0, 6}
	for n, want := range []float64{0, 1, 7, 7, 7, 7, 7, 7} {
		require.Equal(t, want, Peak(v[:n]))
	}
	for i := range v {
		w := append([]float64(nil), v...)
		w[i] = -8
		require.Equal(t, 8.0, Peak(w))
		w[i] = math.Inf(-1)
		require.True(t, math.IsInf(Peak(w), 1))
		w[i] = -math.NaN()
		require.True(t, math.IsNaN(Peak(w)))
	}
}

func BenchmarkPeak(b *testing.B) {
	v := make([]float64, 2048)
	for b.Loop() {
		Peak(v)
	}
	b.ReportMetric(float64(b.Elapsed().Nanoseconds())/float64(b.N*len(v)), "ns/value")
}

func BenchmarkCentralEven(b *testing.B) {
	r := func() []float64 { return make([]float64, 2049) }
	out, t, above, vx, vz, below := r(), r(), r(), r(), r(), r()
	for b.Loop() {
		CentralEven(out[:2048], t, t[:2048], above, vx, vz, below, 0, 0, Even{1, 1, 1, 1}, Weights{0.5, 0.5, 0.1})
	}
	b.ReportMetric(float64(b.Elapsed().Nanoseconds())/float64(b.N*2048), "ns/value")
}

func TestSound(t *testing.T) {
	for n := 1; n < 12; n++ {
		v := make([]float64, n)
		require.True(t, Sound(v))
		for i := range v {
			for _, bad := range []float64{math.NaN(), math.Inf(1), math.Inf(-1)} {
				w := make([]float64, n)
				for j := max(0, i-1); j <= min(n-1, i+1); j++ {
					w[j] = bad
				}
				require.False(t, Sound(w), "n = %d, i = %d", n, i)
			}
		}
	}
}

func BenchmarkBounded(b *testing.B) {
	r := func(p float64) []float64 {
		v := make([]float64, 2049)
		for i := range v {
			v[i] = math.Sin(p + 0.01*float64(i))
		}
		return v
	}
	f, c, v := r(0), r(1), r(2)
	w := &Upwind{[2][]float64{c, c}, [2][]float64{c, c}}
	b.Run("X", func(b *testing.B) {
		for b.Loop() {
			BoundedX(f, v[:2048], r0, c, w)
		}
		b.ReportMetric(float64(b.Elapsed().Nanoseconds())/float64(b.N*2048), "ns/value")
	})
	t0, t1, t2, t3 := r(0), r(0.1), r(0.2), r(0.3)
	b.Run("Z", func(b *testing.B) {
		for b.Loop() {
			BoundedZ(f[:2048], t0, t1, t2, t3, r0, c, [2]float64{0.3, 0.3}, [2]float64{0.2, 0.2})
		}
		b.ReportMetric(float64(b.Elapsed().Nanoseconds())/float64(b.N*2048), "ns/value")
	})
	x := &Fluxes{f, t0, t1}
	b.Run("Update", func(b *testing.B) {
		for b.Loop() {
			Update(t2[:2048], t2, t3, x, nil, c, 0.1, 1, Weights{0.3, 0.1, 1e-3})
		}
		b.ReportMetric(float64(b.Elapsed().Nanoseconds())/float64(b.N*2048), "ns/value")
	})
}

var r0 = func() []float64 {
	v := make([]float64, 2049)
	for i := range v {
		v[i] = math.Cos(0.01 * float64(i))
	}
	return v
}()
