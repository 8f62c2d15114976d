package ode

import (
	"fmt"
	"math"
	"sort"
)

// Path is the solution of an integration as a piecewise polynomial of degree
// five. It is safe for concurrent use once the integration has ended.
type Path struct {
	tab   *tableau
	n, m  int
	times []float64 // start and ends of the steps
	data  []float64 // per step: y, q, stage increments z, stage integrands
}

func (p *Path) reset(tab *tableau, n, m int, t0 float64) {
	p.tab, p.n, p.m = tab, n, m
	p.times, p.data = append(p.times[:0], t0), p.data[:0]
}

// stride is the length of the record of one step.
func (p *Path) stride() int { return (p.n + p.m) * (1 + stages) }

// Clone returns a path that later steps of the solver do not change.
func (p *Path) Clone() Path {
	c := *p
	c.times = append([]float64(nil), p.times...)
	c.data = append([]float64(nil), p.data...)
	return c
}

func (p *Path) append(s *Solver, end float64) {
	p.times = append(p.times, end)
	p.data = append(p.data, s.y...)
	p.data = append(p.data, s.q...)
	p.data = append(p.data, s.z...)
	for i := range stages {
		p.data = append(p.data, s.rates[i*(p.n+p.m)+p.n:(i+1)*(p.n+p.m)]...)
	}
}

// Times returns the start of the path and the ends of its steps, in the order
// of integration. The caller must not change it.
func (p *Path) Times() []float64 { return p.times }

// Span returns the first and the last time of the path.
func (p *Path) Span() (start, end float64) { return p.times[0], p.times[len(p.times)-1] }

// At fills y with the unknowns and q with the integrals from the start, at time
// t. Either may be nil. A time outside the span is an error.
func (p *Path) At(y, q []float64, t float64) error {
	start, end := p.Span()
	if !(t >= math.Min(start, end) && t <= math.Max(start, end)) {
		return fmt.Errorf("time is %g, want %g to %g", t, math.Min(start, end), math.Max(start, end))
	}
	if len(p.times) < 2 {
		return fmt.Errorf("the path has no steps")
	}
	steps := len(p.times) - 1
	var i int
	if end > start {
		i = sort.Search(steps, func(i int) bool { return p.times[i+1] >= t })
	} else {
		i = sort.Search(steps, func(i int) bool { return p.times[i+1] <= t })
	}
	i = min(i, steps-1)
	h := p.times[i+1] - p.times[i]
	p.evaluate(y, q, i, h, (t-p.times[i])/h)
	return nil
}

// evaluate reads step i at θ = (t - start of the step)/h.
func (p *Path) evaluate(y, q []float64, i int, h, theta float64) {
	d := p.data[i*p.stride() : (i+1)*p.stride()]
	y0, q0 := d[:p.n], d[p.n:p.n+p.m]
	z, r := d[p.n+p.m:], d[p.n+p.m+stages*p.n:]
	if y != nil {
		copy(y, y0)
		for j := range stages {
			w := horner(&p.tab.value[j], theta)
			for k := range p.n {
				y[k] += w * z[j*p.n+k]
			}
		}
	}
	if q != nil {
		copy(q, q0)
		for j := range stages {
			w := h * horner(&p.tab.integral[j], theta)
			for k := range p.m {
				q[k] += w * r[j*p.m+k]
			}
		}
	}
}

// extrapolate fills y from the polynomial of the last step at θ.
func (p *Path) extrapolate(y []float64, theta float64) {
	p.evaluate(y, nil, len(p.times)-2, 0, theta)
}
