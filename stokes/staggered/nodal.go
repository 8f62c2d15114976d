package staggered

// A Nodal is a field at the corners of cells: the stream function, the shear
// stress. The value of the corner in column i from the left and row k from the
// bottom is Values[k*(nx+1)+i].
type Nodal struct {
	Grid   *Grid
	Values []float64 // (nx+1)·(nz+1)
}

// NewNodal returns a field of zeros on g.
func NewNodal(g *Grid) *Nodal {
	return &Nodal{Grid: g, Values: make([]float64, (g.NX()+1)*(g.NZ()+1))}
}

// WrapNodal returns a field on g that uses values itself, without a copy. It
// fails when values does not hold (nx+1)·(nz+1) numbers.
func WrapNodal(g *Grid, values []float64) (*Nodal, error) {
	if err := checkLength("values", values, corners, g); err != nil {
		return nil, err
	}
	return &Nodal{Grid: g, Values: values}, nil
}

// At returns the value of the corner in column i and row k.
func (n *Nodal) At(i, k int) float64 { return n.Values[k*(n.Grid.NX()+1)+i] }

// Set changes the value of the corner in column i and row k.
func (n *Nodal) Set(i, k int, v float64) { n.Values[k*(n.Grid.NX()+1)+i] = v }

// Fill sets each corner to f there.
func (n *Nodal) Fill(f func(x, z float64) float64) { n.lattice().fill(f) }

// SetAll sets every corner to v.
func (n *Nodal) SetAll(v float64) { setAll(n.Values, v) }

// Extrema returns the smallest and the largest value and their places, the
// first in storage order where several are equal. Both are NaN where the field
// holds a NaN.
func (n *Nodal) Extrema() (lowest, highest Extremum) { return n.lattice().extrema() }

// ValueAt interpolates bilinearly between corners. A point outside the box is
// first moved to the nearest point of it.
func (n *Nodal) ValueAt(x, z float64) float64 {
	x, z = n.Grid.clamp(x, z)
	return n.lattice().at(x, z)
}

// Dims returns the number of columns and rows of corners. With X, Y and Z it
// makes a Nodal the gridded data that gonum's plotting library draws.
func (n *Nodal) Dims() (c, r int) { return n.Grid.NX() + 1, n.Grid.NZ() + 1 }

// X returns the coordinate of column c of corners.
func (n *Nodal) X(c int) float64 { return n.Grid.x.nodes[c] }

// Y returns the coordinate z of row r of corners.
func (n *Nodal) Y(r int) float64 { return n.Grid.z.nodes[r] }

// Z returns the value in column c and row r.
func (n *Nodal) Z(c, r int) float64 { return n.At(c, r) }

func (n *Nodal) lattice() lattice {
	return lattice{xs: n.Grid.x.nodes, zs: n.Grid.z.nodes, values: n.Values}
}
