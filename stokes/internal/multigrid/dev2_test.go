package multigrid

import (
	"fmt"
	"math"
	"os"
	"testing"
	"time"
)

func gradedWidths(n int, first, last float64) []float64 {
	a, b := 1-1/first, 1-1/last
	pos := func(s float64) float64 { return s - a*(1-math.Pow(1-s, 4))/4 - b*math.Pow(s, 4)/4 }
	h := make([]float64, n)
	for i := range h {
		h[i] = (pos(float64(i+1)/float64(n)) - pos(float64(i)/float64(n))) / pos(1)
	}
	return h
}

func TestDevGraded(t *testing.T) {
	if os.Getenv("DEV") == "" {
		t.Skip()
	}
	for _, eta := range []float64{1, 1e4} {
		for _, n := range []int{96, 192} {
			for name, b := range map[string]box{
				"bottom10":   {hx: equal(n, 1), hz: gradedWidths(n, 10, 1), bot: Stick},
				"left,top30": {hx: gradedWidths(n, 30, 1), hz: gradedWidths(n, 1, 30)},
				"all10":      {hx: gradedWidths(n, 10, 10), hz: gradedWidths(n, 10, 10)},
			} {
				p := newProblem(b, exponential(eta))
				start := time.Now()
				it, norms := p.solve(t)
				work := 0.0
				dims := ""
				for _, l := range p.sv.Levels {
					work += float64(l.cells()) / float64(n*n)
					dims += fmt.Sprintf(" %dx%d", l.X.N, l.Z.N)
				}
				fmt.Printf("%.0e %-10s %4d it %3d  w %.1e %.0f ns/dof, complexity %.2f %s\n", eta, name, n, it, norms.Weighted, float64(time.Since(start).Nanoseconds())/float64(3*n*n), work, dims)
			}
		}
	}
}
