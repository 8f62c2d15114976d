package scaling_test

import (
	"encoding/csv"
	"math"
	"os"
	"strconv"
	"testing"

	"github.com/stretchr/testify/require"

	"example.org/overturn/boussinesq"
	"example.org/overturn/scaling"
	"example.org/overturn/scaling/history"
	"example.org/overturn/scaling/lithosphere"
	"example.org/overturn/units"
)

// TestCheckValues runs every row of testdata/scaling.csv through the exported
// API. Definitions and sources stand beside the numbers in that file; here are
// the calls.
func TestCheckValues(t *testing.T) {
	file, err := os.Open("testdata/scaling.csv")
	require.NoError(t, err)
	defer file.Close()
	rows, err := csv.NewReader(file).ReadAll()
	require.NoError(t, err)
	calls := checkCalls()
	for _, row := range rows[1:] {
		id := row[0]
		t.Run(id+" "+row[1]+" "+row[2], func(t *testing.T) {
			call, ok := calls[id]
			require.True(t, ok, "row without a call")
			delete(calls, id)
			want, err := strconv.ParseFloat(row[3], 64)
			require.NoError(t, err)
			digits, err := strconv.Atoi(row[4])
			require.NoError(t, err)
			got, err := call()
			require.NoError(t, err)
			// half a unit of the last trusted digit
			tol := 0.5 * math.Pow(10, math.Floor(math.Log10(want))-float64(digits)+1)
			if !(math.Abs(got-want) <= tol) {
				t.Errorf("%.14g, want %.14g ± %.1g: %s; %s", got, want, tol, row[5], row[6])
			}
		})
	}
	require.Empty(t, calls, "calls without a row")
}

// value makes the result of a law a call: the rows that use a law outside its
// range say so.
func value(l scaling.Law, v scaling.Groups) func() (float64, error) {
	return func() (float64, error) { return l.At(v) }
}

// number makes any typed result a call.
func number[Q ~float64](q Q, err error) (float64, error) { return float64(q), err }

// prefactor returns that of a law in its Rayleigh number.
func prefactor(l scaling.Law, v scaling.Groups) func() (float64, error) {
	return func() (float64, error) { c, _, err := l.Local(v); return c, err }
}

// viscousTime returns an integral of the edge speed of a square viscous core,
// scaled as in the rows: edge vorticity times plume speed, Ra Nu a/2, is one.
func viscousTime(integral func(scaling.Balance) float64) func() (float64, error) {
	return func() (float64, error) {
		b, err := scaling.Cell{Width: 1, Core: scaling.ViscousCore}.Balance(1e8)
		return integral(b) / math.Sqrt(b.Rayleigh*b.Nusselt*b.Width/2), err
	}
}

func checkCalls() map[string]func() (float64, error) {
	ra := func(x float64) scaling.Groups { return scaling.Groups{Rayleigh: x} }
	rapr := func(x, pr float64) scaling.Groups { return scaling.Groups{Rayleigh: x, Prandtl: pr} }
	lid := func(theta, rai, n float64) scaling.Groups {
		return scaling.Groups{FrankKamenetskii: theta, InteriorRayleigh: rai, StressExponent: n}
	}
	cell := func(a float64) scaling.Groups { return scaling.Groups{Rayleigh: 1e8, CellWidth: a} }
	period := func(gamma float64) scaling.Groups {
		return scaling.Groups{Rayleigh: 1e8, CellWidth: gamma / 2, Prandtl: 1}
	}
	finite := scaling.FreeRolls(scaling.InviscidCore)
	speed := scaling.FreeRollsReynolds()
	viscous := scaling.FreeRolls(scaling.ViscousCore)
	sine := scaling.FreeRolls(scaling.SineCore)
	const rigidFree = 1100.64960 // as the rows have it
	calls := map[string]func() (float64, error){
		"S001": value(scaling.MarginalLayer(rigidFree, scaling.FreeOverRigid), ra(1e7)),
		"S002": value(scaling.MarginalLayer(scaling.CriticalFree, scaling.Free), ra(1e7)),
		"S004": value(scaling.HowardCycle(rigidFree, scaling.FreeOverRigid), ra(1e7)),
		"S005": value(scaling.WholeLayer(1707.76177710, 1./3, scaling.Rigid), ra(1e6)),
		"S006": func() (float64, error) { return scaling.Exchange(1) },
		"S007": func() (float64, error) { return scaling.Exchange(0.5) },
		"S008": func() (float64, error) { return scaling.Exchange(2) },
		"S010": func() (float64, error) { return scaling.Exchange(100) },
		"S011": prefactor(finite, period(2)),
		"S012": prefactor(speed, period(2)),
		"S013": prefactor(finite, period(2*math.Sqrt2)),
		"S014": prefactor(speed, period(2*math.Sqrt2)),
		"S015": prefactor(finite, period(1)),
		"S016": prefactor(speed, period(1)),
		"S017": prefactor(finite, period(4)),
		"S018": prefactor(speed, period(4)),
		"S023": func() (float64, error) { a, _, err := scaling.BestCellWidth(scaling.Nusselt); return 2 * a, err },
		"S024": func() (float64, error) { _, c, err := scaling.BestCellWidth(scaling.Nusselt); return c, err },
		"S025": func() (float64, error) { a, _, err := scaling.BestCellWidth(scaling.Reynolds); return 2 * a, err },
		"S026": prefactor(viscous, cell(1)),
		"S027": viscousTime(func(b scaling.Balance) float64 { return b.SurfaceSpeed * b.Width }),
		"S028": viscousTime(func(b scaling.Balance) float64 { return b.PlumeSpeed }),
		"S029": prefactor(viscous, cell(0.5)),
		"S030": prefactor(viscous, cell(math.Sqrt2)),
		"S031": prefactor(viscous, cell(2)),
		"S033": prefactor(scaling.RigidRolls(), cell(1)),
		"S034": prefactor(scaling.RigidRolls(), cell(0.5)),
		"S035": prefactor(scaling.RigidRolls(), cell(math.Sqrt2)),
		"S036": prefactor(scaling.RigidRolls(), cell(2)),
		"S038": prefactor(sine, cell(1)),
		"S039": prefactor(sine, cell(math.Sqrt2)),
		"S041": func() (float64, error) { return scaling.SurfaceSpeed(10, 1) },
		"S046": value(scaling.PorousElder(), scaling.Groups{PorousRayleigh: 200}),
		"S047": func() (float64, error) { return scaling.ConductiveBase, nil },
		"S048": func() (float64, error) { return scaling.ConductiveMean, nil },
		"S049": value(scaling.MarginalTop(rigidFree, scaling.FreeOverRigid), scaling.Groups{HeatingRayleigh: 1e7}),
		"S051": value(scaling.MixedHeating(), scaling.Groups{Rayleigh: 1e7, Heating: 10}),
		"S062": value(scaling.GlobeDropkin(), rapr(1e6, 7)),
		"S063": value(scaling.HollandsInclined(), ra(1e5)),
		"S064": value(scaling.HollandsInclined(), scaling.Groups{Rayleigh: 1e5, Inclination: math.Pi / 6}),
		"S066": value(scaling.HollandsInclined(), ra(1500)),
		"S067": value(scaling.HollandsHorizontal(), rapr(1e6, 6)),
		"S068": value(scaling.VerticalPlateAllRegimes(), rapr(1e9, 0.71)),
		"S069": value(scaling.VerticalPlateLaminar(), rapr(1e7, 0.71)),
		"S071": value(scaling.Cylinder(), rapr(1e6, 0.71)),
		"S072": value(scaling.CattonTall(), scaling.Groups{Rayleigh: 1e6, Prandtl: 0.71, Slenderness: 4}),
		"S073": value(scaling.CattonSquare(), scaling.Groups{Rayleigh: 1e7, Prandtl: 7, Slenderness: 1.5}),
		"S074": value(scaling.MacGregorEmery(), scaling.Groups{Rayleigh: 1e6, Prandtl: 100, Slenderness: 20}),
		"S077": value(scaling.SolomatovMoresi(), lid(15, 1e7, 1)),
		"S078": value(scaling.SolomatovMoresi(), lid(40, 1e6, 3)),
		"S084": value(scaling.LidOnset(), lid(15, 0, 1)),
		"S085": value(scaling.SteadyLid(), scaling.Groups{FrankKamenetskii: 15, BottomRayleigh: 1e7}),
		"S086": value(scaling.OgawaLid(), scaling.Groups{TopRayleigh: 1000}),
		"S087": value(scaling.OgawaBimodal(), scaling.Groups{TopRayleigh: 300}),
		"S088": value(scaling.YieldingLid(), scaling.Groups{InteriorRayleigh: 1e8}),
		"S115": func() (float64, error) { x, err := scaling.FaxenCylinderDrag(0.1); return x / (4 * math.Pi), err },
		"S117": func() (float64, error) { return scaling.SphereInTube(0.2) },
		"S163": func() (float64, error) { return scaling.CylinderDrag(0.05) },
		"S164": func() (float64, error) { return scaling.CylinderDrag(0.1) },
		"S165": func() (float64, error) { return scaling.CylinderDrag(0.2) },
		"S166": func() (float64, error) { return scaling.CylinderDrag(0.4) },
	}
	for i, c := range []struct{ ra, pr float64 }{{1e8, 1}, {1e9, 0.7}, {1e10, 4.38}, {1e7, 10}} {
		calls["S0"+strconv.Itoa(52+2*i)] = value(scaling.GrossmannLohse(), rapr(c.ra, c.pr))
		calls["S0"+strconv.Itoa(53+2*i)] = value(scaling.GrossmannLohseReynolds(), rapr(c.ra, c.pr))
	}
	addTyped(calls)
	addLithosphere(calls)
	addHistory(calls)
	addBoussinesq(calls)
	return calls
}

// activation is 300 kJ/mol in rows that took R = 8.314462618 J/(mol K); the units
// package has all digits of R, and only R/E enters.
const activation = 300 * units.KilojoulePerMole * units.MolarGasConstant / 8.314462618

// rock is the material of the typed rows: κ = 1e-6 m²/s.
func rock() boussinesq.Layer {
	return boussinesq.Layer{
		Material: boussinesq.Material{Density: 3300, Expansivity: 3e-5, Conductivity: 3.3, SpecificHeat: 1000, Viscosity: 1e19},
		Depth:    2890 * units.Kilometre, Gravity: 9.8, Top: 273, Bottom: 1600,
	}
}

func addTyped(calls map[string]func() (float64, error)) {
	creep := scaling.Arrhenius{Reference: 1e19, Anchor: 1600, Energy: activation}
	withLid := func() (scaling.Lid, error) { return scaling.DavailleJaupartLid.Lid(rock(), creep, 1600) }
	calls["S042"] = func() (float64, error) {
		return number(scaling.PlateFlux(3.3, 1300, 1e-6, 5*units.CentimetrePerYear, 5000*units.Kilometre))
	}
	calls["S044"] = func() (float64, error) {
		return number(scaling.IsothermDepth(0.9, 1e-6, 100*units.Megayear))
	}
	calls["S045"] = func() (float64, error) {
		l := rock()
		l.Material.Viscosity = 1e21
		s, err := l.Scales()
		if err != nil {
			return 0, err
		}
		x, err := scaling.EdgeStress(1e7, 20, 1, 1000)
		return float64(s.Stress(x)), err
	}
	calls["S075"] = func() (float64, error) {
		l := rock()
		l.Bottom = l.Top.Add(1300)
		return l.FrankKamenetskii(creep.Energy, 1600)
	}
	calls["S076"] = func() (float64, error) { l, err := withLid(); return float64(l.ViscousScale), err }
	calls["S080"] = func() (float64, error) { return scaling.RheologicalDrop(15, 1) }
	calls["S081"] = func() (float64, error) { l, err := withLid(); return float64(l.HeatFlux), err }
	calls["S082"] = func() (float64, error) { l, err := withLid(); return float64(l.Thickness), err }
	calls["S083"] = scaling.DavailleJaupartLid.CriticalRayleigh
	calls["S089"] = func() (float64, error) {
		o, err := scaling.Criterion{Rayleigh: 1000, Wavenumber: scaling.WavenumberFreeOverRigid}.Onset(rock(), 200)
		return float64(o.Time), err
	}
	ball := scaling.Body{DensityContrast: 100, Gravity: 9.81, Viscosity: 1, Density: 100}
	calls["S111"] = func() (float64, error) { return number(ball.Sphere(0.01)) }
	calls["S112"] = func() (float64, error) { return number(ball.Drop(0.01, 0.5)) }
	calls["S113"] = func() (float64, error) { return number(ball.Drop(0.01, 0)) }
	slab := scaling.Body{DensityContrast: 60, Gravity: 9.8, Viscosity: 1e21}
	for id, r := range map[string]scaling.Return{"S118": scaling.ReturnElsewhere, "S119": scaling.ReturnBeside} {
		calls[id] = func() (float64, error) {
			u, err := slab.Sheet(80*units.Kilometre, 500*units.Kilometre, r)
			return u.In(units.CentimetrePerYear), err
		}
	}
	conduit := func() (scaling.Conduit, error) {
		l := rock()
		l.Material.SpecificHeat = 1200
		return scaling.ConduitOf(l, 50*units.Kilometre, 250, 1e18)
	}
	calls["S120"] = func() (float64, error) { c, err := conduit(); return c.VolumeFlux, err }
	calls["S121"] = func() (float64, error) { c, err := conduit(); return c.MassFlux, err }
	calls["S122"] = func() (float64, error) { c, err := conduit(); return float64(c.HeatFlux), err }
}

func addLithosphere(calls map[string]func() (float64, error)) {
	p := lithosphere.SteinStein()
	h := lithosphere.HalfSpace{Material: p.Material, Surface: p.Surface, Mantle: p.Mantle, Overburden: p.Overburden}
	const myr = units.Megayear
	for id, age := range map[string]units.Time{"S091": 50, "S092": 100, "S093": 20} {
		calls[id] = func() (float64, error) { return number(p.HeatFlux(age * myr)) }
	}
	for id, age := range map[string]units.Time{"S095": 50, "S096": 100} {
		calls[id] = func() (float64, error) { return number(p.Subsidence(age * myr)) }
	}
	calls["S098"] = func() (float64, error) { return number(p.FinalSubsidence()) }
	calls["S099"] = func() (float64, error) { return number(h.HeatFlux(50 * myr)) }
	calls["S100"] = func() (float64, error) { return number(h.Subsidence(50 * myr)) }
	calls["S101"] = func() (float64, error) {
		q, err := h.HeatFlux(1 * myr)
		return q.In(units.MilliwattPerSquareMetre), err
	}
	calls["S102"] = func() (float64, error) { return number(h.Subsidence(1 * myr)) }
	fit := func(age units.Time) (q, depth float64, err error) {
		flux, d, err := lithosphere.SteinSteinFit(age * myr)
		return flux.In(units.MilliwattPerSquareMetre), float64(d), err
	}
	calls["S103"] = func() (float64, error) { q, _, err := fit(50); return q, err }
	calls["S104"] = func() (float64, error) { q, _, err := fit(100); return q, err }
	calls["S105"] = func() (float64, error) { _, d, err := fit(16); return d, err }
	calls["S106"] = func() (float64, error) { _, d, err := fit(100); return d, err }
	calls["S107"] = func() (float64, error) { return number(lithosphere.ParsonsSclaterDepth(49 * myr)) }
	calls["S108"] = func() (float64, error) { return number(lithosphere.ParsonsSclaterDepth(100 * myr)) }
	calls["S109"] = func() (float64, error) {
		q, err := lithosphere.ParsonsSclaterFlux(50 * myr)
		return q.In(units.MilliwattPerSquareMetre), err
	}
}

func addHistory(calls map[string]func() (float64, error)) {
	calls["S123"] = func() (float64, error) { return history.PowerLawCooling(1, 1./3, 5) }
	earth := history.McDonoughSun()
	calls["S125"] = func() (float64, error) { return number(history.PresentHeating(earth)) }
	calls["S126"] = func() (float64, error) {
		a, err := history.RockHeating(2700, history.Composition{Uranium: 4e-6, Thorium: 15e-6, Potassium: 0.035})
		return float64(a) * 1e6, err
	}
	for id, ago := range map[string]units.Time{"S127": 0, "S128": 4.5 * units.Gigayear} {
		calls[id] = func() (float64, error) {
			r, err := history.NewRadiogenic(earth, history.Isotopes(), 4.5*units.Gigayear)
			return float64(r.At(4.5*units.Gigayear - ago)), err
		}
	}
	for k, i := range history.Isotopes() {
		calls["S13"+strconv.Itoa(k)] = func() (float64, error) { return i.HalfLife.In(units.Year), nil }
	}
	sample := func(start units.Temperature, at units.Time) (history.Sample, error) {
		// tight enough for the digits of S137 within a step
		m, err := history.New(referenceBody(start), &history.Settings{Tolerance: 1e-11})
		if err != nil {
			return history.Sample{}, err
		}
		h, err := m.Run(0, 4.5*units.Gigayear)
		if err != nil {
			return history.Sample{}, err
		}
		return h.At(at)
	}
	temperature := func(start units.Temperature, at units.Time) func() (float64, error) {
		return func() (float64, error) {
			s, err := sample(start, at)
			if err != nil {
				return 0, err
			}
			return float64(s.Temperature[0]), nil
		}
	}
	calls["S134"] = temperature(2000, 4.5*units.Gigayear)
	calls["S135"] = func() (float64, error) { s, err := sample(2000, 4.5*units.Gigayear); return s.Urey, err }
	calls["S136"] = func() (float64, error) {
		s, err := sample(2000, 4.5*units.Gigayear)
		if err != nil {
			return 0, err
		}
		return float64(s.Flux[0]), nil
	}
	calls["S137"] = temperature(2000, 1*units.Gigayear)
	calls["S138"] = temperature(1600, 4.5*units.Gigayear)
	calls["S140"] = func() (float64, error) {
		b := referenceBody(1600)
		return number(b.Reservoirs[0].Loss.Flux(1600, b.Surface), nil)
	}
}

// referenceBody is the case of rows S134 to S140.
func referenceBody(start units.Temperature) history.Body {
	heating, err := history.NewRadiogenic(history.McDonoughSun(), history.Isotopes(), 4.5*units.Gigayear)
	if err != nil {
		panic(err)
	}
	return history.Body{
		Reservoirs: []history.Reservoir{{
			Mass: 4e24, SpecificHeat: 1250, Heating: heating, Area: 5.1e14, Start: start,
			Loss: history.Convection{
				Layer: boussinesq.Layer{
					Material: boussinesq.Material{Density: 3300, Expansivity: 2.5e-5, Conductivity: 4, SpecificHeat: 4 / 3300e-6},
					Depth:    2.89e6, Gravity: 9.8,
				},
				Law:       scaling.WholeLayer(1100, 1./3, scaling.AnyWalls),
				Viscosity: scaling.Arrhenius{Reference: 1e21, Anchor: 1600, Energy: activation},
			},
		}},
		Surface: 273,
	}
}

// addBoussinesq adds the rows that package boussinesq answers.
func addBoussinesq(calls map[string]func() (float64, error)) {
	upper := boussinesq.Layer{
		Material: boussinesq.Material{Density: 3300, Expansivity: 3e-5, Conductivity: 3, SpecificHeat: 1200, Viscosity: 1e21},
		Depth:    660 * units.Kilometre, Gravity: 9.8, Top: 273, Bottom: 273 + 1300,
	}
	calls["S141"] = upper.DissipationNumber
	calls["S142"] = func() (float64, error) { return number(upper.AdiabaticGradient(1600)) }
	calls["S143"] = func() (float64, error) { return number(upper.Adiabat(1600, upper.Depth)) }
	calls["S144"] = func() (float64, error) { return number(upper.SuperadiabaticDrop(1600)) }
	water := boussinesq.Layer{
		Material: boussinesq.Material{Density: 998.2, Expansivity: 2.068e-4, Conductivity: 0.598, SpecificHeat: 4184, Viscosity: 1e-3},
		Depth:    0.01, Gravity: 9.8, Top: 293, Bottom: 294.25,
	}
	calls["S145"] = water.Expansion
}
