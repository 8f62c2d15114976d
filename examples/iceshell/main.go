// Command iceshell takes the warm lower part of an ice shell, under a cold lid,
// from a material in real units to a verified convecting layer: Rayleigh number
// with its range, onset, a run, and the results in units that an observer knows.
// Ithyra, the moon that wears the shell, is invented.
//
//	go run ./examples/iceshell
//
// Numbers go to standard output, the temperature as a picture and as a VTK file
// into the folder of -out.
package main

import (
	"context"
	"flag"
	"fmt"
	"os"
	"os/signal"
	"strings"

	"example.org/overturn/boussinesq"
	"example.org/overturn/boussinesq/convection"
	"example.org/overturn/heat"
	"example.org/overturn/stability"
	"example.org/overturn/stokes/rheology"
	"example.org/overturn/stokes/staggered"
	"example.org/overturn/units"
)

// activationEnergy of ice creep at these temperatures, of the order of the 49 to
// 60 kJ/mol of Goldsby & Kohlstedt (2001, from memory).
const activationEnergy = 55 * units.KilojoulePerMole

// ithyra is what is known of the shell, and how well.
var ithyra = boussinesq.Uncertain{
	Layer: boussinesq.Layer{
		Material: boussinesq.Material{
			Name:         "warm ice",
			Density:      920 * units.KilogramPerCubicMetre,
			Expansivity:  1.55e-4 * units.PerKelvin,
			Conductivity: 2.4 * units.WattPerMetreKelvin,
			SpecificHeat: 1950 * units.JoulePerKilogramKelvin,
			Viscosity:    1e14 * units.PascalSecond,

			ReferenceTemperature: units.Temperature(254),
		},
		Depth:   17 * units.Kilometre,
		Gravity: 0.9 * units.MetrePerSecondSquared,
		Top:     units.Temperature(240),
		Bottom:  units.Temperature(268),
	},
	Ranges: boussinesq.Ranges{
		Viscosity:    boussinesq.Decades(1e13*units.PascalSecond, 1e17*units.PascalSecond),
		Depth:        boussinesq.Between(13*units.Kilometre, 21*units.Kilometre),
		Conductivity: boussinesq.Between(2.2*units.WattPerMetreKelvin, 2.6*units.WattPerMetreKelvin),
	},
}

func main() {
	out := flag.String("out", "examples/iceshell/out", "folder for the picture and the field")
	flag.Parse()
	if flag.NArg() > 0 {
		fmt.Fprintf(os.Stderr, "iceshell: %q is no flag, want -out\n", flag.Arg(0))
		os.Exit(2)
	}
	ctx, stop := signal.NotifyContext(context.Background(), os.Interrupt)
	defer stop()
	if err := run(ctx, *out); err != nil {
		fmt.Fprintln(os.Stderr, "iceshell:", err)
		os.Exit(1)
	}
}

func run(ctx context.Context, out string) error {
	if err := beforehand(); err != nil {
		return err
	}
	model, last, err := simulate(ctx)
	if err != nil {
		return err
	}
	study, err := converge(ctx)
	if err != nil {
		return err
	}
	if err := report(last, study); err != nil {
		return err
	}
	return save(out, model)
}

// beforehand says what can be said without a run.
func beforehand() error {
	l := ithyra.Layer
	fmt.Printf("Ice shell of Ithyra: %.0f km of warm ice between %v and %v\n\n", l.Depth.In(units.Kilometre), l.Top, l.Bottom)
	ra, err := ithyra.Bounds(boussinesq.Layer.Rayleigh)
	if err != nil {
		return err
	}
	sample, err := ithyra.Sample(boussinesq.Layer.Rayleigh, nil)
	if err != nil {
		return err
	}
	fmt.Printf("Rayleigh number %.2g, from %.2g to %.2g; what matters most is the %s\n",
		ra.Best, ra.Low, ra.High, strings.ToLower(sample.Influences()[0].Parameter))
	gamma, err := thermalExponent()
	if err != nil {
		return err
	}
	for _, wall := range []stability.Wall{stability.Free, stability.Rigid} {
		onset, err := stability.Layer{Bottom: wall, Top: wall, Viscosity: stability.Exponential(gamma, 0.5)}.Critical()
		if err != nil {
			return err
		}
		fmt.Printf("  between %-5v walls it convects above %6.1f, in rolls %.0f km wide: probability %.0f %%\n", wall,
			onset.Rayleigh, onset.Wavelength/2*l.Depth.In(units.Kilometre), 100*sample.Above(onset.Rayleigh))
	}
	criteria, err := ithyra.Layer.Validity()
	if err != nil {
		return err
	}
	for _, c := range criteria {
		if c.Verdict == boussinesq.Strained {
			fmt.Printf("  note: %s\n", c.Sentence)
		}
	}
	return nil
}

// thermalExponent returns the logarithm of the viscosity contrast of the best
// values. The viscosity of the material is that in the middle of the range.
func thermalExponent() (float64, error) {
	return ithyra.Layer.FrankKamenetskii(activationEnergy, ithyra.Layer.Material.ReferenceTemperature)
}

// layer returns the scaled problem of the best values on a grid.
func layer(g *staggered.Grid) (convection.Problem, error) {
	p, err := convection.FromLayer(ithyra.Layer, g)
	if err != nil {
		return p, err
	}
	gamma, err := thermalExponent()
	p.Viscosity = rheology.FrankKamenetskii{ThermalExponent: gamma, ReferenceTemperature: 0.5}
	return p, err
}

// simulate runs the layer from a small disturbance until convection is fully
// grown and nearly steady.
func simulate(ctx context.Context) (*convection.Model, convection.Sample, error) {
	var last convection.Sample
	g, err := staggered.Uniform(96, 48, 2, 1)
	if err != nil {
		return nil, last, err
	}
	p, err := layer(g)
	if err != nil {
		return nil, last, err
	}
	const end = 0.1
	m, err := convection.New(p, &convection.Settings{
		EndTime: end, Courant: 0.9, Every: 10, Heat: &heat.Settings{Advection: heat.Bounded},
	})
	if err != nil {
		return nil, last, err
	}
	watch := progress()
	for last, err = range m.Steps(ctx) {
		if err != nil {
			return nil, last, err
		}
		watch(last.Time / end)
	}
	return m, last, nil
}

// converge finds the steady state that the run tends to on three grids.
func converge(ctx context.Context) (*convection.Study, error) {
	g, err := staggered.Graded(192, 96, 2, 1, staggered.Grading{Left: 6, Right: 6, Bottom: 6, Top: 6})
	if err != nil {
		return nil, err
	}
	p, err := layer(g)
	if err != nil {
		return nil, err
	}
	return convection.Refine(ctx, p, 3, nil)
}
