package lithosphere

import (
	"fmt"
	"math"
	"testing"

	"github.com/stretchr/testify/require"
	"gonum.org/v1/gonum/integrate/quad"

	"example.org/overturn/units"
)

const myr = units.Megayear

// Images and series are two forms of one function.
func TestImagesAndSeriesAgree(t *testing.T) {
	// The plate of a very fast ridge conducts nothing along itself, but is
	// summed by the series at any age.
	for _, tau := range []float64{1e-3, 0.01, 0.05, 0.0999} {
		images, sum := series{tau, math.Inf(1)}, series{tau, 1e9}
		require.True(t, images.early())
		require.False(t, sum.early())
		require.InEpsilon(t, images.flux(), sum.flux(), 1e-8)
		require.InEpsilon(t, images.contraction(), sum.contraction(), 1e-8)
		for _, z := range []float64{0, 0.01, 0.3, 0.77, 1} {
			require.InDelta(t, images.temperature(z), sum.temperature(z), 1e-9)
		}
	}
	// Across the change of form.
	early, late := series{0.1 - 1e-9, math.Inf(1)}, series{0.1 + 1e-9, math.Inf(1)}
	require.InDelta(t, early.flux(), late.flux(), 1e-7)
	require.InDelta(t, early.contraction(), late.contraction(), 1e-8)
	require.InDelta(t, early.temperature(0.4), late.temperature(0.4), 1e-8)
}

// A plate so young that its base does not matter is a half-space.
func TestYoungPlateIsHalfSpace(t *testing.T) {
	p := SteinStein()
	h := HalfSpace{p.Material, p.Surface, p.Mantle, p.Overburden}
	for _, age := range []units.Time{1e-3 * myr, 1 * myr, 5 * myr} {
		qp, err := p.HeatFlux(age)
		require.NoError(t, err)
		qh, err := h.HeatFlux(age)
		require.NoError(t, err)
		require.InEpsilon(t, float64(qh), float64(qp), 1e-9)
		sp, err := p.Subsidence(age)
		require.NoError(t, err)
		sh, err := h.Subsidence(age)
		require.NoError(t, err)
		require.InEpsilon(t, float64(sh), float64(sp), 1e-9)
		tp, err := p.Temperature(10*units.Kilometre, age)
		require.NoError(t, err)
		th, err := h.Temperature(10*units.Kilometre, age)
		require.NoError(t, err)
		require.InDelta(t, float64(th), float64(tp), 1e-6)
	}
}

// Subsidence is the contraction of the column, by quadrature of the
// temperature; the heat flux is its gradient.
func TestPlateIsConsistent(t *testing.T) {
	for _, spreading := range []units.Velocity{0, 3 * units.CentimetrePerYear} {
		p := SteinStein()
		p.Spreading = spreading
		for _, age := range []units.Time{3 * myr, 20 * myr, 80 * myr, 300 * myr} {
			at := func(z float64) float64 {
				x, err := p.Temperature(units.Length(z), age)
				require.NoError(t, err)
				return float64(x)
			}
			a := float64(p.BaseDepth)
			missing := quad.Fixed(func(z float64) float64 { return float64(p.Mantle) - at(z) }, 0, a, 200, nil, 0)
			m := p.Material
			want := float64(m.Density) * float64(m.Expansivity) * missing / float64(m.Density-p.Overburden)
			s, err := p.Subsidence(age)
			require.NoError(t, err)
			require.InEpsilon(t, want, float64(s), 1e-9, "age %v", age)

			q, err := p.HeatFlux(age)
			require.NoError(t, err)
			const h = 20.0
			slope := (8*(at(h)-at(0)) - (at(2*h) - at(0))) / (6 * h)
			require.InEpsilon(t, slope*float64(m.Conductivity), float64(q), 1e-5, "age %v", age)
		}
	}
}

// The plate obeys the heat equation, with conduction along it where it spreads:
// u T_x = κ (T_xx + T_zz).
func TestPlateObeysHeatEquation(t *testing.T) {
	for _, peclet := range []float64{math.Inf(1), 3, 30} {
		for _, tau := range []float64{0.02, 0.08, 0.2, 0.5} {
			f := func(tau, z float64) float64 { return series{tau, peclet}.temperature(z) }
			const h = 1e-3
			z := 0.4
			rate := (f(tau+h*tau, z) - f(tau-h*tau, z)) / (2 * h * tau)
			across := (f(tau, z+h) - 2*f(tau, z) + f(tau, z-h)) / (h * h)
			// x/a = 2 Pe τ
			along := (f(tau+h*tau, z) - 2*f(tau, z) + f(tau-h*tau, z)) / (h * h * tau * tau) / (4 * peclet * peclet)
			require.InDelta(t, rate, across+along, 2e-4*math.Abs(rate)+2e-4, "Pe %g τ %g", peclet, tau)
		}
	}
}

func TestAgesAreInverses(t *testing.T) {
	p := SteinStein()
	spreading := p
	spreading.Spreading = 4 * units.CentimetrePerYear
	models := map[string]Model{
		"half-space":        HalfSpace{p.Material, p.Surface, p.Mantle, p.Overburden},
		"plate":             p,
		"spreading plate":   spreading,
		"Parsons & Sclater": ParsonsSclater(),
	}
	for name, m := range models {
		for _, age := range []units.Time{0.5 * myr, 30 * myr, 65 * myr, 160 * myr} {
			q, err := m.HeatFlux(age)
			require.NoError(t, err, name)
			back, err := m.AgeOfHeatFlux(q)
			require.NoError(t, err, name)
			require.InEpsilon(t, float64(age), float64(back), 1e-10, "%s: flux at %v", name, age)
			s, err := m.Subsidence(age)
			require.NoError(t, err, name)
			back, err = m.AgeOfSubsidence(s)
			require.NoError(t, err, name)
			require.InEpsilon(t, float64(age), float64(back), 1e-10, "%s: subsidence at %v", name, age)
			d, err := m.Thickness(0.8, age)
			require.NoError(t, err, name)
			at, err := m.Temperature(d, age)
			require.NoError(t, err, name)
			require.InDelta(t, float64(p.Surface)+0.8*float64(m.(interface{ dropOf() float64 }).dropOf()), float64(at), 1e-8, name)
		}
	}
}

func (h HalfSpace) dropOf() float64 { return h.drop() }
func (p Plate) dropOf() float64     { return p.drop() }

func TestLimitsInTime(t *testing.T) {
	p := SteinStein()
	q, err := p.HeatFlux(3000 * myr)
	require.NoError(t, err)
	final, err := p.FinalHeatFlux()
	require.NoError(t, err)
	require.InEpsilon(t, float64(final), float64(q), 1e-12)
	s, err := p.Subsidence(3000 * myr)
	require.NoError(t, err)
	last, err := p.FinalSubsidence()
	require.NoError(t, err)
	require.InEpsilon(t, float64(last), float64(s), 1e-12)
	d, err := p.Thickness(0.9, 3000*myr)
	require.NoError(t, err)
	require.InEpsilon(t, 0.9*float64(p.BaseDepth), float64(d), 1e-12)

	for _, m := range []Model{p, HalfSpace{p.Material, p.Surface, p.Mantle, p.Overburden}} {
		hot, err := m.Temperature(10*units.Kilometre, 0)
		require.NoError(t, err)
		require.Equal(t, p.Mantle, hot)
		cold, err := m.Temperature(0, 10*myr)
		require.NoError(t, err)
		require.Equal(t, p.Surface, cold)
		s, err := m.Subsidence(0)
		require.NoError(t, err)
		require.Zero(t, s)
		d, err := m.Thickness(0.5, 0)
		require.NoError(t, err)
		require.Zero(t, d)
		age, err := m.AgeOfSubsidence(0)
		require.NoError(t, err)
		require.Zero(t, age)
	}
}

// Conduction along the plate cools it ahead of its age near the ridge, and not
// at all far from it.
func TestSpreadingMattersNearTheRidgeOnly(t *testing.T) {
	still, moving := SteinStein(), SteinStein()
	moving.Spreading = 1 * units.CentimetrePerYear
	ratio := func(age units.Time) float64 {
		q0, err := still.HeatFlux(age)
		require.NoError(t, err)
		q1, err := moving.HeatFlux(age)
		require.NoError(t, err)
		return float64(q1 / q0)
	}
	require.Greater(t, math.Abs(ratio(0.3*myr)-1), 0.1)
	require.InDelta(t, 1, ratio(100*myr), 0.01)
	require.NotEqual(t, 1.0, ratio(100*myr))
	_, err := moving.HeatFlux(1 * units.Second)
	require.ErrorContains(t, err, "distance from the ridge")
	_, err = moving.Temperature(1*units.Kilometre, 1*units.Second)
	require.ErrorContains(t, err, "distance from the ridge")
}

// bare drops the unit of a result.
func bare[Q ~float64](q Q, err error) (float64, error) { return float64(q), err }

// A plate so slow that conduction along it delays its cooling for ages.
func TestAgesOfSlowPlate(t *testing.T) {
	p := SteinStein()
	p.Spreading = 0.02 * units.CentimetrePerYear
	age := 700 * myr
	q, err := p.HeatFlux(age)
	require.NoError(t, err)
	still, err := SteinStein().HeatFlux(age)
	require.NoError(t, err)
	require.Less(t, float64(still), float64(q))
	back, err := p.AgeOfHeatFlux(q)
	require.NoError(t, err)
	require.InEpsilon(t, float64(age), float64(back), 1e-6)
	s, err := p.Subsidence(2000 * myr)
	require.NoError(t, err)
	back, err = p.AgeOfSubsidence(s)
	require.NoError(t, err)
	require.InEpsilon(t, float64(2000*myr), float64(back), 1e-6)
	// The youngest point that the series reaches is the hottest flux it has.
	_, err = p.AgeOfHeatFlux(1e9)
	require.ErrorContains(t, err, "heat flux")
}

func TestErrorsNameTheField(t *testing.T) {
	good := SteinStein()
	broken := func(change func(*Plate)) Plate {
		p := good
		change(&p)
		return p
	}
	for want, p := range map[string]Plate{
		"Material.Density":      broken(func(p *Plate) { p.Material.Density = 0 }),
		"Material.Conductivity": broken(func(p *Plate) { p.Material.Conductivity = units.Conductivity(math.NaN()) }),
		"Material.SpecificHeat": broken(func(p *Plate) { p.Material.SpecificHeat = -1 }),
		"Material.Expansivity":  broken(func(p *Plate) { p.Material.Expansivity = -1 }),
		"Surface":               broken(func(p *Plate) { p.Surface = -3 }),
		"Mantle":                broken(func(p *Plate) { p.Mantle = p.Surface }),
		"Overburden":            broken(func(p *Plate) { p.Overburden = p.Material.Density }),
		"BaseDepth":             broken(func(p *Plate) { p.BaseDepth = 0 }),
		"Spreading":             broken(func(p *Plate) { p.Spreading = -1 }),
	} {
		h := HalfSpace{p.Material, p.Surface, p.Mantle, p.Overburden}
		models := []Model{p}
		if h.Check() != nil {
			models = append(models, h)
		}
		for _, m := range models {
			refuses := func(x float64, err error) {
				t.Helper()
				require.ErrorContains(t, err, "lithosphere: "+want)
				require.Zero(t, x)
			}
			refuses(bare(m.Temperature(1, 1)))
			refuses(bare(m.HeatFlux(1)))
			refuses(bare(m.Subsidence(1)))
			refuses(bare(m.Thickness(0.5, 1)))
			refuses(bare(m.AgeOfHeatFlux(1)))
			refuses(bare(m.AgeOfSubsidence(1)))
			if p, ok := m.(Plate); ok {
				refuses(bare(p.FinalHeatFlux()))
				refuses(bare(p.FinalSubsidence()))
			}
		}
	}
	nan := units.Time(math.NaN())
	for _, m := range []Model{good, HalfSpace{good.Material, good.Surface, good.Mantle, good.Overburden}} {
		_, err := m.HeatFlux(0)
		require.ErrorContains(t, err, "age")
		_, err = m.HeatFlux(nan)
		require.ErrorContains(t, err, "age")
		_, err = m.Subsidence(-1)
		require.ErrorContains(t, err, "age")
		_, err = m.Temperature(-1, 1)
		require.ErrorContains(t, err, "depth")
		_, err = m.Temperature(1, nan)
		require.ErrorContains(t, err, "age")
		_, err = m.Thickness(1, 1)
		require.ErrorContains(t, err, "fraction")
		_, err = m.Thickness(0, 1)
		require.ErrorContains(t, err, "fraction")
		_, err = m.Thickness(0.5, nan)
		require.ErrorContains(t, err, "age")
		_, err = m.AgeOfHeatFlux(0)
		require.ErrorContains(t, err, "heat flux")
		_, err = m.AgeOfSubsidence(-1)
		require.ErrorContains(t, err, "subsidence")
	}
	_, err := good.AgeOfHeatFlux(40 * units.MilliwattPerSquareMetre)
	require.ErrorContains(t, err, "heat flux")
	_, err = good.AgeOfHeatFlux(1e12)
	require.ErrorContains(t, err, "heat flux")
	_, err = good.AgeOfSubsidence(4 * units.Kilometre)
	require.ErrorContains(t, err, "subsidence")
	_, err = good.Temperature(96*units.Kilometre, 1)
	require.ErrorContains(t, err, "depth")
}

func BenchmarkPlateHeatFlux(b *testing.B) {
	p := SteinStein()
	for _, age := range []units.Time{1 * myr, 100 * myr} {
		b.Run(fmt.Sprintf("age=%gMyr", age.In(myr)), func(b *testing.B) {
			b.ReportAllocs()
			for b.Loop() {
				if _, err := p.HeatFlux(age); err != nil {
					b.Fatal(err)
				}
			}
		})
	}
}
