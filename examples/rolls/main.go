// Command rolls asks how the heat flow of steady rolls grows with the Rayleigh
// number: it computes five of them between free-slip walls, each with its
// numerical uncertainty, fits a power law, says whether one is tenable, and
// compares it with the published asymptotics.
//
//	go run ./examples/rolls
//
// The table of runs goes to rolls.csv in the folder of -out as well.
package main

import (
	"context"
	"encoding/csv"
	"errors"
	"flag"
	"fmt"
	"os"
	"os/signal"
	"path/filepath"
	"strconv"

	"example.org/overturn/boussinesq/convection"
	"example.org/overturn/scaling"
	"example.org/overturn/stokes/staggered"
)

func main() {
	out := flag.String("out", "examples/rolls/out", "folder for the table")
	flag.Parse()
	if flag.NArg() > 0 {
		fmt.Fprintf(os.Stderr, "rolls: %q is no flag, want -out\n", flag.Arg(0))
		os.Exit(2)
	}
	ctx, stop := signal.NotifyContext(context.Background(), os.Interrupt)
	defer stop()
	if err := run(ctx, *out); err != nil {
		fmt.Fprintln(os.Stderr, "rolls:", err)
		os.Exit(1)
	}
}

func run(ctx context.Context, out string) error {
	var runs []scaling.Run
	rows := [][]string{{"Ra", "Nu", "uncertainty"}}
	fmt.Println("Steady rolls as wide as deep between free-slip walls, infinite Prandtl number")
	for _, ra := range []float64{1e4, 3e4, 1e5, 3e5, 1e6} {
		nu, err := nusselt(ctx, ra)
		if err != nil {
			return fmt.Errorf("at a Rayleigh number of %g: %w", ra, err)
		}
		fmt.Printf("  Ra = %-7.0e Nu = %9.5f ± %.5f\n", ra, nu.Value, nu.Uncertainty)
		runs = append(runs, scaling.Run{Groups: scaling.Groups{Rayleigh: ra, CellWidth: 1}, Value: nu.Value})
		rows = append(rows, []string{text(ra), text(nu.Value), text(nu.Uncertainty)})
	}
	if err := judge(runs); err != nil {
		return err
	}
	return save(out, rows)
}

// nusselt returns the Nusselt number of a steady roll from three grids.
func nusselt(ctx context.Context, ra float64) (convection.Estimate, error) {
	g, err := staggered.Graded(128, 128, 1, 1, staggered.Grading{Left: 8, Right: 8, Bottom: 8, Top: 8})
	if err != nil {
		return convection.Estimate{}, err
	}
	study, err := convection.Refine(ctx, convection.Problem{Grid: g, Rayleigh: ra}, 3, nil)
	if err != nil {
		return convection.Estimate{}, err
	}
	nu, _ := study.Get("NuTop")
	return nu, nil
}

// judge fits a power law and says what to make of it. The numerical
// uncertainties are no scatter, and far below what a curved law leaves: they are
// not among the errors of the fit.
func judge(runs []scaling.Run) error {
	fit, err := scaling.FitPowerLaw(runs, []scaling.Group{scaling.RayleighNumber}, nil)
	if err != nil {
		return err
	}
	exponent, _ := fit.Exponent(scaling.RayleighNumber)
	fmt.Printf("\nNu = %.3g Ra^β with β = %v\n", fit.Prefactor.Value, exponent)
	tenable, err := fit.Tenable()
	if err != nil {
		return err
	}
	if exponent.Low <= 1.0/3 && 1.0/3 <= exponent.High {
		fmt.Println("  the interval holds 1/3")
	} else {
		fmt.Println("  the interval does not hold 1/3: the approach to the asymptotic law is slow, and")
		fmt.Println("  from below in the exponent, as the local ones show")
	}
	fmt.Printf("  one power law for all five is tenable: %v\n", tenable)
	local, err := scaling.LocalExponents(runs, scaling.RayleighNumber)
	if err != nil {
		return err
	}
	for _, e := range local {
		fmt.Printf("  from Ra = %.0e on: %.4f\n", e.From, e.Exponent)
	}
	for _, c := range fit.Compare([]scaling.Law{scaling.FreeRolls(scaling.ViscousCore)}) {
		fmt.Printf("\nAgainst %q, exponent %.4f:\n  the runs lie %.0f %% above it (%s)\n", c.Law.Name, c.Exponent, 100*c.Bias, c.Law.Source)
	}
	return nil
}

func text(v float64) string { return strconv.FormatFloat(v, 'g', 8, 64) }

// save writes the table of runs.
func save(dir string, rows [][]string) error {
	if err := os.MkdirAll(dir, 0o755); err != nil {
		return err
	}
	name := filepath.Join(dir, "rolls.csv")
	f, err := os.Create(name)
	if err != nil {
		return err
	}
	if err := errors.Join(csv.NewWriter(f).WriteAll(rows), f.Close()); err != nil {
		return err
	}
	fmt.Printf("\nWrote %s\n", name)
	return nil
}
