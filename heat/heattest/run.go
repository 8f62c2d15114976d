package heattest

import (
	"context"
	"errors"
	"fmt"
	"math"

	"example.org/overturn/heat/exact"
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
	report := &Report{Kit: "heattest"}
	set, err := s.complete()
	if err != nil {
		return report, err
	}
	if solve == nil {
		return report, errors.New("heattest: the solver is nil")
	}
	for _, c := range set.Cases {
		result := (&study{Case: c, set: set, solve: solve}).run(ctx)
		if err := ctx.Err(); err != nil {
			return report, fmt.Errorf("heattest: stopped at %s: %w", c.Name, err)
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
	var runs []*trialRun
	for _, n := range st.set.Cells {
		g := v.grid(1/float64(n), st.set.Stretch)
		run, err := st.ask(ctx, v, v.problem(g, st.steps(n)))
		if err != nil {
			return failed(err)
		}
		runs = append(runs, run)
		r.Grids = append(r.Grids, g.String())
	}
	r.Convergence = st.convergence(runs)
	checks, err := st.properties(ctx, runs[0], runs[len(runs)-1])
	if err != nil {
		return failed(err)
	}
	r.Checks = checks
	return r
}

func (st *study) steps(cells int) int {
	return max(1, int(math.Round(st.set.StepsPerCell*float64(cells))))
}

// ask lets the solver solve one problem and looks at the answer.
func (st *study) ask(ctx context.Context, v view, p Problem) (*trialRun, error) {
	if err := ctx.Err(); err != nil {
		return nil, err
	}
	answer, err := st.solve(ctx, p)
	if err != nil {
		return nil, fmt.Errorf("on %v cells: %w", p.Grid, err)
	}
	run := &trialRun{view: v, Problem: p, answer: answer}
	if err := run.sample(); err != nil {
		return nil, fmt.Errorf("on %v cells: %w", p.Grid, err)
	}
	return run, nil
}

// convergence compares errors with orders. The flux is left out if the solver
// does not give it.
func (st *study) convergence(runs []*trialRun) []trial.Convergence {
	want := st.set.Expect(st.Case)
	widths := make([]float64, len(runs))
	temperature, flux := make([]float64, len(runs)), make([]float64, len(runs))
	given := false
	for i, r := range runs {
		widths[i] = 1 / float64(st.set.Cells[i])
		temperature[i] = r.temperatureError()
		flux[i], given = r.fluxError()
	}
	list := []trial.Convergence{trial.Measure("temperature", widths, temperature, want.Temperature, st.set.Slack, st.set.Tolerance)}
	if given {
		list = append(list, trial.Measure("flux", widths, flux, want.Flux, st.set.Slack, st.set.Tolerance))
	}
	return list
}
