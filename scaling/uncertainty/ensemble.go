package uncertainty

import (
	"fmt"
	"math"
	"slices"

	"gonum.org/v1/gonum/stat"
	"gonum.org/v1/gonum/stat/distuv"

	"example.org/overturn/scaling/internal/check"
)

// Ensemble holds the samples of a study and what came of them. It is not changed
// by its methods and is safe for concurrent use.
type Ensemble struct {
	inputs  []Input
	outputs []string
	x, y    []float64 // rows of inputs and outputs
	sorted  [][]float64
	failed  int
}

func (e *Ensemble) collect(x, y []float64, failures []error) {
	d, m := len(e.inputs), len(e.outputs)
	for i, err := range failures {
		if err != nil {
			e.failed++
			continue
		}
		e.x = append(e.x, x[i*d:(i+1)*d]...)
		e.y = append(e.y, y[i*m:(i+1)*m]...)
	}
	for k := range m {
		column := e.column(k)
		slices.Sort(column)
		e.sorted = append(e.sorted, column)
	}
}

// column returns a copy of one output.
func (e *Ensemble) column(k int) []float64 {
	m := len(e.outputs)
	c := make([]float64, len(e.y)/m)
	for i := range c {
		c[i] = e.y[i*m+k]
	}
	return c
}

// Samples returns the number of samples that did not fail.
func (e *Ensemble) Samples() int { return len(e.x) / len(e.inputs) }

// Failed returns the number of samples that failed.
func (e *Ensemble) Failed() int { return e.failed }

// Output returns the values of an output, in the order of the samples.
func (e *Ensemble) Output(name string) ([]float64, error) {
	k, err := e.index(name)
	if err != nil {
		return nil, err
	}
	return e.column(k), nil
}

// Input returns the values of an input, in the order of the samples.
func (e *Ensemble) Input(name string) ([]float64, error) {
	j := slices.IndexFunc(e.inputs, func(in Input) bool { return in.Name == name })
	if j < 0 {
		return nil, &FieldError{Package: string(pkg), Field: "input", Value: fmt.Sprintf("%q", name), Want: "one of the inputs"}
	}
	d := len(e.inputs)
	c := make([]float64, e.Samples())
	for i := range c {
		c[i] = e.x[i*d+j]
	}
	return c, nil
}

func (e *Ensemble) index(output string) (int, error) {
	k := slices.Index(e.outputs, output)
	if k < 0 {
		return 0, &FieldError{Package: string(pkg), Field: "output", Value: fmt.Sprintf("%q", output), Want: fmt.Sprintf("one of %q", e.outputs)}
	}
	return k, nil
}

// Estimate is a number with the interval in which it lies with [DefaultLevel]
// confidence, because the samples are finite.
type Estimate struct{ Value, Low, High float64 }

// Quantile returns the value that an output stays below with probability p,
// 0 < p < 1, interpolated between samples. Its interval is that of order
// statistics.
func (e *Ensemble) Quantile(output string, p float64) (Estimate, error) {
	k, err := e.index(output)
	if err != nil {
		return Estimate{}, err
	}
	if !(p > 0 && p < 1) {
		return Estimate{}, &FieldError{Package: string(pkg), Field: "probability", Value: fmt.Sprint(p), Want: "> 0 and < 1"}
	}
	s := e.sorted[k]
	half := normalQuantile * math.Sqrt(p*(1-p)/float64(len(s)))
	return Estimate{between(s, p), between(s, p-half), between(s, p+half)}, nil
}

// normalQuantile is the standard normal deviate of DefaultLevel, two-sided.
var normalQuantile = distuv.UnitNormal.Quantile((1 + DefaultLevel) / 2)

// between interpolates in sorted values; sample i stands for the probability
// (i+1/2)/n.
func between(s []float64, p float64) float64 {
	at := p*float64(len(s)) - 0.5
	i := int(math.Floor(at))
	switch {
	case i < 0:
		return s[0]
	case i+1 >= len(s):
		return s[len(s)-1]
	}
	f := at - float64(i)
	return s[i]*(1-f) + s[i+1]*f
}

// Band returns the quantiles at (1-share)/2 and (1+share)/2 and the median: low,
// middle and high of a central band, 0.68 for 16 to 84 per cent.
func (e *Ensemble) Band(output string, share float64) (low, median, high float64, err error) {
	if !(share > 0 && share < 1) {
		return 0, 0, 0, &FieldError{Package: string(pkg), Field: "share", Value: fmt.Sprint(share), Want: "> 0 and < 1"}
	}
	k, err := e.index(output)
	if err != nil {
		return 0, 0, 0, err
	}
	s := e.sorted[k]
	return between(s, (1-share)/2), between(s, 0.5), between(s, (1+share)/2), nil
}

// Mean returns the mean of an output, with an interval that takes samples for
// independent: Latin hypercubes do better.
func (e *Ensemble) Mean(output string) (Estimate, error) {
	k, err := e.index(output)
	if err != nil {
		return Estimate{}, err
	}
	mean, dev := stat.MeanStdDev(e.sorted[k], nil)
	half := normalQuantile * dev / math.Sqrt(float64(e.Samples()))
	return Estimate{mean, mean - half, mean + half}, nil
}

// StdDev returns the standard deviation of an output.
func (e *Ensemble) StdDev(output string) (float64, error) {
	k, err := e.index(output)
	if err != nil {
		return 0, err
	}
	return stat.StdDev(e.sorted[k], nil), nil
}

// Probability returns the probability of a condition on inputs and outputs, with
// Wilson's interval (1927), which makes sense even for no or all samples.
func (e *Ensemble) Probability(condition func(in, out []float64) bool) (Estimate, error) {
	if condition == nil {
		return Estimate{}, &FieldError{Package: string(pkg), Field: "condition", Value: "nil", Want: "a function"}
	}
	d, m := len(e.inputs), len(e.outputs)
	hits := 0
	for i := range e.Samples() {
		if condition(slices.Clone(e.x[i*d:(i+1)*d]), slices.Clone(e.y[i*m:(i+1)*m])) {
			hits++
		}
	}
	n, z := float64(e.Samples()), normalQuantile
	p := float64(hits) / n
	centre := (p + z*z/(2*n)) / (1 + z*z/n)
	half := z / (1 + z*z/n) * math.Sqrt(p*(1-p)/n+z*z/(4*n*n))
	return Estimate{p, math.Max(0, centre-half), math.Min(1, centre+half)}, nil
}

// Above returns the probability that an output exceeds a value.
func (e *Ensemble) Above(output string, value float64) (Estimate, error) {
	k, err := e.index(output)
	if err == nil {
		err = check.Finite(pkg, "value", value)
	}
	if err != nil {
		return Estimate{}, err
	}
	return e.Probability(func(_, out []float64) bool { return out[k] > value })
}
