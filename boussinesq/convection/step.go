package convection

import (
	"context"
	"errors"
	"fmt"
	"iter"
	"math"

	"example.org/overturn/heat"
	"example.org/overturn/stokes/staggered"
)

// Steps walks the run: it yields the present state first, then a sample after
// every Settings.Every steps and at the end, until a stop criterion of
// [Settings] is met, the loop is left, the context ends or a step fails. A
// failure is yielded with the sample of the last complete step, from which the
// run can go on: Steps may be called again.
func (m *Model) Steps(ctx context.Context) iter.Seq2[Sample, error] {
	return func(yield func(Sample, error) bool) {
		if err := m.ensureFlow(ctx); err != nil {
			yield(Sample{Time: m.time, Step: m.steps}, err)
			return
		}
		m.change, m.budget = math.NaN(), 0
		taken := 0
		for {
			reason := m.stop(taken)
			if reason != Running || taken%m.settings.Every == 0 {
				s, err := m.sample(reason)
				if !yield(s, err) || err != nil {
					return
				}
			}
			if reason != Running {
				return
			}
			if err := m.advance(ctx); err != nil {
				s, _ := m.sample(Running)
				yield(s, err)
				return
			}
			taken++
		}
	}
}

// Run takes steps until a stop criterion of [Settings] is met and returns the
// last sample. With no criterion set it is an error to call it.
func (m *Model) Run(ctx context.Context) (Sample, error) {
	if math.IsInf(m.settings.EndTime, 1) && m.settings.MaxSteps == 0 && m.settings.SteadyTolerance == 0 {
		return Sample{}, errors.New("convection: Run never ends, want EndTime, MaxSteps or SteadyTolerance in Settings")
	}
	var last Sample
	for s, err := range m.Steps(ctx) {
		last = s
		if err != nil {
			return last, err
		}
	}
	return last, nil
}

// stop reports which criterion is met after so many steps of this walk.
func (m *Model) stop(taken int) Stop {
	switch {
	case m.time >= m.settings.EndTime:
		return AtEndTime
	case m.change <= m.settings.SteadyTolerance && m.settings.SteadyTolerance > 0:
		return AtSteadyState
	case m.settings.MaxSteps > 0 && taken >= m.settings.MaxSteps:
		return AtMaxSteps
	}
	return Running
}

// ensureFlow solves for the flow of the present temperature.
func (m *Model) ensureFlow(ctx context.Context) error {
	if m.solved {
		return nil
	}
	rep, err := m.sys.solveFlow(ctx, m.temperature, m.flow)
	if err != nil {
		return err
	}
	m.solved, m.iterations = true, rep.Iterations
	return nil
}

// advance takes one time step. When it fails the model is as it was before.
func (m *Model) advance(ctx context.Context) error {
	dt := m.nextStep()
	if !(dt > 0) {
		return fmt.Errorf("convection: time step %d would be %v long, want > 0", m.steps+1, dt)
	}
	copy(m.old.Values, m.temperature.Values)
	iterations, err := m.try(ctx, dt)
	for e, ok := errors.AsType[*heat.StepError](err); ok; e, ok = errors.AsType[*heat.StepError](err) {
		// The flow has become faster than the one that the step was made for.
		dt = m.settings.Courant * e.Stable
		copy(m.temperature.Values, m.old.Values)
		iterations, err = m.try(ctx, dt)
	}
	if err != nil {
		copy(m.temperature.Values, m.old.Values)
		return err
	}
	m.limit = m.limitFrom(dt)
	m.keepFlow()
	m.iterations = iterations
	m.last, m.hasPrevious = dt, true
	if dt == m.settings.EndTime-m.time {
		m.time = m.settings.EndTime // exactly, whatever the sum rounds to
	} else {
		m.time += dt
	}
	m.steps++
	m.change = m.changeRate(dt)
	return nil
}

// try moves temperature over dt and leaves the flow at the end in m.middle.
func (m *Model) try(ctx context.Context, dt float64) (iterations int, err error) {
	if m.hasPrevious {
		extrapolate(m.middle, m.flow, m.previous, 0.5*dt/m.last)
	} else if err := m.predictMiddle(ctx, dt); err != nil {
		return 0, err
	}
	before, err := m.sys.heat.HeatContent(m.temperature)
	if err != nil {
		return 0, fmt.Errorf("convection: %w", err)
	}
	rep, err := m.sys.heat.Step(ctx, m.temperature, m.middle, dt)
	if err != nil {
		return 0, fmt.Errorf("convection: %w", err)
	}
	after, err := m.sys.heat.HeatContent(m.temperature)
	if err != nil {
		return 0, fmt.Errorf("convection: %w", err)
	}
	m.budget = budgetError(before, after, &rep)
	if m.hasPrevious {
		extrapolate(m.middle, m.flow, m.previous, dt/m.last)
	}
	flow, err := m.sys.solveFlow(ctx, m.temperature, m.middle)
	return flow.Iterations, err
}

// predictMiddle finds the flow at the middle of a first step from a half step
// with the flow at its beginning.
func (m *Model) predictMiddle(ctx context.Context, dt float64) error {
	if err := m.middle.CopyFrom(m.flow); err != nil {
		return err
	}
	if _, err := m.sys.heat.Step(ctx, m.temperature, m.flow, 0.5*dt); err != nil {
		return fmt.Errorf("convection: %w", err)
	}
	_, err := m.sys.solveFlow(ctx, m.temperature, m.middle)
	copy(m.temperature.Values, m.old.Values)
	return err
}

// extrapolate stores flow + factor·(flow − previous) in dst.
func extrapolate(dst, flow, previous *staggered.Flow, factor float64) {
	for _, a := range [3][3][]float64{
		{dst.VX, flow.VX, previous.VX}, {dst.VZ, flow.VZ, previous.VZ}, {dst.P, flow.P, previous.P},
	} {
		d, f, p := a[0], a[1], a[2]
		for j := range d {
			d[j] = f[j] + factor*(f[j]-p[j])
		}
	}
}

// keepFlow makes the flow in m.middle the present one.
func (m *Model) keepFlow() {
	copy(m.previous.VX, m.flow.VX)
	copy(m.previous.VZ, m.flow.VZ)
	copy(m.previous.P, m.flow.P)
	copy(m.flow.VX, m.middle.VX)
	copy(m.flow.VZ, m.middle.VZ)
	copy(m.flow.P, m.middle.P)
}

// nextStep chooses the length of the next step.
func (m *Model) nextStep() float64 {
	dt := m.settings.Courant * m.sys.heat.StableStep(m.flow)
	// An implicit step at rest has no bound but the diffusion time of the layer.
	dt = min(dt, m.settings.MaxStep, m.limit, 1/m.sys.rate())
	if !m.hasPrevious {
		// Nothing is known yet of how fast the flow changes. A step within
		// the explicit limit of conduction is shorter than any growth.
		dt = min(dt, 1/m.sys.fastest())
	}
	left := m.settings.EndTime - m.time
	if dt >= left {
		return left
	}
	// Two equal steps rather than a long and a very short one.
	if 2*dt > left {
		return 0.5 * left
	}
	return dt
}

// maxGrowth is the largest ratio of a step to the one before.
const maxGrowth = 1.25

// limitFrom compares the flow in m.middle, at the end of a step over dt, with
// the one extrapolated from the two before, whose difference grows with dt².
func (m *Model) limitFrom(dt float64) float64 {
	if !m.hasPrevious {
		return maxGrowth * dt
	}
	miss, size := 0.0, 0.0
	factor := dt / m.last
	for _, a := range [2][3][]float64{
		{m.middle.VX, m.flow.VX, m.previous.VX}, {m.middle.VZ, m.flow.VZ, m.previous.VZ},
	} {
		end, now, before := a[0], a[1], a[2]
		for j, v := range end {
			d := v - (now[j] + factor*(now[j]-before[j]))
			miss += d * d
			size += v * v
		}
	}
	if size == 0 {
		return math.Inf(1)
	}
	relative := math.Sqrt(miss/size) / m.settings.FlowError
	return dt * min(maxGrowth, max(0.5, 0.9/math.Sqrt(relative)))
}

// changeRate returns the root mean square of ∂T/∂t over the last step, in
// temperature ranges per diffusion time: infinite where all warms evenly.
func (m *Model) changeRate(dt float64) float64 {
	for j, v := range m.temperature.Values {
		m.old.Values[j] = v - m.old.Values[j]
	}
	change := m.old.RMS()
	if change == 0 {
		return 0
	}
	return change / (extent(m.temperature) * dt * m.sys.rate())
}
