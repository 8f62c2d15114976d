package exact_test

import (
	"encoding/csv"
	"math"
	"os"
	"strconv"
	"testing"

	"example.org/overturn/stokes/exact"
	"github.com/stretchr/testify/require"
	"gonum.org/v1/gonum/integrate/quad"
)

// table reads a file of testdata into rows by column name.
func table(t *testing.T, file string) []map[string]string {
	t.Helper()
	f, err := os.Open(file)
	require.NoError(t, err)
	defer f.Close()
	r := csv.NewReader(f)
	r.Comment = '#'
	records, err := r.ReadAll()
	require.NoError(t, err)
	var rows []map[string]string
	for _, record := range records[1:] {
		row := map[string]string{}
		for i, name := range records[0] {
			row[name] = record[i]
		}
		rows = append(rows, row)
	}
	return rows
}

func number(t *testing.T, text string) float64 {
	t.Helper()
	v, err := strconv.ParseFloat(text, 64)
	require.NoError(t, err)
	return v
}

func find(t *testing.T, name string) exact.Case {
	t.Helper()
	for _, c := range exact.All() {
		if c.Name == name {
			return c
		}
	}
	t.Fatalf("no case is called %q", name)
	return exact.Case{}
}

// rootMeanSquare integrates over a box by Gauss's rule, between the lines of
// the case.
func rootMeanSquare(c exact.Case, f func(exact.Fields) float64) float64 {
	return math.Sqrt(integral(c, func(x, z float64) float64 { return f(c.At(x, z)) }) / (c.Box.Width() * c.Box.Height()))
}

func integral(c exact.Case, f func(x, z float64) float64) float64 {
	xs := append(append([]float64{c.Box.Left}, c.XLines...), c.Box.Right)
	zs := append(append([]float64{c.Box.Bottom}, c.ZLines...), c.Box.Top)
	sum := 0.0
	for i := range len(xs) - 1 {
		for k := range len(zs) - 1 {
			sum += quad.Fixed(func(x float64) float64 {
				return quad.Fixed(func(z float64) float64 { return f(x, z) }, zs[k], zs[k+1], 40, quad.Legendre{}, 1)
			}, xs[i], xs[i+1], 40, quad.Legendre{}, 1)
		}
	}
	return sum
}

// Values computed elsewhere in 50-digit arithmetic. They are met to three
// units of the last of their 15 digits. At one point, next to the jump, the
// velocity is a two-hundredth of what it is elsewhere on that side, and has the
// rounding error 2⁻⁵² of the largest speed.
func TestTabulatedPoints(t *testing.T) {
	for _, row := range table(t, "testdata/points.csv") {
		c := find(t, row["case"])
		want := number(t, row["value"])
		tolerance := 3 * math.Pow(10, 1-number(t, row["digits"])) * math.Abs(want)
		if row["case"] == "column jump" && row["x"] == "0.49" {
			speed, _ := scales(c)
			tolerance = max(tolerance, 0x1p-52*speed)
		}
		var got float64
		switch row["quantity"] {
		case "vrms":
			got = rootMeanSquare(c, func(f exact.Fields) float64 { return f.VX*f.VX + f.VZ*f.VZ })
		case "prms":
			got = rootMeanSquare(c, func(f exact.Fields) float64 { return f.P * f.P })
		default:
			f := c.At(number(t, row["x"]), number(t, row["z"]))
			got = map[string]float64{"vx": f.VX, "vz": f.VZ, "p": f.P}[row["quantity"]]
		}
		if !(math.Abs(got-want) <= tolerance) {
			t.Errorf("%s: %s(%s, %s) = %.16g, want %.16g, relative error %.1e",
				row["case"], row["quantity"], row["x"], row["z"], got, want, got/want-1)
		}
	}
}

// Twelve layers of mixed properties at wavelengths from a hundredth to a
// thousand times their thickness.
func TestTabulatedLayers(t *testing.T) {
	const tolerance = 1e-12
	solutions := map[string]exact.Solution{}
	for _, row := range table(t, "testdata/layers.csv") {
		kx, z := number(t, row["kx"]), number(t, row["z"])
		s, ok := solutions[row["kx"]]
		if !ok {
			var err error
			s, err = twelve(kx).Solve()
			require.NoError(t, err)
			solutions[row["kx"]] = s
		}
		crest, flank := s.At(0, z), s.At(0.5*math.Pi/kx, z)
		for name, got := range map[string]float64{
			"vx": flank.VX, "vz": crest.VZ, "p": crest.P, "shear_stress": flank.Stress.XZ,
		} {
			want := number(t, row[name])
			if e := math.Abs(got/want - 1); !(e <= tolerance) {
				t.Errorf("kx = %v: %s(%v) = %.16g, want %.16g, relative error %.1e", kx, name, z, got, want, e)
			}
		}
	}
}

// The cases are what they were when their values were recorded, so that figures
// obtained with them stay comparable. Whether they are right is for the other
// tests to say.
func TestCasesAreAsRecorded(t *testing.T) {
	rows := table(t, "testdata/cases.csv")
	cases := exact.All()
	require.Len(t, rows, len(cases))
	for i, c := range cases {
		row := rows[i]
		require.Equal(t, row["case"], c.Name)
		x, z := c.Box.Left+0.375*c.Box.Width(), c.Box.Bottom+0.625*c.Box.Height()
		f := c.At(x, z)
		speed, stress := scales(c)
		for _, q := range []struct {
			name       string
			got, scale float64
		}{
			{"vx", f.VX, speed}, {"vz", f.VZ, speed}, {"p", f.P, stress},
			{"viscosity", c.Viscosity(x, z), c.Viscosity(x, z)},
		} {
			if want := number(t, row[q.name]); !(math.Abs(q.got-want) <= 1e-6*q.scale) {
				t.Errorf("%s: %s = %.7g, recorded %.7g", c.Name, q.name, q.got, want)
			}
		}
	}
}
