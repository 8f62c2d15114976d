package piecewise

import "math"

const (
	cells = 16 // of an interval that is searched

	// Closing in on a place of a smooth function by a factor of cells makes
	// its first differences smaller by that factor and its second differences
	// by the square of it. A jump keeps the first ones, a kink loses one
	// factor only.
	jumpKept = 0.5
	kinkKept = 0.3

	// A kink is located to this part of the interval by second differences;
	// closer in, they drown in round-off. Extrapolation from both sides, over
	// so many times the distance, then does the rest.
	kinkWidth = 1e-6
	kinkReach = 20
)

// findEdge looks for a jump, then for a kink of f between a and b.
func findEdge(f func(float64) float64, a, b float64) (float64, bool) {
	if z, ok := findJump(f, a, b); ok {
		return z, true
	}
	return findKink(f, a, b)
}

func findJump(f func(float64) float64, a, b float64) (float64, bool) {
	first := math.Inf(1)
	for {
		at, size := largestStep(f, a, b)
		if size == 0 || !math.IsInf(first, 1) && size < jumpKept*first {
			return 0, false
		}
		if math.IsInf(first, 1) {
			first = size
		}
		h := (b - a) / cells
		lo, hi := a+float64(at)*h, a+float64(at+1)*h
		if lo <= a && hi >= b || hi-lo <= 4e-16*math.Abs(hi) {
			return hi, true
		}
		a, b = lo, hi
	}
}

// largestStep returns the cell over which f changes most.
func largestStep(f func(float64) float64, a, b float64) (at int, size float64) {
	h := (b - a) / cells
	prev := f(a)
	for i := range cells {
		v := f(a + float64(i+1)*h)
		if d := math.Abs(v - prev); d > size {
			at, size = i, d
		}
		prev = v
	}
	return at, size
}

func findKink(f func(float64) float64, a, b float64) (float64, bool) {
	width, last := b-a, math.Inf(1)
	for {
		at, size := largestBend(f, a, b)
		h := (b - a) / cells
		// The interval shrinks by a factor of cells/2, and so does the bend of a kink.
		if size == 0 || !math.IsInf(last, 1) && size < kinkKept*last/(cells/2) {
			return 0, false
		}
		last = size
		middle := a + float64(at)*h
		a, b = middle-h, middle+h
		if b-a <= kinkWidth*width {
			return meet(f, middle, kinkReach*(b-a)), true
		}
	}
}

// meet returns where the parabolas through three points on each side of a kink
// near z meet; the points are at multiples of h from z.
func meet(f func(float64) float64, z, h float64) float64 {
	var c [2][3]float64 // value, slope and curvature at z, in units of h
	for side, s := range []float64{-1, 1} {
		f1, f2, f3 := f(z+s*h), f(z+2*s*h), f(z+3*s*h)
		bend := f1 - 2*f2 + f3
		c[side] = [3]float64{3*f1 - 3*f2 + f3, s * (-2.5*f1 + 4*f2 - 1.5*f3), bend}
	}
	t := 0.0
	for range 4 { // Newton's method on the difference
		gap := c[1][0] - c[0][0] + t*(c[1][1]-c[0][1]+t*(c[1][2]-c[0][2])/2)
		slope := c[1][1] - c[0][1] + t*(c[1][2]-c[0][2])
		if slope == 0 {
			break
		}
		t -= gap / slope
	}
	if !(math.Abs(t) < 1) {
		return z
	}
	return z + t*h
}

// largestBend returns the inner grid point where the slope of f changes most.
func largestBend(f func(float64) float64, a, b float64) (at int, size float64) {
	h := (b - a) / cells
	var v [cells + 1]float64
	for i := range v {
		v[i] = f(a + float64(i)*h)
	}
	for i := 1; i < cells; i++ {
		if d := math.Abs(v[i+1] - 2*v[i] + v[i-1]); d > size {
			at, size = i, d
		}
	}
	return at, size
}
