package heat

import (
	"context"
	"errors"
	"fmt"
	"math"

	"example.org/overturn/heat/internal/dissect"
	"example.org/overturn/stokes/staggered"
)

// steady is what the steady solves need beyond a step.
type steady struct {
	solver   *dissect.Solver
	matrix   dissect.Matrix
	factored bool
	rate     []float64
}

func (st *Stepper) makeSteady() *steady {
	if st.steady == nil {
		n := st.op.nx * st.op.nz
		a := make([]float64, 6*n)
		cut := func(j int) []float64 { return a[j*n : (j+1)*n : (j+1)*n] }
		st.steady = &steady{
			solver: dissect.New(st.op.nx, st.op.nz, st.op.ring),
			matrix: dissect.Matrix{Centre: cut(0), South: cut(1), West: cut(2), East: cut(3), North: cut(4)},
			rate:   cut(5),
		}
	}
	return st.steady
}

// Factor eliminates the linear operator
//
//	A(v) T = C v·∇T − ∇·(k ∇T),   homogeneous walls,
//
// under the flow, nil at rest, with Central advection whatever the settings,
// by nested dissection: of the order of N^1.5 operations and N log N numbers for
// N cells. The factors serve [Stepper.SolveTo] until the next Factor or Steady.
// It fails with [ErrSingular] if no wall determines the temperature.
func (st *Stepper) Factor(flow *staggered.Flow) error { return st.FactorShifted(flow, 0) }

// FactorShifted is Factor for the operator C·shift + A(v); shift = 1/dt makes it
// that of an implicit Euler step.
func (st *Stepper) FactorShifted(flow *staggered.Flow, shift float64) error {
	if err := checkFlow(st.op.g, flow); err != nil {
		return err
	}
	if !(shift >= 0 && shift <= math.MaxFloat64) {
		return fmt.Errorf("heat: shift is %v, want finite and >= 0", shift)
	}
	if flow != nil {
		if rate, _ := st.op.courantRate(flow.VX, flow.VZ); !(rate <= math.MaxFloat64) {
			return fmt.Errorf("heat: flow: %w", ErrNotFinite)
		}
	}
	if shift == 0 && !st.op.determined(flow) {
		return fmt.Errorf("heat: walls %v: %w", st.walls, ErrSingular)
	}
	sd := st.makeSteady()
	sd.factored = false
	st.op.matrixTo(&sd.matrix, flow)
	if shift > 0 {
		st.op.shift(sd.matrix.Centre, shift)
	}
	if err := sd.solver.Factor(sd.matrix, st.set.Workers); err != nil {
		if errors.Is(err, dissect.ErrSingular) {
			return fmt.Errorf("heat: walls %v: %w", st.walls, ErrSingular)
		}
		return err
	}
	sd.factored = true
	return nil
}

// determined reports whether something fixes the level of the temperature: a
// wall or inflow of a given temperature.
func (op *operator) determined(flow *staggered.Flow) bool {
	return op.temperatureAt
}

// shift adds C·rate to the diagonal.
func (op *operator) shift(diagonal []float64, rate float64) {
	for k, dz := range op.dz {
		for i, dx := range op.dx {
			c := k*op.nx + i
			diagonal[c] += rate * op.cellCapacity(c) * dx * dz
		}
	}
}

// SolveTo solves A(v)·dst = rhs with the factors of the last Factor; rhs is heat
// per volume and time, as from RateTo, and dst may be rhs. Under Central
// advection T + A⁻¹·RateTo(T) is the steady temperature, whatever T is. It
// allocates nothing.
func (st *Stepper) SolveTo(dst, rhs *staggered.Scalar) error {
	if st.steady == nil || !st.steady.factored {
		return errors.New("heat: SolveTo has no factors, want Factor called first")
	}
	if err := checkScalar(st.op.g, "dst", dst); err != nil {
		return err
	}
	if err := checkScalar(st.op.g, "rhs", rhs); err != nil {
		return err
	}
	st.solve(dst.Values, rhs.Values)
	return nil
}

func (st *Stepper) solve(dst, rhs []float64) {
	op := st.op
	for k, dz := range op.dz {
		for i, dx := range op.dx {
			c := k*op.nx + i
			dst[c] = rhs[c] * (dx * dz / op.capacity)
		}
	}
	st.steady.solver.SolveTo(dst, dst)
}

// Steady replaces temperature, the start guess, by the steady state under the
// flow, nil at rest. The report holds its heat budget. It factors the operator
// with [Stepper.Factor]; Bounded advection, which is not linear, is reached by
// iteration. On [ErrNotConverged] temperature holds the best answer.
func (st *Stepper) Steady(ctx context.Context, temperature *staggered.Scalar, flow *staggered.Flow) (Report, error) {
	if err := ctx.Err(); err != nil {
		return Report{}, err
	}
	if err := st.check(temperature, flow); err != nil {
		return Report{}, err
	}
	if err := st.Factor(flow); err != nil {
		return Report{}, err
	}
	return st.correct(ctx, temperature, flow)
}

// correct repeats T += A⁻¹·rate(T) until the corrections are small.
func (st *Stepper) correct(ctx context.Context, temperature *staggered.Scalar, flow *staggered.Flow) (Report, error) {
	sd, t := st.steady, temperature.Values
	var rep Report
	for it := 1; ; it++ {
		before := rep.Residual
		rep = Report{Residual: before, Iterations: it - 1}
		if err := st.rate(sd.rate, t, flow, st.set.Advection, &rep); err != nil {
			return Report{}, st.blame(err, temperature, flow)
		}
		if it > 1 && rep.Residual <= st.set.Tolerance {
			return rep, nil
		}
		if it > st.set.MaxIterations {
			return rep, &ConvergenceError{Iterations: rep.Iterations, Residual: rep.Residual, Tolerance: st.set.Tolerance}
		}
		if err := ctx.Err(); err != nil {
			return rep, err
		}
		st.solve(sd.rate, sd.rate)
		var change, size float64
		for c, d := range sd.rate {
			t[c] += d
			change, size = math.Max(change, math.Abs(d)), math.Max(size, math.Abs(t[c]))
		}
		rep.Residual = 0
		if change > 0 {
			rep.Residual = change / size
		}
	}
}
