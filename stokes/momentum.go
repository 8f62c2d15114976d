package stokes

import (
	"fmt"

	"example.org/overturn/stokes/staggered"
)

// ApplyTo stores in dst the force per volume that the stresses of a flow exert
// at each face,
//
//	−∇P + div(2ηε),
//
// which is minus the body force when the flow is the answer of
// [Solver.Solve]. It is linear in the viscosity and, for given walls, in the
// flow. On walls it is zero.
func (sv *Solver) ApplyTo(dst *staggered.Vector, flow *staggered.Flow, viscosity *staggered.Scalar) error {
	nx, nz := sv.grid.Cells()
	if dst == nil {
		return fmt.Errorf("stokes: destination is nil, want a vector on %v", sv.grid)
	}
	if err := checkCount("destination.X", dst.X, (nx+1)*nz); err != nil {
		return err
	}
	if err := checkCount("destination.Z", dst.Z, nx*(nz+1)); err != nil {
		return err
	}
	if err := sv.setFlow(flow, viscosity); err != nil {
		return err
	}
	l := sv.level
	clear(dst.Z[:nx])
	clear(dst.Z[nx*nz:])
	sv.mg.Operator(func(j int, rx, rz []float64) {
		x := dst.X[(j-1)*(nx+1):][:nx+1]
		rdz := l.Z.RH[j]
		for i := range x {
			x[i] = rx[i+1] * l.X.RD[i+1] * rdz
		}
		if j > 1 {
			z := dst.Z[(j-1)*nx:][:nx]
			rdn := l.Z.RD[j]
			for i := range z {
				z[i] = rz[i+1] * l.X.RH[i+1] * rdn
			}
		}
	})
	return nil
}
