package convection_test

import (
	"context"
	"fmt"
	"log"
	"os"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"example.org/overturn/boussinesq"
	"example.org/overturn/boussinesq/convection"
	"example.org/overturn/stokes/staggered"
	"example.org/overturn/units"
)

// The README shows the body of this example, and TestReadmeShowsTheExample
// keeps the two alike.
func Example() {
	syrup := boussinesq.Material{
		Density:      1430 * units.KilogramPerCubicMetre,
		Expansivity:  4.5e-4 * units.PerKelvin,
		Conductivity: 0.36 * units.WattPerMetreKelvin,
		SpecificHeat: 2300 * units.JoulePerKilogramKelvin,
		Viscosity:    60 * units.PascalSecond,
	}
	tank := boussinesq.Layer{
		Material: syrup, Depth: 20 * units.Centimetre, Gravity: units.StandardGravity,
		Top: units.Celsius(20), Bottom: units.Celsius(50),
	}
	grid, err := staggered.Graded(128, 128, 1, 1, staggered.Grading{Left: 8, Right: 8, Bottom: 8, Top: 8})
	check(err)
	problem, err := convection.FromLayer(tank, grid)
	check(err)
	study, err := convection.Refine(context.Background(), problem, 3, nil)
	check(err)
	nu, _ := study.Get("NuTop")
	scales, err := tank.Scales()
	check(err)
	fmt.Printf("Ra = %.3g, Nu = %.3f ± %.3f, heat flow %.0f W/m²\n", problem.Rayleigh,
		nu.Value, nu.Uncertainty, scales.HeatFlux(nu.Value).In(units.WattPerSquareMetre))
	// Output: Ra = 2.31e+05, Nu = 13.782 ± 0.002, heat flow 744 W/m²
}

func check(err error) {
	if err != nil {
		log.Fatal(err)
	}
}

func TestReadmeShowsTheExample(t *testing.T) {
	source, err := os.ReadFile("readme_test.go")
	require.NoError(t, err)
	readme, err := os.ReadFile("../../README.md")
	require.NoError(t, err)
	_, body, _ := strings.Cut(string(source), "func Example() {\n")
	body, rest, _ := strings.Cut(body, "\t// Output: ")
	output, _, _ := strings.Cut(rest, "\n")
	shown := strings.ReplaceAll("\n"+body, "\n\t", "\n")
	assert.Contains(t, string(readme), strings.TrimSpace(shown))
	assert.Contains(t, string(readme), output)
}
