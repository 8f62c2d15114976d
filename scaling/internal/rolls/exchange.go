package rolls

import (
	"fmt"
	"math"

	"gonum.org/v1/gonum/integrate/quad"
	"gonum.org/v1/gonum/mat"
)

// MinPlumeRatio is the smallest plume ratio that [HeatExchange] takes: the
// number of its collocation points grows like 1/√r.
const MinPlumeRatio = 0.005

// HeatExchange returns the heat Q that the layer along the edge of a steady
// roll picks up from one plate.
//
// In von Mises variables (τ the integral of the edge speed along the edge, ψ
// the stream function) the layer obeys T_τ = T_ψψ. The plate, 0 < τ < 1, is
// held at T = 1/2 above the core; the plume, 1 < τ < 1+r, is insulated by
// symmetry; the other half of the loop repeats this with T → -T. Then
// Q(r) = ∫₀¹ -T_ψ dτ. For r → ∞ the plume forgets everything, Q = 1/√π; for
// r → 0 it forgets nothing, Q = 4η(-1/2)/√π with Dirichlet's η.
//
// r must not be below [MinPlumeRatio]. The relative error is about 1e-14.
//
// The problem is that of Roberts (1979), Jimenez and Zufiria (1987) and Chini
// and Cox (2009). The wall flux f obeys an Abel equation,
//
//	∫₀^τ f(s)/√(τ-s) ds + ∫₀¹ f(s) k(τ-s) ds = √π/2,  k(σ) = Σ_{m≥1} (-1)^m/√(σ + m(1+r)),
//
// whose solution is s^(-1/2) times an analytic g(s). We collocate g at
// Chebyshev points, so that the error falls exponentially.
func HeatExchange(r float64) (float64, error) {
	if math.IsInf(r, 1) {
		return 1 / math.Sqrt(math.Pi), nil
	}
	if !(r >= MinPlumeRatio) {
		return math.NaN(), fmt.Errorf("plume ratio is %g, want >= %g", r, MinPlumeRatio)
	}
	n, quadrature := exchangeSizes(r)
	nodes := make([]float64, n) // Chebyshev points on (0, 1)
	for i := range nodes {
		s := math.Sin(math.Pi * (2*float64(i) + 1) / (4 * float64(n)))
		nodes[i] = s * s
	}
	u, wu := make([]float64, quadrature), make([]float64, quadrature)
	quad.Legendre{}.FixedLocations(u, wu, 0, 1)

	a := mat.NewDense(n, n, nil)
	rhs := mat.NewVecDense(n, nil)
	cardinal := make([]float64, n)
	// The Abel integral of g/√s: s = τ sin²ϑ turns it into 2 ∫₀^{π/2} g(τ sin²ϑ) dϑ,
	// which n+1 equal steps integrate exactly.
	for m := range n + 1 {
		sin := math.Sin(math.Pi * (2*float64(m) + 1) / (4 * float64(n+1)))
		for i, tau := range nodes {
			cardinals(cardinal, nodes, tau*sin*sin)
			addRow(a.RawRowView(i), math.Pi/float64(n+1), cardinal)
		}
	}
	// The memory of earlier half loops: s = u² removes the root.
	total := make([]float64, n) // the functional ∫ g/√s ds = Q
	for q := range u {
		cardinals(cardinal, nodes, u[q]*u[q])
		addRow(total, 2*wu[q], cardinal)
		for i, tau := range nodes {
			addRow(a.RawRowView(i), 2*wu[q]*memory(tau-u[q]*u[q], 1+r), cardinal)
		}
	}
	for i := range n {
		rhs.SetVec(i, math.Sqrt(math.Pi)/2)
	}
	var g mat.VecDense
	if err := g.SolveVec(a, rhs); err != nil {
		return math.NaN(), fmt.Errorf("heat exchange at plume ratio %g: %w", r, err)
	}
	return mat.Dot(&g, mat.NewVecDense(n, total)), nil
}

// exchangeSizes returns how many collocation and quadrature points bring the
// error below round-off. The nearest singularity of g lies at s = -r, that of
// the integrand in u at ±√(1+r).
func exchangeSizes(r float64) (collocation, quadrature int) {
	const digits = 37 // -ln 1e-16
	collocation = int(digits/(2*math.Asinh(math.Sqrt(r)))) + 7
	quadrature = int(digits/(4*math.Asinh(math.Sqrt(math.Sqrt(1+r)-1)))) + collocation/2 + 10
	if quadrature == 26 {
		quadrature++ // gonum v0.17.0 has wrong nodes for 26
	}
	return collocation, quadrature
}

// memory returns Σ_{m≥1} (-1)^m/√(σ+mP), σ > -P, by the acceleration of Cohen,
// Rodriguez Villegas and Zagier (2000, algorithm 1): 22 terms give 16 digits of
// an alternating series of moments. The first terms, where σ may nearly cancel
// P, are summed as they are.
func memory(sigma, period float64) float64 {
	const plain, terms = 2, 22
	sum := 0.0
	for m := 1; m <= plain; m++ {
		sum += sign(m) / math.Sqrt(sigma+float64(m)*period)
	}
	d := math.Pow(3+math.Sqrt(8), terms)
	d = (d + 1/d) / 2
	b, c, s := -1.0, -d, 0.0
	for k := range terms {
		c = b - c
		s += c / math.Sqrt(sigma+float64(plain+1+k)*period)
		kk := float64(k)
		b *= (kk + terms) * (kk - terms) / ((kk + 0.5) * (kk + 1))
	}
	return sum + sign(plain+1)*s/d
}

func sign(m int) float64 {
	if m%2 == 0 {
		return 1
	}
	return -1
}

// cardinals fills dst with the values at x of the polynomials that are one at
// one of the Chebyshev nodes and zero at the others (barycentric form).
func cardinals(dst, nodes []float64, x float64) {
	n := len(nodes)
	sum := 0.0
	for i, node := range nodes {
		if x == node {
			clear(dst)
			dst[i] = 1
			return
		}
		w := sign(i) * math.Sin(math.Pi*(2*float64(i)+1)/(2*float64(n)))
		dst[i] = w / (x - node)
		sum += dst[i]
	}
	for i := range dst {
		dst[i] /= sum
	}
}

func addRow(dst []float64, alpha float64, src []float64) {
	for i, v := range src {
		dst[i] += alpha * v
	}
}
