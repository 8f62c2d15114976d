// Command verify computes the steady benchmark cases 1a, 1b, 1c and 2a of
// Blankenbach et al. (1989) on three grids, extrapolates to cells of no size,
// and prints the result with its numerical uncertainty beside the published
// values.
//
//	go run ./examples/verify
//	go run ./examples/verify -case 1a -json
//
// With -json each line is an object for one case, quantity and grid (cells along
// each side of the box) with the value on that grid; extrapolated,
// observed_order, published, reference (a sharper computed value) and
// relative_difference (of the extrapolated value to the reference) are the same
// on all grids.
package main

import (
	"context"
	"encoding/json"
	"flag"
	"fmt"
	"io"
	"math"
	"os"
	"os/signal"

	"example.org/overturn/boussinesq/convection"
	"example.org/overturn/stokes/staggered"
)

func main() {
	only := flag.String("case", "", "one case: 1a, 1b, 1c or 2a (default all)")
	asJSON := flag.Bool("json", false, "print one JSON object a line")
	cells := flag.Int("cells", 384, "cells along each side on the finest of three grids, a multiple of 4")
	flag.Parse()
	if flag.NArg() > 0 {
		fmt.Fprintf(os.Stderr, "verify: %q is no flag, want -case, -json or -cells\n", flag.Arg(0))
		os.Exit(2)
	}
	ctx, stop := signal.NotifyContext(context.Background(), os.Interrupt)
	defer stop()
	if err := verify(ctx, os.Stdout, *only, *asJSON, *cells); err != nil {
		fmt.Fprintln(os.Stderr, "verify:", err)
		os.Exit(1)
	}
}

func verify(ctx context.Context, w io.Writer, only string, asJSON bool, cells int) error {
	known := false
	for _, b := range benchmarks {
		if only != "" && only != b.name {
			continue
		}
		known = true
		study, err := b.study(ctx, cells)
		if err != nil {
			return fmt.Errorf("case %s: %w", b.name, err)
		}
		write := table
		if asJSON {
			write = lines
		}
		if err := write(w, b, study); err != nil {
			return err
		}
	}
	if !known {
		return fmt.Errorf("case %q is unknown, want 1a, 1b, 1c or 2a", only)
	}
	return nil
}

// study solves a case on grids refined towards all walls.
func (b benchmark) study(ctx context.Context, cells int) (*convection.Study, error) {
	g, err := staggered.Graded(cells, cells, 1, 1, staggered.Grading{Left: 8, Right: 8, Bottom: 8, Top: 8})
	if err != nil {
		return nil, err
	}
	p := b.problem
	p.Grid = g
	return convection.Refine(ctx, p, 3, &convection.SteadySettings{Monitor: progress(b.name)})
}

// progress returns a line on standard error that follows the solution, nothing
// when that is not a terminal.
func progress(name string) func(convection.SteadyProgress) {
	if info, err := os.Stderr.Stat(); err != nil || info.Mode()&os.ModeCharDevice == 0 {
		return nil
	}
	return func(p convection.SteadyProgress) {
		fmt.Fprintf(os.Stderr, "\rcase %s: %dx%d cells, Newton step %d, residual %.1e\x1b[K\r",
			name, p.Grid.NX(), p.Grid.NZ(), p.Newton, p.Residual)
	}
}

// onGrids returns a quantity on each grid, and the grids.
func onGrids(study *convection.Study, quantity string) (cells []int, values []float64) {
	for _, s := range study.Solutions {
		for name, v := range s.All() {
			if name == diagnostic[quantity] {
				cells, values = append(cells, s.Temperature.Grid.NX()), append(values, v)
			}
		}
	}
	return cells, values
}

func table(w io.Writer, b benchmark, study *convection.Study) error {
	cells, _ := onGrids(study, "nu")
	fmt.Fprintf(w, "Case %s on %dx%d, %dx%d and %dx%d cells\n", b.name, cells[0], cells[0], cells[1], cells[1], cells[2], cells[2])
	fmt.Fprintf(w, "  %-5s %12s %12s %12s %6s %22s %12s %14s %10s\n",
		"", fmt.Sprint(cells[0]), fmt.Sprint(cells[1]), fmt.Sprint(cells[2]), "order", "extrapolated", "published", "reference", "difference")
	for _, v := range b.values {
		e, _ := study.Get(diagnostic[v.quantity])
		_, values := onGrids(study, v.quantity)
		published := "-"
		if !math.IsNaN(v.published) {
			published = fmt.Sprintf("%.8g", v.published)
		}
		fmt.Fprintf(w, "  %-5s %12.7g %12.7g %12.7g %6.2f %13.8g ± %-6.0e %12s %14.9g %10.1e\n", v.quantity,
			values[0], values[1], values[2], e.Order, e.Value, e.Uncertainty, published, v.reference, e.Value/v.reference-1)
	}
	_, err := fmt.Fprintln(w)
	return err
}

// A line is what -json prints.
type line struct {
	Case               string   `json:"case"`
	Quantity           string   `json:"quantity"`
	Grid               int      `json:"grid"`
	Value              float64  `json:"value"`
	Extrapolated       float64  `json:"extrapolated"`
	Uncertainty        float64  `json:"uncertainty"`
	ObservedOrder      *float64 `json:"observed_order"`
	Published          *float64 `json:"published"`
	Reference          float64  `json:"reference"`
	RelativeDifference float64  `json:"relative_difference"`
}

func lines(w io.Writer, b benchmark, study *convection.Study) error {
	enc := json.NewEncoder(w)
	for _, v := range b.values {
		e, _ := study.Get(diagnostic[v.quantity])
		cells, values := onGrids(study, v.quantity)
		for i := range cells {
			err := enc.Encode(line{
				Case: b.name, Quantity: v.quantity, Grid: cells[i], Value: values[i],
				Extrapolated: e.Value, Uncertainty: e.Uncertainty, ObservedOrder: number(e.Order),
				Published: number(v.published), Reference: v.reference, RelativeDifference: e.Value/v.reference - 1,
			})
			if err != nil {
				return err
			}
		}
	}
	return nil
}

// number makes NaN, which JSON lacks, null.
func number(v float64) *float64 {
	if math.IsNaN(v) {
		return nil
	}
	return &v
}
