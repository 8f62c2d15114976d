package heat

import (
	"errors"
	"fmt"
)

var (
	// ErrSize reports a field that does not fit the grid of the equation.
	ErrSize = errors.New("wrong size")

	// ErrNotFinite reports a NaN or an infinity in a temperature, a flow or a
	// source. The temperature that the method was given is unchanged.
	ErrNotFinite = errors.New("not finite")

	// ErrUnstable reports a time step too long for the scheme. The error that
	// wraps it is a [*StepError]; take its Stable, split the step, or use the
	// [Implicit] scheme when conduction sets the limit.
	ErrUnstable = errors.New("unstable time step")

	// ErrSingular reports that no steady state is determined: nothing holds
	// the temperature at any wall. Hold one wall at a temperature, or exchange
	// heat through it.
	ErrSingular = errors.New("no unique steady state")

	// ErrNotConverged reports a steady solve that used up its iterations. The
	// error that wraps it is a [*ConvergenceError].
	ErrNotConverged = errors.New("not converged")
)

// StepError says how long a time step may be.
type StepError struct {
	Step   float64 // asked for
	Stable float64 // the longest that is stable
}

func (e *StepError) Error() string {
	return fmt.Sprintf("heat: %v: dt is %g, want <= %g", ErrUnstable, e.Step, e.Stable)
}

// Unwrap returns [ErrUnstable].
func (e *StepError) Unwrap() error { return ErrUnstable }

// ConvergenceError says how far a steady solve got before it stopped.
type ConvergenceError struct {
	Iterations int
	Residual   float64 // reached, see Settings.Tolerance
	Tolerance  float64 // asked for
}

func (e *ConvergenceError) Error() string {
	return fmt.Sprintf("heat: steady state %v after %d iterations: residual %.1e, tolerance %.1e",
		ErrNotConverged, e.Iterations, e.Residual, e.Tolerance)
}

// Unwrap returns [ErrNotConverged].
func (e *ConvergenceError) Unwrap() error { return ErrNotConverged }
