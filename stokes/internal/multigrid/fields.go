package multigrid

// Fields are a velocity at faces and a pressure at centres, or the residuals
// of their equations. All three arrays are padded by one ring and share one
// stride of N+2 columns and the index j·stride+i: X belongs to the left face
// of cell (i, j), Z to its lower face, P to its centre. The slots of the
// ring beside a wall hold the wall's tangential velocity.
type Fields struct{ X, Z, P []float64 }

// NewFields returns zeros.
func newFields(size int) Fields {
	all := make([]float64, 3*size)
	return Fields{X: all[:size:size], Z: all[size : 2*size : 2*size], P: all[2*size:]}
}

func (u Fields) clear() {
	clear(u.X)
	clear(u.Z)
	clear(u.P)
}
