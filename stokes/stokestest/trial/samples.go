package trial

import (
	"math"
)

// Mean returns the mean over the box.
func (s Samples) Mean() float64 {
	sum := 0.0
	for i, v := range s.Value {
		sum += s.Weight[i] * v
	}
	return sum
}

// RMS returns the root mean square over the box.
func (s Samples) RMS() float64 {
	sum := 0.0
	for i, v := range s.Value {
		sum += s.Weight[i] * v * v
	}
	return math.Sqrt(sum)
}

// Minus returns the samples less f at their points.
func (s Samples) Minus(f func(x, z float64) float64) Samples {
	values := make([]float64, len(s.Value))
	for i, v := range s.Value {
		values[i] = v - f(s.X[i], s.Z[i])
	}
	s.Value = values
	return s
}

// Plus returns the samples with a number added to all.
func (s Samples) Plus(v float64) Samples {
	return s.Minus(func(_, _ float64) float64 { return -v })
}

// Times returns the samples multiplied by a factor.
func (s Samples) Times(factor float64) Samples {
	values := make([]float64, len(s.Value))
	for i, v := range s.Value {
		values[i] = factor * v
	}
	s.Value = values
	return s
}

// Moved returns the samples at the points to which move takes theirs.
func (s Samples) Moved(move func(x, z float64) (float64, float64)) Samples {
	x, z := make([]float64, len(s.X)), make([]float64, len(s.Z))
	for i := range x {
		x[i], z[i] = move(s.X[i], s.Z[i])
	}
	s.X, s.Z = x, z
	return s
}

// Difference returns the samples less those of t at the same points. It reports
// false if t lacks one of the points, give or take a millionth of size.
func (s Samples) Difference(t Samples, size float64) (Samples, bool) {
	const coarseness = 1e-6
	type key struct{ x, z int64 }
	at := func(x, z float64) key {
		return key{int64(math.Round(x / (coarseness * size))), int64(math.Round(z / (coarseness * size)))}
	}
	index := make(map[key]int, len(t.X))
	for i := range t.X {
		index[at(t.X[i], t.Z[i])] = i
	}
	values := make([]float64, len(s.Value))
	for i, v := range s.Value {
		j, found := 0, false
		centre := at(s.X[i], s.Z[i])
		for n := 0; n < 9 && !found; n++ { // a neighbour where rounding went the other way
			j, found = index[key{centre.x + int64((n+1)%3-1), centre.z + int64((n/3+1)%3-1)}]
		}
		if !found {
			return Samples{}, false
		}
		values[i] = v - t.Value[j]
	}
	s.Value = values
	return s, true
}
