package main

import (
	"errors"
	"fmt"
	"image/png"
	"io"
	"math"
	"os"
	"path/filepath"

	"example.org/overturn/boussinesq/convection"
	"example.org/overturn/stokes/staggered"
	"example.org/overturn/stokes/staggered/picture"
	"example.org/overturn/units"
)

// averages collects means over time.
type averages struct {
	count              float64
	nu, speed, surface float64
	temperature        float64
	imbalance, budget  float64
	workError          float64
}

func (a *averages) add(s convection.Sample) {
	a.count++
	step := func(mean *float64, v float64) { *mean += (v - *mean) / a.count }
	step(&a.nu, s.NuTop)
	step(&a.speed, s.RMSVelocity)
	step(&a.surface, s.SurfaceVelocity)
	step(&a.temperature, s.MeanTemperature)
	step(&a.imbalance, s.NuBottom-s.NuTop)
	a.budget = max(a.budget, s.HeatBudgetError)
	a.workError = max(a.workError, s.WorkError())
}

// report prints the scaled results beside the dimensional ones.
func report(mean averages) error {
	s, err := ithyra.Layer.Scales()
	if err != nil {
		return err
	}
	kelvin := float64(s.Temperature(mean.temperature))
	row := func(name string, scaled, value float64, unit string) {
		fmt.Printf("  %-28s %10.4g %10.3g %s\n", name, scaled, value, unit)
	}
	fmt.Printf("\n  %-28s %10s %10s\n", "mean over the second half", "scaled", "of Ithyra")
	row("Nusselt number, heat flux", mean.nu, s.HeatFlux(mean.nu).In(units.MilliwattPerSquareMetre), "mW/m²")
	row("rms speed", mean.speed, s.Velocity(mean.speed).In(units.MillimetrePerYear), "mm/yr")
	row("rms speed along the top", mean.surface, s.Velocity(mean.surface).In(units.MillimetrePerYear), "mm/yr")
	row("mean temperature", mean.temperature, kelvin, "K")
	row("time to cross the layer", 1/mean.speed, s.Time(1/mean.speed).In(units.Megayear), "Myr")
	row("time to diffuse through it", 1, s.Time(1).In(units.Megayear), "Myr")
	fmt.Printf("\nChecks: the heat budget of every step closes to %.0e, buoyancy work and dissipation differ by %.0e,\n"+
		"heat flows in and out differ by %.1f %% of the mean.\n", mean.budget, mean.workError, 100*math.Abs(mean.imbalance)/mean.nu)
	return nil
}

// save writes the last state as a picture and as a VTK file.
func save(dir string, m *convection.Model) error {
	if err := os.MkdirAll(dir, 0o755); err != nil {
		return err
	}
	psi := staggered.NewNodal(m.Temperature().Grid)
	m.Flow().StreamFunctionTo(psi)
	img, err := picture.Draw(m.Temperature(), &picture.Settings{Stream: psi})
	if err != nil {
		return err
	}
	name := filepath.Join(dir, "temperature.png")
	if err := write(name, func(w io.Writer) error { return png.Encode(w, img) }); err != nil {
		return err
	}
	field := filepath.Join(dir, "iceshell.vtr")
	err = write(field, func(w io.Writer) error {
		return staggered.WriteVTK(w, m.Temperature().Grid,
			staggered.Field{Name: "temperature", Data: m.Temperature()},
			staggered.Field{Name: "viscosity", Data: m.Viscosity()},
			staggered.Field{Name: "velocity", Data: m.Flow()},
			staggered.Field{Name: "stream_function", Data: psi})
	})
	if err != nil {
		return err
	}
	fmt.Printf("\nWrote %s and %s\n", name, field)
	return nil
}

func write(name string, content func(io.Writer) error) error {
	f, err := os.Create(name)
	if err != nil {
		return err
	}
	return errors.Join(content(f), f.Close())
}

// progress returns a line on standard error that shows the share done, nothing
// when that is not a terminal.
func progress() func(share float64) {
	if info, err := os.Stderr.Stat(); err != nil || info.Mode()&os.ModeCharDevice == 0 {
		return func(float64) {}
	}
	return func(share float64) {
		fmt.Fprintf(os.Stderr, "\rrunning: %3.0f %%\r", 100*share)
		if share >= 1 {
			fmt.Fprint(os.Stderr, "\x1b[K")
		}
	}
}
