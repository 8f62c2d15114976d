package stability

import (
	"errors"
	"fmt"
	"math"
	"slices"
)

// A Box cuts a piece out of a layer, with vertical sides that let only certain
// wavenumbers fit.
type Box struct {
	// Aspect is width over depth, > 0.
	Aspect float64

	// Sides are the conditions at the vertical sides. Default Mirrors.
	Sides Sides
}

// Sides says what the vertical sides of a box do.
type Sides int

const (
	// Mirrors are impermeable, free of stress, and insulating: k = nπ/A for
	// n rolls.
	Mirrors Sides = iota
	// Periodic sides join: k = 2πn/A for n pairs of rolls.
	Periodic
)

// A BoxOnset is the onset of one pattern in a box.
type BoxOnset struct {
	// Rolls is how many rolls stand side by side.
	Rolls int
	Onset
}

// InBox returns the onsets of the patterns that fit into a box, the first and
// the second to set in as the Rayleigh number grows.
func (l Layer) InBox(box Box) (first, second BoxOnset, err error) {
	s, err := NewSolver(l, nil)
	if err != nil {
		return first, second, err
	}
	return s.InBox(Search{}, box)
}

// InBox returns the onsets that a search asks for of the patterns that fit into
// a box, the first and the second to set in.
func (s *Solver) InBox(search Search, box Box) (first, second BoxOnset, err error) {
	if !(box.Aspect > 0) || math.IsInf(box.Aspect, 1) {
		return first, second, &InputError{"Box.Aspect", box.Aspect, "finite and > 0"}
	}
	if box.Sides != Mirrors && box.Sides != Periodic {
		return first, second, &InputError{"Box.Sides", float64(box.Sides), "Mirrors or Periodic"}
	}
	q, err := s.question(search)
	if err != nil {
		return first, second, err
	}
	found, err := q.boxOnsets(box, search.Branch)
	if err != nil {
		return first, second, err
	}
	if len(found) == 0 {
		k := box.wavenumber(1)
		return first, second, &NoOnsetError{Number: q.number, Wavenumber: [2]float64{k, largestWavenumber}}
	}
	first = found[0]
	if len(found) > 1 {
		second = found[1]
	}
	return first, second, nil
}

// wavenumber returns that of the n-th pattern.
func (b Box) wavenumber(n int) float64 { return float64(n*b.rolls(1)) * math.Pi / b.Aspect }

// rolls returns the number of rolls of the n-th pattern.
func (b Box) rolls(n int) int { return n * (1 + int(b.Sides)) }

// boxOnsets returns the onsets of patterns, the first ones in order, as many
// as it takes to be sure of the first two.
func (q *question) boxOnsets(box Box, branch Branch) ([]BoxOnset, error) {
	if _, err := q.find(branch); errors.Is(err, ErrNoOnset) {
		return nil, nil // nor is there one in a box
	}
	var found []BoxOnset
	rising := 0
	for n := 1; ; n++ {
		k := box.wavenumber(n)
		second := math.Inf(1)
		if len(found) > 1 {
			second = math.Abs(found[1].Value)
		}
		if n > 1 && (k > largestWavenumber || q.lowerBound(k) > second && q.rises(k) || rising > 3) {
			return found, nil
		}
		if q.lowerBound(k) > second {
			continue
		}
		a, err := q.neutral(k, branch)
		if err != nil && !errors.Is(err, ErrNotConverged) {
			return nil, fmt.Errorf("stability: %d rolls: %w", box.rolls(n), err)
		}
		switch {
		case math.IsInf(a.value, 1):
			continue
		case a.value > farAbove*second && a.Slope > 0:
			rising++
		}
		found = append(found, BoxOnset{box.rolls(n), q.onset(&a)})
		slices.SortStableFunc(found, func(a, b BoxOnset) int {
			if math.Abs(a.Value) < math.Abs(b.Value) {
				return -1
			}
			return 1
		})
	}
}

// rises reports whether the lower bound rises beyond a wavenumber.
func (q *question) rises(k float64) bool { return q.lowerBound(1.01*k) > q.lowerBound(k) }
