package lines

// Row returns the coefficients that A has in the row of place j of one line:
// before·x[j−1] + here·x[j] + after·x[j+1]. On a ring the place before the first
// is the last one.
type Row func(line, j int) (before, here, after float64)

// Load reads A. It must come before the first Factor.
func (s *System) Load(row Row) {
	n := s.n
	for m := range s.matrices() {
		for j := range n {
			b, h, a := row(m, j)
			switch {
			case !s.closed:
				if j == 0 {
					b = 0
				}
				if j == n-1 {
					a = 0
				}
			case n == 1: // its own neighbour
				b, h, a = 0, b+h+a, 0
			case n == 2 && j == 0: // the other is the neighbour on both sides
				b, a = 0, b+a
			case n == 2:
				b, a = b+a, 0
			}
			at := s.place(m, j)
			s.before[at], s.here[at], s.after[at] = b, h, a
		}
	}
}

// Factor computes the factors of 1 + f·A for the lines lo ≤ line < hi, for all
// of them at once if they share their matrix.
func (s *System) Factor(f float64, lo, hi int) {
	if s.shared {
		lo, hi = 0, 1
	}
	if !s.rows && !s.shared {
		s.factorColumns(f, lo, hi)
		return
	}
	for m := lo; m < hi; m++ {
		s.factor(m, f)
	}
}

// factor works on a matrix whose coefficients are contiguous.
func (s *System) factor(m int, f float64) {
	n := s.n
	cut := func(v []float64) []float64 { return v[m*n : (m+1)*n] }
	before, here, after := cut(s.before), cut(s.here), cut(s.after)
	low, inv, up := cut(s.low), cut(s.inv), cut(s.up)
	last := 0.0
	for j := range n {
		b := f * before[j]
		i := 1 / (1 + f*here[j] - b*last)
		last = f * after[j] * i
		low[j], inv[j], up[j] = b, i, last
	}
	if s.ring {
		s.openRing(m, f)
	}
}

// openRing makes a ring tridiagonal by a change of rank one (Sherman & Morrison
// 1950): the corner column u = (−p, 0 … 0, c) and row (1, 0 … 0, −a/p), with the
// first pivot p and the corner coefficients a, of the first row, and c, of the
// last.
func (s *System) openRing(m int, f float64) {
	n := s.n
	first, end := m*n, m*n+n-1
	p := 1 + f*s.here[first]
	a, c := f*s.before[first], f*s.after[end]
	// Factor again with the changed ends.
	last := 0.0
	for at := first; at <= end; at++ {
		b, h := f*s.before[at], 1+f*s.here[at]
		switch at {
		case first:
			b, h = 0, h+p
		case end:
			h += a * c / p
		}
		i := 1 / (h - b*last)
		last = f * s.after[at] * i
		s.low[at], s.inv[at], s.up[at] = b, i, last
	}
	s.up[end] = 0
	q := s.q[first : end+1]
	clear(q)
	q[0], q[n-1] = -p, c
	s.thomas(q, m)
	s.corner[2*m] = -a / p
	s.corner[2*m+1] = 1 / (1 + q[0] - a/p*q[n-1])
}

// factorColumns works on a range of columns, a row of cells at a time.
func (s *System) factorColumns(f float64, lo, hi int) {
	for j := range s.n {
		cut := func(v []float64) []float64 { return v[j*s.lines+lo : j*s.lines+hi] }
		before, here, after := cut(s.before), cut(s.here), cut(s.after)
		low, inv, up := cut(s.low), cut(s.inv), cut(s.up)
		last := low // of no account: the first row has nothing before it
		if j > 0 {
			last = s.up[(j-1)*s.lines+lo : (j-1)*s.lines+hi]
		}
		for i := range low {
			b := f * before[i]
			p := 1 + f*here[i]
			if j > 0 {
				p -= b * last[i]
			}
			low[i], inv[i] = b, 1/p
			up[i] = f * after[i] * inv[i]
		}
	}
}
