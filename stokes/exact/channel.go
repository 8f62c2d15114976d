package exact

import "math"

// Channel is the flow between plates at z = 0 and z = Height that move along x,
// driven by the plates (Couette), by a pressure gradient (Poiseuille), by a
// force along x, or by all of them. The viscosity is exponential in height. The
// pressure is PressureGradient·x.
type Channel struct {
	Height           float64 // > 0
	AtBottom, AtTop  float64 // viscosities, > 0
	VBottom, VTop    float64 // velocities of the plates
	PressureGradient float64 // ∂P/∂x
	Force            float64 // along x, per volume: of a layer on a slope, or where x is periodic

	// FreeTop makes the top a surface without shear stress instead of a plate:
	// a film on a slope. VTop must be zero then, and is not used.
	FreeTop bool
}

// Solve returns the flow.
func (p Channel) Solve() (Solution, error) {
	c := check{problem: "Channel"}
	c.positive("Height", p.Height)
	c.positive("AtBottom", p.AtBottom)
	c.ratio("AtTop", p.AtTop, p.AtBottom)
	c.finite("VBottom", p.VBottom)
	c.finite("VTop", p.VTop)
	c.finite("PressureGradient", p.PressureGradient)
	c.finite("Force", p.Force)
	c.require(!p.FreeTop || p.VTop == 0, "VTop", p.VTop, "0 where FreeTop is set")
	if c.err != nil {
		return nil, c.err
	}
	s := &channel{p: p, drive: p.Force - p.PressureGradient, growth: math.Log(p.AtTop / p.AtBottom)}
	if p.FreeTop {
		s.stress = s.drive * p.Height
		return s, nil
	}
	plates := (p.VTop - p.VBottom) * p.AtBottom / p.Height
	s.stress = (plates + s.drive*p.Height*firstMoment(s.growth)) / zerothMoment(s.growth)
	return s, nil
}

type channel struct {
	p      Channel
	drive  float64 // minus the vertical gradient of the shear stress
	growth float64 // logarithm of the ratio of viscosities
	stress float64 // shear stress at the bottom
}

func (s *channel) At(x, z float64) Fields {
	y := z / s.p.Height
	c := s.growth * y
	eta := s.p.AtBottom * math.Exp(c)
	// The integral of (stress − drive z)/η.
	vx := s.p.VBottom + z/s.p.AtBottom*(s.stress*zerothMoment(c)-s.drive*z*firstMoment(c))
	shear := (s.stress - s.drive*z) / (2 * eta)
	return newFields(vx, 0, s.p.PressureGradient*x, eta, 0, shear)
}

func (s *channel) Viscosity(_, z float64) float64 {
	return s.p.AtBottom * math.Exp(s.growth*(z/s.p.Height))
}

func (s *channel) Force(_, _ float64) (bx, bz float64) { return s.p.Force, 0 }

// zerothMoment is ∫exp(−ct)dt for t from 0 to 1.
func zerothMoment(c float64) float64 {
	if c == 0 {
		return 1
	}
	return -math.Expm1(-c) / c
}

// firstMoment is ∫t exp(−ct)dt for t from 0 to 1.
func firstMoment(c float64) float64 {
	if math.Abs(c) < 1 {
		sum, power := 0.0, 1.0 // power is (−c)ⁿ/n!
		for n := range 18 {
			sum += power / float64(n+2)
			power *= -c / float64(n+1)
		}
		return sum
	}
	return (-math.Expm1(-c) - c*math.Exp(-c)) / (c * c)
}
