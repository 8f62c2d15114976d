package uncertainty

import (
	"cmp"
	"context"
	"fmt"
	"math"
	"slices"

	"gonum.org/v1/gonum/stat"
)

// Sensitivity is what one input contributes to the variance of an output.
type Sensitivity struct {
	Input string

	// First is the share of the variance that knowing this input alone would
	// remove, with its standard error. Estimates may fall a little below zero or
	// above one.
	First, FirstError float64

	// Total is the share that would be left if all other inputs were known: that
	// of the input with all its interactions. Only [Sobol] gives it.
	Total, TotalError float64
}

// batches is the number of parts whose scatter gives the standard error of a
// rank estimate.
const batches = 10

// FirstOrder returns the first-order sensitivities of an output, in the order of
// the inputs, from the ensemble itself: with the samples in the order of an
// input, outputs of neighbours are as alike as that input makes them (Gamboa et
// al. 2022). The bias is of order 1/samples; a few hundred samples rank the
// inputs, several thousand give two digits.
func (e *Ensemble) FirstOrder(output string) ([]Sensitivity, error) {
	k, err := e.index(output)
	if err != nil {
		return nil, err
	}
	y := e.column(k)
	if stat.Variance(y, nil) == 0 {
		return nil, constant(output)
	}
	var out []Sensitivity
	for _, in := range e.inputs {
		x, err := e.Input(in.Name)
		if err != nil {
			return nil, err
		}
		s := Sensitivity{Input: in.Name, First: rankShare(x, y)}
		parts := make([]float64, 0, batches)
		for b := range batches {
			var xb, yb []float64
			for i := b; i < len(x); i += batches {
				xb, yb = append(xb, x[i]), append(yb, y[i])
			}
			if len(xb) > 3 && stat.Variance(yb, nil) > 0 {
				parts = append(parts, rankShare(xb, yb))
			}
		}
		if len(parts) > 1 {
			s.FirstError = stat.StdDev(parts, nil) / math.Sqrt(float64(len(parts)))
		}
		out = append(out, s)
	}
	return out, nil
}

func constant(output string) error {
	return &FieldError{Package: string(pkg), Field: "output " + output, Value: "constant", Want: "one that varies"}
}

// rankShare is the estimator of Gamboa et al. (2022, eq. 4): the mean product of
// outputs whose inputs are neighbours in rank, the last with the first.
func rankShare(x, y []float64) float64 {
	order := make([]int, len(x))
	for i := range order {
		order[i] = i
	}
	slices.SortStableFunc(order, func(a, b int) int { return cmp.Compare(x[a], x[b]) })
	mean := stat.Mean(y, nil)
	var product, square float64
	for r, i := range order {
		next := order[(r+1)%len(order)]
		product += (y[i] - mean) * (y[next] - mean)
		square += (y[i] - mean) * (y[i] - mean)
	}
	return product / square
}

// Sobol returns the first-order and total sensitivities of every output, in the
// order of the inputs, by (inputs + 2) · Settings.Samples evaluations: two
// independent designs A and B, and A with one column at a time from B (Saltelli
// et al. 2010; total effects by Jansen 1999). No sample may fail.
func Sobol(ctx context.Context, inputs []Input, outputs []string, f Func, settings *Settings) (map[string][]Sensitivity, error) {
	s, err := settings.resolve()
	if err != nil {
		return nil, err
	}
	if err := checkStudy(inputs, outputs, f); err != nil {
		return nil, err
	}
	s.Failures = 0
	n, d, m := s.Samples, len(inputs), len(outputs)
	a, err := design(inputs, n, s.Seed, 1)
	if err != nil {
		return nil, err
	}
	b, err := design(inputs, n, s.Seed, 2)
	if err != nil {
		return nil, err
	}
	all := append(slices.Clone(a), b...)
	for j := range d {
		mixed := slices.Clone(a)
		for i := range n {
			mixed[i*d+j] = b[i*d+j]
		}
		all = append(all, mixed...)
	}
	y, failures, err := evaluate(ctx, all, d, m, f, s)
	if err != nil {
		return nil, err
	}
	if err := tooMany(failures, all, d, s); err != nil {
		return nil, err
	}
	result := make(map[string][]Sensitivity, m)
	for k, name := range outputs {
		column := func(block int) []float64 {
			c := make([]float64, n)
			for i := range c {
				c[i] = y[(block*n+i)*m+k]
			}
			return c
		}
		ya, yb := column(0), column(1)
		mean, variance := stat.MeanVariance(append(slices.Clone(ya), yb...), nil)
		if variance == 0 {
			return nil, fmt.Errorf("uncertainty: sensitivities: %w", constant(name))
		}
		for j, in := range inputs {
			mixed := column(2 + j)
			first, total := make([]float64, n), make([]float64, n)
			for i := range n {
				first[i] = (yb[i] - mean) * (mixed[i] - ya[i]) / variance
				total[i] = (ya[i] - mixed[i]) * (ya[i] - mixed[i]) / (2 * variance)
			}
			r := Sensitivity{Input: in.Name}
			var sd float64
			r.First, sd = stat.MeanStdDev(first, nil)
			r.FirstError = sd / math.Sqrt(float64(n))
			r.Total, sd = stat.MeanStdDev(total, nil)
			r.TotalError = sd / math.Sqrt(float64(n))
			result[name] = append(result[name], r)
		}
	}
	return result, nil
}
