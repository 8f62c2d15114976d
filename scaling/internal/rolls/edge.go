package rolls

import (
	"errors"
	"math"

	"gonum.org/v1/gonum/mat"
)

// edge is the grid along one side of a roll. Speed and vorticity behave like
// the power ±1/2 of the distance to a corner, followed by powers that are
// irrational; in the variable t of s = 1/(1+e^-t) they are smooth, so that equal
// steps of t integrate them with an error that falls exponentially.
//
// Along the edge we store vorticity times √(s(1-s)) and speed over √(s(1-s)),
// both of which stay finite and positive at the corners.
type edge struct {
	step float64
	t    []float64
	s, r []float64 // position and its distance 1-s to the other end
	root []float64 // √(s(1-s))
}

const (
	edgeStep = 0.4 // leaves errors near e^(-π²/step)
	edgeEnd  = 21  // the weight of the corner beyond is e^(-3/2 edgeEnd)
)

// newEdge returns a grid fine enough for vorticity that varies over the
// distance d, in lengths of the edge.
func newEdge(d float64) *edge {
	step := edgeStep * math.Min(1, 2.5*d)
	half := int(math.Ceil(edgeEnd / step))
	n := 2*half + 1
	e := &edge{step: step}
	e.t, e.s, e.r, e.root = make([]float64, n), make([]float64, n), make([]float64, n), make([]float64, n)
	for i := range n {
		t := float64(i-half) * step
		e.t[i], e.s[i], e.r[i] = t, 1/(1+math.Exp(-t)), 1/(1+math.Exp(t))
		e.root[i] = 1 / (2 * math.Cosh(t/2))
	}
	return e
}

// integral returns ∫ f ds over the edge for f stored as f/√(s(1-s)).
func (e *edge) integral(f []float64) float64 {
	sum := 0.0
	for i, v := range f {
		sum += v * e.root[i] * e.root[i] * e.root[i]
	}
	return sum * e.step
}

// rootIntegral returns ∫ √|f| ds over the edge for f stored as f√(s(1-s)).
func (e *edge) rootIntegral(f []float64) float64 {
	sum := 0.0
	for i, v := range f {
		sum += math.Sqrt(math.Abs(v)*e.root[i]) * e.root[i]
	}
	return sum * e.step
}

// refined returns the density in t of a vorticity, f ds/dt, on a grid some times
// as fine, by band-limited interpolation.
func (e *edge) refined(f []float64, times int) (t, density []float64) {
	n := len(e.t)
	t, density = make([]float64, (n-1)*times+1), make([]float64, (n-1)*times+1)
	sine := make([]float64, times) // of the fractions of a step
	for k := range sine {
		sine[k] = math.Sin(math.Pi * float64(k) / float64(times))
	}
	for i := range t {
		whole, part := i/times, i%times
		t[i] = e.t[0] + float64(i)*e.step/float64(times)
		if part == 0 {
			density[i] = f[whole] * e.root[whole]
			continue
		}
		sum := 0.0
		for j := range n {
			distance := float64(whole-j) + float64(part)/float64(times)
			sum += sign(whole-j) * f[j] * e.root[j] / distance
		}
		density[i] = sum * sine[part] / math.Pi
	}
	return t, density
}

// alongside returns the matrix that takes the vorticity of two opposite edges
// of unit length and distance d (the other two free of vorticity) to the speed
// along the same edges. In sine modes of wavenumber k it is
// (tanh q + q/cosh²q)/(2k) with q = kd/2. The 1 that this tends to sums to
//
//	(1/2π) ln [sin π(s+s')/2 / |sin π(s-s')/2|],
//
// what is left falls exponentially. The logarithm is integrated as
// Σ_j h (Cin(πj) - γ - ln(π/h)) f_j, exact for band-limited f.
func (e *edge) alongside(d float64) *mat.Dense {
	n := len(e.t)
	a := mat.NewDense(n, n, nil)
	lag := make([]float64, n)
	for j := 1; j < n; j++ {
		lag[j] = cosineIntegral(math.Pi * float64(j))
	}
	rest := e.finiteDistance(d)
	const eulerGamma = 0.57721566490153286061
	for i := range n {
		for j := range n {
			var k float64
			if i == j {
				k = math.Log(2*math.Sin(math.Pi*math.Min(e.s[i], e.r[i]))/(math.Pi*e.s[i]*e.r[i])) +
					eulerGamma + math.Log(math.Pi/e.step)
			} else {
				k = e.logKernel(i, j) + lag[max(i-j, j-i)]
			}
			k = k/(2*math.Pi) + rest.At(i, j)
			a.Set(i, j, e.step*k*e.root[j]/e.root[i])
		}
	}
	return a
}

// logKernel returns ln [sin π(s+s')/2 / sin π|s-s'|/2], with no cancellation.
func (e *edge) logKernel(i, j int) float64 {
	if i > j {
		i, j = j, i
	}
	apart := math.Sinh((e.t[j]-e.t[i])/2) * 2 * e.root[i] * e.root[j]
	return math.Log1p(2 * math.Sin(math.Pi/2*e.r[j]) * math.Sin(math.Pi/2*e.s[i]) / math.Sin(math.Pi/2*apart))
}

// finiteDistance returns the part of the kernel of alongside that depends on
// the distance d.
func (e *edge) finiteDistance(d float64) *mat.Dense {
	n := len(e.t)
	terms := int(math.Ceil(45 / (math.Pi * d)))
	modes := mat.NewDense(n, terms, nil)
	weighted := mat.NewDense(n, terms, nil)
	for m := range terms {
		k := math.Pi * float64(m+1)
		q := k * d / 2
		sech := 1 / math.Cosh(q)
		eps := q*sech*sech - 2/(math.Exp(2*q)+1)
		for i := range n {
			sin := math.Sin(k * math.Min(e.s[i], e.r[i]))
			if m%2 == 1 && e.s[i] > e.r[i] {
				sin = -sin
			}
			modes.Set(i, m, sin)
			weighted.Set(i, m, sin*eps/k)
		}
	}
	var rest mat.Dense
	rest.Mul(weighted, modes.T())
	return &rest
}

// across returns the matrix that takes the vorticity of two opposite edges of
// the given length to the speed along the two edges of length d that join them.
// With P(ξ, s) = Σ e^(-nπξ) sin nπs = sin πs/(4 (sinh² πξ/2 + sin² πs/2)) the
// speed at x from one of them is
//
//	∫ ω Σ_m (-1)^m (m+1) [x (P(x+md) - P(2d-x+md)) + (d-x) (P(d-x+md) - P(d+x+md))] ds
//
// for unit length; other lengths follow by scaling.
func (e *edge) across(length, d float64) *mat.Dense {
	n := len(e.t)
	a := mat.NewDense(n, n, nil)
	ratio := d / length
	images := int(math.Ceil(45/(math.Pi*ratio))) + 1
	sine, half := make([]float64, n), make([]float64, n)
	for j := range n {
		sine[j] = math.Sin(math.Pi * math.Min(e.s[j], e.r[j]))
		half[j] = math.Pow(math.Sin(math.Pi/2*e.s[j]), 2)
	}
	for i := range n {
		x, y := e.s[i]*ratio, e.r[i]*ratio
		row := a.RawRowView(i)
		for m := range images {
			shift := float64(m) * ratio
			near, far := sinhSquared(x+shift), sinhSquared(y+shift)
			near2, far2 := sinhSquared(ratio+y+shift), sinhSquared(ratio+x+shift)
			c := sign(m) * float64(m+1) / 4
			for j := range n {
				row[j] += c * (x/(near+half[j]) - x/(near2+half[j]) + y/(far+half[j]) - y/(far2+half[j]))
			}
		}
		for j := range n {
			row[j] *= length * sine[j] * e.step * e.root[j] / e.root[i]
		}
	}
	return a
}

func sinhSquared(xi float64) float64 {
	s := math.Sinh(math.Pi / 2 * xi)
	return s * s
}

// errDiverged reports that Newton's method failed; no roll width in range does
// that.
var errDiverged = errors.New("vorticity of the plumes did not converge")

// plumeVorticity solves ω·(Rω) = 1 along the plumes by Newton's method, R being
// the response of their speed to their vorticity.
func (e *edge) plumeVorticity(response *mat.Dense) ([]float64, error) {
	n := len(e.t)
	w := make([]float64, n)
	for i := range w {
		w[i] = 1
	}
	jac := mat.NewDense(n, n, nil)
	rhs := mat.NewVecDense(n, nil)
	for range 40 {
		v := product(response, w)
		worst := 0.0
		for i := range n {
			f := 1 - w[i]*v[i]
			worst = math.Max(worst, math.Abs(f))
			rhs.SetVec(i, f)
			row, from := jac.RawRowView(i), response.RawRowView(i)
			for j := range n {
				row[j] = w[i] * from[j]
			}
			row[i] += v[i]
		}
		if worst < 1e-11 {
			return w, nil
		}
		var delta mat.VecDense
		if err := delta.SolveVec(jac, rhs); ill(err) {
			return nil, err
		}
		for i := range w {
			// Stay positive: at most a halving a step.
			w[i] = math.Max(w[i]+delta.AtVec(i), w[i]/2)
		}
	}
	return nil, errDiverged
}

// cosineIntegral returns Ci(x) for x >= 2 as the real part of -E₁(ix), by the
// continued fraction 1/(z+1-1/(z+3-4/(z+5-...))) in Lentz's form.
func cosineIntegral(x float64) float64 {
	z := complex(0, x)
	b := z + 1
	d := 1 / b
	c := complex(1e300, 0)
	h := d
	for i := 1; i < 500; i++ {
		a := complex(-float64(i)*float64(i), 0)
		b += 2
		d = 1 / (a*d + b)
		c = b + a/c
		del := c * d
		h *= del
		if math.Abs(real(del)-1)+math.Abs(imag(del)) < 1e-16 {
			break
		}
	}
	sin, cos := math.Sincos(x)
	return -real(h * complex(cos, -sin))
}
