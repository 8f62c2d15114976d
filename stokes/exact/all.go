package exact

import (
	"math"
	"slices"
)

// All returns the cases, always in the same order. The caller may change what
// it gets.
func All() []Case {
	cases := make([]Case, len(catalogue))
	for i, entry := range catalogue {
		c := entry.Case
		var err error
		if c.Solution, err = entry.problem.Solve(); err != nil {
			panic(err) // never: the parameters are those below, and tests solve them all
		}
		c.XLines, c.ZLines, c.Sheets = slices.Clone(c.XLines), slices.Clone(c.ZLines), slices.Clone(c.Sheets)
		cases[i] = c
	}
	return cases
}

var unit = Box{Left: 0, Right: 1, Bottom: 0, Top: 1}

// smooth are the orders where all fields are smooth, jump those where the
// viscosity jumps between cells, curved those where it jumps inside them.
var (
	smooth = Orders{Velocity: 2, Pressure: 2}
	jump   = Orders{Velocity: 1, Pressure: 1}
	curved = Orders{Velocity: 1, Pressure: 0.5}
)

var catalogue = []struct {
	Case
	problem Problem
}{
	{
		Case: Case{
			Name:   "box mode",
			Source: "classical",
			Box:    unit,
			Expect: smooth,
		},
		problem: BoxMode{Viscosity: 1, KX: math.Pi, KZ: math.Pi, Force: 1},
	},
	{
		Case: Case{
			Name:   "column jump",
			Source: "Zhong (1996)",
			Box:    unit,
			XLines: []float64{0.5},
			Expect: jump,
		},
		problem: ColumnJump{Width: 1, Jump: 0.5, Left: 1, Right: 1e6, KX: math.Pi, KZ: math.Pi, Force: 1},
	},
	{
		Case: Case{
			Name:   "column jump off centre",
			Source: "Zhong (1996)",
			Box:    unit,
			XLines: []float64{0.25},
			Expect: jump,
		},
		problem: ColumnJump{Width: 1, Jump: 0.25, Left: 1000, Right: 1, KX: 2 * math.Pi, KZ: math.Pi, Force: 1},
	},
	{
		Case: Case{
			Name:   "columns",
			Source: "after Zhong (1996)",
			Box:    unit,
			Walls:  Walls{Left: NoSlip},
			XLines: []float64{0.25, 0.75},
			Expect: jump,
		},
		problem: Columns{KZ: math.Pi, Left: NoSlip, Columns: []Column{
			{Width: 0.25, Viscosity: 10, Force: Profile{Mean: 1}},
			{Width: 0.5, Viscosity: 1, Contrast: 100, Force: Profile{Cosine: 1, Wavenumber: math.Pi}},
			{Width: 0.25, Viscosity: 1, Force: Profile{Mean: -1}},
		}},
	},
	{
		Case: Case{
			Name:   "exponential viscosity",
			Source: "Revenaugh & Parsons (1987)",
			Box:    unit,
			Expect: smooth,
		},
		problem: ExponentialViscosity{Height: 1, AtBottom: 1, AtTop: 1e6, KX: math.Pi, KZ: math.Pi, Force: 1},
	},
	{
		Case: Case{
			Name:   "exponential viscosity between plates",
			Source: "Revenaugh & Parsons (1987)",
			Box:    unit,
			Walls:  Walls{Bottom: NoSlip, Top: NoSlip},
			Expect: smooth,
		},
		problem: ExponentialViscosity{Height: 1, AtBottom: 1, AtTop: 1000, KX: 2 * math.Pi, KZ: math.Pi, Force: 1,
			BottomWall: NoSlip, TopWall: NoSlip},
	},
	{
		Case: Case{
			Name:   "layers",
			Source: "after Hager & O'Connell (1981)",
			Box:    unit,
			Walls:  Walls{Bottom: NoSlip},
			ZLines: []float64{0.25, 0.5, 0.75},
			Expect: jump,
		},
		problem: Layers{KX: math.Pi, Bottom: NoSlip, Layers: []Layer{
			{Thickness: 0.25, Viscosity: 30, Force: Profile{Mean: 1}},
			{Thickness: 0.25, Viscosity: 1, Contrast: 10},
			{Thickness: 0.25, Viscosity: 0.1, Force: Profile{Mean: 1, Sine: -1, Wavenumber: 2 * math.Pi}},
			{Thickness: 0.25, Viscosity: 100},
		}},
	},
	{
		Case: Case{
			Name:   "inclusion in pure shear",
			Source: "Schmid & Podladchikov (2003)",
			Box:    Box{Left: -2, Right: 2, Bottom: -2, Top: 2},
			Walls:  Walls{Left: Driven, Right: Driven, Bottom: Driven, Top: Driven},
			Circle: 1,
			Expect: curved,
		},
		problem: Inclusion{Radius: 1, Inside: 1000, Outside: 1, Stretch: 1},
	},
	{
		Case: Case{
			Name:   "inclusion in simple shear",
			Source: "Schmid & Podladchikov (2003)",
			Box:    Box{Left: -2, Right: 2, Bottom: -2, Top: 2},
			Walls:  Walls{Left: Driven, Right: Driven, Bottom: Driven, Top: Driven},
			Circle: 1,
			Expect: curved,
		},
		problem: Inclusion{Radius: 1, Inside: 0.001, Outside: 1, Shear: 1},
	},
	{
		Case: Case{
			Name:   "channel",
			Source: "Poiseuille and Couette, classical",
			Box:    unit,
			Walls:  Walls{Left: Driven, Right: Driven, Bottom: NoSlip, Top: Driven},
			Expect: smooth,
		},
		problem: Channel{Height: 1, AtBottom: 1, AtTop: 100, VTop: 0.1, PressureGradient: -10},
	},
	{
		Case: Case{
			Name:   "film on a slope",
			Source: "classical",
			Box:    unit,
			Walls:  Walls{Left: Periodic, Right: Periodic, Bottom: NoSlip},
			Expect: Orders{Velocity: 2}, // the pressure is zero
		},
		problem: Channel{Height: 1, AtBottom: 1, AtTop: 100, Force: 10, FreeTop: true},
	},
	{
		Case: Case{
			Name:   "spreading plates",
			Source: "Batchelor (1967)",
			Box:    Box{Left: -1, Right: 1, Bottom: -1.5, Top: -0.5},
			Walls:  Walls{Left: Driven, Right: Driven, Bottom: Driven, Top: Driven},
			Expect: smooth,
		},
		problem: Corner{Viscosity: 1, From: Plate{Angle: -math.Pi, VX: -1}, To: Plate{Angle: 0, VX: 1}},
	},
	{
		Case: Case{
			Name:   "sinking plate",
			Source: "Batchelor (1967)",
			Box:    Box{Left: 1, Right: 2, Bottom: -0.75, Top: -0.25},
			Walls:  Walls{Left: Driven, Right: Driven, Bottom: Driven, Top: Driven},
			Expect: smooth,
		},
		problem: Corner{Viscosity: 1,
			From: Plate{Angle: -math.Pi / 4, VX: math.Sqrt2 / 2, VZ: -math.Sqrt2 / 2}, To: Plate{Angle: 0}},
	},
	{
		Case: Case{
			Name:   "relaxation of a layer",
			Source: "Haskell (1935)",
			Box:    unit,
			Walls:  Walls{Bottom: NoSlip, Top: Driven},
			Expect: smooth,
		},
		problem: Relaxation{KX: math.Pi, Layers: []Layer{{Thickness: 1, Viscosity: 1}}, Bottom: NoSlip, Weight: 1, Amplitude: 1},
	},
	{
		Case: Case{
			Name:   "relaxation of a half-space",
			Source: "Haskell (1935)",
			Box:    Box{Left: 0, Right: 1, Bottom: -1, Top: 0},
			Walls:  Walls{Bottom: Driven, Top: Driven},
			Expect: smooth,
		},
		problem: Relaxation{KX: math.Pi, Layers: []Layer{{Thickness: math.Inf(1), Viscosity: 1}}, Weight: 1, Amplitude: 1},
	},
	{
		Case: Case{
			Name:   "rayleigh-taylor wave",
			Source: "Chandrasekhar (1961)",
			Box:    unit,
			Walls:  Walls{Bottom: NoSlip, Top: NoSlip},
			ZLines: []float64{0.25},
			Sheets: []Sheet{{Z: 0.25, Force: 1, KX: math.Pi}},
			Expect: jump,
		},
		problem: RayleighTaylor{KX: math.Pi, Lower: Layer{Thickness: 0.25, Viscosity: 0.1}, Upper: Layer{Thickness: 0.75, Viscosity: 1},
			Bottom: NoSlip, Top: NoSlip, Weight: 1, Amplitude: 1},
	},
	{
		Case: Case{
			Name:   "manufactured, free slip",
			Source: "chosen here",
			Box:    Box{Left: 0, Right: 2, Bottom: 0, Top: 1},
			Expect: smooth,
		},
		problem: Manufactured{Walls: FreeSlip, Width: 2, Height: 1, Viscosity: 1, Contrast: 1e4, Velocity: 1},
	},
	{
		Case: Case{
			Name:   "manufactured, no slip",
			Source: "chosen here",
			Box:    unit,
			Walls:  Walls{Left: NoSlip, Right: NoSlip, Bottom: NoSlip, Top: NoSlip},
			Expect: smooth,
		},
		problem: Manufactured{Walls: NoSlip, Width: 1, Height: 1, Viscosity: 1, Contrast: 1e4, Velocity: 1},
	},
	{
		Case: Case{
			Name:   "manufactured, periodic",
			Source: "chosen here",
			Box:    Box{Left: 0, Right: 2, Bottom: 0, Top: 1},
			Walls:  Walls{Left: Periodic, Right: Periodic, Bottom: NoSlip, Top: NoSlip},
			Expect: smooth,
		},
		problem: Manufactured{Walls: Periodic, Width: 2, Height: 1, Viscosity: 1, Contrast: 1e4, Velocity: 1},
	},
}
