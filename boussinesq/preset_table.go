package boussinesq

import "example.org/overturn/units"

// Sources that several presets share.
const (
	iapws95     = "IAPWS-95 (Wagner & Pruss 2002)"
	airEquation = "Lemmon, Jacobsen, Penoncello & Friend (2000)"
	airFlow     = "Lemmon & Jacobsen (2004)"
	iceEquation = "IAPWS R10-06 (Feistel & Wagner 2006)"
	metals      = "Mechanical Engineers' Handbook vol. 4, Table 6, after Liquid Metals Handbook (1952)"
	gases       = "Mechanical Engineers' Handbook vol. 4, Table 7"
	glycerol    = "Segur & Oberstar (1951); handbooks"
	silicone    = "data sheets and handbooks"
	syrup       = "convection experiments such as White (1988), Davaille & Jaupart (1993)"
	basalt      = "Murase & McBirney (1973), Lesher & Spera (2015)"
	mantleTable = "parameter table of doi 10.1186/s40645-016-0103-8 (2016)"
	mantleUse   = "values in use in mantle papers"
	seismic     = "PREM: Dziewonski & Anderson (1981)"
	plate       = "Stein & Stein (1992)"
	gallium     = "Assael et al. (2012); handbooks"
	handbooks   = "handbooks"
)

// Short names for the table: a conversion to one of these is a number of its
// SI unit.
type (
	kgm3 = units.Density          // kg/m³
	perK = units.Expansivity      // 1/K
	wmK  = units.Conductivity     // W/(m K)
	jkgK = units.SpecificHeat     // J/(kg K)
	pas  = units.DynamicViscosity // Pa s
	pa   = units.Pressure         // Pa
)

func computed[Q units.Quantity](v Q, digits int, source string) Property[Q] {
	return Property[Q]{Value: v, Digits: digits, Status: Computed, Source: source}
}

func read[Q units.Quantity](v Q, digits int, source string) Property[Q] {
	return Property[Q]{Value: v, Digits: digits, Status: Read, Source: source}
}

func memory[Q units.Quantity](v Q, digits int, source string) Property[Q] {
	return Property[Q]{Value: v, Digits: digits, Status: FromMemory, Source: source}
}

// between and decades add a range.

func (p Property[Q]) between(low, high Q) Property[Q] { p.Range = Between(low, high); return p }

func (p Property[Q]) decades(low, high Q) Property[Q] { p.Range = Decades(low, high); return p }

// presets is the table behind [Presets].
//
// Viscosities of the liquid metals, of silicone oil and of the core are ρ ν
// from the kinematic ones of the source. Where the best value of a range is
// not named by a source it is the middle: arithmetic, or geometric for ranges
// of decades.
var presets = []Preset{
	{
		Name: "water-20C", Title: "water at 20 °C", Conditions: "293.15 K, 0.101325 MPa",
		Note:         "IAPWS-IF97 gives a specific heat 1.8e-4 greater and an expansivity 9.5e-4 smaller, relatively",
		Temperature:  293.15,
		Density:      computed(kgm3(998.20715), 7, iapws95),
		Expansivity:  computed(perK(2.068062e-4), 5, iapws95),
		Conductivity: computed(wmK(0.598012), 5, "IAPWS R15-11"),
		SpecificHeat: computed(jkgK(4184.051), 6, iapws95),
		Viscosity:    computed(pas(1.001596e-3), 5, "IAPWS R12-08"),
		BulkModulus:  memory(pa(2.19e9), 2, "density times squared speed of sound, handbooks"),
		Sensitivity:  Sensitivity{Viscosity: -0.0245, Expansivity: 0.051, Conductivity: 0.0029, SpecificHeat: -1.7e-4},
	},
	{
		Name: "air-20C", Title: "dry air at 20 °C", Conditions: "293.15 K, 101325 Pa",
		Note:         "an ideal gas would have the expansivity 1/T = 3.411e-3 per kelvin",
		Temperature:  293.15,
		Density:      computed(kgm3(1.204575), 6, airEquation),
		Expansivity:  computed(perK(3.420988e-3), 6, airEquation),
		Conductivity: computed(wmK(2.58738e-2), 4, airFlow),
		SpecificHeat: computed(jkgK(1006.144), 6, airEquation),
		Viscosity:    computed(pas(1.820568e-5), 4, airFlow),
		BulkModulus:  memory(pa(1.42e5), 2, "1.4 times the pressure, ideal gas"),
		Sensitivity:  Sensitivity{Viscosity: 0.0026, Expansivity: -0.0034, Conductivity: 0.003},
	},
	{
		Name: "air-300K", Title: "air at 300 K", Conditions: "300 K, 1 atm",
		Note: "viscosity is Pr k/c_p with the Prandtl number 0.708 of the source; its kinematic viscosity of " +
			"16.84e-6 m²/s contradicts that number by 7 %",
		Temperature:  300,
		Density:      read(kgm3(1.1774), 3, gases),
		Expansivity:  computed(perK(1./300), 3, "1/T of an ideal gas"),
		Conductivity: read(wmK(0.02624), 3, gases),
		SpecificHeat: read(jkgK(1005.7), 3, gases),
		Viscosity:    computed(pas(1.8473e-5), 3, "Pr k/c_p, "+gases),
		BulkModulus:  memory(pa(1.42e5), 2, "1.4 times the pressure, ideal gas"),
		Sensitivity:  Sensitivity{Viscosity: 0.0026, Expansivity: -0.0033, Conductivity: 0.003},
	},
	{
		Name: "ice-273K", Title: "ice Ih at its melting point", Conditions: "273.15 K, 0.101325 MPa",
		Note: "conductivity is not settled: the range is from 567/T to 651/T W/(m K) (Klinger 1980; Petrenko & " +
			"Whitworth 1999; both from memory). Viscosity depends on stress, grain size and temperature: fill it in",
		Temperature:  273.15,
		Density:      computed(kgm3(916.7218), 6, iceEquation),
		Expansivity:  computed(perK(1.59840e-4), 6, iceEquation),
		Conductivity: memory(wmK(2.2), 2, handbooks).between(wmK(2.08), wmK(2.38)),
		SpecificHeat: computed(jkgK(2096.695), 6, iceEquation),
		BulkModulus:  memory(pa(8.7e9), 1, handbooks),
		Sensitivity:  Sensitivity{Conductivity: -0.0037, Expansivity: 0.0032, SpecificHeat: 0.0035},
	},
	{
		Name: "ice-260K", Title: "ice Ih at 260 K", Conditions: "260 K, 0.101325 MPa",
		Note: "conductivity is not settled: the range is from 567/T to 651/T W/(m K) (Klinger 1980; Petrenko & " +
			"Whitworth 1999; both from memory). Viscosity depends on stress, grain size and temperature: fill it in",
		Temperature:  260,
		Density:      computed(kgm3(918.6115), 6, iceEquation),
		Expansivity:  computed(perK(1.53275e-4), 6, iceEquation),
		Conductivity: memory(wmK(2.34), 2, "middle of the two laws").between(wmK(2.18), wmK(2.50)),
		SpecificHeat: computed(jkgK(1999.981), 6, iceEquation),
		BulkModulus:  memory(pa(8.9e9), 1, handbooks),
		Sensitivity:  Sensitivity{Conductivity: -0.0038, Expansivity: 0.0033, SpecificHeat: 0.0037},
	},
	{
		Name: "glycerol-20C", Title: "pure glycerol at 20 °C", Conditions: "293.15 K, 1 atm",
		Note:         "it takes up water from air, and each percent of water takes away a good part of its viscosity",
		Temperature:  293.15,
		Density:      memory(kgm3(1261), 3, glycerol),
		Expansivity:  memory(perK(5.0e-4), 3, glycerol),
		Conductivity: memory(wmK(0.285), 3, glycerol),
		SpecificHeat: memory(jkgK(2400), 3, glycerol),
		Viscosity:    memory(pas(1.412), 3, glycerol),
		BulkModulus:  memory(pa(4.6e9), 1, "density times squared speed of sound, handbooks"),
		Sensitivity:  Sensitivity{Viscosity: -0.092},
	},
	{
		Name: "silicone-oil-1000cSt", Title: "silicone oil, 1000 cSt", Conditions: "298 K, 1 atm",
		Note:         "polydimethylsiloxane; the viscosity is the nominal one of the grade",
		Temperature:  298,
		Density:      memory(kgm3(970), 2, silicone),
		Expansivity:  memory(perK(9.4e-4), 2, silicone).between(perK(9.0e-4), perK(9.7e-4)),
		Conductivity: memory(wmK(0.16), 2, silicone),
		SpecificHeat: memory(jkgK(1460), 2, silicone).between(jkgK(1370), jkgK(1550)),
		Viscosity:    memory(pas(0.97), 2, silicone),
		BulkModulus:  memory(pa(0.95e9), 1, "density times squared speed of sound, handbooks"),
		Sensitivity:  Sensitivity{Viscosity: -0.02},
	},
	{
		Name: "syrup-20C", Title: "golden or glucose syrup at 20 °C", Conditions: "about 20 °C, 1 atm",
		Note: "of low confidence. Viscosity is tens of Pa s and differs by batch, brand and water content, and so " +
			"does its law of temperature: measure yours and fill it in",
		Temperature:  293.15,
		Density:      memory(kgm3(1430), 1, syrup).between(kgm3(1420), kgm3(1440)),
		Expansivity:  memory(perK(4.5e-4), 1, syrup).between(perK(4.0e-4), perK(5e-4)),
		Conductivity: memory(wmK(0.365), 1, syrup).between(wmK(0.35), wmK(0.38)),
		SpecificHeat: memory(jkgK(2300), 1, syrup).between(jkgK(2200), jkgK(2400)),
	},
	{
		Name: "basalt-melt", Title: "basaltic melt near its liquidus", Conditions: "about 1200 °C, 1 atm, poor in volatiles",
		Note: "each value is good to 20 % at best. Viscosity is 10 to 100 Pa s at Kilauea and 100 to 1000 Pa s at " +
			"Stromboli; the range is the first",
		Temperature:  1473.15,
		Density:      memory(kgm3(2700), 1, basalt),
		Expansivity:  memory(perK(6e-5), 1, basalt).between(perK(5e-5), perK(7e-5)),
		Conductivity: memory(wmK(1.25), 1, basalt).between(wmK(1.0), wmK(1.5)),
		SpecificHeat: memory(jkgK(1450), 1, basalt),
		Viscosity:    memory(pas(30), 1, basalt).decades(pas(10), pas(100)),
	},
	{
		Name: "upper-mantle", Title: "upper mantle", Conditions: "constant properties, conductivity given",
		Note: "diffusivity follows from conductivity, 7.6e-7 m²/s; the source rounds it to 1e-6 m²/s, which " +
			"upper-mantle-rounded has instead. Viscosity down to 1e19 Pa s in the asthenosphere",
		Density:      read(kgm3(3300), 2, mantleTable),
		Expansivity:  read(perK(3e-5), 1, mantleTable).between(perK(2e-5), perK(4e-5)),
		Conductivity: read(wmK(3), 1, mantleTable).between(wmK(3), wmK(4.5)),
		SpecificHeat: read(jkgK(1200), 2, mantleTable).between(jkgK(1100), jkgK(1250)),
		Viscosity:    memory(pas(1e21), 1, mantleUse).decades(pas(1e19), pas(1e21)),
		BulkModulus:  memory(pa(130e9), 1, seismic),
	},
	{
		Name: "upper-mantle-rounded", Title: "upper mantle of diffusivity 1e-6 m²/s", Conditions: "constant properties, diffusivity given",
		Note: "conductivity follows from the rounded diffusivity; the source gives 3 W/(m K), which upper-mantle " +
			"has instead. Viscosity down to 1e19 Pa s in the asthenosphere",
		Density:      read(kgm3(3300), 2, mantleTable),
		Expansivity:  read(perK(3e-5), 1, mantleTable).between(perK(2e-5), perK(4e-5)),
		Conductivity: computed(wmK(3.96), 1, "κ ρ c_p, "+mantleTable),
		SpecificHeat: read(jkgK(1200), 2, mantleTable),
		Viscosity:    memory(pas(1e21), 1, mantleUse).decades(pas(1e19), pas(1e21)),
		BulkModulus:  memory(pa(130e9), 1, seismic),
	},
	{
		Name: "lithosphere", Title: "oceanic lithosphere of a cooling plate", Conditions: "constants of the plate model",
		Note:         "the published fits of heat flow and depth follow from these values, which confirms them. Viscosity has no part in the model: fill it in",
		Density:      memory(kgm3(3330), 4, plate),
		Expansivity:  memory(perK(3.1e-5), 2, plate),
		Conductivity: memory(wmK(3.138), 4, plate),
		SpecificHeat: memory(jkgK(1171), 4, plate),
		BulkModulus:  memory(pa(130e9), 1, seismic),
	},
	{
		Name: "lower-mantle", Title: "lower mantle", Conditions: "ranges over depth",
		Note:         "the ranges are the change from top to bottom as much as what is not known",
		Density:      memory(kgm3(5000), 1, seismic).between(kgm3(4400), kgm3(5560)),
		Expansivity:  memory(perK(1.75e-5), 1, mantleUse).between(perK(1e-5), perK(2.5e-5)),
		Conductivity: memory(wmK(7.5), 1, mantleUse).between(wmK(5), wmK(10)),
		SpecificHeat: memory(jkgK(1250), 1, mantleUse),
		Viscosity:    memory(pas(1.7e22), 1, mantleUse).decades(pas(3e21), pas(1e23)),
		BulkModulus:  memory(pa(480e9), 1, seismic),
	},
	{
		Name: "outer-core", Title: "liquid iron of the outer core", Conditions: "ranges from top to bottom",
		Note:         "papers before about 2010 take 30 to 50 W/(m K) for conductivity",
		Density:      memory(kgm3(11000), 1, seismic).between(kgm3(9900), kgm3(12170)),
		Expansivity:  memory(perK(1.5e-5), 1, "values in use in core papers").between(perK(1.2e-5), perK(1.8e-5)),
		Conductivity: read(wmK(130), 1, "Pozzo, Davies, Gubbins & Alfè (2013), abstract").between(wmK(100), wmK(160)),
		SpecificHeat: read(jkgK(750), 1, "parameter table of doi 10.1186/s40645-020-00374-8, after Labrosse (2015)"),
		Viscosity:    memory(pas(1.1e-2), 1, "values in use in core papers"),
		BulkModulus:  memory(pa(970e9), 1, seismic),
	},
	{
		Name: "halite", Title: "rock salt", Conditions: "300 K, 1 atm",
		Note:         "conductivity falls roughly as 1/T. The range of viscosity is that of damp rock salt at low stress",
		Temperature:  300,
		Density:      memory(kgm3(2165), 2, handbooks),
		Expansivity:  memory(perK(1.2e-4), 2, handbooks),
		Conductivity: memory(wmK(6), 1, handbooks),
		SpecificHeat: memory(jkgK(865), 2, handbooks),
		Viscosity:    memory(pas(3e18), 1, handbooks).decades(pas(1e17), pas(1e20)),
		BulkModulus:  memory(pa(25e9), 1, handbooks),
		Sensitivity:  Sensitivity{Conductivity: -0.0033},
	},
	{
		Name: "mercury-273K", Title: "mercury at 273 K", Conditions: "273 K",
		Temperature:  273,
		Density:      read(kgm3(13595), 3, metals),
		Expansivity:  memory(perK(1.81e-4), 3, "handbooks, at 293 K"),
		Conductivity: read(wmK(8.18), 3, metals),
		SpecificHeat: read(jkgK(140), 3, metals),
		Viscosity:    computed(pas(13595*1.240e-7), 3, metals),
		BulkModulus:  memory(pa(28.5e9), 2, "density times squared speed of sound, handbooks"),
	},
	{
		Name: "mercury-600K", Title: "mercury at 600 K", Conditions: "600 K",
		Temperature:  600,
		Density:      read(kgm3(12809), 3, metals),
		Expansivity:  computed(perK(1.877e-4), 2, "(13595 − 12809) kg/m³ over 327 K, by the density at 600 K; "+metals),
		Conductivity: read(wmK(11.95), 3, metals),
		SpecificHeat: read(jkgK(136), 3, metals),
		Viscosity:    computed(pas(12809*0.711e-7), 3, metals),
	},
	{
		Name: "sodium-366K", Title: "liquid sodium at 366 K", Conditions: "366 K (200 °F)",
		Note:         "the source lists it as liquid, though sodium melts at 371 K",
		Temperature:  366,
		Density:      read(kgm3(929.1), 3, metals),
		Expansivity:  memory(perK(2.6e-4), 2, "handbooks, near 400 K"),
		Conductivity: read(wmK(86.2), 3, metals),
		SpecificHeat: read(jkgK(1380), 3, metals),
		Viscosity:    computed(pas(929.1*7.516e-7), 3, metals),
	},
	{
		Name: "sodium-977K", Title: "liquid sodium at 977 K", Conditions: "977 K",
		Temperature:  977,
		Density:      read(kgm3(778.5), 3, metals),
		Expansivity:  computed(perK(3.166e-4), 2, "(929.1 − 778.5) kg/m³ over 611 K, by the density at 977 K; "+metals),
		Conductivity: read(wmK(59.7), 3, metals),
		SpecificHeat: read(jkgK(1260), 3, metals),
		Viscosity:    computed(pas(778.5*2.285e-7), 3, metals),
	},
	{
		Name: "nak56-366K", Title: "sodium-potassium alloy 56/44", Conditions: "366 K",
		Note:         "the source gives no expansivity: fill it in",
		Temperature:  366,
		Density:      read(kgm3(887.4), 3, metals),
		Conductivity: read(wmK(25.6), 3, metals),
		SpecificHeat: read(jkgK(1130), 3, metals),
		Viscosity:    computed(pas(887.4*6.522e-7), 3, metals),
	},
	{
		Name: "gallium-303K", Title: "gallium just above its melting point", Conditions: "302.9 K",
		Temperature:  302.9,
		Density:      memory(kgm3(6095), 2, gallium),
		Expansivity:  memory(perK(1.2e-4), 2, gallium),
		Conductivity: memory(wmK(29.5), 2, gallium).between(wmK(28), wmK(31)),
		SpecificHeat: memory(jkgK(397), 2, gallium),
		Viscosity:    memory(pas(1.95e-3), 2, gallium).between(pas(1.9e-3), pas(2.0e-3)),
	},
}
