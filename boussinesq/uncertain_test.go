package boussinesq

import (
	"errors"
	"math"
	"testing"

	"example.org/overturn/units"
	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"gonum.org/v1/gonum/stat"
	"gonum.org/v1/gonum/stat/distuv"
)

func TestQuantilesOfTheShapes(t *testing.T) {
	for _, tt := range []struct {
		r    Range[units.Length]
		p    float64
		want float64
	}{
		{Between[units.Length](2, 6), 0.25, 3},
		{Between[units.Length](-2, 6), 0.5, 2},
		{Decades[units.Length](1e2, 1e6), 0.25, 1e3},
		{Decades[units.Length](1e2, 1e6), 0.75, 1e5},
		{PlusMinus[units.Length](10, 2), 0.5, 10},
		{PlusMinus[units.Length](10, 2), distuv.UnitNormal.CDF(1), 12},
		{PlusMinus[units.Length](10, 2), distuv.UnitNormal.CDF(-2), 6},
		{Range[units.Length]{1, 100, LogNormal}, 0.5, 10},
		{Range[units.Length]{1, 100, LogNormal}, distuv.UnitNormal.CDF(-1), 1},
		{Range[units.Length]{7, 7, LogNormal}, 0.3, 7},
		{Range[units.Length]{7, 7, Normal}, 0.3, 7},
	} {
		got, err := tt.r.Quantile(tt.p)
		require.NoError(t, err)
		inRelative(t, tt.want, float64(got), 1e-12, tt.r.Shape.String())
	}
}

func TestPlusMinusTemperature(t *testing.T) {
	assert.Equal(t, PlusMinus[units.Temperature](300, 5), PlusMinusTemperature(300, 5))
}

func TestRangeIsZero(t *testing.T) {
	assert.True(t, Range[units.Length]{}.IsZero())
	assert.False(t, Between[units.Length](0, 1).IsZero())
}

func TestBadRanges(t *testing.T) {
	nan := units.Length(math.NaN())
	for _, tt := range []struct {
		r     Range[units.Length]
		field string
	}{
		{Between(nan, 1), "Ranges.Depth.Low"},
		{Between(1, units.Length(math.Inf(1))), "Ranges.Depth.High"},
		{Between[units.Length](2, 1), "Ranges.Depth.High"},
		{Decades[units.Length](0, 1), "Ranges.Depth.Low"},
		{Range[units.Length]{-1, 1, LogNormal}, "Ranges.Depth.Low"},
		{PlusMinus[units.Length](1, -1), "Ranges.Depth.High"},
		{Range[units.Length]{1, 2, Shape(4)}, "Ranges.Depth.Shape"},
		{Range[units.Length]{1, 2, Shape(-1)}, "Ranges.Depth.Shape"},
	} {
		u := Uncertain{round(), Ranges{Depth: tt.r}}
		_, err := u.Bounds(Layer.Rayleigh)
		wantField(t, err, tt.field)
		_, err = u.Sample(Layer.Rayleigh, nil)
		wantField(t, err, tt.field)
		_, err = tt.r.Quantile(0.5)
		assert.Error(t, err)
	}
	for _, p := range []float64{0, 1, -1, math.NaN()} {
		_, err := Between[units.Length](1, 2).Quantile(p)
		wantField(t, err, "probability")
	}
}

func TestShapesInWords(t *testing.T) {
	assert.Equal(t, "uniform", Uniform.String())
	assert.Equal(t, "log-uniform", LogUniform.String())
	assert.Equal(t, "normal", Normal.String())
	assert.Equal(t, "log-normal", LogNormal.String())
	assert.Equal(t, "Shape(7)", Shape(7).String())
	for _, want := range []Shape{Uniform, LogUniform, Normal, LogNormal} {
		text, err := want.MarshalText()
		require.NoError(t, err)
		got := Shape(99)
		require.NoError(t, got.UnmarshalText(text))
		assert.Equal(t, want, got)
	}
	for _, bad := range []Shape{-1, 4} {
		_, err := bad.MarshalText()
		wantField(t, err, "Shape")
	}
	s := Normal
	wantField(t, s.UnmarshalText([]byte("Normal")), "Shape")
	assert.Equal(t, Normal, s)
}

// Each range reaches its own field, and no other.
func TestRangesReachTheirFields(t *testing.T) {
	read := map[string]func(Layer) float64{
		"Density":      func(l Layer) float64 { return float64(l.Material.Density) },
		"Expansivity":  func(l Layer) float64 { return float64(l.Material.Expansivity) },
		"Conductivity": func(l Layer) float64 { return float64(l.Material.Conductivity) },
		"SpecificHeat": func(l Layer) float64 { return float64(l.Material.SpecificHeat) },
		"Viscosity":    func(l Layer) float64 { return float64(l.Material.Viscosity) },
		"Depth":        func(l Layer) float64 { return float64(l.Depth) },
		"Gravity":      func(l Layer) float64 { return float64(l.Gravity) },
		"Top":          func(l Layer) float64 { return float64(l.Top) },
		"Bottom":       func(l Layer) float64 { return float64(l.Bottom) },
		"BottomFlux":   func(l Layer) float64 { return float64(l.BottomFlux) },
		"Heating":      func(l Layer) float64 { return float64(l.Heating) },
	}
	all := Ranges{
		Density: Between[units.Density](1, 2), Expansivity: Between[units.Expansivity](3, 4),
		Conductivity: Between[units.Conductivity](5, 6), SpecificHeat: Between[units.SpecificHeat](7, 8),
		Viscosity: Between[units.DynamicViscosity](9, 10), Depth: Between[units.Length](11, 12),
		Gravity: Between[units.Acceleration](13, 14), Top: Between[units.Temperature](15, 16),
		Bottom: Between[units.Temperature](17, 18), BottomFlux: Between[units.HeatFlux](19, 20),
		Heating: Between[units.VolumetricHeating](21, 22),
	}
	params, err := all.parameters()
	require.NoError(t, err)
	require.Len(t, params, len(read))
	for i, p := range params {
		assert.Equal(t, float64(2*i+1), p.low, p.name)
		assert.Equal(t, float64(2*i+2), p.high, p.name)
		var l Layer
		p.set(&l, 99)
		for name, f := range read {
			if name == p.name {
				assert.Equal(t, 99.0, f(l), name)
			} else {
				assert.Zero(t, f(l), "%s moved %s", p.name, name)
			}
		}
	}
	none, err := Ranges{}.parameters()
	require.NoError(t, err)
	assert.Empty(t, none)
}

// Ra ~ d³/(μ κ): the ends are known.
func TestBoundsAreAtTheEnds(t *testing.T) {
	u := Uncertain{round(), Ranges{
		Depth:     Between[units.Length](1, 4),
		Viscosity: Decades[units.DynamicViscosity](4, 32),
		Gravity:   PlusMinus[units.Acceleration](8, 4),
	}}
	b, err := u.Bounds(Layer.Rayleigh)
	require.NoError(t, err)
	assert.Equal(t, Bounds{Low: 128. / 8 / 2 / 2, Best: 128, High: 128 * 8 * 4 * 1.5}, b)

	b, err = Uncertain{Layer: round()}.Bounds(Layer.Rayleigh)
	require.NoError(t, err)
	assert.Equal(t, Bounds{128, 128, 128}, b)

	u.Layer.Depth = 8 // a best value may lie outside
	b, err = u.Bounds(Layer.Rayleigh)
	require.NoError(t, err)
	assert.Equal(t, Bounds{Low: 128. / 8 / 2 / 2, Best: 128 * 64, High: 128 * 64}, b)
}

func TestErrorsComeThrough(t *testing.T) {
	u := Uncertain{round(), Ranges{Bottom: Between[units.Temperature](290, 310)}}
	_, err := u.Bounds(Layer.Rayleigh)
	assert.ErrorIs(t, err, ErrStable)
	assert.ErrorContains(t, err, "at an end of the ranges")
	_, err = u.Sample(Layer.Rayleigh, nil)
	assert.ErrorIs(t, err, ErrStable)
	assert.ErrorContains(t, err, "draw ")
	u.Layer.Depth = 0
	_, err = u.Bounds(Layer.Rayleigh)
	wantField(t, err, "Layer.Depth")
	assert.NotContains(t, err.Error(), "end of the ranges", "it is the best values that are bad")
	for _, bad := range []float64{math.NaN(), math.Inf(1)} {
		_, err = u.Sample(func(Layer) (float64, error) { return bad, nil }, nil)
		wantField(t, err, "number of draw 0")
	}
	_, err = u.Sample(Layer.Rayleigh, &Settings{Draws: 1})
	wantField(t, err, "Settings.Draws")
	_, err = u.Sample(Layer.Rayleigh, &Settings{Draws: -5})
	wantField(t, err, "Settings.Draws")
}

// The chance that a layer whose bottom is between 290 and 310 K convects when
// its top is 300 K: a half, once stable layers count as zero.
func TestProbabilityOfConvection(t *testing.T) {
	u := Uncertain{round(), Ranges{Bottom: Between[units.Temperature](290, 310)}}
	s, err := u.Sample(func(l Layer) (float64, error) {
		ra, err := l.Rayleigh()
		if errors.Is(err, ErrStable) {
			return 0, nil
		}
		return ra, err
	}, &Settings{Draws: 200})
	require.NoError(t, err)
	assert.Equal(t, 0.5, s.Above(0))
	assert.Equal(t, 0.25, s.Above(32*5)) // above 305 K
	assert.Equal(t, 0.0, s.Above(32*10))
	assert.Equal(t, 1.0, s.Above(-1))
}

// ln Ra is linear in the logarithms of the parameters: for log-normal ranges
// its distribution is known exactly.
func TestSampleOfAProductIsLogNormal(t *testing.T) {
	u := Uncertain{round(), Ranges{
		Viscosity:   Range[units.DynamicViscosity]{8, 32, LogNormal},    // σ = ln 2
		Depth:       Range[units.Length]{2 / 1.25, 2 * 1.25, LogNormal}, // 3σ = 3 ln 1.25
		Expansivity: Range[units.Expansivity]{0.25 / 1.1, 0.25 * 1.1, LogNormal},
	}}
	s, err := u.Sample(Layer.Rayleigh, &Settings{Draws: 20000, Seed: 3})
	require.NoError(t, err)
	parts := []float64{math.Log(2), 3 * math.Log(1.25), math.Log(1.1)}
	variance := 0.0
	for _, p := range parts {
		variance += p * p
	}
	want := distuv.LogNormal{Mu: math.Log(128), Sigma: math.Sqrt(variance)}

	q, err := s.Quantiles(0.025, 0.16, 0.5, 0.84, 0.975)
	require.NoError(t, err)
	for i, p := range []float64{0.025, 0.16, 0.5, 0.84, 0.975} {
		x := want.Quantile(p)
		chance := math.Sqrt(p*(1-p)/20000) / want.Prob(x) // standard error of independent draws
		assert.InDelta(t, x, q[i], 3*chance, "quantile %v of the exact log-normal", p)
	}
	inRelative(t, want.Mean(), s.Mean(), 0.01, "exact, log-normal")
	assert.InDelta(t, want.Survival(300), s.Above(300), 5e-3)

	// Shares of the variance of ln Ra, up to what ranks make of them.
	order := s.Influences()
	require.Len(t, order, 3)
	names := []string{"Viscosity", "Depth", "Expansivity"}
	for i, f := range order {
		assert.Equal(t, names[i], f.Parameter)
		assert.InDelta(t, parts[i]*parts[i]/variance, f.Share, 0.03)
		assert.Equal(t, f.Parameter != "Viscosity", f.Rises)
	}
}

// One uniform parameter, cut into strata: the sample is exact.
func TestStrataAreUsedOnce(t *testing.T) {
	u := Uncertain{round(), Ranges{Depth: Between[units.Length](1, 9)}}
	s, err := u.Sample(func(l Layer) (float64, error) { return float64(l.Depth), nil }, &Settings{Draws: 4})
	require.NoError(t, err)
	assert.Equal(t, []float64{2, 4, 6, 8}, s.Values)
	assert.Equal(t, 5.0, s.Mean())
	q, err := s.Quantiles(0, 0.5, 1)
	require.NoError(t, err)
	assert.Equal(t, 2.0, q[0])
	assert.Equal(t, 8.0, q[2])
	assert.Equal(t, []Influence{{"Depth", 1, true}}, s.Influences())
	assert.Equal(t, 0.5, s.Above(4)) // greater, not equal
	for _, bad := range []float64{-0.1, 1.1, math.NaN()} {
		_, err := s.Quantiles(0.5, bad)
		wantField(t, err, "share 1")
	}
}

func TestSampleIsReproducible(t *testing.T) {
	u := Uncertain{round(), Ranges{Depth: Between[units.Length](1, 3), Gravity: Between[units.Acceleration](1, 9)}}
	draw := func(s *Settings) []float64 {
		x, err := u.Sample(Layer.Rayleigh, s)
		require.NoError(t, err)
		return x.Values
	}
	assert.Equal(t, draw(nil), draw(&Settings{Draws: DefaultDraws}))
	assert.Len(t, draw(nil), 1000)
	assert.Equal(t, draw(&Settings{Seed: 1}), draw(&Settings{Seed: 1}))
	assert.NotEqual(t, draw(nil), draw(&Settings{Seed: 1}))
	assert.Len(t, draw(&Settings{Draws: 2}), 2)
	assert.IsNonDecreasing(t, draw(&Settings{Seed: 5}))
}

// Parameters are independent: their correlation is that of chance.
func TestStrataAreIndependent(t *testing.T) {
	const draws = 4000
	columns := hypercube(3, draws, 11)
	floats := make([][]float64, len(columns))
	for j, c := range columns {
		for _, k := range c {
			floats[j] = append(floats[j], float64(k))
		}
	}
	for i := range floats {
		for j := range i {
			assert.Less(t, math.Abs(stat.Correlation(floats[i], floats[j], nil)), 4/math.Sqrt(draws))
		}
	}
}

func TestConstantNumberHasNoInfluences(t *testing.T) {
	u := Uncertain{round(), Ranges{Depth: Between[units.Length](1, 3)}}
	s, err := u.Sample(Layer.Prandtl, nil)
	require.NoError(t, err)
	assert.Empty(t, s.Influences())
}

// The sample itself allocates, each draw does not.
func TestDrawsDoNotAllocate(t *testing.T) {
	u := Uncertain{round(), Ranges{Depth: Between[units.Length](1, 3)}}
	count := func(draws int) float64 {
		s := &Settings{Draws: draws}
		return testing.AllocsPerRun(5, func() { _, _ = u.Sample(Layer.Rayleigh, s) })
	}
	assert.Equal(t, count(100), count(400))
}

func TestRanksShareTies(t *testing.T) {
	assert.Equal(t, []float64{4, 1.5, 1.5, 3, 0}, ranks([]float64{9, 2, 2, 5, -1}))
	assert.Equal(t, []float64{1, 1, 1}, ranks([]float64{7, 7, 7}))
}

func BenchmarkSample(b *testing.B) {
	p, err := ByName("upper-mantle")
	require.NoError(b, err)
	u := Uncertain{upperMantle(b), p.Ranges()}
	b.ReportAllocs()
	for b.Loop() {
		if _, err := u.Sample(Layer.Rayleigh, nil); err != nil {
			b.Fatal(err)
		}
	}
	b.ReportMetric(float64(b.Elapsed().Nanoseconds())/float64(b.N*DefaultDraws), "ns/draw")
}
