package heat

import (
	"math"
	"sync"

	"example.org/overturn/heat/internal/lines"
	"example.org/overturn/heat/internal/rows"
	"example.org/overturn/stokes/staggered"
)

// rosenbrockGamma makes ROS2 damp stiff decay completely in one dimension.
const rosenbrockGamma = 1 - math.Sqrt2/2

// implicit solves (1 − γ dt Ax)(1 − γ dt Az) k = r, where Ax and Az are
// conduction along x and z.
type implicit struct {
	op     *operator
	step   float64 // whose factors are held
	factor float64 // of Ax and Az in them
	x      *lines.System
	z      *lines.System

	tasksF []func() // factor
	tasksX []func() // solve along x
	tasksZ []func() // and along z
	wait   sync.WaitGroup
	k      []float64 // being solved for

	shifts   [4][]float64 // what moving walls add to the flux, see shift
	shifting float64      // their sign in the solve at hand, 0 for none

	sides [2][]float64 // per row: homogeneous flux through left and right
	ends  [2][]float64 // per column: through bottom and top
}

// linePart is the share of a goroutine.
type linePart struct{ row0, row1, col0, col1 int }

func newImplicit(op *operator, workers int) *implicit {
	sharing := lines.Shared
	if op.varying || op.capacities != nil {
		sharing = lines.Each
	}
	im := &implicit{op: op, step: math.NaN()}
	sharingX, sharingZ := sharing, sharing
	if !op.alike(staggered.Left, staggered.Right) {
		sharingX = lines.Each
	}
	if !op.alike(staggered.Bottom, staggered.Top) {
		sharingZ = lines.Each
	}
	im.x = lines.NewRows(op.nx, op.nz, sharingX, op.ring)
	im.z = lines.NewColumns(op.nx, op.nz, sharingZ)
	im.load()
	for _, side := range staggered.Sides() {
		n := op.nz
		if side.Horizontal() {
			n = op.nx
		}
		im.shifts[side] = make([]float64, n)
	}
	for e := range 2 {
		im.sides[e], im.ends[e] = make([]float64, op.nz), make([]float64, op.nx)
	}
	n := max(1, min(workers, op.nx, op.nz, op.nx*op.nz/cellsPerWorker))
	for j := range n {
		p := linePart{op.nz * j / n, op.nz * (j + 1) / n, op.nx * j / n, op.nx * (j + 1) / n}
		im.tasksF = append(im.tasksF, func() { im.factorPart(p); im.wait.Done() })
		im.tasksX = append(im.tasksX, func() { im.alongX(p); im.wait.Done() })
		im.tasksZ = append(im.tasksZ, func() { im.alongZ(p); im.wait.Done() })
	}
	return im
}

// alike reports whether the conduction through each of two walls depends on
// temperature in the same way all along it.
func (op *operator) alike(a, b staggered.Side) bool {
	for _, s := range [...]staggered.Side{a, b} {
		if w := &op.walls[s]; !same(w.c1) || !same(w.c2) {
			return false
		}
	}
	return true
}

// load reads the conduction into the systems.
func (im *implicit) load() {
	op := im.op
	im.x.Load(func(k, i int) (before, here, after float64) {
		s, f := op.alongX(i, k), 1/(op.dx[i]*op.cellCapacity(k*op.nx+i))
		return f * s.west, f * s.centre, f * s.east
	})
	im.z.Load(func(i, k int) (before, here, after float64) {
		s, f := op.alongZ(i, k), 1/(op.dz[k]*op.cellCapacity(k*op.nx+i))
		return f * s.south, f * s.centre, f * s.north
	})
}

// prepare makes the factors for a step.
func (im *implicit) prepare(dt float64) {
	if dt == im.step {
		return
	}
	im.factor = rosenbrockGamma * dt
	im.launch(im.tasksF)
	im.step = dt
}

// solve replaces k by the solution, in place, and adds share times the heat that
// its own conduction brought through the walls to rep.
func (im *implicit) solve(k []float64, share float64, rep *Report) {
	im.k = k
	im.launch(im.tasksX)
	im.launch(im.tasksZ)
	op := im.op
	share *= op.capacity
	for e, s := range [...]staggered.Side{staggered.Left, staggered.Right} {
		for j, dz := range op.dz {
			rep.Conducted[s] += share * im.sides[e][j] * dz
		}
	}
	for e, s := range [...]staggered.Side{staggered.Bottom, staggered.Top} {
		for j, dx := range op.dx {
			rep.Conducted[s] += share * im.ends[e][j] * dx
		}
	}
}

func (im *implicit) launch(tasks []func()) {
	im.wait.Add(len(tasks))
	for _, task := range tasks[1:] {
		go task()
	}
	tasks[0]()
	im.wait.Wait()
}

// factorPart factors a part of the lines. Those that share a matrix leave it to
// the first part.
func (im *implicit) factorPart(p linePart) {
	if p.row0 == 0 || im.x.Sharing() == lines.Each {
		im.x.Factor(im.factor, p.row0, p.row1)
	}
	if p.col0 == 0 || im.z.Sharing() == lines.Each {
		im.z.Factor(im.factor, p.col0, p.col1)
	}
}

func (im *implicit) alongX(p linePart) {
	op := im.op
	if im.shifting != 0 && !op.ring {
		im.enterSides(p)
	}
	im.x.Solve(im.k, p.row0, p.row1)
	if op.ring {
		return
	}
	left, right := &op.walls[staggered.Left], &op.walls[staggered.Right]
	for j := p.row0; j < p.row1; j++ {
		row := im.k[j*op.nx : (j+1)*op.nx]
		im.sides[0][j] = left.response(j, row[0], row[min(1, op.nx-1)]) + im.shifting*im.shifts[staggered.Left][j]
		im.sides[1][j] = right.response(j, row[op.nx-1], row[max(op.nx-2, 0)]) + im.shifting*im.shifts[staggered.Right][j]
	}
}

func (im *implicit) alongZ(p linePart) {
	op := im.op
	if im.shifting != 0 {
		im.enterEnds(p)
	}
	im.z.Solve(im.k, p.col0, p.col1)
	bottom, top := &op.walls[staggered.Bottom], &op.walls[staggered.Top]
	b1, b2 := im.row(0), im.row(min(1, op.nz-1))
	t1, t2 := im.row(op.nz-1), im.row(max(op.nz-2, 0))
	for j := p.col0; j < p.col1; j++ {
		im.ends[0][j] = bottom.response(j, b1[j], b2[j]) + im.shifting*im.shifts[staggered.Bottom][j]
		im.ends[1][j] = top.response(j, t1[j], t2[j]) + im.shifting*im.shifts[staggered.Top][j]
	}
}

func (im *implicit) row(k int) []float64 { return im.k[k*im.op.nx : (k+1)*im.op.nx] }

// response is the flux that temperatures conduct into the box through a wall
// whose own numbers are zero.
func (w *wallLine) response(j int, t1, t2 float64) float64 { return w.c2[j]*t2 - w.c1[j]*t1 }

// rosenbrock is ROS2 of Verwer et al. (1999, eq. 6) with A ≈ Ax + Az factored
// (Hundsdorfer & Verwer 2003, section IV.5): of second order for any A, so that
// advection, which A leaves out, is integrated as by rungeKutta2:
//
//	(1 − γ dt Ax)(1 − γ dt Az) k1 = dt F(T)
//	(1 − γ dt Ax)(1 − γ dt Az) k2 = dt F(T + k1) − 2 k1
//	T ← T + 3/2 k1 + 1/2 k2
//
// Where walls change in time by Δ, k1 is Δ at the wall and k2 is −Δ, as the
// non-autonomous form asks; see shift for what the factors make of it.
//
// A steady state stays as it is, whatever dt. As γ ≥ 1/4, decaying modes are
// multiplied by a number between −1 and 1 whatever dt: with w = −dt(λx+λz) and
// p = (1 − γ dt λx)(1 − γ dt λz) ≥ 1 + γw it is 1 − 2w/p + (w²/2 + w)/p².
func (st *Stepper) rosenbrock(t []float64, dt float64, rep *Report) error {
	im, k, u := st.implicit, st.stage[0], st.stage[1]
	st.moveTo(0)
	if err := st.first(k, t, rows.Weights{Rate: dt}, 1./2, dt, rep); err != nil {
		return err
	}
	im.prepare(dt)
	im.shift(&st.motion)
	im.solve(k, rosenbrockGamma/2, rep)
	rows.Sum(u, t, k)
	st.moveTo(1)
	if err := st.sweep.run(k, k, u, rows.Weights{Old: -2, Rate: dt}, 1./2, rep); err != nil {
		return err
	}
	im.shifting = -im.shifting
	im.solve(k, rosenbrockGamma/2, rep)
	rows.Finish(t, u, k)
	return nil
}
