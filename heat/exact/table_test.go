package exact

import (
	"encoding/csv"
	"math"
	"os"
	"strconv"
	"testing"

	"github.com/stretchr/testify/require"
)

const (
	day  = 86400.0
	year = 365.25 * day
)

// near fails unless got is within a relative distance of want.
func near(t *testing.T, want, got, tol float64, what string) {
	t.Helper()
	if !(math.Abs(got-want) <= tol*math.Abs(want)) {
		t.Errorf("%s = %.16g, want %.16g within %.0e relative", what, got, want, tol)
	}
}

// temperature solves a problem and returns its temperature at z and t.
func temperature(t *testing.T, p Problem, x, z, time float64) float64 {
	t.Helper()
	s, err := p.Solve()
	require.NoError(t, err)
	return s.At(x, z, time).Temperature
}

// rows has a function for each row of testdata/heat.csv.
func rows(t *testing.T) map[string]float64 {
	at := func(p Problem, x, z, time float64) float64 { return temperature(t, p, x, z, time) }
	fluxAt := func(s Solution, z, time float64) float64 { return s.At(0, z, time).FluxZ }
	cold := HalfSpace{Initial: 1}
	swing := PeriodicSurface{}
	slab, plate := Slab{Initial: 1}, Slab{Initial: 1, High: 1}
	rotation := GaussianRotation{Material: Material{Conductivity: 0.001}, Width: 0.08, X: 0.25, Rate: 2 * math.Pi}
	slate := Contact{
		Lower: Material{3, 3300 * 1200}, LowerInitial: 1600,
		Upper: Material{2.5, 2900 * 1000}, UpperInitial: 600,
	}
	lake := StefanTwoPhase{
		Solid: Material{2.22, 917 * 2100}, Liquid: Material{0.56, 917 * 4200}, LatentHeat: 917 * 334000,
		Surface: -10, Melting: 0, Initial: 5,
	}
	crust := GeothermExponential{Material: Material{Conductivity: 2.5}, Surface: 10, MantleFlow: 30e-3, Source: 2.5e-6, Depth: 10e3}
	series := Layers{Thicknesses: []float64{0.5, 0.5}, Conductivities: []float64{1, 10}, High: 1}
	modes := BoxMode{N: 2}
	return map[string]float64{
		"H001": at(cold, 0, 1, 0.25),
		"H003": cold.SurfaceGradient(0.25),
		"H004": cold.HeatLost(0.25),
		"H005": at(HalfSpace{Material: Material{Conductivity: 1e-6}, Initial: 1623, Surface: 273}, 0, 50e3, 60e6*year),
		"H006": cold.IsothermDepth(0.9, 1),
		"H007": at(HalfSpaceFlux{Flux: 1}, 0, 0, 1),
		"H008": at(HalfSpaceFlux{Flux: 1}, 0, 0.5, 1),
		"H010": PeriodicSurface{Material: Material{Conductivity: 1e-6}, Period: year}.SkinDepth(),
		"H011": PeriodicSurface{Material: Material{Conductivity: 1e-6}, Period: day}.SkinDepth(),
		"H012": at(swing, 0, 1, 0.3),
		"H014": swing.FluxAmplitude(),
		"H015": at(HalfSpaceRobin{Ambient: 1}, 0, 0.5, 1),
		"H016": at(HalfSpaceRobin{Ambient: 1}, 0, 0, 1),
		"H018": at(slab, 0, 0.5, 0.1),
		"H019": slab.Mean(0.1),
		"H022": at(plate, 0, 0.5, 0.05),
		"H023": -fluxAt(plate, 0, 0.05),
		"H025": at(SlabInsulated{Initial: 1}, 0, 1, 0.2),
		"H027": SlabRobin{}.Root(0),
		"H028": at(SlabRobin{Initial: 1}, 0, 0, 0.5),
		"H030": at(Slab{Source: 1}, 0, 0.5, 0.1),
		"H032": at(SlabInsulated{Source: 1}, 0, 1, 1e9),
		"H033": at(SlabInsulated{Source: 1}, 0, 1, 0.2),
		"H034": at(Gaussian{Material: Material{Conductivity: 0.1}, Width: 0.1}, 0.1, 0.05, 0.02),
		"H036": at(LineSource{}, 0.3, 0.4, 0.3),
		"H037": at(rotation, -0.05, -0.2, 0.7),
		"H038": at(rotation, 0.25, 0, 1),
		"H040": at(Gaussian{Material: Material{Conductivity: 0.01}, Width: 0.1, X: 0.1, Z: 0.2, VX: 1, VZ: 0.5}, 0.6, 0.3, 0.4),
		"H041": at(GaussianShear{Material: Material{Conductivity: 0.01}, Width: 0.1, Rate: 2}, 0.2, 0.1, 1),
		"H043": at(Throughflow{Velocity: 5, High: 1}, 0, 0.5, 0),
		"H044": at(Throughflow{Velocity: 100, High: 1}, 0, 0.95, 0),
		"H045": at(Throughflow{Velocity: 1000, High: 1}, 0, 0.9, 0),
		"H047": -fluxAt(Throughflow{Velocity: 5, High: 1}, 1, 0),
		"H048": at(Inflow{Material: Material{Conductivity: 0.1}, Velocity: 1, Surface: 1}, 0, 1, 0.8),
		"H050": slate.Interface(),
		"H051": at(slate, 0, 100, 1e10),
		"H052": StefanOnePhase{Melting: 1}.Lambda(),
		"H053": StefanOnePhase{Melting: 0.1}.Lambda(),
		"H055": lake.Lambda(),
		"H056": lake.Front(day),
		"H057": StefanContact{Material: Material{HeatCapacity: 1100}, LatentHeat: 400e3, Melting: 1000}.Lambda(),
		"H058": at(Geotherm{Material: Material{Conductivity: 2.5}, HeatFlow: 60e-3, Source: 1e-6}, 0, 20e3, 0),
		"H059": at(crust, 0, 30e3, 0),
		"H060": crust.SurfaceFlow(),
		"H062": sphereAt(0, 0.1),
		"H063": sphereAt(0.5, 0.05),
		"H064": at(Cylinder{Initial: 1}, 0, 0, 0.1),
		"H066": at(modes, 0.3, 0.6, 0.01),
		"H067": modes.FivePointRate(1.0/64, 1.0/64),
		"H068": at(HotTop{Top: 1}, 0.25, 0.25, 0),
		"H070": at(ConductivityLinear{Slope: 0.5, High: 1}, 0, 0.5, 0),
		"H071": at(ConductivityInverse{Reference: 300, Low: 300, High: 1600}, 0, 0.3, 0),
		"H072": at(ConductivityExponential{Growth: 2, High: 1}, 0, 0.4, 0),
		"H073": series.Interface(0),
		"H074": -series.Flux(),
		"H075": at(StagnationFlow{Material: Material{Conductivity: 0.5}, Rate: 2, Far: 1}, 0, 0.6, 0),
		"H076": Leveque{Far: 1}.WallGradient(1),
		"H077": at(Leveque{Far: 1}, 1, 0.8, 0),
		"H078": at(CouetteHeating{Speed: 2, High: 1}, 0, 0.3, 0),
		"H079": at(Upflow{Speed: 3, Deep: 1}, 0, 0.5, 0),
		"H080": Cell{Sides: Isothermal}.Medium(0.3, 0.4, 0.2).Source,
		"H081": Cell{Material: Material{Conductivity: 0.1}, Sides: Isothermal, Velocity: 2 * math.Pi}.Medium(0.3, 0.4, 0.2).Source,
		"H082": Cell{Material: Material{Conductivity: 0.1}, Velocity: 2 * math.Pi}.Medium(0.3, 0.4, 0.2).Source,
	}
}

func sphereAt(r, time float64) float64 {
	v, _ := Sphere{Initial: 1}.At(r, time)
	return v
}

// The values have 14 digits, of which 12 are trusted.
func TestTable(t *testing.T) {
	f, err := os.Open("testdata/heat.csv")
	require.NoError(t, err)
	defer f.Close()
	r := csv.NewReader(f)
	r.Comment = '#'
	table, err := r.ReadAll()
	require.NoError(t, err)
	got := rows(t)
	require.Len(t, table, len(got)+1, "a row without a function, or the reverse")
	worst := 0.0
	for _, row := range table[1:] {
		want, err := strconv.ParseFloat(row[3], 64)
		require.NoError(t, err)
		v, ok := got[row[0]]
		require.True(t, ok, "row %s has no function", row[0])
		near(t, want, v, 1e-12, row[0]+" "+row[1]+" "+row[2])
		worst = max(worst, math.Abs(v/want-1))
	}
	t.Logf("%d rows, largest relative difference %.1e", len(got), worst)
}
