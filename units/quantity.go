package units

import (
	"strconv"

	"gonum.org/v1/gonum/unit"
)

// Quantity is a number of SI units whose type knows its dimension. A type of
// your own takes part in [Parse] and [Format] as soon as it has this method.
type Quantity interface {
	~float64
	Dimension() Dimension
}

func text[Q Quantity](q Q) string {
	s := strconv.FormatFloat(float64(q), 'g', -1, 64)
	if u := q.Dimension().siUnit(); u != "" {
		s += " " + u
	}
	return s
}

func appendText[Q Quantity](b []byte, q Q) ([]byte, error) { return append(b, text(q)...), nil }

// gonum returns the quantity as a value of gonum's algebra.
func gonum[Q Quantity](q Q) *unit.Unit {
	d := q.Dimension()
	dims := unit.Dimensions{}
	for _, e := range []struct {
		of  unit.Dimension
		exp float64
	}{
		{unit.LengthDim, d.Length}, {unit.MassDim, d.Mass}, {unit.TimeDim, d.Time},
		{unit.TemperatureDim, d.Temperature}, {unit.MoleDim, d.Amount},
		{unit.CurrentDim, d.Current}, {unit.LuminousIntensityDim, d.LuminousIntensity},
	} {
		if e.exp != 0 {
			dims[e.of] = int(e.exp)
		}
	}
	return unit.New(float64(q), dims)
}
