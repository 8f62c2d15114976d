package stability

import (
	"cmp"
	"errors"
	"fmt"
	"math"
	"slices"
)

const (
	// gridRatio separates the wavenumbers of a search.
	gridRatio = 1.25

	// A search stays within these wavenumbers even where no bound says that
	// there is nothing outside, unless the boundaries ask for smaller ones.
	leastWavenumber   = 1e-3
	largestWavenumber = 1e3

	// farAbove is how many times the best value a curve has to rise, where no
	// bound is known, before the search stops.
	farAbove = 30

	// closeCall: a minimum that an interpolation puts within this part of the
	// best value above it is refined.
	closeCall = 0.1

	// surprise is the relative error of an interpolated value at which an
	// interval is halved.
	surprise = 0.02
	halvings = 4
)

// A sample is a point of a curve, as a search sees it: the value to some
// digits, its slope or NaN, and the level that gave it.
type sample struct {
	k, value, slope float64
	omega           float64 // frequency
	level           int
}

// none is a sample of a wavenumber that has no value.
func none(k float64) sample { return sample{k: k, value: math.Inf(1), slope: math.NaN()} }

func (s sample) missing() bool { return math.IsInf(s.value, 1) }

// A search finds the smallest value of a curve over all wavenumbers.
//
// It is bounded on both sides: a wavenumber is looked at as long as its lower
// bound is below the best value found. Each interval of a grid is interpolated
// from values and slopes; where the interpolation is wrong in the middle the
// interval is halved; every interval that encloses a minimum close to the best
// one is refined to full precision.
type search struct {
	sample func(k float64) (sample, error)

	// lower is a bound of the value at k, -Inf where nothing is known.
	lower func(k float64) float64

	// extremum computes the minimum between two wavenumbers from a guess, and
	// point the value at the wavenumber of a guess, to full precision.
	extremum func(guess sample, lo, hi float64) (answer, error)
	point    func(guess sample) (answer, error)

	from    float64 // smallest wavenumber
	samples []sample
}

// minimum returns the smallest minimum between samples that is close to limit or
// below it. No minimum gives the value +Inf.
func (s *search) minimum(limit float64) (answer, error) {
	if err := s.scan(); err != nil {
		return answer{}, err
	}
	if err := s.inspect(); err != nil {
		return answer{}, err
	}
	best := answer{value: math.Inf(1)}
	limit = above(min(limit, s.smallest()))
	var warning error
	for i := range len(s.samples) - 1 {
		a, b := s.samples[i], s.samples[i+1]
		if !encloses(a, b) || interpolated(a, b).value > limit {
			continue
		}
		found, err := s.refine(a, b)
		if err != nil && !errors.Is(err, ErrNotConverged) {
			return found, err
		}
		if found.value < best.value {
			best, warning = found, err
		}
	}
	return best, warning
}

// refine computes the minimum between two samples.
func (s *search) refine(a, b sample) (answer, error) {
	found, err := s.extremum(interpolated(a, b), a.k, b.k)
	if err == nil || errors.Is(err, ErrNotConverged) {
		return found, err
	}
	return s.bisect(a, b)
}

// bisect closes in on a minimum by the sign of the slope, until Newton's
// method takes over. It also finds the corner where two branches cross.
func (s *search) bisect(a, b sample) (answer, error) {
	const corner = 1e-12 // relative width at which the minimum must be a corner
	for b.k-a.k > corner*b.k {
		m, err := s.sample((a.k + b.k) / 2)
		if err != nil {
			return answer{}, err
		}
		if m.slope < 0 {
			a = m
		} else {
			b = m
		}
		if m.missing() {
			continue
		}
		if found, err := s.extremum(m, a.k, b.k); err == nil {
			return found, nil
		}
	}
	found, err := s.point(b)
	if err != nil {
		return found, fmt.Errorf("stability: minimum between wavenumbers %g and %g: %w", a.k, b.k, err)
	}
	found.kError = max(found.kError, corner*b.k)
	return found, nil
}

// above returns the value up to which a minimum is close to the best.
func above(best float64) float64 { return best + closeCall*math.Abs(best) }

// interval returns the wavenumbers that were looked at.
func (s *search) interval() [2]float64 {
	return [2]float64{s.samples[0].k, s.samples[len(s.samples)-1].k}
}

// scan samples a grid of wavenumbers, from the one with the smallest bound
// outwards.
func (s *search) scan() error {
	centre := s.centre()
	first, err := s.sample(centre)
	if err != nil {
		return err
	}
	s.samples = append(s.samples[:0], first)
	best := first.value
	for up, down, upDone, downDone := centre, centre, false, false; !upDone || !downDone; {
		if !upDone {
			up *= gridRatio
			at, err := s.add(up, &best)
			if err != nil {
				return err
			}
			upDone = up > largestWavenumber || s.nothingBeyond(at, best, at.slope > 0)
		}
		if !downDone {
			down /= gridRatio
			at, err := s.add(down, &best)
			if err != nil {
				return err
			}
			downDone = down < s.from || s.nothingBeyond(at, best, at.slope < 0)
		}
	}
	s.sort()
	return nil
}

func (s *search) sort() {
	slices.SortFunc(s.samples, func(a, b sample) int { return cmp.Compare(a.k, b.k) })
}

func (s *search) add(k float64, best *float64) (sample, error) {
	at, err := s.sample(k)
	if err == nil {
		s.samples = append(s.samples, at)
		*best = min(*best, at.value)
	}
	return at, err
}

// nothingBeyond reports whether the scan may stop at a sample: its value is
// above the best, and the bound says that all farther ones are too. Without a
// bound, the curve must have risen far above the best, and rise on.
func (s *search) nothingBeyond(at sample, best float64, rising bool) bool {
	if !(at.value > best) || math.IsInf(best, 1) {
		return false
	}
	if b := s.lower(at.k); !math.IsInf(b, -1) {
		return b > best
	}
	return at.value > farAbove*best && rising
}

// centre returns the wavenumber with the smallest bound.
func (s *search) centre() float64 {
	const start, step = 3, 1.3
	at, least := float64(start), math.Inf(1)
	for k := s.from; k < largestWavenumber; k *= step {
		if b := s.lower(k); !math.IsInf(b, -1) && b < least {
			at, least = k, b
		}
	}
	return max(at, 10*s.from)
}

func (s *search) smallest() float64 {
	v := math.Inf(1)
	for _, at := range s.samples {
		v = min(v, at.value)
	}
	return v
}

// encloses reports whether the curve has a minimum between two samples.
func encloses(a, b sample) bool { return a.slope < 0 && b.slope >= 0 }

// interpolated returns the minimum between two samples of the cubic through
// their values and slopes, in ln k.
func interpolated(a, b sample) sample {
	h := math.Log(b.k / a.k)
	da, db := a.slope*a.k*h, b.slope*b.k*h
	// value = a + da t + c t² + e t³
	c := 3*(b.value-a.value) - 2*da - db
	e := da + db - 2*(b.value-a.value)
	t := -da / (c + math.Sqrt(max(c*c-3*e*da, 0)))
	if !(t > 0 && t < 1) {
		t = da / (da - db)
	}
	return sample{
		k: a.k * math.Exp(h*t), value: a.value + t*(da+t*(c+t*e)),
		omega: a.omega + t*(b.omega-a.omega), level: max(a.level, b.level),
	}
}

// middle returns the interpolated value halfway between two samples.
func middle(a, b sample) sample {
	h := math.Log(b.k / a.k)
	return sample{k: math.Sqrt(a.k * b.k), value: (a.value+b.value)/2 + h*(a.slope*a.k-b.slope*b.k)/8}
}

// inspect halves the intervals that interpolation gets wrong, where it matters.
func (s *search) inspect() error {
	best, first := s.smallest(), len(s.samples)
	for i := range first - 1 { // new samples go to the end
		if err := s.inspectInterval(s.samples[i], s.samples[i+1], best, halvings); err != nil {
			return err
		}
	}
	s.sort()
	return nil
}

func (s *search) inspectInterval(a, b sample, best float64, depth int) error {
	if depth == 0 || !worthwhile(a, b, above(best)) {
		return nil
	}
	guess := middle(a, b)
	m, err := s.sample(guess.k)
	if err != nil {
		return err
	}
	s.samples = append(s.samples, m)
	if math.Abs(guess.value-m.value) <= surprise*math.Abs(m.value) {
		return nil
	}
	if err = s.inspectInterval(a, m, best, depth-1); err != nil {
		return err
	}
	return s.inspectInterval(m, b, best, depth-1)
}

// worthwhile reports whether an interval could hold a minimum below a limit.
func worthwhile(a, b sample, limit float64) bool {
	if a.missing() && b.missing() {
		return false
	}
	if math.IsNaN(a.slope) || math.IsNaN(b.slope) {
		return min(a.value, b.value) < limit
	}
	least := min(a.value, b.value, middle(a, b).value)
	if encloses(a, b) {
		least = min(least, interpolated(a, b).value)
	}
	return least < limit
}
