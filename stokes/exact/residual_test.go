package exact_test

import (
	"math"
	"math/rand/v2"
	"testing"

	"example.org/overturn/stokes/exact"
)

// derivative differentiates f at x by central differences of step up to h,
// extrapolated to step zero (Ridders 1982), and returns the value of the
// smallest estimated error.
func derivative(f func(float64) float64, x, h float64) float64 {
	const rows, shrink = 12, 1.5
	var previous, row [rows]float64
	best, smallest := math.NaN(), math.Inf(1)
	for i := range rows {
		row[0] = (f(x+h) - f(x-h)) / (2 * h)
		factor := 1.0
		for j := 1; j <= i; j++ {
			factor *= shrink * shrink
			row[j] = (row[j-1]*factor - previous[j-1]) / (factor - 1)
			e := math.Max(math.Abs(row[j]-row[j-1]), math.Abs(row[j]-previous[j-1]))
			if e < smallest {
				best, smallest = row[j], e
			}
		}
		previous = row
		h /= shrink
	}
	return best
}

// clearance is the distance of a point from the nearest place where the
// solution is not smooth, or a tenth of the box if that is less.
func clearance(c exact.Case, x, z float64) float64 {
	d := 0.1 * min(c.Box.Width(), c.Box.Height())
	for _, line := range c.XLines {
		d = min(d, math.Abs(x-line))
	}
	for _, line := range c.ZLines {
		d = min(d, math.Abs(z-line))
	}
	if c.Circle > 0 {
		d = min(d, math.Abs(math.Hypot(x, z)-c.Circle))
	}
	return d
}

// points are places in the box of a case that are not too near to where the
// solution is not smooth.
func points(c exact.Case, n int) [][2]float64 {
	random := rand.New(rand.NewPCG(1, 2))
	var list [][2]float64
	for len(list) < n {
		x := c.Box.Left + c.Box.Width()*random.Float64()
		z := c.Box.Bottom + c.Box.Height()*random.Float64()
		if clearance(c, x, z) > 0.01*min(c.Box.Width(), c.Box.Height()) {
			list = append(list, [2]float64{x, z})
		}
	}
	return list
}

// Each solution satisfies the equations: differences of the velocity give the
// strain rate, its trace vanishes, strain rate, viscosity and pressure give
// the stress, and differences of the stress balance the force.
func TestSolutionsSatisfyTheEquations(t *testing.T) {
	const tolerance = 1e-9
	for _, c := range append(exact.All(), moreCases(t)...) {
		t.Run(c.Name, func(t *testing.T) {
			worst := 0.0
			for _, p := range points(c, 60) {
				worst = max(worst, residual(t, c, p[0], p[1], tolerance))
			}
			t.Logf("largest relative residual %.1e", worst)
		})
	}
}

func residual(t *testing.T, c exact.Case, x, z, tolerance float64) float64 {
	t.Helper()
	h := 0.4 * clearance(c, x, z)
	alongX := func(f func(exact.Fields) float64) float64 {
		return derivative(func(s float64) float64 { return f(c.At(s, z)) }, x, h)
	}
	alongZ := func(f func(exact.Fields) float64) float64 {
		return derivative(func(s float64) float64 { return f(c.At(x, s)) }, z, h)
	}
	size := min(c.Box.Width(), c.Box.Height())
	f := c.At(x, z)
	e, s := f.StrainRate, f.Stress
	worst := 0.0
	check := func(what string, got, want, scale float64) {
		t.Helper()
		r := math.Abs(got-want) / scale
		worst = max(worst, r)
		if !(r <= tolerance) {
			t.Errorf("at (%.3f, %.3f): %s is %.12g, want %.12g, scale %.3g", x, z, what, got, want, scale)
		}
	}

	rate := math.Abs(e.XX) + math.Abs(e.ZZ) + math.Abs(e.XZ) + (math.Abs(f.VX)+math.Abs(f.VZ))/size
	vx, vz := func(f exact.Fields) float64 { return f.VX }, func(f exact.Fields) float64 { return f.VZ }
	check("∂vx/∂x", alongX(vx), e.XX, rate)
	check("∂vz/∂z", alongZ(vz), e.ZZ, rate)
	check("shear", 0.5*(alongZ(vx)+alongX(vz)), e.XZ, rate)
	check("divergence", alongX(vx)+alongZ(vz), 0, rate)

	eta := c.Viscosity(x, z)
	stress := math.Abs(s.XX) + math.Abs(s.ZZ) + math.Abs(s.XZ) + math.Abs(f.P)
	check("σxx", s.XX, -f.P+2*eta*e.XX, stress)
	check("σzz", s.ZZ, -f.P+2*eta*e.ZZ, stress)
	check("σxz", s.XZ, 2*eta*e.XZ, stress)

	bx, bz := c.Force(x, z)
	force := math.Abs(bx) + math.Abs(bz) + stress/size
	xx, zz, xz := func(f exact.Fields) float64 { return f.Stress.XX },
		func(f exact.Fields) float64 { return f.Stress.ZZ },
		func(f exact.Fields) float64 { return f.Stress.XZ }
	check("force along x", -alongX(xx)-alongZ(xz), bx, force)
	check("force along z", -alongX(xz)-alongZ(zz), bz, force)
	return worst
}
