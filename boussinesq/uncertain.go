package boussinesq

import (
	"fmt"
	"math"
	"math/rand/v2"
	"sort"

	"gonum.org/v1/gonum/stat"
)

// Uncertain is a layer some of whose parameters are ranges. [Uncertain.Bounds]
// is what can happen at the ends of the ranges; [Uncertain.Sample] how likely
// it is.
type Uncertain struct {
	Layer  Layer // the best values
	Ranges Ranges
}

// Number is anything that a layer has a number for. Method expressions fit:
//
//	u.Sample(boussinesq.Layer.Rayleigh, nil)
type Number func(Layer) (float64, error)

// Bounds holds a number of a layer at its best values, and the least and the
// greatest of it at the ends of the ranges.
type Bounds struct {
	Low, Best, High float64
}

// Bounds evaluates f at the best values and at each combination of ends of the
// ranges: two to the number of ranges. What it returns bounds f everywhere if
// f rises or falls all the way with each parameter, as Rayleigh numbers do.
// Ranges of shape [Normal] and [LogNormal] end one standard deviation out.
func (u Uncertain) Bounds(f Number) (Bounds, error) {
	params, err := u.Ranges.parameters()
	if err != nil {
		return Bounds{}, err
	}
	best, err := f(u.Layer)
	if err != nil {
		return Bounds{}, err
	}
	b := Bounds{Low: best, Best: best, High: best}
	for corner := range 1 << len(params) {
		l := u.Layer
		for i, p := range params {
			end := p.low
			if corner>>i&1 == 1 {
				end = p.high
			}
			p.set(&l, end)
		}
		x, err := f(l)
		if err != nil {
			return Bounds{}, fmt.Errorf("at an end of the ranges: %w", err)
		}
		b.Low, b.High = min(b.Low, x), max(b.High, x)
	}
	return b, nil
}

// DefaultDraws is the number of draws where [Settings] say nothing.
const DefaultDraws = 1000

// Settings tunes [Uncertain.Sample]. A nil *Settings, or a zero field, means
// the default.
type Settings struct {
	// Draws is the number of layers drawn. Default [DefaultDraws].
	Draws int

	// Seed starts the random numbers: equal seeds give equal samples. Zero
	// is a seed like any other.
	Seed uint64
}

// resolve fills in the defaults. The receiver may be nil.
func (s *Settings) resolve() (draws int, seed uint64, err error) {
	if s == nil {
		return DefaultDraws, 0, nil
	}
	switch {
	case s.Draws == 0:
		return DefaultDraws, s.Seed, nil
	case s.Draws < 2:
		return 0, 0, &FieldError{Field: "Settings.Draws", Value: fmt.Sprint(s.Draws), Want: ">= 2, or 0 for the default"}
	}
	return s.Draws, s.Seed, nil
}

// Sample evaluates f on layers drawn from the ranges, all independent, by
// Latin hypercube sampling (McKay, Beckman & Conover 1979): each range is cut
// into as many strata of equal probability as there are draws, and each one is
// used once, at its middle, in random order. A mean then converges faster
// than with independent draws.
//
// The first error of f ends the sample, so an f that takes long can watch a
// context of its own. To count layers that have no number,
// such as those that are stable, as zero, let f say so.
func (u Uncertain) Sample(f Number, settings *Settings) (*Sample, error) {
	draws, seed, err := settings.resolve()
	if err != nil {
		return nil, err
	}
	params, err := u.Ranges.parameters()
	if err != nil {
		return nil, err
	}
	strata := hypercube(len(params), draws, seed)
	values := make([]float64, draws)
	var l Layer
	for i := range values {
		l = u.Layer
		for j, p := range params {
			share := (float64(strata[j][i]) + 0.5) / float64(draws)
			p.set(&l, quantile(p.shape, p.low, p.high, share))
		}
		if values[i], err = f(l); err != nil {
			return nil, fmt.Errorf("draw %d: %w", i, err)
		}
		if math.IsNaN(values[i]) || math.IsInf(values[i], 0) {
			return nil, &FieldError{Field: fmt.Sprintf("number of draw %d", i), Value: fmt.Sprint(values[i]), Want: "a finite number"}
		}
	}
	return newSample(values, params, strata), nil
}

// hypercube returns a permutation of 0 to draws-1 for each parameter.
func hypercube(parameters, draws int, seed uint64) [][]int {
	random := rand.New(rand.NewPCG(seed, 0))
	strata := make([][]int, parameters)
	for j := range strata {
		strata[j] = random.Perm(draws)
	}
	return strata
}

// Sample holds the values that a number takes over the ranges of a layer.
type Sample struct {
	// Values are in ascending order.
	Values []float64

	influences []Influence
}

// Influence is the part that one parameter has in the spread of a number.
type Influence struct {
	Parameter string // name of a field of [Ranges]

	// Share is the square of the rank correlation (Spearman 1904) between
	// parameter and number. For a product of powers of independent parameters
	// the shares add up to about 1.
	Share float64

	// Rises says that the number rises with the parameter.
	Rises bool
}

func newSample(values []float64, params []parameter, strata [][]int) *Sample {
	rank := ranks(values)
	s := &Sample{Values: append([]float64(nil), values...)}
	sort.Float64s(s.Values)
	x := make([]float64, len(values))
	for j, p := range params {
		for i, k := range strata[j] {
			x[i] = float64(k)
		}
		if r := stat.Correlation(x, rank, nil); !math.IsNaN(r) { // NaN: the number is constant
			s.influences = append(s.influences, Influence{Parameter: p.name, Share: r * r, Rises: r > 0})
		}
	}
	sort.SliceStable(s.influences, func(a, b int) bool { return s.influences[a].Share > s.influences[b].Share })
	return s
}

// ranks returns the rank of each value; equal values share their mean rank.
func ranks(values []float64) []float64 {
	order := make([]int, len(values))
	for i := range order {
		order[i] = i
	}
	sort.SliceStable(order, func(a, b int) bool { return values[order[a]] < values[order[b]] })
	rank := make([]float64, len(values))
	for lo := 0; lo < len(order); {
		hi := lo
		for hi < len(order) && values[order[hi]] == values[order[lo]] {
			hi++
		}
		for _, i := range order[lo:hi] {
			rank[i] = float64(lo+hi-1) / 2
		}
		lo = hi
	}
	return rank
}

// Mean returns the mean of the values.
func (s *Sample) Mean() float64 { return stat.Mean(s.Values, nil) }

// Quantiles returns, for each share p from 0 to 1, the value that this share
// of the sample lies below, by linear interpolation. 0.16, 0.5 and 0.84 give
// the median with one standard deviation either side.
func (s *Sample) Quantiles(p ...float64) ([]float64, error) {
	q := make([]float64, len(p))
	for i, share := range p {
		if !(share >= 0 && share <= 1) {
			return nil, &FieldError{Field: fmt.Sprintf("share %d", i), Value: fmt.Sprint(share), Want: "from 0 to 1"}
		}
		q[i] = stat.Quantile(share, stat.LinInterp, s.Values, nil)
	}
	return q, nil
}

// Above returns the share of the values that are greater than x: the
// probability that a layer of these ranges exceeds it.
func (s *Sample) Above(x float64) float64 {
	below := sort.Search(len(s.Values), func(i int) bool { return s.Values[i] > x })
	return float64(len(s.Values)-below) / float64(len(s.Values))
}

// Influences says which parameters matter, the one that matters most first.
func (s *Sample) Influences() []Influence { return append([]Influence(nil), s.influences...) }
