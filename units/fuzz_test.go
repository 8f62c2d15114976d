package units_test

import (
	"errors"
	"math"
	"slices"
	"strings"
	"testing"

	"example.org/overturn/units"
)

// FuzzParse checks that no text panics, that every error is one that a caller
// can act on, and that what was read is written so that it reads the same. The
// seeds are in testdata.
func FuzzParse(f *testing.F) {
	f.Fuzz(func(t *testing.T, text string) {
		parseBack[units.Velocity](t, text)
		parseBack[units.Temperature](t, text)
		parseBack[units.TemperatureDifference](t, text)
		parseBack[units.Dimensionless](t, text)
		parseBack[units.DynamicViscosity](t, text)

		u, err := units.ParseUnit(text)
		if err != nil {
			checkError(t, text, err)
			return
		}
		if !(u.Scale > 0) || math.IsInf(u.Scale, 0) {
			t.Errorf("%q has the size %v", text, u.Scale)
		}
		again, err := units.ParseUnit(u.Dimension.String())
		if err != nil || again.Dimension != u.Dimension {
			t.Errorf("%q has the dimension %v, which reads as %v: %v", text, u.Dimension, again.Dimension, err)
		}
	})
}

func parseBack[Q interface {
	units.Quantity
	String() string
}](t *testing.T, text string) {
	q, err := units.Parse[Q](text)
	if err != nil {
		checkError(t, text, err)
		return
	}
	if x := float64(q); math.IsNaN(x) || math.IsInf(x, 0) {
		t.Errorf("%q reads as %v", text, x)
	}
	back, err := units.Parse[Q](q.String())
	if err != nil || math.Float64bits(float64(back)) != math.Float64bits(float64(q)) {
		t.Errorf("%q reads as %v, which reads as %v: %v", text, q, back, err)
	}
}

func checkError(t *testing.T, text string, err error) {
	e, ok := errors.AsType[*units.ParseError](err)
	if !ok {
		t.Fatalf("%q: %T", text, err)
	}
	kinds := []error{units.ErrSyntax, units.ErrUnknownUnit, units.ErrDimension, units.ErrRange}
	if !slices.Contains(kinds, e.Err) || e.Text != text || e.Pos < 0 || e.Pos > len(text) || !strings.HasPrefix(text[e.Pos:], e.Found) {
		t.Errorf("%q: %#v", text, e)
	}
	if (e.Got != e.Want) != (e.Err == units.ErrDimension) {
		t.Errorf("%q: dimensions %v and %v with %v", text, e.Got, e.Want, e.Err)
	}
}

// FuzzRoundTrip checks that every float64 comes back from every unit.
func FuzzRoundTrip(f *testing.F) {
	for _, x := range awkward {
		f.Add(math.Float64bits(x), "cm/yr")
	}
	f.Add(math.Float64bits(1e-9), "ft/(degF s) K")
	f.Add(math.Float64bits(1e-9), "yr^0.5 m/s^1.5")
	f.Fuzz(func(t *testing.T, bits uint64, unit string) {
		v := units.Velocity(math.Float64frombits(bits))
		text, err := units.Format(v, unit, 0)
		if err != nil {
			return
		}
		back, err := units.Parse[units.Velocity](text)
		if err != nil || math.Float64bits(float64(back)) != bits {
			t.Errorf("%v in %q is %q, which reads as %v: %v", v, unit, text, back, err)
		}
	})
}
