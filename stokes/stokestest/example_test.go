package stokestest_test

import (
	"context"
	"errors"
	"fmt"
	"log"
	"testing"

	"example.org/overturn/stokes"
	"example.org/overturn/stokes/exact"
	"example.org/overturn/stokes/staggered"
	"example.org/overturn/stokes/stokestest"
)

// The adapter of a code that has boxes with free-slip walls and gives velocity
// and pressure; here it is our own solver that does the work.
func ExampleRun() {
	solve := func(ctx context.Context, p stokestest.Problem) (stokestest.Answer, error) {
		if p.Walls != (exact.Walls{}) {
			return stokestest.Answer{}, fmt.Errorf("free slip only: %w", errors.ErrUnsupported)
		}
		g, err := staggered.NewGrid(p.X, p.Z)
		if err != nil {
			return stokestest.Answer{}, err
		}
		sv, err := stokes.NewSolver(g, stokes.Walls{}, nil)
		if err != nil {
			return stokestest.Answer{}, err
		}
		flow, eta, force := staggered.NewFlow(g), staggered.NewScalar(g), staggered.NewVector(g)
		eta.Fill(p.Viscosity)
		force.Fill(p.ForceX, p.ForceZ)
		if _, err := sv.Solve(ctx, flow, eta, force); err != nil {
			return stokestest.Answer{}, err
		}
		xc, zc := p.XCentres(), p.ZCentres()
		return stokestest.Answer{
			VX: stokestest.Lattice(p.X, zc, flow.VX),
			VZ: stokestest.Lattice(xc, p.Z, flow.VZ),
			P:  stokestest.Lattice(xc, zc, flow.P),
		}, nil
	}
	report, err := stokestest.Run(context.Background(), solve, &stokestest.Settings{
		Cases: exact.All()[:5],
		Cells: []int{24, 48},
	})
	if err != nil {
		log.Fatal(err)
	}
	fmt.Println(report)
	fmt.Println("conforms:", report.Err() == nil)
	// Output:
	// case                    finest          velocity       pressure  checks
	// box mode                48x48      3.6e-04  2.00  1.3e-04  2.00     4/4  ok
	// column jump             48x48      1.1e-01  1.01  1.1e-02  1.06     4/4  ok
	// column jump off centre  48x48      2.2e-02  1.07  2.5e-02  1.09     4/4  ok
	// columns                 skipped: on 24x24 cells: free slip only: unsupported operation
	// exponential viscosity   48x48      4.4e-03  1.91  2.9e-03  1.99     4/4  ok
	//
	// conforms: true
}

// In a test of one's own.
func ExampleCheck() {
	// As the body of func TestSolver(t *testing.T):
	test := func(t *testing.T) {
		if err := stokestest.Check(t.Context(), ours, nil); err != nil {
			t.Error(err)
		}
	}
	_ = test
}

// A bug, and how the report shows it: a force of the wrong sign.
func ExampleResult() {
	upsideDown := func(ctx context.Context, p stokestest.Problem) (stokestest.Answer, error) {
		force := p.Force
		p.Force = func(x, z float64) (bx, bz float64) {
			bx, bz = force(x, z)
			return bx, -bz
		}
		return ours(ctx, p)
	}
	report, err := stokestest.Run(context.Background(), upsideDown, &stokestest.Settings{Cases: exact.All()[:1], Cells: []int{16, 32}})
	if err != nil {
		log.Fatal(err)
	}
	for _, f := range report.Results[0].Failures() {
		fmt.Println(f)
	}
	// Output:
	// box mode: order of velocity is 0.00174, want >= 1.7
	// box mode: order of pressure is 0.00087, want >= 1.7
	// box mode: order of stress is 0.00087, want >= 1.2
}
