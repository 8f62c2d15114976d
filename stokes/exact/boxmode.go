package exact

import "math"

// BoxMode is the flow of uniform viscosity under the upward force
//
//	b = Force cos(KX x) sin(KZ z)
//
// in a box with free-slip walls: vertical ones where sin(KX x) = 0 and
// horizontal ones where sin(KZ z) = 0. The velocity is
//
//	vz = Force KX² / (η (KX² + KZ²)²) cos(KX x) sin(KZ z).
//
// The pressure has zero mean over the box.
type BoxMode struct {
	Viscosity float64 // > 0
	KX, KZ    float64 // > 0
	Force     float64 // not 0
}

// Solve returns the flow.
func (p BoxMode) Solve() (Solution, error) {
	c := check{problem: "BoxMode"}
	c.positive("Viscosity", p.Viscosity)
	c.positive("KX", p.KX)
	c.positive("KZ", p.KZ)
	c.notZero("Force", p.Force)
	if c.err != nil {
		return nil, c.err
	}
	return &boxMode{p}, nil
}

type boxMode struct{ p BoxMode }

func (s *boxMode) At(x, z float64) Fields {
	kx, kz := s.p.KX, s.p.KZ
	sinX, cosX := math.Sincos(kx * x)
	sinZ, cosZ := math.Sincos(kz * z)
	k2 := kx*kx + kz*kz
	// The amplitudes of the fields.
	vz := s.p.Force / s.p.Viscosity * (kx / k2) * (kx / k2)
	vx := -vz * kz / kx
	p := -s.p.Force * kz / k2
	shear := -0.5 * (vx*kz + vz*kx)
	return newFields(vx*sinX*cosZ, vz*cosX*sinZ, p*cosX*cosZ, s.p.Viscosity, vx*kx*cosX*cosZ, shear*sinX*sinZ)
}

func (s *boxMode) Viscosity(_, _ float64) float64 { return s.p.Viscosity }

func (s *boxMode) Force(x, z float64) (bx, bz float64) {
	return 0, s.p.Force * math.Cos(s.p.KX*x) * math.Sin(s.p.KZ*z)
}
