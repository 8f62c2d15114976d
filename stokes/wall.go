package stokes

import (
	"fmt"
	"math"

	"example.org/overturn/stokes/staggered"
)

// A Wall says what the fluid does on one side of the box. The zero value is
// [FreeSlip].
type Wall struct {
	kind       wallKind
	tangential func(s float64) float64
	normal     func(s float64) float64
}

type wallKind int

const (
	freeSlip wallKind = iota
	noSlip
	periodic
)

// The three kinds of wall.
var (
	// FreeSlip is a wall that exerts no shear stress. The fluid does not
	// cross it unless it is made to by [Wall.Through].
	FreeSlip = Wall{}

	// NoSlip is a wall to which the fluid sticks. It rests unless it is made
	// to move by [Wall.Moving].
	NoSlip = Wall{kind: noSlip}

	// Periodic is for Left and Right, both or neither: what leaves through one
	// enters through the other. Between two free-slip walls a periodic layer
	// may slide as a whole without resistance; the solver then returns the
	// flow whose mean horizontal velocity is zero. A force whose horizontal
	// sum is not zero has no steady answer there and is an error; a sum of less
	// than a thousandth of the sizes is taken for an error of sampling and
	// removed.
	Periodic = Wall{kind: periodic}
)

// Moving returns a no-slip wall that moves along itself with a given velocity:
// vx on Bottom and Top, vz on Left and Right. The argument s of the function
// is the coordinate along the wall, x or z; it is evaluated once, at the
// corners of cells, when the solver is made.
func (w Wall) Moving(tangential func(s float64) float64) Wall {
	w.kind = noSlip
	w.tangential = tangential
	return w
}

// Through returns a wall that the fluid crosses with a given normal velocity,
// positive along the axis on all four walls: vx on Left and Right, vz on Bottom
// and Top. The argument s is the coordinate along the wall. Each face gets the
// mean of the function over it, by four-point Gauss quadrature, when the solver
// is made. As the fluid is incompressible, the fluxes through all walls must
// add up to zero, or [Solver.Solve] fails; an imbalance of less than one
// millionth is taken for an error of quadrature and spread over the faces in
// proportion to their flux.
func (w Wall) Through(normal func(s float64) float64) Wall {
	w.normal = normal
	return w
}

// Walls are the four sides of the box; the zero value is free slip all round.
type Walls struct {
	Left, Right, Bottom, Top Wall
}

// of returns the wall on one side.
func (w Walls) of(side staggered.Side) Wall {
	return [...]Wall{w.Left, w.Right, w.Bottom, w.Top}[side]
}

// String names the kind of wall.
func (w Wall) String() string {
	name := [...]string{"free slip", "no slip", "periodic"}[w.kind]
	if w.tangential != nil {
		name = "moving"
	}
	if w.normal != nil {
		name += ", through-flow"
	}
	return name
}

func (w Walls) check() error {
	for _, side := range staggered.Sides() {
		wall := w.of(side)
		if wall.kind != periodic {
			continue
		}
		if side.Horizontal() {
			return fmt.Errorf("stokes: %v wall is periodic, which only left and right can be", side)
		}
		if wall.normal != nil || wall.tangential != nil {
			return fmt.Errorf("stokes: %v wall is periodic and has a prescribed velocity, want one of the two", side)
		}
		if w.Left.kind != w.Right.kind {
			return fmt.Errorf("stokes: %v wall is periodic and the other side is %v, want both periodic or neither",
				side, w.of(1-side))
		}
	}
	return nil
}

// wallMotion holds the prescribed velocities on the grid.
type wallMotion struct {
	tangential [4][]float64 // at the nodes along each wall; nil: at rest or slipping
	normal     [4][]float64 // at the faces of each wall; nil: closed
}

// fluxTolerance is the imbalance of the fluxes through the walls, relative to
// the sum of their sizes, that counts as an error of quadrature and is spread
// over the wall faces.
const fluxTolerance = 1e-6

func newWallMotion(g *staggered.Grid, walls Walls) (wallMotion, error) {
	var m wallMotion
	for _, side := range staggered.Sides() {
		wall := walls.of(side)
		nodes := g.ZNodes()
		if side.Horizontal() {
			nodes = g.XNodes()
		}
		var err error
		if wall.tangential != nil {
			if m.tangential[side], err = sample(nodes, wall.tangential, side, "tangential"); err != nil {
				return m, err
			}
		}
		if wall.normal != nil {
			if m.normal[side], err = faceMeans(nodes, wall.normal, side); err != nil {
				return m, err
			}
		}
	}
	return m, nil
}

func sample(nodes []float64, f func(float64) float64, side staggered.Side, what string) ([]float64, error) {
	values := make([]float64, len(nodes))
	for i, s := range nodes {
		values[i] = f(s)
		if !finite(values[i]) {
			return nil, fmt.Errorf("stokes: %s velocity of the %v wall at %v is %v, want a finite number", what, side, s, values[i])
		}
	}
	return values, nil
}

// Nodes and weights of four-point Gauss-Legendre quadrature on [-1, 1],
// Abramowitz & Stegun (1964), table 25.4 (from memory; the test integrates
// polynomials of degree 7).
var (
	gaussNodes   = [...]float64{-0.8611363115940526, -0.3399810435848563, 0.3399810435848563, 0.8611363115940526}
	gaussWeights = [...]float64{0.3478548451374538, 0.6521451548625461, 0.6521451548625461, 0.3478548451374538}
)

func faceMeans(nodes []float64, f func(float64) float64, side staggered.Side) ([]float64, error) {
	values := make([]float64, len(nodes)-1)
	for i := range values {
		half := 0.5 * (nodes[i+1] - nodes[i])
		centre := nodes[i] + half
		sum := 0.0
		for q, t := range gaussNodes {
			sum += gaussWeights[q] * f(centre+half*t)
		}
		values[i] = 0.5 * sum
		if !finite(values[i]) {
			return nil, fmt.Errorf("stokes: normal velocity of the %v wall near %v is %v, want a finite number", side, centre, values[i])
		}
	}
	return values, nil
}

// outflow returns the net volume that leaves the box through its walls per
// time, and the sum of the sizes of the flux through each face.
func (m *wallMotion) outflow(g *staggered.Grid) (net, size float64) {
	for _, side := range staggered.Sides() {
		widths, sign := m.faces(g, side)
		for i, v := range m.normal[side] {
			net += sign * v * widths[i]
			size += math.Abs(v) * widths[i]
		}
	}
	return net, size
}

// spread changes the normal velocities, each in proportion to its size, such
// that the net outflow falls by excess.
func (m *wallMotion) spread(g *staggered.Grid, excess, size float64) {
	for _, side := range staggered.Sides() {
		_, sign := m.faces(g, side)
		for i, v := range m.normal[side] {
			m.normal[side][i] = v - sign*math.Abs(v)*excess/size
		}
	}
}

// faces returns the widths of the faces of a wall and the sign of the outward
// direction.
func (m *wallMotion) faces(g *staggered.Grid, side staggered.Side) (widths []float64, sign float64) {
	sign = 1
	if side == staggered.Left || side == staggered.Bottom {
		sign = -1
	}
	if side.Horizontal() {
		return g.DX(), sign
	}
	return g.DZ(), sign
}

// balance spreads an imbalance as small as an error of quadrature.
func (m *wallMotion) balance(g *staggered.Grid) {
	net, size := m.outflow(g)
	if size > 0 && math.Abs(net) <= fluxTolerance*size {
		m.spread(g, net, size)
	}
}

func finite(v float64) bool { return v-v == 0 }

// IsPeriodic reports whether the wall is [Periodic].
func (w Wall) IsPeriodic() bool { return w.kind == periodic }

// AtRest returns the walls with the same kinds but no motion along or through
// them: the walls of a small change of the flow.
func (w Walls) AtRest() Walls {
	still := func(w Wall) Wall { return Wall{kind: w.kind} }
	return Walls{Left: still(w.Left), Right: still(w.Right), Bottom: still(w.Bottom), Top: still(w.Top)}
}

// Sticks reports whether fluid sticks to the wall.
func (w Wall) Sticks() bool { return w.kind == noSlip }

// Velocity returns the velocity of a no-slip wall along itself at s, 0 where it
// was not made to move.
func (w Wall) Velocity(s float64) float64 {
	if w.tangential == nil {
		return 0
	}
	return w.tangential(s)
}

// Crossed reports whether fluid was made to cross the wall.
func (w Wall) Crossed() bool { return w.normal != nil }
