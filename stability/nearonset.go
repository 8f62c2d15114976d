package stability

import (
	"errors"
	"fmt"
	"math"

	"example.org/overturn/stability/internal/pencil"
)

// NearOnset describes the layer just above its onset: with ε = (Ra - Ra_c)/Ra_c
// and q = k - k_c, disturbances grow like
//
//	σ τ₀ = ε - ξ₀² q² + …
//
// (Cross and Hohenberg 1993, section IV, from memory).
type NearOnset struct {
	// Onset is the critical point.
	Onset Onset

	// Coherence is ξ₀² = (1/2Ra_c) d²Ra/dk², in d².
	Coherence float64

	// Time is τ₀ = 1/(Ra_c dσ/dRa), in d²/κ.
	Time float64
}

// NearOnset returns the coefficients of the linear amplitude equation at the
// first onset as the Rayleigh number grows.
func (s *Solver) NearOnset() (NearOnset, error) {
	o, err := s.Critical()
	if err != nil {
		return NearOnset{}, err
	}
	if o.LongWave() {
		return NearOnset{Onset: o}, fmt.Errorf("stability: growth rate just above an onset at zero wavenumber: %w", ErrNoTheory)
	}
	g := growing{engine: &s.engine, drive: s.drives(o.Rayleigh)}
	a, err := g.follow(sample{k: o.Wavenumber, omega: o.Frequency}, 0, 0)
	if err != nil && !errors.Is(err, ErrNotConverged) {
		return NearOnset{Onset: o}, err
	}
	return NearOnset{
		Onset: o, Coherence: o.Curvature / (2 * o.Rayleigh), Time: 1 / (o.Rayleigh * real(a.Sensitivity)),
	}, err
}

// NusseltSlope returns dNu/d(Ra/Ra_c) just above the onset of steady
// two-dimensional rolls of the critical wavenumber, and an estimate of its
// error: Nu = 1 + slope (Ra - Ra_c)/Ra_c + …
//
// It is the third-order solvability condition of Malkus and Veronis (1958) and
// Schlüter, Lortz and Busse (1965) for a layer heated from below between
// isothermal boundaries, with a viscosity that may depend on depth but not on
// the disturbance of temperature, and with inertia at finite Prandtl number. For
// free boundaries it is 2. Layers with anything else that the theory does not
// cover give [ErrNoTheory]. For rigid walls and infinite Prandtl number the value
// is 1.430053; 1/0.69942 = 1.42976 of Schlüter, Lortz and Busse (from memory) is
// 0.02 % lower.
func (s *Solver) NusseltSlope() (slope, errorEstimate float64, err error) {
	if err := s.checkRolls(); err != nil {
		return 0, 0, err
	}
	q, err := s.question(Search{Branch: StationaryOnset})
	if err != nil {
		return 0, 0, err
	}
	a, err := q.stationaryMinimum()
	if err != nil {
		return 0, 0, err
	}
	var coarse float64
	for i := 0; ; i++ { // the quadratic terms need a finer mesh than the onset
		lv := s.engine.still.level(i)
		sol, err := lv.work.Solve(q.curve(pencil.Marginal), a.Point)
		if err != nil {
			return 0, 0, err
		}
		r := s.newRolls(lv, &sol)
		if slope, err = r.slope(); err != nil {
			return 0, 0, err
		}
		errorEstimate = math.Abs(slope-coarse) + roundOff*slope
		coarse = slope
		if i > 0 && errorEstimate <= max(s.engine.tolerance, 10*roundOff)*slope {
			return slope, errorEstimate, nil
		}
		if s.engine.still.size(i+1) > s.engine.maxUnknowns {
			return slope, errorEstimate, fmt.Errorf("stability: slope of the Nusselt number: %w", ErrNotConverged)
		}
	}
}

// checkRolls reports what the theory of the slope does not cover.
func (s *Solver) checkRolls() error {
	l := &s.layer
	for _, c := range []struct {
		beyond bool
		what   string
	}{
		{!s.base.unit(), "a base state with a gradient that is not 1"},
		{!conditionsOf(l.Bottom).isothermal() || !conditionsOf(l.Top).isothermal(), "a boundary that is not isothermal"},
		{conditionsOf(l.Bottom).wall == Permeable || conditionsOf(l.Top).wall == Permeable, "a permeable boundary"},
		{l.Taylor > 0, "rotation"},
		{l.Magnetic.Chandrasekhar > 0, "a magnetic field"},
		{l.Solute.Diffusivity > 0, "a solute"},
	} {
		if c.beyond {
			return fmt.Errorf("stability: slope of the Nusselt number with %s: %w", c.what, ErrNoTheory)
		}
	}
	return nil
}

// rolls is the expansion in the amplitude: the mode W cos kx, Θ cos kx of first
// order and the second harmonic w₂ cos 2kx, θ₂ cos 2kx of second order.
type rolls struct {
	level    *level
	system   *system
	rayleigh float64
	k        float64
	inertia  float64
	first    []float64
	second   []float64
}

func (s *Solver) newRolls(lv *level, sol *pencil.Solution) *rolls {
	re, _ := lv.work.Vector()
	return &rolls{
		level: lv, system: s.engine.still.system, rayleigh: sol.Drive[driveOf(ThermalRayleigh)], k: sol.K,
		inertia: s.layer.inertia(), first: re,
	}
}

// velocity returns a derivative of W, or of w₂.
func (r *rolls) velocity(x []float64, order int, z float64) float64 {
	return r.level.layout.Value(r.system.velocity, order, x, z)
}

// temperature returns a derivative of Θ, or of θ₂, for wavenumber k.
func (r *rolls) temperature(x []float64, order int, z, k float64) float64 {
	return r.level.layout.Value(r.system.temperature, order, x, z) * r.system.scale / k
}

// vorticity returns X = (D² - k²)W.
func (r *rolls) vorticity(z float64) float64 {
	return r.velocity(r.first, 2, z) - r.k*r.k*r.velocity(r.first, 0, z)
}

// points is enough for products of four functions.
func (r *rolls) points() int { return 2*r.level.layout.Degree + 2 }

// harmonic solves for the second harmonic, which the first drives by
//
//	heat:     ½(WΘ' - W'Θ)           momentum: (W'X - WX')/Pr
func (r *rolls) harmonic() error {
	layout, k2 := r.level.layout, 2*r.k
	load := make([]float64, layout.Size())
	layout.Load(load, r.system.temperature, 0, r.points(), func(z float64) float64 {
		w, wz := r.velocity(r.first, 0, z), r.velocity(r.first, 1, z)
		t, tz := r.temperature(r.first, 0, z, r.k), r.temperature(r.first, 1, z, r.k)
		return -k2 / r.system.scale * (w*tz - wz*t) / 2
	})
	if r.inertia > 0 {
		layout.Load(load, r.system.velocity, 0, r.points(), func(z float64) float64 {
			return -2 * r.inertia * r.vorticity(z) * r.velocity(r.first, 1, z)
		})
		layout.Load(load, r.system.velocity, 1, r.points(), func(z float64) float64 {
			return -r.inertia * r.vorticity(z) * r.velocity(r.first, 0, z)
		})
	}
	pt := pencil.Point{K: k2}
	pt.Drive[driveOf(ThermalRayleigh)] = r.rayleigh
	var err error
	r.second, err = r.level.work.SolveLinear(pt, load)
	return err
}

// slope evaluates the solvability condition of third order.
func (r *rolls) slope() (float64, error) {
	if err := r.harmonic(); err != nil {
		return 0, fmt.Errorf("stability: second harmonic: %w", err)
	}
	var wt, thermal, square, inertial float64 // ⟨WΘ⟩, ⟨ΘN₃⟩ in two parts, ⟨WS⟩
	k2 := 2 * r.k
	r.level.layout.Points(r.points(), func(z, weight float64) {
		w, wz := r.velocity(r.first, 0, z), r.velocity(r.first, 1, z)
		t, tz := r.temperature(r.first, 0, z, r.k), r.temperature(r.first, 1, z, r.k)
		w2, w2z := r.velocity(r.second, 0, z), r.velocity(r.second, 1, z)
		t2, t2z := r.temperature(r.second, 0, z, k2), r.temperature(r.second, 1, z, k2)
		wt += weight * w * t
		square += weight * w * t * w * t
		thermal += weight * t * (wz*t2 + w*t2z/2 + w2z*t/4 + w2*tz/2)
		if r.inertia > 0 {
			inertial -= weight * r.vorticity(z) * (w*w2z/4 + wz*w2/2)
		}
	})
	thermal += (square - wt*wt) / 2 // the mean: Θ₂₀' = ½(WΘ - ⟨WΘ⟩)
	second := (r.rayleigh*thermal + r.inertia*inertial/(r.k*r.k)) / wt
	return wt / 2 * r.rayleigh / second, nil
}
