// Package root finds a zero of a continuous function in a bracket.
package root

import (
	"errors"
	"fmt"
	"math"
)

// ErrNoBracket reports that the function has the same sign at both ends.
var ErrNoBracket = errors.New("no sign change in the bracket")

// maxIterations is far above what bisection alone needs to exhaust a float64.
const maxIterations = 200

// Find returns x in [a, b] (or [b, a]) where f changes sign, to within tol in
// x; tol zero means as close as float64 allows. It combines bisection, secant
// and inverse quadratic steps (Brent 1973, ch. 4), so that it never leaves the
// bracket and converges faster than linearly when f is smooth.
func Find(f func(float64) float64, a, b, tol float64) (float64, error) {
	fa, fb := f(a), f(b)
	if fa == 0 {
		return a, nil
	}
	if fb == 0 {
		return b, nil
	}
	if math.IsNaN(fa) || math.IsNaN(fb) || (fa > 0) == (fb > 0) {
		return math.NaN(), fmt.Errorf("%w: f(%g) = %g, f(%g) = %g", ErrNoBracket, a, fa, b, fb)
	}
	c, fc := a, fa
	d, e := b-a, b-a // this step and the one before
	for range maxIterations {
		if (fb > 0) == (fc > 0) {
			c, fc = a, fa
			d = b - a
			e = d
		}
		if math.Abs(fc) < math.Abs(fb) {
			a, b, c = b, c, b
			fa, fb, fc = fb, fc, fb
		}
		half := (c - b) / 2
		width := 2*epsilon*math.Abs(b) + tol/2
		if fb == 0 || math.Abs(half) <= width {
			return b, nil
		}
		d, e = step(a, b, c, fa, fb, fc, d, e, width)
		a, fa = b, fb
		if math.Abs(d) < width {
			d = math.Copysign(width, half)
		}
		b += d
		if fb = f(b); math.IsNaN(fb) {
			return math.NaN(), fmt.Errorf("function is NaN at %g", b)
		}
	}
	return b, nil
}

const epsilon = 0x1p-52

// step proposes the next step d from b and hands back the one before it: an
// interpolated step where that shrinks fast enough, half the bracket otherwise.
func step(a, b, c, fa, fb, fc, d, e, width float64) (next, last float64) {
	half := (c - b) / 2
	if math.Abs(e) < width || math.Abs(fa) <= math.Abs(fb) {
		return half, half
	}
	var p, q float64
	s := fb / fa
	if a == c {
		p, q = 2*half*s, 1-s
	} else {
		q0, r := fa/fc, fb/fc
		p = s * (2*half*q0*(q0-r) - (b-a)*(r-1))
		q = (q0 - 1) * (r - 1) * (s - 1)
	}
	if p > 0 {
		q = -q
	}
	p = math.Abs(p)
	if 2*p < math.Min(3*half*q-math.Abs(width*q), math.Abs(e*q)) {
		return p / q, d
	}
	return half, half
}
