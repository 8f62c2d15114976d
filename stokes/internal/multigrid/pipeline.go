package multigrid

import "example.org/overturn/stokes/internal/team"

// A stage is a pass over the rows 1..rows of a level, one row at a time. It may
// work on row j as soon as the stage before it has finished the rows around.
type stage struct {
	row func(member, j int)

	// lag is by how many rows the stage follows the first one when rows are
	// taken from the bottom up; lead is by how many rows above a border it
	// must start when the rows below are not its own. Both leave room for
	// what the stage reads and for what others still have to read.
	lag, lead int
}

// A pipeline takes rows through its stages in such an order that every stage
// sees what it would see if the one before had finished all rows: the result
// is the same to the bit, but rows are still in cache from stage to stage.
//
// With a team the rows are cut into blocks. Each member takes its block
// through the pipeline as far as it can without the rows of others. Then the
// borders, some rows each, are finished stage by stage.
type pipeline struct {
	stages []stage
	rows   int
	s      []*scratch
	team   *team.Team
	blocks int
	block  func(member int)
	border func(member int)
}

// shifted returns the stages as they have to follow others.
func shifted(stages []stage, rows int) []stage {
	var s []stage
	for _, st := range stages {
		s = append(s, stage{st.row, st.lag + rows, st.lead + rows})
	}
	return s
}

// leastBlock is the smallest number of rows worth a goroutine. It exceeds the
// sum of the largest lag and lead, which keeps borders apart.
const leastBlock = 28

func newPipeline(rows int, t *team.Team, blocks int, s []*scratch, stages []stage) *pipeline {
	p := &pipeline{stages: stages, rows: rows, s: s, team: t, blocks: max(1, min(blocks, rows/leastBlock))}
	p.block, p.border = p.runBlock, p.runBorder
	return p
}

func (p *pipeline) run() {
	if p.blocks == 1 {
		p.runBlock(0)
		return
	}
	p.team.Run(p.block)
	p.team.Run(p.border)
}

// runBlock takes the rows of one block through all stages; at the borders of
// the block stage after stage stops short.
func (p *pipeline) runBlock(member int) {
	if member >= p.blocks {
		return
	}
	p.s[member].forget()
	lo, hi := team.Block(p.rows, member, p.blocks)
	lo, hi = lo+1, hi+1
	last := p.stages[len(p.stages)-1].lag
	end := hi
	if member == p.blocks-1 {
		end += last // the upper wall: run the pipeline empty
	}
	for t := lo; t < end; t++ {
		for s := range p.stages {
			st := &p.stages[s]
			from := lo
			if member > 0 {
				from += st.lead
			}
			if j := t - st.lag; j >= from && j < hi {
				st.row(member, j)
			}
		}
	}
}

// runBorder finishes the rows around the lower border of one block.
func (p *pipeline) runBorder(member int) {
	if member+1 >= p.blocks {
		return
	}
	p.s[member].forget()
	_, border := team.Block(p.rows, member, p.blocks)
	border++
	for s := range p.stages {
		st := &p.stages[s]
		for j := border - st.lag; j < border+st.lead; j++ {
			st.row(member, j)
		}
	}
}
