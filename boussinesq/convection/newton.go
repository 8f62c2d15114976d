package convection

import (
	"context"
	"errors"
	"fmt"
	"math"

	"gonum.org/v1/gonum/floats"

	"example.org/overturn/boussinesq/convection/internal/gmres"
	"example.org/overturn/stokes"
	"example.org/overturn/stokes/staggered"
)

// A newton solves R(T, v(T)) = 0, where R is the rate of change of heat per
// volume and v(T) the Stokes flow that goes with T.
//
// R is linear in T for a given flow, R = source − A(v) T, and linear in the flow
// for a given T. The linearised system for the correction d is
//
//	A(v) d + B v′ = R,   B u = R(T, 0) − R(T, u),
//
// with v′ the change of the flow: the Stokes flow at fixed viscosity under the
// buoyancy of d and the stress that d causes by changing the viscosity. With
// d = A⁻¹y it becomes y + B v′(A⁻¹y) = R, the identity plus a smoothing
// operator, on which GMRES needs a number of steps that does not depend on the
// grid.
type newton struct {
	sys      *system
	settings SteadySettings
	linear   *stokes.Solver // for v′: walls at rest, a loose tolerance
	krylov   *gmres.Solver

	temperature *staggered.Scalar
	flow        *staggered.Flow
	rate        *staggered.Scalar // R at temperature

	resting  *staggered.Scalar // R(T, 0)
	response *staggered.Flow   // v′
	stress   *stressResponse   // nil where the viscosity does not depend on T

	step, y, trial *staggered.Scalar
	before         *staggered.Scalar // R at temperature while a trial is made
	trialFlow      *staggered.Flow
}

// Tolerances inside a Newton step: it gains a factor of a hundred, so that the
// products need not be better than a tenth of a per cent of that.
const (
	forcing         = 1e-2
	linearTolerance = 1e-5
)

func newNewton(sys *system, s SteadySettings) (*newton, error) {
	inner := *s.Stokes
	inner.Tolerance = linearTolerance
	inner.Monitor = nil
	linear, err := stokes.NewSolver(sys.Grid, sys.Walls.AtRest(), &inner)
	if err != nil {
		return nil, fmt.Errorf("convection: %w", err)
	}
	g := sys.Grid
	n := &newton{
		sys: sys, settings: s, linear: linear,
		krylov:   gmres.New(g.NX()*g.NZ(), s.MaxDirections),
		rate:     staggered.NewScalar(g),
		resting:  staggered.NewScalar(g),
		response: staggered.NewFlow(g),
		step:     staggered.NewScalar(g),
		y:        staggered.NewScalar(g),
		trial:    staggered.NewScalar(g),
		before:   staggered.NewScalar(g),

		flow:      staggered.NewFlow(g),
		trialFlow: staggered.NewFlow(g),
	}
	if sys.Viscosity != nil {
		n.stress = newStressResponse(sys)
	}
	return n, nil
}

// Limits of the implicit steps in time, as root-mean-square changes of the
// temperature in ranges: one that would change it by more than tooLarge is
// repeated shorter, and the next one aims at aim.
const (
	aim      = 0.04
	tooLarge = 0.15
	// firstChange is that of the first step, so small that the step is shorter
	// than what grows takes to grow.
	firstChange = 1e-3
	// longest is the step that is as good as infinite, in diffusion times of
	// the layer.
	longest = 10
	// maxDetours is how often Newton's method may hand back to steps in time.
	maxDetours = 3
)

// solve improves a temperature in place, by implicit steps in time first if
// the guess is far from steady.
func (n *newton) solve(ctx context.Context, temperature *staggered.Scalar, far bool) (*Solution, error) {
	n.temperature = temperature
	sol := &Solution{Temperature: temperature, Flow: n.flow}
	if err := n.evaluate(ctx, temperature, n.flow); err != nil {
		return nil, err
	}
	sol.Residual = n.residual(n.rate)
	shift := 0.0
	if far {
		shift = n.firstShift(sol.Residual)
	}
	var failure error
	detours := 0
	for sol.Residual > n.settings.Tolerance {
		if sol.Newton >= n.settings.MaxNewton {
			failure = fmt.Errorf("convection: %w after %d Newton steps: residual %.1e, tolerance %.1e",
				ErrNotSteady, sol.Newton, sol.Residual, n.settings.Tolerance)
			break
		}
		var products int
		var err error
		if shift > 0 {
			products, shift, err = n.implicitStep(ctx, shift)
		} else if products, err = n.improve(ctx, sol.Residual); errors.Is(err, ErrNotSteady) && detours < maxDetours {
			// The state is further off than it seemed: back to steps in time.
			shift, err = n.firstShift(sol.Residual), nil
			detours++
		}
		if err != nil {
			failure = err
			break
		}
		sol.Newton++
		sol.Krylov += products
		sol.Residual = n.residual(n.rate)
		if n.settings.Monitor != nil {
			n.settings.Monitor(SteadyProgress{Grid: n.sys.Grid, Newton: sol.Newton, Krylov: products, Residual: sol.Residual})
		}
	}
	var err error
	sol.Diagnostics, err = newSampler(n.sys).diagnose(temperature, n.flow)
	return sol, errors.Join(failure, err)
}

// implicitStep takes one linearly implicit Euler step over 1/shift and returns
// the shift for the next, zero when Newton's method can take over.
func (n *newton) implicitStep(ctx context.Context, shift float64) (products int, next float64, err error) {
	for range 20 {
		count, err := n.correction(ctx, shift, 5*forcing)
		products += count
		if err != nil {
			return products, shift, err
		}
		size := n.step.RMS() / n.extent()
		if size <= tooLarge {
			before := n.flow.RMS()
			accepted, err := n.try(ctx, 1, math.Inf(1))
			if err != nil {
				return products, shift, err
			}
			if accepted {
				return products, n.nextShift(shift, size, before), nil
			}
		}
		shift *= 4
	}
	return products, shift, fmt.Errorf("convection: %w: implicit steps became too short", ErrNotSteady)
}

// firstShift chooses the first step.
func (n *newton) firstShift(residual float64) float64 {
	return max(n.sys.fastest(), residual*n.sys.rate()/firstChange)
}

// nextShift chooses the step after one over 1/shift that changed the temperature
// by size and the speed from before to what it is now. A mode that grows at the
// rate σ is multiplied by 1/(1−σ/shift): a step longer than 1/σ would turn its
// sign and lead back to the state that is being left.
func (n *newton) nextShift(shift, size, before float64) float64 {
	next := shift * min(4, max(0.4, size/aim))
	if now := n.flow.RMS(); now > before {
		growth := shift * (1 - before/now)
		next = max(next, 2*growth)
	}
	if next*longest < n.sys.rate() {
		return 0
	}
	return next
}

// growth estimates how fast the flow of a temperature changes it, per diffusion
// time of the layer: the rate that advection adds over the departure from the
// horizontal mean. Zero where nothing flows.
func (n *newton) growth(ctx context.Context, t *staggered.Scalar) (float64, error) {
	n.temperature = t
	if err := n.evaluate(ctx, t, n.flow); err != nil {
		return 0, err
	}
	if err := n.sys.heat.RateTo(n.resting, t, nil); err != nil {
		return 0, fmt.Errorf("convection: %w", err)
	}
	floats.SubTo(n.trial.Values, n.rate.Values, n.resting.Values)
	added := n.trial.RMS()
	means := t.HorizontalMeans(nil)
	for k, mean := range means {
		row, departure := t.Row(k), n.trial.Row(k)
		for i, v := range row {
			departure[i] = v - mean
		}
	}
	size := n.trial.RMS()
	if added == 0 || size == 0 {
		return 0, nil
	}
	return added / (n.sys.HeatCapacity * size * n.sys.rate()), nil
}

// evaluate solves for the flow of a temperature and stores R in n.rate.
func (n *newton) evaluate(ctx context.Context, t *staggered.Scalar, flow *staggered.Flow) error {
	if _, err := n.sys.solveFlow(ctx, t, flow); err != nil {
		return err
	}
	if err := n.sys.heat.RateTo(n.rate, t, flow); err != nil {
		return fmt.Errorf("convection: %w", err)
	}
	return nil
}

// residual is the root mean square of a rate in temperature ranges per
// diffusion time.
func (n *newton) residual(rate *staggered.Scalar) float64 {
	return rate.RMS() / (n.sys.HeatCapacity * n.extent() * n.sys.rate())
}

// extent is the range of the temperature, 1 where it is uniform.
func (n *newton) extent() float64 {
	if e := extent(n.temperature); e > 0 {
		return e
	}
	return 1
}

// improve takes one Newton step, shortened where the residual would not fall,
// and returns the number of products it cost.
func (n *newton) improve(ctx context.Context, residual float64) (int, error) {
	products, err := n.correction(ctx, 0, forcing)
	if err != nil {
		return products, err
	}
	for share := 1.0; share > 1e-3; share /= 2 {
		if accepted, err := n.try(ctx, share, (1-0.1*share)*residual); accepted || err != nil {
			return products, err
		}
	}
	return products, fmt.Errorf("convection: %w: no Newton step lowers the residual %.1e", ErrNotSteady, residual)
}

// correction stores in n.step the solution of the linearised system with C·shift
// added to A.
func (n *newton) correction(ctx context.Context, shift, tolerance float64) (int, error) {
	if err := n.linearise(shift); err != nil {
		return 0, fmt.Errorf("convection: %w", err)
	}
	product := func(dst, y []float64) error { return n.product(ctx, dst, y) }
	products, err := n.krylov.Solve(ctx, n.y.Values, n.rate.Values, product, tolerance)
	if err != nil && !errors.Is(err, gmres.ErrNotConverged) {
		return products, fmt.Errorf("convection: %w", err)
	}
	if err := n.sys.heat.SolveTo(n.step, n.y); err != nil {
		return products, fmt.Errorf("convection: %w", err)
	}
	return products, nil
}

// try moves a share of n.step and keeps the new state if its residual is at
// most bound.
func (n *newton) try(ctx context.Context, share, bound float64) (bool, error) {
	floats.AddScaledTo(n.trial.Values, n.temperature.Values, share, n.step.Values)
	if err := n.trialFlow.CopyFrom(n.flow); err != nil {
		return false, err
	}
	copy(n.before.Values, n.rate.Values)
	if err := n.evaluate(ctx, n.trial, n.trialFlow); err != nil {
		copy(n.rate.Values, n.before.Values)
		// Without a flow the step went too far: temperatures beyond sense.
		return false, ctx.Err()
	}
	if !(n.residual(n.rate) <= bound) {
		copy(n.rate.Values, n.before.Values)
		return false, nil
	}
	copy(n.temperature.Values, n.trial.Values)
	return true, n.flow.CopyFrom(n.trialFlow)
}

// linearise prepares the products at the present temperature and flow.
func (n *newton) linearise(shift float64) error {
	if err := n.sys.heat.RateTo(n.resting, n.temperature, nil); err != nil {
		return err
	}
	if n.stress != nil {
		n.stress.prepare(n.temperature, n.flow)
	}
	n.response.Velocity().SetAll(0, 0)
	n.response.Pressure().SetAll(0)
	return n.sys.heat.FactorShifted(n.flow, shift)
}

// product stores y + B v′(A⁻¹y) in dst.
func (n *newton) product(ctx context.Context, dst, y []float64) error {
	copy(n.step.Values, y)
	if err := n.sys.heat.SolveTo(n.step, n.step); err != nil {
		return err
	}
	if err := n.respond(ctx, n.step); err != nil {
		return err
	}
	if err := n.sys.heat.RateTo(n.trial, n.temperature, n.response); err != nil {
		return err
	}
	for j, v := range y {
		dst[j] = v + n.resting.Values[j] - n.trial.Values[j]
	}
	return nil
}

// respond finds the change of the flow under a change of the temperature.
func (n *newton) respond(ctx context.Context, d *staggered.Scalar) error {
	n.sys.buoyancy.FillVertical(d, n.sys.Rayleigh)
	if n.stress != nil {
		if err := n.stress.addTo(n.sys.buoyancy, d); err != nil {
			return err
		}
	}
	_, err := n.linear.Solve(ctx, n.response, n.viscosity(), n.sys.buoyancy)
	return err
}

// viscosity returns that of the present temperature.
func (n *newton) viscosity() *staggered.Scalar {
	if n.stress == nil {
		return nil
	}
	return n.stress.viscosity
}
