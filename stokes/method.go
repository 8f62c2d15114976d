package stokes

import (
	"context"
	"fmt"

	"example.org/overturn/stokes/internal/layered"
	"example.org/overturn/stokes/internal/multigrid"
	"example.org/overturn/stokes/staggered"
)

// A Method is a way to solve the equations.
type Method int

// The methods.
const (
	// Automatic chooses Transform where it applies and Multigrid elsewhere.
	Automatic Method = iota

	// Multigrid solves any problem: generalised conjugate residuals,
	// preconditioned by a multigrid cycle.
	Multigrid

	// Transform solves directly, by sine or Fourier transforms along x and
	// elimination along z, and refines the answer with the residual of the
	// equations. It takes a viscosity that does not vary along x, at least three
	// equally wide columns whose number has no prime factor above eleven, two
	// rows, free-slip or periodic sides, and no flow through walls.
	Transform
)

// String returns the name of the method in lower case.
func (m Method) String() string {
	switch m {
	case Automatic:
		return "automatic"
	case Multigrid:
		return "multigrid"
	case Transform:
		return "transform"
	}
	return fmt.Sprintf("Method(%d)", int(m))
}

// maxRefinements bounds the direct solutions of one Solve. Each gains at least
// two digits on 2048 rows and more on fewer.
const maxRefinements = 8

// choose returns the method for the problem at hand, or an error when the one
// asked for does not apply.
func (sv *Solver) choose() (Method, error) {
	method := sv.settings.Method
	if method == Multigrid {
		return Multigrid, nil
	}
	reason := ""
	switch {
	case !sv.suits:
		reason = "it takes free-slip or periodic sides, two rows, and at least three columns of equal width whose number has no prime factor above eleven"
	case !sv.layered:
		reason = "the viscosity varies along x"
	case sv.load.source != nil || sv.motion.crossed():
		reason = "fluid crosses the walls or has sources"
	default:
		return Transform, nil
	}
	if method == Transform {
		return 0, fmt.Errorf("stokes: Method is %v, which does not apply: %s", Transform, reason)
	}
	return Multigrid, nil
}

// crossed reports whether fluid crosses a wall.
func (m *wallMotion) crossed() bool {
	for _, side := range staggered.Sides() {
		if m.normal[side] != nil {
			return true
		}
	}
	return false
}

// transform improves the solution, whose residual is known to be norms, by
// direct solutions until it is below target or they bring nothing more.
func (sv *Solver) transform(ctx context.Context, norms multigrid.Norms, target float64) (multigrid.Norms, int, error) {
	if sv.direct == nil {
		sv.direct = layered.New(sv.level, sv.mg.Team())
	}
	if !sv.factored {
		sv.direct.Factor()
		sv.factored = true
	}
	sv.watch(0, norms.Weighted)
	n := 0
	for n < min(maxRefinements, sv.settings.MaxIterations) && norms.Weighted > target {
		if err := ctx.Err(); err != nil {
			return norms, n, err
		}
		before := norms.Weighted
		sv.direct.Add(sv.mg.X, sv.mg.R)
		sv.mg.Residual(&sv.load)
		sv.direct.Balance(sv.mg.X.P, sv.mg.R)
		norms = sv.mg.Residual(&sv.load)
		n++
		sv.watch(n, norms.Weighted)
		if !(norms.Weighted < 0.5*before) {
			break
		}
	}
	return norms, n, nil
}
