package stokestest

import (
	"fmt"
	"math"

	"example.org/overturn/stokes/exact"
	"example.org/overturn/stokes/stokestest/trial"
)

// A trialRun is a problem with its answer.
type trialRun struct {
	view
	Problem
	answer Answer

	vx, vz, p, xx, zz, xz trial.Samples // those not given are empty
}

// sample reads the fields of the answer.
func (r *trialRun) sample() error {
	for _, q := range []struct {
		name     string
		field    Field
		to       *trial.Samples
		required bool
	}{
		{"VX", r.answer.VX, &r.vx, true},
		{"VZ", r.answer.VZ, &r.vz, true},
		{"P", r.answer.P, &r.p, false},
		{"XX", r.answer.XX, &r.xx, false},
		{"ZZ", r.answer.ZZ, &r.zz, false},
		{"XZ", r.answer.XZ, &r.xz, false},
	} {
		if q.field.IsMissing() && !q.required {
			continue
		}
		var err error
		if *q.to, err = q.field.Sample(r.Grid); err != nil {
			return fmt.Errorf("in Answer.%s: %w", q.name, err)
		}
	}
	return nil
}

// deviations are the errors of an answer, relative to the size of velocity and
// stress; missing where the answer lacks a quantity.
type deviations struct{ velocity, pressure, stress float64 }

const missing = -1

func (r *trialRun) deviations() deviations {
	speed, stress := r.scales(r.Grid)
	d := deviations{pressure: missing, stress: missing}
	vx := r.vx.Minus(func(x, z float64) float64 { return r.flow(x, z).VX })
	vz := r.vz.Minus(func(x, z float64) float64 { return r.flow(x, z).VZ })
	if r.slides() {
		vx = vx.Plus(-vx.Mean())
	}
	d.velocity = math.Hypot(vx.RMS(), vz.RMS()) / speed
	if len(r.p.Value) > 0 {
		p := r.p.Minus(func(x, z float64) float64 { return r.flow(x, z).P })
		d.pressure = p.Plus(-p.Mean()).RMS() / stress
	}
	if e, given := r.stressError(); given {
		d.stress = e / stress
	}
	return d
}

// slides reports whether nothing keeps the fluid from moving along x as a
// whole.
func (r *trialRun) slides() bool {
	w := r.Problem.Walls
	return w.Left == exact.Periodic && w.Bottom == exact.FreeSlip && w.Top == exact.FreeSlip
}

// stressError returns the root mean square error of the components that are
// given, less the constant by which the pressure may differ.
func (r *trialRun) stressError() (e float64, given bool) {
	var normal []trial.Samples
	if len(r.xx.Value) > 0 {
		normal = append(normal, r.xx.Minus(func(x, z float64) float64 { return r.flow(x, z).Stress.XX }))
	}
	if len(r.zz.Value) > 0 {
		normal = append(normal, r.zz.Minus(func(x, z float64) float64 { return r.flow(x, z).Stress.ZZ }))
	}
	constant := 0.0
	for _, s := range normal {
		constant += s.Mean() / float64(len(normal))
	}
	for _, s := range normal {
		e = math.Hypot(e, s.Plus(-constant).RMS()/math.Sqrt2)
	}
	if len(r.xz.Value) > 0 {
		e = math.Hypot(e, r.xz.Minus(func(x, z float64) float64 { return r.flow(x, z).Stress.XZ }).RMS())
	}
	return e, len(normal) > 0 || len(r.xz.Value) > 0
}
