package stokes

import (
	"fmt"

	"example.org/overturn/stokes/staggered"
)

// NormalStressTo stores in dst the normal stress on a wall at the centres of its
// faces, σzz at the nx faces of Bottom and Top, σxx at the nz faces of Left and
// Right, and returns dst. A nil dst is allocated. It is extrapolated from the
// three nearest rows of cells by a parabola: second order accurate where
// viscosity and force are smooth, but for the corners of the box between
// no-slip walls, and of first order in those between walls with through-flow.
// On Top, minus this stress, less its mean and
// divided by the difference of weights across the surface, is the dynamic
// topography; positive is up.
func (sv *Solver) NormalStressTo(dst []float64, side staggered.Side, flow *staggered.Flow, viscosity *staggered.Scalar) ([]float64, error) {
	nx, nz := sv.grid.Cells()
	along, across, centres := nx, nz, sv.grid.ZCentres()
	wall := sv.grid.ZNodes()
	if !side.Horizontal() {
		along, across, centres, wall = nz, nx, sv.grid.XCentres(), sv.grid.XNodes()
	}
	if side < staggered.Left || side > staggered.Top {
		return nil, fmt.Errorf("stokes: side is %v, want Left, Right, Bottom or Top", side)
	}
	if sv.walls.of(side).kind == periodic {
		return nil, fmt.Errorf("stokes: side is %v, which is periodic: there is no wall", side)
	}
	if dst == nil {
		dst = make([]float64, along)
	}
	if err := checkCount("destination", dst, along); err != nil {
		return nil, err
	}
	if err := sv.setFlow(flow, viscosity); err != nil {
		return nil, err
	}
	first, inward, at := 1, 1, wall[0]
	if side == staggered.Right || side == staggered.Top {
		first, inward, at = across, -1, wall[across]
	}
	points := min(across, 3)
	var weights [3]float64
	for p := range points {
		weights[p] = 1
		for q := range points {
			if q != p {
				cp, cq := centres[first-1+p*inward], centres[first-1+q*inward]
				weights[p] *= (at - cq) / (cp - cq)
			}
		}
	}
	for k := range dst {
		dst[k] = 0
		for p := range points {
			if side.Horizontal() {
				dst[k] += weights[p] * sv.verticalStress(k+1, first+p*inward)
			} else {
				dst[k] += weights[p] * sv.horizontalStress(first+p*inward, k+1)
			}
		}
	}
	return dst, nil
}

// verticalStress is σzz of cell (i, j) of the present solution.
func (sv *Solver) verticalStress(i, j int) float64 {
	l, u := sv.level, sv.mg.X
	c, up := j*(l.X.N+2)+i, (j+1)*(l.X.N+2)+i
	return 2*l.Eta[c]*(u.Z[up]-u.Z[c])*l.Z.RH[j] - u.P[c]
}

// horizontalStress is σxx of cell (i, j).
func (sv *Solver) horizontalStress(i, j int) float64 {
	l, u := sv.level, sv.mg.X
	c := j*(l.X.N+2) + i
	return 2*l.Eta[c]*(u.X[c+1]-u.X[c])*l.X.RH[i] - u.P[c]
}
