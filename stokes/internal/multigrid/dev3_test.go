package multigrid

import (
	"fmt"
	"os"
	"testing"
)

func TestDevAspect(t *testing.T) {
	if os.Getenv("DEV") == "" {
		t.Skip()
	}
	for _, c := range [][3]int{{200, 80, 10}, {200, 76, 10}, {200, 77, 10}, {200, 52, 10}, {48, 48, 10}, {47, 48, 10}, {48, 47, 10}, {47, 47, 10}, {63, 41, 10}, {64, 40, 10}, {64, 64, 2}, {64, 64, 4}, {64, 64, 3}, {128, 128, 3}} {
		for _, eta := range []float64{1, 1e4} {
			b := box{hx: equal(c[0], float64(c[2])), hz: equal(c[1], 1), sides: Stick, bot: Stick, top: Stick}
			p := newProblem(b, exponential(eta))
			it, norms := p.solve(t)
			dims := ""
			for k, l := range p.sv.Levels {
				dims += fmt.Sprintf(" %dx%d", l.X.N, l.Z.N)
				if p.sv.branch[k] {
					dims += "*"
				}
			}
			fmt.Printf("%v %g it %3d  w %.1e %s\n", c, eta, it, norms.Weighted, dims)
		}
	}
}
