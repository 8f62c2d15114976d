package rows

// CentralX stores the flux through the faces 1 to n-1 between the n cells of t,
//
//	f = v·T − c·ΔT,
//
// with T interpolated linearly: wl and wr are the weights of the cells left
// and right of each face, c the conductances. f[0] and f[n] are left alone.
func CentralX(f, t, v, wl, wr, c []float64) {
	n := len(t)
	f, v, wl, wr, c = f[:n], v[:n], wl[:n], wr[:n], c[:n]
	left := t[0]
	for i := 1; i < n; i++ {
		here, u, k := t[i], v[i], c[i]
		f[i] = (u*wl[i]+k)*left + (u*wr[i]-k)*here
		left = here
	}
}

// CentralZ stores the flux through the faces between the rows below and above.
// wb and wa are their weights in the linear interpolation.
func CentralZ(f, below, above, v, c []float64, wb, wa float64) {
	n := len(f)
	below, above, v, c = below[:n], above[:n], v[:n], c[:n]
	for i := range f {
		u, k := v[i], c[i]
		f[i] = (u*wb+k)*below[i] + (u*wa-k)*above[i]
	}
}

// Even holds what a row of CentralEven has in common: velocity enters the
// fluxes by HalfX and HalfZ, the temperature difference by CondX and CondZ, all
// divided by the cell size.
type Even struct{ HalfX, HalfZ, CondX, CondZ float64 }

// CentralEven does the work of CentralX, CentralZ and Update in one go for a
// row of equal cells with equal conductances and no source. left and right are
// the fluxes through its ends, below those through its lower faces; it leaves
// those through the upper ones, to the row above, in below. All fluxes are
// divided by the cell size.
func CentralEven(out, old, t, above, vx, vz, below []float64, left, right float64, e Even, w Weights) {
	n := len(out)
	old, t, above = old[:n], t[:n], above[:n]
	vx, vz, below = vx[:n+1], vz[:n], below[:n]
	here := t[0]
	for i := 0; i < n-1; i++ {
		next, up := t[i+1], above[i]
		u, v := vx[i+1]*e.HalfX, vz[i]*e.HalfZ
		fx := (u+e.CondX)*here + (u-e.CondX)*next
		fz := (v+e.CondZ)*here + (v-e.CondZ)*up
		r := (left - fx) + (below[i] - fz)
		below[i] = fz
		out[i] = w.Old*old[i] + w.Now*here + w.Rate*r
		left, here = fx, next
	}
	v := vz[n-1] * e.HalfZ
	fz := (v+e.CondZ)*here + (v-e.CondZ)*above[n-1]
	r := (left - right) + (below[n-1] - fz)
	below[n-1] = fz
	out[n-1] = w.Old*old[n-1] + w.Now*here + w.Rate*r
}

// ConductX stores the conductive flux through the faces 1 to n-1.
func ConductX(f, t, c []float64) {
	n := len(t)
	f, c = f[:n], c[:n]
	left := t[0]
	for i := 1; i < n; i++ {
		here := t[i]
		f[i] = c[i] * (left - here)
		left = here
	}
}

// ConductZ stores the conductive flux through the faces between two rows.
func ConductZ(f, below, above, c []float64) {
	n := len(f)
	below, above, c = below[:n], above[:n], c[:n]
	for i := range f {
		f[i] = c[i] * (below[i] - above[i])
	}
}

// CentralEvenZ stores in f the fluxes of CentralEven between two rows, to the
// same bits.
func CentralEvenZ(f, below, above, vz []float64, e Even) {
	n := len(f)
	below, above, vz = below[:n], above[:n], vz[:n]
	for i := range f {
		v := vz[i] * e.HalfZ
		f[i] = (v+e.CondZ)*below[i] + (v-e.CondZ)*above[i]
	}
}
