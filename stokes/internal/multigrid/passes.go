package multigrid

import "example.org/overturn/stokes/internal/team"

// passes are the parallel pieces of work on one level, made once so that
// running them allocates nothing.
type passes struct {
	sweep    *pipeline
	restrict func(member int)
	prolong  func(member int)
	refresh  []func(member int) // from viscosity to coefficients, in this order
}

// makePasses prepares the work of level l, whose next coarser level is c or
// nil, for a team of which the first blocks members take part.
//
// The lags and leads of the sweep follow from what each row function reads and
// writes; TestPipelineIsExact holds them to it.
func (l *Level) makePasses(t *team.Team, blocks int, c *Level, s []*scratch) {
	l.passes.sweep = newPipeline(l.Z.N, t, blocks,
		stage{func(j int) { l.relaxX(j, 0) }, 0, 0},
		stage{func(j int) { l.relaxX(j, 1) }, 1, 1},
		stage{func(j int) { l.relaxZ(j, 0) }, 1, 2},
		stage{func(j int) { l.relaxZ(j, 1) }, 2, 3},
		stage{l.pressBefore, 3, 3},
		stage{func(j int) { l.distribute(j, 0) }, 4, 4},
		stage{func(j int) { l.distribute(j, 1) }, 5, 5},
		stage{l.pressAfter, 6, 6},
	)
	rows := func(n int, work func(member, lo, hi int)) func(int) {
		return func(member int) {
			if member < blocks {
				lo, hi := team.Block(n, member, blocks)
				work(member, lo+1, hi+1)
			}
		}
	}
	l.passes.refresh = []func(int){
		rows(l.Z.N+1, func(_, lo, hi int) { l.cutCorners(lo, hi) }),
		rows(l.Z.N, func(_, lo, hi int) { l.setDiagonals(lo, hi) }),
		rows(l.Z.N, func(_, lo, hi int) { l.setDistribution(lo, hi) }),
	}
	if c == nil {
		return
	}
	l.passes.refresh = append(l.passes.refresh, rows(c.Z.N+1, func(_, lo, hi int) { l.coarsenViscosity(c, lo, hi) }))
	l.passes.restrict = rows(c.Z.N, func(member, lo, hi int) { l.restrict(c, s[member], lo, hi) })
	l.passes.prolong = rows(l.Z.N, func(member, lo, hi int) {
		for j := lo; j < hi; j++ {
			l.prolong(c, s[member], j)
		}
	})
}
