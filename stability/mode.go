package stability

import (
	"math"

	"gonum.org/v1/gonum/floats"

	"example.org/overturn/stability/internal/element"
)

// A Mode is the shape of a disturbance with horizontal wavenumber k. At height
// z and place x it is
//
//	w = Velocity(z) cos kx     u = HorizontalVelocity(z) sin kx
//	θ = Temperature(z) cos kx  ψ = StreamFunction(z) sin kx
//
// with u = ∂ψ/∂z and w = -∂ψ/∂x. Its amplitude is arbitrary: the largest
// Velocity is 1. Lengths are in d, velocities in κ/d, temperatures in the unit of
// the base state. A Mode is immutable and safe for concurrent use.
//
// At zero wavenumber, where temperature is much larger than velocity, Velocity
// is the limit of the velocity divided by k², and so on.
type Mode struct {
	k, frequency float64
	layout       *element.Layout
	system       *system
	re, im       []float64 // coefficients; im is nil without oscillation
	peak         float64
}

// newMode makes a mode of the coefficients of an answer, which it takes over.
func newMode(a *answer) *Mode {
	if a.re == nil {
		return nil
	}
	m := &Mode{k: a.K, frequency: math.Abs(imag(a.Sigma)), layout: a.layout, system: a.system, re: a.re, im: a.im}
	if m.k > 0 {
		m.removeWeights(m.re)
		m.removeWeights(m.im)
	}
	m.normalise()
	return m
}

// removeWeights takes the factor 1/k from constant functions into their
// coefficients.
func (m *Mode) removeWeights(x []float64) {
	for i, f := range m.layout.Fields {
		if c := m.layout.Constant(i); f.Weighted && c >= 0 && x != nil {
			x[c] /= m.k
		}
	}
}

// normalise makes the largest velocity 1 in size, real and positive.
func (m *Mode) normalise() {
	m.peak = m.findPeak()
	re, im := m.value(m.system.velocity, 0, m.peak)
	size := re*re + im*im
	if size == 0 {
		return
	}
	if m.im == nil {
		floats.Scale(1/re, m.re)
		return
	}
	for i, x := range m.re { // divide by re + i im
		y := m.im[i]
		m.re[i], m.im[i] = (x*re+y*im)/size, (y*re-x*im)/size
	}
}

// value returns a derivative of a field at z.
func (m *Mode) value(field, order int, z float64) (re, im float64) {
	if field < 0 {
		return 0, 0
	}
	re = m.layout.Value(field, order, m.re, z)
	if m.im != nil {
		im = m.layout.Value(field, order, m.im, z)
	}
	return re, im
}

// real returns the real part of a derivative of a field.
func (m *Mode) real(field, order int, z float64) float64 {
	if field < 0 {
		return 0
	}
	return m.layout.Value(field, order, m.re, z)
}

// findPeak returns the height of the largest velocity.
func (m *Mode) findPeak() float64 {
	const perElement = 16
	at, largest, step := 0.0, -1.0, 0.0
	for e := range len(m.layout.Nodes) - 1 {
		a, h := m.layout.Nodes[e], m.layout.Nodes[e+1]-m.layout.Nodes[e]
		for i := range perElement + 1 {
			z := a + h*float64(i)/perElement
			re, im := m.value(m.system.velocity, 0, z)
			if v := re*re + im*im; v > largest {
				at, largest, step = z, v, h/perElement
			}
		}
	}
	first, last := m.layout.Nodes[0], m.layout.Nodes[len(m.layout.Nodes)-1]
	return m.climb(at, max(at-step, first), min(at+step, last))
}

// climb finds the maximum of |w|² between two heights, by Newton's method on
// its slope as long as that stays between them, else by halving.
func (m *Mode) climb(z, lo, hi float64) float64 {
	const maxSteps = 60
	for range maxSteps {
		re, im := m.value(m.system.velocity, 0, z)
		re1, im1 := m.value(m.system.velocity, 1, z)
		re2, im2 := m.value(m.system.velocity, 2, z)
		slope := re*re1 + im*im1
		if slope > 0 {
			lo = z
		} else {
			hi = z
		}
		next := z - slope/(re1*re1+im1*im1+re*re2+im*im2)
		if !(next > lo && next < hi) {
			next = (lo + hi) / 2
		}
		if math.Abs(next-z) <= 1e-15*math.Abs(z) {
			return next
		}
		z = next
	}
	return z
}

// Wavenumber returns k.
func (m *Mode) Wavenumber() float64 { return m.k }

// Peak returns the height at which the vertical velocity is largest.
func (m *Mode) Peak() float64 { return m.peak }

// Velocity returns the amplitude of the vertical velocity at height z.
func (m *Mode) Velocity(z float64) float64 { return m.real(m.system.velocity, 0, z) }

// HorizontalVelocity returns the amplitude of the horizontal velocity along x
// at height z, of rolls along y. At zero wavenumber it is the limit of the
// velocity divided by k.
func (m *Mode) HorizontalVelocity(z float64) float64 {
	return -m.real(m.system.velocity, 1, z) / m.perWavenumber()
}

// StreamFunction returns the amplitude of the stream function at height z. At
// zero wavenumber it is the limit of the function divided by k.
func (m *Mode) StreamFunction(z float64) float64 {
	return -m.real(m.system.velocity, 0, z) / m.perWavenumber()
}

// perWavenumber returns k, or 1 in the limit of zero wavenumber.
func (m *Mode) perWavenumber() float64 {
	if m.k == 0 {
		return 1
	}
	return m.k
}

// Temperature returns the amplitude of the temperature at height z.
func (m *Mode) Temperature(z float64) float64 {
	return m.real(m.system.temperature, 0, z) * m.system.scale / m.perWavenumber()
}

// Solute returns the amplitude of the concentration at height z, zero for a
// layer without solute.
func (m *Mode) Solute(z float64) float64 {
	return m.real(m.system.solute, 0, z) * m.system.scale / m.perWavenumber()
}

// Vorticity returns the amplitude of the vertical vorticity at height z, which
// rotation makes: in units of 2Ω times κ/(ν), so that it solves
// (D² - k²)ζ = -Dw at stationary onset.
func (m *Mode) Vorticity(z float64) float64 {
	if m.system.vorticity < 0 {
		return 0
	}
	return m.real(m.system.vorticity, 0, z) / m.system.rotationRoot
}

// AtPhase returns an oscillating mode after a part of its period: phase 2π is
// a whole one. A mode that does not oscillate is returned unchanged.
func (m *Mode) AtPhase(phase float64) *Mode {
	if m.im == nil {
		return m
	}
	out := *m
	sin, cos := math.Sincos(phase)
	out.re, out.im = make([]float64, len(m.re)), make([]float64, len(m.im))
	for i, x := range m.re {
		y := m.im[i]
		out.re[i], out.im[i] = x*cos-y*sin, x*sin+y*cos
	}
	return &out
}
