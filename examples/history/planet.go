package main

import (
	"math"

	"gonum.org/v1/gonum/stat/distuv"

	"example.org/overturn/boussinesq"
	"example.org/overturn/scaling"
	"example.org/overturn/scaling/history"
	"example.org/overturn/scaling/uncertainty"
	"example.org/overturn/units"
)

// The planet, all invented: radii, gravity and masses.
const (
	radius, coreRadius   = 4650 * units.Kilometre, 2300 * units.Kilometre
	mantleMass, coreMass = 1.5e24 * units.Kilogram, 5.3e23 * units.Kilogram
	gravity              = 6.3 * units.MetrePerSecondSquared
	surface              = units.Temperature(260)
)

// inputs is what is not known, and how well it is.
var inputs = []uncertainty.Input{
	{Name: "start of the mantle, K", Distribution: distuv.Uniform{Min: 1750, Max: 2050}},
	{Name: "start of the core above it, K", Distribution: distuv.Uniform{Min: 0, Max: 500}},
	{Name: "viscosity at 1600 K, Pa s", Distribution: uncertainty.LogUniform{Min: 1e20, Max: 1e22}},
	{Name: "activation energy, J/mol", Distribution: distuv.Normal{Mu: 320e3, Sigma: 25e3}},
	{Name: "heat production, Earth's", Distribution: distuv.LogNormal{Mu: 0, Sigma: 0.2}},
	{Name: "conductivity, W/(m K)", Distribution: distuv.NewTriangle(2.8, 4.6, 3.6, nil)},
	{Name: "prefactor of the lid law", Distribution: distuv.Uniform{Min: 0.47, Max: 0.53}},
}

// planet builds the body for one set of the inputs.
func planet(in []float64) (history.Body, error) {
	start := units.Temperature(in[0])
	creep := scaling.Arrhenius{Reference: units.DynamicViscosity(in[2]), Anchor: 1600, Energy: units.MolarEnergy(in[3])}
	rock := history.McDonoughSun()
	rock.Potassium, rock.Thorium, rock.Uranium = in[4]*rock.Potassium, in[4]*rock.Thorium, in[4]*rock.Uranium
	heating, err := history.NewRadiogenic(rock, history.Isotopes(), age)
	if err != nil {
		return history.Body{}, err
	}
	layer := boussinesq.Layer{
		Material: boussinesq.Material{Density: 3900, Expansivity: 2.5e-5, Conductivity: units.Conductivity(in[5]), SpecificHeat: 1200},
		Depth:    radius - coreRadius, Gravity: gravity,
	}
	return history.Body{Surface: surface, Reservoirs: []history.Reservoir{
		{
			Name: "core", Mass: coreMass, SpecificHeat: 800, Area: sphere(coreRadius), Start: start.Add(units.TemperatureDifference(in[1])),
			Loss: history.BottomLayer{Layer: layer, Viscosity: creep, Critical: scaling.CriticalFree},
		},
		{
			Name: "mantle", Mass: mantleMass, SpecificHeat: 1200, Area: sphere(radius), Start: start, Heating: heating,
			Loss: history.StagnantLid{Layer: layer, Viscosity: creep, Law: scaling.LidLaw{Prefactor: in[6], Drop: 2.24}},
		},
	}}, nil
}

func sphere(r units.Length) units.Area { return units.Area(4 * math.Pi * float64(r) * float64(r)) }
