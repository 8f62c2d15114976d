package layered

// A channel is the mean horizontal flow of each row between periodic sides,
// which no stream function that vanishes on the walls contains. Its shear
// stress balances the mean horizontal force.
type channel struct {
	shear []float64 // η_n/[dz] of corner rows 1..nz+1
	pivot []float64
	flow  []float64
}

func newChannel(rows int) *channel {
	return &channel{make([]float64, rows+2), make([]float64, rows+2), make([]float64, rows+2)}
}

// factor eliminates the tridiagonal matrix of the shear stresses. Between two
// free-slip walls it is singular; the last pivot then pins the last row, and
// solve takes out the mean.
func (c *channel) factor(sv *Solver) {
	n := sv.l.Z.N
	for j := 1; j <= n+1; j++ {
		c.shear[j] = sv.l.Shear(2, j) * sv.l.Z.RD[j]
	}
	for j := 1; j <= n; j++ {
		c.pivot[j] = c.shear[j] + c.shear[j+1]
		if j > 1 {
			c.pivot[j] -= c.shear[j] * c.shear[j] / c.pivot[j-1]
		}
	}
	if sv.l.Drifts() {
		c.pivot[n] = 1
	}
}

// add adds the mean flow that the residual of x-momentum drives.
func (c *channel) add(sv *Solver, u, r Fields) {
	l := sv.l
	n, columns := l.Z.N, l.X.N
	width := l.X.H[1] * float64(columns)
	for j := 1; j <= n; j++ {
		sum := 0.0
		for _, v := range l.Row(r.X, j)[1 : columns+1] {
			sum += v
		}
		c.flow[j] = sum / width
		if j > 1 {
			c.flow[j] += c.shear[j] * c.flow[j-1] / c.pivot[j-1]
		}
	}
	if l.Drifts() {
		c.flow[n] = 0
	}
	mean, height := 0.0, 0.0
	for j := n; j >= 1; j-- {
		if j < n {
			c.flow[j] += c.shear[j+1] * c.flow[j+1]
		}
		c.flow[j] /= c.pivot[j]
		mean += c.flow[j] * l.Z.H[j]
		height += l.Z.H[j]
	}
	if mean /= height; !l.Drifts() {
		mean = 0
	}
	for j := 1; j <= n; j++ {
		x := l.Row(u.X, j)[1 : columns+1]
		for i := range x {
			x[i] += c.flow[j] - mean
		}
	}
}
