package scaling

import (
	"math"
	"math/rand/v2"
	"testing"

	"github.com/stretchr/testify/require"
)

// series makes runs of f at Rayleigh numbers between 1e4 and 1e8.
func series(n int, f func(ra float64) float64) []Run {
	var runs []Run
	for i := range n {
		ra := math.Pow(10, 4+4*float64(i)/float64(n-1))
		runs = append(runs, Run{Groups: Groups{Rayleigh: ra}, Value: f(ra)})
	}
	return runs
}

func TestFitOfExactPowerLaw(t *testing.T) {
	f, err := FitPowerLaw(series(6, func(ra float64) float64 { return 0.27 * math.Cbrt(ra) }), []Group{RayleighNumber}, nil)
	require.NoError(t, err)
	require.InEpsilon(t, 0.27, f.Prefactor.Value, 1e-12)
	require.InEpsilon(t, 1./3, f.Exponents[0].Value, 1e-12)
	require.Less(t, f.Scatter, 1e-13)
	ok, err := f.Tenable()
	require.NoError(t, err)
	require.True(t, ok)
	require.Equal(t, DefaultLevel, f.Level)
	require.Equal(t, 4, f.DegreesOfFreedom)
	x, err := f.At(Groups{Rayleigh: 1e5})
	require.NoError(t, err)
	require.InEpsilon(t, 0.27*math.Cbrt(1e5), x.Value, 1e-12)
}

func TestFitInTwoGroups(t *testing.T) {
	var runs []Run
	for _, ra := range []float64{1e5, 1e6, 1e7} {
		for _, theta := range []float64{8, 11, 16, 23} {
			runs = append(runs, Run{
				Groups: Groups{InteriorRayleigh: ra, FrankKamenetskii: theta},
				Value:  0.53 * math.Pow(theta, -4./3) * math.Cbrt(ra),
			})
		}
	}
	f, err := FitPowerLaw(runs, []Group{InteriorRayleighNumber, FrankKamenetskiiParameter}, nil)
	require.NoError(t, err)
	require.InEpsilon(t, 0.53, f.Prefactor.Value, 1e-10)
	e, ok := f.Exponent(FrankKamenetskiiParameter)
	require.True(t, ok)
	require.InEpsilon(t, -4./3, e.Value, 1e-10)
	e, ok = f.Exponent(InteriorRayleighNumber)
	require.True(t, ok)
	require.InEpsilon(t, 1./3, e.Value, 1e-10)
	_, ok = f.Exponent(PrandtlNumber)
	require.False(t, ok)
	require.Len(t, f.Curvature, 2)
	require.Contains(t, f.String(), "curvature in θ")

	// The law that the runs are made of is found among the published ones.
	found := false
	for _, c := range f.Compare(All()) {
		require.Equal(t, 12, c.Evaluated+notEvaluated(c.Law, runs))
		if c.Law.Name == SolomatovMoresi().Name {
			found = true
			require.InDelta(t, 0, c.Bias, 1e-10)
			require.InDelta(t, 0, c.RMS, 1e-10)
			require.Zero(t, c.OutOfRange)
		}
		if c.Law.Name == DavailleJaupart().Name {
			require.InEpsilon(t, math.Log(0.53/0.47), c.Bias, 1e-10)
			require.Equal(t, 6, c.OutOfRange) // θ of 16 and 23
		}
	}
	require.True(t, found)
}

func notEvaluated(l Law, runs []Run) (n int) {
	for _, r := range runs {
		if x, _ := l.At(r.Groups); x <= 0 {
			n++
		}
	}
	return n
}

// Slope, its error and the intervals of a line by hand: y = 1, 3, 2, 5 at ln x
// = 0, 1, 2, 3 has slope 1.1, residual sum 2.7 and Sxx = 5.
func TestFitAgainstHandCalculation(t *testing.T) {
	var runs []Run
	for i, y := range []float64{1, 3, 2, 5} {
		runs = append(runs, Run{Groups: Groups{Rayleigh: math.Exp(float64(i))}, Value: math.Exp(y)})
	}
	f, err := FitPowerLaw(runs, []Group{RayleighNumber}, &FitSettings{Level: 0.9})
	require.NoError(t, err)
	e := f.Exponents[0]
	require.InEpsilon(t, 1.1, e.Value, 1e-12)
	s := math.Sqrt(2.7 / 2)
	require.InEpsilon(t, s, f.Scatter, 1e-12)
	require.InEpsilon(t, s/math.Sqrt(5), e.StandardError, 1e-12)
	const t95 = 2.91998558 // Student's t, two degrees of freedom, 95%: tables
	require.InEpsilon(t, 1.1+t95*s/math.Sqrt(5), e.High, 1e-8)
	require.InEpsilon(t, 1.1-t95*s/math.Sqrt(5), e.Low, 1e-8)
	// Intercept 1.1 with variance s²(1/4 + 1.5²/5)
	se := s * math.Sqrt(0.25+2.25/5)
	require.InEpsilon(t, math.Exp(1.1), f.Prefactor.Value, 1e-12)
	require.InEpsilon(t, math.Exp(1.1)*se, f.Prefactor.StandardError, 1e-12)
	require.InEpsilon(t, math.Exp(1.1+t95*se), f.Prefactor.High, 1e-8)
	require.InEpsilon(t, math.Exp(1.1-t95*se), f.Prefactor.Low, 1e-8)
	// and at ln x = 2: s²(1/4 + 0.5²/5)
	x, err := f.At(Groups{Rayleigh: math.Exp(2)})
	require.NoError(t, err)
	require.InEpsilon(t, math.Exp(3.3+t95*s*math.Sqrt(0.25+0.05)), x.High, 1e-8)
	// One curvature, with a square added: by hand c = 0.25 ± √(2.45/1/4) = 0.783,
	// t = 0.3194 with one degree of freedom, p = 1 - 2 atan(t)/π.
	require.InEpsilon(t, 0.25, f.Curvature[0].Coefficient.Value, 1e-10)
	se = math.Sqrt(2.45 / 4)
	require.InEpsilon(t, se, f.Curvature[0].Coefficient.StandardError, 1e-10)
	require.InEpsilon(t, 1-2*math.Atan(0.25/se)/math.Pi, f.Curvature[0].P, 1e-8)
}

// 95% intervals hold the truth in 95% of noisy samples, and a true power law is
// called untenable in 5%.
func TestIntervalsCover(t *testing.T) {
	r := rand.New(rand.NewPCG(1, 2))
	const studies = 2000
	slope, prefactor, curved := 0, 0, 0
	for range studies {
		runs := series(8, func(ra float64) float64 { return 0.2 * math.Pow(ra, 0.3) * math.Exp(0.05*r.NormFloat64()) })
		f, err := FitPowerLaw(runs, []Group{RayleighNumber}, nil)
		require.NoError(t, err)
		if f.Exponents[0].Contains(0.3) {
			slope++
		}
		if f.Prefactor.Contains(0.2) {
			prefactor++
		}
		if ok, err := f.Tenable(); err == nil && !ok {
			curved++
		}
	}
	// three standard deviations of a binomial with 2000 trials at 5%: 29
	require.InDelta(t, 0.95*studies, slope, 30)
	require.InDelta(t, 0.95*studies, prefactor, 30)
	require.InDelta(t, 0.05*studies, curved, 30)
}

// An approach to a power law is no power law: the test sees the curvature, the
// local exponents show the approach.
func TestCurvedRunsAreUntenable(t *testing.T) {
	runs := series(7, func(ra float64) float64 { return 0.1966 * math.Cbrt(ra) * (1 + 2*math.Pow(ra, -0.2)) })
	f, err := FitPowerLaw(runs, []Group{RayleighNumber}, nil)
	require.NoError(t, err)
	ok, err := f.Tenable()
	require.NoError(t, err)
	require.False(t, ok)
	require.Positive(t, f.Curvature[0].Coefficient.Value)
	local, err := LocalExponents(runs, RayleighNumber)
	require.NoError(t, err)
	require.Len(t, local, 6)
	for i := 1; i < len(local); i++ {
		require.Greater(t, local[i].Exponent, local[i-1].Exponent)
		require.Equal(t, local[i-1].To, local[i].From)
	}
	require.Less(t, local[5].Exponent, 1./3)
	require.InDelta(t, 1./3, local[5].Exponent, 0.02)
}

// Given errors weight the runs and test the fit.
func TestWeights(t *testing.T) {
	runs := series(6, func(ra float64) float64 { return 0.2 * math.Pow(ra, 0.3) })
	for i := range runs {
		runs[i].RelativeError = 0.01
	}
	runs[5].Value *= 1.5
	f, err := FitPowerLaw(runs, []Group{RayleighNumber}, nil)
	require.NoError(t, err)
	require.Less(t, f.LackOfFit, 1e-6)
	ok, err := f.Tenable()
	require.NoError(t, err)
	require.False(t, ok)
	// The outlier does no harm if its error says that it is one.
	runs[5].RelativeError = 1e3
	f, err = FitPowerLaw(runs, []Group{RayleighNumber}, nil)
	require.NoError(t, err)
	require.InEpsilon(t, 0.3, f.Exponents[0].Value, 1e-6)
	require.Greater(t, f.LackOfFit, 0.99)

	// χ² of residuals of one standard error each, 6 of them on 4 degrees of
	// freedom: 1 - (1 + 3) e^-3 = 0.801, less what the slope takes up.
	for i := range runs {
		runs[i].Value = 0.2 * math.Pow(runs[i].Groups.Rayleigh, 0.3) * math.Exp(0.01*[]float64{1, -1, -1, 1, 1, -1}[i])
		runs[i].RelativeError = 0.01
	}
	f, err = FitPowerLaw(runs, []Group{RayleighNumber}, nil)
	require.NoError(t, err)
	chi2 := f.Scatter * f.Scatter * 4
	require.InEpsilon(t, (1+chi2/2)*math.Exp(-chi2/2), f.LackOfFit, 1e-9)
	require.InDelta(t, 6, chi2, 0.2)

	local, err := LocalExponents(runs, RayleighNumber)
	require.NoError(t, err)
	require.InEpsilon(t, math.Sqrt2*0.01/math.Log(math.Pow(10, 0.8)), local[0].Error, 1e-12)
}

func TestCompareWithPublished(t *testing.T) {
	runs := series(5, func(ra float64) float64 { return 0.2 * math.Cbrt(ra) })
	for i := range runs {
		runs[i].Groups.CellWidth = 1
		runs[i].Value *= 1 + 0.01*float64(i%2)
	}
	f, err := FitPowerLaw(runs, []Group{RayleighNumber}, nil)
	require.NoError(t, err)
	laws := []Law{FreeRolls(ViscousCore), RigidRolls(), GrossmannLohse(), LidOnset(), exponentLaws()[2]}
	c := f.Compare(laws)
	require.Len(t, c, 3) // GrossmannLohse misses Pr, LidOnset is in another group
	require.True(t, c[0].Agrees)
	require.Less(t, math.Abs(c[0].Errors), 3.0)
	require.InDelta(t, math.Log(0.2/0.19662)+0.004, c[0].Bias, 1e-3)
	require.Equal(t, 2, c[0].OutOfRange) // Ra = 1e4 and 1e5
	require.Equal(t, 5, c[0].Evaluated)
	require.False(t, c[1].Agrees)
	require.InDelta(t, 0.2, c[1].Exponent, 1e-12)
	require.Greater(t, c[1].Errors, 10.0)
	require.Equal(t, 0.25, c[2].Exponent) // known by its exponent only
	require.Zero(t, c[2].Evaluated)
	require.Zero(t, c[2].RMS)
	for i := range runs {
		runs[i].Groups.Prandtl = 1
	}
	f, err = FitPowerLaw(runs, []Group{RayleighNumber}, nil)
	require.NoError(t, err)
	c = f.Compare([]Law{GrossmannLohse()})
	require.InDelta(t, 0.255, c[0].Exponent, 0.01) // between the 1/4 and 1/3 of its limits
	require.GreaterOrEqual(t, c[0].RMS, math.Abs(c[0].Bias))
}

func TestFitErrors(t *testing.T) {
	good := func() []Run { return series(5, func(ra float64) float64 { return ra }) }
	ra := []Group{RayleighNumber}
	check := func(want string, runs []Run, groups []Group, s *FitSettings) {
		t.Helper()
		_, err := FitPowerLaw(runs, groups, s)
		require.ErrorContains(t, err, "scaling: "+want)
	}
	check("groups", good(), nil, nil)
	check("number of runs is 2, want >= 3 for 1 groups", good()[:2], ra, nil)
	check("FitSettings.Level", good(), ra, &FitSettings{Level: 1})
	runs := good()
	runs[2].Value = math.NaN()
	check("run 2: value", runs, ra, nil)
	runs = good()
	runs[3].Groups.Rayleigh = 0
	check("run 3: Ra", runs, ra, nil)
	runs = good()
	runs[1].RelativeError = -1
	check("run 1: relative error", runs, ra, nil)
	runs[1].RelativeError = 0.1
	check("runs with a relative error is 1, want 0 or all 5", runs, ra, nil)
	runs = good()
	for i := range runs {
		runs[i].Groups.Rayleigh = 5
	}
	check("groups of the runs", runs, ra, nil)
	check("groups of the runs", good(), []Group{RayleighNumber, RayleighNumber}, nil)
	_, err := LocalExponents(runs, RayleighNumber)
	require.ErrorContains(t, err, "twice")
	refuses(t, "Pr")(LocalExponents(good(), PrandtlNumber))

	f, err := FitPowerLaw(good()[:3], ra, nil)
	require.NoError(t, err)
	refuses(t, "too few")(f.Tenable())
	refuses(t, "Ra")(f.At(Groups{}))
}

func TestComparison(t *testing.T) {
	v := Groups{Rayleigh: 1e7, CellWidth: 1, Prandtl: 1e4}
	c := Compare(Find(Query{Quantity: Nusselt, Geometry: HorizontalLayer, Walls: Free, Heating: FromBelow, Rheology: Isoviscous}), v)
	require.NotEmpty(t, c.Applied)
	for i := 1; i < len(c.Applied); i++ {
		require.LessOrEqual(t, c.Applied[i-1].Value, c.Applied[i].Value)
	}
	s, err := c.Spread()
	require.NoError(t, err)
	require.Equal(t, len(c.Applied), s.Laws)
	require.Equal(t, c.Applied[0].Value, s.Low)
	require.Equal(t, c.Applied[len(c.Applied)-1].Value, s.High)
	require.Equal(t, s.High/s.Low, s.Ratio)
	require.True(t, s.Low <= s.Median && s.Median <= s.High)
	require.Positive(t, s.LogDeviation)
	// The finite-Pr rolls are out of range at Pr = 1e4.
	require.Len(t, c.OutOfRange, 1)
	require.Contains(t, c.String(), "out of range")

	four := Comparison{Applied: []Applied{{Value: 1}, {Value: 2}, {Value: 4}, {Value: 10}}}
	s, err = four.Spread()
	require.NoError(t, err)
	require.Equal(t, 3.0, s.Median)
	one := Comparison{Applied: []Applied{{Value: 7}}}
	s, err = one.Spread()
	require.NoError(t, err)
	require.Equal(t, Spread{Laws: 1, Low: 7, Median: 7, High: 7, Ratio: 1}, s)
	none := Compare([]Law{GlobeDropkin()}, Groups{Rayleigh: 1e6})
	require.Len(t, none.Failed, 1)
	_, err = none.Spread()
	require.ErrorIs(t, err, ErrOutOfRange)
}

func BenchmarkFit(b *testing.B) {
	runs := series(20, func(ra float64) float64 { return 0.2 * math.Cbrt(ra) })
	b.ReportAllocs()
	for b.Loop() {
		if _, err := FitPowerLaw(runs, []Group{RayleighNumber}, nil); err != nil {
			b.Fatal(err)
		}
	}
}
