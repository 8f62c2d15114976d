// Package channel solves for the slow flow around a cylinder that moves along a
// channel between two parallel walls.
package channel

import (
	"errors"
	"fmt"
	"math"
	"sync"

	"gonum.org/v1/gonum/integrate/quad"
	"gonum.org/v1/gonum/mat"
)

// MaxRatio is the largest ratio of diameter to wall distance that [Drag] takes:
// beyond it the series needs more terms than we keep.
const MaxRatio = 0.9

// modes is the number of odd Fourier modes on the cylinder.
const modes = 22

// Drag returns F/(μU), the force per length on a rigid cylinder that moves with
// speed U midway between no-slip walls; ratio is its diameter over the distance
// of the walls. The fluid is at rest far away, so that there is no net flux
// through the channel.
//
// Lengths are in half the distance of the walls. The stream function is odd in
// y and even in x, hence a sum of the singular solutions
//
//	y ln r;  y r⁻ᵐ cos mφ, m = 2, 4, ...;  r⁻ⁿ sin nφ, n = 1, 3, ...
//
// each with a Fourier integral that cancels it on the walls (the method of
// Faxén 1946). No slip on the cylinder, mode by mode, gives the coefficients;
// that of y ln r is -F/(4πμU).
func Drag(ratio float64) (float64, error) {
	if !(ratio > 0 && ratio <= MaxRatio) {
		return math.NaN(), fmt.Errorf("ratio of diameter to wall distance is %g, want > 0 and <= %g", ratio, MaxRatio)
	}
	return drag(ratio, modes)
}

func drag(ratio float64, n int) (float64, error) {
	c := cylinder{radius: ratio, n: n, a: mat.NewDense(2*n, 2*n, nil)}
	for j := range 2 * n {
		c.singular(j)
		c.reflected(j)
	}
	// ψ = Uy on r = ratio
	rhs := mat.NewVecDense(2*n, nil)
	rhs.SetVec(0, ratio)
	rhs.SetVec(n, ratio)
	var x mat.VecDense
	var condition mat.Condition
	if err := x.SolveVec(c.a, rhs); err != nil && !errors.As(err, &condition) {
		return math.NaN(), err
	}
	return -4 * math.Pi * x.AtVec(0), nil
}

// cylinder collects the values (rows 0 to n-1) and radial derivatives r∂/∂r
// (rows n to 2n-1) on the cylinder, in sine modes 1, 3, ..., 2n-1, of solutions
// 0 (y ln r), 1 to n (r⁻ⁿ sin nφ) and n+1 to 2n-1 (y r⁻ᵐ cos mφ), of which each
// but the first is scaled to be of order one there.
type cylinder struct {
	radius float64
	n      int
	a      *mat.Dense
}

func (c *cylinder) add(column, mode int, value, power float64) {
	if row := (mode - 1) / 2; row < c.n {
		c.a.Set(row, column, c.a.At(row, column)+value)
		c.a.Set(c.n+row, column, c.a.At(c.n+row, column)+power*value)
	}
}

func (c *cylinder) singular(j int) {
	r := c.radius
	switch {
	case j == 0:
		c.add(0, 1, r*math.Log(r), 1)
		c.a.Set(c.n, 0, c.a.At(c.n, 0)+r)
	case j <= c.n:
		n := 2*j - 1
		c.add(j, n, 1, -float64(n))
	default:
		m := 2 * (j - c.n)
		c.add(j, m+1, 0.5, 1-float64(m))
		c.add(j, m-1, -0.5, 1-float64(m))
	}
}

// reflected adds the wall correction of solution j, ∫ (A sinh ωy + B y cosh ωy)
// cos ωx dω, expanded about the axis:
//
//	sinh ωy cos ωx = Σ ±(ωr)ⁿ/n! sin nφ,  cosh ωy cos ωx = Σ ±(ωr)ᵐ/m! cos mφ.
func (c *cylinder) reflected(j int) {
	source := j
	scale := 1.0
	switch {
	case j == 0:
	case j <= c.n:
		scale = math.Pow(c.radius, float64(2*j-1))
	default:
		m := 2 * (j - c.n)
		scale = math.Pow(c.radius, float64(m-1))
		source = maxModes + j - c.n
	}
	w := wallMoments()[source]
	c.add(j, 1, scale*w.slope*c.radius, 1)
	for k := 1; k < c.n; k++ {
		n, m := 2*k+1, 2*k
		c.add(j, n, scale*w.odd[k]*math.Pow(c.radius, float64(n)), float64(n))
		half := scale * w.even[k] * math.Pow(c.radius, float64(m+1)) / 2
		c.add(j, m+1, half, float64(m+1))
		c.add(j, m-1, -half, float64(m+1))
	}
}

// moments are the coefficients of one wall correction about the axis.
type moments struct {
	slope float64   // of y
	odd   []float64 // at k: of rⁿ sin nφ, n = 2k+1
	even  []float64 // at k: of y rᵐ cos mφ, m = 2k
}

// maxModes is the number of modes that the table of moments is made for.
const maxModes = 24

// wallMoments returns the corrections of y ln r, of r⁻ⁿ sin nφ (n = 1, 3, ...)
// and of y r⁻ᵐ cos mφ (m = 2, 4, ...), in this order. With f and g the
// transforms on the wall of ψ and ∂ψ/∂y of the singular solution,
//
//	A = (g cosh ω - f (cosh ω + ω sinh ω))/D,  B = (f ω cosh ω - g sinh ω)/D,
//	D = sinh ω cosh ω - ω.
var wallMoments = sync.OnceValue(func() []moments {
	const nodes, end = 240, 110.0 // integrands fall like ω^(4 maxModes) e^(-2ω)
	omega, weight := make([]float64, nodes), make([]float64, nodes)
	quad.Legendre{}.FixedLocations(omega, weight, 0, end)
	table := make([]moments, 2*maxModes)
	for s := range table {
		table[s] = moments{odd: make([]float64, maxModes), even: make([]float64, maxModes)}
	}
	for q, w := range omega {
		d := determinant(w)
		rise := -math.Expm1(-2*w) / 2      // e^-ω sinh ω
		cosine := (1 + math.Exp(-2*w)) / 2 // e^-ω cosh ω
		for s := range table {
			var a, b, slope, c float64
			switch {
			case s == 0:
				c, a, b = 1, 1, (1/w-1)*rise-cosine
				slope = w + b - math.Exp(-w)/w*d
			case s <= maxModes:
				n := 2*s - 1
				c = sign(s-1) * powerOverFactorial(w, n-1)
				a, b = -(cosine + w), w
				slope = w * (rise - w)
			default:
				m := 2 * (s - maxModes)
				c = sign(m/2) * powerOverFactorial(w, m-1)
				a, b = -w, w-rise
				slope = w - w*w - rise
			}
			c *= weight[q] / d
			table[s].slope += c * slope
			for k := 1; k < maxModes; k++ {
				table[s].odd[k] += c * a * sign(k) * powerOverFactorial(w, 2*k+1)
				table[s].even[k] += c * b * sign(k) * powerOverFactorial(w, 2*k)
			}
		}
	}
	return table
})

// determinant returns sinh ω cosh ω - ω, by its series where the two cancel.
func determinant(w float64) float64 {
	if w > 1 {
		return math.Sinh(2*w)/2 - w
	}
	x := 2 * w
	term := x * x * x / 6
	sum := 0.0
	for k := 3.0; k < 30; k += 2 {
		sum += term
		term *= x * x / ((k + 1) * (k + 2))
	}
	return sum / 2
}

func powerOverFactorial(x float64, n int) float64 {
	lg, _ := math.Lgamma(float64(n + 1))
	return math.Exp(float64(n)*math.Log(x) - lg)
}

func sign(k int) float64 {
	if k%2 == 0 {
		return 1
	}
	return -1
}
