package laminate

import (
	"math"
	"sort"
)

// A Flow is the solution of a [Problem]. It does not change and may be shared.
type Flow struct {
	k      float64
	faces  []float64 // positions of the interfaces between layers
	layers []layer
}

// A layer holds the solution between two faces.
type layer struct {
	origin    float64 // of its dimensionless positions s = k(position − origin)
	low, high float64 // positions s of the faces; zero if at infinity
	eta       float64 // viscosity at the origin
	b         float64 // B/k
	across    Profile
	along     Profile
	fields    sum
}

// A State holds the amplitudes at one position.
type State struct {
	W, U      float64 // velocities across and along the layers
	P         float64 // pressure
	Stretch   float64 // kU: the strain rate along the layers, and minus that across
	Shear     float64 // U′ − kW: twice the shear strain rate
	Viscosity float64
}

// At returns the amplitudes at a position. On an interface they are those of
// the upper layer; beyond the ends the nearest layer goes on.
func (f *Flow) At(position float64) State {
	l := f.layer(position)
	s := f.k * (position - l.origin)
	return l.fields.at(s).state(f.k, l.viscosity(s))
}

// Viscosity returns the viscosity at a position.
func (f *Flow) Viscosity(position float64) float64 {
	l := f.layer(position)
	return l.viscosity(f.k * (position - l.origin))
}

// Force returns the amplitudes of the force per volume at a position.
func (f *Flow) Force(position float64) (across, along float64) {
	l := f.layer(position)
	return l.across.At(position), l.along.At(position)
}

func (f *Flow) layer(position float64) *layer {
	return &f.layers[sort.Search(len(f.faces), func(i int) bool { return position < f.faces[i] })]
}

func (l *layer) viscosity(s float64) float64 {
	if l.b == 0 {
		return l.eta
	}
	return l.eta * math.Exp(2*l.b*s)
}
