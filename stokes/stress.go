package stokes

import (
	"fmt"

	"example.org/overturn/stokes/staggered"
)

// A Tensor is a symmetric tensor field: the diagonal at cell centres, the
// other component at corners, where their differences live.
type Tensor struct {
	XX, ZZ *staggered.Scalar
	XZ     *staggered.Nodal
}

// NewTensor returns a field of zeros.
func NewTensor(g *staggered.Grid) *Tensor {
	return &Tensor{XX: staggered.NewScalar(g), ZZ: staggered.NewScalar(g), XZ: staggered.NewNodal(g)}
}

func (sv *Solver) checkTensor(t *Tensor) error {
	nx, nz := sv.grid.Cells()
	if t == nil || t.XX == nil || t.ZZ == nil || t.XZ == nil {
		return fmt.Errorf("stokes: tensor or a component of it is nil, want fields on %v", sv.grid)
	}
	if err := checkCount("tensor.XX", t.XX.Values, nx*nz); err != nil {
		return err
	}
	if err := checkCount("tensor.ZZ", t.ZZ.Values, nx*nz); err != nil {
		return err
	}
	return checkCount("tensor.XZ", t.XZ.Values, (nx+1)*(nz+1))
}

// StrainRateTo stores in dst the strain rate ε of a flow,
//
//	εxx = ∂vx/∂x,  εzz = ∂vz/∂z,  εxz = ½(∂vx/∂z + ∂vz/∂x),
//
// by central differences, second order in the interior. εxz is zero on
// free-slip walls; on no-slip walls it comes from the parabola through the
// wall and the two nearest rows.
func (sv *Solver) StrainRateTo(dst *Tensor, flow *staggered.Flow) error {
	if err := sv.checkFlow(flow); err != nil {
		return err
	}
	if err := sv.checkTensor(dst); err != nil {
		return err
	}
	sv.load.clear()
	sv.guess(flow)
	sv.strainRate(dst, 1/sv.scale)
	return nil
}

// StressTo stores in dst the stress σ = −P + 2ηε of a flow. At corners η is
// the mean that the solver uses.
func (sv *Solver) StressTo(dst *Tensor, flow *staggered.Flow, viscosity *staggered.Scalar) error {
	if err := sv.checkTensor(dst); err != nil {
		return err
	}
	if err := sv.setFlow(flow, viscosity); err != nil {
		return err
	}
	sv.strainRate(dst, 1)
	l := sv.level
	nx, nz := sv.grid.Cells()
	for j := 1; j <= nz; j++ {
		eta, p := l.Row(l.Eta, j)[1:], l.Row(sv.mg.X.P, j)[1:]
		xx, zz := dst.XX.Values[(j-1)*nx:][:nx], dst.ZZ.Values[(j-1)*nx:][:nx]
		for i := range xx {
			xx[i] = 2*eta[i]*xx[i] - p[i]
			zz[i] = 2*eta[i]*zz[i] - p[i]
		}
	}
	for j := 1; j <= nz+1; j++ {
		corner, xz := l.Row(l.Corner, j)[1:], dst.XZ.Values[(j-1)*(nx+1):][:nx+1]
		for i := range xz {
			xz[i] *= 2 * corner[i]
		}
	}
	return nil
}

// setFlow puts a flow and a viscosity where the kernels find them.
func (sv *Solver) setFlow(flow *staggered.Flow, viscosity *staggered.Scalar) error {
	if err := sv.checkFlow(flow); err != nil {
		return err
	}
	if err := sv.setViscosity(viscosity); err != nil {
		return err
	}
	sv.load.clear()
	sv.guess(flow)
	sv.level.WrapFields(sv.mg.X)
	return nil
}

// strainRate stores the strain rate of the present solution times a factor.
func (sv *Solver) strainRate(dst *Tensor, factor float64) {
	l, x := sv.level, sv.mg.X
	nx, nz := sv.grid.Cells()
	l.WrapFields(x)
	rh := l.X.RH[1:]
	for j := 1; j <= nz; j++ {
		vx, low, up := l.Row(x.X, j)[1:], l.Row(x.Z, j)[1:], l.Row(x.Z, j+1)[1:]
		xx, zz := dst.XX.Values[(j-1)*nx:][:nx], dst.ZZ.Values[(j-1)*nx:][:nx]
		rdz := l.Z.RH[j]
		for i := range xx {
			xx[i] = (vx[i+1] - vx[i]) * rh[i] * factor
			zz[i] = (up[i] - low[i]) * rdz * factor
		}
	}
	for j := 1; j <= nz+1; j++ {
		xz := dst.XZ.Values[(j-1)*(nx+1):][:nx+1]
		for i := range xz {
			xz[i] = 0.5 * factor * sv.shear(i+1, j)
		}
	}
}

// shear returns ∂vx/∂z + ∂vz/∂x at corner (i, j).
func (sv *Solver) shear(i, j int) float64 {
	l := sv.level
	nx, nz := sv.grid.Cells()
	if j == 1 && sv.walls.Bottom.kind == freeSlip || j == nz+1 && sv.walls.Top.kind == freeSlip ||
		i == 1 && sv.walls.Left.kind == freeSlip || i == nx+1 && sv.walls.Right.kind == freeSlip {
		return 0
	}
	at := j*(nx+2) + i
	x, z := sv.mg.X.X, sv.mg.X.Z
	row := nx + 2
	dvx := (x[at] - x[at-row]) * l.Z.RD[j]
	dvz := (z[at] - z[at-1]) * l.X.RD[i]
	switch {
	case j == 1 && nz > 1:
		dvx = wallSlope(x[at-row], x[at], x[at+row], l.Z.H[1], l.Z.H[2])
	case j == nz+1 && nz > 1:
		dvx = -wallSlope(x[at], x[at-row], x[at-2*row], l.Z.H[nz], l.Z.H[nz-1])
	}
	if sv.walls.Left.kind != periodic && nx > 1 {
		switch i {
		case 1:
			dvz = wallSlope(z[at-1], z[at], z[at+1], l.X.H[1], l.X.H[2])
		case nx + 1:
			dvz = -wallSlope(z[at], z[at-1], z[at-2], l.X.H[nx], l.X.H[nx-1])
		}
	}
	return dvx + dvz
}

// wallSlope is the inward derivative at a wall of the parabola through the
// value there and those at the centres of two cells of widths h1 and h2.
func wallSlope(wall, first, second, h1, h2 float64) float64 {
	a, b := 0.5*h1, h1+0.5*h2
	return ((first-wall)*b/a - (second-wall)*a/b) / (b - a)
}
