package multigrid

// The distributive Gauss-Seidel sweep of Brandt & Dinar (1979), red-black and
// with corrections weighted by the inverse diagonal of the momentum
// equations: eight passes over the rows. Each is a function of one row so that
// a [pipeline] can take a row through all of them while it is in cache.
//
// Corrections vanish on walls. There ix and iz are zero, so the passes need
// not know about walls at all.

// startX is the first half of relaxX when all unknowns are zero, whatever the
// arrays hold: it clears row j and makes the red equations exact.
func (l *Level) startX(j int) {
	v := l.row(l.u.X, j)
	clear(v)
	clear(l.row(l.u.Z, j))
	clear(l.row(l.u.P, j))
	n := len(v)
	f, ix := l.row(l.f.X, j)[:n], l.row(l.ix, j)[:n]
	first := l.X.firstFree()
	for i := first + (first+j)&1; i < n-1; i += 2 {
		v[i] = f[i] * ix[i]
	}
	l.wrapX(v)
}

// relaxX makes one colour of the x-momentum equations of row j exact.
func (l *Level) relaxX(j, colour int) {
	v, down, up := l.row(l.u.X, j), l.row(l.u.X, j-1), l.row(l.u.X, j+1)
	n := len(v)
	down, up = down[:n], up[:n]
	low, high := l.row(l.u.Z, j)[:n], l.row(l.u.Z, j+1)[:n]
	p, e, f, ix := l.row(l.u.P, j)[:n], l.row(l.Eta, j)[:n], l.row(l.f.X, j)[:n], l.row(l.ix, j)[:n]
	en, enUp := l.row(l.en, j)[:n], l.row(l.en, j+1)[:n]
	rh, d := l.X.RH[:n], l.X.D[:n]
	dz, rd, rdUp := l.Z.H[j], l.Z.RD[j], l.Z.RD[j+1]
	dz2 := 2 * dz
	first := l.X.firstFree()
	for i := first + (first+j+colour)&1; i < n-1; i += 2 {
		c := d[i]
		a := f[i] + dz2*(e[i]*rh[i]*v[i+1]+e[i-1]*rh[i-1]*v[i-1]) + dz*(p[i-1]-p[i])
		a += enUp[i] * (c*rdUp*up[i] + (high[i] - high[i-1]))
		a += en[i] * (c*rd*down[i] - (low[i] - low[i-1]))
		v[i] = a * ix[i]
	}
	l.wrapX(v)
}

// relaxZ makes one colour of the z-momentum equations of row j exact.
func (l *Level) relaxZ(j, colour int) {
	if j == 1 {
		return
	}
	v, down, up := l.row(l.u.Z, j), l.row(l.u.Z, j-1), l.row(l.u.Z, j+1)
	n := len(v)
	down, up = down[:n], up[:n]
	below, x := l.row(l.u.X, j-1)[:n], l.row(l.u.X, j)[:n]
	pDown, p := l.row(l.u.P, j-1)[:n], l.row(l.u.P, j)[:n]
	eDown, e := l.row(l.Eta, j-1)[:n], l.row(l.Eta, j)[:n]
	f, iz, en := l.row(l.f.Z, j)[:n], l.row(l.iz, j)[:n], l.row(l.en, j)[:n]
	h, rd := l.X.H[:n], l.X.RD[:n]
	dzn, r2, r2Down := l.Z.D[j], 2*l.Z.RH[j], 2*l.Z.RH[j-1]
	for i := 1 + (1+j+colour)&1; i < n-1; i += 2 {
		a := f[i] + h[i]*(e[i]*r2*up[i]+eDown[i]*r2Down*down[i]+(pDown[i]-p[i]))
		a += en[i+1] * (dzn*rd[i+1]*v[i+1] + (x[i+1] - below[i+1]))
		a += en[i] * (dzn*rd[i]*v[i-1] - (x[i] - below[i]))
		v[i] = a * iz[i]
	}
	l.wrapX(v)
}

// pressBefore lowers the pressure by 2η times the mass defect of each cell of
// row j. Together with pressAfter, which takes back what is left of the
// defect, this is the pressure part of the distribution: the change of the
// defect says by how much.
func (l *Level) pressBefore(j int) {
	x, p := l.row(l.u.X, j), l.row(l.u.P, j)
	n := len(x)
	p = p[:n]
	low, high := l.row(l.u.Z, j)[:n], l.row(l.u.Z, j+1)[:n]
	g, e := l.row(l.f.P, j)[:n], l.row(l.Eta, j)[:n]
	h, rh := l.X.H[:n], l.X.RH[:n]
	dz, r2 := l.Z.H[j], 2*l.Z.RH[j]
	for i := 1; i < n-1; i++ {
		r := g[i] + dz*(x[i+1]-x[i]) + h[i]*(high[i]-low[i])
		p[i] -= e[i] * r * (r2 * rh[i])
	}
}

// pressAfter finishes what pressBefore began, for the red cells of row j; the
// black ones, corrected last, have no defect left.
func (l *Level) pressAfter(j int) {
	x, p := l.row(l.u.X, j), l.row(l.u.P, j)
	n := len(x)
	p = p[:n]
	low, high := l.row(l.u.Z, j)[:n], l.row(l.u.Z, j+1)[:n]
	g, e := l.row(l.f.P, j)[:n], l.row(l.Eta, j)[:n]
	h, rh := l.X.H[:n], l.X.RH[:n]
	dz, r2 := l.Z.H[j], 2*l.Z.RH[j]
	for i := 1 + (1+j)&1; i < n-1; i += 2 {
		r := g[i] + dz*(x[i+1]-x[i]) + h[i]*(high[i]-low[i])
		p[i] += e[i] * r * (r2 * rh[i])
	}
	l.wrapX(p)
}

// distribute removes the mass defect of one colour of the cells of row j by
// changing the velocities of their faces, most where the fluid is weakest.
func (l *Level) distribute(j, colour int) {
	x := l.row(l.u.X, j)
	n := len(x)
	low, high := l.row(l.u.Z, j)[:n], l.row(l.u.Z, j+1)[:n]
	g, is := l.row(l.f.P, j)[:n], l.row(l.is, j)[:n]
	ix, iz, izUp := l.row(l.ix, j)[:n], l.row(l.iz, j)[:n], l.row(l.iz, j+1)[:n]
	h := l.X.H[:n]
	dz := l.Z.H[j]
	seam := x[1]
	for i := 1 + (1+j+colour)&1; i < n-1; i += 2 {
		r := g[i] + dz*(x[i+1]-x[i]) + h[i]*(high[i]-low[i])
		c := r * is[i]
		a, b := dz*c, h[i]*c
		x[i] += a * ix[i]
		x[i+1] -= a * ix[i+1]
		low[i] += b * iz[i]
		high[i] -= b * izUp[i]
	}
	if l.X.wraps() {
		// The face at the seam has two slots: add up what each received.
		x[1] += x[n-1] - seam
		l.wrapX(x)
		l.wrapX(low)
		l.wrapX(high)
	}
}
