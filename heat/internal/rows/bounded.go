package rows

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
	corr := 0.0
	if fore > 0 {
		if aft > 0 {
			corr = min(down*fore+up*aft, fore, aft)
		}
	} else if aft < 0 {
		corr = max(down*fore+up*aft, fore, aft)
	}
	return c + corr
}

// BoundedX stores the flux through the faces 2 to n-2 between the n cells of t
// with the limited reconstruction. The faces nearer to the ends are left alone.
//
// The limiter is that of Limited, written out: the compiler would call it.
func BoundedX(f, t, v, c []float64, w *Upwind) {
	n := len(t)
	if n < 4 {
		return
	}
	f, v, c = f[:n], v[:n], c[:n]
	down0, up0 := w.Down[0][:n], w.Up[0][:n]
	down1, up1 := w.Down[1][:n], w.Up[1][:n]
	l, r := t[1], t[2]
	before, here := l-t[0], r-l // differences across the faces i-1 and i
	for i := 2; i < n-1; i++ {
		rr := t[i+1]
		after := rr - r
		u, corr := v[i], 0.0
		if u > 0 {
			if here > 0 {
				if before > 0 {
					corr = down0[i]*here + up0[i]*before
					if corr > here {
						corr = here
					}
					if corr > before {
						corr = before
					}
				}
			} else if before < 0 {
				corr = down0[i]*here + up0[i]*before
				if corr < here {
					corr = here
				}
				if corr < before {
					corr = before
				}
			}
			f[i] = u*(l+corr) - c[i]*here
		} else {
			if here > 0 {
				if after > 0 {
					corr = down1[i]*here + up1[i]*after
					if corr > here {
						corr = here
					}
					if corr > after {
						corr = after
					}
				}
			} else if after < 0 {
				corr = down1[i]*here + up1[i]*after
				if corr < here {
					corr = here
				}
				if corr < after {
					corr = after
				}
			}
			f[i] = u*(r-corr) - c[i]*here
		}
		l, r, before, here = r, rr, here, after
	}
}

// BoundedZ stores the flux through the faces between the rows below and above;
// below2 and above2 are the rows behind them. down and up are the weights for
// flow along and against the axis.
func BoundedZ(f, below2, below, above, above2, v, c []float64, down, up [2]float64) {
	n := len(f)
	below2, below, above, above2 = below2[:n], below[:n], above[:n], above2[:n]
	v, c = v[:n], c[:n]
	down0, up0, down1, up1 := down[0], up[0], down[1], up[1]
	for i := range f {
		b, a := below[i], above[i]
		here := a - b
		u, corr := v[i], 0.0
		if u > 0 {
			before := b - below2[i]
			if here > 0 {
				if before > 0 {
					corr = down0*here + up0*before
					if corr > here {
						corr = here
					}
					if corr > before {
						corr = before
					}
				}
			} else if before < 0 {
				corr = down0*here + up0*before
				if corr < here {
					corr = here
				}
				if corr < before {
					corr = before
				}
			}
			f[i] = u*(b+corr) - c[i]*here
		} else {
			after := above2[i] - a
			if here > 0 {
				if after > 0 {
					corr = down1*here + up1*after
					if corr > here {
						corr = here
					}
					if corr > after {
						corr = after
					}
				}
			} else if after < 0 {
				corr = down1*here + up1*after
				if corr < here {
					corr = here
				}
				if corr < after {
					corr = after
				}
			}
			f[i] = u*(a-corr) - c[i]*here
		}
	}
}
