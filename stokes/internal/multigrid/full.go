package multigrid

import "example.org/overturn/stokes/internal/team"

// Full multigrid: where nothing is known about the solution, start from that of
// a coarser grid, found in the same way. On each level one cycle is then
// enough to bring the error below that of discretisation (Brandt & Dinar
// 1979), so that a solution of this accuracy costs little more than two cycles.

// makeFull prepares the levels for solveFull.
func (h *Hierarchy) makeFull() {
	h.full = true
	for k, l := range h.Levels[:len(h.Levels)-1] {
		c := h.Levels[k+1]
		l.cx, l.cz = newCubics(l.mx), newCubics(l.mz)
		rows := func(n int, work func(member, j int)) func(int) {
			blocks := h.blocks[k]
			return func(member int) {
				if member < blocks {
					lo, hi := team.Block(n, member, blocks)
					for j := lo + 1; j <= hi; j++ {
						work(member, j)
					}
				}
			}
		}
		l.passes.interpolate = rows(l.Z.N, func(member, j int) { l.interpolate(c, h.s[member].wide, j) })
	}
}

// solveFull stores in z the solution of the correction equation with
// right-hand side r to about the accuracy of discretisation.
func (h *Hierarchy) solveFull(z, r Fields) {
	if !h.full {
		h.makeFull()
	}
	l := h.Finest()
	l.u, l.f = z, r
	h.done = false
	for k := range h.end {
		h.run(k, h.Levels[k].passes.load)
	}
	h.direct[h.end].solve()
	for k := h.end - 1; k >= 0; k-- {
		h.run(k, h.Levels[k].passes.interpolate)
		h.refine(k)
	}
}

// refine is an F-cycle on level k that starts from what is there. A V-cycle
// does for the velocity, but not for the pressure.
func (h *Hierarchy) refine(k int) {
	p := &h.Levels[k].passes
	h.down(k, p.down, p.sweep)
	h.cycle(k + 1)
	if h.branch[k+1] && k+1 < h.end {
		h.improve(k + 1)
	}
	h.up(k)
}

// restrictLoad restricts the right-hand side of l to row J of that of c.
func (l *Level) restrictLoad(c *Level, J int) {
	mz := l.mz
	fx, fz, g := c.row(c.f.X, J), c.row(c.f.Z, J), c.row(c.f.P, J)
	clear(fx)
	clear(fz)
	clear(g)
	if J > 1 {
		for j := mz.node[J-1] + 1; j < mz.node[J]; j++ {
			l.mx.gatherCells(fz, l.row(l.f.Z, j), mz.nodeW[j])
		}
	}
	for j := mz.node[J]; j < mz.node[J+1]; j++ {
		l.mx.gatherFaces(fx, l.row(l.f.X, j))
		l.mx.gatherCells(g, l.row(l.f.P, j), 1)
		l.mx.gatherCells(fz, l.row(l.f.Z, j), 1-mz.nodeW[j])
	}
	c.wrapX(fx)
	c.wrapX(fz)
	c.wrapX(g)
}
