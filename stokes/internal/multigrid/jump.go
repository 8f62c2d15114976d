package multigrid

// Near a jump of viscosity the distributive sweep smooths badly: a cell on
// the stiff side needs velocity and pressure changed together. There, and
// only there, each level is relaxed cell by cell (Vanka 1986, with the
// diagonal of the momentum equations), which costs nothing where the viscosity
// is smooth.

const (
	jumpRatio   = 20.0 // of viscosities within jumpRadius that makes a jump
	jumpRadius  = 2    // in cells
	jumpsSweeps = 4    // before and after each smoothing
)

// findJumps lists the cells whose neighbourhood holds a jump.
func (l *Level) findJumps() {
	l.jumps = l.jumps[:0]
	n, m := l.X.N, l.Z.N
	for j := 1; j <= m; j++ {
		j0, j1 := max(1, j-jumpRadius), min(m, j+jumpRadius)
		for i := 1; i <= n; i++ {
			lowest, highest := l.Eta[j*l.stride+i], l.Eta[j*l.stride+i]
			for jj := j0; jj <= j1; jj++ {
				for ii := i - jumpRadius; ii <= i+jumpRadius; ii++ {
					c := ii
					if l.X.wraps() {
						c = (ii-1+2*n)%n + 1
					} else if ii < 1 || ii > n {
						continue
					}
					e := l.Eta[jj*l.stride+c]
					lowest, highest = min(lowest, e), max(highest, e)
				}
			}
			if highest > jumpRatio*lowest {
				l.jumps = append(l.jumps, j*l.stride+i)
			}
		}
	}
}

// relaxJumps makes sweeps over the cells near jumps, forwards and backwards in
// turn.
func (l *Level) relaxJumps(sweeps int) {
	if len(l.jumps) == 0 {
		return
	}
	for s := range sweeps {
		for k := range l.jumps {
			if s&1 == 1 {
				k = len(l.jumps) - 1 - k
			}
			l.relaxCell(l.jumps[k])
		}
	}
}

// relaxCell removes the mass defect of one cell together with the momentum
// defects of its four faces, as far as the diagonal knows them.
func (l *Level) relaxCell(c int) {
	w := l.stride
	j, i := c/w, c%w
	dz, dx := l.Z.H[j], l.X.H[i]
	u, r := l.u, c+1
	t := c + w
	ixl, ixr, izb, izt := l.ix[c], l.ix[r], l.iz[c], l.iz[t]
	right := i + 1
	if i == l.X.N && l.X.wraps() {
		right = 1
	}
	rl, rr := l.defectX(i, j), l.defectX(right, j)
	rb, rt := 0.0, 0.0
	if j > 1 {
		rb = l.defectZ(i, j)
	}
	if j < l.Z.N {
		rt = l.defectZ(i, j+1)
	}
	rp := l.f.P[c] + dz*(u.X[r]-u.X[c]) + dx*(u.Z[t]-u.Z[c])
	dp := (dz*(ixl*rl-ixr*rr) + dx*(izb*rb-izt*rt) - rp) * l.is[c]
	u.P[c] += dp
	u.X[c] += ixl * (rl - dz*dp)
	u.X[r] += ixr * (rr + dz*dp)
	u.Z[c] += izb * (rb - dx*dp)
	u.Z[t] += izt * (rt + dx*dp)
	if l.X.wraps() && (i == 1 || i == l.X.N) {
		if i == l.X.N {
			u.X[j*w+1] = u.X[r] // the seam has two slots
		}
		l.wrapX(l.row(u.X, j))
		l.wrapX(l.row(u.Z, j))
		l.wrapX(l.row(u.Z, j+1))
		l.wrapX(l.row(u.P, j))
	}
}

// defectX is the residual of the x-momentum equation at the left face of
// cell (i, j), zero on a wall.
func (l *Level) defectX(i, j int) float64 {
	w := l.stride
	c := j*w + i
	if l.ix[c] == 0 {
		return 0
	}
	x, z, u := &l.X, &l.Z, &l.u
	v := u.X[c]
	west := c - 1
	if i == 1 {
		west = c + x.N - 1
	}
	r := l.f.X[c] + z.H[j]*(2*l.Eta[c]*x.RH[i]*(u.X[c+1]-v)-2*l.Eta[c-1]*x.RH[i-1]*(v-u.X[west])+u.P[c-1]-u.P[c])
	r += l.en[c+w] * (x.D[i]*z.RD[j+1]*(u.X[c+w]-v) + u.Z[c+w] - u.Z[c+w-1])
	r -= l.en[c] * (x.D[i]*z.RD[j]*(v-u.X[c-w]) + u.Z[c] - u.Z[c-1])
	return r
}

// defectZ is the residual of the z-momentum equation at the lower face of
// cell (i, j), zero on a wall.
func (l *Level) defectZ(i, j int) float64 {
	w := l.stride
	c := j*w + i
	if l.iz[c] == 0 {
		return 0
	}
	x, z, u := &l.X, &l.Z, &l.u
	v := u.Z[c]
	r := l.f.Z[c] + x.H[i]*(2*l.Eta[c]*z.RH[j]*(u.Z[c+w]-v)-2*l.Eta[c-w]*z.RH[j-1]*(v-u.Z[c-w])+u.P[c-w]-u.P[c])
	r += l.en[c+1] * (z.D[j]*x.RD[i+1]*(u.Z[c+1]-v) + u.X[c+1] - u.X[c+1-w])
	r -= l.en[c] * (z.D[j]*x.RD[i]*(v-u.Z[c-1]) + u.X[c] - u.X[c-w])
	return r
}
