package convection

import (
	"errors"
	"fmt"
	"math"
)

// SchemeOrder is the order in the cell size at which the discretisation of
// this package converges.
const SchemeOrder = 2

// An Estimate is a number freed of most of its discretisation error by a
// sequence of grids, with what is left as its uncertainty.
type Estimate struct {
	// Value is extrapolated to cells of no size where the sequence converges
	// as the scheme should, else it is the value of the finest grid.
	Value float64

	// Uncertainty is an estimate of the numerical error of Value, always
	// positive unless the grids agree to the last bit.
	Uncertainty float64

	// Order is the order of convergence observed on the finest three grids;
	// NaN with fewer than three, or where their values do not converge
	// monotonically.
	Order float64

	// Finest is the value on the finest grid.
	Finest float64
}

// String returns value ± uncertainty and the observed order.
func (e Estimate) String() string {
	return fmt.Sprintf("%.9g ± %.1g (observed order %.2f)", e.Value, e.Uncertainty, e.Order)
}

// orderWindow is how far the observed order may lie from [SchemeOrder] for an
// extrapolation to be believed.
const orderWindow = 0.5

// disbelief is the share of an extrapolation that is always counted as
// uncertain: the terms of its series may cancel on three grids by chance.
const disbelief = 0.02

// safety is the factor on the error estimated without three grids in the
// asymptotic range: that of the grid convergence index (Roache 1994, from
// memory).
const safety = 3

// Extrapolate estimates the limit of values computed on grids with cells of
// the sizes h, from coarse to fine, by a second-order scheme whose error is a
// series in even powers of h on smooth problems (Richardson 1911). h must be
// positive and strictly decreasing; at least two grids are needed.
//
// With three grids or more, and an observed order within 0.5 of 2, the terms in
// h² and h⁴ are removed by the finest three, and the uncertainty is the change
// against removing by the finest two h² alone, or a term of the observed order,
// whichever is larger, but not less than a fiftieth of the whole extrapolation.
// With two grids only h² is removed and the uncertainty is the whole step from
// the finest value. Where the order is off, nothing is removed and the
// uncertainty is three times the step that Richardson extrapolation of order
// min(order, 2) would make, or three times the range of the last values where
// they do not converge at all.
func Extrapolate(h, values []float64) (Estimate, error) {
	if err := checkSequence(h, values); err != nil {
		return Estimate{}, err
	}
	n := len(h)
	finest := values[n-1]
	step := richardson(h[n-2], h[n-1], values[n-2], finest, SchemeOrder) - finest
	e := Estimate{Value: finest + step, Uncertainty: math.Abs(step), Order: math.NaN(), Finest: finest}
	if n == 2 {
		return e, nil
	}
	h, values = h[n-3:], values[n-3:]
	e.Order = observedOrder(h, values)
	switch {
	case math.Abs(e.Order-SchemeOrder) <= orderWindow || values[0] == values[1] && values[1] == values[2]:
		// Two extrapolations of order 2 differ by the term in h⁴, which a
		// third one of order 4 removes: with weights of h², not of h.
		coarse := richardson(h[0], h[1], values[0], values[1], SchemeOrder)
		fine := richardson(h[1], h[2], values[1], values[2], SchemeOrder)
		ratio := (h[0] / h[2]) * (h[0] / h[2])
		e.Value = fine + (fine-coarse)/(ratio-1)
		e.Uncertainty = math.Abs(e.Value - fine)
		if !math.IsNaN(e.Order) {
			asObserved := richardson(h[1], h[2], values[1], values[2], e.Order)
			e.Uncertainty = max(e.Uncertainty, math.Abs(e.Value-asObserved), disbelief*math.Abs(e.Value-finest))
		}
	case math.IsNaN(e.Order):
		e.Value = finest
		e.Uncertainty = safety * (max(values[0], values[1], values[2]) - min(values[0], values[1], values[2]))
	default:
		e.Value = finest
		order := min(e.Order, SchemeOrder)
		e.Uncertainty = safety * math.Abs(richardson(h[1], h[2], values[1], values[2], order)-finest)
	}
	return e, nil
}

// richardson removes an error proportional to h to the power order.
func richardson(coarse, fine, atCoarse, atFine, order float64) float64 {
	return atFine + (atFine-atCoarse)/(math.Pow(coarse/fine, order)-1)
}

// observedOrder returns the p for which values = limit + c·h^p holds on three
// grids, NaN if there is none between 0.05 and 12.
func observedOrder(h, v []float64) float64 {
	ratio := (v[0] - v[1]) / (v[1] - v[2])
	if !(ratio > 0) || math.IsInf(ratio, 0) {
		return math.NaN()
	}
	a, b := h[0]/h[1], h[2]/h[1]
	excess := func(p float64) float64 {
		return (math.Pow(a, p)-1)/(1-math.Pow(b, p)) - ratio
	}
	// The left side grows with p: bisection cannot miss.
	low, high := 0.05, 12.0
	if excess(low) > 0 || excess(high) < 0 {
		return math.NaN()
	}
	for range 60 {
		if mid := 0.5 * (low + high); excess(mid) < 0 {
			low = mid
		} else {
			high = mid
		}
	}
	return 0.5 * (low + high)
}

func checkSequence(h, values []float64) error {
	if len(h) != len(values) {
		return fmt.Errorf("convection: %d cell sizes and %d values, want as many", len(h), len(values))
	}
	if len(h) < 2 {
		return errors.New("convection: extrapolation wants at least two grids")
	}
	for i := range h {
		if !(h[i] > 0) || math.IsInf(h[i], 1) || i > 0 && h[i] >= h[i-1] {
			return fmt.Errorf("convection: cell size %d is %v, want positive and strictly decreasing", i, h[i])
		}
		if math.IsNaN(values[i]) || math.IsInf(values[i], 0) {
			return fmt.Errorf("convection: value %d is %v, want a finite number", i, values[i])
		}
	}
	return nil
}
