package rows

import "math"

// Weights says how a pass combines the last state, the state at hand and the
// rate of change: Old·old + Now·t + Rate·rate.
type Weights struct{ Old, Now, Rate float64 }

// Fluxes are those through the faces of one row of cells: through the n+1
// faces along it, below it and above it.
type Fluxes struct{ X, Below, Above []float64 }

// Update stores in out the combination w of old, t and the rate
//
//	(f.X[i] − f.X[i+1])·ix + (f.Below[i] − f.Above[i])·iz + scale·source
//
// where ix and iz are the inverse cell sizes. out may be old. A nil source is
// none.
func Update(out, old, t []float64, f *Fluxes, source, ix []float64, iz, scale float64, w Weights) {
	n := len(out)
	old, t, ix = old[:n], t[:n], ix[:n]
	x, below, above := f.X[:n+1], f.Below[:n], f.Above[:n]
	left := x[0]
	if source == nil {
		for i := range out {
			right := x[i+1]
			r := (left-right)*ix[i] + (below[i]-above[i])*iz
			out[i] = w.Old*old[i] + w.Now*t[i] + w.Rate*r
			left = right
		}
		return
	}
	source = source[:n]
	for i := range out {
		right := x[i+1]
		r := (left-right)*ix[i] + (below[i]-above[i])*iz + scale*source[i]
		out[i] = w.Old*old[i] + w.Now*t[i] + w.Rate*r
		left = right
	}
}

// UpdateVarying is Update for a heat capacity that varies from cell to cell:
// the fluxes of temperature, carried, change a cell at once, those of heat,
// conducted, and the source by their share of its capacity. It returns the sum
// of what is carried, capacity·rate·dx.
func UpdateVarying(out, old, t []float64, carried, conducted *Fluxes, source, capacity, dx, ix []float64, iz float64, w Weights) (moved float64) {
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
		out[i] = w.Old*old[i] + w.Now*t[i] + w.Rate*(a+q/c)
	}
	return moved
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

// Peak returns the largest absolute value; +Inf or NaN if there is one. Without
// their sign floating-point numbers sort as integers, NaN last.
func Peak(v []float64) float64 {
	const magnitude = 1<<63 - 1
	var a, b, c, d uint64
	i := 0
	for ; i+4 <= len(v); i += 4 {
		w := v[i : i+4 : i+4]
		a = max(a, math.Float64bits(w[0])&magnitude)
		b = max(b, math.Float64bits(w[1])&magnitude)
		c = max(c, math.Float64bits(w[2])&magnitude)
		d = max(d, math.Float64bits(w[3])&magnitude)
	}
	for ; i < len(v); i++ {
		a = max(a, math.Float64bits(v[i])&magnitude)
	}
	return math.Float64frombits(max(a, b, c, d))
}

// Sound looks at every third value and the last for a NaN or an infinity. A
// rate of change inherits one from its cell and from each neighbour: no more
// need be looked at.
func Sound(rate []float64) (finite bool) {
	sum := 0.0
	for i := 0; i < len(rate); i += 3 {
		sum += rate[i] * 0
	}
	sum += rate[len(rate)-1] * 0
	return sum == 0
}
