package element

import (
	"math"
	"sync"

	"example.org/overturn/stability/internal/gauss"
)

// Class is the smoothness of a field from one element to the next.
type Class int

const (
	// C0 fields are continuous: temperature, vorticity.
	C0 Class = iota
	// C1 fields have a continuous slope: the vertical velocity of a viscous fluid.
	C1
)

const maxOrder = 2 // highest derivative in a term

// Local functions of an element of class C0: value at the left and right
// node, bubbles 2 … p, and the constant. Of class C1: value and slope at the
// left node, value and slope at the right node, bubbles 4 … p.
func localCount(c Class, p int) int {
	if c == C0 {
		return p + 2
	}
	return p + 1
}

// A reference holds the local functions and their derivatives at the points
// of a Gauss rule on -1 < ξ < 1. It is never changed once it is made.
type reference struct {
	x, w  []float64
	value [2][maxOrder + 1][]float64 // [class][derivative][function*points+point]
}

type referenceKey struct{ p, points int }

var references sync.Map // of referenceKey to *reference

// referenceOf returns the reference for degree p with a rule of the given
// number of points or a few more.
func referenceOf(p, points int) *reference {
	key := referenceKey{p, points}
	if r, ok := references.Load(key); ok {
		return r.(*reference)
	}
	r, _ := references.LoadOrStore(key, newReference(p, points))
	return r.(*reference)
}

func newReference(p, points int) *reference {
	r := &reference{}
	r.x, r.w = gauss.Rule(points)
	points = len(r.x)
	column := make([]float64, p+2)
	legendre := make([]float64, p+1)
	for _, c := range []Class{C0, C1} {
		for d := range r.value[c] {
			r.value[c][d] = make([]float64, localCount(c, p)*points)
			for q, x := range r.x {
				localFunctions(column, legendre, c, d, p, x)
				for i := range localCount(c, p) {
					r.value[c][d][i*points+q] = column[i]
				}
			}
		}
	}
	return r
}

// localFunctions writes the d-th derivatives in ξ of all local functions at ξ
// = x into dst. The work space legendre has p+1 elements.
func localFunctions(dst, legendre []float64, c Class, d, p int, x float64) {
	legendrePolynomials(legendre, x)
	if c == C0 {
		continuousFunctions(dst, legendre, d, p, x)
		return
	}
	smoothFunctions(dst, legendre, d, p, x)
}

func continuousFunctions(dst, legendre []float64, d, p int, x float64) {
	switch d {
	case 0:
		dst[0], dst[1], dst[p+1] = (1-x)/2, (1+x)/2, 1
	case 1:
		dst[0], dst[1], dst[p+1] = -0.5, 0.5, 0
	default:
		dst[0], dst[1], dst[p+1] = 0, 0, 0
	}
	for n := 2; n <= p; n++ {
		m := float64(2*n - 1)
		switch d {
		case 0:
			dst[n] = (legendre[n] - legendre[n-2]) / math.Sqrt(2*m)
		case 1:
			dst[n] = math.Sqrt(m/2) * legendre[n-1]
		default:
			dst[n] = math.Sqrt(m/2) * legendreSlope(legendre, n-1)
		}
	}
}

func smoothFunctions(dst, legendre []float64, d, p int, x float64) {
	switch d { // the cubics of Hermite
	case 0:
		dst[0], dst[1] = (1-x)*(1-x)*(2+x)/4, (1-x)*(1-x)*(1+x)/4
		dst[2], dst[3] = (1+x)*(1+x)*(2-x)/4, (1+x)*(1+x)*(x-1)/4
	case 1:
		dst[0], dst[1] = 3*(x*x-1)/4, (x-1)*(3*x+1)/4
		dst[2], dst[3] = 3*(1-x*x)/4, (x+1)*(3*x-1)/4
	default:
		dst[0], dst[1] = 1.5*x, (3*x-1)/2
		dst[2], dst[3] = -1.5*x, (3*x+1)/2
	}
	for n := 4; n <= p; n++ {
		m := float64(2*n - 3)
		scale := math.Sqrt(m / 2)
		switch d {
		case 0:
			upper := (legendre[n] - legendre[n-2]) / (m + 2)
			lower := (legendre[n-2] - legendre[n-4]) / (m - 2)
			dst[n] = scale * (upper - lower) / m
		case 1:
			dst[n] = scale * (legendre[n-1] - legendre[n-3]) / m
		default:
			dst[n] = scale * legendre[n-2]
		}
	}
}

// legendrePolynomials writes P₀(x), P₁(x), … into dst.
func legendrePolynomials(dst []float64, x float64) {
	prev, cur := 0.0, 1.0
	for n := range dst {
		dst[n] = cur
		prev, cur = cur, (float64(2*n+1)*x*cur-float64(n)*prev)/float64(n+1)
	}
}

// legendreSlope returns Pₙ'(x) from Pₙ'= Σ (2m+1) Pₘ over m = n-1, n-3, …
func legendreSlope(legendre []float64, n int) float64 {
	sum := 0.0
	for m := n - 1; m >= 0; m -= 2 {
		sum += float64(2*m+1) * legendre[m]
	}
	return sum
}
