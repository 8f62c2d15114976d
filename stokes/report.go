package stokes

import (
	"errors"
	"fmt"
	"time"
)

// A Report says what one Solve did. It is filled in also when Solve fails to
// converge.
//
// Residuals are measured in two norms and given relative to the residual of the
// fluid at rest, with the walls in motion and the pressure that balances the
// mean weight of each row. The weighted norm
//
//	|r|² = Σ rx²/Dx + rz²/Dz + rp² η/V
//
// adds up three dissipations: r are the residuals of momentum and continuity
// integrated over their control volumes V, D the diagonal of the momentum
// operator. It is the norm in which Solve iterates and stops. The plain norm of
// the momentum residual, |r|² = Σ (rx² + rz²)/V, can be far larger where the
// viscosity varies by orders of magnitude.
type Report struct {
	Method     Method    // Multigrid or Transform
	Iterations int       // cycles, or direct solutions
	Residuals  []float64 // weighted, before the first and after each iteration; valid until the next Solve
	Residual   float64   // weighted, recomputed from the answer
	Momentum   float64   // plain norm of momentum, recomputed from the answer
	Divergence float64   // root mean square of div v minus the source of the answer, in units of 1/time
	Elapsed    time.Duration
}

// String summarises the report in one line.
func (r Report) String() string {
	return fmt.Sprintf("%v: %d iterations, residual %.1e (momentum alone %.1e), %v",
		r.Method, r.Iterations, r.Residual, r.Momentum, r.Elapsed.Round(time.Microsecond))
}

// ErrNotConverged reports that Solve stopped short of the tolerance. The
// error that wraps it is a [*ConvergenceError]. Usual causes, and cures:
//
//   - sharp, unaligned bodies more than 1e6 times stiffer than their
//     surroundings: more MaxIterations and MaxBasis, or a smoother viscosity;
//   - a tolerance below what rounding allows: the history then ends in a
//     plateau near 1e-12.
var ErrNotConverged = errors.New("not converged")

// A ConvergenceError says how far Solve got before it stopped.
type ConvergenceError struct {
	Iterations int
	Residual   float64 // reached, as in Report
	Tolerance  float64 // asked for
}

// Error describes the failure in one line.
func (e *ConvergenceError) Error() string {
	return fmt.Sprintf("stokes: %v after %d iterations: residual %.1e, tolerance %.1e",
		ErrNotConverged, e.Iterations, e.Residual, e.Tolerance)
}

// Unwrap returns [ErrNotConverged].
func (e *ConvergenceError) Unwrap() error { return ErrNotConverged }
