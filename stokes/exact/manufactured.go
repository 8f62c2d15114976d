package exact

import "math"

// Manufactured is a smooth flow with a smooth viscosity that varies in both
// directions. Velocity, pressure and viscosity are chosen, and the force
// is what the equations ask for; it has both components. With a = π/Width,
// c = π/Height and stream function ψ, vx = ∂ψ/∂z, vz = −∂ψ/∂x, the flow is
// for Walls of kind
//
//	FreeSlip   ψ ∝ sin 2ax sin cz          g = cos ax sin(cz + π/4)
//	NoSlip     ψ ∝ sin² ax sin² cz         g = sin(ax + 1) cos cz
//	Periodic   ψ ∝ sin(2ax + ½) sin² cz    g = cos 2ax cos cz
//
// with the factor Velocity·Height/π, the viscosity is
//
//	η = Viscosity·Contrast^((1 + g)/2)
//
// and the pressure, which has zero mean over the box 0 ≤ x ≤ Width,
// 0 ≤ z ≤ Height, is
//
//	P = √Contrast·Viscosity·Velocity/Height · sin(2ax + 1) sin(cz + 1).
//
// Periodic means that the sides are periodic; bottom and top are of no slip
// then.
type Manufactured struct {
	Walls         Wall    // FreeSlip, NoSlip or Periodic
	Width, Height float64 // > 0
	Viscosity     float64 // > 0
	Contrast      float64 // bound of the ratio of viscosities, > 0
	Velocity      float64 // not 0
}

// Solve returns the flow.
func (p Manufactured) Solve() (Solution, error) {
	c := check{problem: "Manufactured"}
	c.require(p.Walls == FreeSlip || p.Walls == NoSlip || p.Walls == Periodic, "Walls", p.Walls, "FreeSlip, NoSlip or Periodic")
	c.positive("Width", p.Width)
	c.positive("Height", p.Height)
	c.positive("Viscosity", p.Viscosity)
	c.positive("Contrast", p.Contrast)
	c.notZero("Velocity", p.Velocity)
	if c.err != nil {
		return nil, c.err
	}
	a, b := math.Pi/p.Width, math.Pi/p.Height
	s := &manufactured{
		eta:      p.Viscosity,
		growth:   0.5 * math.Log(p.Contrast),
		pressure: product{x: wave{k: 2 * a, phase: 1}, z: wave{k: b, phase: 1}},
		stream:   p.Velocity / b,
		stress:   math.Sqrt(p.Contrast) * p.Viscosity * p.Velocity / p.Height,
	}
	switch p.Walls {
	case FreeSlip:
		s.psi = product{x: wave{k: 2 * a}, z: wave{k: b}}
		s.g = product{x: wave{k: a, phase: math.Pi / 2}, z: wave{k: b, phase: math.Pi / 4}}
	case NoSlip:
		s.psi = product{x: wave{k: a, squared: true}, z: wave{k: b, squared: true}}
		s.g = product{x: wave{k: a, phase: 1}, z: wave{k: b, phase: math.Pi / 2}}
	default:
		s.psi = product{x: wave{k: 2 * a, phase: 0.5}, z: wave{k: b, squared: true}}
		s.g = product{x: wave{k: 2 * a, phase: math.Pi / 2}, z: wave{k: b, phase: math.Pi / 2}}
	}
	return s, nil
}

type manufactured struct {
	eta, growth      float64 // η = eta·exp(growth·(1 + g))
	stream, stress   float64 // factors of stream function and pressure
	psi, g, pressure product
}

// A product is one of a function of x and a function of z.
type product struct{ x, z wave }

// A wave is sin(ks + phase), or its square.
type wave struct {
	k, phase float64
	squared  bool
}

// derivatives returns the value and three derivatives.
func (w wave) derivatives(s float64) [4]float64 {
	sin, cos := math.Sincos(w.k*s + w.phase)
	k := w.k
	if w.squared {
		return [4]float64{sin * sin, 2 * k * sin * cos, 2 * k * k * (cos - sin) * (cos + sin), -8 * k * k * k * sin * cos}
	}
	return [4]float64{sin, k * cos, -k * k * sin, -k * k * k * cos}
}

func (p product) derivatives(x, z float64) (dx, dz [4]float64) {
	return p.x.derivatives(x), p.z.derivatives(z)
}

func (s *manufactured) At(x, z float64) Fields {
	px, pz := s.psi.derivatives(x, z)
	qx, qz := s.pressure.derivatives(x, z)
	u := s.stream
	return newFields(u*px[0]*pz[1], -u*px[1]*pz[0], s.stress*qx[0]*qz[0], s.Viscosity(x, z),
		u*px[1]*pz[1], 0.5*u*(px[0]*pz[2]-px[2]*pz[0]))
}

func (s *manufactured) Viscosity(x, z float64) float64 {
	gx, gz := s.g.derivatives(x, z)
	return s.eta * math.Exp(s.growth*(1+gx[0]*gz[0]))
}

// Force uses div(2ηε) = η∇²v + 2ε·∇η, which holds where div v = 0.
func (s *manufactured) Force(x, z float64) (bx, bz float64) {
	px, pz := s.psi.derivatives(x, z)
	qx, qz := s.pressure.derivatives(x, z)
	gx, gz := s.g.derivatives(x, z)
	stretch, shear := px[1]*pz[1], px[0]*pz[2]-px[2]*pz[0]
	slopeX, slopeZ := s.growth*gx[1]*gz[0], s.growth*gx[0]*gz[1] // of log η
	eta := s.stream * s.Viscosity(x, z)
	bx = s.stress*qx[1]*qz[0] - eta*(px[2]*pz[1]+px[0]*pz[3]+2*stretch*slopeX+shear*slopeZ)
	bz = s.stress*qx[0]*qz[1] - eta*(-px[3]*pz[0]-px[1]*pz[2]+shear*slopeX-2*stretch*slopeZ)
	return bx, bz
}
