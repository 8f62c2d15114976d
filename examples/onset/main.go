// Command onset asks whether a tank of syrup convects: from typed inputs with
// ranges to a verdict, the odds, and the neutral curve as a table and a picture.
// The syrup, called brell, and its tank are invented.
//
//	go run ./examples/onset
//
// The table goes to neutral.csv and the picture to neutral.png in the folder of
// -out: the Rayleigh number at which a wavelength is neutral, in colour, against
// the wavelength in cm; the tank's Rayleigh number with its range, in grey.
package main

import (
	"context"
	"encoding/csv"
	"flag"
	"fmt"
	"io"
	"math"
	"os"
	"path/filepath"

	"example.org/overturn/boussinesq"
	"example.org/overturn/stability"
	"example.org/overturn/units"
)

// tank is what is known of the syrup and its tank, and how well.
var tank = boussinesq.Uncertain{
	Layer: boussinesq.Layer{
		Material: boussinesq.Material{
			Name:         "brell",
			Density:      1390 * units.KilogramPerCubicMetre,
			Expansivity:  4.2e-4 * units.PerKelvin,
			Conductivity: 0.36 * units.WattPerMetreKelvin,
			SpecificHeat: 2400 * units.JoulePerKilogramKelvin,
			Viscosity:    35 * units.PascalSecond, // at 30 °C
		},
		Depth:   4 * units.Centimetre,
		Gravity: units.StandardGravity,
		Top:     units.Celsius(22),
		Bottom:  units.Celsius(38),
	},
	Ranges: boussinesq.Ranges{
		Viscosity: boussinesq.Decades(15*units.PascalSecond, 80*units.PascalSecond),
		Depth:     boussinesq.Between(3.8*units.Centimetre, 4.2*units.Centimetre),
		Bottom:    boussinesq.PlusMinusTemperature(units.Celsius(38), 1*units.Kelvin),
	},
}

// conditions: a plate below, a free surface above which a fan keeps at its
// temperature, and a viscosity that falls by a factor e in 12 K.
var conditions = stability.Conditions{
	Bottom:            stability.Rigid,
	Top:               stability.Free,
	RelativeViscosity: func(t units.Temperature) float64 { return math.Exp(-(t.Celsius() - 30) / 12) },
}

func main() {
	out := flag.String("out", "examples/onset/out", "folder for the table and the picture")
	flag.Parse()
	if err := run(os.Stdout, *out); err != nil {
		fmt.Fprintln(os.Stderr, "onset:", err)
		os.Exit(1)
	}
}

func run(w io.Writer, out string) error {
	odds, err := stability.JudgeUncertain(context.Background(), tank, conditions, &boussinesq.Settings{Draws: 400})
	if err != nil {
		return err
	}
	fmt.Fprintf(w, "Does a tank of %s, %.3g cm deep, convect between %.0f °C below and %.0f °C above?\n\n%v\n",
		tank.Layer.Material.Name, tank.Layer.Depth.In(units.Centimetre), tank.Layer.Bottom.Celsius(), tank.Layer.Top.Celsius(), odds)
	for _, i := range odds.Ratio.Influences() {
		fmt.Fprintf(w, "  %3.0f %% of the doubt is in its %s\n", 100*i.Share, i.Parameter)
	}
	fmt.Fprintln(w)
	checks, err := tank.Layer.Validity()
	if err != nil {
		return err
	}
	for _, c := range checks {
		if c.Verdict == boussinesq.Strained {
			fmt.Fprintln(w, "Beware:", c.Sentence)
		}
	}
	curve, err := neutralCurve(odds.Best)
	if err != nil {
		return err
	}
	if err := os.MkdirAll(out, 0o755); err != nil {
		return err
	}
	if err := writeTable(filepath.Join(out, "neutral.csv"), curve); err != nil {
		return err
	}
	between, err := odds.Ratio.Quantiles(0.05, 0.95)
	if err != nil {
		return err
	}
	for i := range between { // of the same critical number, near enough for a band
		between[i] *= odds.Best.Critical
	}
	return writePicture(filepath.Join(out, "neutral.png"), curve, odds.Best, between)
}

// neutralCurve computes neutral states from half to three times the wavelength
// of the onset.
func neutralCurve(v stability.Verdict) ([]stability.Onset, error) {
	solver, err := stability.NewSolver(v.Layer, nil)
	if err != nil {
		return nil, err
	}
	ks := make([]float64, 0, 101)
	for i := range cap(ks) {
		ks = append(ks, 2*math.Pi/(v.Onset.Wavelength*(0.4+2.6*float64(i)/float64(cap(ks)-1))))
	}
	return solver.Curve(stability.Search{}, ks)
}

func writeTable(name string, curve []stability.Onset) error {
	file, err := os.Create(name)
	if err != nil {
		return err
	}
	defer file.Close()
	table := csv.NewWriter(file)
	rows := [][]string{{"wavelength_cm", "wavenumber", "rayleigh_neutral", "error_estimate"}}
	for _, o := range curve {
		length := units.Length(o.Wavelength) * tank.Layer.Depth
		rows = append(rows, []string{
			fmt.Sprintf("%.4f", length.In(units.Centimetre)), fmt.Sprintf("%.6f", o.Wavenumber),
			fmt.Sprintf("%.10g", o.Rayleigh), fmt.Sprintf("%.1e", o.Error.Value),
		})
	}
	if err := table.WriteAll(rows); err != nil {
		return err
	}
	return file.Close()
}
