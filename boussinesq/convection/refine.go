package convection

import (
	"context"
	"fmt"
	"math"
	"strings"

	"example.org/overturn/stokes/staggered"
)

// A Study holds a steady state on a sequence of grids and what it says about
// the limit of no cell size.
type Study struct {
	// Solutions from the coarsest to the finest grid.
	Solutions []*Solution

	// Estimates of the diagnostics, under the names and in the order of
	// [Diagnostics.All]. That of a diagnostic which is not finite, as NuTop
	// between walls of one temperature, is NaN.
	Estimates []NamedEstimate

	// Deviation is the largest distance of an observed order from 2 among the
	// diagnostics, at most 1, and 1 where one does not converge at all or where
	// the thermal boundary layers hold fewer than three cells on the coarsest of
	// the last three grids: near zero on grids that resolve the state.
	Deviation float64
}

// A NamedEstimate is the estimate of one diagnostic.
type NamedEstimate struct {
	Name string
	Estimate
}

// Get returns the estimate of a name of [Diagnostics.All], and whether there is
// one.
func (s *Study) Get(name string) (Estimate, bool) {
	for _, e := range s.Estimates {
		if e.Name == name {
			return e.Estimate, true
		}
	}
	return Estimate{}, false
}

// String lists the estimates, one a line.
func (s *Study) String() string {
	var b strings.Builder
	for _, e := range s.Estimates {
		fmt.Fprintf(&b, "%-16s %v\n", e.Name, e.Estimate)
	}
	return b.String()
}

// Refine finds the steady state of p on so many grids, at least two: that of p
// and those of every second, fourth, ... of its nodes, and estimates each
// diagnostic with its numerical uncertainty by [Extrapolate]. The number of
// cells of p.Grid must be divisible by two in both directions each time.
//
// Three coarse grids may show an order of 2 by chance. Hence every uncertainty is
// at least 3·Deviation² times the step from the finest value to the
// extrapolated one, up to three times the step: what the worst resolved
// diagnostic says about the grids counts for all. The estimate is of the error of
// the discretisation only; that of the solve is of the order of
// SteadySettings.Tolerance.
func Refine(ctx context.Context, p Problem, grids int, s *SteadySettings) (*Study, error) {
	if grids < 2 {
		return nil, fmt.Errorf("convection: a study of %d grids, want at least 2", grids)
	}
	c, err := s.withDefaults()
	if err != nil {
		return nil, err
	}
	if p, err = p.withDefaults(); err != nil {
		return nil, err
	}
	nx, nz := p.Grid.Cells()
	if factor := 1 << (grids - 1); nx%factor != 0 || nz%factor != 0 {
		return nil, fmt.Errorf("convection: a study of %d grids cannot halve %dx%d cells so often, want multiples of %d", grids, nx, nz, factor)
	}
	solutions, err := steadySequence(ctx, p, c, grids)
	if err != nil {
		return &Study{Solutions: solutions}, err
	}
	study := &Study{Solutions: solutions[len(solutions)-grids:]}
	return study, study.estimate(p.Conductivity)
}

// estimate extrapolates each diagnostic.
func (s *Study) estimate(conductivity float64) error {
	sizes := make([]float64, len(s.Solutions))
	values := map[string][]float64{}
	var names []string
	for i, sol := range s.Solutions {
		sizes[i] = cellSize(sol.Temperature.Grid)
		for name, v := range sol.All() {
			if i == 0 {
				names = append(names, name)
			}
			values[name] = append(values[name], v)
		}
	}
	for _, name := range names {
		if v := values[name]; !finite(v) {
			nan := math.NaN()
			e := Estimate{Value: nan, Uncertainty: nan, Order: nan, Finest: v[len(v)-1]}
			s.Estimates = append(s.Estimates, NamedEstimate{Name: name, Estimate: e})
			continue
		}
		e, err := Extrapolate(sizes, values[name])
		if err != nil {
			return fmt.Errorf("%s: %w", name, err)
		}
		s.Estimates = append(s.Estimates, NamedEstimate{Name: name, Estimate: e})
	}
	if len(sizes) > 2 {
		s.Deviation = s.deviation(values)
		if s.Solutions[len(sizes)-3].cellsInLayer(conductivity) < layerCells {
			s.Deviation = 1
		}
		s.distrust()
	}
	return nil
}

// layerCells is the number of cells that the thermal boundary layers must hold on
// the coarsest of three grids for their orders to mean anything: with one or two,
// an order of 2 is chance.
const layerCells = 3

// cellsInLayer returns the thickness of the thermal boundary layers, half the
// temperature range over the gradient at the wall, in cells at the wall.
func (s *Solution) cellsInLayer(conductivity float64) float64 {
	dz := s.Temperature.Grid.DZ()
	gradient := max(math.Abs(s.HeatFlowTop), math.Abs(s.HeatFlowBottom)) / conductivity
	return 0.5 * extent(s.Temperature) / gradient / max(dz[0], dz[len(dz)-1])
}

// unchanging is the relative change between the finest two grids below which
// the order of a diagnostic means nothing: it is converged, or fixed by symmetry.
const unchanging = 1e-6

// deviation returns the largest distance of an order from that of the scheme.
func (s *Study) deviation(values map[string][]float64) float64 {
	largest := 0.0
	for _, e := range s.Estimates {
		v := values[e.Name]
		n := len(v)
		size := math.Abs(v[n-1])
		if e.Name == "MeanTemperature" {
			// Its zero is arbitrary.
			size = extent(s.Solutions[n-1].Temperature)
		}
		switch {
		case !finite(v), math.Abs(v[n-1]-v[n-2]) <= unchanging*size:
		case math.IsNaN(e.Order):
			return 1
		default:
			largest = max(largest, min(1, math.Abs(e.Order-SchemeOrder)))
		}
	}
	return largest
}

// distrust widens the uncertainties by what the worst resolved diagnostic says.
func (s *Study) distrust() {
	for i := range s.Estimates {
		e := &s.Estimates[i]
		e.Uncertainty = max(e.Uncertainty, safety*s.Deviation*s.Deviation*math.Abs(e.Value-e.Finest))
	}
}

func finite(values []float64) bool {
	for _, v := range values {
		if math.IsNaN(v) || math.IsInf(v, 0) {
			return false
		}
	}
	return true
}

// cellSize returns the root of the mean area of a cell.
func cellSize(g *staggered.Grid) float64 {
	return math.Sqrt(g.Area() / float64(g.NX()*g.NZ()))
}
