package boussinesq

import (
	"fmt"
	"math"
	"slices"
	"strings"

	"example.org/overturn/units"
	"gonum.org/v1/gonum/stat/distuv"
)

// Shape says how probability is spread over a [Range].
type Shape int

// The shapes of a range. The first two have sharp ends. The last two put Low
// and High one standard deviation either side of the middle, so that a third
// of the draws falls outside.
const (
	Uniform    Shape = iota // between Low and High all alike
	LogUniform              // between Low and High, each decade alike
	Normal                  // the 16 and 84 % points of a normal distribution
	LogNormal               // the 16 and 84 % points of a log-normal distribution
)

var shapes = []string{Uniform: "uniform", LogUniform: "log-uniform", Normal: "normal", LogNormal: "log-normal"}

// known reports whether s is one of the constants.
func (s Shape) known() bool { return s >= 0 && int(s) < len(shapes) }

// String returns the name of the shape.
func (s Shape) String() string {
	if !s.known() {
		return fmt.Sprintf("Shape(%d)", int(s))
	}
	return shapes[s]
}

// MarshalText returns the name of the shape.
func (s Shape) MarshalText() ([]byte, error) {
	if !s.known() {
		return nil, s.unknown(s.String())
	}
	return []byte(shapes[s]), nil
}

// UnmarshalText sets the shape by its name.
func (s *Shape) UnmarshalText(text []byte) error {
	i := slices.Index(shapes, string(text))
	if i < 0 {
		return s.unknown(fmt.Sprintf("%q", text))
	}
	*s = Shape(i)
	return nil
}

func (Shape) unknown(value string) error {
	return &FieldError{Field: "Shape", Value: value, Want: "one of " + strings.Join(shapes, ", ")}
}

// logarithmic reports whether the shape lives on a scale of ratios.
func (s Shape) logarithmic() bool { return s == LogUniform || s == LogNormal }

// Range says how uncertain one parameter is. The zero Range says that it is
// certain.
type Range[Q units.Quantity] struct {
	Low, High Q
	Shape     Shape // default [Uniform]
}

// Between returns the range from low to high, all values alike.
func Between[Q units.Quantity](low, high Q) Range[Q] {
	return Range[Q]{Low: low, High: high}
}

// Decades returns the range from low to high, all decades alike: for a
// parameter known to an order of magnitude.
func Decades[Q units.Quantity](low, high Q) Range[Q] {
	return Range[Q]{Low: low, High: high, Shape: LogUniform}
}

// PlusMinus returns a normal distribution of the given standard deviation. For
// an absolute temperature there is [PlusMinusTemperature].
func PlusMinus[Q units.Quantity](mean, deviation Q) Range[Q] {
	return Range[Q]{Low: mean - deviation, High: mean + deviation, Shape: Normal}
}

// PlusMinusTemperature is [PlusMinus] for an absolute temperature, whose
// deviation is a difference.
func PlusMinusTemperature(mean units.Temperature, deviation units.TemperatureDifference) Range[units.Temperature] {
	return Range[units.Temperature]{Low: mean.Add(-deviation), High: mean.Add(deviation), Shape: Normal}
}

// IsZero reports whether the range leaves its parameter certain.
func (r Range[Q]) IsZero() bool { return r == Range[Q]{} }

// Quantile returns the value that a share p of the distribution lies below,
// 0 < p < 1.
func (r Range[Q]) Quantile(p float64) (Q, error) {
	if err := r.check("Range"); err != nil {
		return 0, err
	}
	if !(p > 0 && p < 1) {
		return 0, &FieldError{Field: "probability", Value: fmt.Sprint(p), Want: "between 0 and 1"}
	}
	return Q(quantile(r.Shape, float64(r.Low), float64(r.High), p)), nil
}

func (r Range[Q]) check(field string) error {
	if err := first(finite(field+".Low", r.Low), finite(field+".High", r.High)); err != nil {
		return err
	}
	if !r.Shape.known() {
		return &FieldError{Field: field + ".Shape", Value: r.Shape.String(), Want: "one of " + strings.Join(shapes, ", ")}
	}
	if r.Low > r.High {
		return &FieldError{Field: field + ".High", Value: fmt.Sprint(r.High), Want: "at least a Low of " + fmt.Sprint(r.Low)}
	}
	if r.Shape.logarithmic() {
		return positive(field+".Low", r.Low)
	}
	return nil
}

// quantile inverts the cumulative distribution of a checked range.
func quantile(s Shape, low, high, p float64) float64 {
	if s.logarithmic() {
		low, high = math.Log(low), math.Log(high)
	}
	q := low + p*(high-low)
	if s == Normal || s == LogNormal {
		q = distuv.Normal{Mu: low + (high-low)/2, Sigma: (high - low) / 2}.Quantile(p)
	}
	if s.logarithmic() {
		q = math.Exp(q)
	}
	return q
}

// Ranges says which parameters of a [Layer] are uncertain. A parameter whose
// range is zero keeps the layer's own value. [Preset.Ranges] fills in those of
// a material.
type Ranges struct {
	Density      Range[units.Density]
	Expansivity  Range[units.Expansivity]
	Conductivity Range[units.Conductivity]
	SpecificHeat Range[units.SpecificHeat]
	Viscosity    Range[units.DynamicViscosity]

	Depth      Range[units.Length]
	Gravity    Range[units.Acceleration]
	Top        Range[units.Temperature]
	Bottom     Range[units.Temperature]
	BottomFlux Range[units.HeatFlux]
	Heating    Range[units.VolumetricHeating]
}

// parameter is one uncertain parameter, its type forgotten.
type parameter struct {
	name      string
	shape     Shape
	low, high float64 // SI
	set       func(*Layer, float64)
}

// parameters lists the uncertain parameters, in the order of the fields.
func (r Ranges) parameters() ([]parameter, error) {
	var list []parameter
	err := first(
		vary(&list, "Density", r.Density, func(l *Layer) *units.Density { return &l.Material.Density }),
		vary(&list, "Expansivity", r.Expansivity, func(l *Layer) *units.Expansivity { return &l.Material.Expansivity }),
		vary(&list, "Conductivity", r.Conductivity, func(l *Layer) *units.Conductivity { return &l.Material.Conductivity }),
		vary(&list, "SpecificHeat", r.SpecificHeat, func(l *Layer) *units.SpecificHeat { return &l.Material.SpecificHeat }),
		vary(&list, "Viscosity", r.Viscosity, func(l *Layer) *units.DynamicViscosity { return &l.Material.Viscosity }),
		vary(&list, "Depth", r.Depth, func(l *Layer) *units.Length { return &l.Depth }),
		vary(&list, "Gravity", r.Gravity, func(l *Layer) *units.Acceleration { return &l.Gravity }),
		vary(&list, "Top", r.Top, func(l *Layer) *units.Temperature { return &l.Top }),
		vary(&list, "Bottom", r.Bottom, func(l *Layer) *units.Temperature { return &l.Bottom }),
		vary(&list, "BottomFlux", r.BottomFlux, func(l *Layer) *units.HeatFlux { return &l.BottomFlux }),
		vary(&list, "Heating", r.Heating, func(l *Layer) *units.VolumetricHeating { return &l.Heating }),
	)
	return list, err
}

// vary appends the parameter behind field to the list, unless it is certain.
func vary[Q units.Quantity](list *[]parameter, name string, r Range[Q], field func(*Layer) *Q) error {
	if r.IsZero() {
		return nil
	}
	*list = append(*list, parameter{
		name: name, shape: r.Shape, low: float64(r.Low), high: float64(r.High),
		set: func(l *Layer, x float64) { *field(l) = Q(x) },
	})
	return r.check("Ranges." + name)
}
