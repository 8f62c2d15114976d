package rows

// Weights says how a pass combines the last state, the state at hand and the
// rate of change: Old·old + Now·t + Rate·rate.
type Weights struct{ Old, Now, Rate float64 }

// Update stores in out the combination w of old, t and the rate
//
//	(fx[i] − fx[i+1])/Δx + (fb[i] − ft[i])/Δz + scale·source
//
// and returns the sum of the rates times Δx, which is not finite if any of the
// rates is not. ix and iz are 1/Δx and 1/Δz. out may be old.
func Update(out, old, t, fx, fb, ft, source, dx, ix []float64, iz, scale float64, w Weights) float64 {
	n := len(out)
	old, t, fb, ft, source = old[:n], t[:n], fb[:n], ft[:n], source[:n]
	dx, ix, fx = dx[:n], ix[:n], fx[:n+1]
	left, sum := fx[0], 0.0
	for i := range out {
		right := fx[i+1]
		r := (left-right)*ix[i] + (fb[i]-ft[i])*iz + scale*source[i]
		sum += r * dx[i]
		out[i] = w.Old*old[i] + w.Now*t[i] + w.Rate*r
		left = right
	}
	return sum
}

// Fluxes are those through the faces of one row of cells: left and right,
// below, above.
type Fluxes struct{ X, Below, Above []float64 }

// UpdateVarying is Update for a heat capacity that varies from cell to cell:
// the fluxes of temperature, carried, change a cell at once, those of heat,
// conducted, and the source by their share of its capacity. With a nil weight
// of capacity the rate is that of temperature. It returns the sums of
// capacity·rate·Δx and of its carried part.
func UpdateVarying(out, old, t []float64, carried, conducted *Fluxes, source, capacity, dx, ix []float64, iz float64, w Weights) (sum, moved float64) {
	n := len(out)
	old, t, source, capacity = old[:n], t[:n], source[:n], capacity[:n]
	dx, ix = dx[:n], ix[:n]
	ax, ab, at := carried.X[:n+1], carried.Below[:n], carried.Above[:n]
	qx, qb, qt := conducted.X[:n+1], conducted.Below[:n], conducted.Above[:n]
	for i := range out {
		a := (ax[i]-ax[i+1])*ix[i] + (ab[i]-at[i])*iz
		q := (qx[i]-qx[i+1])*ix[i] + (qb[i]-qt[i])*iz + source[i]
		c := capacity[i]
		moved += c * a * dx[i]
		sum += (c*a + q) * dx[i]
		out[i] = w.Old*old[i] + w.Now*t[i] + w.Rate*(a+q/c)
	}
	return sum, moved
}

// Sum stores t + k in out.
func Sum(out, t, k []float64) {
	t, k = t[:len(out)], k[:len(out)]
	for i := range out {
		out[i] = t[i] + k[i]
	}
}

// Finish adds 3/2·(u − t) + k/2 to t.
func Finish(t, u, k []float64) {
	u, k = u[:len(t)], k[:len(t)]
	for i, v := range t {
		t[i] = v + (1.5*(u[i]-v) + 0.5*k[i])
	}
}
