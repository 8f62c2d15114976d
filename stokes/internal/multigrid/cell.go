package multigrid

// A cellRow is what the relaxation of the cells of one row reads and writes,
// cut into rows once.
type cellRow struct {
	last            int // column of the right wall or of the seam
	seam            int // where the face in that column is found: itself, or column 1
	bottom, top     bool
	x, xDown, xUp   []float64
	z               [4][]float64 // rows j−1 to j+2
	p, eta          [3][]float64 // rows j−1 to j+1
	en, enUp        []float64
	ix, izLow, izUp []float64
	fx, fzLow, fzUp []float64
	g, is           []float64
	h, rh, d, rd    []float64
	dz, rd0, rd1    float64
	dn0, dn1        float64
	rh0, rh1, rh2   float64
}

func (l *Level) cutRow(j int) cellRow {
	z := &l.Z
	c := cellRow{
		last: l.X.N + 1, seam: l.X.N + 1, bottom: j == 1, top: j == z.N,
		x: l.row(l.u.X, j), xDown: l.row(l.u.X, j-1), xUp: l.row(l.u.X, j+1),
		en: l.row(l.en, j), enUp: l.row(l.en, j+1),
		ix: l.row(l.ix, j), izLow: l.row(l.iz, j), izUp: l.row(l.iz, j+1),
		fx: l.row(l.f.X, j), fzLow: l.row(l.f.Z, j), fzUp: l.row(l.f.Z, j+1),
		g: l.row(l.f.P, j), is: l.row(l.is, j),
		h: l.X.H, rh: l.X.RH, d: l.X.D, rd: l.X.RD,
		dz: z.H[j], rd0: z.RD[j], rd1: z.RD[j+1], dn0: z.D[j], dn1: z.D[j+1],
		rh0: 2 * z.RH[j-1], rh1: 2 * z.RH[j], rh2: 2 * z.RH[j+1],
	}
	for k := range c.z {
		c.z[k] = l.row(l.u.Z, min(j-1+k, z.N+1))
	}
	for k := range c.p {
		c.p[k], c.eta[k] = l.row(l.u.P, j-1+k), l.row(l.Eta, j-1+k)
	}
	if l.X.wraps() {
		c.seam = 1
	}
	return c
}

// relax removes the mass defect of cell i together with the momentum defects
// of its four faces, as far as the diagonal knows them.
func (c *cellRow) relax(i int) {
	right := i + 1
	if right == c.last {
		right = c.seam
	}
	ixl, ixr, izb, izt := c.ix[i], c.ix[i+1], c.izLow[i], c.izUp[i]
	dx, dz := c.h[i], c.dz
	rl, rr, rb, rt := 0.0, 0.0, 0.0, 0.0
	if ixl != 0 {
		rl = c.defectX(i)
	}
	if ixr != 0 {
		rr = c.defectX(right)
	}
	if !c.bottom {
		rb = c.defectZ(i, 1, c.fzLow, c.en, c.xDown, c.x, c.dn0, c.rh0, c.rh1)
	}
	if !c.top {
		rt = c.defectZ(i, 2, c.fzUp, c.enUp, c.x, c.xUp, c.dn1, c.rh1, c.rh2)
	}
	low, up := c.z[1], c.z[2]
	rp := c.g[i] + dz*(c.x[i+1]-c.x[i]) + dx*(up[i]-low[i])
	dp := (dz*(ixl*rl-ixr*rr) + dx*(izb*rb-izt*rt) - rp) * c.is[i]
	c.p[1][i] += dp
	c.x[i] += ixl * (rl - dz*dp)
	c.x[i+1] += ixr * (rr + dz*dp)
	low[i] += izb * (rb - dx*dp)
	up[i] += izt * (rt + dx*dp)
}

// defectX is the residual of the x-momentum equation at face i of the row.
func (c *cellRow) defectX(i int) float64 {
	x, e, p, low, up := c.x, c.eta[1], c.p[1], c.z[1], c.z[2]
	v := x[i]
	r := c.fx[i] + c.dz*(2*(e[i]*c.rh[i]*(x[i+1]-v)-e[i-1]*c.rh[i-1]*(v-x[i-1]))+(p[i-1]-p[i]))
	r += c.enUp[i] * (c.d[i]*c.rd1*(c.xUp[i]-v) + (up[i] - up[i-1]))
	return r - c.en[i]*(c.d[i]*c.rd0*(v-c.xDown[i])+(low[i]-low[i-1]))
}

// defectZ is the residual of the z-momentum equation at face i of the k-th of
// the rows of z, between the rows below and above of x.
func (c *cellRow) defectZ(i, k int, f, en, below, above []float64, dn, rhDown, rhUp float64) float64 {
	down, z, up := c.z[k-1], c.z[k], c.z[k+1]
	v := z[i]
	r := f[i] + c.h[i]*((c.eta[k][i]*rhUp*(up[i]-v)-c.eta[k-1][i]*rhDown*(v-down[i]))+(c.p[k-1][i]-c.p[k][i]))
	r += en[i+1] * (dn*c.rd[i+1]*(z[i+1]-v) + (above[i+1] - below[i+1]))
	return r - en[i]*(dn*c.rd[i]*(v-z[i-1])+(above[i]-below[i]))
}
