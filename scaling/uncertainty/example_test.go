package uncertainty_test

import (
	"context"
	"fmt"
	"log"
	"math"

	"gonum.org/v1/gonum/stat/distuv"

	"example.org/overturn/scaling/uncertainty"
)

// How long does a layer 100 km thick take to cool by conduction, if its
// diffusivity and its thickness are known to some per cent?
func Example() {
	inputs := []uncertainty.Input{
		{Name: "thickness", Distribution: distuv.Normal{Mu: 100e3, Sigma: 5e3}},
		{Name: "diffusivity", Distribution: uncertainty.LogUniform{Min: 0.8e-6, Max: 1.2e-6}},
	}
	myr := 1e6 * 365.25 * 86400
	age := func(in, out []float64) error {
		out[0] = in[0] * in[0] / (math.Pi * in[1]) / myr
		return nil
	}
	e, err := uncertainty.Run(context.Background(), inputs, []string{"age"}, age, &uncertainty.Settings{Samples: 4000})
	if err != nil {
		log.Fatal(err)
	}
	low, median, high, err := e.Band("age", 0.68)
	if err != nil {
		log.Fatal(err)
	}
	fmt.Printf("%.0f Myr, 68%% between %.0f and %.0f\n", median, low, high)
	shares, err := e.FirstOrder("age")
	if err != nil {
		log.Fatal(err)
	}
	for _, s := range shares {
		fmt.Printf("%s: %.1f of the variance\n", s.Input, s.First)
	}
	// Output:
	// 103 Myr, 68% between 88 and 121
	// thickness: 0.4 of the variance
	// diffusivity: 0.6 of the variance
}
