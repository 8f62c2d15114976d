package history_test

import (
	"context"
	"testing"

	"github.com/stretchr/testify/require"
	"gonum.org/v1/gonum/stat/distuv"

	"example.org/overturn/scaling/history"
	"example.org/overturn/scaling/uncertainty"
	"example.org/overturn/units"
)

// present is the temperature after 4.5 Gyr as a function of start, viscosity and
// heat production.
func present(in, out []float64) error {
	body, err := mantle(units.Temperature(in[0]), units.DynamicViscosity(in[1]))
	if err != nil {
		return err
	}
	model, err := history.New(body, nil)
	if err != nil {
		return err
	}
	h, err := model.Run(0, 4.5*units.Gigayear)
	if err != nil {
		return err
	}
	s, err := h.At(4.5 * units.Gigayear)
	if err != nil {
		return err
	}
	out[0] = float64(s.Temperature[0])
	return nil
}

var planet = []uncertainty.Input{
	{Name: "start", Distribution: distuv.Uniform{Min: 1700, Max: 2100}},
	{Name: "viscosity", Distribution: uncertainty.LogUniform{Min: 1e19, Max: 1e22}},
}

// The start is forgotten, the viscosity is not: self-regulation.
func TestViscosityMattersStartDoesNot(t *testing.T) {
	e, err := uncertainty.Run(context.Background(), planet, []string{"T"}, present, &uncertainty.Settings{Samples: 400, Seed: 1})
	require.NoError(t, err)
	s, err := e.FirstOrder("T")
	require.NoError(t, err)
	require.Less(t, s[0].First, 0.15)
	require.Greater(t, s[1].First, 0.85)
}

// BenchmarkTenThousand is a Monte Carlo study of ten thousand histories.
func BenchmarkTenThousand(b *testing.B) {
	const samples = 10000
	for b.Loop() {
		if _, err := uncertainty.Run(context.Background(), planet, []string{"T"}, present, &uncertainty.Settings{Samples: samples}); err != nil {
			b.Fatal(err)
		}
	}
	b.ReportMetric(b.Elapsed().Seconds()/float64(b.N), "s/study")
	b.ReportMetric(float64(b.Elapsed().Nanoseconds())/float64(b.N*samples), "ns/history")
}
