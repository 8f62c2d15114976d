package exact

import "math"

// rootSteps bounds the search; bisection alone needs some sixty.
const rootSteps = 120

// root returns the zero of a function that falls from lo to hi, by Newton's
// method with bisection where its step leaves the bracket. The function returns
// its value and its slope.
func root(lo, hi float64, f func(x float64) (value, slope float64)) float64 {
	x := hi
	for range rootSteps {
		value, slope := f(x)
		step := value / slope
		if math.Abs(step) <= 2e-16*math.Abs(x) {
			return x // here rounding decides on the sign of the value
		}
		if value > 0 {
			lo = x
		} else {
			hi = x
		}
		next := x - step
		if !(next > lo && next < hi) {
			next = 0.5 * (lo + hi)
		}
		if next == lo || next == hi {
			return next
		}
		x = next
	}
	return x
}
