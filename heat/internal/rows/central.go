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
