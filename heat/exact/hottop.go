package exact

import "math"

// HotTop is the steady box whose top z = Height is at the temperature Top and
// whose other walls are at Others (Carslaw & Jaeger 1959, 5.3; section from
// memory):
//
//	T = Others + (Top − Others) Σ 4/(mπ) sin(mπx/W) sinh(mπz/W)/sinh(mπH/W), m odd.
//
// The sum converges slowly near the top. It is evaluated as a sum of images,
// each of which is a strip's closed form (2/π) atan(sin(πx/W)/sinh(πd/W)), d
// being the distance from the image of the top. In the corners of the top the
// temperature is that of the side wall and the flux infinite.
type HotTop struct {
	Material
	Width, Height float64 // W and H; default 1
	Top, Others   float64 // temperatures
}

func (s HotTop) state(x, z, _ float64) State {
	if s.Top == s.Others {
		return State{Temperature: s.Top}
	}
	w, h := orOne(s.Width), orOne(s.Height)
	var theta, slopeX, slopeZ float64
	for k := 0.0; ; k++ {
		down, up := 2*k*h+h-z, 2*k*h+h+z
		t1, x1, d1 := strip(x/w, down/w)
		t2, x2, d2 := strip(x/w, up/w)
		theta += t1 - t2
		slopeX += x1 - x2
		slopeZ -= d1 + d2
		if down > 13*w { // exp(−13π) is below rounding
			break
		}
	}
	step, k := s.Top-s.Others, s.conductivity()
	return State{Temperature: s.Others + step*theta, FluxX: -k * step * slopeX / w, FluxZ: -k * step * slopeZ / w}
}

// strip returns the temperature in a half-infinite strip of width 1 whose end
// is at 1 and whose sides are at 0, at the distance d from the end, and its
// slopes in x and d.
func strip(x, d float64) (theta, slopeX, slopeD float64) {
	if d > 100 {
		return 0, 0, 0
	}
	sin, cos := math.Sincos(math.Pi * x)
	if x >= 1 {
		sin = 0
	}
	sinh, cosh := math.Sinh(math.Pi*d), math.Cosh(math.Pi*d)
	if sin == 0 && sinh == 0 {
		// A corner. The side wall's temperature, and infinite flux.
		return 0, math.Copysign(far, cos), -far
	}
	square := sin*sin + sinh*sinh
	return 2 / math.Pi * math.Atan2(sin, sinh), 2 * cos * sinh / square, -2 * sin * cosh / square
}

// Solve implements [Problem].
func (s HotTop) Solve() (Solution, error) { return checked(s) }

// At implements [Solution].
func (s HotTop) At(x, z, t float64) State { return inside(s, x, z, t) }

// Medium implements [Solution].
func (s HotTop) Medium(_, _, _ float64) Medium { return s.medium() }

// Domain implements [Solution]: the box.
func (s HotTop) Domain() Domain { return rectangle(orOne(s.Width), orOne(s.Height), forever) }

// Validate implements [Solution].
func (s HotTop) Validate() error {
	return first(
		s.check("HotTop"),
		notNegative("HotTop.Width", s.Width),
		notNegative("HotTop.Height", s.Height),
		anyFinite("HotTop.Top", s.Top),
		anyFinite("HotTop.Others", s.Others),
	)
}
