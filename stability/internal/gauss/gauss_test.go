package gauss

import (
	"math"
	"testing"
)

func TestRuleIntegratesPolynomials(t *testing.T) {
	for n := 1; n <= 80; n++ {
		x, w := Rule(n)
		if len(x) < n || len(x) > n+1 || len(w) != len(x) {
			t.Fatalf("Rule(%d) has %d points and %d weights", n, len(x), len(w))
		}
		for degree := range 2 * n {
			sum, want := 0.0, 0.0
			for i := range x {
				sum += w[i] * math.Pow(x[i], float64(degree))
			}
			if degree%2 == 0 {
				want = 2 / float64(degree+1)
			}
			if math.Abs(sum-want) > 2e-15 {
				t.Errorf("n = %d: ∫x^%d = %.16g, want %.16g", n, degree, sum, want)
			}
		}
	}
}

func TestPointsIncreaseInsideTheInterval(t *testing.T) {
	for n := 1; n <= 80; n++ {
		x, _ := Rule(n)
		for i, z := range x {
			if !(z > -1 && z < 1) || i > 0 && z <= x[i-1] {
				t.Fatalf("n = %d: points %v", n, x)
			}
		}
	}
}

func TestWrongRulesAreNoticed(t *testing.T) {
	x, w := Rule(7)
	if !right(x, w) {
		t.Fatal("a right rule is refused")
	}
	w[3] += 1e-9
	if right(x, w) {
		t.Error("a wrong weight is not noticed")
	}
	x, w = Rule(7)
	x[1] += 1e-9
	if right(x, w) {
		t.Error("a wrong point is not noticed")
	}
}
