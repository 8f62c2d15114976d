package stability

import (
	"errors"
	"fmt"
	"math"

	"example.org/overturn/stability/internal/pencil"
)

// A growing is what is asked of an engine about growth: at which values of the
// driving numbers.
type growing struct {
	*engine
	drive [3]float64
}

// oscillating is the size of an imaginary part, relative to k² + |σ|, from
// which it is not round-off.
const oscillating = 1e-8

func (g *growing) point(k float64, sigma complex128) pencil.Point {
	return pencil.Point{K: k, Sigma: sigma, Drive: g.drive}
}

func growthKind(k float64, sigma complex128) pencil.Curve {
	if imag(sigma) > oscillating*(k*k+math.Abs(real(sigma))) {
		return pencil.Curve{Kind: pencil.GrowingOscillation}
	}
	return pencil.Curve{Kind: pencil.Growth}
}

// rates returns the growth rates at a wavenumber on one level, the fastest
// first, and one of each conjugate pair. The slice is valid until the next call.
func (g *growing) rates(k float64, level int) ([]complex128, error) {
	shift := g.bound.growth(k, g.drive) + 1 + k*k
	all, err := g.moving.level(level).work.GrowthEigenvalues(g.point(k, complex(shift, 0)))
	if err != nil {
		return nil, fmt.Errorf("stability: at wavenumber %g: %w", k, err)
	}
	one := all[:0]
	for _, sigma := range all {
		if imag(sigma) >= 0 {
			one = append(one, sigma)
		}
	}
	return one, nil
}

// rate computes the n-th fastest growth rate at a wavenumber to some digits.
// The value of the sample is its negative: what decays slowest is smallest.
func (g *growing) rate(k float64, n int) (sample, error) {
	for i := 0; ; i++ {
		found, err := g.rates(k, i)
		if err != nil {
			return sample{}, err
		}
		if n >= len(found) {
			if g.moving.size(i+1) > g.maxUnknowns {
				return none(k), nil
			}
			continue
		}
		sigma, lv := found[n], g.moving.level(i)
		s, err := lv.work.Solve(growthKind(k, sigma), g.point(k, sigma))
		if err != nil || near(s.Sigma, sigma) > 1e-3*(k*k+near(sigma, 0)) {
			return sample{k: k, value: -real(sigma), omega: imag(sigma), slope: math.NaN(), level: i}, nil
		}
		if lv.tail() < coarseTail || g.moving.size(i+1) > g.maxUnknowns {
			return sample{k: k, value: -real(s.Sigma), omega: imag(s.Sigma), slope: -s.Slope, level: i}, nil
		}
	}
}

func near(a, b complex128) float64 { return math.Hypot(real(a-b), imag(a-b)) }

// follow computes a growing solution to the tolerance from a sample.
func (g *growing) follow(at sample, lo, hi float64) (answer, error) {
	sigma := complex(-at.value, at.omega)
	a, err := g.refine(g.moving, growthKind(at.k, sigma), g.point(at.k, sigma), at.level, lo, hi)
	if errors.Is(err, pencil.ErrDiverged) {
		err = fmt.Errorf("stability: growth rate at wavenumber %g: %w", at.k, err)
	}
	return a, err
}

// at returns the n-th fastest growth at a wavenumber.
func (g *growing) at(k float64, n int) (answer, error) {
	s, err := g.rate(k, n)
	if err != nil {
		return answer{}, err
	}
	if s.missing() {
		return answer{}, fmt.Errorf("stability: %w: mode %d at wavenumber %g", ErrNotConverged, n, k)
	}
	return g.follow(s, 0, 0)
}

// fastest returns the fastest growth of any wavenumber.
func (g *growing) fastest() (answer, error) {
	negative := func(a answer, err error) (answer, error) {
		a.value = -a.value
		return a, err
	}
	s := &search{
		from: g.from,
		sample: func(k float64) (sample, error) {
			if g.bound.growth(k, g.drive) == 0 {
				return none(k), nil
			}
			return g.rate(k, 0)
		},
		lower:    func(k float64) float64 { return -g.bound.growth(k, g.drive) },
		extremum: func(at sample, lo, hi float64) (answer, error) { return negative(g.follow(at, lo, hi)) },
		point:    func(at sample) (answer, error) { return negative(g.follow(at, 0, 0)) },
	}
	a, err := s.minimum(math.Inf(1))
	if err != nil && !errors.Is(err, ErrNotConverged) {
		return a, err
	}
	if !(a.value < 0) {
		return a, ErrStable
	}
	return negative(a, err)
}
