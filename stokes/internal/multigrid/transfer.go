package multigrid

// restrict computes the residual of the correction equation of l in the rows
// of coarse cell row J and stores its restriction as the right-hand side of
// that row of c: the transpose of linear interpolation along each component
// and of constants across it. Fine residuals are never stored.
//
// Faces inside the row below reach up to the lower faces of J. If s did not
// come from that row, they are computed again.
func (l *Level) restrict(c *Level, s *scratch, J int) {
	mz := l.mz
	fx, fz, g := c.row(c.f.X, J), c.row(c.f.Z, J), c.row(c.f.P, J)
	clear(fx)
	clear(g)
	first := mz.node[J]
	if s.at != first || s.of != l || J == 1 {
		clear(s.carry)
		if J > 1 {
			first = mz.node[J-1] + 1
		}
		l.begin(s, l.u, first)
	}
	copy(fz, s.carry)
	for j := first; j < mz.node[J+1]; j++ {
		l.operatorRow(s, l.u, j)
		l.addLoad(s, j)
		w := mz.nodeW[j]
		if j < mz.node[J] {
			l.mx.gatherCells(fz, s.rz, w)
			continue
		}
		l.mx.gatherFaces(fx, s.rx)
		l.mx.gatherCells(g, s.rp, 1)
		l.mx.gatherCells(fz, s.rz, 1-w)
		if j == mz.node[J] {
			clear(s.carry)
		} else {
			l.mx.gatherCells(s.carry, s.rz, w)
		}
	}
	s.at, s.of = mz.node[J+1], l
	c.wrapX(fx)
	c.wrapX(fz)
	c.wrapX(g)
}

// restrictAfter restricts the coarse row of which j is the uppermost fine row.
func (l *Level) restrictAfter(c *Level, s *scratch, j int) {
	if J := l.mz.cell[j]; l.mz.cell[j+1] != J {
		l.restrict(c, s, J)
	}
}

// addLoad adds the right-hand side to the operator: s then holds the residual
// of row j.
func (l *Level) addLoad(s *scratch, j int) {
	fx, fz, g := l.row(l.f.X, j), l.row(l.f.Z, j), l.row(l.f.P, j)
	n := len(fx)
	fz, g = fz[:n], g[:n]
	rx, rz, rp := s.rx[:n], s.rz[:n], s.rp[:n]
	for i := range fx {
		rx[i] += fx[i]
		rz[i] += fz[i]
		rp[i] += g[i]
	}
}

// gatherFaces adds to each coarse face of a row what the transpose of linear
// interpolation collects from fine faces.
func (m *merge) gatherFaces(dst, src []float64) {
	n := m.coarse.N
	node, low, up := m.node[:n+1], m.lowN[:n+1], m.upN[:n+1]
	for I := m.coarse.firstFree(); I <= n; I++ {
		i := node[I]
		dst[I] += src[i] + low[I]*src[i-1] + up[I]*src[i+1]
	}
	for _, I := range m.triples {
		i := m.node[I]
		if I >= m.coarse.firstFree() {
			dst[I] += (1 - m.nodeW[i+2]) * src[i+2]
		}
		switch {
		case I < n:
			dst[I+1] += m.nodeW[i+1] * src[i+1]
		case m.fine.wraps():
			dst[1] += m.nodeW[i+1] * src[i+1]
		}
	}
}

// gatherCells adds to each coarse cell of a row the values of its children
// times w.
func (m *merge) gatherCells(dst, src []float64, w float64) {
	if m.allPairs {
		n := m.coarse.N
		dst = dst[1:][:n]
		for I := range dst {
			dst[I] += w * (src[2*I+1] + src[2*I+2])
		}
		return
	}
	for i, I := range m.cell[:m.fine.N+1] {
		if i > 0 {
			dst[I] += w * src[i]
		}
	}
}

// prolong adds the correction of the coarser level c to row j of l: linear
// interpolation of velocities, constants for the pressure.
func (l *Level) prolong(c *Level, s *scratch, j int) {
	mz := l.mz
	t := s.cx[:c.stride]
	low := mz.low[j]
	blend(t, c.row(c.u.X, low), c.row(c.u.X, low+1), mz.lowW[j], mz.upW[j])
	l.mx.spreadFaces(l.row(l.u.X, j), t)
	l.wrapX(l.row(l.u.X, j))

	J := mz.cell[j]
	if j > 1 {
		blend(t, c.row(c.u.Z, J), c.row(c.u.Z, J+1), 1-mz.nodeW[j], mz.nodeW[j])
		l.mx.spreadCentres(l.row(l.u.Z, j), t)
		l.wrapX(l.row(l.u.Z, j))
	}
	p, cp := l.row(l.u.P, j), c.row(c.u.P, J)
	for i, I := range l.mx.cell {
		p[i] += cp[I]
	}
	l.wrapX(p)
}

// blend stores wa·a + wb·b in dst.
func blend(dst, a, b []float64, wa, wb float64) {
	a, b = a[:len(dst)], b[:len(dst)]
	for i := range dst {
		dst[i] = wa*a[i] + wb*b[i]
	}
}

// spreadFaces adds linear interpolation between coarse faces to fine ones.
func (m *merge) spreadFaces(dst, src []float64) {
	n := m.fine.N
	cell, w := m.cell[:n+1], m.nodeW[:n+1]
	dst = dst[:n+1]
	for i := m.fine.firstFree(); i <= n; i++ {
		I := cell[i]
		dst[i] += src[I] + w[i]*(src[I+1]-src[I])
	}
}

// spreadCentres adds linear interpolation between coarse centres to fine ones.
func (m *merge) spreadCentres(dst, src []float64) {
	n := m.fine.N
	low, a, b := m.low[:n+1], m.lowW[:n+1], m.upW[:n+1]
	dst = dst[:n+1]
	for i := 1; i <= n; i++ {
		I := low[i]
		dst[i] += a[i]*src[I] + b[i]*src[I+1]
	}
}
