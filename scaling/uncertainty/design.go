package uncertainty

import (
	"math/rand/v2"

	"example.org/overturn/scaling/internal/check"
)

// design draws n points of the inputs by Latin hypercube sampling, row by row.
// Each input has random numbers of its own, so that adding one changes no other.
func design(inputs []Input, n int, seed, stream uint64) ([]float64, error) {
	d := len(inputs)
	x := make([]float64, n*d)
	for j, in := range inputs {
		source := rand.New(rand.NewPCG(seed, stream<<32+uint64(j)))
		slices := source.Perm(n)
		for i, slice := range slices {
			p := (float64(slice) + open(source)) / float64(n)
			v := in.Distribution.Quantile(p)
			if err := check.Finite(pkg, in.Name+": quantile", v); err != nil {
				return nil, err
			}
			x[i*d+j] = v
		}
	}
	return x, nil
}

// open returns a random number in (0, 1), the ends excluded.
func open(r *rand.Rand) float64 { return (float64(r.Uint64()>>12) + 0.5) * 0x1p-52 }
