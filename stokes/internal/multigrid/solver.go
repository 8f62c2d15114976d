package multigrid

import (
	"context"
	"math"

	"example.org/overturn/stokes/internal/team"
)

// A Load is the right-hand side of the Stokes equations.
type Load interface {
	// AddRow adds to fx, fz and g row j of the body force and of the source of
	// mass, integrated over the control volumes. Slots of walls are ignored.
	AddRow(j int, fx, fz, g []float64)
}

// A Solver finds the flow under a load by generalised conjugate residuals
// (Eisenstat, Elman & Schultz 1983) with one multigrid cycle as right
// preconditioner.
//
// Residuals are measured by three dissipations,
//
//	|r|² = Σ rx²/Dx + rz²/Dz + rp² η/V,
//
// with D the diagonal of the momentum equations: dimensionally consistent, and
// fair to stiff and weak regions alike. In the plain norm up to three times
// as many iterations are needed.
type Solver struct {
	*Hierarchy
	X Fields // start and answer; wall velocities are set by the caller
	R Fields // the residual of X

	z, q  []Fields  // directions and what the operator makes of them
	beta  []float64 // row k: coefficients of q[k] before orthogonalisation
	norm  []float64 // |q[k]|²
	alpha []float64
	parts []float64 // of the present q along the earlier ones

	load   Load
	k      int  // present direction
	first  bool // the next direction is to be found by full multigrid
	sums   []float64
	totals []float64
	step   float64
	coeff  []float64

	residualPass, applyPass, dotPass, updatePass, combinePass func(member int)
}

// The basis starts with room for shortBasis directions. When they are used up
// without the residual having fallen by goodProgress, the basis grows, and goes
// on growing, instead of starting anew: near rigid bodies a restart on a
// plateau is the end of convergence.
const (
	shortBasis   = 5
	goodProgress = 1e-3
)

// A new q of which less than lossOfAngle, in square, is new is orthogonalised
// twice; one of which less than parallel is new is rounding and ends the round.
const (
	lossOfAngle = 1e-2
	parallel    = 1e-26
)

// NewSolver makes a solver for the grid of x and z.
func NewSolver(x, z Axis, t *team.Team) *Solver {
	sv := &Solver{Hierarchy: NewHierarchy(x, z, t)}
	l := sv.Finest()
	sv.totals, sv.sums = make([]float64, 3), make([]float64, 3*(l.Z.N+1))
	sv.X, sv.R = newFields(l.size()), newFields(l.size())
	rows := func(work func(s *scratch, j int), begin func(s *scratch, j int)) func(int) {
		return func(member int) {
			blocks := sv.blocks[0]
			if member >= blocks {
				return
			}
			lo, hi := team.Block(l.Z.N, member, blocks)
			s := sv.s[member]
			if begin != nil {
				begin(s, lo+1)
			}
			for j := lo + 1; j <= hi; j++ {
				work(s, j)
			}
		}
	}
	sv.residualPass = rows(sv.residualRow, func(s *scratch, j int) { l.begin(s, sv.X, j) })
	sv.applyPass = rows(sv.applyRow, func(s *scratch, j int) { l.begin(s, sv.z[sv.k], j) })
	if l.mx != nil {
		// The operator can follow the last sweep of the cycle row by row.
		apply := stage{func(m, j int) { sv.applyAfter(sv.s[m], j) }, 8, 9}
		sv.finish = newPipeline(l.Z.N, t, sv.blocks[0], sv.s, append(l.passes.upStages, apply))
	}
	sv.dotPass = rows(sv.dotsRow, nil)
	sv.updatePass = rows(sv.updateRow, nil)
	sv.combinePass = rows(sv.combineRow, nil)
	return sv
}

// grow extends the basis to m directions.
func (sv *Solver) grow(m int) {
	size := sv.Finest().size()
	for len(sv.z) < m {
		sv.z = append(sv.z, newFields(size))
		sv.q = append(sv.q, newFields(size))
	}
	old, n := sv.beta, len(sv.norm)
	sv.beta = make([]float64, m*m)
	for k := range n {
		copy(sv.beta[k*m:], old[k*n:(k+1)*n])
	}
	sv.norm = append(sv.norm, make([]float64, m-len(sv.norm))...)
	sv.parts = append(sv.parts, make([]float64, m-len(sv.parts))...)
	sv.alpha = append(sv.alpha, make([]float64, m-len(sv.alpha))...)
	sv.coeff = append(sv.coeff, make([]float64, m-len(sv.coeff))...)
	sv.totals = make([]float64, m+2)
	sv.sums = make([]float64, (sv.Finest().Z.N+1)*(m+2))
}

// Norms are sizes of a residual.
type Norms struct {
	Weighted   float64 // of all three equations, see Solver
	Momentum   float64 // root of the sum of momentum residual² / volume
	Continuity float64 // the same for continuity
}

// Limits say when Solve stops.
type Limits struct {
	Target     float64 // weighted residual to reach
	Iterations int
	Basis      int // directions kept before the solver starts anew

	// Watch, if not nil, is told the weighted residual before the first and
	// after every iteration.
	Watch func(iteration int, residual float64)
}

// Residual computes the residual of X under the load and returns its norms.
func (sv *Solver) Residual(load Load) Norms {
	sv.load = load
	sv.Finest().WrapFields(sv.X)
	sv.run(0, sv.residualPass)
	t := sv.total(3)
	return Norms{math.Sqrt(t[0]), math.Sqrt(t[1]), math.Sqrt(t[2])}
}

// Solve improves X until its residual reaches the target. It returns the
// norms of the true residual of the answer and the number of iterations made.
// The error is that of the context.
func (sv *Solver) Solve(ctx context.Context, load Load, lim Limits) (Norms, int, error) {
	if len(sv.z) == 0 {
		sv.grow(min(shortBasis, lim.Basis))
	}
	norms := sv.Residual(load)
	if lim.Watch != nil {
		lim.Watch(0, norms.Weighted)
	}
	done := 0
	for done < lim.Iterations && norms.Weighted > lim.Target {
		before := norms.Weighted
		sv.first = done == 0 && !sv.Finest().jumps.sharp()
		n, err := sv.round(ctx, lim, done, before)
		done += n
		sv.combine()
		if err != nil {
			return sv.Residual(load), done, err
		}
		// The recursive residual drifts from the true one: start anew from
		// the latter, and end only if that agrees.
		norms = sv.Residual(load)
		if n == 0 || !(norms.Weighted < before) {
			break // rounding allows no better
		}
	}
	return norms, done, nil
}

// round iterates until the target is reached or the basis is full, from a true
// residual of size start.
func (sv *Solver) round(ctx context.Context, lim Limits, done int, start float64) (int, error) {
	sv.k = 0
	residual := start
	n := 0
	for done+n < lim.Iterations && residual > lim.Target {
		if err := ctx.Err(); err != nil {
			return n, err
		}
		if sv.k == len(sv.z) {
			if residual < goodProgress*start && len(sv.z) <= shortBasis || len(sv.z) >= lim.Basis {
				return n, nil
			}
			sv.grow(min(lim.Basis, 2*len(sv.z)))
		}
		next, ok := sv.iterate()
		if !ok {
			return n, nil
		}
		residual = next
		n++
		if lim.Watch != nil {
			lim.Watch(done+n, residual)
		}
	}
	return n, nil
}

// iterate adds one direction and returns the norm of the residual after it,
// or false when the direction adds nothing.
func (sv *Solver) iterate() (float64, bool) {
	k, m := sv.k, len(sv.z)
	if sv.first {
		sv.solveFull(sv.z[k], sv.R)
		sv.first = false
	} else {
		sv.Precondition(sv.z[k], sv.R)
	}
	if !sv.done {
		sv.run(0, sv.applyPass)
	}
	clear(sv.beta[k*m:][:k])
	t := sv.total(k + 2)
	whole := t[k]
	rest := sv.orthogonalise(t)
	if !(rest > lossOfAngle*whole) {
		// Most of q was in the span of the others and what is left is
		// inaccurate: take its parts out once more.
		sv.step = 0
		sv.run(0, sv.updatePass)
		sv.run(0, sv.dotPass)
		t = sv.total(k + 2)
		rest = sv.orthogonalise(t)
	}
	if !(rest > parallel*whole) {
		return 0, false
	}
	sv.norm[k] = rest
	sv.step = t[k+1] / rest
	sv.alpha[k] = sv.step
	sv.run(0, sv.updatePass)
	sv.k++
	return math.Sqrt(sv.total(1)[0]), true
}

// orthogonalise turns the inner products of q[k] with the earlier q into
// coefficients, for updatePass to use, and returns the square of what will be
// left of q.
func (sv *Solver) orthogonalise(t []float64) float64 {
	k, m := sv.k, len(sv.z)
	rest := t[k]
	for i := range k {
		b := t[i] / sv.norm[i]
		sv.parts[i] = b
		sv.beta[k*m+i] += b
		rest -= b * t[i]
	}
	return rest
}

// combine adds to X the directions of this round. The orthogonalised
// directions p obey p[k] = z[k] − Σ beta[k,i] p[i]; in terms of the z the sum
// of alpha[k] p[k] follows by back substitution.
func (sv *Solver) combine() {
	k, m := sv.k, len(sv.z)
	if k == 0 {
		return
	}
	copy(sv.coeff, sv.alpha[:k])
	for i := k - 1; i >= 0; i-- {
		for j := range i {
			sv.coeff[j] -= sv.beta[i*m+j] * sv.coeff[i]
		}
	}
	sv.run(0, sv.combinePass)
}
