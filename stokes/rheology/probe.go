package rheology

import (
	"errors"
	"fmt"
	"math"
)

// A Domain is the range of temperatures and depths over which a law will be
// used.
type Domain struct {
	ColdestTemperature, HottestTemperature float64
	Top, Bottom                            float64 // depths
}

// probed is how many temperatures, and how many depths, Probe tries.
const probed = 33

// Probe tries a law, the caller's own or one of this package, over a domain in
// the way the solvers use it and returns what is wrong, all faults joined: a
// viscosity that is not positive and finite, one that depends on where in its
// row a cell is or on the row's length, one that changes from call to call, a
// row that cannot be its own destination, a temperature that was written to.
// It first asks [Check].
func Probe(law Law, d Domain) error {
	if err := first(
		Check(law),
		anyFinite("ColdestTemperature of Domain", d.ColdestTemperature),
		anyFinite("HottestTemperature of Domain", d.HottestTemperature),
		anyFinite("Top of Domain", d.Top),
		anyFinite("Bottom of Domain", d.Bottom),
	); err != nil {
		return err
	}
	temperature := make([]float64, probed)
	for i := range temperature {
		w := float64(i) / (probed - 1)
		temperature[i] = (1-w)*d.ColdestTemperature + w*d.HottestTemperature
	}
	for k := range probed {
		w := float64(k) / (probed - 1)
		if err := probeRow(law, temperature, (1-w)*d.Top+w*d.Bottom); err != nil {
			return err
		}
	}
	return nil
}

func probeRow(law Law, temperature []float64, depth float64) error {
	var faults []error
	fault := func(format string, args ...any) {
		faults = append(faults, fmt.Errorf("rheology: at depth %g "+format, append([]any{depth}, args...)...))
	}
	given := append([]float64(nil), temperature...)
	eta := make([]float64, len(given))
	law.ViscosityTo(eta, given, depth)
	if i := differ(given, temperature); i >= 0 {
		fault("the law changes temperature %g to %g", temperature[i], given[i])
		copy(given, temperature)
	}
	for i, v := range eta {
		if !finite(v) || v <= 0 {
			fault("and temperature %g the viscosity is %g, want finite and > 0", temperature[i], v)
			break
		}
	}

	again := make([]float64, len(given))
	law.ViscosityTo(again, given, depth)
	if i := differ(again, eta); i >= 0 {
		fault("and temperature %g a second call gives %g after %g", temperature[i], again[i], eta[i])
	}
	for i := range again {
		law.ViscosityTo(again[i:i+1], given[i:i+1], depth)
	}
	if i := differ(again, eta); i >= 0 {
		fault("and temperature %g a cell alone has %g, in a row %g", temperature[i], again[i], eta[i])
	}
	law.ViscosityTo(given, given, depth)
	if i := differ(given, eta); i >= 0 {
		fault("and temperature %g a row that is its own destination has %g, want %g", temperature[i], given[i], eta[i])
	}
	return errors.Join(faults...)
}

// differ returns the first place where two rows differ in their bits, -1 if
// nowhere.
func differ(a, b []float64) int {
	for i, v := range a {
		if math.Float64bits(v) != math.Float64bits(b[i]) {
			return i
		}
	}
	return -1
}
