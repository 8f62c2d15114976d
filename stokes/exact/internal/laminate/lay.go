package laminate

import (
	"math"
	"math/cmplx"
)

// A stack is a problem whose layers have found their places, their particular
// solutions and their homogeneous solutions, but not yet the amplitudes of
// these.
type stack struct {
	flow  *Flow
	spans []span
	size  int // number of unknown amplitudes
}

// A span is what is unknown of a layer.
type span struct {
	first int   // number of its first amplitude
	basis []sum // homogeneous solutions
	sheet traction
}

// maxSplit bounds the number of layers into which a thin one is split.
const maxSplit = 64

// lay places the layers, from low to high.
func lay(p Problem) *stack {
	s := &stack{flow: &Flow{k: p.K}}
	flatness := min(1, p.K*totalThickness(p.Layers))
	low := 0.0
	for i, given := range p.Layers {
		parts := split(p.K, given)
		switch {
		case i == 0 && parts == 0:
			s.pushInfinite(given, low, true)
		case parts == 0:
			s.pushInfinite(given, low, false)
		case parts > maxSplit:
			s.pushThick(given, low)
		default:
			s.pushThin(given, low, parts, flatness)
		}
		if parts > 0 {
			low += given.Thickness
		}
		s.spans[len(s.spans)-1].sheet = traction{stressAcross: given.SheetAcross, stressAlong: given.SheetAlong}
	}
	return s
}

func totalThickness(layers []Layer) float64 {
	sum := 0.0
	for _, l := range layers {
		sum += l.Thickness
	}
	return sum
}

// split returns the number of parts in which power series represent a layer:
// more than maxSplit if they should not, zero if the layer is infinite.
func split(k float64, given Layer) int {
	h := k * given.Thickness
	switch parts := math.Ceil(0.5 * h * (1 + math.Abs(given.Growth)/k) / seriesReach); {
	case math.IsInf(h, 1):
		return 0
	case h > thin || parts > maxSplit:
		return maxSplit + 1
	default:
		return int(max(1, parts))
	}
}

// push appends a layer above the others. Its exponents and its loads are those
// of the given one; viscosity is that at the origin.
func (s *stack) push(l layer, basis []sum) {
	if len(s.flow.layers) > 0 {
		s.flow.faces = append(s.flow.faces, l.origin+l.low/s.flow.k)
	}
	s.flow.layers = append(s.flow.layers, l)
	s.spans = append(s.spans, span{first: s.size, basis: basis})
	s.size += len(basis)
}

// pushInfinite appends a layer that reaches down or up to infinity from a
// position. It has only those solutions that decay.
func (s *stack) pushInfinite(given Layer, from float64, down bool) {
	l := newLayer(s.flow.k, from, given)
	l.addPairs(s.flow.k)
	growing, decaying, beta := exponents(l.b)
	p := pair{gamma: decaying, beta: beta}
	if down {
		p.gamma = growing
	}
	s.push(l, l.homogeneous(nil, p, s.flow.k))
}

// pushThick appends a layer that uses exponentials.
func (s *stack) pushThick(given Layer, low float64) {
	k := s.flow.k
	l := newLayer(k, low, given)
	l.high = k * given.Thickness
	l.addPairs(k)
	growing, decaying, beta := exponents(l.b)
	basis := l.homogeneous(nil, pair{gamma: growing, beta: beta, anchor: l.high}, k)
	s.push(l, l.homogeneous(basis, pair{gamma: decaying, beta: beta}, k))
}

// exponents returns −b ± α and β with α + iβ = √(1 + b² + 2ib).
func exponents(b float64) (growing, decaying, beta float64) {
	size := math.Abs(b)
	alpha := math.Sqrt(0.5 * (1 + b*b + math.Hypot(1+b*b, 2*b)))
	beta = size / alpha
	more := alpha + size
	less := (1 + beta*beta) / more // α − |b|, without cancellation
	if b < 0 {
		return more, -less, beta
	}
	return less, -more, beta
}

// homogeneous appends the two solutions of a pair of exponents, of such a size
// that their stresses at the anchor are of order one.
func (l *layer) homogeneous(basis []sum, p pair, k float64) []sum {
	size := 1 / (2 * k * l.viscosity(p.anchor))
	for _, w := range []term{{size, 0}, {0, size}} {
		p.set(w, term{}, l.b)
		basis = append(basis, sum{pairs: []pair{p}})
	}
	return basis
}

// pushThin appends a layer in equal parts that use power series. In a flow
// that is much longer than deep the components of the state differ in size by
// powers of its flatness, and the unknowns are scaled by these.
func (s *stack) pushThin(given Layer, low float64, parts int, flatness float64) {
	k := s.flow.k
	h := given.Thickness / float64(parts)
	for i := range parts {
		middle := (float64(i) + 0.5) * h
		part := given
		part.Viscosity *= math.Exp(given.Growth * middle)
		l := newLayer(k, low+middle, part)
		l.low, l.high = -0.5*k*h, 0.5*k*h
		l.addSeries(k)
		unit := 1 / (2 * k * l.eta)
		var basis []sum
		for _, start := range []profile{
			{w: unit * flatness}, {u: unit}, {g: unit / flatness}, {r: unit / (flatness * flatness)},
		} {
			basis = append(basis, sum{series: newSeries(start, nil, nil, l.b)})
		}
		s.push(l, basis)
	}
}

// newLayer makes a layer from the viscosity and the loads.
func newLayer(k, origin float64, given Layer) layer {
	return layer{
		origin: origin,
		eta:    given.Viscosity,
		b:      given.Growth / (2 * k),
		across: given.Across,
		along:  given.Along,
	}
}

// addPairs adds the particular solution in closed form.
func (l *layer) addPairs(k float64) {
	l.addPair(k, complex(l.across.Mean, 0), complex(l.along.Mean, 0), 0)
	l.addPair(k, l.across.wave(l.origin), 0, l.across.Wavenumber)
	l.addPair(k, 0, l.along.wave(l.origin), l.along.Wavenumber)
}

// addPair adds the particular solution under forces across and along the
// layer that vary as the real part of an amplitude times e^{imz}.
func (l *layer) addPair(k float64, across, along complex128, wavenumber float64) {
	if across == 0 && along == 0 {
		return
	}
	m, unit := wavenumber/k, complex(1/(l.eta*k*k), 0)
	r := complex(-(m*m + 1), -2*m*l.b)
	w := unit * (across + complex(0, m)*along) / (r*r + complex(4*l.b*l.b, 0))
	p := pair{gamma: -2 * l.b, beta: m}
	p.set(realTerm(w, m), realTerm(unit*along, m), l.b)
	l.fields.addPair(p)
}

// realTerm is the real part of amplitude·e^{ims}.
func realTerm(amplitude complex128, m float64) term {
	return term{real(amplitude), -imag(amplitude) * m}
}

// addSeries adds the particular solution as power series, except for that of
// loads that vary too fast; for those the closed form is as good.
func (l *layer) addSeries(k float64) {
	across, along := make([]float64, seriesOrder+1), make([]float64, seriesOrder+1)
	add := func(to []float64, amplitude complex128, wavenumber float64) bool {
		lambda := complex(-2*l.b, wavenumber/k)
		if cmplx.Abs(lambda)*l.high > seriesReach {
			return false
		}
		for n, c := range exponentialSeries(amplitude/complex(l.eta*k*k, 0), lambda) {
			to[n] += c
		}
		return true
	}
	add(across, complex(l.across.Mean, 0), 0)
	add(along, complex(l.along.Mean, 0), 0)
	if wave := l.across.wave(l.origin); !add(across, wave, l.across.Wavenumber) {
		l.addPair(k, wave, 0, l.across.Wavenumber)
	}
	if wave := l.along.wave(l.origin); !add(along, wave, l.along.Wavenumber) {
		l.addPair(k, 0, wave, l.along.Wavenumber)
	}
	l.fields.series = newSeries(profile{}, across, along, l.b)
}
