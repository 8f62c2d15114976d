package stability

import (
	"errors"
	"fmt"
	"math"

	"example.org/overturn/stability/internal/pencil"
)

// A question is what is asked of an engine about neutral states: of which
// number, with what values of the others, and on the how manieth branch.
type question struct {
	*engine
	number Number
	fixed  [3]float64 // drives; that of number is ignored
	order  int

	oscillates bool // neutral modes may oscillate, for all that is known
}

// curve returns the family of neutral solutions in the number asked for.
func (q *question) curve(kind pencil.Kind) pencil.Curve {
	return pencil.Curve{Kind: kind, Drive: driveOf(q.number)}
}

// point returns a point of the pencil with the number at a value.
func (q *question) point(k, value float64) pencil.Point {
	pt := pencil.Point{K: k, Drive: q.fixed}
	pt.Drive[driveOf(q.number)] = value
	return pt
}

// lowerBound is the lower bound of the number, -Inf where none is known.
func (q *question) lowerBound(k float64) float64 {
	if b := q.bound.lower(k, q.number, q.fixed); b > 0 {
		return b
	}
	return math.Inf(-1)
}

// stationary computes a point of the stationary neutral curve to some digits.
func (q *question) stationary(k float64) (sample, error) {
	for i := 0; ; i++ {
		s, tail, err := q.stationaryAt(k, i)
		if err != nil || tail < coarseTail || q.still.size(i+1) > q.maxUnknowns {
			return s, err
		}
	}
}

// stationaryAt does it on one level, and returns how far the solution has
// decayed.
func (q *question) stationaryAt(k float64, i int) (sample, float64, error) {
	lv := q.still.level(i)
	values, err := lv.work.DriveEigenvalues(q.point(k, 0), driveOf(q.number))
	if err != nil {
		return sample{}, 0, fmt.Errorf("stability: at wavenumber %g: %w", k, err)
	}
	if len(values) <= q.order {
		return none(k), 0, nil
	}
	value := values[q.order]
	s, err := lv.work.Solve(q.curve(pencil.Marginal), q.point(k, value))
	if found := s.Drive[driveOf(q.number)]; err != nil || math.Abs(found-value) > 1e-3*value {
		// Two branches that nearly touch: keep the eigenvalue, without slope.
		return sample{k: k, value: value, slope: math.NaN(), level: i}, 0, nil
	}
	return sample{k: k, value: s.Drive[driveOf(q.number)], slope: s.Slope, level: i}, lv.tail(), nil
}

// stationaryMinimum finds the smallest value of the number at which some
// wavenumber is neutral without oscillating.
func (q *question) stationaryMinimum() (answer, error) {
	if q.bottomless && q.order == 0 && q.number == ThermalRayleigh {
		return answer{system: q.still.system}, nil
	}
	best := answer{value: math.Inf(1)}
	var err error
	if q.longWave {
		if best, err = q.longWaveMinimum(); err != nil {
			return best, err
		}
	}
	s := q.stationarySearch()
	found, err := s.minimum(best.value)
	if err != nil && !errors.Is(err, ErrNotConverged) {
		return found, err
	}
	if found.value < best.value {
		return found, err
	}
	if !math.IsInf(best.value, 1) {
		return best, nil
	}
	if left := s.samples[0]; !left.missing() && left.value <= s.smallest() {
		return q.longWaveEdge(left)
	}
	return best, &NoOnsetError{Number: q.number, Wavenumber: s.interval()}
}

// longWaveEdge stands in for the limit k → 0 where the system is singular there:
// the neutral value at the smallest wavenumber, whose distance from the limit
// goes into the error.
func (q *question) longWaveEdge(left sample) (answer, error) {
	a, err := q.stationaryNeutral(left.k)
	a.valueError += math.Abs(a.Slope) * a.K
	a.K = 0
	return a, err
}

// stationarySearch is the search for the minimum at k > 0.
func (q *question) stationarySearch() *search {
	c := q.curve(pencil.Marginal)
	return &search{
		from: q.from, sample: q.stationary, lower: q.lowerBound,
		extremum: func(at sample, lo, hi float64) (answer, error) {
			return q.refine(q.still, c, q.point(at.k, at.value), at.level, lo, hi)
		},
		point: func(at sample) (answer, error) {
			return q.refine(q.still, c, q.point(at.k, at.value), at.level, 0, 0)
		},
	}
}

// longWaveMinimum returns the limit k → 0 if the curve rises from there.
func (q *question) longWaveMinimum() (answer, error) {
	no := answer{value: math.Inf(1)}
	values, err := q.still.level(0).work.DriveEigenvalues(q.point(0, 0), driveOf(q.number))
	if err != nil || len(values) <= q.order {
		return no, err
	}
	found, err := q.refine(q.still, q.curve(pencil.Marginal), q.point(0, values[q.order]), 0, 0, 0)
	if errors.Is(err, pencil.ErrDiverged) { // no mean gradient: the limit is infinite
		return no, nil
	}
	if found.Curvature <= 0 {
		return no, nil
	}
	return found, err
}

// stationaryNeutral returns the stationary neutral state at a wavenumber, to
// the tolerance. No such state gives the value +Inf.
func (q *question) stationaryNeutral(k float64) (answer, error) {
	s, err := q.stationary(k)
	if err != nil || s.missing() {
		return answer{value: math.Inf(1)}, err
	}
	a, err := q.refine(q.still, q.curve(pencil.Marginal), q.point(k, s.value), s.level, 0, 0)
	if errors.Is(err, pencil.ErrDiverged) {
		return a, fmt.Errorf("stability: neutral state at wavenumber %g: %w", k, err)
	}
	return a, err
}
