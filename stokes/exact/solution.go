package exact

// A Solution is a steady flow that is known at every point. Solutions do not
// change and are safe for concurrent use.
type Solution interface {
	// At returns the flow at a point.
	At(x, z float64) Fields

	// Viscosity returns η at a point.
	Viscosity(x, z float64) float64

	// Force returns the body force per volume at a point.
	Force(x, z float64) (bx, bz float64)
}

// A Problem is a set of parameters that has an exact solution. Solve fails if
// a parameter makes no sense.
type Problem interface {
	Solve() (Solution, error)
}

// Fields are the fields at a point.
type Fields struct {
	VX, VZ     float64 // velocity
	P          float64 // dynamic pressure
	StrainRate Tensor  // ε = ½(∇v + ∇vᵀ); its trace is zero
	Stress     Tensor  // σ = −P + 2ηε, positive in tension
}

// A Tensor is a symmetric tensor at a point.
type Tensor struct{ XX, ZZ, XZ float64 }

// newFields completes the fields from the pressure and the strain rate: ∂vx/∂x
// and half of ∂vx/∂z + ∂vz/∂x.
func newFields(vx, vz, p, eta, stretch, shear float64) Fields {
	return Fields{
		VX: vx, VZ: vz, P: p,
		StrainRate: Tensor{XX: stretch, ZZ: -stretch, XZ: shear},
		Stress:     Tensor{XX: 2*eta*stretch - p, ZZ: -2*eta*stretch - p, XZ: 2 * eta * shear},
	}
}

// Dissipation returns the viscous dissipation 2ηε:ε per volume.
func (f Fields) Dissipation() float64 {
	e, s := f.StrainRate, f.Stress
	return (s.XX+f.P)*e.XX + (s.ZZ+f.P)*e.ZZ + 2*s.XZ*e.XZ
}
