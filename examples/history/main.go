// Command history cools an invented rocky planet, a third of the Earth's mass
// with a core and a stagnant lid, whose parameters are known in ranges only. It
// writes mantle temperature, heat flow and lid thickness against time, with bands
// that hold 68% of the histories, as CSV and PNG, and prints what matters most.
package main

import (
	"context"
	"encoding/csv"
	"flag"
	"fmt"
	"log"
	"os"
	"path/filepath"

	"example.org/overturn/scaling/history"
	"example.org/overturn/scaling/uncertainty"
	"example.org/overturn/units"
)

const (
	gyr   = units.Gigayear
	age   = 4.5 * gyr
	times = 91 // of the curves, every 50 Myr
)

// The curves, in the units of their axes.
var curves = []struct {
	name string
	of   func(history.Sample) float64
}{
	{"temperature (K)", func(s history.Sample) float64 { return float64(s.Temperature[1]) }},
	{"heat flow (TW)", func(s history.Sample) float64 { return s.Flow[1].In(units.Terawatt) }},
	{"lid (km)", func(s history.Sample) float64 { return s.Layer[1].Lid.In(units.Kilometre) }},
}

func at(i int) units.Time { return age * units.Time(i) / (times - 1) }

// cool runs one history and reads the curves off it.
func cool(in, out []float64) error {
	body, err := planet(in)
	if err != nil {
		return err
	}
	model, err := history.New(body, nil)
	if err != nil {
		return err
	}
	h, err := model.Run(0, age)
	if err != nil {
		return err
	}
	for i := range times {
		s, err := h.At(at(i))
		if err != nil {
			return err
		}
		for c, curve := range curves {
			out[c*times+i] = curve.of(s)
		}
	}
	return nil
}

func main() {
	log.SetFlags(0)
	out := flag.String("out", "examples/history/out", "folder for history.csv and history.png")
	samples := flag.Int("samples", 2000, "number of histories")
	flag.Parse()
	var names []string
	for _, curve := range curves {
		for i := range times {
			names = append(names, fmt.Sprintf("%s at %.2f Gyr", curve.name, at(i).In(gyr)))
		}
	}
	e, err := uncertainty.Run(context.Background(), inputs, names, cool, &uncertainty.Settings{Samples: *samples, Seed: 1})
	check(err)
	table := [][]string{{"time (Gyr)"}}
	panels := make([]panel, len(curves))
	for c, curve := range curves {
		table[0] = append(table[0], curve.name+" 16%", curve.name+" 50%", curve.name+" 84%")
		panels[c] = panel{title: curve.name, end: age.In(gyr)}
	}
	for i := range times {
		row := []string{fmt.Sprintf("%.2f", at(i).In(gyr))}
		for c := range curves {
			low, median, high, err := e.Band(names[c*times+i], 0.68)
			check(err)
			panels[c].add(low, median, high)
			row = append(row, fmt.Sprintf("%.4g", low), fmt.Sprintf("%.4g", median), fmt.Sprintf("%.4g", high))
		}
		table = append(table, row)
	}
	check(os.MkdirAll(*out, 0o755))
	file, err := os.Create(filepath.Join(*out, "history.csv"))
	check(err)
	check(csv.NewWriter(file).WriteAll(table))
	check(file.Close())
	check(drawPNG(filepath.Join(*out, "history.png"), panels))
	for c, curve := range curves {
		today := names[c*times+times-1]
		low, median, high, err := e.Band(today, 0.68)
		check(err)
		fmt.Printf("today's %s: %.4g, 68%% between %.4g and %.4g\n", curve.name, median, low, high)
		shares, err := e.FirstOrder(today)
		check(err)
		for _, s := range shares {
			if s.First > 0.05 {
				fmt.Printf("%5.0f%% of its variance: %s\n", 100*s.First, s.Input)
			}
		}
	}
	fmt.Printf("Wrote history.csv and history.png to %s\n", *out)
}

func check(err error) {
	if err != nil {
		log.Fatal(err)
	}
}
