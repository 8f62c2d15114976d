package trial

import (
	"errors"
	"fmt"
	"math"
)

// A Convergence is the error of one quantity on grids that become finer.
type Convergence struct {
	Quantity string
	Errors   []float64 // relative, one a grid
	Observed float64   // order, between the last two grids; NaN with fewer
	Expected float64   // order; zero if none is

	slack, floor float64
}

// Measure returns the convergence of a quantity. The observed order may fall
// short of the expected one by slack; an error of floor or less passes whatever
// the order.
func Measure(quantity string, widths, errs []float64, expected, slack, floor float64) Convergence {
	c := Convergence{Quantity: quantity, Errors: errs, Observed: math.NaN(), Expected: expected, slack: slack, floor: floor}
	if n := len(errs); n > 1 {
		c.Observed = math.Log(errs[n-2]/errs[n-1]) / math.Log(widths[n-2]/widths[n-1])
	}
	return c
}

// Last returns the error on the finest grid, NaN if there is none.
func (c Convergence) Last() float64 {
	if len(c.Errors) == 0 {
		return math.NaN()
	}
	return c.Errors[len(c.Errors)-1]
}

// Passed reports whether the order is the expected one or better.
func (c Convergence) Passed() bool {
	return c.Expected == 0 || c.Observed >= c.Expected-c.slack || c.Last() <= c.floor
}

// A Check is one property: a number that must not exceed a limit.
type Check struct {
	Name         string
	Value, Limit float64
}

// Passed reports whether the value is within the limit.
func (c Check) Passed() bool { return c.Value <= c.Limit }

// A Result is what came of one case.
type Result struct {
	Name, Source string
	Grids        []string
	Convergence  []Convergence
	Checks       []Check

	// Skipped is the error with which the solver declined the case: one that
	// wraps [errors.ErrUnsupported].
	Skipped error

	// Err is the error with which it failed, or what is wrong with its
	// answer.
	Err error
}

// A Failure is one thing that is wrong with a solver.
type Failure struct {
	Case  string
	What  string  // the order of a quantity, or a check
	Value float64 // found
	Want  string  // "≥ 1.75"
	Err   error   // in place of What, Value and Want
}

// Error describes the failure in one line.
func (f *Failure) Error() string {
	if f.Err != nil {
		return fmt.Sprintf("%s: %v", f.Case, f.Err)
	}
	return fmt.Sprintf("%s: %s is %.3g, want %s", f.Case, f.What, f.Value, f.Want)
}

// Unwrap returns Err.
func (f *Failure) Unwrap() error { return f.Err }

// Failures returns what is wrong, in the order of the report.
func (r Result) Failures() []*Failure {
	if r.Skipped != nil {
		return nil
	}
	if r.Err != nil {
		return []*Failure{{Case: r.Name, Err: r.Err}}
	}
	var list []*Failure
	for _, c := range r.Convergence {
		if !c.Passed() {
			list = append(list, &Failure{Case: r.Name, What: "order of " + c.Quantity, Value: c.Observed,
				Want: fmt.Sprintf(">= %.3g", c.Expected-c.slack)})
		}
	}
	for _, c := range r.Checks {
		if !c.Passed() {
			list = append(list, &Failure{Case: r.Name, What: c.Name, Value: c.Value, Want: fmt.Sprintf("<= %.3g", c.Limit)})
		}
	}
	return list
}

// A Report is what came of all cases.
type Report struct {
	Kit     string // the name of the package
	Results []Result
}

// ErrNothingTested reports a solver that declined every case.
var ErrNothingTested = errors.New("the solver declined every case")

// Err returns an error that lists all failures, each of them a [*Failure]; nil
// if there is none.
func (r *Report) Err() error {
	var list []error
	tested := false
	for _, res := range r.Results {
		tested = tested || res.Skipped == nil
		for _, f := range res.Failures() {
			list = append(list, f)
		}
	}
	switch {
	case !tested:
		return fmt.Errorf("%s: %w", r.Kit, ErrNothingTested)
	case len(list) == 0:
		return nil
	}
	return fmt.Errorf("%s found errors:\n%w", r.Kit, errors.Join(list...))
}
