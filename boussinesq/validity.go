package boussinesq

import (
	"fmt"
	"math"

	"example.org/overturn/units"
)

// Bounds of the criteria of [Layer.Validity].
const (
	// TenPercent is the bound on each change that the approximation leaves
	// out: the choice of Gray & Giorgini (1976), from memory.
	TenPercent = 0.1

	// MachBound is the Mach number below which flow counts as
	// incompressible: common practice.
	MachBound = 0.3

	// InertiaBound is the inverse of the Prandtl number above which inertia
	// no longer matters near onset: common practice. At high Rayleigh
	// numbers ask for a small [Layer.Reynolds] as well.
	InertiaBound = 0.01
)

// Verdict is the outcome of a [Criterion].
type Verdict int

// The outcomes.
const (
	Holds     Verdict = iota // the number is within its bound
	Strained                 // the number exceeds its bound
	NotJudged                // the material does not give what the number needs
)

// String returns the verdict in words.
func (v Verdict) String() string {
	switch v {
	case Holds:
		return "holds"
	case Strained:
		return "strained"
	case NotJudged:
		return "not judged"
	}
	return fmt.Sprintf("Verdict(%d)", int(v))
}

// Criterion is one condition of the Boussinesq approximation, or of the
// neglect of inertia, applied to a layer: Value should stay below Bound.
type Criterion struct {
	Name     string // for example "thermal expansion"
	Formula  string // of Value
	Value    float64
	Bound    float64
	Verdict  Verdict
	Sentence string // what the number says about this layer, plainly
	Source   string // of the condition
}

// Excess returns Value over Bound: by how much the approximation is strained
// where it is greater than 1.
func (c Criterion) Excess() float64 { return c.Value / c.Bound }

// String returns the criterion in one line.
func (c Criterion) String() string {
	if c.Verdict == NotJudged {
		return fmt.Sprintf("%s: %v. %s", c.Name, c.Verdict, c.Sentence)
	}
	return fmt.Sprintf("%s: %s = %.2g, %v (bound %.2g). %s", c.Name, c.Formula, c.Value, c.Verdict, c.Bound, c.Sentence)
}

// Validity returns each criterion of the approximation for this layer, in a
// fixed order: those that need the layer only, then those that need
// [Material.BulkModulus] and [Material.Sensitivity].
//
// Temperature differences are the scale θ of [Layer.TemperatureScale]. A layer
// of given flux that convects well keeps a smaller difference: its criteria
// err on the safe side.
func (l Layer) Validity() ([]Criterion, error) {
	theta, err := l.TemperatureScale()
	if err != nil {
		return nil, err
	}
	v := validity{l, float64(theta)}
	list := []Criterion{
		v.expansion(),
		v.dissipation(),
		v.adiabat(),
		v.mihaljan(),
		v.inertia(),
		v.compression(),
		v.mach(),
		v.change("viscosity", l.Material.Sensitivity.Viscosity, "let the model carry a viscosity law"),
		v.change("expansivity", l.Material.Sensitivity.Expansivity, "buoyancy is not proportional to temperature"),
		v.change("conductivity", l.Material.Sensitivity.Conductivity, "let the model carry a law of conductivity"),
		v.change("specific heat", l.Material.Sensitivity.SpecificHeat, "let the model carry a law of heat capacity"),
	}
	for i := range list {
		if _, err := inRange(list[i].Name, list[i].Value); err != nil {
			return nil, err
		}
		list[i].judge()
	}
	return list, nil
}

// judge gives the verdict of a criterion that has a value.
func (c *Criterion) judge() {
	if c.Verdict != NotJudged && c.Value > c.Bound {
		c.Verdict = Strained
	}
}

// validity is a checked layer with its temperature scale in kelvins.
type validity struct {
	Layer
	theta float64
}

func (v validity) expansion() Criterion {
	x := float64(v.Material.Expansivity) * v.theta
	return Criterion{
		Name: "thermal expansion", Formula: "α ΔT", Value: x, Bound: TenPercent,
		Sentence: fmt.Sprintf("Density changes by %s with temperature; the approximation keeps that in the buoyancy alone.", percent(x)),
		Source:   "Spiegel & Veronis (1960); bound: Gray & Giorgini (1976), from memory",
	}
}

func (v validity) dissipation() Criterion {
	x := v.dissipationNumber()
	return Criterion{
		Name: "dissipation number", Formula: "α g d/c_p", Value: x, Bound: TenPercent,
		Sentence: fmt.Sprintf("Viscous heating, which is left out, comes to about %s of the convected heat.", percent(x)),
		Source:   "Spiegel & Veronis (1960); Jarvis & McKenzie (1980); bound: Gray & Giorgini (1976), from memory",
	}
}

func (v validity) adiabat() Criterion {
	mean := v.Top.Add(units.TemperatureDifference(v.theta / 2))
	x := float64(v.adiabaticDrop(mean)) / v.theta
	return Criterion{
		Name: "adiabatic temperature change", Formula: "T_mean (exp(Di) − 1)/ΔT", Value: x, Bound: TenPercent,
		Sentence: fmt.Sprintf("Compression alone warms what sinks through the layer by %s of the temperature difference, "+
			"and that part drives nothing.", percent(x)),
		Source: "Jeffreys (1930); bound: Gray & Giorgini (1976), from memory",
	}
}

func (v validity) mihaljan() Criterion {
	speed := float64(v.Material.diffusivity()) / float64(v.Depth)
	x := speed / v.theta * speed / float64(v.Material.SpecificHeat)
	return Criterion{
		Name: "kinetic energy against heat", Formula: "κ²/(c_p d² ΔT)", Value: x, Bound: TenPercent,
		Sentence: fmt.Sprintf("At the speed of heat diffusion, kinetic energy is %.1g of the heat that drives it.", x),
		Source:   "Mihaljan (1962); bound: as for the other criteria",
	}
}

func (v validity) inertia() Criterion {
	x := 1 / v.Material.prandtl()
	return Criterion{
		Name: "inertia", Formula: "1/Pr", Value: x, Bound: InertiaBound,
		Sentence: fmt.Sprintf("Momentum diffuses %.2g times as fast as heat; a model of infinite Prandtl number takes it for instantaneous.", 1/x),
		Source:   "common practice; not a condition of the Boussinesq approximation itself",
	}
}

func (v validity) compression() Criterion {
	c := Criterion{
		Name: "compression", Formula: "ρ g d/K", Bound: TenPercent,
		Source: "depth against density scale height: Spiegel & Veronis (1960); bound: Gray & Giorgini (1976), from memory",
	}
	if v.Material.BulkModulus == 0 {
		return c.notJudged("The material gives no bulk modulus.")
	}
	c.Value = v.compressionNumber()
	c.Sentence = fmt.Sprintf("The weight of the layer compresses its base by %s; the depth is that part of a density scale height.", percent(c.Value))
	return c
}

func (v validity) mach() Criterion {
	c := Criterion{
		Name: "Mach number", Formula: "(α ΔT ρ g d/K)^½", Bound: MachBound,
		Source: "common practice",
	}
	if v.Material.BulkModulus == 0 {
		return c.notJudged("The material gives no bulk modulus.")
	}
	c.Value = math.Sqrt(float64(v.Material.Expansivity) * v.theta * v.compressionNumber())
	c.Sentence = fmt.Sprintf("Without friction buoyancy would drive the fluid to %s of the speed of sound; with it, less.", percent(c.Value))
	return c
}

// change judges how much a property varies over the temperature scale.
func (v validity) change(property string, perKelvin units.Expansivity, advice string) Criterion {
	c := Criterion{
		Name: "change of " + property, Formula: "|d ln x/dT| ΔT", Bound: TenPercent,
		Source: "Gray & Giorgini (1976), from memory",
	}
	if perKelvin == 0 {
		return c.notJudged(fmt.Sprintf("The material does not say how %s changes with temperature.", property))
	}
	c.Value = math.Abs(float64(perKelvin)) * v.theta
	c.Sentence = fmt.Sprintf("Over the temperature difference %s changes by about %s.", property, factor(c.Value))
	if c.Value > c.Bound {
		c.Sentence = fmt.Sprintf("Over the temperature difference %s changes by about %s: %s.", property, factor(c.Value), advice)
	}
	return c
}

func (v validity) compressionNumber() float64 {
	return float64(v.Material.Density) * float64(v.Gravity) * float64(v.Depth) / float64(v.Material.BulkModulus)
}

func (c Criterion) notJudged(why string) Criterion {
	c.Verdict, c.Sentence = NotJudged, why
	return c
}

// percent prints a share to two digits.
func percent(x float64) string {
	if x > 0.995 {
		return fmt.Sprintf("%.0f %%", 100*x)
	}
	return fmt.Sprintf("%.2g %%", 100*x)
}

// factor prints exp(x), as a percentage where it is close to 1.
func factor(x float64) string {
	if x < 0.5 {
		return percent(x)
	}
	return fmt.Sprintf("a factor %.2g", math.Exp(x))
}
