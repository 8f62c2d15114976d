package boussinesq

import (
	"fmt"
	"strings"

	"example.org/overturn/units"
)

// Status says how the value of a preset was obtained, and so how far to trust
// it.
type Status int

// What a value rests on.
const (
	Unknown    Status = iota // there is no value: fill it in
	Computed                 // computed from a reference formulation, or from other values of the same source
	Read                     // read in the source named
	FromMemory               // remembered, not read again: confirm it before you quote it
)

// String returns the status in words.
func (s Status) String() string {
	switch s {
	case Unknown:
		return "unknown"
	case Computed:
		return "computed"
	case Read:
		return "read in source"
	case FromMemory:
		return "from memory"
	}
	return fmt.Sprintf("Status(%d)", int(s))
}

// Property is one value of a [Preset].
type Property[Q units.Quantity] struct {
	Value  Q        // zero where Status is Unknown
	Range  Range[Q] // what the source gives; zero where it gives none
	Digits int      // significant digits that the source carries
	Status Status
	Source string
}

// Preset is a material with the origin of each of its values.
//
// A property that the source does not give, or that no single number can stand
// for, is Unknown and zero. [Material.Check] names it until it is filled in.
type Preset struct {
	Name       string // for [ByName]
	Title      string // of the material, in words
	Conditions string
	Note       string // what to watch, or empty

	Temperature units.Temperature // where Density holds

	Density      Property[units.Density]
	Expansivity  Property[units.Expansivity]
	Conductivity Property[units.Conductivity]
	SpecificHeat Property[units.SpecificHeat]
	Viscosity    Property[units.DynamicViscosity]
	BulkModulus  Property[units.Pressure]

	// Sensitivity is from memory throughout, to one or two digits.
	Sensitivity Sensitivity
}

// Presets returns the materials of this package, in a fixed order.
func Presets() []Preset { return append([]Preset(nil), presets...) }

// ByName returns the preset of that name, or an error that wraps
// [ErrUnknownPreset] and lists the names.
func ByName(name string) (Preset, error) {
	names := make([]string, len(presets))
	for i, p := range presets {
		if p.Name == name {
			return p, nil
		}
		names[i] = p.Name
	}
	return Preset{}, &FieldError{
		Field: "name", Value: fmt.Sprintf("%q", name),
		Want: "one of " + strings.Join(names, ", "), Err: ErrUnknownPreset,
	}
}

// Material returns the material of the best values.
func (p Preset) Material() Material {
	return Material{
		Name:                 p.Title,
		Conditions:           p.Conditions,
		Source:               p.source(),
		Density:              p.Density.Value,
		ReferenceTemperature: p.Temperature,
		Expansivity:          p.Expansivity.Value,
		Conductivity:         p.Conductivity.Value,
		SpecificHeat:         p.SpecificHeat.Value,
		Viscosity:            p.Viscosity.Value,
		BulkModulus:          p.BulkModulus.Value,
		Sensitivity:          p.Sensitivity,
	}
}

// Ranges returns the ranges that the sources give. Add those of your layer.
func (p Preset) Ranges() Ranges {
	return Ranges{
		Density:      p.Density.Range,
		Expansivity:  p.Expansivity.Range,
		Conductivity: p.Conductivity.Range,
		SpecificHeat: p.SpecificHeat.Range,
		Viscosity:    p.Viscosity.Range,
	}
}

// source says in one line where each value comes from.
func (p Preset) source() string {
	var parts []string
	for _, row := range []struct {
		name, source string
		status       Status
	}{
		{"density", p.Density.Source, p.Density.Status},
		{"expansivity", p.Expansivity.Source, p.Expansivity.Status},
		{"conductivity", p.Conductivity.Source, p.Conductivity.Status},
		{"specific heat", p.SpecificHeat.Source, p.SpecificHeat.Status},
		{"viscosity", p.Viscosity.Source, p.Viscosity.Status},
	} {
		if row.status == Unknown {
			parts = append(parts, row.name+": unknown")
			continue
		}
		parts = append(parts, fmt.Sprintf("%s: %s (%v)", row.name, row.source, row.status))
	}
	return strings.Join(parts, "; ")
}
