package heat

import (
	"context"
	"errors"
	"fmt"
	"math"

	"example.org/overturn/heat/internal/rows"
	"example.org/overturn/stokes/staggered"
)

// A Stepper advances a temperature in time, finds its steady state, and gives
// access to the discrete equation itself. Once made it allocates nothing per
// step. It serves one goroutine at a time; two Steppers share nothing.
type Stepper struct {
	op     *operator
	set    Settings
	source *staggered.Scalar
	walls  Walls
	motion motion

	sweep    *sweep
	stage    [2][]float64 // states within a step
	implicit *implicit    // nil unless used
	steady   *steady      // nil unless used
}

// NewStepper returns a Stepper for the equation.
func NewStepper(eq Equation, s *Settings) (*Stepper, error) {
	set, err := s.withDefaults()
	if err != nil {
		return nil, err
	}
	if err := eq.check(); err != nil {
		return nil, err
	}
	op, err := newOperator(&eq)
	if err != nil {
		return nil, err
	}
	st := &Stepper{op: op, set: set, source: eq.Source, walls: eq.Walls}
	st.sweep = newSweep(op, set.Workers)
	st.stage[0] = make([]float64, op.nx*op.nz)
	if set.Scheme != RungeKutta2 {
		st.stage[1] = make([]float64, op.nx*op.nz)
	}
	if set.Scheme == Implicit {
		st.implicit = newImplicit(op, set.Workers)
	}
	return st, nil
}

// Grid returns the grid of the equation.
func (st *Stepper) Grid() *staggered.Grid { return st.op.g }

// Step advances temperature by dt under the flow; nil is a fluid at rest. The
// report tells where the heat came from. On error the temperature is unchanged.
func (st *Stepper) Step(ctx context.Context, temperature *staggered.Scalar, flow *staggered.Flow, dt float64) (Report, error) {
	if err := ctx.Err(); err != nil {
		return Report{}, err
	}
	if err := st.check(temperature, flow); err != nil {
		return Report{}, err
	}
	if !(dt > 0 && dt <= math.MaxFloat64) {
		return Report{}, fmt.Errorf("heat: dt is %v, want finite and > 0", dt)
	}
	st.sweep.begin(st.set.Advection, flow, st.source)
	rep := Report{Step: dt}
	err := st.advance(temperature.Values, dt, &rep)
	st.settle(err)
	if errors.Is(err, errTooLong) {
		return Report{}, &StepError{Step: dt, Stable: st.stableStep(flow)}
	}
	if err != nil {
		return Report{}, st.blame(err, temperature, flow)
	}
	return rep, nil
}

// advance takes a step by the scheme of the settings.
func (st *Stepper) advance(t []float64, dt float64, rep *Report) error {
	switch st.set.Scheme {
	case RungeKutta2:
		return st.rungeKutta2(t, dt, rep)
	case Implicit:
		return st.rosenbrock(t, dt, rep)
	}
	return st.rungeKutta3(t, dt, rep)
}

// errTooLong reports a step beyond the stable one.
var errTooLong = errors.New("too long")

// first runs the first stage of a step, from t to out, and finds out whether
// the step is admissible: the velocities have passed by then.
func (st *Stepper) first(out, t []float64, w rows.Weights, share, dt float64, rep *Report) error {
	if err := st.sweep.run(out, t, t, w, share, rep); err != nil || st.set.Limit == Unenforced {
		return err
	}
	const rounding = 1 + 1e-9
	if dt > rounding*st.stepFor(st.sweep.courantBound()) && dt > rounding*st.stepFor(st.op.courantRate(st.sweep.vx, st.sweep.vz)) {
		return errTooLong
	}
	return nil
}

// rungeKutta2 is the method of Shu & Osher (1988, eq. 2.16).
func (st *Stepper) rungeKutta2(t []float64, dt float64, rep *Report) error {
	u := st.stage[0]
	if err := st.first(u, t, rows.Weights{Now: 1, Rate: dt}, 1./2, dt, rep); err != nil {
		return err
	}
	st.moveTo(1)
	return st.sweep.run(t, t, u, rows.Weights{Old: 1. / 2, Now: 1. / 2, Rate: dt / 2}, 1./2, rep)
}

// rungeKutta3 is the method of Shu & Osher (1988, eq. 2.18).
func (st *Stepper) rungeKutta3(t []float64, dt float64, rep *Report) error {
	u, v := st.stage[0], st.stage[1]
	if err := st.first(u, t, rows.Weights{Now: 1, Rate: dt}, 1./6, dt, rep); err != nil {
		return err
	}
	st.moveTo(1)
	if err := st.sweep.run(v, t, u, rows.Weights{Old: 3. / 4, Now: 1. / 4, Rate: dt / 4}, 1./6, rep); err != nil {
		return err
	}
	st.moveTo(1. / 2)
	return st.sweep.run(t, t, v, rows.Weights{Old: 1. / 3, Now: 2. / 3, Rate: dt * 2 / 3}, 2./3, rep)
}

// RateTo stores in dst the heat that each cell gains per volume and time,
// C ∂T/∂t: advection, conduction and source. Its sum over cells times their
// areas is the power through the walls and of the source, to rounding.
func (st *Stepper) RateTo(dst, temperature *staggered.Scalar, flow *staggered.Flow) error {
	if err := checkScalar(st.op.g, "dst", dst); err != nil {
		return err
	}
	if err := st.check(temperature, flow); err != nil {
		return err
	}
	if &dst.Values[0] == &temperature.Values[0] {
		return errors.New("heat: dst is temperature itself, want another field")
	}
	var rep Report
	return st.blame(st.rate(dst.Values, temperature.Values, flow, st.set.Advection, &rep), temperature, flow)
}

// rate stores the heat gained per volume in dst and adds the budget to rep.
func (st *Stepper) rate(dst, t []float64, flow *staggered.Flow, a Advection, rep *Report) error {
	st.sweep.begin(a, flow, st.source)
	if err := st.sweep.run(dst, t, t, rows.Weights{Rate: st.op.capacity}, 1, rep); err != nil {
		return err
	}
	for c, v := range st.op.capacities {
		dst[c] *= v
	}
	return nil
}

// HeatContent returns the integral of heat capacity times temperature over the
// box, per length perpendicular to it.
func (st *Stepper) HeatContent(temperature *staggered.Scalar) (float64, error) {
	op := st.op
	if err := checkScalar(op.g, "temperature", temperature); err != nil {
		return 0, err
	}
	sum := 0.0
	for k, dz := range op.dz {
		row := 0.0
		for i, t := range temperature.Row(k) {
			row += op.capacityOf(k*op.nx+i) * t * op.dx[i]
		}
		sum += row * dz
	}
	return sum, nil
}

// check reports whether the fields fit the grid.
func (st *Stepper) check(temperature *staggered.Scalar, flow *staggered.Flow) error {
	if err := checkScalar(st.op.g, "temperature", temperature); err != nil {
		return err
	}
	if err := checkFlow(st.op.g, flow); err != nil {
		return err
	}
	if st.source != nil {
		return checkScalar(st.op.g, "Source", st.source)
	}
	return nil
}

// blame says which number made a rate not finite.
func (st *Stepper) blame(err error, temperature *staggered.Scalar, flow *staggered.Flow) error {
	if err == nil {
		return nil
	}
	type named struct {
		name   string
		values []float64
		width  int
	}
	nx := st.op.nx
	list := []named{{"temperature", temperature.Values, nx}}
	if flow != nil {
		list = append(list, named{"VX", flow.VX, nx + 1}, named{"VZ", flow.VZ, nx})
	}
	if st.source != nil {
		list = append(list, named{"Source", st.source.Values, nx})
	}
	for _, f := range list {
		for c, v := range f.values {
			if !(math.Abs(v) <= math.MaxFloat64) {
				return fmt.Errorf("heat: %s at (%d, %d) is %v: %w", f.name, c%f.width, c/f.width, v, ErrNotFinite)
			}
		}
	}
	return fmt.Errorf("heat: the numbers overflow: %w", ErrNotFinite)
}
