package stability

import (
	"context"
	"errors"
	"fmt"
	"math"
	"strings"

	"example.org/overturn/boussinesq"
	"example.org/overturn/units"
)

// A Verdict says whether a layer of material convects, in its own units.
type Verdict struct {
	// Convects says whether the layer at rest is unstable.
	Convects bool

	// Rayleigh is the layer's number, Critical the one at which convection
	// sets in, and Ratio the first over the second. Critical is +Inf, and Ratio
	// zero, if there is no onset. A Rayleigh number that is not positive means
	// that nothing drives the layer.
	Rayleigh, Critical, Ratio float64

	// Onset is the neutral state at the critical Rayleigh number, and
	// Wavelength its length, +Inf for an onset at zero wavenumber.
	Onset      Onset
	Wavelength units.Length

	// Rolls is how many rolls stand side by side at onset in a layer of
	// limited Width, else zero.
	Rolls int

	// Fastest is the disturbance that grows fastest at the layer's Rayleigh
	// number, FastestWavelength its length, and GrowthTime the time in which it
	// grows by a factor e. They are zero if nothing grows. The sides of a layer
	// of limited Width are not respected: it has a shorter or longer wave that
	// grows no faster.
	Fastest           Growth
	FastestWavelength units.Length
	GrowthTime        units.Time

	// Layer is the dimensionless problem, for further questions.
	Layer Layer
}

// TimeToGrow returns the time in which the fastest disturbance grows by a
// factor, +Inf if nothing grows.
func (v Verdict) TimeToGrow(factor float64) units.Time {
	if v.GrowthTime == 0 {
		return units.Time(math.Inf(1))
	}
	return units.Time(math.Log(factor) * float64(v.GrowthTime))
}

// String states the verdict in words, in a few lines.
func (v Verdict) String() string {
	var b strings.Builder
	switch {
	case v.Convects:
		fmt.Fprintf(&b, "The layer convects. Its Rayleigh number, %.3g, is %.3g times the critical one, %.4g.\n",
			v.Rayleigh, v.Ratio, v.Critical)
	case v.Rayleigh <= 0:
		return "The layer stays at rest: nothing drives it.\n"
	case math.IsInf(v.Critical, 1):
		return fmt.Sprintf("The layer stays at rest: no Rayleigh number is critical, %.3g no more than others.\n", v.Rayleigh)
	default:
		fmt.Fprintf(&b, "The layer stays at rest. Its Rayleigh number, %.3g, is %.3g of the critical one, %.4g.\n",
			v.Rayleigh, v.Ratio, v.Critical)
	}
	sets := "would set"
	if v.Convects {
		sets = "sets"
	}
	switch {
	case v.Onset.LongWave():
		fmt.Fprintf(&b, "Convection %s in with rolls as wide as the layer allows.\n", sets)
	case v.Rolls > 0:
		fmt.Fprintf(&b, "Convection %s in with %s.\n", sets, count(v.Rolls, "roll"))
	default:
		fmt.Fprintf(&b, "Convection %s in at a wavelength of %.3g m, two rolls.\n", sets, v.Wavelength.In(units.Metre))
	}
	if v.Onset.Oscillates() {
		b.WriteString("It begins as an oscillation.\n")
	}
	if v.GrowthTime > 0 {
		fmt.Fprintf(&b, "What grows fastest has a wavelength of %.3g m, and grows by a factor e in %s.\n",
			v.FastestWavelength.In(units.Metre), duration(v.GrowthTime))
	}
	return b.String()
}

func count(n int, what string) string {
	if n == 1 {
		return "1 " + what
	}
	return fmt.Sprintf("%d %ss", n, what)
}

// duration writes a time in the unit that a person would choose.
func duration(t units.Time) string {
	for _, u := range []struct {
		unit units.Time
		name string
	}{{units.Year, "years"}, {units.Day, "days"}, {units.Hour, "hours"}, {units.Minute, "minutes"}} {
		if t >= 2*u.unit {
			return fmt.Sprintf("%.3g %s", t.In(u.unit), u.name)
		}
	}
	return fmt.Sprintf("%.3g seconds", t.In(units.Second))
}

// Judge says whether a layer convects, at which wavelength, and how soon. A
// layer that stays at rest does so against small disturbances; what else a tank
// or a vessel of hot fluid needs to be safe, it does not say.
func Judge(l boussinesq.Layer, c Conditions) (Verdict, error) {
	p, rayleigh, err := c.pose(l)
	if err != nil {
		return Verdict{}, err
	}
	kappa, err := l.Material.Diffusivity()
	if err != nil {
		return Verdict{}, err
	}
	v := Verdict{Rayleigh: rayleigh, Layer: c.layer(p)}
	if v.Layer.Prandtl, err = l.Prandtl(); err != nil {
		return Verdict{}, err
	}
	s, err := NewSolver(v.Layer, nil)
	if err != nil {
		return Verdict{}, err
	}
	if v.Onset, v.Rolls, err = c.onset(s, p); err != nil && !errors.Is(err, ErrNotConverged) {
		if !errors.Is(err, ErrNoOnset) {
			return Verdict{}, err
		}
		v.Critical = math.Inf(1)
		return v, nil
	}
	v.Critical, v.Wavelength = v.Onset.Value, units.Length(v.Onset.Wavelength)*l.Depth
	v.Ratio = rayleigh / v.Critical
	v.Convects = v.Ratio > 1
	if !v.Convects {
		return v, err
	}
	g, growthErr := s.Fastest(rayleigh)
	switch {
	case errors.Is(growthErr, ErrStable): // by less than round-off above onset
		return v, err
	case growthErr != nil && !errors.Is(growthErr, ErrNotConverged):
		return v, growthErr
	}
	v.Fastest, v.FastestWavelength = g, units.Length(g.Wavelength)*l.Depth
	v.GrowthTime = units.Time(float64(l.Depth) * float64(l.Depth) / float64(kappa) / g.Rate)
	return v, errors.Join(err, growthErr)
}

// onset returns the onset of a problem, in the box if there is one.
func (c Conditions) onset(s *Solver, p problem) (Onset, int, error) {
	if p.aspect == 0 {
		o, err := s.Critical()
		return o, 0, err
	}
	first, _, err := s.InBox(Search{}, Box{Aspect: p.aspect, Sides: c.Sides})
	return first.Onset, first.Rolls, err
}

// Odds is the verdict on a layer some of whose parameters are ranges.
type Odds struct {
	// Best is the verdict at the best values.
	Best Verdict

	// Probability is that of convection: the share of the layers drawn from
	// the ranges whose Rayleigh number exceeds the critical one.
	Probability float64

	// Ratio is the sample of Rayleigh numbers over critical ones, zero where
	// there is no onset. Its Influences say which range matters.
	Ratio *boussinesq.Sample
}

// String states the odds in words.
func (o Odds) String() string {
	return fmt.Sprintf("%sOver the ranges given, it convects with a probability of %.3g.\n", o.Best, o.Probability)
}

// JudgeUncertain says how likely a layer with ranges of parameters convects. It
// draws layers from the ranges, as [boussinesq.Uncertain.Sample] does, and
// compares each one's Rayleigh number with its own critical one, which it
// computes once for each problem that differs. The context stops it.
func JudgeUncertain(ctx context.Context, u boussinesq.Uncertain, c Conditions, settings *boussinesq.Settings) (Odds, error) {
	best, err := Judge(u.Layer, c)
	if err != nil {
		return Odds{}, err
	}
	known := make(map[problem]float64)
	ratio := func(l boussinesq.Layer) (float64, error) {
		if err := ctx.Err(); err != nil {
			return 0, err
		}
		p, rayleigh, err := c.pose(l)
		if err != nil {
			return 0, err
		}
		critical, ok := known[p]
		if !ok {
			if critical, err = c.critical(p); err != nil {
				return 0, err
			}
			known[p] = critical
		}
		return rayleigh / critical, nil
	}
	sample, err := u.Sample(ratio, settings)
	if err != nil {
		return Odds{Best: best}, fmt.Errorf("stability: odds of convection: %w", err)
	}
	return Odds{Best: best, Probability: sample.Above(1), Ratio: sample}, nil
}

// critical returns the critical Rayleigh number of a problem, +Inf for none.
func (c Conditions) critical(p problem) (float64, error) {
	s, err := NewSolver(c.layer(p), nil)
	if err != nil {
		return 0, err
	}
	o, _, err := c.onset(s, p)
	switch {
	case errors.Is(err, ErrNoOnset):
		return math.Inf(1), nil
	case err != nil && !errors.Is(err, ErrNotConverged):
		return 0, err
	}
	return o.Value, nil
}
