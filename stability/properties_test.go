package stability

import (
	"math"
	"runtime"
	"sync"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

func critical(t *testing.T, l Layer) Onset {
	t.Helper()
	o, err := l.Critical()
	require.NoError(t, err, "%v", l)
	return o
}

// The growth rate vanishes at the critical point and has the sign of Ra - Ra_c;
// stationary onset does not depend on the Prandtl number.
func TestGrowthChangesSignAtOnset(t *testing.T) {
	for _, pr := range []float64{0.01, 0.3, 1, 40, 1e6, 0} {
		l := Layer{Bottom: Rigid, Top: Rigid.Robin(2), Prandtl: pr}
		o := critical(t, l)
		assert.InEpsilon(t, critical(t, Layer{Bottom: Rigid, Top: Rigid.Robin(2)}).Rayleigh, o.Rayleigh, 1e-13)
		for _, d := range []float64{-1e-3, 0, 1e-3} {
			g, err := l.Growth(o.Rayleigh*(1+d), o.Wavenumber)
			require.NoError(t, err)
			if d == 0 {
				assert.InDelta(t, 0, g.Rate, 1e-11, "Pr = %g", pr)
				continue
			}
			assert.Greater(t, g.Rate*d, 0.0, "Pr = %g", pr)
		}
	}
}

// Free boundaries have closed solutions, sin(nπz); every vertical mode of the
// spectrum must be one of them, and none may be missing.
func TestSpectrumOfFreeLayer(t *testing.T) {
	const ra, k, pr = 3e4, 3.0, 0.8
	var want []float64
	for n := 1; n <= 8; n++ {
		a := float64(n*n)*math.Pi*math.Pi + k*k
		b, c := a*(1+pr), a*a*pr-ra*k*k*pr/a // σ² + bσ + c = 0
		root := math.Sqrt(b*b - 4*c)
		want = append(want, (-b+root)/2, (-b-root)/2)
	}
	s, err := NewSolver(Layer{Prandtl: pr}, nil)
	require.NoError(t, err)
	modes, err := s.Spectrum(ra, k, 5)
	require.NoError(t, err)
	for i, m := range modes {
		nearest := math.Inf(1)
		for _, w := range want {
			nearest = min(nearest, math.Abs(w-m.Rate))
		}
		assert.Less(t, nearest, 1e-9*(1+math.Abs(m.Rate)), "mode %d", i)
		assert.LessOrEqual(t, nearest, m.Error.Rate+1e-12*math.Abs(m.Rate), "error estimate of mode %d", i)
		faster := 0
		for _, w := range want {
			if w > m.Rate+1e-6 {
				faster++
			}
		}
		assert.Equal(t, i, faster, "modes faster than mode %d", i)
	}
}

func TestUnstableWithoutTheNumber(t *testing.T) {
	s, err := NewSolver(Layer{Bottom: Rigid, Top: Free.Robin(1)}, nil)
	require.NoError(t, err)
	_, err = s.Find(Search{Number: MarangoniNumber, Rayleigh: 5000})
	assert.ErrorIs(t, err, ErrUnstable)
	_, err = Layer{Solute: Solute{Rayleigh: -2000, Diffusivity: 0.5}, Prandtl: 1}.Critical()
	assert.ErrorIs(t, err, ErrUnstable)
}

// The same question has the same answer to the bit, whatever else a solver was
// asked before and on however many threads.
func TestAnswersDoNotDependOnHistory(t *testing.T) {
	l := Layer{Bottom: Rigid, Top: Free.Robin(2), Base: MixedHeating(3), Viscosity: Exponential(5, 0.5), Prandtl: 2}
	fresh := func() *Solver {
		s, err := NewSolver(l, nil)
		require.NoError(t, err)
		return s
	}
	first, err := fresh().Critical()
	require.NoError(t, err)
	used := fresh()
	_, err = used.Fastest(1e6)
	require.NoError(t, err)
	_, err = used.Neutral(Search{}, 17)
	require.NoError(t, err)
	again, err := used.Critical()
	require.NoError(t, err)
	assert.Equal(t, math.Float64bits(first.Rayleigh), math.Float64bits(again.Rayleigh))
	assert.Equal(t, math.Float64bits(first.Wavenumber), math.Float64bits(again.Wavenumber))
	assert.Equal(t, math.Float64bits(first.Mode.Temperature(0.3)), math.Float64bits(again.Mode.Temperature(0.3)))

	stiff := Layer{Viscosity: Exponential(18, 0.5), Taylor: 1e5} // large enough for parallel kernels
	parallel := critical(t, stiff)
	defer runtime.GOMAXPROCS(runtime.GOMAXPROCS(1))
	alone, err := fresh().Critical()
	require.NoError(t, err)
	assert.Equal(t, math.Float64bits(first.Rayleigh), math.Float64bits(alone.Rayleigh))
	serial := critical(t, stiff)
	require.Greater(t, parallel.Mode.layout.Size(), 200)
	assert.Equal(t, math.Float64bits(parallel.Rayleigh), math.Float64bits(serial.Rayleigh))
	assert.Equal(t, math.Float64bits(parallel.Wavenumber), math.Float64bits(serial.Wavenumber))
}

func TestLayersAreSafeForConcurrentUse(t *testing.T) {
	l := Layer{Bottom: Rigid, Base: InternalHeating(), Viscosity: Exponential(4, 0.5)}
	want := critical(t, l)
	var wg sync.WaitGroup
	for range 4 {
		wg.Go(func() {
			o, err := l.Critical()
			assert.NoError(t, err)
			assert.Equal(t, want.Rayleigh, o.Rayleigh)
			assert.Equal(t, want.Mode.Velocity(0.2), want.Mode.Velocity(0.2))
		})
	}
	wg.Wait()
}
