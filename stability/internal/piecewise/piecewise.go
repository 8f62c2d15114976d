package piecewise

import (
	"fmt"
	"math"
	"slices"
	"sort"

	"example.org/overturn/stability/internal/gauss"
)

const (
	points = 24 // Gauss points of a panel
	tail   = 4  // last coefficients that must have vanished

	// resolved is the size of the last coefficients, relative to the
	// function, at which a series has converged.
	resolved = 5e-14

	// maxDepth bounds the halvings of a panel.
	maxDepth = 22
	// edgeDepth is the number of halvings after which jumps and kinks are
	// looked for.
	edgeDepth = 3
)

// A Scale says what the error of a series is relative to.
type Scale int

const (
	// Global asks for an error that is small against the largest value of the
	// function anywhere.
	Global Scale = iota
	// Local asks for an error that is small against the largest value on each
	// panel: the choice for positive functions of large contrast.
	Local
)

// A Function is a piecewise Legendre series. It is immutable.
type Function struct {
	Nodes  []float64   // ends of the panels, increasing
	series [][]float64 // coefficients on each panel
	degree int         // largest degree that matters on any panel
}

// ValueError reports a value that is not a finite number.
type ValueError struct {
	Z, Value float64
}

func (e *ValueError) Error() string {
	return fmt.Sprintf("value at z = %g is %g, want a finite number", e.Z, e.Value)
}

// rule is the Gauss rule of a panel and legendre the polynomials at its points,
// [point][degree].
var rule, weight, legendre = newRule()

func newRule() (x, w []float64, p [][points]float64) {
	x, w = gauss.Rule(points)
	p = make([][points]float64, points)
	for q := range x {
		prev, cur := 0.0, 1.0
		for n := range points {
			p[q][n] = cur
			prev, cur = cur, (float64(2*n+1)*x[q]*cur-float64(n)*prev)/float64(n+1)
		}
	}
	return x, w, p
}

type resolver struct {
	f       func(float64) float64
	scale   Scale
	largest float64 // absolute value seen so far
	width   float64 // of the interval
	edges   []float64
	out     Function
}

// maxRestarts bounds how often new edges may start the work afresh.
const maxRestarts = 8

// Resolve represents f on an interval. Breaks inside it are taken as ends of
// panels; they may come in any order. Jumps and kinks that are found become
// breaks, too, and the panels that were halved in search of them are given up.
func Resolve(f func(float64) float64, lo, hi float64, breaks []float64, scale Scale) (*Function, error) {
	breaks = slices.Clone(breaks)
	for restart := 0; ; restart++ {
		r := &resolver{f: f, scale: scale, width: hi - lo}
		if err := r.resolve(lo, hi, breaks); err != nil {
			return nil, err
		}
		if len(r.edges) == 0 || restart == maxRestarts {
			return &r.out, nil
		}
		breaks = append(breaks, r.edges...)
	}
}

func (r *resolver) resolve(lo, hi float64, breaks []float64) error {
	ends := []float64{lo, hi}
	for _, b := range breaks {
		if b > lo && b < hi {
			ends = append(ends, b)
		}
	}
	slices.Sort(ends)
	ends = slices.Compact(ends)
	for _, z := range ends { // a first idea of the largest value
		if err := r.see(z); err != nil {
			return err
		}
	}
	r.out.Nodes = append(r.out.Nodes, lo)
	for i := range len(ends) - 1 {
		if err := r.panel(ends[i], ends[i+1], 0); err != nil {
			return err
		}
	}
	return nil
}

func (r *resolver) see(z float64) error {
	v := r.f(z)
	if math.IsNaN(v) || math.IsInf(v, 0) {
		return &ValueError{z, v}
	}
	r.largest = max(r.largest, math.Abs(v))
	return nil
}

// panel represents f on one panel, or halves it.
func (r *resolver) panel(a, b float64, depth int) error {
	var values [points]float64
	local := 0.0
	for q, x := range rule {
		z := a + (b-a)/2*(1+x)
		if err := r.see(z); err != nil {
			return err
		}
		values[q] = r.f(z)
		local = max(local, math.Abs(values[q]))
	}
	reference := r.largest
	if r.scale == Local {
		reference = local
	}
	series := transform(&values)
	if depth >= maxDepth {
		r.accept(b, series, reference)
		return nil
	}
	if last := largestOf(series[points-tail:]); last <= resolved*reference {
		fits, err := r.fits(a, b, series, reference)
		if err != nil {
			return err
		}
		if fits {
			r.accept(b, series, reference)
			return nil
		}
	}
	middle := (a + b) / 2
	if depth >= edgeDepth {
		if edge, ok := findEdge(r.f, a, b); ok && edge > a && edge < b {
			middle = edge
			r.edges = append(r.edges, edge)
		}
	}
	if middle <= a || middle >= b {
		r.accept(b, series, reference)
		return nil
	}
	if err := r.panel(a, middle, depth+1); err != nil {
		return err
	}
	return r.panel(middle, b, depth+1)
}

const (
	// samples is the number of points, spread over the whole interval, at
	// which a series that looks resolved is compared with the function, so
	// that no narrow feature slips through between Gauss points.
	samples = 200
	misfit  = 1e-9
)

// fits compares a series with the function.
func (r *resolver) fits(a, b float64, series []float64, reference float64) (bool, error) {
	n := 3 + int(samples*(b-a)/r.width)
	for i := range n {
		x := (2*float64(i)+1)/float64(n) - 1
		z := a + (b-a)/2*(1+x)
		if err := r.see(z); err != nil {
			return false, err
		}
		if math.Abs(r.f(z)-sum(series, x)) > misfit*reference {
			return false, nil
		}
	}
	return true, nil
}

func (r *resolver) accept(b float64, series []float64, reference float64) {
	n := len(series)
	for n > 1 && math.Abs(series[n-1]) <= resolved*reference {
		n--
	}
	r.out.Nodes = append(r.out.Nodes, b)
	r.out.series = append(r.out.series, series[:n])
	r.out.degree = max(r.out.degree, n-1)
}

func transform(values *[points]float64) []float64 {
	series := make([]float64, points)
	for q, v := range values {
		for n := range series {
			series[n] += v * weight[q] * legendre[q][n]
		}
	}
	for n := range series {
		series[n] *= float64(n) + 0.5
	}
	return series
}

func largestOf(v []float64) float64 {
	m := 0.0
	for _, x := range v {
		m = max(m, math.Abs(x))
	}
	return m
}

// Degree returns the largest polynomial degree of any panel.
func (f *Function) Degree() int { return f.degree }

// Constant reports whether the function is the same number everywhere.
func (f *Function) Constant() bool {
	if f.degree > 0 {
		return false
	}
	for _, s := range f.series {
		if math.Abs(s[0]-f.series[0][0]) > 4*resolved*math.Abs(s[0]) {
			return false
		}
	}
	return true
}

// find returns the panel of z and the local coordinate there.
func (f *Function) find(z float64) (panel int, x float64) {
	panel = sort.SearchFloat64s(f.Nodes[1:len(f.Nodes)-1], z)
	a, b := f.Nodes[panel], f.Nodes[panel+1]
	return panel, 2*(z-a)/(b-a) - 1
}

// At returns the value at z.
func (f *Function) At(z float64) float64 {
	panel, x := f.find(z)
	return sum(f.series[panel], x)
}

// sum evaluates a Legendre series.
func sum(series []float64, x float64) float64 {
	prev, cur, total := 0.0, 1.0, 0.0
	for n, c := range series {
		total += c * cur
		prev, cur = cur, (float64(2*n+1)*x*cur-float64(n)*prev)/float64(n+1)
	}
	return total
}

// Derivative returns df/dz.
func (f *Function) Derivative() *Function {
	d := &Function{Nodes: f.Nodes, series: make([][]float64, len(f.series)), degree: max(f.degree-1, 0)}
	for i, s := range f.series {
		scale := 2 / (f.Nodes[i+1] - f.Nodes[i])
		t := make([]float64, max(len(s)-1, 1))
		for n := range s { // Pₙ' = Σ (2m+1) Pₘ over m = n-1, n-3, …
			for m := n - 1; m >= 0; m -= 2 {
				t[m] += float64(2*m+1) * s[n] * scale
			}
		}
		d.series[i] = t
	}
	return d
}

// FromRight returns the integral of f from z to the right end.
func (f *Function) FromRight() *Function {
	g := &Function{Nodes: f.Nodes, series: make([][]float64, len(f.series)), degree: f.degree + 1}
	at := 0.0 // value at the right end of the panel
	for i := len(f.series) - 1; i >= 0; i-- {
		s, scale := f.series[i], (f.Nodes[i+1]-f.Nodes[i])/2
		t := make([]float64, len(s)+1)
		for n, c := range s { // -∫Pₙ = (Pₙ₋₁ - Pₙ₊₁)/(2n+1)
			t[n+1] -= c * scale / float64(2*n+1)
			if n > 0 {
				t[n-1] += c * scale / float64(2*n+1)
			}
		}
		t[0] += at - sum(t, 1)
		at = sum(t, -1)
		g.series[i] = t
	}
	return g
}
