package main

import (
	"math"

	"example.org/overturn/boussinesq/convection"
	"example.org/overturn/stokes/rheology"
)

// A benchmark is one steady case of Blankenbach et al. (1989) in the unit box.
type benchmark struct {
	name    string
	problem convection.Problem // but for the grid
	values  []value
}

// A value is what one quantity should be.
type value struct {
	quantity  string // nu, vrms, q1 to q4
	published float64
	reference float64
}

// diagnostic gives each quantity its name among the library's diagnostics.
var diagnostic = map[string]string{
	"nu": "NuTop", "vrms": "RMSVelocity",
	"q1": "CornerGradient1", "q2": "CornerGradient2", "q3": "CornerGradient3", "q4": "CornerGradient4",
}

// none stands where the paper gives no value: in the isoviscous cases, symmetric
// about the middle, q3 repeats q1 and q4 repeats q2.
var none = math.NaN()

// benchmarks holds the best values of Blankenbach et al. (1989), from memory,
// and references that an independent code (hp-Galerkin, full Newton) computed to
// the digits shown or more.
var benchmarks = []benchmark{
	{"1a", convection.Problem{Rayleigh: 1e4}, []value{
		{"nu", 4.884409, 4.884409168632},
		{"vrms", 42.864947, 42.86494461276},
		{"q1", 8.059384, 8.059385990533},
		{"q2", 0.588810, 0.5888105362775},
		{"q3", none, 8.059385990533},
		{"q4", none, 0.5888105362775},
	}},
	{"1b", convection.Problem{Rayleigh: 1e5}, []value{
		{"nu", 10.534095, 10.53409477362},
		{"vrms", 193.214540, 193.214532853},
		{"q1", 19.079440, 19.07944321},
		{"q2", 0.722751, 0.7227514324482},
		{"q3", none, 19.07944321},
		{"q4", none, 0.7227514324482},
	}},
	{"1c", convection.Problem{Rayleigh: 1e6}, []value{
		{"nu", 21.972465, 21.97246882099},
		{"vrms", 833.989767, 833.9897227414},
		{"q1", 45.964250, 45.9642525},
		{"q2", 0.877170, 0.877169524482},
		{"q3", none, 45.9642525},
		{"q4", none, 0.877169524482},
	}},
	// Viscosity falls a thousandfold from the cold top to the hot bottom; the
	// Rayleigh number is that of the top.
	{"2a", convection.Problem{Rayleigh: 1e4, Viscosity: rheology.FrankKamenetskii{ThermalExponent: math.Log(1000)}}, []value{
		{"nu", 10.0660, 10.06591263784},
		{"vrms", 480.4334, 480.4319534246},
		{"q1", 17.53136, 17.531225891},
		{"q2", 1.00851, 1.008509916522},
		{"q3", 26.8085, 26.8086413},
		{"q4", 0.497380, 0.497381176879},
	}},
}
