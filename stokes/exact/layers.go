package exact

import (
	"fmt"
	"math"

	"example.org/overturn/stokes/exact/internal/laminate"
)

// A Profile is how a force per volume varies across layers or columns:
//
//	Mean + Sine sin(ms) + Cosine cos(ms)
//
// with m the Wavenumber and s the coordinate, z in layers and x in columns.
// The zero value is no force.
type Profile struct {
	Mean, Sine, Cosine float64
	Wavenumber         float64 // ≥ 0, radians per length
}

// A Layer is one of [Layers].
type Layer struct {
	// Thickness is positive. It may be +Inf in the lowest and in the highest
	// layer, whose flow then decays with distance.
	Thickness float64

	// Viscosity is positive; where it varies it is that at the base.
	Viscosity float64

	// Contrast is the viscosity at the top of the layer over that at its base.
	// The viscosity is exponential in between. Zero means one, and an
	// infinite layer has no other.
	Contrast float64

	// Force is the upward force per volume, over cos(KX x).
	Force Profile

	// Sheet is an upward force per area on the upper face of the layer, over
	// cos(KX x): the weight of a thin body, or of a deflected interface. On the
	// topmost face it has no effect, as a wall bears it.
	Sheet float64
}

// Layers are horizontal layers under loads that vary as cos(KX x): the problem
// that propagator matrices solve (Hager & O'Connell 1981, from memory). The
// layers are given from the bottom up. z = 0 is the base of the lowest
// layer, or its top if its thickness is infinite.
//
// The velocity is vx ∝ sin(KX x), vz ∝ cos(KX x). Vertical planes where
// sin(KX x) = 0 are free-slip walls. The pressure has zero mean over a
// wavelength.
//
// Solve fails also with [ErrRounding]. In stacks of up to twenty layers with
// viscosities that differ by factors up to 1e10, much longer or shorter than the
// waves, the estimate of the rounding error stays below 1e-12.
type Layers struct {
	KX          float64 // wavenumber, > 0
	Layers      []Layer // at least one
	Bottom, Top Wall    // FreeSlip or NoSlip; not used by an infinite layer
}

// Solve returns the flow.
func (p Layers) Solve() (Solution, error) {
	f, err := p.solve("Layers", end(p.Top))
	if err != nil {
		return nil, err
	}
	return &layered{f, p.KX}, nil
}

// solve checks the layers on behalf of a problem, which its errors name, and
// finds the amplitudes.
func (p Layers) solve(problem string, high laminate.End) (*laminate.Flow, error) {
	c := check{problem: problem}
	c.positive("KX", p.KX)
	c.require(len(p.Layers) > 0, "Layers", p.Layers, "one layer or more")
	c.wall("Bottom", p.Bottom)
	c.wall("Top", p.Top)
	layers := make([]laminate.Layer, len(p.Layers))
	for i, l := range p.Layers {
		outer := i == 0 || i == len(p.Layers)-1
		l.check(&c, fmt.Sprintf("Layers[%d].", i), outer)
		layers[i] = laminate.Layer{
			Thickness:   l.Thickness,
			Viscosity:   l.Viscosity,
			Growth:      growth(l.Contrast, l.Thickness),
			Across:      laminate.Profile(l.Force),
			SheetAcross: l.Sheet,
		}
	}
	if c.err != nil {
		return nil, c.err
	}
	return amplitudes(problem, laminate.Problem{K: p.KX, Layers: layers, Low: end(p.Bottom), High: high})
}

func (l Layer) check(c *check, name string, outer bool) {
	infinite := math.IsInf(l.Thickness, 1)
	if !outer || !infinite {
		c.positive(name+"Thickness", l.Thickness)
	}
	c.positive(name+"Viscosity", l.Viscosity)
	c.notNegative(name+"Contrast", l.Contrast)
	c.require(!infinite || l.Contrast == 0 || l.Contrast == 1, name+"Contrast", l.Contrast, "1 or 0 in an infinite layer")
	l.Force.check(c, name+"Force.")
	c.finite(name+"Sheet", l.Sheet)
}

func (p Profile) check(c *check, name string) {
	c.finite(name+"Mean", p.Mean)
	c.finite(name+"Sine", p.Sine)
	c.finite(name+"Cosine", p.Cosine)
	c.notNegative(name+"Wavenumber", p.Wavenumber)
}

// growth is the logarithmic derivative of a viscosity.
func growth(contrast, thickness float64) float64 {
	if contrast == 0 {
		return 0
	}
	return math.Log(contrast) / thickness
}

func end(w Wall) laminate.End {
	if w == NoSlip {
		return laminate.Stick
	}
	return laminate.Slip
}

// amplitudes solves and names the problem in errors.
func amplitudes(problem string, p laminate.Problem) (*laminate.Flow, error) {
	f, err := laminate.Solve(p)
	if err != nil {
		return nil, fmt.Errorf("exact: %s: %w: %w", problem, ErrRounding, err)
	}
	return f, nil
}

// layered is a flow in horizontal layers.
type layered struct {
	flow *laminate.Flow
	kx   float64
}

func (s *layered) At(x, z float64) Fields {
	a := s.flow.At(z)
	sin, cos := math.Sincos(s.kx * x)
	return newFields(a.U*sin, a.W*cos, a.P*cos, a.Viscosity, a.Stretch*cos, 0.5*a.Shear*sin)
}

func (s *layered) Viscosity(_, z float64) float64 { return s.flow.Viscosity(z) }

func (s *layered) Force(x, z float64) (bx, bz float64) {
	across, _ := s.flow.Force(z)
	return 0, across * math.Cos(s.kx*x)
}
