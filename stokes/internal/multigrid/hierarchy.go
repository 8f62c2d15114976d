package multigrid

import "example.org/overturn/stokes/internal/team"

// A Hierarchy is a sequence of ever coarser levels and the cycle that uses
// them to solve the finest one approximately.
type Hierarchy struct {
	Levels []*Level
	team   *team.Team
	blocks []int          // members that work on each level
	branch []bool         // levels that an F-cycle visits twice
	end    int            // the level that is solved directly
	direct []*elimination // of each level; nil until it is one's turn
	finish *pipeline      // replaces the last pass of a cycle, if not nil
	done   bool           // that it did
	full   bool           // levels are ready for full multigrid
	s      []*scratch
}

// leastCells is the size from which a level is shared among goroutines.
const leastCells = 2048

// branchShrink is by how much the number of cells has to fall from one level
// where an F-cycle turns back to the next. Where levels shrink slowly, on graded
// grids, turning back on each of them would cost more than it brings.
const branchShrink = 0.6

// NewHierarchy coarsens the grid of x and z down to a few cells.
func NewHierarchy(x, z Axis, t *team.Team) *Hierarchy {
	h := &Hierarchy{team: t}
	for range t.Size() {
		h.s = append(h.s, newScratch(x.N+2))
	}
	l := newLevel(x, z)
	h.Levels = append(h.Levels, l)
	for l.cells() > coarsestCells {
		mx, mz, ok := coarsen(&l.X, &l.Z)
		if !ok {
			break
		}
		c := newLevel(*mx.coarse, *mz.coarse)
		c.u, c.f = newFields(c.size()), newFields(c.size())
		l.mx, l.mz = mx, mz
		h.Levels = append(h.Levels, c)
		l = c
	}
	if len(h.Levels) == 1 {
		l.u = newFields(l.size())
	}
	for k, l := range h.Levels {
		var c *Level
		if k+1 < len(h.Levels) {
			c = h.Levels[k+1]
		}
		blocks := 1
		if l.cells() >= leastCells {
			blocks = max(1, min(t.Size(), l.Z.N/leastBlock))
		}
		h.blocks = append(h.blocks, blocks)
		l.makePasses(t, blocks, c, h.s)
		l.makeJumps(t.Size())
	}
	last := h.Finest().cells()
	for k, l := range h.Levels {
		turn := k < len(h.Levels)-1 && float64(l.cells()) <= branchShrink*float64(last)
		if turn {
			last = l.cells()
		}
		h.branch = append(h.branch, turn)
	}
	h.direct = make([]*elimination, len(h.Levels))
	h.endOn(len(h.Levels) - 1)
	return h
}

// Finest returns the level of the grid itself.
func (h *Hierarchy) Finest() *Level { return h.Levels[0] }

// Refresh rebuilds everything that depends on the viscosity, from Eta and
// Corner of the finest level.
func (h *Hierarchy) Refresh() {
	for k, l := range h.Levels {
		l.WrapViscosity()
		for _, pass := range l.passes.refresh {
			h.run(k, pass)
		}
		l.findJumps()
	}
	h.endOn(h.lastLevel())
	h.findGrafts()
	h.direct[h.end].factor()
}

// findGrafts does so on all levels, if the viscosity jumps on the finest.
func (h *Hierarchy) findGrafts() {
	for k, l := range h.Levels[:len(h.Levels)-1] {
		l.grafts.clear()
		if k < h.end && h.Finest().jumps.sharp() && !l.jumps.none() {
			l.findGrafts(h.Levels[k+1])
		}
	}
}

// endOn makes level k the one that is solved directly.
func (h *Hierarchy) endOn(k int) {
	h.end = k
	if h.direct[k] == nil {
		h.direct[k] = newElimination(h.Levels[k])
	}
}

// lastLevel returns the level on which coarsening should end for the present
// viscosity.
func (h *Hierarchy) lastLevel() int {
	last := len(h.Levels) - 1
	if !h.Finest().jumps.sharp() {
		return last
	}
	most := max(leastEffort, min(mostEffort, effortPerCell*h.Finest().cells()))
	for k := 1; k < last; k++ {
		if h.Levels[k].effort() <= most {
			return k
		}
	}
	return last
}

// RefreshFinest rebuilds what [Solver.Residual] needs and no more.
func (h *Hierarchy) RefreshFinest() {
	l := h.Finest()
	l.WrapViscosity()
	h.run(0, l.passes.refresh[0])
	h.run(0, l.passes.refresh[1])
}

// Team returns the goroutines that the hierarchy works with.
func (h *Hierarchy) Team() *team.Team { return h.team }

// run does one pass on level k.
func (h *Hierarchy) run(k int, pass func(member int)) {
	if h.blocks[k] == 1 {
		pass(0)
		return
	}
	h.team.Run(pass)
}

// Precondition stores in z an approximate solution of the correction equation
// with right-hand side r: one F(1,1) cycle. It keeps z and r until the next
// call.
func (h *Hierarchy) Precondition(z, r Fields) {
	l := h.Finest()
	l.u, l.f = z, r
	h.done = false
	h.cycle(0)
}

// cycle is an F-cycle from zero on level k.
func (h *Hierarchy) cycle(k int) {
	if k == h.end {
		h.direct[k].solve()
		return
	}
	p := &h.Levels[k].passes
	h.down(k, p.freshDown, p.fresh)
	h.cycle(k + 1)
	if h.branch[k+1] && k+1 < h.end {
		h.improve(k + 1)
	}
	h.up(k)
}

// improve is a V-cycle on level k that starts from what is there.
func (h *Hierarchy) improve(k int) {
	p := &h.Levels[k].passes
	h.down(k, p.down, p.sweep)
	h.descend(k + 1)
	h.up(k)
}

// descend is a V-cycle from zero on level k.
func (h *Hierarchy) descend(k int) {
	if k == h.end {
		h.direct[k].solve()
		return
	}
	p := &h.Levels[k].passes
	h.down(k, p.freshDown, p.fresh)
	h.descend(k + 1)
	h.up(k)
}

// down smooths level k and gives its residual to the next: in one go, or
// taken apart by the relaxation of jumps.
func (h *Hierarchy) down(k int, all, smooth *pipeline) {
	l := h.Levels[k]
	if l.jumps.none() {
		all.run()
		return
	}
	if smooth == l.passes.fresh {
		l.u.clear()
	}
	h.relaxJumps(k)
	l.passes.sweep.run()
	h.relaxJumps(k)
	h.restrictGrafted(k)
}

// up takes the correction from the level below level k and smooths.
func (h *Hierarchy) up(k int) {
	l := h.Levels[k]
	if k == 0 && l.jumps.none() && h.finish != nil {
		h.finish.run()
		h.done = true
		return
	}
	if l.jumps.none() {
		l.passes.up.run()
		return
	}
	h.prolongGrafted(k)
	h.relaxJumps(k)
	l.passes.sweep.run()
	h.relaxJumps(k)
}
