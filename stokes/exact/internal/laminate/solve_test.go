package laminate

import (
	"math"
	"math/rand/v2"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// The exponents are the roots λ = −b ± √(1 + b² ± 2ib), without cancellation
// for large b.
func TestExponents(t *testing.T) {
	for _, b := range []float64{0, 1e-9, 0.3, -0.3, 5, -5, 1e8, -1e8} {
		growing, decaying, beta := exponents(b)
		assert.InEpsilon(t, -(1 + beta*beta), growing*decaying, 1e-14) // b² − α²
		assert.InDelta(t, -2*b, growing+decaying, 1e-14*(1+math.Abs(b)))
		alpha := 0.5 * (growing - decaying)
		assert.InDelta(t, math.Abs(b), alpha*beta, 1e-14*(1+math.Abs(b)))
		assert.Positive(t, growing)
		assert.Negative(t, decaying)
	}
}

// Power series and exponentials give the same layer.
func TestSeriesAgreeWithExponentials(t *testing.T) {
	for _, growth := range []float64{0, 1e-7, 1.5, -4} {
		given := Layer{Thickness: 1, Viscosity: 2, Growth: growth,
			Across: Profile{Mean: 1, Sine: 2, Cosine: 3, Wavenumber: 1.5},
			Along:  Profile{Mean: -1, Sine: 1, Cosine: 0.5, Wavenumber: 8}}
		const k = 4
		p := Problem{K: k, Layers: []Layer{given}, Low: Stick, High: Open}
		require.LessOrEqual(t, split(k, given), maxSplit)
		series, err := Solve(p)
		require.NoError(t, err)
		s := &stack{flow: &Flow{k: k}}
		s.pushThick(given, 0)
		exponentials, estimate := s.solve(p)
		require.Less(t, estimate, RoundingTolerance)
		for _, z := range []float64{0, 0.2, 0.5, 0.77, 1} {
			a, b := series.At(z), exponentials.At(z)
			assert.InEpsilon(t, 1+a.W, 1+b.W, 1e-13)
			assert.InEpsilon(t, 1+a.U, 1+b.U, 1e-13)
			assert.InEpsilon(t, 1+a.P, 1+b.P, 1e-12)
			assert.InEpsilon(t, 1+a.Shear, 1+b.Shear, 1e-12)
			assert.InEpsilon(t, a.Viscosity, b.Viscosity, 1e-14)
		}
	}
}

// Which layers are split, and how often.
func TestSplit(t *testing.T) {
	assert.Equal(t, 0, split(1, Layer{Thickness: math.Inf(1)}))
	assert.Equal(t, 1, split(1, Layer{Thickness: 1e-9}))
	assert.Equal(t, 1, split(1, Layer{Thickness: 2}))
	assert.Equal(t, 2, split(1, Layer{Thickness: 2.1}))
	assert.Equal(t, 4, split(1, Layer{Thickness: thin}))
	assert.Greater(t, split(1, Layer{Thickness: thin * 1.01}), maxSplit)
	assert.Equal(t, 7, split(0.1, Layer{Thickness: 1, Growth: math.Log(1e6)}))
	assert.Greater(t, split(0.1, Layer{Thickness: 1, Growth: 200}), maxSplit)
}

// The estimate of rounding errors is not below the errors by much, nor far
// above, where exponentials are used for a layer that is too thin for them.
func TestRoundingErrorIsEstimated(t *testing.T) {
	const eta = 1.0
	for _, k := range []float64{1, 0.1, 0.01} {
		given := Layer{Thickness: 1, Viscosity: eta, Across: Profile{Mean: 1}}
		p := Problem{K: k, Layers: []Layer{given}, Low: Stick, High: Open}
		want, err := Solve(p) // by series
		require.NoError(t, err)
		s := &stack{flow: &Flow{k: k}}
		s.pushThick(given, 0)
		got, estimate := s.solve(p)
		wrong := 0.0
		for _, z := range []float64{0.3, 0.5, 0.8, 1} {
			a, b := got.At(z), want.At(z)
			wrong = max(wrong, math.Abs(a.U-b.U)/math.Abs(want.At(1).U), math.Abs(a.P-b.P)/math.Abs(want.At(0).P))
		}
		t.Logf("k = %g: error %.1e, estimate %.1e", k, wrong, estimate)
		assert.Less(t, wrong, 20*estimate)
		assert.Greater(t, wrong, 1e-3*estimate)
	}
}

// One plane, one homogeneous solution of amplitude one, given by 1·x = 1.
func TestRoundingErrorOfOnePlane(t *testing.T) {
	estimate := func(plane face) float64 {
		m := newBand(1)
		m.set(0, 0, 1)
		m.solveRefined([]float64{1})
		return (&conditions{matrix: m, planes: []*face{&plane}}).roundingError([]float64{1})
	}
	// 1 − ½: errors ε(1 + ½) of the sum and ε½ of the amplitude, over ½.
	velocity := face{given: traction{velocityAlong: 1}, basis: []traction{{velocityAlong: -0.5}}, unit: 1e9}
	assert.Equal(t, 4*epsilon, estimate(velocity))
	across := face{given: traction{velocityAcross: 1, velocityAlong: 0.25}, basis: []traction{{velocityAcross: -0.5}}, unit: 1e9}
	assert.Equal(t, 4*epsilon, estimate(across))
	// The same of the stress, first against itself and then against the
	// stress 2ηkU that goes with the velocity.
	stress := face{given: traction{stressAlong: 1, velocityAlong: 1e-9}, basis: []traction{{stressAlong: -0.5}}, unit: 1}
	assert.Equal(t, 4*epsilon, estimate(stress))
	stress.unit = 2e9
	assert.InEpsilon(t, epsilon, estimate(stress), 1e-9)
	assert.Zero(t, estimate(face{basis: []traction{{}}, unit: 1}))
}

// The error comes where the estimate passes the tolerance: here a force that
// the pressure balances but for a share d of it.
func TestRoundingTolerance(t *testing.T) {
	for _, tt := range []struct {
		d  float64
		ok bool
	}{{1e-3, true}, {1e-5, true}, {1e-8, false}, {1e-12, false}} {
		p := Problem{K: 1, Layers: []Layer{
			{Thickness: 1, Viscosity: 1, Along: Profile{Mean: 1}},
			{Thickness: 1, Viscosity: 2, Along: Profile{Mean: 1 + tt.d}},
		}}
		f, err := Solve(p)
		if tt.ok {
			assert.NoError(t, err)
			continue
		}
		var e *RoundingError
		require.ErrorAs(t, err, &e)
		assert.Greater(t, e.Estimate, RoundingTolerance)
		assert.InDelta(t, 0, math.Log10(e.Estimate*tt.d/epsilon), 1.5, "estimate of about ε/d")
		assert.Nil(t, f)
		assert.Contains(t, err.Error(), "want at most 1e-09")
	}
}

// Random stacks, longer and shorter than the waves, with viscosities up to 1e10
// apart, are solved with errors that stay below 1e-12 by estimate.
func TestRandomStacksKeepTheirDigits(t *testing.T) {
	random := rand.New(rand.NewPCG(3, 4))
	worst := 0.0
	for range 300 {
		n := 1 + random.IntN(20)
		p := Problem{
			K:    math.Pow(10, -4+8*random.Float64()),
			Low:  End(random.IntN(2)),
			High: End(random.IntN(3)),
		}
		for range n {
			p.Layers = append(p.Layers, Layer{
				Thickness: (0.01 + random.Float64()) / float64(n),
				Viscosity: math.Pow(10, 10*random.Float64()),
				Growth:    float64(n*random.IntN(2)) * 2 * random.NormFloat64(),
				Across:    Profile{Mean: random.NormFloat64(), Sine: random.NormFloat64(), Wavenumber: 10 * random.Float64()},
			})
		}
		_, e := lay(p).solve(p)
		worst = max(worst, e)
	}
	t.Logf("largest estimate %.1e", worst)
	assert.Less(t, worst, 1e-12)
}
