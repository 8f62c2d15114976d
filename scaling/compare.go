package scaling

import (
	"cmp"
	"fmt"
	"math"
	"slices"
	"strings"

	"gonum.org/v1/gonum/stat"
)

// Comparison is what several laws say about one case.
type Comparison struct {
	// Laws in range, from the lowest value to the highest. Laws with the same
	// name have different parameters.
	Applied []Applied

	// Laws that could be evaluated but are out of range, with their error; they
	// do not count.
	OutOfRange []Applied

	// Laws that could not be evaluated, mostly for want of a group.
	Failed []Applied
}

// Applied is one law at one case.
type Applied struct {
	Law   Law
	Value float64
	Err   error // nil where the law is in range
}

// Compare evaluates laws on the same groups. Select laws that give the same
// quantity for the same kind of layer, or the spread means nothing:
//
//	c := scaling.Compare(scaling.Find(scaling.Query{Quantity: scaling.Nusselt, Walls: scaling.Free, ...}), groups)
func Compare(laws []Law, v Groups) Comparison {
	var c Comparison
	for _, l := range laws {
		x, err := l.At(v)
		a := Applied{l, x, err}
		switch {
		case err == nil:
			c.Applied = append(c.Applied, a)
		case x != 0:
			c.OutOfRange = append(c.OutOfRange, a)
		default:
			c.Failed = append(c.Failed, a)
		}
	}
	byValue := func(a, b Applied) int { return cmp.Compare(a.Value, b.Value) }
	slices.SortStableFunc(c.Applied, byValue)
	slices.SortStableFunc(c.OutOfRange, byValue)
	return c
}

// Spread says how far laws are apart.
type Spread struct {
	Laws              int
	Low, Median, High float64
	Ratio             float64 // High/Low
	LogDeviation      float64 // standard deviation of the natural logarithms; zero for one law
}

// Spread returns the spread of the laws in range; an error that wraps
// [ErrOutOfRange] where there is none.
func (c Comparison) Spread() (Spread, error) {
	n := len(c.Applied)
	if n == 0 {
		return Spread{}, fmt.Errorf("scaling: none of %d laws applies: %w", len(c.OutOfRange)+len(c.Failed), ErrOutOfRange)
	}
	values, logs := make([]float64, n), make([]float64, n)
	for i, a := range c.Applied {
		values[i], logs[i] = a.Value, math.Log(a.Value)
	}
	s := Spread{Laws: n, Low: values[0], High: values[n-1], Ratio: values[n-1] / values[0]}
	s.Median = (values[(n-1)/2] + values[n/2]) / 2
	if n > 1 {
		s.LogDeviation = stat.StdDev(logs, nil)
	}
	return s, nil
}

// String returns a table of the laws in range and of those out of it.
func (c Comparison) String() string {
	var b strings.Builder
	for _, a := range c.Applied {
		fmt.Fprintf(&b, "%10.4g  %s; %s (%v)\n", a.Value, a.Law.Name, a.Law.Source, a.Law.Status)
	}
	for _, a := range c.OutOfRange {
		fmt.Fprintf(&b, "%10.4g  out of range: %v\n", a.Value, a.Err)
	}
	return b.String()
}
