package stability

import (
	"fmt"
	"math"

	"example.org/overturn/stability/internal/element"
	"example.org/overturn/stability/internal/pencil"
)

// An engine answers questions about one system at one wavenumber.
type engine struct {
	still, moving *ladder
	bound         bounder
	from          float64 // smallest wavenumber of a search
	longWave      bool    // the still system has a finite limit at k = 0
	bottomless    bool    // Ra → 0 as k → 0
	diffuses      bool    // growth rates near zero are differences of rates like k²
	tolerance     float64
	maxUnknowns   int
}

// A bounder limits what disturbances of a system can do, see [bound].
type bounder interface {
	// lower returns a value of a number below which no disturbance of
	// wavenumber k grows, the other numbers being fixed; 0 if none is known.
	lower(k float64, n Number, fixed [3]float64) float64
	// growth returns a rate that no disturbance of wavenumber k exceeds; 0 if
	// none grows.
	growth(k float64, drive [3]float64) float64
}

// An answer is a solution with its error estimates and where it was found.
type answer struct {
	pencil.Solution
	value      float64 // the objective
	size       float64 // what the error of the value is relative to
	valueError float64
	kError     float64
	omegaError float64
	layout     *element.Layout
	system     *system
	re, im     []float64 // coefficients
}

// coarseTail is the size of the last coefficients, relative to the largest,
// under which a solution is good enough for a search.
const coarseTail = 3e-3

// resolvedTail is the size under which a mode is known as well as it should be:
// its error is of that order, that of an eigenvalue the square of it. Where
// round-off stops the estimates from falling, roundOffTail is enough.
const (
	resolvedTail = 1e-9
	roundOffTail = 1e-7
)

// roundOff is the relative error to which values and wavenumbers are known at
// best.
const roundOff = 2e-14

// refine follows a solution up a ladder until two levels agree. With lo < hi
// it is an extremum in k between them, else a point at fixed k.
func (e *engine) refine(on *ladder, c pencil.Curve, pt pencil.Point, first int, lo, hi float64) (answer, error) {
	var prev, cur answer
	for i := first; ; i++ {
		lv := on.level(i)
		s, err := follow(lv.work, c, pt, lo, hi)
		if err != nil {
			return cur, err
		}
		prev, cur = cur, answer{Solution: s, value: c.Objective(&s.Point), layout: lv.layout, system: on.system}
		pt = s.Point
		done := false
		if i == first {
			cur.valueError, cur.kError, cur.omegaError = math.Inf(1), math.Inf(1), math.Inf(1)
			cur.size = e.sizeOf(&cur, c.Kind)
		} else {
			cur.size = e.sizeOf(&cur, c.Kind)
			cur.estimate(&prev)
			tail := lv.tail()
			done = cur.converged(e.tolerance) && tail < resolvedTail ||
				i > first+1 && tail < roundOffTail && cur.stagnates(&prev)
		}
		if !done && on.size(i+1) > e.maxUnknowns {
			done, err = true, fmt.Errorf("stability: %w: relative error %.1e with %d unknowns, tolerance %.1e",
				ErrNotConverged, cur.valueError/cur.size, lv.layout.Size(), e.tolerance)
		}
		if done {
			if lo >= hi { // the wavenumber was given
				lv.work.Bend(c, &cur.Solution)
				cur.kError = 0
			}
			cur.re, cur.im = lv.work.Vector()
			return cur, err
		}
	}
}

func follow(w *pencil.Workspace, c pencil.Curve, pt pencil.Point, lo, hi float64) (pencil.Solution, error) {
	if lo < hi {
		return w.Extremum(c, pt, lo, hi)
	}
	return w.Solve(c, pt)
}

// sizeOf returns what the error of a value is relative to. A growth rate near
// zero may be the small difference of large ones.
func (e *engine) sizeOf(a *answer, kind pencil.Kind) float64 {
	size := math.Abs(a.value)
	if kind == pencil.Growth || kind == pencil.GrowingOscillation {
		size += math.Abs(imag(a.Sigma))
		if e.diffuses {
			size += a.K * a.K
		}
	}
	return size
}

// estimate sets the error estimates to the change from a coarser level, which
// is mostly the error of that one, and to round-off.
func (a *answer) estimate(coarser *answer) {
	a.valueError = math.Abs(a.value-coarser.value) + roundOff*a.size
	a.kError = math.Abs(a.K-coarser.K) + roundOff*a.K
	a.omegaError = math.Abs(imag(a.Sigma)-imag(coarser.Sigma)) + roundOff*math.Abs(imag(a.Sigma))
}

func (a *answer) converged(tolerance float64) bool {
	return a.valueError <= tolerance*a.size && a.kError <= tolerance*a.K+roundOff &&
		a.omegaError <= tolerance*math.Abs(imag(a.Sigma))
}

// stagnates reports whether the estimates have stopped falling, at a level
// where that is round-off's doing.
func (a *answer) stagnates(coarser *answer) bool {
	const small, progress = 1e-8, 0.3
	if a.valueError > small*a.size || a.kError > small*a.K || a.omegaError > small*math.Abs(imag(a.Sigma)) {
		return false
	}
	return a.valueError > progress*coarser.valueError || a.kError > progress*coarser.kError ||
		a.omegaError > progress*coarser.omegaError
}
