package multigrid

import (
	"fmt"
	"os"
	"testing"
	"time"
)

func TestDev(t *testing.T) {
	if os.Getenv("DEV") == "" {
		t.Skip()
	}
	for _, ld := range loads {
		for _, n := range []int{64, 128} {
			p := newProblem(square(n), ld.eta)
			start := time.Now()
			it, norms := p.solve(t)
			fmt.Printf("%-7s %4d it %3d  w %.1e m %.1e  %.0f ns/dof jumps %d levels %d\n", ld.name, n, it, norms.Weighted, norms.Momentum, float64(time.Since(start).Nanoseconds())/float64(3*n*n), len(p.sv.Finest().jumps.columns), len(p.sv.Levels))
		}
	}
}
