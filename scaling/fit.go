package scaling

import (
	"fmt"
	"math"
	"slices"
	"strings"

	"example.org/overturn/scaling/internal/check"
	"gonum.org/v1/gonum/mat"
	"gonum.org/v1/gonum/stat/distuv"
)

// Run is one result to fit: a run of a program or an experiment.
type Run struct {
	Groups Groups
	Value  float64 // for example its Nusselt number

	// RelativeError is the standard error of Value over Value. Give it for all
	// runs of a fit or for none; zero is not known.
	RelativeError float64
}

// DefaultLevel is the confidence level of intervals where nothing else is said.
const DefaultLevel = 0.95

// FitSettings tunes a fit. A nil *FitSettings, or a zero field, means the
// default.
type FitSettings struct {
	// Level is the confidence level of the intervals. Default [DefaultLevel].
	Level float64
}

func (s *FitSettings) level() (float64, error) {
	if s == nil || s.Level == 0 {
		return DefaultLevel, nil
	}
	if !(s.Level > 0 && s.Level < 1) {
		return 0, &FieldError{Package: string(pkg), Field: "FitSettings.Level", Value: formatFloat(s.Level), Want: "> 0 and < 1"}
	}
	return s.Level, nil
}

// Interval is an estimate with its confidence interval.
type Interval struct {
	Value, StandardError float64
	Low, High            float64
}

// Contains reports whether x lies in the interval.
func (i Interval) Contains(x float64) bool { return x >= i.Low && x <= i.High }

// String returns value and interval.
func (i Interval) String() string { return fmt.Sprintf("%.4g [%.4g, %.4g]", i.Value, i.Low, i.High) }

// FittedExponent is the exponent of one group.
type FittedExponent struct {
	Group Group
	Interval
}

// Fit is a power law through runs,
//
//	Value = Prefactor · Π group^Exponent,
//
// by least squares in logarithms. It is not changed by its methods and is safe
// for concurrent use.
type Fit struct {
	Prefactor Interval
	Exponents []FittedExponent

	Level            float64 // confidence level of the intervals
	Runs             int
	DegreesOfFreedom int

	// Scatter is the standard deviation of the logarithms about the law. Where
	// errors are given it is that in units of them: about one for a good fit.
	Scatter float64

	// Curvature, one a group, tells whether the exponent changes with the group.
	// It is empty where there are too few runs to tell.
	Curvature []Curvature

	// LackOfFit is the probability that scatter as large as this, or larger,
	// comes from the given errors alone: χ² of the residuals. It is 1 where no
	// errors are given.
	LackOfFit float64

	runs       []Run
	covariance *mat.SymDense // of (mean logarithm, exponents), about the centre
	centre     []float64     // mean logarithms of the groups
	height     float64       // logarithm of the law at the centre
}

// Curvature is the coefficient c of an added term c (ln group - mean)².
type Curvature struct {
	Group       Group
	Coefficient Interval

	// P is the probability of a coefficient as far from zero as this, or
	// farther, if the law were a power law with independent scatter.
	P float64
}

// FitPowerLaw fits Value = C Π group^β to runs by least squares in logarithms,
// with weights 1/RelativeError² where errors are given, and confidence intervals
// by Student's distribution. Scatter is estimated from the residuals in either
// case.
//
// Runs of a program scatter little about a smooth curve that need not be a power
// law. Look at [Fit.Tenable] before you publish an exponent; [LocalExponents]
// shows what to say instead.
//
// There must be at least one run more than constants, and every group must vary
// on its own.
func FitPowerLaw(runs []Run, groups []Group, settings *FitSettings) (*Fit, error) {
	level, err := settings.level()
	if err != nil {
		return nil, err
	}
	if len(groups) == 0 {
		return nil, &FieldError{Package: string(pkg), Field: "groups", Value: "none", Want: "at least one"}
	}
	if need := len(groups) + 2; len(runs) < need {
		return nil, &FieldError{Package: string(pkg), Field: "number of runs", Value: fmt.Sprint(len(runs)), Want: fmt.Sprintf(">= %d for %d groups", need, len(groups))}
	}
	d, err := newDesign(runs, groups)
	if err != nil {
		return nil, err
	}
	r, err := d.solve()
	if err != nil {
		return nil, err
	}
	f := &Fit{
		Level: level, Runs: len(runs), DegreesOfFreedom: len(runs) - len(groups) - 1,
		Scatter: r.scatter, LackOfFit: 1,
		runs: slices.Clone(runs), covariance: r.covariance, centre: d.centre, height: r.solution[0],
	}
	quantile := f.quantile()
	for j, g := range groups {
		f.Exponents = append(f.Exponents, FittedExponent{g, interval(r.solution[j+1], math.Sqrt(r.covariance.At(j+1, j+1)), quantile)})
	}
	f.Prefactor = f.prefactor(quantile)
	if d.weighted {
		chi := distuv.ChiSquared{K: float64(f.DegreesOfFreedom)}
		f.LackOfFit = chi.Survival(r.scatter * r.scatter * chi.K)
	}
	f.Curvature = d.curvature(groups, level)
	return f, nil
}

func interval(value, err, quantile float64) Interval {
	return Interval{Value: value, StandardError: err, Low: value - quantile*err, High: value + quantile*err}
}

func (f *Fit) quantile() float64 { return studentQuantile(f.Level, f.DegreesOfFreedom) }

func studentQuantile(level float64, dof int) float64 {
	return distuv.StudentsT{Mu: 0, Sigma: 1, Nu: float64(dof)}.Quantile((1 + level) / 2)
}

// prefactor carries the fit from the centre of the runs to groups of one.
func (f *Fit) prefactor(quantile float64) Interval {
	n := len(f.Exponents)
	g := mat.NewVecDense(n+1, nil)
	g.SetVec(0, 1)
	value := f.height
	for j := range n {
		g.SetVec(j+1, -f.centre[j])
		value -= f.centre[j] * f.Exponents[j].Value
	}
	err := math.Sqrt(mat.Inner(g, f.covariance, g))
	return exponential(value, err, quantile)
}

// exponential turns an interval of a logarithm into one of the number.
func exponential(value, err, quantile float64) Interval {
	x := math.Exp(value)
	return Interval{Value: x, StandardError: x * err, Low: math.Exp(value - quantile*err), High: math.Exp(value + quantile*err)}
}

// Exponent returns the exponent of a group, false if it was not fitted.
func (f *Fit) Exponent(g Group) (Interval, bool) {
	for _, e := range f.Exponents {
		if e.Group == g {
			return e.Interval, true
		}
	}
	return Interval{}, false
}

// At returns the fitted value, with the confidence interval of the law there.
// Away from the runs the interval widens, but it knows nothing of what the law
// does beyond them.
func (f *Fit) At(v Groups) (Interval, error) {
	n := len(f.Exponents)
	g := mat.NewVecDense(n+1, nil)
	g.SetVec(0, 1)
	value := f.height
	for j, e := range f.Exponents {
		x := e.Group.Of(v)
		if err := check.Positive(pkg, "Groups: "+e.Group.String(), x); err != nil {
			return Interval{}, err
		}
		g.SetVec(j+1, math.Log(x)-f.centre[j])
		value += e.Value * g.AtVec(j+1)
	}
	return exponential(value, math.Sqrt(mat.Inner(g, f.covariance, g)), f.quantile()), nil
}

// Tenable reports whether the runs are consistent with a power law at the level
// of the fit: no significant curvature and, where errors are given, no
// significant lack of fit. With too few runs to tell it is an error.
func (f *Fit) Tenable() (bool, error) {
	if len(f.Curvature) == 0 {
		return false, fmt.Errorf("scaling: %d runs are too few to test a power law in %d groups for curvature", f.Runs, len(f.Exponents))
	}
	significant := 1 - f.Level
	for _, c := range f.Curvature {
		if c.P < significant {
			return false, nil
		}
	}
	return f.LackOfFit >= significant, nil
}

// String returns the law and what speaks against it, in a few lines.
func (f *Fit) String() string {
	var b strings.Builder
	fmt.Fprintf(&b, "value = C")
	for _, e := range f.Exponents {
		fmt.Fprintf(&b, " · (%v)^β", e.Group)
	}
	fmt.Fprintf(&b, ", %d runs, %g%% intervals, scatter %.2g\n", f.Runs, 100*f.Level, f.Scatter)
	fmt.Fprintf(&b, "C = %v\n", f.Prefactor)
	for _, e := range f.Exponents {
		fmt.Fprintf(&b, "β(%v) = %v\n", e.Group, e.Interval)
	}
	for _, c := range f.Curvature {
		fmt.Fprintf(&b, "curvature in %v = %v, p = %.2g\n", c.Group, c.Coefficient, c.P)
	}
	return b.String()
}

// FitComparison is a fit against a published law.
type FitComparison struct {
	Law Law

	// Exponent is that of the law in Group; where it is no power law, the local
	// one at the geometric mean of the runs. Agrees says whether the fitted
	// interval holds it; Errors is the difference, fitted less law, in standard
	// errors.
	Group    Group
	Exponent float64
	Agrees   bool
	Errors   float64

	// Bias is the mean of ln(run/law), RMS the root mean square. They are zero
	// where Evaluated, the number of runs for which the law has a value, is.
	Bias, RMS float64
	Evaluated int

	// OutOfRange counts the runs outside the range of the law.
	OutOfRange int
}

// Compare compares the fit, and the runs, with laws in one of the fitted groups.
// Laws in other groups are left out.
func (f *Fit) Compare(laws []Law) []FitComparison {
	var out []FitComparison
	for _, l := range laws {
		fitted, ok := f.Exponent(l.Basis)
		if !ok {
			continue
		}
		c := FitComparison{Law: l, Group: l.Basis}
		if c.Exponent, ok = f.exponentOf(l); !ok {
			continue
		}
		c.Agrees = fitted.Contains(c.Exponent)
		c.Errors = (fitted.Value - c.Exponent) / fitted.StandardError
		for _, r := range f.runs {
			x, err := l.At(r.Groups)
			if x <= 0 {
				continue
			}
			if err != nil {
				c.OutOfRange++
			}
			c.Evaluated++
			d := math.Log(r.Value / x)
			c.Bias += d
			c.RMS += d * d
		}
		if c.Evaluated > 0 {
			c.Bias /= float64(c.Evaluated)
			c.RMS = math.Sqrt(c.RMS / float64(c.Evaluated))
		}
		out = append(out, c)
	}
	return out
}

// exponentOf returns the exponent of a law in its basis, at the geometric mean
// of the runs where it is not the same everywhere.
func (f *Fit) exponentOf(l Law) (float64, bool) {
	if e, ok := l.Exponent(); ok {
		return e, true
	}
	centre := f.runs[len(f.runs)/2].Groups
	for j, e := range f.Exponents {
		centre = centre.with(e.Group, math.Exp(f.centre[j]))
	}
	_, e, err := l.Local(centre)
	return e, err == nil || e != 0
}

// LocalExponent is the slope between two neighbouring runs.
type LocalExponent struct {
	From, To float64 // of the group
	Exponent float64
	Error    float64 // standard error from those of the runs; zero where not given
}

// LocalExponents returns the slopes d ln Value/d ln group between neighbouring
// runs, in order of the group: what is left to say where no power law is
// tenable. Runs must differ in the group; other groups should be the same in
// all.
func LocalExponents(runs []Run, g Group) ([]LocalExponent, error) {
	sorted := slices.Clone(runs)
	slices.SortFunc(sorted, func(a, b Run) int {
		switch x, y := g.Of(a.Groups), g.Of(b.Groups); {
		case x < y:
			return -1
		case x > y:
			return 1
		}
		return 0
	})
	if _, err := newDesign(sorted, []Group{g}); err != nil {
		return nil, err
	}
	var out []LocalExponent
	for i := 1; i < len(sorted); i++ {
		a, b := sorted[i-1], sorted[i]
		x, y := g.Of(a.Groups), g.Of(b.Groups)
		if x == y {
			return nil, &FieldError{Package: string(pkg), Field: fmt.Sprintf("runs: %v", g), Value: formatFloat(x) + " twice", Want: "different values"}
		}
		dx := math.Log(y / x)
		out = append(out, LocalExponent{
			From: x, To: y, Exponent: math.Log(b.Value/a.Value) / dx,
			Error: math.Hypot(a.RelativeError, b.RelativeError) / dx,
		})
	}
	return out, nil
}
