package scaling_test

import (
	"errors"
	"fmt"
	"log"

	"example.org/overturn/boussinesq"
	"example.org/overturn/scaling"
	"example.org/overturn/units"
)

// A layer of rock 1000 km deep, and what is published about such a layer.
func Example() {
	layer := boussinesq.Layer{
		Material: boussinesq.Material{Density: 3300, Expansivity: 3e-5, Conductivity: 3.3, SpecificHeat: 1000, Viscosity: 1e21},
		Depth:    1000 * units.Kilometre, Gravity: 10, Top: 300, Bottom: 1700,
	}
	groups, err := scaling.GroupsOf(layer)
	if err != nil {
		log.Fatal(err)
	}
	groups.CellWidth = 1
	laws := scaling.Find(scaling.Query{
		Quantity: scaling.Nusselt, Geometry: scaling.HorizontalLayer, Walls: scaling.Free,
		Heating: scaling.FromBelow, Rheology: scaling.Isoviscous, Flow: scaling.Steady,
	})
	c := scaling.Compare(laws, groups)
	fmt.Printf("Ra = %.3g\n", groups.Rayleigh)
	for _, a := range c.Applied {
		fmt.Printf("Nu = %.1f: %s\n", a.Value, a.Law.Name)
	}
	for _, a := range c.OutOfRange {
		fmt.Printf("not in range: %s\n", a.Law.Name)
	}
	// Output:
	// Ra = 1.39e+06
	// Nu = 17.9: one-mode loop
	// Nu = 21.9: steady rolls, free walls, infinite Pr
	// not in range: steady rolls, free walls, finite Pr
}

// Outside its range a law still has a value.
func ExampleLaw_At() {
	nu, err := scaling.PorousElder().At(scaling.Groups{PorousRayleigh: 1000})
	fmt.Printf("Nu = %.0f\n", nu)
	fmt.Println(errors.Is(err, scaling.ErrOutOfRange))
	fmt.Println(err)
	// Output:
	// Nu = 25
	// true
	// scaling: porous layer: Ra_porous is 1000, want 40 to 400
}

func ExampleCell_Estimate() {
	layer := boussinesq.Layer{
		Material: boussinesq.Material{Density: 3300, Expansivity: 3e-5, Conductivity: 3.3, SpecificHeat: 1000, Viscosity: 1e21},
		Depth:    1000 * units.Kilometre, Gravity: 10, Top: 300, Bottom: 1700,
	}
	e, err := scaling.Cell{Width: 1, Core: scaling.ViscousCore}.Estimate(layer)
	if err != nil {
		log.Fatal(err)
	}
	fmt.Printf("heat flux %.0f mW/m²\n", e.HeatFlux.In(units.MilliwattPerSquareMetre))
	fmt.Printf("surface speed %.1f cm/yr\n", e.SurfaceSpeed.In(units.CentimetrePerYear))
	fmt.Printf("lithosphere %.0f km at the trench\n", e.EndThickness.In(units.Kilometre))
	fmt.Printf("stress %.1f MPa\n", e.RMSStress.In(units.Megapascal))
	// Output:
	// heat flux 101 mW/m²
	// surface speed 2.9 cm/yr
	// lithosphere 77 km at the trench
	// stress 5.5 MPa
}

// The lid of a planet of the size of a small moon, whose interior has 1700 K.
func ExampleLidLaw_Lid() {
	layer := boussinesq.Layer{
		Material: boussinesq.Material{Density: 3300, Expansivity: 3e-5, Conductivity: 3.3, SpecificHeat: 1000},
		Depth:    800 * units.Kilometre, Gravity: 1.8, Top: 250,
	}
	creep := scaling.Arrhenius{Reference: 1e19, Anchor: 1600, Energy: 300 * units.KilojoulePerMole}
	lid, err := scaling.DavailleJaupartLid.Lid(layer, creep, 1700)
	if err != nil {
		log.Fatal(err)
	}
	fmt.Printf("%v, θ = %.0f\n", lid.Regime, lid.FrankKamenetskii)
	fmt.Printf("lid %.0f km, flux %.1f mW/m²\n", lid.Thickness.In(units.Kilometre), lid.HeatFlux.In(units.MilliwattPerSquareMetre))
	// Output:
	// stagnant lid, θ = 18
	// lid 193 km, flux 21.8 mW/m²
}

// Five runs that approach Ra^(1/3) from above: is a power law tenable?
func ExampleFitPowerLaw() {
	var runs []scaling.Run
	for _, r := range [][2]float64{{1e4, 4.884}, {1e5, 10.534}, {1e6, 21.972}, {3e6, 31.11}, {1e7, 45.57}} {
		runs = append(runs, scaling.Run{Groups: scaling.Groups{Rayleigh: r[0], CellWidth: 1}, Value: r[1]})
	}
	fit, err := scaling.FitPowerLaw(runs, []scaling.Group{scaling.RayleighNumber}, nil)
	if err != nil {
		log.Fatal(err)
	}
	tenable, err := fit.Tenable()
	if err != nil {
		log.Fatal(err)
	}
	fmt.Println("exponent", fit.Exponents[0].Interval, "tenable:", tenable)
	for _, c := range fit.Compare([]scaling.Law{scaling.FreeRolls(scaling.ViscousCore)}) {
		fmt.Printf("%s: exponent %.3f, runs above it by %.0f%%\n", c.Law.Name, c.Exponent, 100*c.Bias)
	}
	local, err := scaling.LocalExponents(runs, scaling.RayleighNumber)
	if err != nil {
		log.Fatal(err)
	}
	for _, e := range local {
		fmt.Printf("from %.0e: %.3f\n", e.From, e.Exponent)
	}
	// Output:
	// exponent 0.3228 [0.316, 0.3297] tenable: true
	// steady rolls, free walls, infinite Pr: exponent 0.333, runs above it by 11%
	// from 1e+04: 0.334
	// from 1e+05: 0.319
	// from 1e+06: 0.317
	// from 3e+06: 0.317
}

func ExampleCriterion_Onset() {
	layer := boussinesq.Layer{
		Material: boussinesq.Material{Density: 3300, Expansivity: 3e-5, Conductivity: 3.3, SpecificHeat: 1000, Viscosity: 1e19},
		Depth:    400 * units.Kilometre, Gravity: 10, Top: 273, Bottom: 1600,
	}
	c, err := scaling.CriterionOf(scaling.FreeOverRigid)
	if err != nil {
		log.Fatal(err)
	}
	o, err := c.Onset(layer, 200)
	if err != nil {
		log.Fatal(err)
	}
	fmt.Printf("after %.0f Myr, drips %.0f km apart\n", o.Time.In(units.Megayear), o.Wavelength.In(units.Kilometre))
	// Output:
	// after 15 Myr, drips 89 km apart
}
