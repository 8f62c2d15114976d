package rheology

import "fmt"

// Limits keeps the viscosity of a law between two bounds: beyond them the
// material is as stiff or as soft as the bound. A solver's cost and accuracy
// depend on the contrast, so that a cut-off far above what matters for the flow
// is common practice for laws of Arrhenius kind.
type Limits struct {
	// Law is the law to bound.
	Law Law

	// Min and Max are the bounds. Default 0: no bound.
	Min, Max float64
}

// ViscosityTo implements [Law].
func (l Limits) ViscosityTo(dst, temperature []float64, depth float64) {
	l.Law.ViscosityTo(dst, temperature, depth)
	clamp(dst, l.Min, l.Max)
}

// Validate implements [Validator]; it checks the law inside too.
func (l Limits) Validate() error {
	return first(bounds("Limits", l.Min, l.Max), inside("Limits", l.Law))
}

// Scaled multiplies a law by a function of depth, which is called once a row:
// a stiffer layer, a soft channel. [Steps] makes such a function.
type Scaled struct {
	// Law is the law to scale.
	Law Law

	// Factor returns the multiplier of the viscosity at a depth, > 0.
	Factor func(depth float64) float64
}

// ViscosityTo implements [Law].
func (s Scaled) ViscosityTo(dst, temperature []float64, depth float64) {
	s.Law.ViscosityTo(dst, temperature, depth)
	f := s.Factor(depth)
	for i := range dst {
		dst[i] *= f
	}
}

// Validate implements [Validator]; it checks the law inside too.
func (s Scaled) Validate() error {
	if s.Factor == nil {
		return fmt.Errorf("rheology: Factor of Scaled is nil, want a function of depth")
	}
	return inside("Scaled", s.Law)
}

// clamp bounds a row between lo and hi, each of which 0 turns off.
func clamp(dst []float64, lo, hi float64) {
	if lo > 0 {
		for i, v := range dst {
			dst[i] = max(v, lo)
		}
	}
	if hi > 0 {
		for i, v := range dst {
			dst[i] = min(v, hi)
		}
	}
}

func bounds(of string, lo, hi float64) error {
	if err := first(notNegative("Min of "+of, lo), notNegative("Max of "+of, hi)); err != nil {
		return err
	}
	if hi > 0 && lo > hi {
		return fmt.Errorf("rheology: Min of %s is %g, want at most its Max, %g", of, lo, hi)
	}
	return nil
}

func inside(wrapper string, law Law) error {
	if err := Check(law); err != nil {
		return fmt.Errorf("rheology: Law of %s: %w", wrapper, err)
	}
	return nil
}
