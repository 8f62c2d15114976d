package exact

import "math"

// Inclusion is a circular inclusion in an unbounded fluid of another viscosity
// (the problem class of Schmid & Podladchikov 2003). Far away the velocity
// becomes
//
//	vx = Stretch x + Shear z,  vz = −Stretch z:
//
// pure shear if Shear is zero, simple shear if Stretch is zero. There is no body
// force. The circle is centred at the origin.
//
// The strain rate inside is uniform, 2 Outside/(Outside + Inside) times that
// far away, and the inclusion turns at half the rate of Shear. The pressure is
// zero inside and tends to zero at infinity.
type Inclusion struct {
	Radius          float64 // > 0
	Inside, Outside float64 // viscosities, > 0
	Stretch         float64 // ∂vx/∂x far away
	Shear           float64 // ∂vx/∂z far away; not both zero
}

// Solve returns the flow.
func (p Inclusion) Solve() (Solution, error) {
	c := check{problem: "Inclusion"}
	c.positive("Radius", p.Radius)
	c.positive("Inside", p.Inside)
	c.positive("Outside", p.Outside)
	c.finite("Stretch", p.Stretch)
	c.finite("Shear", p.Shear)
	c.require(p.Stretch != 0 || p.Shear != 0, "Stretch", p.Stretch, "not 0 where Shear is 0")
	if c.err != nil {
		return nil, c.err
	}
	sum := p.Inside + p.Outside
	return &inclusion{
		p:      p,
		shear:  0.5 * p.Shear,
		inner:  2 * p.Outside / sum,
		excess: (p.Inside - p.Outside) / sum,
	}, nil
}

type inclusion struct {
	p      Inclusion
	shear  float64 // εxz far away
	inner  float64 // strain rate inside over that far away
	excess float64 // (Inside − Outside)/(Inside + Outside)
}

func (s *inclusion) inside(x, z float64) bool { return math.Hypot(x, z) < s.p.Radius }

func (s *inclusion) At(x, z float64) Fields {
	e, g, turn := s.p.Stretch, s.shear, s.shear
	if s.inside(x, z) {
		e, g = s.inner*e, s.inner*g
		return newFields(e*x+(g+turn)*z, (g-turn)*x-e*z, 0, s.p.Inside, e, g)
	}
	r := math.Hypot(x, z)
	nx, nz := x/r, z/r
	ratio := s.p.Radius / r
	a2 := ratio * ratio
	a4 := a2 * a2
	// With n the unit vector from the centre, E the strain rate far away and
	// q = n·E·n, the velocity is far E·x + near q x, and turning.
	far := 1 - s.excess*a4
	near := -2 * s.excess * (a2 - a4)
	ex, ez := e*nx+g*nz, g*nx-e*nz // E·n
	q := nx*ex + nz*ez
	vx := r*(far*ex+near*q*nx) + turn*z
	vz := r*(far*ez+near*q*nz) - turn*x
	// The strain rate is far E + near q + bend (n E·n + E·n n)/2 + curl q nn.
	bend := s.excess * (8*a4 - 4*a2)
	curl := s.excess * (8*a2 - 12*a4)
	stretch := far*e + near*q + bend*ex*nx + curl*q*nx*nx
	shear := far*g + 0.5*bend*(ex*nz+ez*nx) + curl*q*nx*nz
	p := -4 * s.p.Outside * s.excess * a2 * q
	return newFields(vx, vz, p, s.p.Outside, stretch, shear)
}

func (s *inclusion) Viscosity(x, z float64) float64 {
	if s.inside(x, z) {
		return s.p.Inside
	}
	return s.p.Outside
}

func (s *inclusion) Force(_, _ float64) (bx, bz float64) { return 0, 0 }
