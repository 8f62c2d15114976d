package trial

import (
	"errors"
	"fmt"
	"math"
)

// A Field is a quantity as a solver found it. Make one with [Lattice],
// [Points], [Function] or, along a wall, [Profile]; slices are not copied. The
// zero Field says that the solver does not give the quantity.
type Field struct {
	kind         kind
	x, z, values []float64
	f            func(x, z float64) float64
}

type kind int

const (
	missing kind = iota
	lattice
	points
	function
	profile
)

// Lattice is a field given where the lines x and z cross, both strictly
// increasing: Values[k*len(x)+i] belongs to (x[i], z[k]). A point stands for the
// part of the box that is nearest to it.
func Lattice(x, z, values []float64) Field {
	return Field{kind: lattice, x: x, z: z, values: values}
}

// Points is a field given at any points (x[i], z[i]), which all count the same.
func Points(x, z, values []float64) Field {
	return Field{kind: points, x: x, z: z, values: values}
}

// Function is a field that can be evaluated anywhere in the box. It is looked
// at in the middles of the cells.
func Function(f func(x, z float64) float64) Field { return Field{kind: function, f: f} }

// Profile is a quantity along a wall, given at the strictly increasing
// coordinates s along it: x on bottom and top, z on left and right.
func Profile(s, values []float64) Field { return Field{kind: profile, x: s, values: values} }

// IsMissing reports whether the solver did not give the field.
func (f Field) IsMissing() bool { return f.kind == missing }

// OnLattice reports whether the field is a lattice of the coordinates.
func (f Field) OnLattice(x, z []float64) bool {
	return f.kind == lattice && same(f.x, x) && same(f.z, z)
}

// same reports whether coordinates agree to rounding.
func same(a, b []float64) bool {
	if len(a) != len(b) || len(a) == 0 {
		return false
	}
	tolerance := nearness * math.Abs(b[len(b)-1]-b[0])
	for i := range a {
		if !(math.Abs(a[i]-b[i]) <= tolerance) {
			return false
		}
	}
	return true
}

// nearness is the share of the box within which points count as one.
const nearness = 1e-9

// Samples are numbers at points with shares in the box, which add up to one.
type Samples struct{ X, Z, Weight, Value []float64 }

// Sample returns the field at its points. It fails where the numbers of
// coordinates and values disagree, a point is outside the box or a value is not
// finite.
func (f Field) Sample(g Grid) (Samples, error) {
	width, height := g.Size()
	switch f.kind {
	case missing:
		return Samples{}, errors.New("not given")
	case points:
		if len(f.x) != len(f.values) || len(f.z) != len(f.values) || len(f.values) == 0 {
			return Samples{}, fmt.Errorf("%d values at points with %d x and %d z, want as many of each", len(f.values), len(f.x), len(f.z))
		}
		weight := make([]float64, len(f.values))
		for i := range weight {
			weight[i] = 1 / float64(len(weight))
		}
		return Samples{f.x, f.z, weight, f.values}.checked(width, height)
	case function:
		x, z := g.XCentres(), g.ZCentres()
		return cross(x, z, spans(g.X), spans(g.Z), Tabulate(f.f, x, z)).checked(width, height)
	case profile:
		return Samples{}, errors.New("a profile, want a field in the box")
	}
	wx, err := shares("x", f.x, width)
	if err != nil {
		return Samples{}, err
	}
	wz, err := shares("z", f.z, height)
	if err != nil {
		return Samples{}, err
	}
	if len(f.values) != len(f.x)*len(f.z) {
		return Samples{}, fmt.Errorf("%d values on a lattice of %d by %d, want %d", len(f.values), len(f.x), len(f.z), len(f.x)*len(f.z))
	}
	return cross(f.x, f.z, wx, wz, f.values).checked(width, height)
}

// SampleWall returns a profile at its points, whose coordinates along the wall
// of the given length are X. It fails as Sample does.
func (f Field) SampleWall(length float64) (Samples, error) {
	if f.kind != profile {
		return Samples{}, errors.New("a field in the box, want a profile")
	}
	weight, err := shares("s", f.x, length)
	if err != nil {
		return Samples{}, err
	}
	if len(f.values) != len(f.x) {
		return Samples{}, fmt.Errorf("%d values at %d coordinates, want as many of each", len(f.values), len(f.x))
	}
	return Samples{f.x, make([]float64, len(f.x)), weight, f.values}.checked(length, 0)
}

// cross spreads the lattice of two axes and their weights out.
func cross(x, z, wx, wz, values []float64) Samples {
	s := Samples{Value: values}
	for k := range z {
		for i := range x {
			s.X, s.Z = append(s.X, x[i]), append(s.Z, z[k])
			s.Weight = append(s.Weight, wx[i]*wz[k])
		}
	}
	return s
}

func (s Samples) checked(width, height float64) (Samples, error) {
	slack := nearness * (width + height)
	for i, v := range s.Value {
		x, z := s.X[i], s.Z[i]
		if !(x >= -slack && x <= width+slack && z >= -slack && z <= height+slack) {
			return Samples{}, fmt.Errorf("a point at (%g, %g), want it in the box of %g by %g", x, z, width, height)
		}
		if math.IsNaN(v) || math.IsInf(v, 0) {
			return Samples{}, fmt.Errorf("%g at (%g, %g), want a finite number", v, x, z)
		}
	}
	return s, nil
}

// spans returns the widths of cells as shares of the whole.
func spans(edges []float64) []float64 {
	w := make([]float64, len(edges)-1)
	for i := range w {
		w[i] = (edges[i+1] - edges[i]) / (edges[len(w)] - edges[0])
	}
	return w
}

// shares returns which part of the span from 0 to length is nearest to each
// coordinate.
func shares(name string, s []float64, length float64) ([]float64, error) {
	if len(s) == 0 {
		return nil, fmt.Errorf("no coordinate %s, want one at least", name)
	}
	borders := []float64{0}
	for i := range s[1:] {
		if !(s[i+1] > s[i]) {
			return nil, fmt.Errorf("coordinate %s goes from %g to %g, want it to increase", name, s[i], s[i+1])
		}
		borders = append(borders, 0.5*(s[i]+s[i+1]))
	}
	return spans(append(borders, length)), nil
}
