package exact

import (
	"math"

	"example.org/overturn/stokes/exact/internal/laminate"
)

// RayleighTaylor is the growth of a wave Amplitude·cos(KX x) on the interface
// between two layers, small against wavelength and thicknesses. The wave
// grows as exp(Rate·t), and the flow with it; Solve returns the flow at the
// moment when the wave has its Amplitude.
//
// Between two half-spaces the rate is Weight/(2(η₁+η₂)KX) (Chandrasekhar 1961,
// ch. X, from memory). The displaced interface acts as a sheet that is pushed up
// with Weight·Amplitude per area. z = 0 is the base of the lower layer, or the
// interface if the lower layer is infinitely thick. The pressure has zero mean
// over a wavelength.
type RayleighTaylor struct {
	KX           float64 // wavenumber, > 0
	Lower, Upper Layer   // without loads; either may be infinitely thick
	Bottom, Top  Wall    // FreeSlip or NoSlip; not used by an infinite layer
	Weight       float64 // density above less that below, times gravity; < 0: the wave decays
	Amplitude    float64 // of the wave, not 0; Rate does not depend on it
}

// Rate returns the rate of growth, in one over time.
func (p RayleighTaylor) Rate() (float64, error) {
	p.Amplitude = 1
	f, err := p.solve()
	if err != nil {
		return 0, err
	}
	return f.At(p.Interface()).W, nil
}

// Interface returns the height of the interface.
func (p RayleighTaylor) Interface() float64 {
	if math.IsInf(p.Lower.Thickness, 1) {
		return 0
	}
	return p.Lower.Thickness
}

// Solve returns the flow.
func (p RayleighTaylor) Solve() (Solution, error) {
	f, err := p.solve()
	if err != nil {
		return nil, err
	}
	return &layered{f, p.KX}, nil
}

func (p RayleighTaylor) solve() (*laminate.Flow, error) {
	const name = "RayleighTaylor"
	c := check{problem: name}
	c.notZero("Weight", p.Weight)
	c.notZero("Amplitude", p.Amplitude)
	p.Lower.check(&c, "Lower.", true)
	p.Upper.check(&c, "Upper.", true)
	c.unloaded("Lower.", p.Lower)
	c.unloaded("Upper.", p.Upper)
	if c.err != nil {
		return nil, c.err
	}
	p.Lower.Sheet = p.Weight * p.Amplitude
	layers := Layers{KX: p.KX, Layers: []Layer{p.Lower, p.Upper}, Bottom: p.Bottom, Top: p.Top}
	return layers.solve(name, end(p.Top))
}
