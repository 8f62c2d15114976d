package laminate

import "math"

// A profile is the value of the fields at one place, in units that make the
// equations free of k and η: velocities across and along, rate of shear over
// k, stress across over ηk.
type profile struct{ w, u, g, r float64 }

// state gives the profile its dimensions.
func (p profile) state(k, eta float64) State {
	return State{W: p.w, U: p.u, P: -(p.r + 2*p.u) * eta * k, Stretch: k * p.u, Shear: k * p.g, Viscosity: eta}
}

// traction gives those components their dimensions that are continuous across
// interfaces.
func (p profile) traction(k, eta float64) traction {
	return traction{p.w, p.u, p.r * eta * k, p.g * eta * k}
}

func (p profile) plus(q profile, factor float64) profile {
	return profile{p.w + factor*q.w, p.u + factor*q.u, p.g + factor*q.g, p.r + factor*q.r}
}

// A sum of pairs and of a power series about the origin of the layer, either
// of which may be missing, as a function of the dimensionless position s.
type sum struct {
	pairs  []pair
	series []profile
}

func (f *sum) at(s float64) profile {
	var p profile
	for i := len(f.series) - 1; i >= 0; i-- {
		c := &f.series[i]
		p.w = p.w*s + c.w
		p.u = p.u*s + c.u
		p.g = p.g*s + c.g
		p.r = p.r*s + c.r
	}
	for i := range f.pairs {
		f.pairs[i].addTo(&p, s)
	}
	return p
}

// add adds a multiple of another sum.
func (f *sum) add(g *sum, factor float64) {
	for i, c := range g.series {
		f.series[i] = f.series[i].plus(c, factor)
	}
	for i := range g.pairs {
		f.addPair(g.pairs[i].times(factor))
	}
}

// addPair merges the pair with one of the same exponents.
func (f *sum) addPair(p pair) {
	for i := range f.pairs {
		q := &f.pairs[i]
		if q.gamma == p.gamma && q.beta == p.beta && q.anchor == p.anchor {
			q.w, q.u, q.g, q.r = q.w.plus(p.w), q.u.plus(p.u), q.g.plus(p.g), q.r.plus(p.r)
			return
		}
	}
	f.pairs = append(f.pairs, p)
}

// A term stands for e^{γs}(c cos βs + d sin(βs)/β) with the exponents of its
// pair, s being counted from the anchor. The second function is s e^{γs} if β
// is zero.
type term struct{ c, d float64 }

func (t term) plus(u term) term { return term{t.c + u.c, t.d + u.d} }

func (t term) times(factor float64) term { return term{factor * t.c, factor * t.d} }

// A pair is a part of the solution in which all fields are terms with the
// same exponents.
type pair struct {
	gamma, beta, anchor float64

	w, u, g, r term
}

// derivative returns that of a term with respect to s.
func (p *pair) derivative(t term) term {
	return term{p.gamma*t.c + t.d, p.gamma*t.d - p.beta*p.beta*t.c}
}

// set derives the fields from the velocity across the layer, w, where the
// viscosity varies as e^{2bs} and the force along the layer is a·ηk².
func (p *pair) set(w, a term, b float64) {
	p.w = w
	p.u = p.derivative(w).times(-1)
	p.g = p.derivative(p.u).plus(w.times(-1))
	p.r = p.derivative(p.g).plus(p.g.times(2 * b)).plus(p.u.times(-4)).plus(a)
}

func (p pair) times(factor float64) pair {
	p.w, p.u, p.g, p.r = p.w.times(factor), p.u.times(factor), p.g.times(factor), p.r.times(factor)
	return p
}

// addTo adds the pair at the dimensionless position s.
func (p *pair) addTo(total *profile, s float64) {
	s -= p.anchor
	e := math.Exp(p.gamma * s)
	first, second := e, e*s
	if p.beta != 0 {
		sin, cos := math.Sincos(p.beta * s)
		first, second = e*cos, e*(sin/p.beta)
	}
	total.w += p.w.c*first + p.w.d*second
	total.u += p.u.c*first + p.u.d*second
	total.g += p.g.c*first + p.g.d*second
	total.r += p.r.c*first + p.r.d*second
}

// seriesOrder is the degree of the power series, and seriesReach the largest
// product of distance and exponent for which they serve: the first term that
// is left out is less than 1e-19.
const (
	seriesOrder = 20
	seriesReach = 1
)

// thin is the thickness times k up to which layers use power series.
const thin = 8

// newSeries integrates the equations from the state at s = 0, under forces per
// ηk² at s = 0 whose power series are given, where the viscosity varies as
// e^{2bs}.
func newSeries(start profile, across, along []float64, b float64) []profile {
	c := make([]profile, seriesOrder+1)
	c[0] = start
	for n := range seriesOrder {
		p, next := c[n], 1/float64(n+1)
		g, r := p.r+4*p.u-2*b*p.g, -p.g-2*b*p.r
		if along != nil {
			g -= along[n]
		}
		if across != nil {
			r -= across[n]
		}
		c[n+1] = profile{-p.u * next, (p.w + p.g) * next, g * next, r * next}
	}
	return c
}

// exponentialSeries returns the power series of the real part of
// amplitude·e^{λs}.
func exponentialSeries(amplitude, lambda complex128) []float64 {
	c := make([]float64, seriesOrder+1)
	for n := range c {
		c[n] = real(amplitude)
		amplitude *= lambda / complex(float64(n+1), 0)
	}
	return c
}
