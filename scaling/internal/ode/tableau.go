package ode

import (
	"math"
	"sync"

	"gonum.org/v1/gonum/integrate/quad"
)

// stages is the number of collocation points of a step. The last is its end.
const stages = 5

// Order is the order of convergence at the ends of steps, DenseOrder that of
// the largest error in between.
const (
	Order      = 2*stages - 1
	DenseOrder = stages + 1
)

// tableau holds the collocation method in the variable 0 < θ <= 1 of a step.
type tableau struct {
	c [stages]float64
	a [stages][stages]float64 // a[i][j] = ∫₀^c[i] l_j, l_j Lagrange's polynomials on c
	// value[i] are the coefficients of θ, θ², ... of the polynomial that is one
	// at c[i] and zero at 0 and at the other points; integral[i] those of ∫₀^θ l_i.
	value, integral [stages][stages]float64
	// start[i] is the derivative of value[i] at θ = 0.
	start [stages]float64
	// dense is the largest |∫₀^θ Π (1 - σ/c_i) dσ|: the dense error per step and
	// per unit of the defect at θ = 0.
	dense float64
}

var radau = sync.OnceValue(func() *tableau {
	t := &tableau{c: radauPoints()}
	for i := range stages {
		// coefficients of l_i, by multiplying out its factors
		l := [stages + 1]float64{1}
		for j := range stages {
			if j == i {
				continue
			}
			for k := stages; k > 0; k-- {
				l[k] = (l[k-1] - t.c[j]*l[k]) / (t.c[i] - t.c[j])
			}
			l[0] *= -t.c[j] / (t.c[i] - t.c[j])
		}
		for k := range stages {
			t.integral[i][k] = l[k] / float64(k+1)
			t.value[i][k] = l[k] / t.c[i]
		}
		t.start[i] = t.value[i][0]
	}
	for i := range stages {
		for j := range stages {
			t.a[i][j] = horner(&t.integral[j], t.c[i])
		}
	}
	t.dense = t.largestDefectIntegral()
	return t
})

// radauPoints returns the zeros of P₅ - P₄, mapped to (0, 1], by Newton's method
// from those of the like difference of Chebyshev polynomials. One of them is 1.
func radauPoints() (c [stages]float64) {
	for i := range stages {
		x := math.Cos(2 * math.Pi * float64(stages-1-i) / (2*stages - 1))
		for range 30 {
			p, q, dp, dq := 1.0, x, 0.0, 1.0
			for n := 1.0; n < stages; n++ {
				p, q = q, ((2*n+1)*x*q-n*p)/(n+1)
				dp, dq = dq, dp+(2*n+1)*p
			}
			if i < stages-1 {
				x -= (q - p) / (dq - dp)
			}
		}
		c[i] = (1 + x) / 2
	}
	return c
}

func (t *tableau) largestDefectIntegral() float64 {
	nodes, weights := make([]float64, stages), make([]float64, stages)
	largest := 0.0
	// The integral is extreme where its integrand vanishes: at the points c.
	for _, end := range t.c {
		quad.Legendre{}.FixedLocations(nodes, weights, 0, end)
		sum := 0.0
		for k, s := range nodes {
			product := 1.0
			for _, c := range t.c {
				product *= 1 - s/c
			}
			sum += weights[k] * product
		}
		largest = math.Max(largest, math.Abs(sum))
	}
	return largest
}

// horner evaluates Σ c[k] θ^(k+1).
func horner(c *[stages]float64, theta float64) float64 {
	sum := 0.0
	for k := stages - 1; k >= 0; k-- {
		sum = sum*theta + c[k]
	}
	return sum * theta
}
