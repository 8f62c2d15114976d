// Package anderson accelerates fixed-point iterations x ← x + f(x) by Anderson
// mixing (Anderson 1965; the form of Walker & Ni 2011): among the combinations of
// the last few iterates it continues from the one whose residual f is smallest
// in the 2-norm. Near the solution of a smooth problem it behaves as GMRES on
// the linearised one.
package anderson

import "gonum.org/v1/gonum/floats"

// dependent is the length of a difference of residuals, relative to what it was
// before the older ones were taken out of it, below which it says nothing new.
const dependent = 1e-10

// Mixer remembers the differences between the last iterates and between their
// residuals. It serves one goroutine at a time.
type Mixer struct {
	dx, df [][]float64 // newest last
	q      [][]float64 // scratch: df orthonormalised
	x, f   []float64   // the last iterate and its residual
	first  bool
}

// NewMixer returns a Mixer for n unknowns that remembers depth differences.
func NewMixer(n, depth int) *Mixer {
	m := &Mixer{x: make([]float64, n), f: make([]float64, n), first: true}
	for range depth {
		m.q = append(m.q, make([]float64, n))
		m.dx, m.df = append(m.dx, make([]float64, n)), append(m.df, make([]float64, n))
	}
	m.Reset()
	return m
}

// Reset forgets all.
func (m *Mixer) Reset() {
	m.first = true
	m.dx, m.df = m.dx[:0], m.df[:0]
}

// Next replaces x, whose residual is f, by the next iterate.
func (m *Mixer) Next(x, f []float64) {
	if !m.first {
		m.remember(x, f)
	}
	m.first = false
	copy(m.x, x)
	copy(m.f, f)
	floats.Add(x, f)
	m.project(x, f)
}

// remember appends the differences from the last iterate, in place of the
// oldest when there is no more room.
func (m *Mixer) remember(x, f []float64) {
	depth := len(m.q)
	if depth == 0 {
		return
	}
	if n := len(m.dx); n == depth {
		oldX, oldF := m.dx[0], m.df[0]
		copy(m.dx, m.dx[1:])
		copy(m.df, m.df[1:])
		m.dx[n-1], m.df[n-1] = oldX, oldF
	} else {
		m.dx, m.df = m.dx[:n+1], m.df[:n+1]
	}
	last := len(m.dx) - 1
	floats.SubTo(m.dx[last], x, m.x)
	floats.SubTo(m.df[last], f, m.f)
}

// project takes from x the combination of the remembered steps that makes the
// residual smallest: newest first, each made orthogonal to the newer ones by
// modified Gram-Schmidt, so that an outdated one can drop out.
func (m *Mixer) project(x, f []float64) {
	n := len(m.df)
	var r [][]float64 // upper triangle, by column
	var order []int
	for j := n - 1; j >= 0; j-- {
		q := m.q[len(order)]
		copy(q, m.df[j])
		before := floats.Norm(q, 2)
		column := make([]float64, 0, n)
		for i := range order {
			c := floats.Dot(m.q[i], q)
			floats.AddScaled(q, -c, m.q[i])
			column = append(column, c)
		}
		length := floats.Norm(q, 2)
		if !(length > dependent*before) {
			continue
		}
		floats.Scale(1/length, q)
		r, order = append(r, append(column, length)), append(order, j)
	}
	y := make([]float64, len(order))
	for i := range y {
		y[i] = floats.Dot(m.q[i], f)
	}
	for i := len(y) - 1; i >= 0; i-- {
		y[i] /= r[i][i]
		for l := range i {
			y[l] -= r[i][l] * y[i]
		}
	}
	for i, j := range order {
		floats.AddScaled(x, -y[i], m.dx[j])
		floats.AddScaled(x, -y[i], m.df[j])
	}
}
