package multigrid

// A rowMetric holds the vertical distances that the relaxation of a cell
// needs, the same for all cells of a row.
type rowMetric struct {
	dz                 float64
	rdLow, rdUp        float64 // inverse distances across the lower and upper corners
	dLow, dUp          float64 // heights of the control volumes of the lower and upper faces
	rhBelow, rh, rhTop float64 // twice the inverse heights of the cells below, here and above
	top                bool    // no face above the upper one
}

func (l *Level) rowMetric(j int) rowMetric {
	z := &l.Z
	return rowMetric{
		dz: z.H[j], rdLow: z.RD[j], rdUp: z.RD[j+1], dLow: z.D[j], dUp: z.D[j+1],
		rhBelow: 2 * z.RH[j-1], rh: 2 * z.RH[j], rhTop: 2 * z.RH[j+1], top: j == z.N,
	}
}

// relaxCell removes the mass defect of cell i of row j together with the
// momentum defects of its four faces, as far as the diagonal knows them. What
// it computes for faces on walls is finite and multiplied by zero.
func (l *Level) relaxCell(m *rowMetric, j, i int) {
	w := l.stride
	c := j*w + i
	n, s, e := c+w, c-w, c+1 // the cells above, below and to the right
	x, z, p, eta, en := l.u.X, l.u.Z, l.u.P, l.Eta, l.en
	dx, dxl, dxr := l.X.H[i], l.X.D[i], l.X.D[i+1]
	rdl, rdr, rh := l.X.RD[i], l.X.RD[i+1], 2*l.X.RH[i]

	left, right, low, up := x[c], x[e], z[c], z[n]
	pc, stiff := p[c], eta[c]
	shearSW, shearSE, shearNW, shearNE := en[c], en[e], en[n], en[n+1]
	zSW, zSE, zNW, zNE := z[c-1], z[e], z[n-1], z[n+1]
	xSW, xSE, xNW, xNE := x[s], x[s+1], x[n], x[n+1]

	beyond := x[c+2]
	if i == l.X.N && l.X.wraps() {
		beyond = x[j*w+2]
	}
	above := 0.0
	if !m.top {
		above = z[n+w]
	}
	stretchX, stretchZ := stiff*rh*(right-left), stiff*m.rh*(up-low)

	// Terms shared by the two faces that meet at a corner.
	vSW, vSE, vNW, vNE := low-zSW, zSE-low, up-zNW, zNE-up
	hSW, hSE, hNW, hNE := left-xSW, right-xSE, xNW-left, xNE-right

	rl := l.f.X[c] + m.dz*(stretchX-eta[c-1]*2*l.X.RH[i-1]*(left-x[c-1])+(p[c-1]-pc)) +
		shearNW*(dxl*m.rdUp*hNW+vNW) - shearSW*(dxl*m.rdLow*hSW+vSW)
	rr := l.f.X[e] + m.dz*(eta[e]*2*l.X.RH[i+1]*(beyond-right)-stretchX+(pc-p[e])) +
		shearNE*(dxr*m.rdUp*hNE+vNE) - shearSE*(dxr*m.rdLow*hSE+vSE)
	rb := l.f.Z[c] + dx*(stretchZ-eta[s]*m.rhBelow*(low-z[s])+(p[s]-pc)) +
		shearSE*(m.dLow*rdr*vSE+hSE) - shearSW*(m.dLow*rdl*vSW+hSW)
	rt := l.f.Z[n] + dx*(eta[n]*m.rhTop*(above-up)-stretchZ+(pc-p[n])) +
		shearNE*(m.dUp*rdr*vNE+hNE) - shearNW*(m.dUp*rdl*vNW+hNW)
	rp := l.f.P[c] + m.dz*(right-left) + dx*(up-low)

	ixl, ixr, izb, izt := l.ix[c], l.ix[e], l.iz[c], l.iz[n]
	dp := (m.dz*(ixl*rl-ixr*rr) + dx*(izb*rb-izt*rt) - rp) * l.is[c]
	p[c] = pc + dp
	x[c] = left + ixl*(rl-m.dz*dp)
	x[e] = right + ixr*(rr+m.dz*dp)
	z[c] = low + izb*(rb-dx*dp)
	z[n] = up + izt*(rt+dx*dp)
}
