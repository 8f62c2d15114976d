package stability

import (
	"errors"
	"fmt"
	"math"

	"example.org/overturn/stability/internal/pencil"
)

// A Branch says which kind of onset is meant.
type Branch int

const (
	// FirstOnset is whichever comes first as the number grows.
	FirstOnset Branch = iota
	// StationaryOnset is motion that sets in without oscillating.
	StationaryOnset
	// OscillatoryOnset is motion that sets in as an oscillation, or a wave.
	OscillatoryOnset
)

var branchNames = [...]string{"first", "stationary", "oscillatory"}

// String returns the name of the branch.
func (b Branch) String() string {
	if b < 0 || int(b) >= len(branchNames) {
		return fmt.Sprintf("Branch(%d)", int(b))
	}
	return branchNames[b]
}

// A Search says what onset to look for. The zero Search is the first onset as
// the Rayleigh number grows.
type Search struct {
	// Number is the one that grows from zero; the solute's decreases from
	// zero, since positive values stabilise. The layer's own value of it is
	// ignored.
	Number Number

	// Rayleigh is the Rayleigh number while another number is looked for.
	Rayleigh float64

	// Branch is the kind of onset. Default FirstOnset.
	Branch Branch

	// Order counts stationary branches at a fixed wavenumber by increasing
	// value of the number: 0 is the first, 1 the second, which usually has two
	// rolls on top of each other. An order above 0 implies StationaryOnset.
	Order int
}

// An Onset is a neutral state: a disturbance that neither grows nor decays.
type Onset struct {
	// Number was looked for, and Value was found.
	Number Number
	Value  float64

	// Rayleigh, SoluteRayleigh and Marangoni are the values of all numbers,
	// one of them being Value.
	Rayleigh, SoluteRayleigh, Marangoni float64

	// Wavenumber is in radians per depth, Wavelength = 2π/Wavenumber in
	// depths: a pair of rolls, +Inf if the onset is at zero wavenumber, that is
	// as wide as the layer allows.
	Wavenumber, Wavelength float64

	// Frequency is the angular frequency of an oscillatory onset, in κ/d²,
	// zero for a stationary one.
	Frequency float64

	// Slope and Curvature are the first and second derivative of the neutral
	// value in the wavenumber. The slope is zero at a critical point.
	Slope, Curvature float64

	// Error estimates the errors of the values: the change from the last but
	// one resolution plus round-off. The true errors are smaller as a rule.
	Error OnsetError

	// Mode is the shape of the disturbance.
	Mode *Mode
}

// OnsetError holds estimates of absolute errors.
type OnsetError struct {
	Value, Wavenumber, Frequency float64
}

// LongWave reports whether the onset is at zero wavenumber: the neutral curve
// is lowest in the limit of infinitely wide rolls.
func (o Onset) LongWave() bool { return o.Wavenumber == 0 }

// Oscillates reports whether the onset is an oscillation.
func (o Onset) Oscillates() bool { return o.Frequency != 0 }

// String states the onset in a line.
func (o Onset) String() string {
	s := fmt.Sprintf("%v number %.7g ± %.1g, ", o.Number, o.Value, o.Error.Value)
	if o.LongWave() {
		return s + "at zero wavenumber"
	}
	s += fmt.Sprintf("wavenumber %.7g ± %.1g", o.Wavenumber, o.Error.Wavenumber)
	if o.Oscillates() {
		s += fmt.Sprintf(", frequency %.7g ± %.1g", o.Frequency, o.Error.Frequency)
	}
	return s
}

// Critical returns the onset of convection as the Rayleigh number grows: the
// smallest Rayleigh number at which any disturbance is neutral. See [Layer.Find]
// for other questions and [NewSolver] for many of them.
func (l Layer) Critical() (Onset, error) { return l.Find(Search{}) }

// Find returns the onset that a search asks for.
func (l Layer) Find(search Search) (Onset, error) {
	s, err := NewSolver(l, nil)
	if err != nil {
		return Onset{}, err
	}
	return s.Find(search)
}

// Critical returns the onset of convection as the Rayleigh number grows. The
// error is a [*NoOnsetError] if there is none.
func (s *Solver) Critical() (Onset, error) { return s.Find(Search{}) }

// Find returns the onset that a search asks for. The error is a
// [*NoOnsetError] if there is none, and [ErrUnstable] if something grows without
// the number.
func (s *Solver) Find(search Search) (Onset, error) {
	q, err := s.question(search)
	if err != nil {
		return Onset{}, err
	}
	if search.Branch != StationaryOnset {
		if err := q.checkCalm(); err != nil {
			return Onset{}, fmt.Errorf("stability: %v number: %w", search.Number, err)
		}
	}
	a, err := q.find(search.Branch)
	if err != nil && !errors.Is(err, ErrNotConverged) {
		return Onset{}, err
	}
	return q.onset(&a), err
}

// find returns the onset on a branch.
func (q *question) find(b Branch) (answer, error) {
	switch {
	case b == OscillatoryOnset:
		return q.oscillatory()
	case b == StationaryOnset || q.order > 0:
		return q.stationaryMinimum()
	}
	return q.first()
}

// Neutral returns the neutral state of wavenumber k > 0 with the smallest
// Rayleigh number: a point of the neutral curve.
func (l Layer) Neutral(k float64) (Onset, error) {
	s, err := NewSolver(l, nil)
	if err != nil {
		return Onset{}, err
	}
	return s.Neutral(Search{}, k)
}

// Neutral returns the neutral state of wavenumber k > 0 that a search asks for:
// a point of its neutral curve.
func (s *Solver) Neutral(search Search, k float64) (Onset, error) {
	q, err := s.question(search)
	if err != nil {
		return Onset{}, err
	}
	if err := checkWavenumber(k); err != nil {
		return Onset{}, err
	}
	a, err := q.neutral(k, search.Branch)
	if err != nil && !errors.Is(err, ErrNotConverged) {
		return Onset{}, err
	}
	if math.IsInf(a.value, 1) {
		return Onset{}, &NoOnsetError{Number: q.number, Wavenumber: [2]float64{k, k}}
	}
	return q.onset(&a), err
}

func checkWavenumber(k float64) error {
	if !(k > 0) || math.IsInf(k, 1) {
		return &InputError{"wavenumber", k, "finite and > 0"}
	}
	return nil
}

// question turns a search into a question.
func (s *Solver) question(search Search) (*question, error) {
	switch {
	case search.Number < ThermalRayleigh || search.Number > MarangoniNumber:
		return nil, &InputError{"Search.Number", float64(search.Number), "one of the declared numbers"}
	case search.Branch < FirstOnset || search.Branch > OscillatoryOnset:
		return nil, &InputError{"Search.Branch", float64(search.Branch), "one of the declared branches"}
	case search.Order < 0:
		return nil, &InputError{"Search.Order", float64(search.Order), "≥ 0"}
	case math.IsNaN(search.Rayleigh) || math.IsInf(search.Rayleigh, 0):
		return nil, &InputError{"Search.Rayleigh", search.Rayleigh, "finite"}
	case search.Number == SoluteRayleigh && s.layer.Solute.Diffusivity == 0:
		return nil, &InputError{"solute diffusivity", 0, "> 0, to look for a solute Rayleigh number"}
	case search.Number == MarangoniNumber && (s.layer.Porous == Darcy || conditionsOf(s.layer.Top).wall != Free):
		return nil, fmt.Errorf("stability: top is %v, want a free top of a fluid to look for a Marangoni number",
			conditionsOf(s.layer.Top))
	}
	q := &question{engine: &s.engine, number: search.Number, order: search.Order, fixed: s.drives(search.Rayleigh)}
	q.fixed[driveOf(search.Number)] = 0
	q.oscillates = s.mayOscillate(q.number, q.fixed)
	return q, nil
}

// drives returns what the pencil is driven by at a Rayleigh number.
func (s *Solver) drives(rayleigh float64) [3]float64 {
	var d [3]float64
	d[driveOf(ThermalRayleigh)] = rayleigh
	d[driveOf(SoluteRayleigh)] = -s.layer.Solute.Rayleigh
	d[driveOf(MarangoniNumber)] = s.layer.Marangoni
	return d
}

// onset turns an answer into an onset.
func (q *question) onset(a *answer) Onset {
	sign := 1.0
	if q.number == SoluteRayleigh {
		sign = -1
	}
	d := a.Drive
	if a.K == 0 && a.re == nil { // unstable without any drive
		d = q.fixed
	}
	return Onset{
		Number: q.number, Value: sign * a.value,
		Rayleigh: d[driveOf(ThermalRayleigh)], SoluteRayleigh: 0 - d[driveOf(SoluteRayleigh)],
		Marangoni:  d[driveOf(MarangoniNumber)],
		Wavenumber: a.K, Wavelength: 2 * math.Pi / a.K, Frequency: math.Abs(imag(a.Sigma)),
		Slope: sign * a.Slope, Curvature: sign * a.Curvature,
		Error: OnsetError{a.valueError, a.kError, a.omegaError},
		Mode:  newMode(a),
	}
}

// oscillatory finds the first oscillatory onset, whatever else comes before.
func (q *question) oscillatory() (answer, error) {
	missing := &NoOnsetError{Number: q.number, Wavenumber: [2]float64{q.from, largestWavenumber}}
	if !q.oscillates {
		return answer{}, missing
	}
	limit, err := q.valueOfGrowth(missing)
	if err != nil {
		return answer{}, err
	}
	for range 3 { // growth may be stationary at first
		limit *= 10
		a, err := q.oscillatoryMinimum(limit)
		if err != nil || !math.IsInf(a.value, 1) {
			return a, err
		}
	}
	missing.Largest = limit
	return answer{}, missing
}

// neutral finds the first neutral state at a wavenumber. None gives +Inf.
func (q *question) neutral(k float64, b Branch) (answer, error) {
	still := answer{value: math.Inf(1)}
	var err error
	if b != OscillatoryOnset {
		if still, err = q.stationaryNeutral(k); err != nil && !errors.Is(err, ErrNotConverged) {
			return still, err
		}
	}
	if b == StationaryOnset || q.order > 0 || !q.oscillates {
		return still, err
	}
	limit := still.value
	if math.IsInf(limit, 1) {
		limit = max(q.bound.lower(k, q.number, q.fixed), 1) * 1e6
	}
	at, sampleErr := q.oscillation(k, limit)
	if sampleErr != nil || at.missing() {
		return still, errors.Join(err, sampleErr)
	}
	pt := q.point(k, at.value)
	pt.Sigma = complex(0, at.omega)
	moving, movingErr := q.refine(q.moving, q.curve(pencil.MarginalOscillation), pt, at.level, 0, 0)
	if movingErr == nil && moving.value < still.value {
		return moving, nil
	}
	return still, err
}

// Curve returns the neutral states at given wavenumbers, each > 0: the neutral
// curve of a search. A wavenumber without one gets an Onset of infinite Value.
func (s *Solver) Curve(search Search, ks []float64) ([]Onset, error) {
	out := make([]Onset, len(ks))
	for i, k := range ks {
		o, err := s.Neutral(search, k)
		switch {
		case errors.Is(err, ErrNoOnset):
			o = Onset{Number: search.Number, Value: math.Inf(1), Wavenumber: k, Wavelength: 2 * math.Pi / k}
		case err != nil:
			return nil, err
		}
		out[i] = o
	}
	return out, nil
}
