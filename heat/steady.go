package heat

import (
	"context"
	"errors"
	"fmt"
	"math"

	"example.org/overturn/heat/internal/anderson"
	"example.org/overturn/heat/internal/dissect"
	"example.org/overturn/stokes/staggered"
	"gonum.org/v1/gonum/floats"
)

const (
	// mixedIterates is how many iterates Steady combines under Bounded
	// advection.
	mixedIterates = 8

	// upwindShare is that of the operator with which it corrects them: between
	// central differences, which are too soft for a limited flux, and upwind
	// ones, which are too stiff, it takes the fewest iterations.
	upwindShare = 0.5
)

// steady is what the steady solves need beyond a step.
type steady struct {
	solver   *dissect.Solver
	matrix   dissect.Matrix
	factored bool // for SolveTo
	rate     []float64
	mixer    *anderson.Mixer // nil under Central
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
		if st.set.Advection == Bounded {
			st.steady.mixer = anderson.NewMixer(n, mixedIterates)
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
	if err := st.factor(flow, shift, 0); err != nil {
		return err
	}
	st.steady.factored = true
	return nil
}

// factor eliminates the shifted operator with a share of upwind differences.
func (st *Stepper) factor(flow *staggered.Flow, shift, upwind float64) error {
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
	if shift == 0 && !st.op.determined() {
		return fmt.Errorf("heat: walls %v: %w", st.walls, ErrSingular)
	}
	sd := st.makeSteady()
	sd.factored = false
	st.op.matrixTo(&sd.matrix, flow, upwind)
	if shift > 0 {
		st.op.shift(sd.matrix.Centre, shift)
	}
	if err := sd.solver.Factor(sd.matrix, st.set.Workers); err != nil {
		if errors.Is(err, dissect.ErrSingular) {
			return fmt.Errorf("heat: walls %v: %w", st.walls, ErrSingular)
		}
		return err
	}
	return nil
}

// determined reports whether something fixes the level of the temperature: a
// wall or inflow of a given temperature.
func (op *operator) determined() bool {
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
// flow, nil at rest. The report holds its heat budget.
//
// Under Central advection it is a direct solve and one refinement, after which
// the factors serve SolveTo. Bounded advection, which is not linear, takes some
// ten to some hundred corrections by the operator with a mixture of central and
// upwind differences, accelerated by Anderson mixing (Walker & Ni 2011). On
// [ErrNotConverged] temperature holds the last answer and the report how far it
// came.
func (st *Stepper) Steady(ctx context.Context, temperature *staggered.Scalar, flow *staggered.Flow) (Report, error) {
	if err := ctx.Err(); err != nil {
		return Report{}, err
	}
	if err := st.check(temperature, flow); err != nil {
		return Report{}, err
	}
	var err error
	if st.set.Advection == Bounded && flow != nil {
		err = st.factor(flow, 0, upwindShare)
	} else {
		err = st.Factor(flow)
	}
	if err != nil {
		return Report{}, err
	}
	return st.correct(ctx, temperature, flow)
}

// correct repeats T += A⁻¹·rate(T) until the corrections are small.
func (st *Stepper) correct(ctx context.Context, temperature *staggered.Scalar, flow *staggered.Flow) (Report, error) {
	sd, t := st.steady, temperature.Values
	if sd.mixer != nil {
		sd.mixer.Reset()
	}
	residual := math.Inf(1)
	for it := 0; ; it++ {
		rep := Report{Iterations: it, Residual: residual}
		if err := st.rate(sd.rate, t, flow, st.set.Advection, &rep); err != nil {
			return Report{}, st.blame(err, temperature, flow)
		}
		if residual <= st.set.Tolerance {
			return rep, nil
		}
		if it >= st.set.MaxIterations {
			return rep, &ConvergenceError{Iterations: it, Residual: residual, Tolerance: st.set.Tolerance}
		}
		if err := ctx.Err(); err != nil {
			return rep, err
		}
		st.solve(sd.rate, sd.rate)
		residual = relative(sd.rate, t)
		if sd.mixer != nil && flow != nil && residual > st.set.Tolerance {
			sd.mixer.Next(t, sd.rate)
		} else {
			floats.Add(t, sd.rate)
		}
	}
}

// relative returns the largest correction relative to the largest corrected
// temperature.
func relative(correction, t []float64) float64 {
	var change, size float64
	for c, d := range correction {
		change, size = math.Max(change, math.Abs(d)), math.Max(size, math.Abs(t[c]+d))
	}
	if change == 0 {
		return 0
	}
	return change / size
}
