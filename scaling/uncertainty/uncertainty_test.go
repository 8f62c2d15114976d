package uncertainty

import (
	"context"
	"errors"
	"fmt"
	"math"
	"sync/atomic"
	"testing"

	"github.com/stretchr/testify/require"
	"gonum.org/v1/gonum/stat/distuv"
)

var ctx = context.Background()

// uniform returns inputs on (low, high).
func uniform(n int, low, high float64) []Input {
	var in []Input
	for i := range n {
		in = append(in, Input{fmt.Sprintf("x%d", i+1), distuv.Uniform{Min: low, Max: high}})
	}
	return in
}

// ishigami is sin x₁ + 7 sin² x₂ + 0.1 x₃⁴ sin x₁ on (-π, π)³, whose sensitivities
// are known in closed form (Ishigami & Homma 1990).
func ishigami(in, out []float64) error {
	out[0] = math.Sin(in[0]) + 7*math.Pow(math.Sin(in[1]), 2) + 0.1*math.Pow(in[2], 4)*math.Sin(in[0])
	return nil
}

func ishigamiExact() (first, total [3]float64) {
	const a, b = 7.0, 0.1
	p4, p8 := math.Pow(math.Pi, 4), math.Pow(math.Pi, 8)
	v := a*a/8 + b*p4/5 + b*b*p8/18 + 0.5
	v1 := 0.5 * math.Pow(1+b*p4/5, 2)
	v13 := b * b * p8 * 8 / 225
	return [3]float64{v1 / v, a * a / 8 / v, 0}, [3]float64{(v1 + v13) / v, a * a / 8 / v, v13 / v}
}

func TestFirstOrderOfIshigami(t *testing.T) {
	want, _ := ishigamiExact()
	e, err := Run(ctx, uniform(3, -math.Pi, math.Pi), []string{"y"}, ishigami, &Settings{Samples: 8000, Seed: 3})
	require.NoError(t, err)
	s, err := e.FirstOrder("y")
	require.NoError(t, err)
	for j, x := range s {
		require.Equal(t, fmt.Sprintf("x%d", j+1), x.Input)
		require.InDelta(t, want[j], x.First, 0.03)
		require.InDelta(t, want[j], x.First, 4*x.FirstError)
		require.Less(t, x.FirstError, 0.03)
	}
}

func TestSobolOfIshigami(t *testing.T) {
	first, total := ishigamiExact()
	s, err := Sobol(ctx, uniform(3, -math.Pi, math.Pi), []string{"y"}, ishigami, &Settings{Samples: 8000, Seed: 3})
	require.NoError(t, err)
	for j, x := range s["y"] {
		require.InDelta(t, first[j], x.First, 0.03)
		require.InDelta(t, first[j], x.First, 4*x.FirstError)
		require.InDelta(t, total[j], x.Total, 0.03)
		require.InDelta(t, total[j], x.Total, 4*x.TotalError)
	}
}

// A linear function of normal variables: variance shares are squares of the
// coefficients.
func TestFirstOrderOfLinearFunction(t *testing.T) {
	in := []Input{
		{"a", distuv.Normal{Mu: 1, Sigma: 1}}, {"b", distuv.Normal{Mu: 0, Sigma: 2}}, {"c", distuv.Normal{Mu: 0, Sigma: 1}},
	}
	f := func(in, out []float64) error { out[0] = 2*in[0] + in[1]; out[1] = in[2]; return nil }
	e, err := Run(ctx, in, []string{"y", "z"}, f, &Settings{Samples: 4000, Seed: 9})
	require.NoError(t, err)
	s, err := e.FirstOrder("y")
	require.NoError(t, err)
	for j, want := range []float64{0.5, 0.5, 0} {
		require.InDelta(t, want, s[j].First, 0.04)
	}
	s, err = e.FirstOrder("z")
	require.NoError(t, err)
	for j, want := range []float64{0, 0, 1} {
		require.InDelta(t, want, s[j].First, 0.04)
	}
}

// Adding a constant changes no sensitivity, scaling changes none either, and one
// output does not see another.
func TestSensitivitiesIgnoreOffsetAndScale(t *testing.T) {
	f := func(in, out []float64) error {
		out[0] = in[0] + 0.5*in[1]
		out[1] = 1e3 + 4*out[0]
		out[2] = -in[1]
		return nil
	}
	names := []string{"plain", "moved", "other"}
	settings := &Settings{Samples: 2000, Seed: 4}
	e, err := Run(ctx, uniform(2, 0, 1), names, f, settings)
	require.NoError(t, err)
	plain, err := e.FirstOrder("plain")
	require.NoError(t, err)
	moved, err := e.FirstOrder("moved")
	require.NoError(t, err)
	sobol, err := Sobol(ctx, uniform(2, 0, 1), names, f, settings)
	require.NoError(t, err)
	for j, want := range []float64{0.8, 0.2} {
		require.InDelta(t, plain[j].First, moved[j].First, 1e-9)
		require.InDelta(t, plain[j].FirstError, moved[j].FirstError, 1e-9)
		require.InDelta(t, want, plain[j].First, 0.03)
		require.InDelta(t, sobol["plain"][j].First, sobol["moved"][j].First, 1e-9)
		require.InDelta(t, sobol["plain"][j].Total, sobol["moved"][j].Total, 1e-9)
		require.InDelta(t, want, sobol["plain"][j].First, 0.05)
		require.InDelta(t, want, sobol["plain"][j].Total, 0.05)
		require.InDelta(t, float64(j), sobol["other"][j].Total, 0.05)
	}
	// A condition sees the inputs and outputs of one and the same sample.
	p, err := e.Probability(func(in, out []float64) bool {
		return out[0] == in[0]+0.5*in[1] && out[2] == -in[1] && in[1] > 0.25
	})
	require.NoError(t, err)
	require.InDelta(t, 0.75, p.Value, 1e-12)
	x, err := e.Input("x2")
	require.NoError(t, err)
	y, err := e.Output("other")
	require.NoError(t, err)
	for i := range x {
		require.Equal(t, x[i], -y[i])
	}
}

// An output that is constant but for a few samples still has finite errors.
func TestFirstOrderOfRareEvent(t *testing.T) {
	f := func(in, out []float64) error { out[0] = math.Floor(in[0] + 0.002); return nil }
	e, err := Run(ctx, uniform(1, 0, 1), []string{"y"}, f, &Settings{Samples: 1000})
	require.NoError(t, err)
	s, err := e.FirstOrder("y")
	require.NoError(t, err)
	require.False(t, math.IsNaN(s[0].First) || math.IsNaN(s[0].FirstError))
}

func TestQuantilesOfNormal(t *testing.T) {
	normal := distuv.Normal{Mu: 3, Sigma: 2}
	f := func(in, out []float64) error { out[0] = in[0]; return nil }
	e, err := Run(ctx, []Input{{"x", normal}}, []string{"y"}, f, &Settings{Samples: 2000})
	require.NoError(t, err)
	for _, p := range []float64{0.01, 0.16, 0.5, 0.84, 0.99} {
		q, err := e.Quantile("y", p)
		require.NoError(t, err)
		// one dimension of a Latin hypercube is far better than its interval
		require.InDelta(t, normal.Quantile(p), q.Value, 0.02)
		require.Less(t, q.Low, q.Value)
		require.Greater(t, q.High, q.Value)
		half := 1.96 * math.Sqrt(p*(1-p)/2000) / normal.Prob(normal.Quantile(p))
		require.InEpsilon(t, 2*half, q.High-q.Low, 0.15)
	}
	low, median, high, err := e.Band("y", 0.68)
	require.NoError(t, err)
	require.InDelta(t, normal.Quantile(0.16), low, 0.01)
	require.InDelta(t, 3, median, 0.01)
	require.InDelta(t, normal.Quantile(0.84), high, 0.01)
	mean, err := e.Mean("y")
	require.NoError(t, err)
	require.InDelta(t, 3, mean.Value, 1e-3)
	require.InEpsilon(t, 2*1.96*2/math.Sqrt(2000), mean.High-mean.Low, 0.01)
	sd, err := e.StdDev("y")
	require.NoError(t, err)
	require.InEpsilon(t, 2, sd, 0.005)
	above, err := e.Above("y", 5)
	require.NoError(t, err)
	require.InDelta(t, 0.15866, above.Value, 1e-3)
	require.True(t, above.Low < 0.15866 && above.High > 0.15866)
}

// Wilson's interval for 0 of 100: (0, 0.0370), from its formula with z = 1.96.
func TestProbabilityOfNothing(t *testing.T) {
	f := func(in, out []float64) error { out[0] = in[0]; return nil }
	e, err := Run(ctx, uniform(1, 0, 1), []string{"y"}, f, &Settings{Samples: 100})
	require.NoError(t, err)
	p, err := e.Probability(func(in, out []float64) bool { return out[0] > 2 })
	require.NoError(t, err)
	require.Zero(t, p.Value)
	require.InDelta(t, 0, p.Low, 1e-12)
	require.InDelta(t, 0.0370, p.High, 1e-4)
	p, err = e.Probability(func(in, out []float64) bool { return in[0] < 0.25 && in[0] == out[0] })
	require.NoError(t, err)
	require.Equal(t, 0.25, p.Value)
	// Wilson's interval for 25 of 100: 0.1755 to 0.3430.
	require.InDelta(t, 0.1755, p.Low, 5e-5)
	require.InDelta(t, 0.3430, p.High, 5e-5)
}

func TestWorkersDoNotChangeBits(t *testing.T) {
	var want []uint64
	for _, workers := range []int{1, 2, 3, 7} {
		e, err := Run(ctx, uniform(3, -1, 1), []string{"y"}, ishigami, &Settings{Samples: 500, Seed: 5, Workers: workers})
		require.NoError(t, err)
		y, err := e.Output("y")
		require.NoError(t, err)
		s, err := e.FirstOrder("y")
		require.NoError(t, err)
		var bits []uint64
		for _, v := range append(y, s[0].First, s[1].FirstError) {
			bits = append(bits, math.Float64bits(v))
		}
		if want == nil {
			want = bits
		}
		require.Equal(t, want, bits, "%d workers", workers)
	}
	other, err := Run(ctx, uniform(3, -1, 1), []string{"y"}, ishigami, &Settings{Samples: 500, Seed: 6})
	require.NoError(t, err)
	y, err := other.Output("y")
	require.NoError(t, err)
	require.NotEqual(t, want[0], math.Float64bits(y[0]))
}

// Every slice of equal probability is used once, and adding an input changes no
// other.
func TestDesignIsLatinHypercube(t *testing.T) {
	const n = 64
	x, err := design(uniform(3, 0, 1), n, 1, 0)
	require.NoError(t, err)
	for j := range 3 {
		used := make([]bool, n)
		for i := range n {
			slice := int(x[i*3+j] * n)
			require.False(t, used[slice])
			used[slice] = true
		}
	}
	wider, err := design(uniform(4, 0, 1), n, 1, 0)
	require.NoError(t, err)
	for i := range n {
		require.Equal(t, x[i*3:i*3+3], wider[i*4:i*4+3])
	}
	again, err := design(uniform(3, 0, 1), n, 1, 1)
	require.NoError(t, err)
	require.NotEqual(t, x, again)
}

func TestFailures(t *testing.T) {
	bad := errors.New("no convection")
	f := func(in, out []float64) error {
		switch {
		case in[0] < 0.1:
			return bad
		case in[0] < 0.2:
			out[0] = math.NaN()
		default:
			out[0] = in[0]
		}
		return nil
	}
	in := uniform(1, 0, 1)
	_, err := Run(ctx, in, []string{"y"}, f, &Settings{Samples: 100})
	require.ErrorIs(t, err, ErrFailed)
	var s *SampleError
	require.ErrorAs(t, err, &s)
	require.Equal(t, 20, s.Failed)
	require.Equal(t, 100, s.Samples)
	require.Less(t, s.Inputs[0], 0.2)

	_, err = Run(ctx, in, []string{"y"}, func(_, _ []float64) error { return bad }, &Settings{Samples: 100, Failures: 0.9})
	require.ErrorAs(t, err, &s)
	require.Equal(t, 100, s.Failed)
	require.Zero(t, s.Sample)
	require.ErrorIs(t, err, bad)
	require.ErrorContains(t, err, "100 of 100, first sample 0 with inputs")

	_, err = Run(ctx, in, []string{"y"}, f, &Settings{Samples: 100, Failures: 0.19})
	require.ErrorIs(t, err, ErrFailed)
	e, err := Run(ctx, in, []string{"y"}, f, &Settings{Samples: 100, Failures: 0.2})
	require.NoError(t, err)
	require.Equal(t, 80, e.Samples())
	require.Equal(t, 20, e.Failed())
	q, err := e.Quantile("y", 0.001)
	require.NoError(t, err)
	require.GreaterOrEqual(t, q.Value, 0.2)
	_, err = Sobol(ctx, in, []string{"y"}, f, &Settings{Samples: 100, Failures: 0.9})
	require.ErrorIs(t, err, ErrFailed)
	require.True(t, errors.Is(err, bad) || err != nil)
}

func TestCancellation(t *testing.T) {
	c, cancel := context.WithCancel(ctx)
	var calls atomic.Int64
	f := func(in, out []float64) error {
		if calls.Add(1) == 50 {
			cancel()
		}
		return nil
	}
	_, err := Run(c, uniform(1, 0, 1), []string{"y"}, f, &Settings{Samples: 100000, Workers: 2})
	require.ErrorIs(t, err, context.Canceled)
	require.Less(t, calls.Load(), int64(200))
	_, err = Sobol(c, uniform(1, 0, 1), []string{"y"}, f, nil)
	require.ErrorIs(t, err, context.Canceled)
}

func TestProgress(t *testing.T) {
	last := 0
	f := func(in, out []float64) error { out[0] = in[0]; return nil }
	_, err := Run(ctx, uniform(1, 0, 1), []string{"y"}, f, &Settings{Samples: 100, Workers: 1, Progress: func(done, samples int) {
		require.Equal(t, 100, samples)
		require.Greater(t, done, last)
		last = done
	}})
	require.NoError(t, err)
	require.Equal(t, 100, last)
}

func TestDistributions(t *testing.T) {
	l := LogUniform{1e20, 1e22}
	require.InEpsilon(t, 1e21, l.Quantile(0.5), 1e-12)
	require.InEpsilon(t, 1e20, l.Quantile(0), 1e-12)
	require.InEpsilon(t, 1e22, l.Quantile(1), 1e-12)
	require.Equal(t, 3.5, Fixed(3.5).Quantile(0.2))
	half := Truncated{Distribution: distuv.Normal{Mu: 0, Sigma: 1}, Min: 0, Max: math.Inf(1)}
	require.InEpsilon(t, distuv.UnitNormal.Quantile(0.75), half.Quantile(0.5), 1e-12)
	narrow := Truncated{Distribution: distuv.Normal{Mu: 0, Sigma: 1}, Min: -1, Max: 2}
	require.InDelta(t, -1, narrow.Quantile(0), 1e-12)
	require.InDelta(t, 2, narrow.Quantile(1), 1e-12)
}

func TestErrorsNameTheField(t *testing.T) {
	in := uniform(1, 0, 1)
	out := []string{"y"}
	f := func(in, out []float64) error { out[0] = 1; return nil }
	check := func(want string, in []Input, out []string, f Func, s *Settings) {
		t.Helper()
		_, err := Run(ctx, in, out, f, s)
		require.ErrorContains(t, err, "uncertainty: "+want)
		_, err = Sobol(ctx, in, out, f, s)
		require.ErrorContains(t, err, "uncertainty: "+want)
	}
	check("inputs", nil, out, f, nil)
	check("inputs[0].Name", []Input{{"", Fixed(1)}}, out, f, nil)
	check("inputs[1].Name", []Input{{"a", Fixed(1)}, {"a", Fixed(1)}}, out, f, nil)
	check("a: distribution", []Input{{"a", nil}}, out, f, nil)
	check("a: quantile", []Input{{"a", Fixed(math.NaN())}}, out, f, nil)
	check("outputs", in, nil, f, nil)
	check("outputs[1]", in, []string{"y", "y"}, f, nil)
	check("function", in, out, nil, nil)
	_, err := Run(ctx, in, out, f, &Settings{Samples: 10})
	require.NoError(t, err)
	check("Settings.Samples", in, out, f, &Settings{Samples: 9})
	check("Settings.Workers", in, out, f, &Settings{Workers: -1})
	check("Settings.Failures", in, out, f, &Settings{Failures: 1})

	e, err := Run(ctx, in, out, f, nil)
	require.NoError(t, err)
	require.Equal(t, DefaultSamples, e.Samples())
	_, err = e.FirstOrder("y")
	require.ErrorContains(t, err, "output y is constant")
	_, err = Sobol(ctx, in, out, f, nil)
	require.ErrorContains(t, err, "output y is constant")
	for _, name := range []func() (any, error){
		func() (any, error) { return e.Output("z") },
		func() (any, error) { return e.Quantile("z", 0.5) },
		func() (any, error) { a, b, c, err := e.Band("z", 0.5); return a + b + c, err },
		func() (any, error) { return e.Mean("z") },
		func() (any, error) { return e.StdDev("z") },
		func() (any, error) { return e.Above("z", 1) },
		func() (any, error) { return e.FirstOrder("z") },
	} {
		x, err := name()
		require.ErrorContains(t, err, `output is "z"`)
		require.Zero(t, x)
	}
	_, err = e.Input("z")
	require.ErrorContains(t, err, `input is "z"`)
	for _, p := range []float64{0, 1, math.NaN()} {
		_, err = e.Quantile("y", p)
		require.ErrorContains(t, err, "probability")
		low, median, high, err := e.Band("y", p)
		require.ErrorContains(t, err, "share")
		require.Zero(t, [3]float64{low, median, high})
	}
	_, err = e.Probability(nil)
	require.ErrorContains(t, err, "condition")
	_, err = e.Above("y", math.NaN())
	require.ErrorContains(t, err, "value")
}

// The defaults are what their constants say.
func TestDefaults(t *testing.T) {
	a, err := Run(ctx, uniform(3, -1, 1), []string{"y"}, ishigami, nil)
	require.NoError(t, err)
	b, err := Run(ctx, uniform(3, -1, 1), []string{"y"}, ishigami, &Settings{Samples: DefaultSamples})
	require.NoError(t, err)
	require.Equal(t, a.y, b.y)
	require.InEpsilon(t, 1.959963984540054, normalQuantile, 1e-12)
	require.Equal(t, 0.95, DefaultLevel)
}

func BenchmarkRun(b *testing.B) {
	in := uniform(3, -math.Pi, math.Pi)
	b.ReportAllocs()
	for b.Loop() {
		if _, err := Run(ctx, in, []string{"y"}, ishigami, &Settings{Samples: 10000}); err != nil {
			b.Fatal(err)
		}
	}
	b.ReportMetric(float64(b.Elapsed().Nanoseconds())/float64(b.N)/10000, "ns/sample")
}
