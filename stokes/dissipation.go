package stokes

import "example.org/overturn/stokes/staggered"

// DissipationTo stores in dst the viscous dissipation per volume,
//
//	2η (εxx² + εzz² + 2 εxz²),
//
// of each cell, its own normal part and a share of the shear part at its four
// corners, and returns the sum over the box. That is the quadratic form of the
// solver's own momentum operator: between walls at rest it equals the work of
// the body force to the tolerance of the solve. A nil dst asks for the sum
// alone.
func (sv *Solver) DissipationTo(dst *staggered.Scalar, flow *staggered.Flow, viscosity *staggered.Scalar) (total float64, err error) {
	nx, nz := sv.grid.Cells()
	if dst != nil {
		if err := checkCount("destination", dst.Values, nx*nz); err != nil {
			return 0, err
		}
	}
	if err := sv.setFlow(flow, viscosity); err != nil {
		return 0, err
	}
	l, u := sv.level, sv.mg.X
	for j := 1; j <= nz; j++ {
		vx, low, up, eta := l.Row(u.X, j), l.Row(u.Z, j), l.Row(u.Z, j+1), l.Row(l.Eta, j)
		row := 0.0
		for i := 1; i <= nx; i++ {
			xx, zz := (vx[i+1]-vx[i])*l.X.RH[i], (up[i]-low[i])*l.Z.RH[j]
			// Half a width is the same at a wall and inside, so that a corner
			// gives each cell around it a quarter of a cell's area.
			corners := (sv.cornerDissipation(i, j) + sv.cornerDissipation(i+1, j)) +
				(sv.cornerDissipation(i, j+1) + sv.cornerDissipation(i+1, j+1))
			density := (2*eta[i]*(xx*xx+zz*zz) + 0.25*corners) / sv.scale
			if dst != nil {
				dst.Values[(j-1)*nx+i-1] = density
			}
			row += density * l.X.H[i]
		}
		total += row * l.Z.H[j]
	}
	return total, nil
}

// cornerDissipation is the dissipation per volume of shear at corner (i, j),
// times the scale.
func (sv *Solver) cornerDissipation(i, j int) float64 {
	l, u := sv.level, sv.mg.X
	c := j*(l.X.N+2) + i
	shear := (u.X[c]-u.X[c-l.X.N-2])*l.Z.RD[j] + (u.Z[c]-u.Z[c-1])*l.X.RD[i]
	return l.Shear(i, j) * shear * shear
}
