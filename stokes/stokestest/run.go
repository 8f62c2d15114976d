package stokestest

import (
	"context"
	"errors"
	"fmt"

	"example.org/overturn/stokes/exact"
	"example.org/overturn/stokes/stokestest/trial"
)

// Report is what came of all cases. Its String method prints a table, Err
// returns an error that lists all failures.
type Report = trial.Report

// Result is what came of one case. Its String method prints the errors on all
// grids and the checks.
type Result = trial.Result

// Failure is one thing that is wrong; errors.AsType finds it in the error of
// [Check].
type Failure = trial.Failure

// Check tests a solver. The error lists everything that is wrong.
func Check(ctx context.Context, solve Solver, s *Settings) error {
	r, err := Run(ctx, solve, s)
	if err != nil {
		return err
	}
	return r.Err()
}

// Run tests a solver and reports what came of it. The error is about the
// settings, or that of the context; the report then holds the cases that were
// finished. What is wrong with the solver is in [Report.Err].
func Run(ctx context.Context, solve Solver, s *Settings) (*Report, error) {
	report := &Report{Kit: "stokestest"}
	set, err := s.complete()
	if err != nil {
		return report, err
	}
	if solve == nil {
		return report, errors.New("stokestest: the solver is nil")
	}
	for _, c := range set.Cases {
		result := (&study{Case: c, set: set, solve: solve}).run(ctx)
		if err := ctx.Err(); err != nil {
			return report, fmt.Errorf("stokestest: stopped at %s: %w", c.Name, err)
		}
		report.Results = append(report.Results, result)
		if set.Monitor != nil {
			set.Monitor(result)
		}
	}
	return report, nil
}

// A study is the test of one case.
type study struct {
	exact.Case
	set   Settings
	solve Solver
}

func (st *study) run(ctx context.Context) Result {
	r := Result{Name: st.Name, Source: st.Source}
	failed := func(err error) Result {
		if errors.Is(err, errors.ErrUnsupported) {
			r.Skipped = err
		} else {
			r.Err = err
		}
		return r
	}
	v := viewOf(st.Case)
	var all []deviations
	var coarsest *trialRun
	for _, n := range st.set.Cells {
		run, err := st.ask(ctx, v, v.grid(1/float64(n), st.set.Stretch))
		if err != nil {
			return failed(err)
		}
		if coarsest == nil {
			coarsest = run
		}
		all = append(all, run.deviations())
		r.Grids = append(r.Grids, run.Grid.String())
	}
	r.Convergence = st.convergence(all)
	checks, err := st.properties(ctx, coarsest)
	if err != nil {
		return failed(err)
	}
	r.Checks = checks
	return r
}

// ask lets the solver solve one problem and looks at the answer.
func (st *study) ask(ctx context.Context, v view, g trial.Grid) (*trialRun, error) {
	if err := ctx.Err(); err != nil {
		return nil, err
	}
	p := v.problem(g)
	answer, err := st.solve(ctx, p)
	if err != nil {
		return nil, fmt.Errorf("on %v cells: %w", g, err)
	}
	run := &trialRun{view: v, Problem: p, answer: answer}
	if err := run.sample(); err != nil {
		return nil, fmt.Errorf("on %v cells: %w", g, err)
	}
	return run, nil
}

// convergence compares errors with orders. Quantities that the solver does not
// give are left out.
func (st *study) convergence(all []deviations) []trial.Convergence {
	want := st.set.Expect(st.Case)
	widths := make([]float64, len(st.set.Cells))
	for i, n := range st.set.Cells {
		widths[i] = 1 / float64(n)
	}
	var list []trial.Convergence
	for _, q := range []struct {
		name  string
		order float64
		of    func(d deviations) float64
	}{
		{"velocity", want.Velocity, func(d deviations) float64 { return d.velocity }},
		{"pressure", want.Pressure, func(d deviations) float64 { return d.pressure }},
		{"stress", want.Stress, func(d deviations) float64 { return d.stress }},
	} {
		errs := make([]float64, len(all))
		for i, d := range all {
			errs[i] = q.of(d)
		}
		if errs[0] != missing {
			list = append(list, trial.Measure(q.name, widths, errs, q.order, st.set.Slack, st.set.Tolerance))
		}
	}
	return list
}
