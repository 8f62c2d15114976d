package exact

import (
	"encoding/csv"
	"math"
	"os"
	"strconv"
	"testing"

	"github.com/stretchr/testify/require"
)

// referenceProblems returns the temperature and flux, as functions of z and t,
// that testdata/reference.csv has values of.
func referenceProblems(t *testing.T) map[string]func(z, t float64) (float64, float64) {
	column := func(p Problem, x float64) func(z, t float64) (float64, float64) {
		s, err := p.Solve()
		require.NoError(t, err)
		return func(z, t float64) (float64, float64) {
			f := s.At(x, z, t)
			return f.Temperature, f.FluxZ
		}
	}
	cylinder := Cylinder{Initial: 1}
	return map[string]func(z, t float64) (float64, float64){
		"slab":      column(Slab{Initial: 1, High: 0.5, Source: 2}, 0),
		"robin1":    column(SlabRobin{Initial: 1}, 0),
		"robin1e3":  column(SlabRobin{Initial: 1, Coefficient: 1000}, 0),
		"robin1e-6": column(SlabRobin{Initial: 1, Coefficient: 1e-6}, 0),
		"cylinder": func(r, t float64) (float64, float64) {
			f := cylinder.At(0.6*r, 0.8*r, t)
			return f.Temperature, math.Copysign(math.Hypot(f.FluxX, f.FluxZ), f.FluxZ)
		},
		"sphere":              Sphere{Initial: 1}.At,
		"throughflow -1000":   column(Throughflow{Velocity: -1000, High: 1}, 0),
		"throughflow -3":      column(Throughflow{Velocity: -3, High: 1}, 0),
		"throughflow 1e-9":    column(Throughflow{Velocity: 1e-9, High: 1}, 0),
		"throughflow 0":       column(Throughflow{High: 1}, 0),
		"throughflow 1e-3":    column(Throughflow{Velocity: 1e-3, High: 1}, 0),
		"throughflow 30":      column(Throughflow{Velocity: 30, High: 1}, 0),
		"throughflow 1000":    column(Throughflow{Velocity: 1000, High: 1}, 0),
		"throughflow 1e5":     column(Throughflow{Velocity: 1e5, High: 1}, 0),
		"exponential -500":    column(ConductivityExponential{Growth: -500, High: 1}, 0),
		"exponential -2":      column(ConductivityExponential{Growth: -2, High: 1}, 0),
		"exponential 0":       column(ConductivityExponential{High: 1}, 0),
		"exponential 700":     column(ConductivityExponential{Growth: 700, High: 1}, 0),
		"inflow -2":           column(Inflow{Velocity: -2, Surface: 1}, 0),
		"inflow 0":            column(Inflow{Surface: 1}, 0),
		"inflow 3":            column(Inflow{Velocity: 3, Surface: 1}, 0),
		"inflow 100":          column(Inflow{Velocity: 100, Surface: 1}, 0),
		"halfspacerobin 1e-3": column(HalfSpaceRobin{Ambient: 1, Coefficient: 1e-3}, 0),
		"halfspacerobin 1":    column(HalfSpaceRobin{Ambient: 1}, 0),
		"halfspacerobin 1e4":  column(HalfSpaceRobin{Ambient: 1, Coefficient: 1e4}, 0),
		"twophase": column(StefanTwoPhase{
			Solid: Material{2.22, 2.1}, Liquid: Material{0.56, 4.2}, LatentHeat: 334, Surface: -10, Initial: 5,
		}, 0),
		"leveque": column(Leveque{Far: 1}, 1),
		"hottop":  column(HotTop{Top: 1}, 0.25),
	}
}

// Each number is right to 2e-13 of itself, or, where it is the small difference
// of larger ones, to a few units in the last place of those: of the largest
// temperature, and of the flux that it would drive through the shortest length
// at hand.
func TestReference(t *testing.T) {
	f, err := os.Open("testdata/reference.csv")
	require.NoError(t, err)
	defer f.Close()
	r := csv.NewReader(f)
	r.Comment = '#'
	table, err := r.ReadAll()
	require.NoError(t, err)
	number := func(text string) float64 {
		v, err := strconv.ParseFloat(text, 64)
		if v != 0 { // beyond the range is 0 or infinite
			require.NoError(t, err)
		}
		return v
	}
	problems, seen := referenceProblems(t), map[string]bool{}
	for _, row := range table[1:] {
		at, ok := problems[row[0]]
		require.True(t, ok, row[0])
		seen[row[0]] = true
		z, time := number(row[1]), number(row[2])
		temperature, flux := at(z, time)
		scale := 1.0
		if row[0] == "twophase" {
			scale = 20
		}
		steepest := scale
		if time > 0 {
			steepest *= 1 + 1/math.Sqrt(time)
		}
		check := func(what string, got, want, scale float64) {
			if !(math.Abs(got-want) <= 2e-13*math.Abs(want)+1e-15*scale) {
				t.Errorf("%s of %s at z = %g, t = %g is %.16g, want %.16g", what, row[0], z, time, got, want)
			}
		}
		check("temperature", temperature, number(row[3]), scale)
		check("flux", flux, number(row[4]), steepest)
	}
	require.Len(t, seen, len(problems))
}
