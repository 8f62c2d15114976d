package laminate

import "math"

// A Profile is a load as a function of the position across the layers:
// Mean + Sine·sin(ms) + Cosine·cos(ms) with m the wavenumber.
type Profile struct{ Mean, Sine, Cosine, Wavenumber float64 }

// At returns the load at a position.
func (p Profile) At(s float64) float64 {
	if p.Sine == 0 && p.Cosine == 0 {
		return p.Mean
	}
	sin, cos := math.Sincos(p.Wavenumber * s)
	return p.Mean + p.Sine*sin + p.Cosine*cos
}

// wave returns the complex amplitude of the harmonic part if positions are
// counted from an origin: the real part of it times e^{im(s−origin)} is the load.
func (p Profile) wave(origin float64) complex128 {
	sin, cos := math.Sincos(p.Wavenumber * origin)
	return complex(p.Cosine, -p.Sine) * complex(cos, sin)
}

// A Layer lies between two planes.
type Layer struct {
	Thickness float64 // infinite only in the first or the last layer
	Viscosity float64 // at the lower face
	Growth    float64 // 2B: the viscosity is Viscosity·e^{2B·height}; 0 in infinite layers

	Across, Along Profile // force per volume

	// Force per area on the upper face of the layer.
	SheetAcross, SheetAlong float64
}

// An End says what holds at the lower or upper end of the stack.
type End int

// The kinds of ends. An infinite layer has none.
const (
	Slip  End = iota // no velocity across, no shear stress
	Stick            // no velocity
	Open             // no traction
)

// A Problem is a stack of layers, from low to high s. Position zero is the
// lower face of the lowest finite layer, or the upper face of the lowest
// layer if that is infinite. The caller has checked the numbers.
type Problem struct {
	K         float64 // wavenumber along the layers
	Layers    []Layer
	Low, High End
}
