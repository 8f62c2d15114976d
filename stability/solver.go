package stability

import (
	"math"
)

// Defaults of [Settings].
const (
	DefaultTolerance   = 1e-11
	DefaultMaxUnknowns = 1200
)

// Settings tunes a [Solver]. A nil *Settings, or a zero field, means the
// default.
type Settings struct {
	// Tolerance is the relative change of a critical value, a wavenumber, a
	// growth rate or a frequency from one resolution to the next finer one at
	// which the finer one is accepted. Its own error is much smaller. Default
	// [DefaultTolerance].
	Tolerance float64

	// MaxUnknowns bounds the resolution, and with it time (by its cube) and
	// memory (by its square). Default [DefaultMaxUnknowns].
	MaxUnknowns int
}

// withDefaults returns a copy with the defaults filled in.
func (s *Settings) withDefaults() (Settings, error) {
	var out Settings
	if s != nil {
		out = *s
	}
	if !(out.Tolerance >= 0) || math.IsInf(out.Tolerance, 1) {
		return out, &InputError{"Settings.Tolerance", out.Tolerance, "≥ 0"}
	}
	if out.MaxUnknowns < 0 {
		return out, &InputError{"Settings.MaxUnknowns", float64(out.MaxUnknowns), "≥ 0"}
	}
	if out.Tolerance == 0 {
		out.Tolerance = DefaultTolerance
	}
	if out.MaxUnknowns == 0 {
		out.MaxUnknowns = DefaultMaxUnknowns
	}
	return out, nil
}

// A Solver answers questions about one [Layer]. It keeps the discretised
// equations, so that further questions cost little time and few allocations.
// It serves one goroutine at a time; its answers do not depend on what it was
// asked before.
type Solver struct {
	layer  Layer
	base   *baseState
	bound  bound
	engine engine
}

// NewSolver checks a layer and prepares to answer questions about it.
func NewSolver(l Layer, settings *Settings) (*Solver, error) {
	set, err := settings.withDefaults()
	if err != nil {
		return nil, err
	}
	if err := l.check(); err != nil {
		return nil, err
	}
	s := &Solver{layer: l}
	if s.base, err = l.Base.resolve(); err != nil {
		return nil, err
	}
	if err := s.base.resolveSolute(l.Solute.Gradient); err != nil {
		return nil, err
	}
	eta, err := l.Viscosity.resolve(s.base, s.base.resolved.Nodes)
	if err != nil {
		return nil, err
	}
	s.bound = newBound(&l, s.base, eta)
	if eta.resolved != nil && !eta.resolved.Constant() {
		s.bound.soften(&l, s.base, eta)
	}
	scale := s.unknownScale()
	still := layerSystem(&l, s.base, eta, true, scale)
	moving := layerSystem(&l, s.base, eta, false, scale)
	s.engine = engine{
		still: &ladder{system: still}, moving: &ladder{system: moving},
		bound: &s.bound, diffuses: true, from: s.leastWavenumber(),
		tolerance: set.Tolerance, maxUnknowns: set.MaxUnknowns,
	}
	s.engine.bottomless = still.unlimited && s.base.resolved.FromRight().At(0) > 0
	for i, f := range still.fields {
		if f.Weighted && !still.irregular && (i == still.temperature || i == still.solute || i == still.velocity) {
			s.engine.longWave = true
		}
	}
	return s, nil
}

// mayOscillate reports whether the exchange of stabilities is not assured at
// values of the driving numbers. It is if the equations can be made symmetric: a
// uniform gradient, no stress by temperature, and no second field with a memory
// of its own but inertia (Pellew and Southwell 1940).
func (s *Solver) mayOscillate(number Number, drive [3]float64) bool {
	l := &s.layer
	switch {
	case l.Solute.Diffusivity > 0, number == MarangoniNumber, drive[driveOf(MarangoniNumber)] != 0:
		return true
	case !s.base.uniform:
		return true
	case s.base.gradient(0.5) <= 0:
		return false
	}
	return l.Taylor > 0 && l.inertia() > 0 || l.Magnetic.induction() > 0
}

// leastWavenumber returns where a search ends. Boundaries of nearly fixed flux
// have their onset at k of the order of the fourth root of the Biot number.
func (s *Solver) leastWavenumber() float64 {
	const share = 0.05
	if s.bound.thermal > 0 {
		return min(leastWavenumber, share*math.Sqrt(math.Sqrt(s.bound.thermal)))
	}
	return leastWavenumber
}

// unknownScale makes the temperature unknown about as large as the velocity
// near onset.
func (s *Solver) unknownScale() float64 {
	least := math.Inf(1)
	for k := 0.1; k < 100; k *= 1.2 {
		if b := s.bound.lower(k, ThermalRayleigh, [3]float64{}); b > 0 {
			least = min(least, b)
		}
	}
	if math.IsInf(least, 1) {
		return 1
	}
	return 1 / math.Sqrt(max(least, 1))
}
