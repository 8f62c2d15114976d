package heattest

import (
	"context"
	"errors"
	"fmt"
	"math"

	"example.org/overturn/heat/exact"
	"example.org/overturn/stokes/stokestest/trial"
)

// warmer is the constant by which the temperature is raised, over its size. It
// is a power of two.
const warmer = 8

// properties looks at what must hold whatever the exact solution is: on the
// coarsest grid, but on the finest at the maximum principle, which schemes
// without a limiter keep only up to their errors.
func (st *study) properties(ctx context.Context, r, finest *trialRun) ([]trial.Check, error) {
	list, err := st.twins(ctx, r)
	if err != nil {
		return nil, err
	}
	if d, ok, err := st.uniform(ctx, r); err != nil {
		return nil, err
	} else if ok {
		list = append(list, trial.Check{Name: "uniform temperature", Value: d, Limit: st.set.Tolerance})
	}
	if b := r.answer.Budget; b != nil {
		list = append(list, trial.Check{Name: "heat budget", Value: r.imbalance(*b), Limit: st.set.Tolerance})
	}
	if d, ok := finest.overshoot(); ok {
		list = append(list, trial.Check{Name: "maximum principle", Value: d, Limit: st.set.Overshoot})
	}
	return list, nil
}

// twins compares the answer with those to the same problem in other views.
func (st *study) twins(ctx context.Context, r *trialRun) ([]trial.Check, error) {
	var list []trial.Check
	width, height := r.Grid.Size()
	same := func(x, z float64) (float64, float64) { return x, z }
	for _, twin := range []struct {
		name string
		view view
		grid trial.Grid
		back func(x, z float64) (float64, float64)
	}{
		{"mirrored in x", r.view.mirroredX(), r.Grid.MirroredX(), func(x, z float64) (float64, float64) { return width - x, z }},
		{"mirrored in z", r.view.mirroredZ(), r.Grid.MirroredZ(), func(x, z float64) (float64, float64) { return x, height - z }},
		{"in other units", r.view.in(otherUnits), r.Grid.Scaled(otherUnits.length),
			func(x, z float64) (float64, float64) { return x / otherUnits.length, z / otherUnits.length }},
		{"warmer by a constant", r.view.warmerBy(warmer), r.Grid, same},
	} {
		t, err := st.ask(ctx, twin.view, twin.view.problem(twin.grid, r.Steps))
		if errors.Is(err, errors.ErrUnsupported) {
			continue
		}
		if err != nil {
			return nil, fmt.Errorf("%s: %w", twin.name, err)
		}
		there := t.temperatures.Plus(-t.warmer).Times(1 / t.units.temperature).Moved(twin.back)
		if d, ok := there.Difference(r.temperatures, max(width, height)); ok {
			list = append(list, trial.Check{Name: twin.name, Value: d.RMS() / r.sizes().temperature, Limit: st.set.Tolerance})
		}
	}
	return list, nil
}

// uniform returns by how much a uniform temperature changes in the flow of the
// problem.
func (st *study) uniform(ctx context.Context, r *trialRun) (float64, bool, error) {
	p, ok := uniform(r.Problem)
	if !ok {
		return 0, false, nil
	}
	t, err := st.ask(ctx, r.view, p)
	if errors.Is(err, errors.ErrUnsupported) {
		return 0, false, nil
	}
	if err != nil {
		return 0, false, fmt.Errorf("uniform temperature: %w", err)
	}
	return t.temperatures.Plus(-1).RMS(), true, nil
}

// imbalance returns what is missing in a budget, relative to the heat in the
// box and what passes its walls; in a steady state to the latter.
func (r *trialRun) imbalance(b Budget) float64 {
	width, height := r.Grid.Size()
	size := r.sizes()
	passing := 2 * (width + height) * size.flux
	if r.Problem.Steady() {
		return math.Abs(b.After-b.Before-b.Gained) / passing
	}
	return math.Abs(b.After-b.Before-b.Gained) / (width*height*size.heat + passing*r.Duration)
}

// overshoot returns how far temperatures leave the range of those at the start
// and of walls and surroundings, relative to that range. It reports false where
// there is a source or a wall of given flux, or no range.
func (r *trialRun) overshoot() (float64, bool) {
	low, high := math.Inf(1), math.Inf(-1)
	include := func(t float64) { low, high = min(low, t), max(high, t) }
	const times = 16
	for j := range times + 1 {
		t := r.Duration * float64(j) / times
		for _, z := range r.ZCentres() {
			for _, x := range r.XCentres() {
				if r.Source(x, z, t) != 0 {
					return 0, false
				}
			}
		}
		for side := exact.Left; side <= exact.Top; side++ {
			switch r.kinds()[side] {
			case exact.Flux:
				return 0, false
			case exact.Isothermal, exact.Robin:
				for i := range 65 {
					include(r.WallValue(side, r.wallLength(side)*float64(i)/64, t))
				}
			}
		}
	}
	if !r.Problem.Steady() {
		for _, axis := range [][2][]float64{{r.X, r.Z}, {r.XCentres(), r.ZCentres()}} {
			for _, t := range r.Tabulate(r.Initial, axis[0], axis[1]) {
				include(t)
			}
		}
	}
	if !(high > low) {
		return 0, false
	}
	worst := 0.0
	for _, t := range r.temperatures.Value {
		worst = max(worst, low-t, t-high)
	}
	return worst / (high - low), true
}
