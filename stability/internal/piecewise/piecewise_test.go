package piecewise

import (
	"errors"
	"math"
	"testing"
)

func resolve(t *testing.T, f func(float64) float64, s Scale, breaks ...float64) *Function {
	t.Helper()
	r, err := Resolve(f, 0, 1, breaks, s)
	if err != nil {
		t.Fatal(err)
	}
	return r
}

func TestSmoothFunctionsAreRepresentedToRoundOff(t *testing.T) {
	tests := []struct {
		name   string
		f      func(float64) float64
		scale  Scale
		panels int // at most
	}{
		{"constant", func(float64) float64 { return 3 }, Global, 1},
		{"cubic", func(z float64) float64 { return z*z*z - z/3 }, Global, 1},
		{"contrast of 1e9", func(z float64) float64 { return math.Exp(20.7 * z) }, Local, 4},
		{"boundary layer", func(z float64) float64 { return math.Exp(-(1 - z) * (1 - z) / 4e-4) }, Global, 12},
	}
	for _, tt := range tests {
		t.Run(tt.name, func(t *testing.T) {
			r := resolve(t, tt.f, tt.scale)
			if n := len(r.Nodes) - 1; n > tt.panels {
				t.Errorf("%d panels, want at most %d", n, tt.panels)
			}
			for i := range 101 {
				z := float64(i) / 100
				want := tt.f(z)
				reference := 1.0
				if tt.scale == Local {
					reference = tt.f(min(z+0.25, 1)) // the largest value on the panel, or more
				}
				if d := math.Abs(r.At(z) - want); d > 3e-13*reference {
					t.Errorf("f(%g) = %g, off by %.1e", z, want, d)
				}
			}
		})
	}
}

func TestDegreeAndConstant(t *testing.T) {
	if r := resolve(t, func(float64) float64 { return -2 }, Global); r.Degree() != 0 || !r.Constant() {
		t.Errorf("constant: degree %d, Constant() = %v", r.Degree(), r.Constant())
	}
	if r := resolve(t, func(z float64) float64 { return z * z }, Global); r.Degree() != 2 || r.Constant() {
		t.Errorf("square: degree %d, Constant() = %v", r.Degree(), r.Constant())
	}
	step := func(z float64) float64 {
		if z < 0.25 {
			return 1
		}
		return 2
	}
	if r := resolve(t, step, Global, 0.25); r.Degree() != 0 || r.Constant() || len(r.Nodes) != 3 {
		t.Errorf("step: degree %d, Constant() = %v, nodes %v", r.Degree(), r.Constant(), r.Nodes)
	}
}

func TestJumpsAndKinksAreFound(t *testing.T) {
	const place = 0.3127
	jump := func(z float64) float64 {
		if z < place {
			return math.Sin(3 * z)
		}
		return 5 + z
	}
	kink := func(z float64) float64 { return math.Exp(math.Abs(z - place)) }
	for _, tt := range []struct {
		name string
		f    func(float64) float64
		tol  float64
	}{{"jump", jump, 1e-15}, {"kink", kink, 1e-12}} {
		r := resolve(t, tt.f, Global)
		nearest := math.Inf(1)
		for _, z := range r.Nodes {
			nearest = min(nearest, math.Abs(z-place))
		}
		if nearest > tt.tol || len(r.Nodes) > 12 {
			t.Errorf("%s: a node at %.1e from it, %d nodes", tt.name, nearest, len(r.Nodes))
		}
		for _, z := range []float64{0.1, place - 1e-6, place + 1e-6, 0.9} {
			if d := math.Abs(r.At(z) - tt.f(z)); d > 1e-12 {
				t.Errorf("%s: value at %g is off by %.1e", tt.name, z, d)
			}
		}
	}
}

func TestIntegralAndDerivative(t *testing.T) {
	r := resolve(t, func(z float64) float64 { return math.Exp(12 * z) }, Global, 0.4)
	g, d := r.FromRight(), r.FromRight().Derivative()
	for i := range 21 {
		z := float64(i) / 20
		want := (math.Exp(12) - math.Exp(12*z)) / 12
		if e := math.Abs(g.At(z) - want); e > 1e-13*math.Exp(12) {
			t.Errorf("integral from %g is off by %.1e", z, e)
		}
		if e := math.Abs(d.At(z) + r.At(z)); e > 1e-11*math.Exp(12) {
			t.Errorf("derivative of the integral at %g is off by %.1e", z, e)
		}
	}
	if v := g.At(1); math.Abs(v) > 1e-16*math.Exp(12) {
		t.Errorf("integral over nothing = %g", v)
	}
}

func TestValuesThatAreNoNumbers(t *testing.T) {
	for _, bad := range []float64{math.NaN(), math.Inf(1), math.Inf(-1)} {
		f := func(z float64) float64 {
			if z > 0.7 {
				return bad
			}
			return z
		}
		_, err := Resolve(f, 0, 1, nil, Global)
		var v *ValueError
		if !errors.As(err, &v) || v.Z <= 0.7 {
			t.Errorf("value %g: error %v", bad, err)
		}
	}
}
