package stability

import (
	"errors"
	"fmt"
)

// An InputError reports a number that a layer or a call cannot have.
type InputError struct {
	Name  string  // what the number is, with its place where it has one
	Value float64 // as given
	Want  string  // what is allowed
}

func (e *InputError) Error() string {
	return fmt.Sprintf("stability: %s is %g, want %s", e.Name, e.Value, e.Want)
}

var (
	// ErrNoOnset reports that no positive value of the number that was looked
	// for makes the layer unstable: its stratification is stable, or what
	// stabilises it always wins. The error that wraps it is a [*NoOnsetError].
	ErrNoOnset = errors.New("no onset")

	// ErrUnstable reports that a layer is unstable without the number that was
	// looked for: something else drives it already. Ask for [Solver.Fastest].
	ErrUnstable = errors.New("unstable at zero")

	// ErrStable reports that no disturbance grows, so that there is no
	// fastest-growing one. Compare the Rayleigh number with [Solver.Critical].
	ErrStable = errors.New("every disturbance decays")

	// ErrNotConverged reports that the finest discretisation allowed does not
	// meet the tolerance. The answer that comes with it is the best one, and its
	// error estimate tells how good. A profile with a kink or a jump that is not
	// listed among its breaks is the usual cause; else raise
	// [Settings.MaxUnknowns] or [Settings.Tolerance].
	ErrNotConverged = errors.New("not converged")

	// ErrNoTheory reports that a quantity is not defined, or not implemented,
	// for a layer of this kind.
	ErrNoTheory = errors.New("no theory for this layer")
)

// A NoOnsetError says where an onset was looked for in vain.
type NoOnsetError struct {
	Number     Number     // that was looked for
	Wavenumber [2]float64 // interval that was searched
	Largest    float64    // value of the number up to which oscillations were looked for
}

func (e *NoOnsetError) Error() string {
	return fmt.Sprintf("stability: %v: no positive %v number is critical for wavenumbers from %.3g to %.3g",
		ErrNoOnset, e.Number, e.Wavenumber[0], e.Wavenumber[1])
}

// Unwrap returns [ErrNoOnset].
func (e *NoOnsetError) Unwrap() error { return ErrNoOnset }
