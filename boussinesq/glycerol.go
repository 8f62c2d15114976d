package boussinesq

import (
	"errors"
	"fmt"
	"math"

	"example.org/overturn/units"
)

// ErrOutOfRange reports that a law was evaluated outside the range it was made
// for. The value is returned all the same.
var ErrOutOfRange = errors.New("outside the range of the law")

// GlycerolViscosity returns the viscosity of pure glycerol,
//
//	μ = 12.1 exp((t − 1233) t/(9900 + 70 t)) Pa s,   t in °C
//
// (Cheng 2008; law from memory), for 0 to 100 °C. Outside, the value comes with
// an error that wraps [ErrOutOfRange]. It is good to a few percent; water in
// the glycerol makes a greater difference.
func GlycerolViscosity(t units.Temperature) (units.DynamicViscosity, error) {
	if err := positive("temperature", t); err != nil {
		return 0, err
	}
	c := float64(t) - 273.15
	mu := units.DynamicViscosity(12.1 * math.Exp((c-1233)*c/(9900+70*c)))
	if c >= 0 && c <= 100 {
		return mu, nil
	}
	if err := positive("viscosity of glycerol", mu); err != nil { // near the pole at −141 °C
		return 0, err
	}
	return mu, &FieldError{Field: "temperature", Value: fmt.Sprint(t), Want: "0 to 100 °C", Err: ErrOutOfRange}
}
