package heat

import (
	"math"
	"slices"
	"sync"

	"example.org/overturn/heat/internal/rows"
	"example.org/overturn/stokes/staggered"
)

// cellsPerWorker is the smallest share of the grid worth a goroutine.
const cellsPerWorker = 4096

// sweep computes rates of change in one pass over the rows of cells, in blocks
// of rows that run at the same time. What happens to a cell does not depend on
// the blocks, and sums are added up row by row.
type sweep struct {
	op     *operator
	blocks []*block
	tasks  []func()
	wait   sync.WaitGroup

	advection Advection
	vx, vz    []float64 // nil at rest
	source    []float64 // nil for none
	out, old  []float64
	t         []float64
	weights   rows.Weights

	inspecting bool         // the first pass of a step looks at its input
	peaks      [2][]float64 // largest |vx| and |vz| of each row
	sound      []bool       // whether the rates of each row are finite

	moved               []float64    // heat carried into each row by flow
	heating             []float64    // heat from the source
	conducted, advected [4][]float64 // through the side walls of each row; through bottom and top
}

// block is a range of rows with the fluxes that are being worked on.
type block struct {
	lo, hi      int
	heat        rows.Fluxes // through the faces of a row
	carried     rows.Fluxes // likewise, of temperature; used if the capacity varies
	conductance []float64   // of a row of z-faces
	filled      float64     // the value in conductance
	zeros       []float64
}

func newSweep(op *operator, workers int) *sweep {
	s := &sweep{
		op:      op,
		sound:   make([]bool, op.nz),
		moved:   make([]float64, op.nz),
		heating: make([]float64, op.nz),
	}
	for j := range s.peaks {
		s.peaks[j] = make([]float64, op.nz+1)
	}
	for _, side := range staggered.Sides() {
		n := op.nz
		if side.Horizontal() {
			n = 1
		}
		s.conducted[side], s.advected[side] = make([]float64, n), make([]float64, n)
	}
	n := max(1, min(workers, op.nz, op.nx*op.nz/cellsPerWorker))
	for j := range n {
		b := &block{lo: op.nz * j / n, hi: op.nz * (j + 1) / n}
		b.heat = newFluxes(op.nx)
		if op.capacities != nil {
			b.carried = newFluxes(op.nx)
		}
		b.conductance, b.zeros = make([]float64, op.nx), make([]float64, op.nx+1)
		s.blocks = append(s.blocks, b)
		s.tasks = append(s.tasks, func() { s.rows(b); s.wait.Done() })
	}
	return s
}

func newFluxes(nx int) rows.Fluxes {
	return rows.Fluxes{X: make([]float64, nx+1), Below: make([]float64, nx), Above: make([]float64, nx)}
}

// begin chooses what the next runs have in common.
func (s *sweep) begin(a Advection, flow *staggered.Flow, source *staggered.Scalar) {
	s.advection, s.vx, s.vz, s.source = a, nil, nil, nil
	s.inspecting = true
	if flow != nil {
		s.vx, s.vz = flow.VX, flow.VZ
	}
	if source != nil {
		s.source = source.Values
	}
}

// run stores the combination w of old, t and the rate of change of t in out,
// and adds share times the powers at t to rep. out may be old, not t.
func (s *sweep) run(out, old, t []float64, w rows.Weights, share float64, rep *Report) error {
	s.out, s.old, s.t, s.weights = out, old, t, w
	s.wait.Add(len(s.tasks))
	for _, task := range s.tasks[1:] {
		go task()
	}
	s.tasks[0]()
	s.wait.Wait()
	if s.inspecting {
		s.inspecting = false
		if !s.finite() {
			return ErrNotFinite
		}
	}
	s.collect(share, rep)
	return nil
}

// inspect looks at what went into row k and came out of it while the numbers
// are at hand.
func (s *sweep) inspect(k int) {
	op := s.op
	s.sound[k] = rows.Sound(s.out[k*op.nx : (k+1)*op.nx])
	if s.vx != nil {
		s.peaks[0][k] = rows.Peak(s.vx[k*(op.nx+1) : (k+1)*(op.nx+1)])
		s.peaks[1][k] = rows.Peak(s.vz[k*op.nx : (k+1)*op.nx])
		if k == op.nz-1 {
			s.peaks[1][k+1] = rows.Peak(s.vz[(k+1)*op.nx:])
		}
	}
	s.heating[k] = 0
	if s.source != nil {
		sum := 0.0
		for i, q := range s.source[k*op.nx : (k+1)*op.nx] {
			sum += q * op.dx[i]
		}
		s.heating[k] = sum / op.capacity
	}
}

// finite reports whether all numbers that were inspected are.
func (s *sweep) finite() bool {
	if slices.Contains(s.sound, false) || !allFinite(s.heating) {
		return false
	}
	return s.vx == nil || allFinite(s.peaks[0]) && allFinite(s.peaks[1])
}

func allFinite(list []float64) bool {
	for _, v := range list {
		if !(math.Abs(v) <= math.MaxFloat64) {
			return false
		}
	}
	return true
}

// collect adds up the budget.
func (s *sweep) collect(share float64, rep *Report) {
	var moved float64
	var b Report
	for k, dz := range s.op.dz {
		moved += s.moved[k] * dz
		b.Heating += s.heating[k] * dz
		for _, side := range [...]staggered.Side{staggered.Left, staggered.Right} {
			b.Conducted[side] += s.conducted[side][k] * dz
			b.Advected[side] += s.advected[side][k] * dz
		}
	}
	for _, side := range [...]staggered.Side{staggered.Bottom, staggered.Top} {
		b.Conducted[side], b.Advected[side] = s.conducted[side][0], s.advected[side][0]
	}
	if s.op.capacities != nil {
		b.Exchange = moved
		for side := range b.Advected {
			b.Exchange -= b.Advected[side]
		}
	}
	rep.addWeighted(share*s.op.capacity, &b)
}

// rows works on the rows of a block.
func (s *sweep) rows(b *block) {
	if e, ok := s.even(); ok {
		s.evenRows(b, e)
		return
	}
	b.filled = math.NaN()
	s.facesZ(b, b.lo)
	for k := b.lo; k < b.hi; k++ {
		b.swap()
		s.facesZ(b, k+1)
		s.facesX(b, k)
		s.update(b, k)
		if s.inspecting {
			s.inspect(k)
		}
	}
}

// swap makes the faces above the last row those below the next.
func (b *block) swap() {
	b.heat.Below, b.heat.Above = b.heat.Above, b.heat.Below
	b.carried.Below, b.carried.Above = b.carried.Above, b.carried.Below
}

// row returns row k of the temperature at hand.
func (s *sweep) row(k int) []float64 {
	n := s.op.nx
	return s.t[k*n : (k+1)*n : (k+1)*n]
}

func (s *sweep) update(b *block, k int) {
	op := s.op
	lo, hi := k*op.nx, (k+1)*op.nx
	out, old, t := s.out[lo:hi], s.old[lo:hi], s.t[lo:hi]
	var source []float64
	if s.source != nil {
		source = s.source[lo:hi]
	}
	if op.capacities == nil {
		rows.Update(out, old, t, &b.heat, source, op.ix, op.iz[k], 1/op.capacity, s.weights)
		return
	}
	if source == nil {
		source = b.zeros[:op.nx]
	}
	s.moved[k] = rows.UpdateVarying(out, old, t, &b.carried, &b.heat, source,
		op.capacities[lo:hi], op.dx, op.ix, op.iz[k], s.weights)
}
