package staggered

import (
	"fmt"
	"math"
	"slices"
)

// A Flow is a velocity at the faces of cells and a pressure at their centres.
// VX[k*(nx+1)+i] is the velocity in x on the left face of cell (i, k),
// VZ[k*nx+i] the velocity in z on its lower face, P[k*nx+i] its pressure.
type Flow struct {
	Grid *Grid
	VX   []float64 // (nx+1)·nz
	VZ   []float64 // nx·(nz+1)
	P    []float64 // nx·nz
}

// NewFlow returns a fluid at rest on g, at zero pressure.
func NewFlow(g *Grid) *Flow {
	v := NewVector(g)
	return &Flow{Grid: g, VX: v.X, VZ: v.Z, P: make([]float64, g.NX()*g.NZ())}
}

// WrapFlow returns a flow on g that uses vx, vz and p themselves, without a
// copy. It fails when they do not hold (nx+1)·nz, nx·(nz+1) and nx·nz numbers.
func WrapFlow(g *Grid, vx, vz, p []float64) (*Flow, error) {
	if _, err := WrapVector(g, vx, vz); err != nil {
		return nil, err
	}
	if err := checkLength("p", p, cells, g); err != nil {
		return nil, err
	}
	return &Flow{Grid: g, VX: vx, VZ: vz, P: p}, nil
}

// Velocity returns the velocity as a field that shares the flow's memory.
func (f *Flow) Velocity() *Vector {
	v := f.velocity()
	return &v
}

// velocity is Velocity on the stack.
func (f *Flow) velocity() Vector { return Vector{Grid: f.Grid, X: f.VX, Z: f.VZ} }

// Pressure returns the pressure as a field that shares the flow's memory.
func (f *Flow) Pressure() *Scalar { return &Scalar{Grid: f.Grid, Values: f.P} }

// CopyFrom copies velocity and pressure of h, which must have as many columns
// and rows.
func (f *Flow) CopyFrom(h *Flow) error {
	if f.Grid.NX() != h.Grid.NX() || len(f.VX) != len(h.VX) || len(f.VZ) != len(h.VZ) || len(f.P) != len(h.P) {
		return fmt.Errorf("staggered: copy of a flow on %v into one on %v", h.Grid, f.Grid)
	}
	copy(f.VX, h.VX)
	copy(f.VZ, h.VZ)
	copy(f.P, h.P)
	return nil
}

// Clone returns a copy with memory of its own on the same grid.
func (f *Flow) Clone() *Flow {
	return &Flow{Grid: f.Grid, VX: slices.Clone(f.VX), VZ: slices.Clone(f.VZ), P: slices.Clone(f.P)}
}

// FillVelocity sets the velocity components to the functions of their names at
// the centres of their faces.
func (f *Flow) FillVelocity(vx, vz func(x, z float64) float64) { f.Velocity().Fill(vx, vz) }

// FillFromStream sets the velocity to that of the stream function psi,
//
//	vx = ∂ψ/∂z,  vz = −∂ψ/∂x,
//
// by differences between corners, so that the divergence of every cell is zero
// to rounding.
func (f *Flow) FillFromStream(psi func(x, z float64) float64) {
	n := NewNodal(f.Grid)
	n.Fill(psi)
	f.SetStream(n)
}

// SetStream sets the velocity to that of a stream function at the corners,
// free of divergence to rounding.
func (f *Flow) SetStream(psi *Nodal) {
	nx, nz := f.Grid.Cells()
	dx, dz := f.Grid.DX(), f.Grid.DZ()
	for k := 0; k <= nz; k++ {
		row := psi.Values[k*(nx+1):][:nx+1]
		for i := range nx {
			f.VZ[k*nx+i] = (row[i] - row[i+1]) / dx[i]
		}
		if k < nz {
			above := psi.Values[(k+1)*(nx+1):][:nx+1]
			for i := range row {
				f.VX[k*(nx+1)+i] = (above[i] - row[i]) / dz[k]
			}
		}
	}
}

// StreamFunctionTo stores in dst the stream function of the flow, zero at the
// lower left corner. Its differences give back the velocity to rounding where
// the flow is free of divergence; elsewhere it depends on the path of
// integration, which runs along the bottom and then up.
func (f *Flow) StreamFunctionTo(dst *Nodal) {
	nx, nz := f.Grid.Cells()
	dx, dz := f.Grid.DX(), f.Grid.DZ()
	dst.Values[0] = 0
	for i := range nx {
		dst.Values[i+1] = dst.Values[i] - f.VZ[i]*dx[i]
	}
	for k := range nz {
		row, above := dst.Values[k*(nx+1):][:nx+1], dst.Values[(k+1)*(nx+1):][:nx+1]
		vx := f.VX[k*(nx+1):][:nx+1]
		for i := range row {
			above[i] = row[i] + vx[i]*dz[k]
		}
	}
}

// DivergenceTo stores the divergence of each cell in dst.
func (f *Flow) DivergenceTo(dst *Scalar) {
	nx, nz := f.Grid.Cells()
	dx, dz := f.Grid.DX(), f.Grid.DZ()
	for k := range nz {
		vx := f.VX[k*(nx+1):][:nx+1]
		lower, upper, out := f.VZ[k*nx:][:nx], f.VZ[(k+1)*nx:][:nx], dst.Values[k*nx:][:nx]
		for i := range out {
			out[i] = (vx[i+1]-vx[i])/dx[i] + (upper[i]-lower[i])/dz[k]
		}
	}
}

// RMS returns the root-mean-square speed over the box.
func (f *Flow) RMS() float64 {
	v := f.velocity()
	return math.Sqrt(v.Dot(&v) / f.Grid.Area())
}

// MaxSpeed returns the largest speed among the cell centres, to which the
// components are averaged from the faces.
func (f *Flow) MaxSpeed() float64 {
	nx, nz := f.Grid.Cells()
	largest := 0.0
	for k := range nz {
		for i := range nx {
			vx, vz := f.cellVelocity(i, k)
			largest = max(largest, vx*vx+vz*vz)
		}
	}
	return math.Sqrt(largest)
}

// VelocityAt interpolates the velocity as [Vector.ValueAt] does.
func (f *Flow) VelocityAt(x, z float64) (vx, vz float64) {
	v := f.velocity()
	return v.ValueAt(x, z)
}

// CellVelocityTo stores the velocity at cell centres, the mean of the two
// faces of each component.
func (f *Flow) CellVelocityTo(vx, vz *Scalar) {
	nx, nz := f.Grid.Cells()
	for k := range nz {
		for i := range nx {
			vx.Values[k*nx+i], vz.Values[k*nx+i] = f.cellVelocity(i, k)
		}
	}
}

func (f *Flow) cellVelocity(i, k int) (vx, vz float64) {
	nx := f.Grid.NX()
	j := k*(nx+1) + i
	return 0.5 * (f.VX[j] + f.VX[j+1]), 0.5 * (f.VZ[k*nx+i] + f.VZ[(k+1)*nx+i])
}

// TangentialTo stores in dst the velocity along a wall, on Bottom and Top vx
// at the nx+1 nodes in x, on Left and Right vz at the nz+1 nodes in z, and
// returns dst. It is extrapolated from the three nearest rows of faces by a
// parabola, which is second order whatever holds on the wall. A nil dst is
// allocated.
func (f *Flow) TangentialTo(dst []float64, side Side) []float64 {
	nx, nz := f.Grid.Cells()
	along, across, stride, step, values := nx+1, f.Grid.z, 1, nx+1, f.VX
	if !side.Horizontal() {
		along, across, stride, step, values = nz+1, f.Grid.x, nx, 1, f.VZ
	}
	n := len(across.centres)
	first, inward, wall := 0, 1, across.nodes[0]
	if side == Right || side == Top {
		first, inward, wall = n-1, -1, across.nodes[n]
	}
	points := min(n, 3)
	var weights [3]float64
	for p := range points {
		weights[p] = 1
		for q := range points {
			if q != p {
				cp, cq := across.centres[first+p*inward], across.centres[first+q*inward]
				weights[p] *= (wall - cq) / (cp - cq)
			}
		}
	}
	if dst == nil {
		dst = make([]float64, along)
	}
	for j := range dst[:along] {
		sum := 0.0
		for p := range points {
			sum += weights[p] * values[j*stride+(first+p*inward)*step]
		}
		dst[j] = sum
	}
	return dst
}
