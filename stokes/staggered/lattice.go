package staggered

import (
	"math"
	"sort"
)

// A lattice is a row-major array of values at the crossings of the
// coordinates xs and zs: the common shape of fields at centres, corners and
// faces.
type lattice struct {
	xs, zs, values []float64
}

// An Extremum is the value and the place of a minimum or maximum.
type Extremum struct {
	Value, X, Z float64
}

// extrema returns the smallest and the largest value, at their first
// occurrence in storage order. One NaN among the values makes both NaN, at the
// place of the NaN.
func (l lattice) extrema() (lowest, highest Extremum) {
	lo, hi := 0, 0
	for j, v := range l.values {
		if math.IsNaN(v) {
			lo, hi = j, j
			break
		}
		if v < l.values[lo] {
			lo = j
		}
		if v > l.values[hi] {
			hi = j
		}
	}
	return l.extremum(lo), l.extremum(hi)
}

func (l lattice) extremum(j int) Extremum {
	n := len(l.xs)
	return Extremum{Value: l.values[j], X: l.xs[j%n], Z: l.zs[j/n]}
}

func (l lattice) fill(f func(x, z float64) float64) {
	n := len(l.xs)
	for k, z := range l.zs {
		row := l.values[k*n:][:n]
		for i, x := range l.xs {
			row[i] = f(x, z)
		}
	}
}

// at interpolates bilinearly between the four nearest points. Between the
// outermost points and the wall it extrapolates linearly.
func (l lattice) at(x, z float64) float64 {
	n := len(l.xs)
	i, fx := bracket(l.xs, x)
	k, fz := bracket(l.zs, z)
	i1, k1 := min(i+1, n-1), min(k+1, len(l.zs)-1)
	lower := (1-fx)*l.values[k*n+i] + fx*l.values[k*n+i1]
	upper := (1-fx)*l.values[k1*n+i] + fx*l.values[k1*n+i1]
	return (1-fz)*lower + fz*upper
}

// bracket returns the index of the interval of c whose line goes through x,
// and the position of x in units of that interval, outside [0, 1] beyond the
// ends of c.
func bracket(c []float64, x float64) (int, float64) {
	if len(c) == 1 {
		return 0, 0
	}
	i := sort.SearchFloat64s(c, x) - 1
	i = max(0, min(i, len(c)-2))
	return i, (x - c[i]) / (c[i+1] - c[i])
}

// clamp moves a point to the nearest point of the box.
func (g *Grid) clamp(x, z float64) (float64, float64) {
	return g.x.clamp(x), g.z.clamp(z)
}

func (a axis) clamp(v float64) float64 {
	return max(a.nodes[0], min(v, a.nodes[len(a.nodes)-1]))
}
