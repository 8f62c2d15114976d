package multigrid

// Linear interpolation strains the outermost cells of a stiff body: their faces
// lie between coarse faces of which some belong to the weak fluid around, and
// what strains a cell 10⁶ times stiffer than its surroundings is an error 10⁶
// times larger than what it corrects. Such faces get their correction from
// faces further inside instead, by the linear function that fits those best,
// which for a rigid motion is that motion. Restriction is the transpose: forces
// on these faces act on the ones inside, with the same sum and moment.

// A graft lists the faces of one component that do not take part in the
// interpolation from the next coarser level, and where they take their values
// from.
type graft struct {
	faces   []int
	from    []int // from[k]: where the sources of face k begin; one more than faces
	sources []int
	weights []float64
}

func (g *graft) clear() {
	g.faces, g.from, g.sources, g.weights = g.faces[:0], append(g.from[:0], 0), g.sources[:0], g.weights[:0]
}

// extend stores in the faces what their sources say.
func (g *graft) extend(u []float64) {
	for k, f := range g.faces {
		v := 0.0
		for q := g.from[k]; q < g.from[k+1]; q++ {
			v += g.weights[q] * u[g.sources[q]]
		}
		u[f] = v
	}
}

// collect moves residuals from the faces to their sources.
func (g *graft) collect(r []float64) {
	for k, f := range g.faces {
		for q := g.from[k]; q < g.from[k+1]; q++ {
			r[g.sources[q]] += g.weights[q] * r[f]
		}
		r[f] = 0
	}
}

// A face is grafted when it interpolates from a coarse face softTimes softer.
// Its sources are at most graftRadius columns and rows away, and not softTimes
// softer either.
const (
	softTimes   = 20.0
	graftRadius = 3
)

// grafts are those of both components of one level.
type grafts struct {
	x, z   graft
	soft   []bool // faces of the present component that want a graft
	points centredPoints
	spare  Fields // a correction or a residual on its way

	nodesX, nodesZ, centresX, centresZ []float64
}

func (gs *grafts) none() bool { return len(gs.x.faces)+len(gs.z.faces) == 0 }

func (gs *grafts) clear() {
	gs.x.clear()
	gs.z.clear()
}

// findGrafts prepares the interpolation between l and the next coarser level c
// for the present viscosity.
func (l *Level) findGrafts(c *Level) {
	gs := &l.grafts
	if gs.soft == nil {
		gs.soft, gs.spare = make([]bool, l.size()), newFields(l.size())
		gs.nodesX, gs.nodesZ, gs.centresX, gs.centresZ = l.X.nodes(), l.Z.nodes(), l.X.centres(), l.Z.centres()
	}
	mx, mz := l.mx, l.mz
	for j := 1; j <= l.Z.N; j++ {
		for i := 1; i <= l.X.N; i++ {
			I, J := mx.cell[i], mz.low[j]
			gs.soft[j*l.stride+i] = softer(c, c.ix, I, J, 1-mx.nodeW[i], mx.nodeW[i], mz.lowW[j], mz.upW[j], l.ix[j*l.stride+i])
		}
	}
	l.graftFaces(&gs.x, l.ix, gs.nodesX, gs.centresZ)
	for j := 1; j <= l.Z.N; j++ {
		for i := 1; i <= l.X.N; i++ {
			I, J := mx.low[i], mz.cell[j]
			gs.soft[j*l.stride+i] = softer(c, c.iz, I, J, mx.lowW[i], mx.upW[i], 1-mz.nodeW[j], mz.nodeW[j], l.iz[j*l.stride+i])
		}
	}
	l.graftFaces(&gs.z, l.iz, gs.centresX, gs.nodesZ)
}

// softer reports whether one of the four coarse faces from (I, J) onwards that
// have a weight is much softer than a fine face of inverse diagonal own. Faces
// on walls have an inverse diagonal of zero and never are.
func softer(c *Level, inverse []float64, I, J int, left, right, low, up, own float64) bool {
	if own == 0 {
		return false
	}
	limit := softTimes * own
	at := J*c.stride + I
	above := at + c.stride
	return left*low != 0 && inverse[at] > limit || right*low != 0 && inverse[at+1] > limit ||
		left*up != 0 && inverse[above] > limit || right*up != 0 && inverse[above+1] > limit
}

// graftFaces finds the sources of the soft faces of one component, at x and z,
// from as near as there are enough of them.
func (l *Level) graftFaces(g *graft, inverse, x, z []float64) {
	g.clear()
	soft, p := l.grafts.soft, &l.grafts.points
	for j := 1; j <= l.Z.N; j++ {
		for i := 1; i <= l.X.N; i++ {
			f := j*l.stride + i
			if !soft[f] {
				continue
			}
			h := 1 / min(l.X.H[i], l.Z.H[j])
			for radius := 1; radius <= graftRadius; radius++ {
				p.n = 0
				for k := max(1, j-radius); k <= min(l.Z.N, j+radius); k++ {
					for m := max(1, i-radius); m <= min(l.X.N, i+radius); m++ {
						if s := k*l.stride + m; !soft[s] && inverse[s] != 0 && inverse[s] <= softTimes*inverse[f] {
							p.add(s, (x[m]-x[i])*h, (z[k]-z[j])*h)
						}
					}
				}
				if p.fit() {
					g.faces = append(g.faces, f)
					g.sources = append(g.sources, p.index[:p.n]...)
					g.weights = append(g.weights, p.weight[:p.n]...)
					g.from = append(g.from, len(g.sources))
					break
				}
			}
		}
	}
}

// A centredPoints holds the points around a face and the weights with which
// their values make the value there.
type centredPoints struct {
	n      int
	index  [(2*graftRadius + 1) * (2*graftRadius + 1)]int
	x, z   [(2*graftRadius + 1) * (2*graftRadius + 1)]float64
	weight [(2*graftRadius + 1) * (2*graftRadius + 1)]float64
}

func (p *centredPoints) add(index int, x, z float64) {
	p.index[p.n], p.x[p.n], p.z[p.n] = index, x, z
	p.n++
}

// flat is the smallest pivot, relative to the diagonal, of points that are not
// on one line.
const flat = 1e-6

// fit finds the weights that evaluate at the origin the linear function that
// fits values at the points best, near ones counting more. It fails when the
// points are on one line.
func (p *centredPoints) fit() bool {
	if p.n < 3 {
		return false
	}
	var sx, sz, xx, xz, zz, s float64
	for k := range p.n {
		x, z := p.x[k], p.z[k]
		w := 1 / (x*x + z*z)
		p.weight[k] = w
		s += w
		sx += w * x
		sz += w * z
		xx += w * x * x
		xz += w * x * z
		zz += w * z * z
	}
	// About the centre of the points, mean and slopes are independent.
	mx, mz := sx/s, sz/s
	cxx, cxz, czz := xx-sx*mx, xz-sx*mz, zz-sz*mz
	det := cxx*czz - cxz*cxz
	if !(cxx > flat*xx && det > flat*cxx*zz) {
		return false
	}
	a, b := (czz*mx-cxz*mz)/det, (cxx*mz-cxz*mx)/det
	for k := range p.n {
		p.weight[k] *= 1/s - a*(p.x[k]-mx) - b*(p.z[k]-mz)
	}
	return true
}

// restrictGrafted restricts the residual of level k where faces are grafted.
func (h *Hierarchy) restrictGrafted(k int) {
	l := h.Levels[k]
	gs := &l.grafts
	if gs.none() {
		l.passes.restrict.run()
		return
	}
	h.run(k, l.passes.residual)
	gs.x.collect(gs.spare.X)
	gs.z.collect(gs.spare.Z)
	l.WrapFields(gs.spare)
	f := l.f
	l.f = gs.spare
	h.run(k, l.passes.load)
	l.f = f
}

// prolongGrafted corrects level k where faces are grafted.
func (h *Hierarchy) prolongGrafted(k int) {
	l := h.Levels[k]
	gs := &l.grafts
	if gs.none() {
		l.passes.prolong.run()
		return
	}
	gs.spare.clear()
	u := l.u
	l.u = gs.spare
	l.passes.prolong.run()
	l.u = u
	gs.x.extend(gs.spare.X)
	gs.z.extend(gs.spare.Z)
	l.WrapFields(gs.spare)
	h.run(k, l.passes.correct)
}

// keepResidual stores the residual of rows lo ≤ j < hi in the spare fields.
func (l *Level) keepResidual(s *scratch, lo, hi int) {
	to := l.grafts.spare
	l.begin(s, l.u, lo)
	for j := lo; j < hi; j++ {
		l.operatorRow(s, l.u, j)
		l.addLoad(s, j)
		copy(l.row(to.X, j), s.rx)
		copy(l.row(to.Z, j), s.rz)
		copy(l.row(to.P, j), s.rp)
	}
}

// addSpare adds rows lo ≤ j < hi of the spare fields to the unknowns.
func (l *Level) addSpare(lo, hi int) {
	from := l.grafts.spare
	for j := lo; j < hi; j++ {
		addScaled(l.row(l.u.X, j), 1, l.row(from.X, j))
		addScaled(l.row(l.u.Z, j), 1, l.row(from.Z, j))
		addScaled(l.row(l.u.P, j), 1, l.row(from.P, j))
	}
}
