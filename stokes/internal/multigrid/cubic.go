package multigrid

// Full multigrid hands on solutions, not corrections: they must arrive with an
// error below that of the finer grid, for which linear interpolation is too
// rough. It is cubic here, by tensor products of interpolation along the axes.

// A cubic holds for each fine point of an axis the weights of four coarse
// points, base and those after it.
type cubic struct {
	base   []int
	weight [][4]float64
}

// cubics are the interpolations from one axis to a finer one.
type cubics struct {
	nodes    cubic // of a normal velocity, whose zero at a wall is a point as others
	centres  cubic // of a tangential velocity: zero at a Stick end, even about a Slip end
	pressure cubic // from points inside alone
}

func newCubics(m *merge) *cubics {
	n := m.fine.N
	nodes, centres := m.fine.nodes(), m.fine.centres()
	c := &cubics{nodes: newCubic(n), centres: newCubic(n), pressure: newCubic(n)}
	coarseNodes, coarseCentres, coarseInside := m.coarse.knownNodes(), m.coarse.knownCentres(true), m.coarse.knownCentres(false)
	for i := 1; i <= n; i++ {
		c.nodes.set(i, nodes[i], coarseNodes)
		c.centres.set(i, centres[i], coarseCentres)
		c.pressure.set(i, centres[i], coarseInside)
	}
	return c
}

func newCubic(n int) cubic {
	return cubic{base: make([]int, n+1), weight: make([][4]float64, n+1)}
}

// A known is a point where a field on the coarse axis is known: at one of its
// indices, or zero.
type known struct {
	x    float64
	i    int
	zero bool
}

// nodes returns the positions of the N+1 nodes, from index 1.
func (a *Axis) nodes() []float64 {
	x := make([]float64, a.N+2)
	for i := 1; i <= a.N; i++ {
		x[i+1] = x[i] + a.H[i]
	}
	return x
}

// centres returns the positions of the N centres, from index 1.
func (a *Axis) centres() []float64 {
	x := a.nodes()
	for i := 1; i <= a.N; i++ {
		x[i] += 0.5 * a.H[i]
	}
	return x[:a.N+1]
}

// beyond is by how many points a periodic axis goes on at both ends.
const beyond = 2

func (a *Axis) knownNodes() []known {
	x := a.nodes()
	var points []known
	if !a.wraps() {
		for i := 1; i <= a.N+1; i++ {
			points = append(points, known{x: x[i], i: i})
		}
		return points
	}
	return a.repeated(x[:a.N+1])
}

// repeated returns the points x[1..N] and those beyond the ends.
func (a *Axis) repeated(x []float64) []known {
	n, length := a.N, a.nodes()[a.N+1]
	var points []known
	for i := 1 - beyond; i <= n+beyond; i++ {
		p := known{i: i}
		switch {
		case i < 1:
			p.x = x[i+n] - length
		case i > n:
			p.x = x[i-n] + length
		default:
			p.x = x[i]
		}
		points = append(points, p)
	}
	return points
}

// knownCentres returns the points at centres and, if asked for, what the walls
// say about a tangential velocity.
func (a *Axis) knownCentres(walls bool) []known {
	x := a.centres()
	if a.wraps() {
		return a.repeated(x)
	}
	n, length := a.N, a.nodes()[a.N+1]
	var points []known
	if walls && a.Lo == Stick {
		points = append(points, known{zero: true})
	} else if walls && n > 1 {
		points = append(points, known{x: -x[2], i: 2}, known{x: -x[1], i: 1})
	}
	for i := 1; i <= n; i++ {
		points = append(points, known{x: x[i], i: i})
	}
	if walls && a.Hi == Stick {
		points = append(points, known{x: length, zero: true})
	} else if walls && n > 1 {
		points = append(points, known{x: 2*length - x[n], i: n}, known{x: 2*length - x[n-1], i: n - 1})
	}
	return points
}

// set stores the weights for fine point i at x: those of Lagrange's polynomial
// through the four nearest points, or fewer where there are no more.
func (t *cubic) set(i int, x float64, points []known) {
	first := 0
	for first+4 < len(points) && points[first+2].x <= x {
		first++
	}
	near := points[first:min(first+4, len(points))]
	low := near[len(near)/2].i
	for _, p := range near {
		if !p.zero {
			low = min(low, p.i)
		}
	}
	if near[len(near)/2].zero {
		low = near[0].i
	}
	t.base[i] = low
	for k, p := range near {
		if p.zero {
			continue
		}
		w := 1.0
		for q, other := range near {
			if q != k {
				w *= (x - other.x) / (p.x - other.x)
			}
		}
		t.weight[i][p.i-low] += w
	}
}

// blend stores in dst, which goes on by beyond slots at both ends, the
// combination of rows of a that is the value at i.
func (t *cubic) blend(dst []float64, l *Level, a []float64, i int) {
	clear(dst)
	dst = dst[beyond:][:l.stride]
	for k, w := range t.weight[i] {
		if w != 0 {
			addScaled(dst, w, l.row(a, t.base[i]+k))
		}
	}
}

// along stores in dst[from:] the values at the points from onwards, from a row
// that goes on by beyond slots at both ends.
func (t *cubic) along(dst, src []float64, from int) {
	base, weight := t.base[from:], t.weight[from:]
	dst = dst[from:][:len(base)]
	weight = weight[:len(base)]
	for i, b := range base {
		s, w := src[b+beyond:][:4], &weight[i]
		dst[i] = w[0]*s[0] + w[1]*s[1] + w[2]*s[2] + w[3]*s[3]
	}
}

// repeat continues a periodic row of a level beyond its ends.
func (l *Level) repeat(row []float64) {
	if !l.X.wraps() {
		return
	}
	n := l.X.N
	for d := range beyond {
		row[beyond-d] = row[beyond+n-d]
		row[beyond+n+1+d] = row[beyond+1+d]
	}
}

// interpolate stores in row j of l the solution of the coarser level c.
func (l *Level) interpolate(c *Level, t []float64, j int) {
	x, z := l.cx, l.cz
	t = t[:c.stride+2*beyond]
	first := l.X.firstFree()

	row := l.row(l.u.X, j)
	clear(row)
	z.centres.blend(t, c, c.u.X, j)
	c.repeat(t)
	x.nodes.along(row, t, first)
	l.wrapX(row)

	row = l.row(l.u.Z, j)
	clear(row)
	if j > 1 {
		z.nodes.blend(t, c, c.u.Z, j)
		c.repeat(t)
		x.centres.along(row, t, 1)
		l.wrapX(row)
	}

	row = l.row(l.u.P, j)
	clear(row)
	z.pressure.blend(t, c, c.u.P, j)
	c.repeat(t)
	x.pressure.along(row, t, 1)
	l.wrapX(row)
}
