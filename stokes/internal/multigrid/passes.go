package multigrid

import "example.org/overturn/stokes/internal/team"

// passes are the parallel pieces of work on one level, made once so that
// running them allocates nothing.
type passes struct {
	refresh []func(member int) // from viscosity to coefficients, in this order

	// Smoothing on its way down, from zero or from what is there, and up.
	// Where there are jumps, whose relaxation is not by rows, it is taken apart.
	freshDown, down, up             *pipeline
	fresh, sweep, restrict, prolong *pipeline
	upStages                        []stage

	load        func(member int) // restriction of the right-hand side alone
	interpolate func(member int) // of full multigrid; nil until it is needed

	residual, correct func(member int) // of grafts
}

// sweepStages are the distributive sweep. The lags and leads follow from what
// each row function reads and writes; TestPipelinesAreExact holds them to it.
func (l *Level) sweepStages() []stage {
	return []stage{
		{func(_, j int) { l.relaxX(j, 0) }, 0, 0},
		{func(_, j int) { l.relaxX(j, 1) }, 1, 1},
		{func(_, j int) { l.relaxZ(j, 0) }, 1, 2},
		{func(_, j int) { l.relaxZ(j, 1) }, 2, 3},
		{func(_, j int) { l.pressBefore(j) }, 3, 3},
		{func(_, j int) { l.distribute(j, 0) }, 4, 4},
		{func(_, j int) { l.distribute(j, 1) }, 5, 5},
		{func(_, j int) { l.pressAfter(j) }, 6, 6},
	}
}

// makePasses prepares the work of level l, whose next coarser level is c or
// nil, for a team of which the first blocks members take part.
func (l *Level) makePasses(t *team.Team, blocks int, c *Level, s []*scratch) {
	rows := func(n int, work func(lo, hi int)) func(int) {
		return func(member int) {
			if member < blocks {
				lo, hi := team.Block(n, member, blocks)
				work(lo+1, hi+1)
			}
		}
	}
	l.passes.refresh = []func(int){
		rows(l.Z.N+1, l.cutCorners),
		rows(l.Z.N, l.setDiagonals),
		rows(l.Z.N, l.setDistribution),
	}
	if c == nil {
		return
	}
	l.passes.refresh = append(l.passes.refresh,
		rows(c.Z.N+1, func(lo, hi int) { l.coarsenViscosity(c, lo, hi) }))

	l.passes.load = rows(c.Z.N, func(lo, hi int) {
		for J := lo; J < hi; J++ {
			l.restrictLoad(c, J)
		}
	})
	l.passes.correct = rows(l.Z.N, l.addSpare)
	l.passes.residual = func(member int) {
		if member < blocks {
			lo, hi := team.Block(l.Z.N, member, blocks)
			l.keepResidual(s[member], lo+1, hi+1)
		}
	}

	sweep := l.sweepStages()
	fresh := append([]stage{{func(_, j int) { l.startX(j) }, 0, 0}}, sweep[1:]...)
	restrict := []stage{{func(m, j int) { l.restrictAfter(c, s[m], j) }, 7, 13}}
	prolong := []stage{{func(m, j int) { l.prolong(c, s[m], j) }, 0, 0}}
	make := func(parts ...[]stage) *pipeline {
		var all []stage
		for _, p := range parts {
			all = append(all, p...)
		}
		return newPipeline(l.Z.N, t, blocks, s, all)
	}
	l.passes.freshDown = make(fresh, restrict)
	l.passes.down = make(sweep, restrict)
	l.passes.upStages = append(prolong, shifted(sweep, 1)...)
	l.passes.up = make(l.passes.upStages)
	l.passes.fresh = make(fresh)
	l.passes.sweep = make(sweep)
	l.passes.restrict = make(restrict)
	l.passes.prolong = make(prolong)
}
