package multigrid

import "math"

// cutCorners takes over l.Corner, but for walls without shear stress, for rows
// lo ≤ j < hi of 1..nz+1.
func (l *Level) cutCorners(lo, hi int) {
	n, top := l.X.N, l.Z.N+1
	for j := lo; j < hi; j++ {
		en := l.row(l.en, j)
		copy(en, l.row(l.Corner, j))
		if j == 1 && l.Z.Lo == Slip || j == top && l.Z.Hi == Slip {
			clear(en)
		}
		if l.X.Lo == Slip {
			en[1] = 0
		}
		if l.X.Hi == Slip {
			en[n+1] = 0
		}
	}
}

// setDiagonals stores the inverse diagonals of both momentum equations for
// rows lo ≤ j < hi of 1..nz. It reads en up to row hi.
//
//	Dx = dz (2η/dx + 2η left/dx left) + [dx] (η above/[dz above] + η below/[dz])
func (l *Level) setDiagonals(lo, hi int) {
	x, z, n := &l.X, &l.Z, l.X.N
	for j := lo; j < hi; j++ {
		e, en, enUp := l.row(l.Eta, j), l.row(l.en, j), l.row(l.en, j+1)
		ix, iz := l.row(l.ix, j), l.row(l.iz, j)
		dz2, rd, rdUp := 2*z.H[j], z.RD[j], z.RD[j+1]
		for i := x.firstFree(); i <= n; i++ {
			ix[i] = 1 / (dz2*(e[i]*x.RH[i]+e[i-1]*x.RH[i-1]) + x.D[i]*(enUp[i]*rdUp+en[i]*rd))
		}
		l.wrapX(ix)
		if j == 1 {
			continue
		}
		below, dzn := l.row(l.Eta, j-1), z.D[j]
		r2, r2Below := 2*z.RH[j], 2*z.RH[j-1]
		for i := 1; i <= n; i++ {
			iz[i] = 1 / (x.H[i]*(e[i]*r2+below[i]*r2Below) + dzn*(en[i+1]*x.RD[i+1]+en[i]*x.RD[i]))
		}
		l.wrapX(iz)
	}
}

// setDistribution stores the inverse diagonal of div D⁻¹ grad for rows
// lo ≤ j < hi. It reads iz up to row hi.
func (l *Level) setDistribution(lo, hi int) {
	h := l.X.H
	for j := lo; j < hi; j++ {
		ix, iz, izUp, is := l.row(l.ix, j), l.row(l.iz, j), l.row(l.iz, j+1), l.row(l.is, j)
		dz := l.Z.H[j]
		for i := 1; i <= l.X.N; i++ {
			is[i] = 0
			if s := dz*dz*(ix[i]+ix[i+1]) + h[i]*h[i]*(iz[i]+izUp[i]); s > 0 {
				is[i] = 1 / s
			}
		}
	}
}

// WrapViscosity fills the ring around the cells: repeated periodically or, at
// walls, with the value of the neighbour.
func (l *Level) WrapViscosity() {
	n, m := l.X.N, l.Z.N
	for j := 1; j <= m; j++ {
		e := l.row(l.Eta, j)
		e[0], e[n+1] = e[1], e[n]
		l.wrapX(e)
	}
	copy(l.row(l.Eta, 0), l.row(l.Eta, 1))
	copy(l.row(l.Eta, m+1), l.row(l.Eta, m))
}

// coarsenViscosity stores in c, for coarse rows lo ≤ J < hi of 1..nz+1, the
// geometric mean of the children of each cell and the log full weighting
// (1-2-1 in each direction) of fine corners. Both are products of square
// roots, which scale exactly with powers of two.
func (l *Level) coarsenViscosity(c *Level, lo, hi int) {
	mx, mz := l.mx, l.mz
	for J := lo; J < hi; J++ {
		if J <= c.Z.N {
			eta := c.row(c.Eta, J)
			for I := 1; I <= c.X.N; I++ {
				eta[I] = l.childrenMean(mx.node[I], mx.count[I], mz.node[J], mz.count[J])
			}
		}
		k := mz.node[J]
		zSides := mz.twoSided(J)
		corner := c.row(c.Corner, J)
		for I := 1; I <= c.X.N+1; I++ {
			i := mx.node[I]
			v := l.weightedCorner(i, k, mx.twoSided(I))
			if zSides {
				v = quarterMean(l.weightedCorner(i, k-1, mx.twoSided(I)), v, l.weightedCorner(i, k+1, mx.twoSided(I)))
			}
			corner[I] = v
		}
	}
}

// twoSided reports whether coarse node I has a vanishing fine node on each
// side.
func (m *merge) twoSided(I int) bool {
	if m.fine.wraps() {
		return m.lowN[I] > 0 && m.upN[(I-1)%m.coarse.N+1] > 0
	}
	return I > 1 && I <= m.coarse.N && m.count[I-1] > 1 && m.count[I] > 1
}

// weightedCorner is the corner value at (i, j), averaged along x.
func (l *Level) weightedCorner(i, j int, average bool) float64 {
	row := l.row(l.Corner, j)
	if !average {
		return row[i]
	}
	left, right := i-1, i+1
	if l.X.wraps() {
		left, right = (left+l.X.N-1)%l.X.N+1, (right-1)%l.X.N+1
	}
	return quarterMean(row[left], row[i], row[right])
}

// quarterMean is the geometric mean with weights 1/4, 1/2, 1/4.
func quarterMean(a, b, c float64) float64 { return math.Sqrt(b * math.Sqrt(a*c)) }

// childrenMean is the geometric mean of a block of cells.
func (l *Level) childrenMean(i, ni, j, nj int) float64 {
	switch nj {
	case 1:
		return l.rowMean(i, ni, j)
	case 2:
		return math.Sqrt(l.rowMean(i, ni, j) * l.rowMean(i, ni, j+1))
	default:
		return math.Cbrt(l.rowMean(i, ni, j) * l.rowMean(i, ni, j+1) * l.rowMean(i, ni, j+2))
	}
}

func (l *Level) rowMean(i, n, j int) float64 {
	row := l.row(l.Eta, j)
	switch n {
	case 1:
		return row[i]
	case 2:
		return math.Sqrt(row[i] * row[i+1])
	default:
		return math.Cbrt(row[i] * row[i+1] * row[i+2])
	}
}
