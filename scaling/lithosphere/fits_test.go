package lithosphere

import (
	"math"
	"testing"

	"github.com/stretchr/testify/require"

	"example.org/overturn/scaling"
	"example.org/overturn/units"
)

// The constants of Stein & Stein (1992) give the coefficients of their own fits:
// 510 mW/m² √Myr, 365 m/√Myr, 5651 m.
func TestSteinSteinIsConsistent(t *testing.T) {
	require.Equal(t, 2600*units.Metre, SteinSteinRidge)
	p := SteinStein()
	h := HalfSpace{p.Material, p.Surface, p.Mantle, p.Overburden}
	q, err := h.HeatFlux(1 * myr)
	require.NoError(t, err)
	require.InEpsilon(t, 510, q.In(units.MilliwattPerSquareMetre), 0.002)
	s, err := h.Subsidence(1 * myr)
	require.NoError(t, err)
	require.InEpsilon(t, 365, float64(s), 0.002)
	final, err := p.FinalSubsidence()
	require.NoError(t, err)
	require.InEpsilon(t, 5651, float64(final+SteinSteinRidge), 1e-3)
}

// The fit and the plate differ by less than 2 mW/m² and 70 m from 10 to 150 Myr.
func TestFitFollowsPlate(t *testing.T) {
	p := SteinStein()
	for age := 10 * myr; age < 150*myr; age += 5 * myr {
		q, depth, err := SteinSteinFit(age)
		require.NoError(t, err)
		qp, err := p.HeatFlux(age)
		require.NoError(t, err)
		s, err := p.Subsidence(age)
		require.NoError(t, err)
		require.InDelta(t, float64(qp), float64(q), 2e-3, "age %v", age)
		require.InDelta(t, float64(s+SteinSteinRidge), float64(depth), 70, "age %v", age)
	}
}

func TestBranchesOfTheFits(t *testing.T) {
	// Stein & Stein (1992): which branch holds at 20 and 55 Myr.
	_, depth, err := SteinSteinFit(20 * myr)
	require.NoError(t, err)
	require.InEpsilon(t, 5651-2473*math.Exp(-0.0278*20), float64(depth), 1e-12)
	q, _, err := SteinSteinFit(55 * myr)
	require.NoError(t, err)
	require.InEpsilon(t, 0.510/math.Sqrt(55), float64(q), 1e-12)
	// Parsons & Sclater (1977)
	d, err := ParsonsSclaterDepth(70 * myr)
	require.NoError(t, err)
	require.InEpsilon(t, 6400-3200*math.Exp(-70/62.8), float64(d), 1e-12)
	d, err = ParsonsSclaterDepth(0)
	require.NoError(t, err)
	require.Equal(t, 2500*units.Metre, d)

	flux, err := ParsonsSclaterFlux(144 * myr)
	require.ErrorIs(t, err, scaling.ErrOutOfRange)
	require.InEpsilon(t, 11.3/12*0.04184, float64(flux), 1e-12)
	_, err = ParsonsSclaterFlux(120 * myr)
	require.NoError(t, err)

	for _, age := range []units.Time{-1, units.Time(math.NaN())} {
		_, _, err = SteinSteinFit(age)
		require.ErrorContains(t, err, "age")
		_, err = ParsonsSclaterDepth(age)
		require.ErrorContains(t, err, "age")
		_, err = ParsonsSclaterFlux(age)
		require.ErrorContains(t, err, "age")
	}
	_, _, err = SteinSteinFit(0)
	require.Error(t, err)
}

func TestParsonsSclaterPlate(t *testing.T) {
	p := ParsonsSclater()
	// 2500 m at the ridge, 6400 m in the end: their fit (abstract).
	final, err := p.FinalSubsidence()
	require.NoError(t, err)
	require.InDelta(t, 3900, float64(final), 100)
	// e-folding time 62.8 Myr of the fit is a²/(π²κ).
	a := float64(p.BaseDepth)
	require.InDelta(t, 62.8, a*a/(math.Pi*math.Pi*diffusivity(p.Material))/float64(myr), 1)
}
