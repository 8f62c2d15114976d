package multigrid

// A Level is the Stokes operator on one grid, with the unknowns and the
// right-hand side of its correction equation.
type Level struct {
	X, Z   Axis
	stride int
	rows   int

	Eta    []float64 // viscosity of cells
	Corner []float64 // viscosity of the lower left corners, walls included
	en     []float64 // Corner, but zero on walls without shear stress
	ix, iz []float64 // inverse diagonals of the momentum equations; 0 on walls
	is     []float64 // inverse of the diagonal of div D⁻¹ grad; 0 where every face is a wall

	u Fields // correction
	f Fields // right-hand side

	jumps  jumps  // cells near jumps of viscosity
	grafts grafts // faces of stiff bodies beside weak ones

	mx, mz *merge  // to the next coarser level; nil on the coarsest
	cx, cz *cubics // from the next coarser level; nil until they are needed
	passes passes
}

func newLevel(x, z Axis) *Level {
	l := &Level{X: x, Z: z, stride: x.N + 2, rows: z.N + 2}
	n := l.size()
	l.Eta, l.Corner, l.en = make([]float64, n), make([]float64, n), make([]float64, n)
	l.ix, l.iz, l.is = make([]float64, n), make([]float64, n), make([]float64, n)
	return l
}

// size returns the length of a padded array.
func (l *Level) size() int { return l.stride * l.rows }

// cells returns the number of cells.
func (l *Level) cells() int { return l.X.N * l.Z.N }

// row returns row j of a padded array.
func (l *Level) row(a []float64, j int) []float64 {
	return a[j*l.stride : (j+1)*l.stride : (j+1)*l.stride]
}

// Row returns row j of a padded array of the level, 0 ≤ j ≤ nz+1.
func (l *Level) Row(a []float64, j int) []float64 { return l.row(a, j) }

// wrapX repeats the first and last columns of face values beyond the ends of
// a periodic axis.
func (l *Level) wrapX(row []float64) {
	if l.X.wraps() {
		n := l.X.N
		row[0], row[n+1] = row[n], row[1]
	}
}

// WrapFields repeats the first and last columns of all rows of u where the
// sides are periodic.
func (l *Level) WrapFields(u Fields) {
	if !l.X.wraps() {
		return
	}
	for j := range l.rows {
		l.wrapX(l.row(u.X, j))
		l.wrapX(l.row(u.Z, j))
		l.wrapX(l.row(u.P, j))
	}
}

// Shear returns the viscosity that resists shear at corner (i, j): that of the
// fluid, or zero on a wall without shear stress.
func (l *Level) Shear(i, j int) float64 { return l.en[j*l.stride+i] }
