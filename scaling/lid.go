package scaling

import (
	"math"

	"example.org/overturn/boussinesq"
	"example.org/overturn/scaling/internal/check"
	"example.org/overturn/scaling/internal/root"
	"example.org/overturn/units"
)

// Viscosity is a viscosity that depends on temperature.
type Viscosity interface {
	// At returns η(T).
	At(units.Temperature) units.DynamicViscosity
	// Scale returns the viscous temperature scale |η/(dη/dT)| at T.
	Scale(units.Temperature) units.TemperatureDifference
}

// Arrhenius is the viscosity of thermally activated creep,
// η = Reference exp((E/R)(1/T - 1/Anchor)).
type Arrhenius struct {
	Reference units.DynamicViscosity // at Anchor
	Anchor    units.Temperature
	Energy    units.MolarEnergy // of activation, E
}

// At implements [Viscosity].
func (a Arrhenius) At(t units.Temperature) units.DynamicViscosity {
	r := float64(units.MolarGasConstant)
	return a.Reference * units.DynamicViscosity(math.Exp(float64(a.Energy)/r*(1/float64(t)-1/float64(a.Anchor))))
}

// Scale implements [Viscosity]: R T²/E.
func (a Arrhenius) Scale(t units.Temperature) units.TemperatureDifference {
	return units.TemperatureDifference(float64(units.MolarGasConstant) * float64(t) * float64(t) / float64(a.Energy))
}

// Check returns an error that names the first field without sense.
func (a Arrhenius) Check() error {
	return check.First(
		check.Positive(pkg, "Arrhenius.Reference", a.Reference),
		check.Positive(pkg, "Arrhenius.Anchor", a.Anchor),
		check.Positive(pkg, "Arrhenius.Energy", a.Energy),
	)
}

// Exponential is the linearised viscosity η = Reference exp(-(T-Anchor)/Fold).
type Exponential struct {
	Reference units.DynamicViscosity // at Anchor
	Anchor    units.Temperature
	Fold      units.TemperatureDifference // that changes viscosity by a factor e
}

// At implements [Viscosity].
func (x Exponential) At(t units.Temperature) units.DynamicViscosity {
	return x.Reference * units.DynamicViscosity(math.Exp(-float64(t.Sub(x.Anchor))/float64(x.Fold)))
}

// Scale implements [Viscosity]: Fold at any temperature.
func (x Exponential) Scale(units.Temperature) units.TemperatureDifference { return x.Fold }

// Check returns an error that names the first field without sense.
func (x Exponential) Check() error {
	return check.First(
		check.Positive(pkg, "Exponential.Reference", x.Reference),
		check.Positive(pkg, "Exponential.Anchor", x.Anchor),
		check.Positive(pkg, "Exponential.Fold", x.Fold),
	)
}

// LidLaw is the law of the layer that convects under a stagnant lid: heat flux
// and temperature drop of its cold boundary layer,
//
//	q = Prefactor k (ρ g α/(κη_i))^(1/3) ΔT_v^(4/3),  ΔT_rh = Drop ΔT_v,
//
// with ΔT_v the viscous temperature scale of the interior.
type LidLaw struct {
	Prefactor, Drop float64
}

// Lid laws. The first two fluxes differ by 13%.
var (
	// DavailleJaupartLid is measured in the laboratory (Davaille & Jaupart 1993,
	// from memory).
	DavailleJaupartLid = LidLaw{Prefactor: 0.47, Drop: 2.24}

	// SolomatovMoresiLid is computed in two dimensions for n = 1 (Solomatov &
	// Moresi 2000, from memory).
	SolomatovMoresiLid = LidLaw{Prefactor: 0.53, Drop: 2.4}
)

// MarginalLid returns the lid law of a boundary layer with a given temperature
// drop, in viscous scales, and critical Rayleigh number: its prefactor is
// drop^(4/3) Rd^(-1/3).
func MarginalLid(drop, rd float64) (LidLaw, error) {
	err := check.First(check.Positive(pkg, "drop", drop), check.Positive(pkg, "critical Rayleigh number", rd))
	if err != nil {
		return LidLaw{}, err
	}
	s := LidLaw{Prefactor: math.Pow(drop, 4./3) / math.Cbrt(rd), Drop: drop}
	if err := s.Check(); err != nil {
		return LidLaw{}, err
	}
	return s, nil
}

// CriticalRayleigh returns the local critical Rayleigh number that the two
// constants imply, Drop⁴/Prefactor³: 242.5 for [DavailleJaupartLid].
func (s LidLaw) CriticalRayleigh() (float64, error) {
	if err := s.Check(); err != nil {
		return 0, err
	}
	return check.Result(pkg, "critical Rayleigh number", math.Pow(s.Drop, 4)/math.Pow(s.Prefactor, 3))
}

// Check returns an error that names the first field without sense.
func (s LidLaw) Check() error {
	return check.First(check.Positive(pkg, "LidLaw.Prefactor", s.Prefactor), check.Positive(pkg, "LidLaw.Drop", s.Drop))
}

// Lid is the structure of a layer that convects under a stagnant lid.
type Lid struct {
	Interior         units.Temperature
	Base             units.Temperature // of the lid, Interior - RheologicalDrop
	ViscousScale     units.TemperatureDifference
	RheologicalDrop  units.TemperatureDifference // that drives convection
	FrankKamenetskii float64                     // (Interior - Top)/ViscousScale
	InteriorRayleigh float64                     // on the drop Interior - Top, with η(Interior)
	Regime           Regime

	HeatFlux       units.HeatFlux
	Nusselt        float64      // HeatFlux over conduction of Interior - Top through the depth
	Thickness      units.Length // of the lid
	LayerThickness units.Length // of the boundary layer below it
}

// Lid returns the structure of a layer whose interior is at the given
// temperature. The layer gives material, depth, gravity and Top; its Viscosity
// is not used.
//
// A lid that would be thicker than the layer is reported as [ErrOutOfRange]
// beside the answer, and so is a viscosity contrast too small for a lid.
func (s LidLaw) Lid(l boussinesq.Layer, eta Viscosity, interior units.Temperature) (Lid, error) {
	if err := s.check(l, eta); err != nil {
		return Lid{}, err
	}
	if err := check.Above(pkg, "interior temperature", interior, l.Top); err != nil {
		return Lid{}, err
	}
	k, d := float64(l.Material.Conductivity), float64(l.Depth)
	drop := interior.Sub(l.Top)
	scale := eta.Scale(interior)
	q := s.flux(l, eta, interior)
	lid := Lid{
		Interior: interior, ViscousScale: scale,
		RheologicalDrop:  units.TemperatureDifference(s.Drop) * scale,
		FrankKamenetskii: float64(drop) / float64(scale),
		HeatFlux:         q,
		Nusselt:          float64(q) * d / (k * float64(drop)),
	}
	lid.Base = interior.Add(-lid.RheologicalDrop)
	lid.LayerThickness = units.Length(k * float64(lid.RheologicalDrop) / float64(q))
	lid.Thickness = units.Length(k * float64(lid.Base.Sub(l.Top)) / float64(q))
	lid.InteriorRayleigh = buoyancy(l) * float64(drop) * d * d * d / float64(eta.At(interior))
	var err error
	if lid.Regime, err = RegimeOf(lid.FrankKamenetskii, 1); err != nil {
		return Lid{}, err
	}
	if _, err := check.Result(pkg, "heat flux under the lid", q); err != nil {
		return Lid{}, err
	}
	return lid, lid.inRange(l)
}

func (lid Lid) inRange(l boussinesq.Layer) error {
	var out []Violation
	if lid.Regime != StagnantLidRegime {
		out = append(out, Violation{Limit{LidParameter, StagnantLidBound, math.Inf(1)}, lid.FrankKamenetskii / 2})
	}
	if total := lid.Thickness + lid.LayerThickness; total > l.Depth {
		// Conduction carries more than convection would: Nu < 1.
		least := lid.InteriorRayleigh / math.Pow(lid.Nusselt, 3)
		out = append(out, Violation{Limit{InteriorRayleighNumber, least, math.Inf(1)}, lid.InteriorRayleigh})
	}
	if out == nil {
		return nil
	}
	return &RangeError{Law: "stagnant lid", Violations: out}
}

// InteriorFor returns the interior temperature at which the flux through the
// lid is q: that of a layer in steady state which is heated from within, with
// q = Heating · Depth.
func (s LidLaw) InteriorFor(l boussinesq.Layer, eta Viscosity, q units.HeatFlux) (units.Temperature, error) {
	if err := check.First(s.check(l, eta), check.Positive(pkg, "heat flux", q)); err != nil {
		return 0, err
	}
	return s.solve(l, "heat flux", float64(q), func(t units.Temperature) float64 {
		return math.Log(float64(s.flux(l, eta, t)) / float64(q))
	})
}

// InteriorBetween returns the interior temperature of a layer between isothermal
// walls, heated from below: that at which the flux through the lid equals the
// flux of a marginally stable boundary layer at the bottom,
//
//	q = k (ρ g α/(κη Rd))^(1/3) (Bottom - T)^(4/3),
//
// with η at the mean temperature of that layer and the local critical Rayleigh
// number rd.
func (s LidLaw) InteriorBetween(l boussinesq.Layer, eta Viscosity, rd float64) (units.Temperature, error) {
	if err := check.First(s.check(l, eta), check.Positive(pkg, "critical Rayleigh number", rd), check.Above(pkg, "Layer.Bottom", l.Bottom, l.Top)); err != nil {
		return 0, err
	}
	k := float64(l.Material.Conductivity)
	f := func(x float64) float64 {
		t := units.Temperature(x)
		drop := float64(l.Bottom.Sub(t))
		below := k * math.Cbrt(buoyancy(l)/(float64(eta.At(t.Add(units.TemperatureDifference(drop/2))))*rd)) * math.Pow(drop, 4./3)
		return float64(s.flux(l, eta, t)) - below
	}
	low, high := float64(l.Top), float64(l.Bottom)
	x, err := root.Find(f, low, high, 1e-12*high)
	if err != nil {
		return 0, &FieldError{Package: string(pkg), Field: "Layer.Bottom", Value: l.Bottom.String(), Want: "hot enough for a convecting interior", Err: err}
	}
	return units.Temperature(x), nil
}

func (s LidLaw) solve(l boussinesq.Layer, field string, value float64, f func(units.Temperature) float64) (units.Temperature, error) {
	const hottest = 1e5 // kelvin: any rock, ice or syrup has long boiled
	x, err := root.Find(func(x float64) float64 { return f(units.Temperature(x)) }, float64(l.Top)*(1+1e-9), hottest, 0)
	if err != nil {
		return 0, &FieldError{Package: string(pkg), Field: field, Value: formatFloat(value), Want: "a flux that some interior temperature gives", Err: err}
	}
	return units.Temperature(x), nil
}

func (s LidLaw) flux(l boussinesq.Layer, eta Viscosity, t units.Temperature) units.HeatFlux {
	scale := float64(eta.Scale(t))
	q := s.Prefactor * float64(l.Material.Conductivity) * math.Cbrt(buoyancy(l)/float64(eta.At(t))) * scale * math.Cbrt(scale)
	return units.HeatFlux(q)
}

func (s LidLaw) check(l boussinesq.Layer, eta Viscosity) error {
	if err := s.Check(); err != nil {
		return err
	}
	if eta == nil {
		return &FieldError{Package: string(pkg), Field: "viscosity", Value: "nil", Want: "a Viscosity"}
	}
	if c, ok := eta.(interface{ Check() error }); ok {
		if err := c.Check(); err != nil {
			return err
		}
	}
	m := l.Material
	return check.First(
		check.Positive(pkg, "Material.Density", m.Density), check.Positive(pkg, "Material.Expansivity", m.Expansivity),
		check.Positive(pkg, "Material.Conductivity", m.Conductivity), check.Positive(pkg, "Material.SpecificHeat", m.SpecificHeat),
		check.Positive(pkg, "Layer.Depth", l.Depth), check.Positive(pkg, "Layer.Gravity", l.Gravity), check.Positive(pkg, "Layer.Top", l.Top),
	)
}

// buoyancy returns ρ g α/κ of a checked layer.
func buoyancy(l boussinesq.Layer) float64 {
	m := l.Material
	rho := float64(m.Density)
	kappa := float64(m.Conductivity) / (rho * float64(m.SpecificHeat))
	return rho * float64(l.Gravity) * float64(m.Expansivity) / kappa
}
