package exact

// ExponentialViscosity is a layer 0 ≤ z ≤ Height whose viscosity is
// exponential in height, under the upward force
//
//	b = Force cos(KX x) sin(KZ z)
//
// (the problem class of Revenaugh & Parsons 1987). Vertical planes where
// sin(KX x) = 0 are free-slip walls. The pressure has zero mean over a
// wavelength. Solve fails also with [ErrRounding].
type ExponentialViscosity struct {
	Height              float64 // > 0
	AtBottom, AtTop     float64 // viscosities, > 0
	KX                  float64 // > 0
	KZ                  float64 // > 0
	Force               float64 // not 0
	BottomWall, TopWall Wall    // FreeSlip or NoSlip
}

// Solve returns the flow.
func (p ExponentialViscosity) Solve() (Solution, error) {
	c := check{problem: "ExponentialViscosity"}
	c.positive("Height", p.Height)
	c.positive("AtBottom", p.AtBottom)
	c.ratio("AtTop", p.AtTop, p.AtBottom)
	c.positive("KX", p.KX)
	c.positive("KZ", p.KZ)
	c.notZero("Force", p.Force)
	c.wall("BottomWall", p.BottomWall)
	c.wall("TopWall", p.TopWall)
	if c.err != nil {
		return nil, c.err
	}
	return Layers{
		KX:     p.KX,
		Bottom: p.BottomWall,
		Top:    p.TopWall,
		Layers: []Layer{{
			Thickness: p.Height,
			Viscosity: p.AtBottom,
			Contrast:  p.AtTop / p.AtBottom,
			Force:     Profile{Sine: p.Force, Wavenumber: p.KZ},
		}},
	}.Solve()
}
