package rheology

import (
	"errors"
	"fmt"
	"math"
)

// A Law gives the viscosity of a row of cells.
type Law interface {
	// ViscosityTo fills dst with the viscosities of cells that all lie at one
	// depth below the top of the layer and have the given temperatures. The
	// slices have the same length and may be the same slice. Each viscosity
	// depends on its own temperature and the depth only, and is positive.
	ViscosityTo(dst, temperature []float64, depth float64)
}

// A Validator can say what is wrong with its own fields. Every law of this
// package is one.
type Validator interface {
	// Validate returns an error that names the first field that makes no
	// sense, its value and what is allowed.
	Validate() error
}

// ErrNoLaw reports a nil [Law].
var ErrNoLaw = errors.New("rheology: law is nil")

// Check returns the error of the law's own Validate method if it has one, and
// [ErrNoLaw] if there is no law.
func Check(law Law) error {
	if law == nil {
		return ErrNoLaw
	}
	if v, ok := law.(Validator); ok {
		return v.Validate()
	}
	return nil
}

// Constant is the viscosity of a layer that has only one.
type Constant float64

// ViscosityTo implements [Law]. It does not look at the temperature.
func (c Constant) ViscosityTo(dst, _ []float64, _ float64) {
	fill(dst, float64(c))
}

// Validate reports a viscosity that is not positive and finite.
func (c Constant) Validate() error { return positive("Constant", float64(c)) }

// Profile is a viscosity that depends on depth only. The function is called
// once a row.
type Profile func(depth float64) float64

// ViscosityTo implements [Law]. It does not look at the temperature.
func (p Profile) ViscosityTo(dst, _ []float64, depth float64) {
	fill(dst, p(depth))
}

// Validate reports a missing function.
func (p Profile) Validate() error {
	if p == nil {
		return errors.New("rheology: Profile is nil, want a function of depth")
	}
	return nil
}

// Func makes a [Law] of a function of temperature and depth. It is called once
// a cell, which costs little beside an exponential.
type Func func(temperature, depth float64) float64

// ViscosityTo implements [Law].
func (f Func) ViscosityTo(dst, temperature []float64, depth float64) {
	temperature = temperature[:len(dst)]
	for i, t := range temperature {
		dst[i] = f(t, depth)
	}
}

// Validate reports a missing function.
func (f Func) Validate() error {
	if f == nil {
		return errors.New("rheology: Func is nil, want a function of temperature and depth")
	}
	return nil
}

// Steps returns a function of depth that is piecewise constant, for a [Profile]
// or for the factor of a [Scaled] law: values[0] down to the first of the
// depths, values[j] from depths[j-1] on. There is one value more than depths.
func Steps(depths, values []float64) (func(depth float64) float64, error) {
	if len(values) != len(depths)+1 {
		return nil, fmt.Errorf("rheology: %d values for %d depths, want one value more than depths", len(values), len(depths))
	}
	for j, d := range depths {
		if !finite(d) || j > 0 && d <= depths[j-1] {
			return nil, fmt.Errorf("rheology: depth %d is %g, want finite and above the one before", j, d)
		}
	}
	for j, v := range values {
		if !finite(v) || v <= 0 {
			return nil, fmt.Errorf("rheology: value %d is %g, want finite and > 0", j, v)
		}
	}
	depths, values = append([]float64(nil), depths...), append([]float64(nil), values...)
	return func(depth float64) float64 {
		j := 0
		for j < len(depths) && depth >= depths[j] {
			j++
		}
		return values[j]
	}, nil
}

func fill(dst []float64, v float64) {
	for i := range dst {
		dst[i] = v
	}
}

func finite(v float64) bool { return !math.IsNaN(v) && !math.IsInf(v, 0) }
