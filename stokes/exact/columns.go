package exact

import (
	"fmt"
	"math"

	"example.org/overturn/stokes/exact/internal/laminate"
)

// A Column is one of [Columns].
type Column struct {
	// Width is positive. It may be +Inf in the first and in the last column,
	// whose flow then decays with distance.
	Width float64

	// Viscosity is positive; where it varies it is that on the left side.
	Viscosity float64

	// Contrast is the viscosity on the right side of the column over that on
	// its left side. The viscosity is exponential in between. Zero means one,
	// and an infinite column has no other.
	Contrast float64

	// Force is the upward force per volume, over sin(KZ z).
	Force Profile
}

// Columns are vertical columns of different viscosity under loads that vary as
// sin(KZ z), a generalisation of [ColumnJump]. The columns are given from left
// to right. x = 0 is the left side of the first column, or its right side if
// its width is infinite.
//
// The velocity is vx ∝ cos(KZ z), vz ∝ sin(KZ z). Horizontal planes where
// sin(KZ z) = 0 are free-slip walls. The pressure has zero mean over a
// wavelength. Solve fails also with [ErrRounding].
type Columns struct {
	KZ          float64  // wavenumber, > 0
	Columns     []Column // at least one
	Left, Right Wall     // FreeSlip or NoSlip; not used by an infinite column
}

// Solve returns the flow.
func (p Columns) Solve() (Solution, error) { return p.solve("Columns") }

func (p Columns) solve(problem string) (Solution, error) {
	c := check{problem: problem}
	c.positive("KZ", p.KZ)
	c.require(len(p.Columns) > 0, "Columns", p.Columns, "one column or more")
	c.wall("Left", p.Left)
	c.wall("Right", p.Right)
	layers := make([]laminate.Layer, len(p.Columns))
	for i, l := range p.Columns {
		outer := i == 0 || i == len(p.Columns)-1
		l.check(&c, fmt.Sprintf("Columns[%d].", i), outer)
		layers[i] = laminate.Layer{
			Thickness: l.Width,
			Viscosity: l.Viscosity,
			Growth:    growth(l.Contrast, l.Width),
			Along:     laminate.Profile(l.Force),
		}
	}
	if c.err != nil {
		return nil, c.err
	}
	f, err := amplitudes(problem, laminate.Problem{K: p.KZ, Layers: layers, Low: end(p.Left), High: end(p.Right)})
	if err != nil {
		return nil, err
	}
	return &columnar{f, p.KZ}, nil
}

func (l Column) check(c *check, name string, outer bool) {
	infinite := math.IsInf(l.Width, 1)
	if !outer || !infinite {
		c.positive(name+"Width", l.Width)
	}
	c.positive(name+"Viscosity", l.Viscosity)
	c.notNegative(name+"Contrast", l.Contrast)
	c.require(!infinite || l.Contrast == 0 || l.Contrast == 1, name+"Contrast", l.Contrast, "1 or 0 in an infinite column")
	l.Force.check(c, name+"Force.")
}

// columnar is a flow in vertical columns. It is one in layers, mirrored at
// the diagonal.
type columnar struct {
	flow *laminate.Flow
	kz   float64
}

func (s *columnar) At(x, z float64) Fields {
	a := s.flow.At(x)
	sin, cos := math.Sincos(s.kz * z)
	return newFields(a.W*cos, a.U*sin, a.P*cos, a.Viscosity, -a.Stretch*cos, 0.5*a.Shear*sin)
}

func (s *columnar) Viscosity(x, _ float64) float64 { return s.flow.Viscosity(x) }

func (s *columnar) Force(x, z float64) (bx, bz float64) {
	_, along := s.flow.Force(x)
	return 0, along * math.Sin(s.kz*z)
}

// ColumnJump is a box whose viscosity jumps at a vertical plane, between
// free-slip walls, under the upward force
//
//	b = Force cos(KX x) sin(KZ z)
//
// (the problem class of Zhong 1996). The box reaches from x = 0 to Width; KX
// and the place of the jump are free. Bottom and top of the box are
// any two planes where sin(KZ z) = 0. The pressure has zero mean over the
// box. Solve fails also with [ErrRounding].
type ColumnJump struct {
	Width       float64 // > 0
	Jump        float64 // between 0 and Width
	Left, Right float64 // viscosities on the two sides of the jump, > 0
	KX          float64 // > 0: without it the pressure alone would balance the force
	KZ          float64 // > 0
	Force       float64 // not 0
}

// Solve returns the flow.
func (p ColumnJump) Solve() (Solution, error) {
	const name = "ColumnJump"
	c := check{problem: name}
	c.positive("Width", p.Width)
	c.require(p.Jump > 0 && p.Jump < p.Width, "Jump", p.Jump, fmt.Sprintf("between 0 and Width = %v", p.Width))
	c.positive("Left", p.Left)
	c.positive("Right", p.Right)
	c.positive("KX", p.KX)
	c.positive("KZ", p.KZ)
	c.notZero("Force", p.Force)
	if c.err != nil {
		return nil, c.err
	}
	force := Profile{Cosine: p.Force, Wavenumber: p.KX}
	return Columns{KZ: p.KZ, Columns: []Column{
		{Width: p.Jump, Viscosity: p.Left, Force: force},
		{Width: p.Width - p.Jump, Viscosity: p.Right, Force: force},
	}}.solve(name)
}
