package multigrid

// A scratch holds the row buffers of one goroutine.
type scratch struct {
	tau, tauUp []float64 // shear stress along the corners below and above a row
	szz, szzUp []float64 // vertical normal stress in the row below and in the row
	sxx        []float64
	rx, rz, rp []float64
	cx, cz, cp []float64

	carry []float64 // restricted z-residuals of the faces inside the last coarse row
	at    int       // fine row that follows it
	of    *Level

	wide []float64 // a row that goes on at both ends
}

func newScratch(stride int) *scratch {
	all := make([]float64, 12*stride)
	next := func() []float64 {
		row := all[:stride:stride]
		all = all[stride:]
		return row
	}
	return &scratch{
		tau: next(), tauUp: next(), szz: next(), szzUp: next(), sxx: next(),
		rx: next(), rz: next(), rp: next(), cx: next(), cz: next(), cp: next(),
		carry: next(), wide: make([]float64, stride+2*beyond),
	}
}

// forget makes the next row start afresh.
func (s *scratch) forget() { s.of = nil }

// begin prepares s for operatorRow from row j upwards.
func (l *Level) begin(s *scratch, u Fields, j int) {
	s.forget()
	l.shearRow(s.tauUp, u, j)
	if j > 1 {
		l.normalRow(s.szzUp, u, j-1)
	}
}

// operatorRow stores in s.rx, s.rz and s.rp row j of the momentum and
// continuity operators of u, integrated over the control volumes,
//
//	rx = dz [sxx] + [dx] (τ above − τ below)
//	rz = dx [szz] + [dz] (τ right − τ left)
//	rp = dz [vx] + dx [vz]
//
// with sxx = 2η ∂vx/∂x − p and so on. It takes from s what the row below left
// there: each stress is computed once. Entries of walls are zero.
func (l *Level) operatorRow(s *scratch, u Fields, j int) {
	s.tau, s.tauUp = s.tauUp, s.tau
	s.szz, s.szzUp = s.szzUp, s.szz
	l.shearRow(s.tauUp, u, j+1)

	n := l.X.N
	vx, low, up, p, eta := l.row(u.X, j), l.row(u.Z, j), l.row(u.Z, j+1), l.row(u.P, j), l.row(l.Eta, j)
	sxx, szz, below, rp := s.sxx[:len(vx)], s.szzUp[:len(vx)], s.szz[:len(vx)], s.rp[:len(vx)]
	low, up, p, eta = low[:len(vx)], up[:len(vx)], p[:len(vx)], eta[:len(vx)]
	h, rh := l.X.H[:len(vx)], l.X.RH[:len(vx)]
	dz, rdz := l.Z.H[j], l.Z.RH[j]
	for i := 1; i < len(vx)-1; i++ {
		e, q := 2*eta[i], p[i]
		a, b := vx[i+1]-vx[i], up[i]-low[i]
		sxx[i] = e*a*rh[i] - q
		szz[i] = e*b*rdz - q
		rp[i] = dz*a + h[i]*b
	}
	tau, tauUp, rx, rz := s.tau[:len(vx)], s.tauUp[:len(vx)], s.rx[:len(vx)], s.rz[:len(vx)]
	d := l.X.D[:len(vx)]
	rx[1], rx[n+1] = 0, 0
	if l.X.wraps() {
		sxx[0] = sxx[n]
		rx[1] = dz*(sxx[1]-sxx[0]) + d[1]*(tauUp[1]-tau[1])
	}
	for i := 2; i < len(vx)-1; i++ {
		rx[i] = dz*(sxx[i]-sxx[i-1]) + d[i]*(tauUp[i]-tau[i])
	}
	if j == 1 {
		clear(rz)
	} else {
		dzn := l.Z.D[j]
		for i := 1; i < len(vx)-1; i++ {
			rz[i] = h[i]*(szz[i]-below[i]) + dzn*(tau[i+1]-tau[i])
		}
	}
	if l.X.wraps() {
		l.wrapX(rx)
		l.wrapX(rz)
		l.wrapX(rp)
	}
}

// shearRow stores the shear stress at corner row j.
func (l *Level) shearRow(tau []float64, u Fields, j int) {
	below, above, vz, en := l.row(u.X, j-1), l.row(u.X, j), l.row(u.Z, j), l.row(l.en, j)
	above, vz, en, tau = above[:len(below)], vz[:len(below)], en[:len(below)], tau[:len(below)]
	rd, rdz := l.X.RD[:len(below)], l.Z.RD[j]
	for i := 1; i < len(below); i++ {
		tau[i] = en[i] * ((above[i]-below[i])*rdz + (vz[i]-vz[i-1])*rd[i])
	}
}

// normalRow stores the vertical normal stress of cell row j.
func (l *Level) normalRow(szz []float64, u Fields, j int) {
	low, up, p, eta := l.row(u.Z, j), l.row(u.Z, j+1), l.row(u.P, j), l.row(l.Eta, j)
	rdz := l.Z.RH[j]
	for i := range p {
		szz[i] = 2*eta[i]*(up[i]-low[i])*rdz - p[i]
	}
}
