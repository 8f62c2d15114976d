package stokestest

import (
	"context"
	"errors"
	"fmt"
	"math"

	"example.org/overturn/stokes/exact"
	"example.org/overturn/stokes/stokestest/trial"
)

// Other units: factors of length, velocity and viscosity, powers of two so
// that no digit is lost. They take a box of size 1 to a mantle in SI.
var (
	otherLength    = math.Ldexp(1, 21)
	otherVelocity  = math.Ldexp(1, -30)
	otherViscosity = math.Ldexp(1, 70)
)

// properties looks at what must hold whatever the exact solution is.
func (st *study) properties(ctx context.Context, r *trialRun) ([]trial.Check, error) {
	var list []trial.Check
	limit := st.set.Tolerance
	width, height := r.Grid.Size()
	for _, twin := range []struct {
		name string
		view view
		grid trial.Grid
		back func(x, z float64) (float64, float64)
	}{
		{"mirrored in x", r.view.mirroredX(), r.Grid.MirroredX(), func(x, z float64) (float64, float64) { return width - x, z }},
		{"mirrored in z", r.view.mirroredZ(), r.Grid.MirroredZ(), func(x, z float64) (float64, float64) { return x, height - z }},
		{"in other units", r.view.inUnits(otherLength, otherVelocity, otherViscosity), r.Grid.Scaled(otherLength),
			func(x, z float64) (float64, float64) { return x / otherLength, z / otherLength }},
	} {
		t, err := st.ask(ctx, twin.view, twin.grid)
		if errors.Is(err, errors.ErrUnsupported) {
			continue
		}
		if err != nil {
			return nil, fmt.Errorf("%s: %w", twin.name, err)
		}
		if d, ok := r.differenceTo(t, twin.back); ok {
			list = append(list, trial.Check{Name: twin.name, Value: d, Limit: limit})
		}
	}
	if d, ok, err := r.divergence(); err != nil {
		return nil, err
	} else if ok {
		list = append(list, trial.Check{Name: "divergence", Value: d, Limit: limit})
	}
	if w, d := r.answer.Work, r.answer.Dissipation; r.AtRest() && (w != 0 || d != 0) {
		list = append(list, trial.Check{Name: "work and dissipation", Value: math.Abs(w-d) / max(math.Abs(w), math.Abs(d)), Limit: limit})
	}
	return list, nil
}

// differenceTo returns the relative difference of velocity and pressure from
// the answer to the same problem in another view, from which back leads here.
// It reports false where the points of the two do not agree.
func (r *trialRun) differenceTo(t *trialRun, back func(x, z float64) (float64, float64)) (float64, bool) {
	width, height := r.Grid.Size()
	speed, stress := r.scales(r.Grid)
	worst := 0.0
	for _, q := range []struct {
		here, there trial.Samples
		factor      float64
		constant    bool // up to one
		size        float64
	}{
		{r.vx, t.vx, sign(t.flipX) / t.velocity, r.slides(), speed},
		{r.vz, t.vz, sign(t.flipZ) / t.velocity, false, speed},
		{r.p, t.p, 1 / t.stress(), true, stress},
	} {
		if len(q.here.Value) == 0 {
			continue
		}
		d, ok := q.there.Times(q.factor).Moved(back).Difference(q.here, max(width, height))
		if !ok {
			return 0, false
		}
		if q.constant {
			d = d.Plus(-d.Mean())
		}
		worst = max(worst, d.RMS()/q.size)
	}
	return worst, true
}

// divergence returns the root mean square of the divergence over that of the
// strain rate: as the solver gives it, or from velocities at faces. It reports
// false if there is neither.
func (r *trialRun) divergence() (float64, bool, error) {
	if f := r.answer.Divergence; !f.IsMissing() {
		s, err := f.Sample(r.Grid)
		if err != nil {
			return 0, false, fmt.Errorf("Answer.Divergence: %w", err)
		}
		return s.RMS() / r.strainRate(), true, nil
	}
	if !r.answer.VX.OnLattice(r.X, r.ZCentres()) || !r.answer.VZ.OnLattice(r.XCentres(), r.Z) {
		return 0, false, nil
	}
	nx, nz := r.Cells()
	sum := 0.0
	for k := range nz {
		dz := r.Z[k+1] - r.Z[k]
		for i := range nx {
			dx := r.X[i+1] - r.X[i]
			in := k*(nx+1) + i
			out := (r.vx.Value[in+1]-r.vx.Value[in])/dx + (r.vz.Value[(k+1)*nx+i]-r.vz.Value[k*nx+i])/dz
			sum += out * out * dx * dz
		}
	}
	width, height := r.Grid.Size()
	return math.Sqrt(sum/(width*height)) / r.strainRate(), true, nil
}

// strainRate returns the root mean square √(ε:ε) of the exact flow.
func (r *trialRun) strainRate() float64 {
	s, err := trial.Function(func(x, z float64) float64 {
		e := r.flow(x, z).StrainRate
		return math.Sqrt(contracted(e))
	}).Sample(r.Grid)
	if err != nil { // exact solutions are finite in the middles of cells
		return 0
	}
	return s.RMS()
}

func contracted(e exact.Tensor) float64 { return e.XX*e.XX + e.ZZ*e.ZZ + 2*e.XZ*e.XZ }
