package heattest_test

import (
	"context"
	"errors"
	"fmt"
	"log"
	"slices"
	"testing"

	"example.org/overturn/heat/exact"
	"example.org/overturn/heat/heattest"
)

// conduct is somebody's code: explicit steps of conduction in n by n square cells
// of a box whose walls are at one temperature. Fourier is κ·duration/h².
func conduct(n int, fourier, wall float64, t []float64) []float64 {
	steps := int(fourier/0.2) + 1
	r := fourier / float64(steps)
	at := func(i, k int, own float64) float64 {
		if i < 0 || k < 0 || i == n || k == n {
			return 2*wall - own // half a cell beyond the wall
		}
		return t[k*n+i]
	}
	for range steps {
		next := make([]float64, len(t))
		for k := range n {
			for i := range n {
				own := t[k*n+i]
				next[k*n+i] = own + r*(at(i-1, k, own)+at(i+1, k, own)+at(i, k-1, own)+at(i, k+1, own)-4*own)
			}
		}
		t = next
	}
	return t
}

// A code that can do very little, and what there is to say of it.
func ExampleRun() {
	solve := func(_ context.Context, p heattest.Problem) (heattest.Answer, error) {
		if p.Name != "box mode" {
			return heattest.Answer{}, fmt.Errorf("not written yet: %w", errors.ErrUnsupported)
		}
		n, _ := p.Cells()
		x, z := p.XCentres(), p.ZCentres()
		kappa, h := p.Conductivity(x[0], z[0])/p.HeatCapacity(x[0], z[0]), p.X[1]
		wall := p.WallValue(exact.Bottom, 0, 0)
		t := conduct(n, kappa*p.Duration/(h*h), wall, p.Tabulate(p.Initial, x, z))
		return heattest.Answer{Temperature: heattest.Lattice(x, z, t)}, nil
	}
	report, err := heattest.Run(context.Background(), solve, &heattest.Settings{Cells: []int{16, 32}})
	if err != nil {
		log.Fatal(err)
	}
	done := slices.DeleteFunc(slices.Clone(report.Results), func(r heattest.Result) bool { return r.Skipped != nil })
	fmt.Print(&heattest.Report{Results: done})
	fmt.Println(len(report.Results)-len(done), "to go")
	// Output:
	// case      finest       temperature  checks
	// box mode  32x32      7.6e-04  1.98     6/6  ok
	// 33 to go
}

// In a test of one's own.
func ExampleCheck() {
	// As the body of func TestSolver(t *testing.T):
	test := func(t *testing.T) {
		set := &heattest.Settings{Cases: exact.All(), Overshoot: 1e-12}
		if err := heattest.Check(t.Context(), ours, set); err != nil {
			t.Error(err)
		}
	}
	_ = test
}
