package main

import (
	"errors"
	"fmt"
	"image/png"
	"io"
	"os"
	"path/filepath"

	"example.org/overturn/boussinesq/convection"
	"example.org/overturn/stokes/staggered"
	"example.org/overturn/stokes/staggered/picture"
	"example.org/overturn/units"
)

// report prints the run and the steady state it tends to, scaled and
// dimensional, with the numerical uncertainty of the latter. That of the
// material is in the range of the Rayleigh number.
func report(last convection.Sample, study *convection.Study) error {
	s, err := ithyra.Layer.Scales()
	if err != nil {
		return err
	}
	steady := func(name string) convection.Estimate {
		e, _ := study.Get(name)
		return e
	}
	flux := func(v float64) float64 { return s.HeatFlux(v).In(units.MilliwattPerSquareMetre) }
	speed := func(v float64) float64 { return s.Velocity(v).In(units.MillimetrePerYear) }
	kelvin := func(v float64) float64 { return float64(s.TemperatureDifference(v)) }
	fmt.Printf("\n  %-24s %10s %20s %20s\n", "best values", "the run", "steady state", "of Ithyra")
	row := func(name string, run float64, e convection.Estimate, in func(float64) float64, zero float64, unit string) {
		fmt.Printf("  %-24s %10.4g %12.5g ± %-5.1g %10.4g ± %-5.1g %s\n",
			name, run, e.Value, e.Uncertainty, zero+in(e.Value), in(e.Uncertainty), unit)
	}
	row("Nusselt number, heat flux", last.NuTop, steady("NuTop"), flux, 0, "mW/m²")
	row("rms speed", last.RMSVelocity, steady("RMSVelocity"), speed, 0, "mm/yr")
	row("rms speed along the top", last.SurfaceVelocity, steady("SurfaceVelocity"), speed, 0, "mm/yr")
	row("mean temperature", last.MeanTemperature, steady("MeanTemperature"), kelvin, float64(ithyra.Layer.Top), "K")
	fmt.Printf("\n  the run lasted %.2f Myr; fluid crosses the layer in %.3f Myr, heat alone in %.1f Myr\n",
		s.Time(last.Time).In(units.Megayear), s.Time(1/last.RMSVelocity).In(units.Megayear), s.Time(1).In(units.Megayear))
	fmt.Printf("  its last step closes the heat budget to %.0e; buoyancy work and dissipation differ by %.0e\n",
		last.HeatBudgetError, last.WorkError())
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
