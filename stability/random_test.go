package stability

import (
	"errors"
	"math"
	"math/rand/v2"
	"os"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// randomLayer draws a layer with any combination of what a layer can have.
func randomLayer(r *rand.Rand) Layer {
	porous := r.IntN(4) == 0
	wall := func() Boundary {
		w := []Wall{Free, Rigid}[r.IntN(2)]
		if porous {
			w = []Wall{Impermeable, Permeable}[r.IntN(2)]
		}
		switch r.IntN(3) {
		case 0:
			return w
		case 1:
			return w.FixedFlux()
		}
		return w.Robin(math.Pow(10, -3+6*r.Float64()))
	}
	pick := func(v ...float64) float64 { return v[r.IntN(len(v))] }
	l := Layer{
		Bottom: wall(), Top: wall(),
		Base: []Base{
			{}, InternalHeating(), MixedHeating(5), CoolingFromAbove(0.02), InternalHeatingBetween(),
			Gradient(func(z float64) float64 { return math.Sin(7 * z) }),
		}[r.IntN(6)],
		Viscosity: []Viscosity{{}, Exponential(5, 0.5), Layered([]float64{0.4}, []float64{1, 30}), Arrhenius(4, 1, 1)}[r.IntN(4)],
	}
	if r.IntN(5) == 0 {
		l.Solute = Solute{
			Rayleigh: pick(500, -3, 3000), Diffusivity: pick(0.03, 0.3, 2),
			Bottom: SoluteWall(r.IntN(2)), Top: SoluteWall(r.IntN(2)),
		}
	}
	if porous {
		l.Porous = Darcy
		return l
	}
	l.Prandtl = pick(0, 0.02, 0.5, 7, 1e4)
	if r.IntN(3) == 0 {
		l.Taylor = math.Pow(10, 1+3.5*r.Float64())
	}
	if r.IntN(3) == 0 {
		l.Magnetic = Magnetic{
			Chandrasekhar: math.Pow(10, 2.5*r.Float64()), Diffusivity: pick(0, 0.1, 3),
			Bottom: MagneticWall(r.IntN(3)), Top: MagneticWall(r.IntN(3)),
		}
	}
	if conditionsOf(l.Top).wall == Free && r.IntN(4) == 0 {
		l.Marangoni = 20 * r.Float64()
	}
	return l
}

// Whatever a layer has, just below its first onset nothing grows near the
// critical wavenumber, and at it a rate vanishes. Ten layers by default, three
// hundred with OVERTURN_LONG=1.
func TestRandomLayers(t *testing.T) {
	skipIfShort(t)
	layers := 10
	if os.Getenv("OVERTURN_LONG") != "" {
		layers = 300
	}
	r := rand.New(rand.NewPCG(3, 4))
	for i := range layers {
		l := randomLayer(r)
		s, err := NewSolver(l, nil)
		require.NoError(t, err, "%v", l)
		o, err := s.Critical()
		if errors.Is(err, ErrNoOnset) || errors.Is(err, ErrUnstable) {
			continue
		}
		require.NoError(t, err, "layer %d: %v %+v", i, l, l.Magnetic)
		require.False(t, math.IsNaN(o.Value+o.Wavenumber), "layer %d: %v", i, l)
		if o.Value == 0 {
			continue // nothing stops wide rolls
		}
		for _, d := range []float64{0.6, 0.9, 1, 1.1, 1.6} {
			k := o.Wavenumber * d
			if o.LongWave() {
				k = 0.03 * d * d
			}
			g, err := s.Growth(o.Value*(1-1e-4), k)
			require.NoError(t, err, "layer %d: %v, k = %g", i, l, k)
			assert.Less(t, g.Rate, 1e-9, "layer %d: %v, k = %g", i, l, k)
		}
		if !o.LongWave() {
			g, err := s.Growth(o.Value, o.Wavenumber)
			require.NoError(t, err)
			assert.InDelta(t, 0, g.Rate, 1e-8*(1+o.Frequency+o.Wavenumber*o.Wavenumber), "layer %d: %v", i, l)
			assert.InDelta(t, o.Frequency, g.Frequency, 1e-8*(1+o.Frequency), "layer %d: %v", i, l)
		}
	}
}
