package multigrid

// The work of a [Solver] on one row at a time. A pass writes the sums of each
// row to memory of that row; they are added up in the order of rows, so that
// the number of goroutines changes no bit of an inner product.

// total adds up the first n sums of each row, in the order of rows whatever
// the number of goroutines.
func (sv *Solver) total(n int) []float64 {
	t := sv.totals[:n]
	clear(t)
	width := len(sv.totals)
	for j := 1; j <= sv.Finest().Z.N; j++ {
		for i, v := range sv.sums[j*width:][:n] {
			t[i] += v
		}
	}
	return t
}

func (sv *Solver) rowSums(j int) []float64 {
	width := len(sv.totals)
	return sv.sums[j*width:][:width]
}

// residualRow computes row j of the residual of X.
func (sv *Solver) residualRow(s *scratch, j int) {
	l := sv.Finest()
	l.operatorRow(s, sv.X, j)
	sv.load.AddRow(j, s.rx, s.rz, s.rp)
	n := l.X.N
	if l.X.wraps() {
		l.wrapX(s.rx)
	} else {
		s.rx[1], s.rx[n+1] = 0, 0
	}
	if j == 1 {
		clear(s.rz)
	}
	rx, rz, rp := l.row(sv.R.X, j), l.row(sv.R.Z, j), l.row(sv.R.P, j)
	copy(rx, s.rx)
	copy(rz, s.rz)
	copy(rp, s.rp)
	ix, iz, eta := l.row(l.ix, j), l.row(l.iz, j), l.row(l.Eta, j)
	rdz, rdn := l.Z.RH[j], l.Z.RD[j]
	var w, u, c float64
	for i := 1; i <= n; i++ {
		xx, zz, pp := rx[i]*rx[i], rz[i]*rz[i], rp[i]*rp[i]*l.X.RH[i]*rdz
		w += xx*ix[i] + zz*iz[i] + pp*eta[i]
		u += xx*l.X.RD[i]*rdz + zz*l.X.RH[i]*rdn
		c += pp
	}
	sums := sv.rowSums(j)
	sums[0], sums[1], sums[2] = w, u, c
}

// applyRow stores in row j of q[k] what the operator makes of z[k], and the
// inner products with the earlier q, itself and the residual.
func (sv *Solver) applyRow(s *scratch, j int) {
	l, k := sv.Finest(), sv.k
	l.operatorRow(s, sv.z[k], j)
	qx, qz, qp := l.row(sv.q[k].X, j), l.row(sv.q[k].Z, j), l.row(sv.q[k].P, j)
	n := len(qx)
	qz, qp = qz[:n], qp[:n]
	rx, rz, rp := s.rx[:n], s.rz[:n], s.rp[:n]
	for i := range qx {
		qx[i], qz[i], qp[i] = -rx[i], -rz[i], -rp[i]
	}
	sv.dotsRow(s, j)
}

// applyAfter does so for rows that become ready one after the other.
func (sv *Solver) applyAfter(s *scratch, j int) {
	l := sv.Finest()
	if j == 1 || s.of != l || s.at != j {
		l.begin(s, sv.z[sv.k], j)
	}
	sv.applyRow(s, j)
	s.of, s.at = l, j+1
}

// dotsRow computes row j of the inner products of q[k] with the earlier q,
// itself and the residual.
func (sv *Solver) dotsRow(s *scratch, j int) {
	l, k := sv.Finest(), sv.k
	qx, qz, qp := l.row(sv.q[k].X, j), l.row(sv.q[k].Z, j), l.row(sv.q[k].P, j)
	n := len(qx)
	qz, qp = qz[:n], qp[:n]
	wx, wz, wp := s.cx[:n], s.cz[:n], s.cp[:n]
	ix, iz, eta, rh := l.row(l.ix, j)[:n], l.row(l.iz, j)[:n], l.row(l.Eta, j)[:n], l.X.RH[:n]
	rdz := l.Z.RH[j]
	for i := range qx {
		wx[i], wz[i], wp[i] = qx[i]*ix[i], qz[i]*iz[i], qp[i]*eta[i]*(rh[i]*rdz)
	}
	sums := sv.rowSums(j)
	for i := 0; i <= k; i++ {
		sums[i] = l.dotRow(s, sv.q[i], j)
	}
	sums[k+1] = l.dotRow(s, sv.R, j)
}

// dotRow is the inner product of row j of u with the weighted row in s.
func (l *Level) dotRow(s *scratch, u Fields, j int) float64 {
	x, z, p := l.row(u.X, j), l.row(u.Z, j), l.row(u.P, j)
	n := len(x) - 1
	x, z, p = x[1:n], z[1:n], p[1:n]
	wx, wz, wp := s.cx[1:n], s.cz[1:n], s.cp[1:n]
	z, p, wx, wz, wp = z[:len(x)], p[:len(x)], wx[:len(x)], wz[:len(x)], wp[:len(x)]
	var a, b, c float64
	for i := range x {
		a += x[i] * wx[i]
		b += z[i] * wz[i]
		c += p[i] * wp[i]
	}
	return a + b + c
}

// updateRow makes row j of q[k] orthogonal to the earlier ones and takes its
// part out of the residual.
func (sv *Solver) updateRow(_ *scratch, j int) {
	l, k := sv.Finest(), sv.k
	qx, qz, qp := l.row(sv.q[k].X, j), l.row(sv.q[k].Z, j), l.row(sv.q[k].P, j)
	for i := range k {
		b := -sv.parts[i]
		addScaled(qx, b, l.row(sv.q[i].X, j))
		addScaled(qz, b, l.row(sv.q[i].Z, j))
		addScaled(qp, b, l.row(sv.q[i].P, j))
	}
	rx, rz, rp := l.row(sv.R.X, j), l.row(sv.R.Z, j), l.row(sv.R.P, j)
	addScaled(rx, -sv.step, qx)
	addScaled(rz, -sv.step, qz)
	addScaled(rp, -sv.step, qp)
	n := len(rx)
	rz, rp = rz[:n], rp[:n]
	ix, iz, eta, rh := l.row(l.ix, j)[:n], l.row(l.iz, j)[:n], l.row(l.Eta, j)[:n], l.X.RH[:n]
	rdz := l.Z.RH[j]
	var a, b, c float64
	for i := 1; i < n-1; i++ {
		a += rx[i] * rx[i] * ix[i]
		b += rz[i] * rz[i] * iz[i]
		c += rp[i] * rp[i] * (eta[i] * rh[i])
	}
	sv.rowSums(j)[0] = a + b + c*rdz
}

// combineRow adds the directions to row j of X.
func (sv *Solver) combineRow(_ *scratch, j int) {
	l := sv.Finest()
	x, z, p := l.row(sv.X.X, j), l.row(sv.X.Z, j), l.row(sv.X.P, j)
	n := l.X.N + 1
	for i := range sv.k {
		c := sv.coeff[i]
		addScaled(x[1:n], c, l.row(sv.z[i].X, j)[1:n])
		if j > 1 {
			addScaled(z[1:n], c, l.row(sv.z[i].Z, j)[1:n])
		}
		addScaled(p[1:n], c, l.row(sv.z[i].P, j)[1:n])
	}
}

func addScaled(dst []float64, c float64, src []float64) {
	src = src[:len(dst)]
	for i := range dst {
		dst[i] += c * src[i]
	}
}

// Operator calls use for each row of the momentum operator of X, integrated
// over control volumes and padded as rows of a level are.
func (sv *Solver) Operator(use func(j int, rx, rz []float64)) {
	l, s := sv.Finest(), sv.s[0]
	l.begin(s, sv.X, 1)
	for j := 1; j <= l.Z.N; j++ {
		l.operatorRow(s, sv.X, j)
		use(j, s.rx, s.rz)
	}
}
