package uncertainty

import (
	"fmt"
	"math"

	"example.org/overturn/scaling/internal/check"
)

// FieldError reports a field, or an argument, whose value makes no sense; its
// fields Package, Field, Value and Want say which and what is allowed.
type FieldError = check.FieldError

// pkg names this package in the errors of its checks.
const pkg = check.In("uncertainty")

// Distribution is a probability distribution. Those of gonum's distuv with a
// Quantile method are ones: Normal, LogNormal, Uniform, Triangle, Beta and
// others.
type Distribution interface {
	// Quantile is the inverse of the cumulative distribution, 0 < p < 1.
	Quantile(p float64) float64
}

// Input is an uncertain parameter.
type Input struct {
	Name         string
	Distribution Distribution
}

// LogUniform is a distribution whose logarithm is uniform, for a parameter known
// to an order of magnitude or so.
type LogUniform struct{ Min, Max float64 }

// Quantile implements [Distribution].
func (l LogUniform) Quantile(p float64) float64 { return l.Min * math.Pow(l.Max/l.Min, p) }

// Fixed is a parameter that is known: it makes one of a study's inputs a
// constant.
type Fixed float64

// Quantile implements [Distribution].
func (f Fixed) Quantile(float64) float64 { return float64(f) }

// Truncated is a distribution without what lies outside Min and Max, for a
// normal distribution of something that cannot be negative, say.
type Truncated struct {
	Distribution interface {
		Distribution
		CDF(x float64) float64
	}
	Min, Max float64 // may be infinite
}

// Quantile implements [Distribution].
func (t Truncated) Quantile(p float64) float64 {
	low, high := t.Distribution.CDF(t.Min), t.Distribution.CDF(t.Max)
	x := t.Distribution.Quantile(low + p*(high-low))
	return math.Min(t.Max, math.Max(t.Min, x))
}

func checkInputs(inputs []Input) error {
	if len(inputs) == 0 {
		return &FieldError{Package: string(pkg), Field: "inputs", Value: "none", Want: "at least one"}
	}
	names := map[string]bool{}
	for i, in := range inputs {
		switch {
		case in.Name == "" || names[in.Name]:
			return &FieldError{Package: string(pkg), Field: fmt.Sprintf("inputs[%d].Name", i), Value: fmt.Sprintf("%q", in.Name), Want: "a name of its own"}
		case in.Distribution == nil:
			return &FieldError{Package: string(pkg), Field: in.Name + ": distribution", Value: "nil", Want: "a distribution"}
		}
		names[in.Name] = true
	}
	return nil
}
