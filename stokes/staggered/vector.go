package staggered

// A Vector is a vector field given by its components normal to the faces of
// cells: a body force, a velocity. X sits at the centres of vertical faces,
// X[k*(nx+1)+i] on the left of cell (i, k); Z at the centres of horizontal
// faces, Z[k*nx+i] below cell (i, k).
type Vector struct {
	Grid *Grid
	X    []float64 // (nx+1)·nz
	Z    []float64 // nx·(nz+1)
}

// NewVector returns a field of zeros on g.
func NewVector(g *Grid) *Vector {
	nx, nz := g.Cells()
	return &Vector{Grid: g, X: make([]float64, (nx+1)*nz), Z: make([]float64, nx*(nz+1))}
}

// WrapVector returns a field on g that uses x and z themselves, without a
// copy. It fails when they do not hold (nx+1)·nz and nx·(nz+1) numbers.
func WrapVector(g *Grid, x, z []float64) (*Vector, error) {
	if err := checkLength("x", x, xFaces, g); err != nil {
		return nil, err
	}
	if err := checkLength("z", z, zFaces, g); err != nil {
		return nil, err
	}
	return &Vector{Grid: g, X: x, Z: z}, nil
}

// Fill sets each component to the function of its name at the centre of its
// face. A nil function leaves that component as it is.
func (v *Vector) Fill(fx, fz func(x, z float64) float64) {
	if fx != nil {
		v.xFaces().fill(fx)
	}
	if fz != nil {
		v.zFaces().fill(fz)
	}
}

// SetAll sets all components in x and in z.
func (v *Vector) SetAll(x, z float64) {
	setAll(v.X, x)
	setAll(v.Z, z)
}

// ValueAt interpolates each component bilinearly between the centres of its
// faces; within half a cell of a wall the tangential component is
// extrapolated linearly. A point outside the box is first moved to the nearest
// point of it.
func (v *Vector) ValueAt(x, z float64) (vx, vz float64) {
	x, z = v.Grid.clamp(x, z)
	return v.xFaces().at(x, z), v.zFaces().at(x, z)
}

// FillVertical sets the z component to factor times s, interpolated linearly
// from the cell centres below and above each face, and the x component to
// zero: buoyancy from a temperature. On the bottom and the top wall it takes
// the value of the adjoining cell.
func (v *Vector) FillVertical(s *Scalar, factor float64) {
	setAll(v.X, 0)
	nx, nz := v.Grid.Cells()
	dz := v.Grid.DZ()
	for k := 0; k <= nz; k++ {
		below, above := max(k-1, 0), min(k, nz-1)
		weight := dz[below] / (dz[below] + dz[above])
		lower, upper, out := s.Row(below), s.Row(above), v.Z[k*nx:][:nx]
		for i := range out {
			out[i] = factor * ((1-weight)*lower[i] + weight*upper[i])
		}
	}
}

// Dot returns the sum over all faces of v·w times the volume that belongs to
// the face, half a cell at the walls: the integral of the scalar product over
// the box, second order accurate.
func (v *Vector) Dot(w *Vector) float64 {
	nx, nz := v.Grid.Cells()
	dx, dz := v.Grid.DX(), v.Grid.DZ()
	total := 0.0
	for k := range nz {
		vx, wx := v.X[k*(nx+1):][:nx+1], w.X[k*(nx+1):][:nx+1]
		lower, upper := v.Z[k*nx:][:nx], v.Z[(k+1)*nx:][:nx]
		wLower, wUpper := w.Z[k*nx:][:nx], w.Z[(k+1)*nx:][:nx]
		sum := 0.0
		for i, width := range dx {
			sum += 0.5 * width * (vx[i]*wx[i] + vx[i+1]*wx[i+1] + lower[i]*wLower[i] + upper[i]*wUpper[i])
		}
		total += sum * dz[k]
	}
	return total
}

func (v *Vector) xFaces() lattice {
	return lattice{xs: v.Grid.x.nodes, zs: v.Grid.z.centres, values: v.X}
}

func (v *Vector) zFaces() lattice {
	return lattice{xs: v.Grid.x.centres, zs: v.Grid.z.nodes, values: v.Z}
}
