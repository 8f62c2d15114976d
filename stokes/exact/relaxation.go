package exact

import (
	"fmt"
	"math"

	"example.org/overturn/stokes/exact/internal/laminate"
)

// Relaxation is the decay of a surface topography Amplitude·cos(KX x) under
// its own weight, with an amplitude that is small against the wavelength.
// Topography decays as exp(−Rate·t), and the flow with it; Solve returns the
// flow at the moment when the topography has its Amplitude.
//
// For a half-space of viscosity η the rate is Weight/(2ηKX) (Haskell 1935, from
// memory). With a layer of thickness h on a base, and y = KX h, that is to be
// multiplied by
//
//	(sinh y cosh y − y) / (cosh² y + y²)   on a base of no slip,
//	sinh² y / (sinh y cosh y + y)          on a base of free slip.
//
// The surface is the top of the topmost layer. The weight acts there on the
// undeformed surface, as a stress −Weight·Amplitude across it, and the shear
// stress is zero. The pressure has zero mean over a wavelength.
type Relaxation struct {
	KX        float64 // wavenumber, > 0
	Layers    []Layer // from the bottom up, without loads; the lowest may be infinitely thick
	Bottom    Wall    // FreeSlip or NoSlip; not used by an infinite layer
	Weight    float64 // difference of density across the surface times gravity, > 0
	Amplitude float64 // of the topography, not 0; Rate does not depend on it
}

// Rate returns the rate of decay, in one over time.
func (p Relaxation) Rate() (float64, error) {
	p.Amplitude = 1
	f, surface, err := p.solve()
	if err != nil {
		return 0, err
	}
	return -f.At(surface).W, nil
}

// Solve returns the flow.
func (p Relaxation) Solve() (Solution, error) {
	f, _, err := p.solve()
	if err != nil {
		return nil, err
	}
	return &layered{f, p.KX}, nil
}

func (p Relaxation) solve() (f *laminate.Flow, surface float64, err error) {
	const name = "Relaxation"
	c := check{problem: name}
	c.positive("Weight", p.Weight)
	c.notZero("Amplitude", p.Amplitude)
	for i, l := range p.Layers {
		c.unloaded(fmt.Sprintf("Layers[%d].", i), l)
		if !math.IsInf(l.Thickness, 1) {
			surface += l.Thickness
		} else {
			c.require(i == 0, fmt.Sprintf("Layers[%d].Thickness", i), l.Thickness, "> 0 and finite: the surface lies above it")
		}
	}
	if c.err != nil {
		return nil, 0, c.err
	}
	layers := append([]Layer(nil), p.Layers...)
	if len(layers) > 0 {
		layers[len(layers)-1].Sheet = -p.Weight * p.Amplitude
	}
	f, err = Layers{KX: p.KX, Layers: layers, Bottom: p.Bottom}.solve(name, laminate.Open)
	return f, surface, err
}

// unloaded checks a layer that must not have loads of its own.
func (c *check) unloaded(name string, l Layer) {
	c.require(l.Force == Profile{}, name+"Force", l.Force, "none")
	c.require(l.Sheet == 0, name+"Sheet", l.Sheet, "0")
}
