package convection

import (
	"math"

	"gonum.org/v1/gonum/floats"

	"example.org/overturn/stokes/staggered"
)

// A stressResponse is the force that a flow feels when the viscosity changes
// with the temperature, ∇·(2 δη ε), by a central difference in the direction of
// the change of temperature.
type stressResponse struct {
	sys         *system
	temperature *staggered.Scalar
	flow        *staggered.Flow // velocity alone: pressure would only cancel
	viscosity   *staggered.Scalar

	warmer, eta  *staggered.Scalar
	above, below *staggered.Vector
}

// differenceStep is the largest change of temperature in the difference, in
// temperature ranges: its square is the relative error.
const differenceStep = 1e-4

func newStressResponse(sys *system) *stressResponse {
	g := sys.Grid
	return &stressResponse{
		sys: sys, viscosity: staggered.NewScalar(g),
		warmer: staggered.NewScalar(g), eta: staggered.NewScalar(g),
		above: staggered.NewVector(g), below: staggered.NewVector(g),
	}
}

func (r *stressResponse) prepare(t *staggered.Scalar, flow *staggered.Flow) {
	r.temperature = t
	r.flow = &staggered.Flow{Grid: flow.Grid, VX: flow.VX, VZ: flow.VZ, P: make([]float64, len(flow.P))}
	r.sys.viscosityTo(r.viscosity, t)
}

// addTo adds the force for the change d of the temperature.
func (r *stressResponse) addTo(force *staggered.Vector, d *staggered.Scalar) error {
	largest := floats.Norm(d.Values, math.Inf(1))
	if largest == 0 {
		return nil
	}
	h := differenceStep * max(extent(r.temperature), math.SmallestNonzeroFloat64) / largest
	if err := r.apply(r.above, h, d); err != nil {
		return err
	}
	if err := r.apply(r.below, -h, d); err != nil {
		return err
	}
	scale := 0.5 / h
	for j := range force.X {
		force.X[j] += scale * (r.above.X[j] - r.below.X[j])
	}
	for j := range force.Z {
		force.Z[j] += scale * (r.above.Z[j] - r.below.Z[j])
	}
	return nil
}

// apply stores the viscous force at the temperature plus h d.
func (r *stressResponse) apply(dst *staggered.Vector, h float64, d *staggered.Scalar) error {
	floats.AddScaledTo(r.warmer.Values, r.temperature.Values, h, d.Values)
	r.sys.viscosityTo(r.eta, r.warmer)
	return r.sys.stokes.ApplyTo(dst, r.flow, r.eta)
}
