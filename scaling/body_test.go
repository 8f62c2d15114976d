package scaling

import (
	"math"
	"testing"

	"github.com/stretchr/testify/require"

	"example.org/overturn/units"
)

var stone = Body{DensityContrast: 100, Gravity: 10, Viscosity: 10}

// Limits of a drop: rigid 2/9, inviscid 1/3 of Δρga²/μ.
func TestDropLimits(t *testing.T) {
	rigid, err := stone.Sphere(0.1)
	require.NoError(t, err)
	require.InEpsilon(t, 2./9*100*10*0.01/10, float64(rigid), 1e-14)
	stiff, err := stone.Drop(0.1, 1e12)
	require.NoError(t, err)
	require.InEpsilon(t, float64(rigid), float64(stiff), 1e-10)
	bubble, err := stone.Drop(0.1, 0)
	require.NoError(t, err)
	require.InEpsilon(t, 1.5, float64(bubble/rigid), 1e-14)
	light := stone
	light.DensityContrast = -100
	up, err := light.Sphere(0.1)
	require.NoError(t, err)
	require.Equal(t, -rigid, up)
}

func TestSphereReynoldsNumber(t *testing.T) {
	b := stone
	u, err := b.Sphere(0.1)
	require.NoError(t, err)
	// Re = 2ρUa/μ = 0.1
	b.Density = units.Density(0.1 * 10 / (2 * float64(u) * 0.1))
	b.Density *= 0.999
	_, err = b.Sphere(0.1)
	require.NoError(t, err)
	b.Density *= 1.01
	v, err := b.Sphere(0.1)
	require.ErrorIs(t, err, ErrOutOfRange)
	require.ErrorContains(t, err, "Reynolds number")
	require.Equal(t, u, v)
}

// Walls of a tube: Ladenburg's and Faxén's first term, 1 + 2.104 a/R, for a
// small sphere.
func TestSphereInTube(t *testing.T) {
	for _, l := range []float64{0, 1e-4, 1e-3} {
		k, err := SphereInTube(l)
		require.NoError(t, err)
		require.InDelta(t, 1+2.10444*l, k, 5*l*l+1e-15)
	}
	k, err := SphereInTube(0.7)
	require.ErrorIs(t, err, ErrOutOfRange)
	require.Greater(t, k, 10.)
	for _, bad := range []float64{-0.1, math.NaN(), 1, 1.5} {
		refuses(t, "ratio of radii")(SphereInTube(bad))
	}
}

// The series is off by what was found for it: 5e-6 at k = 0.05, 8e-6 at 0.1,
// 1.5e-5 at 0.2, 1.4e-4 at 0.3, 3.4e-3 at 0.4.
func TestFaxenSeriesAgainstSolution(t *testing.T) {
	for k, off := range map[float64]float64{0.05: 5e-6, 0.1: 8e-6, 0.2: 1.5e-5, 0.3: 1.4e-4, 0.4: 3.4e-3} {
		series, err := FaxenCylinderDrag(k)
		require.NoError(t, err)
		exact, err := CylinderDrag(k)
		require.NoError(t, err)
		require.InEpsilon(t, off, math.Abs(series/exact-1), 0.15, "k = %g", k)
	}
	_, err := FaxenCylinderDrag(0.45)
	require.ErrorIs(t, err, ErrOutOfRange)
	for _, bad := range []float64{0, -1, math.NaN(), 2} {
		refuses(t, "ratio of diameter")(FaxenCylinderDrag(bad))
		refuses(t, "ratio of diameter")(CylinderDrag(bad))
	}
}

// Weight and drag are in balance.
func TestCylinderSpeed(t *testing.T) {
	u, err := stone.Cylinder(0.1, 1)
	require.NoError(t, err)
	drag, err := CylinderDrag(0.2)
	require.NoError(t, err)
	require.InEpsilon(t, math.Pi*0.01*100*10, drag*10*float64(u), 1e-12)
	refuses(t, "ratio of diameter")(stone.Cylinder(0.1, 0.2))
	refuses(t, "radius")(stone.Cylinder(0, 1))
	refuses(t, "distance of walls")(stone.Cylinder(1, -1))
}

func TestBodyErrors(t *testing.T) {
	for want, b := range map[string]Body{
		"Body.DensityContrast": {DensityContrast: units.Density(math.NaN()), Gravity: 1, Viscosity: 1},
		"Body.Gravity":         {Gravity: -1, Viscosity: 1},
		"Body.Viscosity":       {Gravity: 1},
		"Body.Density ":        {Gravity: 1, Viscosity: 1, Density: -1},
	} {
		_, err := b.Sphere(1)
		require.ErrorContains(t, err, want)
		_, err = b.Drop(1, 1)
		require.ErrorContains(t, err, want)
		_, err = b.Cylinder(1, 5)
		require.ErrorContains(t, err, want)
		_, err = b.Sheet(1, 1, ReturnBeside)
		require.ErrorContains(t, err, want)
	}
	_, err := stone.Sphere(0)
	require.ErrorContains(t, err, "radius")
	refuses(t, "viscosity inside")(stone.Drop(1, -1))
	refuses(t, "thickness")(stone.Sheet(0, 1, ReturnBeside))
	refuses(t, "distance")(stone.Sheet(1, 0, ReturnBeside))
	refuses(t, "return")(stone.Sheet(1, 1, 7))
	refuses(t, "range of float64")(Body{DensityContrast: 1e300, Gravity: 1, Viscosity: 1e-300}.Sphere(1))
}

// The two profiles beside a sheet: no flux in the second, whose wall shear is
// four times that of the first.
func TestSheetProfiles(t *testing.T) {
	a, err := stone.Sheet(0.1, 2, ReturnElsewhere)
	require.NoError(t, err)
	b, err := stone.Sheet(0.1, 2, ReturnBeside)
	require.NoError(t, err)
	require.InEpsilon(t, 4, float64(a/b), 1e-14)
	// Weight per area Δρ g h over two walls of shear stress μV/W.
	require.InEpsilon(t, 100*10*0.1, 2*10*float64(a)/2, 1e-14)
}

func TestConduit(t *testing.T) {
	l := mantle()
	c, err := ConduitOf(l, 50*units.Kilometre, 250, 1e18)
	require.NoError(t, err)
	a := 50e3
	require.InEpsilon(t, c.VolumeFlux, math.Pi*a*a*float64(c.MeanSpeed), 1e-12)
	// Mean speed of Poiseuille flow: (Δρ g) a²/8μ.
	require.InEpsilon(t, 3300*3e-5*250*10*a*a/8e18, float64(c.MeanSpeed), 1e-12)
	// Heat over buoyancy is c/α.
	require.InEpsilon(t, 1000/3e-5, float64(c.HeatFlux)/c.MassFlux, 1e-12)
	back, err := ConduitCarrying(l, c.MassFlux, 250, 1e18)
	require.NoError(t, err)
	require.InEpsilon(t, a, float64(back.Radius), 1e-12)
	require.InEpsilon(t, c.MassFlux, back.MassFlux, 1e-12)

	refuses(t, "radius")(ConduitOf(l, 0, 1, 1))
	refuses(t, "temperature excess")(ConduitOf(l, 1, 0, 1))
	refuses(t, "viscosity")(ConduitOf(l, 1, 1, 0))
	refuses(t, "range of float64")(ConduitOf(l, 1e90, 250, 1e-10))
	refuses(t, "buoyancy flux")(ConduitCarrying(l, -1, 1, 1))
	refuses(t, "viscosity")(ConduitCarrying(l, 1, 1, 0))
	l.Gravity = 0
	refuses(t, "Layer.Gravity")(ConduitOf(l, 1, 1, 1))
}

// A head without entrainment is a sphere of the volume released; all heads keep
// the heat released; strong entrainment follows the exponents of Griffiths &
// Campbell (1990): z ~ t^(5/4), diameter ~ z^(3/5).
func TestStartingPlume(t *testing.T) {
	l := mantle()
	const q, excess = 100., 300
	head := func(c Entrainment, t0 units.Time) Head {
		h, err := StartingPlume(l, q, excess, c, t0)
		require.NoError(t, err)
		return h
	}
	for _, c := range []Entrainment{0, 1, 4} {
		h := head(c, 10*units.Megayear)
		volume := math.Pi / 6 * math.Pow(float64(h.Diameter), 3)
		require.InEpsilon(t, excess*q*float64(h.Time), volume*float64(h.Excess), 1e-10)
		// speed of an inviscid drop with the mean excess
		a := float64(h.Diameter) / 2
		u := 3300 * 3e-5 * float64(h.Excess) * 10 * a * a / (3 * 1e21)
		require.InEpsilon(t, u, float64(h.Speed), 1e-10)
		// dz/dt = U
		dt := 1e-4 * h.Time
		rise := float64(head(c, h.Time+dt).Height-head(c, h.Time-dt).Height) / (2 * float64(dt))
		require.InEpsilon(t, u, rise, 1e-6)
		// dV/dt = q + C √κ a^(3/2) U^(1/2)
		grow := math.Pi / 6 * (math.Pow(float64(head(c, h.Time+dt).Diameter), 3) - math.Pow(float64(head(c, h.Time-dt).Diameter), 3)) / (2 * float64(dt))
		require.InEpsilon(t, q+float64(c)*1e-3*math.Pow(a, 1.5)*math.Sqrt(u), grow, 1e-6)
	}
	require.InEpsilon(t, excess, float64(head(0, units.Megayear).Excess), 1e-12)
	// Entrainment makes heads larger, cooler and slower.
	require.Greater(t, head(2, 50*units.Megayear).Diameter, head(1, 50*units.Megayear).Diameter)
	require.Less(t, head(2, 50*units.Megayear).Height, head(1, 50*units.Megayear).Height)
	// A very weak one changes nothing.
	require.InEpsilon(t, float64(head(0, units.Megayear).Height), float64(head(1e-9, units.Megayear).Height), 1e-7)

	// Late: exponents in t and between size and height.
	early, late := head(1, 1e25), head(1, 1e27)
	lt := math.Log(100.)
	require.InDelta(t, 1.25, math.Log(float64(late.Height/early.Height))/lt, 0.01)
	require.InDelta(t, 0.75, math.Log(float64(late.Diameter/early.Diameter))/lt, 0.01)
	require.InDelta(t, 0.6, math.Log(float64(late.Diameter/early.Diameter))/math.Log(float64(late.Height/early.Height)), 0.01)

	refuses(t, "range of float64")(StartingPlume(l, 1e300, 1e300, 0, 1e300))
	for want, err := range map[string]error{
		"volume flux":        second(StartingPlume(l, 0, 1, 1, 1)),
		"temperature excess": second(StartingPlume(l, 1, 0, 1, 1)),
		"entrainment":        second(StartingPlume(l, 1, 1, -1, 1)),
		"time":               second(StartingPlume(l, 1, 1, 1, 0)),
	} {
		require.ErrorContains(t, err, want)
	}
}

// refuses wants an error that contains a text, and no value beside it.
func refuses(t *testing.T, want string) func(x any, err error) {
	t.Helper()
	return func(x any, err error) {
		t.Helper()
		require.ErrorContains(t, err, want)
		require.Zero(t, x)
	}
}

func second[T any](_ T, err error) error { return err }

func TestOnset(t *testing.T) {
	l := mantle()
	c, err := CriterionOf(FreeOverRigid)
	require.NoError(t, err)
	o, err := c.Onset(l, 1000)
	require.NoError(t, err)
	// The layer is marginal when it sets in, and as thick as √(πκt).
	d, err := GradientThickness(1e-6, o.Time)
	require.NoError(t, err)
	require.InEpsilon(t, float64(d), float64(o.Thickness), 1e-12)
	require.InEpsilon(t, c.Rayleigh, buoyancy(l)*1000*math.Pow(float64(d), 3)/1e21, 1e-12)
	require.InEpsilon(t, 2*math.Pi/2.682321757693414, float64(o.Wavelength/o.Thickness), 1e-12)

	// Under a lid: the drop of the lid law, the viscosity of the interior.
	under, err := c.OnsetUnderLid(l, DavailleJaupartLid, creep, 1600)
	require.NoError(t, err)
	soft := l
	soft.Material.Viscosity = 1e19
	same, err := c.Onset(soft, units.TemperatureDifference(2.24*float64(creep.Scale(1600))))
	require.NoError(t, err)
	require.InEpsilon(t, float64(same.Time), float64(under.Time), 1e-12)

	// A layer that is too thin never gets there.
	thin := l
	thin.Depth = o.Thickness * 0.99
	again, err := c.Onset(thin, 1000)
	require.ErrorIs(t, err, ErrOutOfRange)
	require.Equal(t, o, again)

	refuses(t, "temperature drop")(c.Onset(l, 0))
	refuses(t, "Criterion.Rayleigh")(Criterion{Wavenumber: 1}.Onset(l, 1))
	refuses(t, "Criterion.Wavenumber")(Criterion{Rayleigh: 1}.Onset(l, 1))
	refuses(t, "LidLaw")(c.OnsetUnderLid(l, LidLaw{}, creep, 1600))
	refuses(t, "interior temperature")(c.OnsetUnderLid(l, DavailleJaupartLid, creep, 0))
	refuses(t, "walls")(CriterionOf(AnyWalls))
	l.Depth = 0
	refuses(t, "Layer.Depth")(c.Onset(l, 1))
}
