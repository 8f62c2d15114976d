package rows

import "math"

// Upwind holds the weights of the third-order upwind-biased reconstruction at
// the faces of a row,
//
//	T = C + down·(D − C) + up·(C − U),
//
// where C is the cell that the flow leaves through the face, D the one it
// enters and U the one behind C. Index 0 of a pair is for flow along the axis,
// index 1 for flow against it.
type Upwind struct{ Down, Up [2][]float64 }

// Limited returns the value at a face: C plus the correction down·(D−C) +
// up·(C−U), cut so that it lies between 0 and both D−C and C−U. Then the face
// value lies between C and D, and what leaves C by the correction is a
// non-negative multiple of C−U no larger than itself: no new extrema.
func Limited(u, c, d, down, up float64) float64 {
	fore, aft := d-c, c-u
	if !(fore*aft > 0) {
		return c
	}
	most := math.Abs(fore)
	if a := math.Abs(aft); a < most {
		most = a
	}
	corr := math.Abs(down*fore + up*aft)
	if corr > most {
		corr = most
	}
	return c + math.Copysign(corr, fore)
}

// BoundedX stores the flux through the faces 2 to n-2 between the n cells of t
// with the limited reconstruction. The faces nearer to the ends are left alone.
func BoundedX(f, t, v, c []float64, w *Upwind) {
	n := len(t)
	if n < 4 {
		return
	}
	f, v, c = f[:n], v[:n], c[:n]
	down0, up0 := w.Down[0][:n], w.Up[0][:n]
	down1, up1 := w.Down[1][:n], w.Up[1][:n]
	ll, l, r := t[0], t[1], t[2]
	for i := 2; i < n-1; i++ {
		rr := t[i+1]
		if u := v[i]; u > 0 {
			f[i] = u*Limited(ll, l, r, down0[i], up0[i]) + c[i]*(l-r)
		} else {
			f[i] = u*Limited(rr, r, l, down1[i], up1[i]) + c[i]*(l-r)
		}
		ll, l, r = l, r, rr
	}
}

// BoundedZ stores the flux through the faces between the rows below and above;
// below2 and above2 are the rows behind them. down and up are the weights for
// flow along and against the axis.
func BoundedZ(f, below2, below, above, above2, v, c []float64, down, up [2]float64) {
	n := len(f)
	below2, below, above, above2 = below2[:n], below[:n], above[:n], above2[:n]
	v, c = v[:n], c[:n]
	for i := range f {
		b, a := below[i], above[i]
		if u := v[i]; u > 0 {
			f[i] = u*Limited(below2[i], b, a, down[0], up[0]) + c[i]*(b-a)
		} else {
			f[i] = u*Limited(above2[i], a, b, down[1], up[1]) + c[i]*(b-a)
		}
	}
}
