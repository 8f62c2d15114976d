package stability

import (
	"errors"
	"fmt"
	"math"

	"example.org/overturn/stability/internal/pencil"
)

const (
	// hopfRatio separates the values of a number at which growth is looked for
	// below the stationary onset, and hopfWindow those above it, where an
	// oscillation may grow in a window only.
	hopfRatio  = 3.0
	hopfWindow = 1.5
	// hopfWidth is the relative width to which the onset of an oscillation is
	// bracketed before Newton's method takes over.
	hopfWidth = 1e-3
	// hopfReach is the step by which the value up to which oscillations are
	// looked for is lowered.
	hopfReach = 3
	// hopfMargin widens that limit, so that the neutral curve is seen on both
	// sides of its minimum.
	hopfMargin = 1.5
	// hopfDecades is how many powers of ten above the smallest bound
	// oscillations are looked for where no stationary onset sets a limit.
	hopfDecades = 5
	// certainGrowth is the size of a rate, relative to k² + |σ|, from which it
	// is not round-off.
	certainGrowth = 1e-9
)

// checkLevel is the level of the moving ladder on which growth is looked for.
const checkLevel = 1

// fastestOf returns the fastest growth rate at a value of the number, of all
// disturbances or of those that oscillate; zero if none grows.
func (q *question) fastestOf(k, value float64, level int, onlyOscillating bool) (complex128, error) {
	g := growing{engine: q.engine, drive: q.point(k, value).Drive}
	found, err := g.rates(k, level)
	if err != nil {
		return 0, err
	}
	for _, sigma := range found {
		size := k*k + near(sigma, 0)
		if real(sigma) <= certainGrowth*size {
			break
		}
		if onlyOscillating && imag(sigma) <= oscillating*size {
			continue
		}
		if g.confirms(k, sigma, level) {
			return sigma, nil
		}
	}
	return 0, nil
}

// confirms polishes a growth rate that may be round-off of a shift that is
// large because the bound is weak.
func (g *growing) confirms(k float64, sigma complex128, level int) bool {
	const suspect = 1e-8
	if real(sigma) > suspect*g.bound.growth(k, g.drive) {
		return true
	}
	s, err := g.moving.level(level).work.Solve(growthKind(k, sigma), g.point(k, sigma))
	return err != nil || real(s.Sigma) > certainGrowth*(k*k+near(s.Sigma, 0))
}

// oscillation computes the smallest value of the number up to a limit at which
// a neutral oscillation of wavenumber k exists, to some digits: on a coarse level,
// then following it up to one that resolves it.
func (q *question) oscillation(k, limit float64) (sample, error) {
	const drift = 2 // by which a finer level may change the value
	at, tail, err := q.oscillationAt(k, limit, checkLevel)
	for i := checkLevel; err == nil && !at.missing() && tail >= coarseTail && q.moving.size(i+1) <= q.maxUnknowns; i++ {
		finer, ok := q.neutralOscillation(at, at.value/drift, at.value*drift, i+1)
		if !ok {
			at, tail, err = q.oscillationAt(k, limit, i+1)
			continue
		}
		at, tail = finer, q.moving.level(i+1).tail()
	}
	if err != nil || at.level == checkLevel || at.missing() {
		return at, err
	}
	first, err := q.nothingBelow(at)
	if err != nil || first {
		return at, err
	}
	at, _, err = q.oscillationAt(k, limit, at.level)
	return at, err
}

// justBelow is how close below a neutral value growth is looked for.
const justBelow = 1 - 1e-6

// nothingBelow reports whether nothing grows just below a neutral value.
func (q *question) nothingBelow(at sample) (bool, error) {
	still, err := q.stationaryBelow(at.k, at.level)
	if err != nil {
		return false, err
	}
	other, err := q.fastestOf(at.k, at.value*justBelow, at.level, at.value*justBelow > still)
	return other == 0, err
}

// oscillationAt does the search on one level, and returns how far the solution
// has decayed.
func (q *question) oscillationAt(k, limit float64, level int) (sample, float64, error) {
	calm := q.bound.lower(k, q.number, q.fixed)
	if calm >= limit {
		return none(k), 0, nil
	}
	still, err := q.stationaryBelow(k, level)
	if err != nil {
		return sample{}, 0, err
	}
	wild, sigma, err := q.firstOscillation(k, calm, limit, still, level)
	if err != nil || sigma == 0 {
		return none(k), 0, err
	}
	calm = max(calm, wild/hopfRatio)
	for try := true; ; {
		// Newton's method from the growing mode, then a look just below: if
		// something grows there, another mode was first.
		if try {
			guess := sample{k: k, value: wild, omega: imag(sigma), slope: math.NaN(), level: level}
			if at, ok := q.neutralOscillation(guess, calm, wild, level); ok {
				tail := q.moving.level(level).tail()
				other, err := q.fastestOf(k, at.value*justBelow, level, at.value*justBelow > still)
				if err != nil || other == 0 {
					return at, tail, err
				}
				wild, sigma = at.value*justBelow, other
			}
			if wild-calm <= hopfWidth*wild {
				return guess, 0, nil
			}
		}
		m := (calm + wild) / 2
		at, err := q.fastestOf(k, m, level, m > still)
		if err != nil {
			return sample{}, 0, err
		}
		if at == 0 {
			calm = m
		} else {
			wild, sigma = m, at
		}
		try = at != 0 || wild-calm <= hopfWidth*wild
	}
}

// neutralOscillation follows a mode to where it is neutral, if that is between
// two values of the number.
func (q *question) neutralOscillation(at sample, lo, hi float64, level int) (sample, bool) {
	if at.omega == 0 {
		return sample{}, false
	}
	pt := q.point(at.k, at.value)
	pt.Sigma = complex(0, at.omega)
	s, err := q.moving.level(level).work.Solve(q.curve(pencil.MarginalOscillation), pt)
	value := s.Drive[driveOf(q.number)]
	if err != nil || !(value > lo && value <= hi && imag(s.Sigma) > 0) {
		return sample{}, false
	}
	return sample{k: at.k, value: value, omega: imag(s.Sigma), slope: s.Slope, level: level}, true
}

// stationaryBelow returns the stationary neutral value at a wavenumber, or +Inf.
// Below it, whatever grows has begun as an oscillation, even if its frequency has
// fallen to zero since.
func (q *question) stationaryBelow(k float64, level int) (float64, error) {
	if level > checkLevel {
		level = checkLevel
	}
	values, err := q.still.level(level).work.DriveEigenvalues(q.point(k, 0), driveOf(q.number))
	if err != nil {
		return 0, fmt.Errorf("stability: at wavenumber %g: %w", k, err)
	}
	if len(values) == 0 {
		return math.Inf(1), nil
	}
	return values[0] * (1 - hopfWidth), nil
}

// firstOscillation climbs from a value at which nothing grows to one at which
// an oscillation does, given the value of the stationary onset.
func (q *question) firstOscillation(k, calm, limit, still float64, level int) (float64, complex128, error) {
	value := calm
	if value == 0 {
		value = limit / 1e6
	}
	for value < limit {
		ratio := hopfRatio
		if value >= still {
			ratio = hopfWindow
		}
		next := min(value*ratio, limit)
		if value < still && still < next {
			next = still // the last value at which any growth tells
		}
		value = next
		sigma, err := q.fastestOf(k, value, level, value > still)
		if err != nil || sigma != 0 {
			return value, sigma, err
		}
	}
	return limit, 0, nil
}

// oscillatoryMinimum finds the smallest value of the number up to a limit at
// which some wavenumber has a neutral oscillation. None gives the value +Inf.
func (q *question) oscillatoryMinimum(limit float64) (answer, error) {
	c := q.curve(pencil.MarginalOscillation)
	point := func(at sample) pencil.Point {
		pt := q.point(at.k, at.value)
		pt.Sigma = complex(0, at.omega)
		return pt
	}
	s := &search{
		from:   q.from,
		sample: func(k float64) (sample, error) { return q.oscillation(k, limit) },
		lower: func(k float64) float64 {
			if b := q.lowerBound(k); !(b > limit) {
				return b
			}
			return math.Inf(1)
		},
		extremum: func(at sample, lo, hi float64) (answer, error) {
			return q.refine(q.moving, c, point(at), at.level, lo, hi)
		},
		point: func(at sample) (answer, error) { return q.refine(q.moving, c, point(at), at.level, 0, 0) },
	}
	return s.minimum(limit)
}

// wavenumbers lists the grid on which something could grow at a value.
func (q *question) wavenumbers(value float64) []float64 {
	var ks []float64
	for k := q.from; k < largestWavenumber; k *= gridRatio {
		if q.bound.lower(k, q.number, q.fixed) < value {
			ks = append(ks, k)
		}
	}
	return ks
}

// anythingGrows reports whether a disturbance on the grid grows at a value.
func (q *question) anythingGrows(value float64, level int) (bool, error) {
	for _, k := range q.wavenumbers(value) {
		sigma, err := q.fastestOf(k, value, level, false)
		if err != nil || sigma != 0 {
			return sigma != 0, err
		}
	}
	return false, nil
}

// first finds what happens first as the number grows: the stationary onset, or
// an oscillation before it.
func (q *question) first() (answer, error) {
	still, err := q.stationaryMinimum()
	var missing *NoOnsetError
	if err != nil && !errors.As(err, &missing) && !errors.Is(err, ErrNotConverged) {
		return still, err
	}
	if !q.oscillates || still.value == 0 {
		return still, err
	}
	limit := still.value
	if missing != nil {
		limit, err = q.valueOfGrowth(missing)
		if err != nil {
			return still, err
		}
	} else if grows, growErr := q.anythingGrows(limit*(1-1e-6), checkLevel); growErr != nil || !grows {
		return still, errors.Join(err, growErr)
	}
	for { // a lower limit makes the search shorter
		grows, err := q.anythingGrows(limit/hopfReach, checkLevel)
		if err != nil {
			return still, err
		}
		if !grows {
			break
		}
		limit /= hopfReach
	}
	moving, movingErr := q.oscillatoryMinimum(hopfMargin * limit)
	if movingErr == nil && moving.value < still.value {
		return moving, nil
	}
	if movingErr != nil {
		return moving, movingErr
	}
	if missing != nil {
		return still, missing
	}
	return still, err
}

// valueOfGrowth finds a value of the number at which something grows, although
// nothing has a stationary onset. If there is none it returns the error given.
func (q *question) valueOfGrowth(missing *NoOnsetError) (float64, error) {
	least := math.Inf(1)
	for k := q.from; k < largestWavenumber; k *= gridRatio {
		if b := q.bound.lower(k, q.number, q.fixed); b > 0 {
			least = min(least, b)
		}
	}
	if math.IsInf(least, 1) {
		least = 1
	}
	for value, i := 10*least, 0; i < hopfDecades; value, i = value*10, i+1 {
		missing.Largest = value
		grows, err := q.anythingGrows(value, checkLevel)
		if err != nil {
			return 0, err
		}
		if grows {
			return value, nil
		}
	}
	return 0, missing
}

// checkCalm returns ErrUnstable if something grows while the number is zero.
func (q *question) checkCalm() error {
	suspicious := false
	for k := q.from; k < largestWavenumber; k *= gridRatio {
		suspicious = suspicious || q.bound.lower(k, q.number, q.fixed) == 0
	}
	if !suspicious {
		return nil
	}
	for k := q.from; k < largestWavenumber; k *= gridRatio {
		if q.bound.growth(k, q.point(k, 0).Drive) == 0 {
			continue
		}
		sigma, err := q.fastestOf(k, 0, checkLevel, false)
		if err != nil {
			return err
		}
		if sigma != 0 {
			return ErrUnstable
		}
	}
	return nil
}
