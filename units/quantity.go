package units

import (
	"fmt"
	"math"

	"gonum.org/v1/gonum/unit"
)

// Quantity is a number of SI units whose type knows its dimension. A type of
// your own takes part in [Parse] and [Format] as soon as it has this method.
type Quantity interface {
	~float64
	Dimension() Dimension
}

// finite refuses NaN and infinities.
func finite[Q Quantity](q Q) error {
	if x := float64(q); math.IsNaN(x) || math.IsInf(x, 0) {
		return fmt.Errorf("units: %w: %T of %v, want a finite number", ErrRange, q, x)
	}
	return nil
}

// gonum returns the quantity as a value of gonum's algebra, whose exponents are
// whole numbers; so are those of all quantities here.
func gonum[Q Quantity](q Q) *unit.Unit {
	d := q.Dimension()
	return unit.New(float64(q), unit.Dimensions{
		unit.LengthDim:            int(d.Length),
		unit.MassDim:              int(d.Mass),
		unit.TimeDim:              int(d.Time),
		unit.TemperatureDim:       int(d.Temperature),
		unit.MoleDim:              int(d.Amount),
		unit.CurrentDim:           int(d.Current),
		unit.LuminousIntensityDim: int(d.LuminousIntensity),
	})
}
