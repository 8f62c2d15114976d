package stability

import (
	"example.org/overturn/stability/internal/element"
	"example.org/overturn/stability/internal/pencil"
)

// coarseDegrees and fineDegrees are the polynomial degrees tried on the first
// mesh, and on each refined one.
var (
	coarseDegrees = [...]int{10, 14, 18, 22}
	fineDegrees   = [...]int{18, 22}
)

// rung returns how often the mesh of a level is refined, and its degree.
func rung(level int) (refinements, degree int) {
	if level < len(coarseDegrees) {
		return 0, coarseDegrees[level]
	}
	level -= len(coarseDegrees)
	return 1 + level/len(fineDegrees), fineDegrees[level%len(fineDegrees)]
}

// wallShares are where refinement cuts an element at a wall, from the wall:
// boundary layers are found in few steps.
var wallShares = [...]float64{0.04, 0.2}

// refined cuts the first and the last interval near the ends, and halves the
// others, the given number of times.
func refined(nodes []float64, times int) []float64 {
	for range times {
		last := len(nodes) - 2
		finer := make([]float64, 0, 2*len(nodes)+4)
		for i, z := range nodes[:last+1] {
			h := nodes[i+1] - z
			finer = append(finer, z)
			if i == 0 {
				finer = append(finer, z+wallShares[0]*h, z+wallShares[1]*h)
			}
			if i > 0 && i < last {
				finer = append(finer, z+h/2)
			}
			if i == last {
				finer = append(finer, z+(1-wallShares[1])*h, z+(1-wallShares[0])*h)
			}
		}
		nodes = append(finer, nodes[last+1])
	}
	return nodes
}

// A level is one discretisation of a system.
type level struct {
	layout *element.Layout
	pencil *pencil.Pencil
	work   *pencil.Workspace
	tails  []float64
}

// A ladder holds the discretisations of a system, made when they are first
// used, each finer than the one before.
type ladder struct {
	system *system
	levels []*level
}

// size returns the number of unknowns of a level without making it, roughly.
func (l *ladder) size(i int) int {
	refinements, degree := rung(i)
	elements := len(l.system.nodes) - 1
	for range refinements {
		elements = 2*elements + 2 + max(0, 2-elements)
	}
	return elements * degree * len(l.system.fields)
}

func (l *ladder) level(i int) *level {
	for len(l.levels) <= i {
		l.levels = append(l.levels, nil)
	}
	if l.levels[i] == nil {
		refinements, degree := rung(i)
		l.levels[i] = newLevel(l.system, refined(l.system.nodes, refinements), degree)
	}
	return l.levels[i]
}

func newLevel(s *system, nodes []float64, degree int) *level {
	layout := element.NewLayout(nodes, degree, s.fields)
	blocks := append(element.Assemble(layout, &s.operator), s.bumpBlocks(layout)...)
	p := pencil.New(layout.Size()+len(s.interfaces), blocks)
	return &level{
		layout: layout, pencil: p, work: pencil.NewWorkspace(p),
		tails: make([]float64, len(nodes)-1),
	}
}

// tail returns how large the last coefficients of the last solution are, the
// worst element counting.
func (l *level) tail() float64 {
	l.layout.Tail(l.tails, l.work.Scaled())
	worst := 0.0
	for _, t := range l.tails {
		worst = max(worst, t)
	}
	return worst
}
