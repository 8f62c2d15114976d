package exact

import "math"

// Corner is the flow of uniform viscosity in the wedge between two plates that
// meet at the origin and move with constant velocities, as in the mantle at
// a spreading ridge or above a sinking plate (Batchelor 1967, section 4.8, from
// memory). Usually plates move along themselves; a velocity across them is
// one at which fluid is drawn through.
//
// The stream function is r f(θ): velocity depends on the direction alone,
// pressure and stress fall off as 1/r. The apex itself has no values: there At
// returns infinities and NaN. The pressure tends to zero far away. In a wedge
// of a small opening α rounding errors grow as 1/α².
type Corner struct {
	Viscosity float64 // > 0
	From, To  Plate   // From.Angle < To.Angle ≤ From.Angle + 2π
}

// A Plate is one side of a [Corner]: the ray from the origin at an Angle,
// counted from the x axis anticlockwise, in radians.
type Plate struct {
	Angle  float64
	VX, VZ float64 // velocity
}

// Solve returns the flow.
func (p Corner) Solve() (Solution, error) {
	c := check{problem: "Corner"}
	c.positive("Viscosity", p.Viscosity)
	for _, side := range []struct {
		name string
		Plate
	}{{"From", p.From}, {"To", p.To}} {
		c.finite(side.name+".Angle", side.Angle)
		c.finite(side.name+".VX", side.VX)
		c.finite(side.name+".VZ", side.VZ)
	}
	opening := p.To.Angle - p.From.Angle
	c.require(opening > 0 && opening <= 2*math.Pi, "To.Angle", p.To.Angle, "more than From.Angle, by 2π at most")
	if c.err != nil {
		return nil, c.err
	}
	s := &corner{eta: p.Viscosity, half: 0.5 * opening}
	s.middle = p.From.Angle + s.half
	s.fit(p.From.polar(), p.To.polar())
	return s, nil
}

// polar returns the velocity of a plate away from the apex and anticlockwise.
func (p Plate) polar() [2]float64 {
	sin, cos := math.Sincos(p.Angle)
	return [2]float64{p.VX*cos + p.VZ*sin, p.VZ*cos - p.VX*sin}
}

// A corner flow has f = A cos φ + B sin φ + C φ cos φ + D φ sin φ, where φ is
// counted from the middle of the wedge. The velocity is f′ away from the apex
// and −f anticlockwise.
type corner struct {
	eta          float64
	middle, half float64
	a, b, c, d   float64
}

// fit finds the coefficients from the velocities at φ = −half and half, first
// the even and then the odd part of f.
func (s *corner) fit(from, to [2]float64) {
	sin, cos := math.Sincos(s.half)
	h := s.half
	even, slope := -0.5*(to[1]+from[1]), 0.5*(to[0]-from[0])
	det := h + sin*cos
	s.a = (even*(sin+h*cos) - slope*h*sin) / det
	s.d = (slope*cos + even*sin) / det
	odd, slope := -0.5*(to[1]-from[1]), 0.5*(to[0]+from[0])
	det = sin*cos - h
	s.b = (odd*(cos-h*sin) - slope*h*cos) / det
	s.c = (slope*sin - odd*cos) / det
}

// polar returns the distance from the apex and the angle from the middle of
// the wedge, between −π and π.
func (s *corner) polar(x, z float64) (r, phi float64) {
	sin, cos := math.Sincos(s.middle)
	u, v := x*cos+z*sin, z*cos-x*sin
	return math.Hypot(u, v), math.Atan2(v, u)
}

func (s *corner) At(x, z float64) Fields {
	r, phi := s.polar(x, z)
	sin, cos := math.Sincos(phi)
	f := (s.a+s.c*phi)*cos + (s.b+s.d*phi)*sin
	slope := (s.b+s.d*phi+s.c)*cos + (s.d-s.a-s.c*phi)*sin
	curve := 2 * (s.d*cos - s.c*sin)  // f + f″
	change := 2 * (s.d*sin + s.c*cos) // −(f′ + f‴)
	shear := curve / (2 * r)          // of a line along the ray
	nx, nz := x/r, z/r
	return newFields(slope*nx+f*nz, slope*nz-f*nx, s.eta*change/r, s.eta,
		-2*shear*nx*nz, shear*(nx-nz)*(nx+nz))
}

func (s *corner) Viscosity(_, _ float64) float64 { return s.eta }

func (s *corner) Force(_, _ float64) (bx, bz float64) { return 0, 0 }
