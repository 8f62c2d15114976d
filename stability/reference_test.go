package stability

import (
	"encoding/csv"
	"math"
	"os"
	"regexp"
	"strconv"
	"strings"
	"testing"

	"github.com/stretchr/testify/require"
	"gonum.org/v1/gonum/floats/scalar"
)

// A reference is a row of testdata/stability.csv: see testdata/README.md for
// its columns, definitions and sources.
type reference struct {
	id, name, quantity string
	value              float64
	digits             int
	definition         string
}

// skipIfShort skips what takes longer than a second or two.
func skipIfShort(t *testing.T) {
	t.Helper()
	if testing.Short() {
		t.Skip("takes seconds")
	}
}

func readReferences(t *testing.T) []reference {
	t.Helper()
	file, err := os.Open("testdata/stability.csv")
	require.NoError(t, err)
	defer file.Close()
	rows, err := csv.NewReader(file).ReadAll()
	require.NoError(t, err)
	var out []reference
	for _, r := range rows[1:] {
		value, err := strconv.ParseFloat(r[3], 64)
		require.NoError(t, err)
		digits, err := strconv.Atoi(r[4])
		require.NoError(t, err)
		out = append(out, reference{r[0], r[1], r[2], value, digits, r[5]})
	}
	return out
}

// tolerance is what is asked for: the digits trusted, but 1e-10 where there are
// more, and 1e-12 for free-free layers.
func (r reference) tolerance() float64 {
	tol := max(1e-10, math.Pow(10, -float64(r.digits)))
	if strings.HasPrefix(r.name, "RB free-free isothermal") {
		tol = 1e-12
	}
	return tol
}

// number returns the number after a name in the definition.
func (r reference) number(t *testing.T, name string) float64 {
	t.Helper()
	m := regexp.MustCompile(`(?:^|[^A-Za-z0-9_])` + name + `=(-?pi|-?[0-9.]+(?:e[+-]?[0-9]+)?)(/[0-9.]+)?`).
		FindStringSubmatch(r.definition)
	require.NotNil(t, m, "%s: no %s in %q", r.id, name, r.definition)
	v := math.Pi
	if m[1] != "pi" {
		var err error
		v, err = strconv.ParseFloat(m[1], 64)
		require.NoError(t, err)
	}
	if m[2] != "" {
		d, err := strconv.ParseFloat(m[2][1:], 64)
		require.NoError(t, err)
		v /= d
	}
	return v
}

// boundary reads a description like "bottom no-slip, Robin Bi=0.1".
func (r reference) boundary(t *testing.T, side string) Boundary {
	t.Helper()
	m := regexp.MustCompile(side + ` (no-slip|free-slip|impermeable|permeable \(const p\)), (isothermal|fixed flux|Robin Bi=([0-9.]+))`).
		FindStringSubmatch(r.definition)
	require.NotNil(t, m, "%s: no %s in %q", r.id, side, r.definition)
	wall := map[string]Wall{
		"no-slip": Rigid, "free-slip": Free, "impermeable": Impermeable, "permeable (const p)": Permeable,
	}[m[1]]
	switch m[2] {
	case "isothermal":
		return wall.Isothermal()
	case "fixed flux":
		return wall.FixedFlux()
	}
	bi, err := strconv.ParseFloat(m[3], 64)
	require.NoError(t, err)
	return wall.Robin(bi)
}

func (r reference) layer(t *testing.T) Layer {
	t.Helper()
	return Layer{Bottom: r.boundary(t, "bottom"), Top: r.boundary(t, "top")}
}

// has reports whether the definition contains a text.
func (r reference) has(text string) bool { return strings.Contains(r.definition, text) }

// section returns the letter that starts the id.
func (r reference) section() string { return r.id[:1] }

// group returns the id without the quantity.
func (r reference) group() string { return strings.TrimSuffix(r.id, "."+r.quantity) }

func TestReferenceValues(t *testing.T) {
	compute := map[string]func(*testing.T, reference) float64{
		"A": sectionA, "B": sectionB, "C": sectionC, "D": sectionD, "E": sectionE, "F": sectionF,
		"G": sectionG, "H": sectionH, "I": sectionI, "J": sectionJ,
	}
	worst := map[string]float64{}
	for i, r := range readReferences(t) {
		if testing.Short() && i%9 != 0 {
			continue
		}
		t.Run(r.id, func(t *testing.T) {
			got := compute[r.section()](t, r)
			rel := math.Abs(got-r.value) / math.Abs(r.value)
			worst[r.section()] = max(worst[r.section()], rel)
			if !scalar.EqualWithinRel(got, r.value, r.tolerance()) && got != r.value {
				t.Errorf("%s %s = %.15g, want %.15g to %.0e; off by %.1e (%s)",
					r.name, r.quantity, got, r.value, r.tolerance(), rel, r.definition)
			}
		})
	}
	t.Logf("largest relative deviations: %v", worst)
}

// pick returns the quantity of an onset that a row is about.
func (r reference) pick(t *testing.T, o Onset) float64 {
	t.Helper()
	switch r.quantity {
	case "Ra_c", "Ra_neutral", "Ma_c", "Ra_T_stationary", "Ra_T_oscillatory", "Ra_c_osc":
		return o.Value
	case "k_c", "k_c_osc":
		return o.Wavenumber
	case "omega_c":
		return o.Frequency
	case "R2":
		return o.Curvature / 2
	case "theta_over_w at z=1/2":
		return o.Mode.Temperature(0.5) / o.Mode.Velocity(0.5)
	}
	t.Fatalf("%s: unknown quantity", r.id)
	return 0
}

// asked runs what the quantity of a row asks of a layer.
func (r reference) asked(t *testing.T, l Layer, search Search) float64 {
	t.Helper()
	s, err := NewSolver(l, nil)
	require.NoError(t, err)
	switch r.quantity {
	case "Ra_neutral":
		o, err := s.Neutral(search, r.number(t, "k"))
		require.NoError(t, err)
		return r.estimated(t, r.pick(t, o), o.Error.Value)
	case "sigma":
		g, err := s.Growth(r.rayleigh(t), r.number(t, "k"))
		require.NoError(t, err)
		return r.estimated(t, g.Rate, g.Error.Rate)
	case "sigma_max":
		g, err := s.Fastest(r.rayleigh(t))
		require.NoError(t, err)
		return r.estimated(t, g.Rate, g.Error.Rate)
	case "k_max":
		g, err := s.Fastest(r.rayleigh(t))
		require.NoError(t, err)
		return r.estimated(t, g.Wavenumber, g.Error.Wavenumber)
	}
	o, err := s.Find(search)
	require.NoError(t, err)
	require.Equal(t, r.has("(k_c = 0)") || r.has("(k_c=0)"), o.LongWave(), "%s: onset at zero wavenumber", r.id)
	switch r.quantity {
	case "Ra_c", "Ma_c", "Ra_T_stationary", "Ra_T_oscillatory", "Ra_c_osc":
		return r.estimated(t, o.Value, o.Error.Value)
	case "k_c", "k_c_osc":
		return r.estimated(t, o.Wavenumber, o.Error.Wavenumber)
	case "omega_c":
		return r.estimated(t, o.Frequency, o.Error.Frequency)
	}
	return r.pick(t, o)
}

// estimated asserts that an error estimate is one, up to the last digit of the
// reference, and that it is not worthless. It returns the value.
func (r reference) estimated(t *testing.T, got, estimate float64) float64 {
	t.Helper()
	lastDigit := 2 * math.Abs(r.value) * math.Pow(10, -float64(r.digits))
	require.LessOrEqual(t, math.Abs(got-r.value), estimate+lastDigit, "%s: error estimate %.1e", r.id, estimate)
	require.LessOrEqual(t, estimate, 1e-9*(1+math.Abs(r.value)), "%s: error estimate", r.id)
	return got
}

// prandtl reads "Pr=inf" or "Pr=7".
func (r reference) prandtl(t *testing.T) float64 {
	t.Helper()
	if r.has("Pr=inf") {
		return 0
	}
	return r.number(t, "Pr")
}

func sectionA(t *testing.T, r reference) float64 {
	walls := map[string][2]Wall{"A10": {Rigid, Rigid}, "A11": {Free, Free}, "A12": {Rigid, Free}}
	switch g := r.group(); {
	case g == "A01":
		return r.asked(t, Layer{}, Search{})
	case walls[g] != [2]Wall{} || g == "A11":
		return r.asked(t, Layer{Bottom: walls[g][0].FixedFlux(), Top: walls[g][1].FixedFlux()}, Search{})
	case g == "A15":
		return r.asked(t, r.layer(t), Search{Order: 1})
	}
	return r.asked(t, r.layer(t), Search{})
}

func sectionB(t *testing.T, r reference) float64 {
	l := Layer{Base: InternalHeating()}
	switch g := r.group(); {
	case g == "B08RR":
		l.Bottom, l.Top = Rigid.FixedFlux(), Rigid.FixedFlux()
		return r.asked(t, l, Search{})
	case g == "B08FF":
		l.Bottom, l.Top = Free.FixedFlux(), Free.FixedFlux()
		return r.asked(t, l, Search{})
	case g == "B08RF":
		l.Bottom, l.Top = Rigid.FixedFlux(), Free.FixedFlux()
		return r.asked(t, l, Search{})
	case r.has("f=z-1/2"):
		l.Base = InternalHeatingBetween()
	case r.has("f=1+h(z-1/2)"):
		l.Base = MixedHeating(r.number(t, "h"))
	case r.has("f=(1-r)+r z"):
		l.Base = MixedFlux(r.number(t, "r"))
	}
	l.Bottom, l.Top = r.boundary(t, "bottom"), r.boundary(t, "top")
	if r.quantity == "Ra_c_dT" {
		r.quantity, r.value = "Ra_c", 2*r.value
		return r.asked(t, l, Search{}) / 2
	}
	return r.asked(t, l, Search{})
}

func sectionC(t *testing.T, r reference) float64 {
	var l Layer
	switch {
	case r.has("of A02"):
		l = Layer{Bottom: Rigid, Top: Rigid}
	case !r.has("free-slip isothermal both"):
		l = r.layer(t)
	}
	if r.has("f=z") {
		l.Base = InternalHeating()
	}
	if r.has("Pr=") {
		l.Prandtl = r.prandtl(t)
	}
	order := 0
	if r.has(" n=") || r.has("mode n=") {
		order = int(r.number(t, "n")) - 1
	}
	if r.quantity == "sigma" && order > 0 {
		s, err := NewSolver(l, nil)
		require.NoError(t, err)
		all, err := s.Spectrum(r.number(t, "Ra"), r.number(t, "k"), 4)
		require.NoError(t, err)
		return nearestRate(all, r.value)
	}
	return r.asked(t, l, Search{Order: order})
}

// nearestRate returns the growth rate closest to one that is looked for: a
// vertical mode need not be the fastest.
func nearestRate(all []Growth, want float64) float64 {
	best := math.Inf(1)
	for _, g := range all {
		if math.Abs(g.Rate-want) < math.Abs(best-want) {
			best = g.Rate
		}
	}
	return best
}

func sectionD(t *testing.T, r reference) float64 {
	if r.group() == "D45FF" {
		return sublayer(t, r)
	}
	if r.quantity == "z_wmax" {
		o, err := Layer{Bottom: Rigid, Top: Rigid, Viscosity: Exponential(math.Log(1000), 0.5)}.Critical()
		require.NoError(t, err)
		return o.Mode.Peak()
	}
	l := r.layer(t)
	switch r.group() {
	case "D52":
		l.Viscosity = ViscosityLaw(func(z, _ float64) float64 { return 1 + 9*z })
		return r.asked(t, l, Search{})
	case "D54":
		l.Base = InternalHeating()
		l.Viscosity = Exponential(2*math.Log(100), 0.5)
		return r.asked(t, l, Search{})
	}
	contrast := r.number(t, "eta_top/eta_bottom")
	l.Viscosity = Exponential(math.Log(contrast), 0.5)
	switch r.quantity {
	case "Ra_c_bottom":
		l.Viscosity = Exponential(math.Log(contrast), 1)
		r.quantity = "Ra_c"
	case "sigma":
		l.Prandtl = r.prandtl(t)
	}
	return r.asked(t, l, Search{})
}

// sublayer extrapolates nothing: at γ = 50 the top of the layer is stiffer by 21
// orders of magnitude, and the limit is reached to exp(-2·0.38·50).
func sublayer(t *testing.T, r reference) float64 {
	const gamma = 50
	o, err := Layer{Viscosity: Exponential(gamma, 1)}.Critical()
	require.NoError(t, err)
	if r.quantity == "k_sub" {
		return o.Wavenumber / gamma
	}
	return o.Value / math.Pow(gamma, 4)
}

func sectionE(t *testing.T, r reference) float64 {
	l := Layer{Porous: Darcy}
	if r.has("bottom ") {
		l.Bottom, l.Top = r.boundary(t, "bottom"), r.boundary(t, "top")
	}
	if r.has("f=z") {
		l.Base = InternalHeating()
	}
	return r.asked(t, l, Search{})
}

func sectionF(t *testing.T, r reference) float64 {
	rigid := Layer{Bottom: Rigid, Top: Rigid}
	switch n, _ := strconv.Atoi(r.id[1:3]); n {
	case 1, 4:
		l := Layer{Taylor: r.taylor(t)}
		if n == 4 {
			l.Prandtl = r.number(t, "Pr")
		}
		return r.asked(t, l, Search{})
	case 2:
		rigid.Taylor = r.number(t, "Ta")
		return r.asked(t, rigid, Search{Branch: StationaryOnset})
	case 5:
		return r.asked(t, Layer{Magnetic: Magnetic{Chandrasekhar: r.number(t, "Q")}}, Search{})
	case 6:
		rigid.Magnetic.Chandrasekhar = r.number(t, "Q")
		return r.asked(t, rigid, Search{Branch: StationaryOnset})
	case 8:
		l := Layer{Bottom: Rigid, Top: Free.Robin(r.number(t, "Bi"))}
		return r.asked(t, l, Search{Number: MarangoniNumber})
	case 9:
		return r.asked(t, Layer{Bottom: Rigid.FixedFlux(), Top: Free.FixedFlux()}, Search{Number: MarangoniNumber})
	case 11:
		return r.asked(t, Layer{Bottom: Rigid, Top: Free.FixedFlux()}, Search{Number: MarangoniNumber, Rayleigh: 300})
	case 13:
		return r.doubleDiffusion(t)
	case 15:
		return r.fingers(t)
	}
	return r.stack(t)
}

// taylor reads "Ta=100", or "Ta=4 Omega^2 d^4/nu^2=100".
func (r reference) taylor(t *testing.T) float64 {
	t.Helper()
	r.definition = strings.ReplaceAll(r.definition, "4 Omega^2 d^4/nu^2=", "")
	return r.number(t, "Ta")
}

// rayleigh reads "Ra=1000", or "Ra_T=-1000".
func (r reference) rayleigh(t *testing.T) float64 {
	t.Helper()
	if r.has("Ra_T=") {
		return r.number(t, "Ra_T")
	}
	return r.number(t, "Ra")
}

func (r reference) doubleDiffusion(t *testing.T) float64 {
	l := Layer{Prandtl: r.number(t, "Pr"), Solute: Solute{Rayleigh: r.number(t, "Ra_S"), Diffusivity: r.number(t, "tau")}}
	if r.quantity == "Ra_T_stationary" {
		return r.asked(t, l, Search{Branch: StationaryOnset})
	}
	return r.asked(t, l, Search{})
}

// fingers computes salt fingers: the row is about one vertical mode.
func (r reference) fingers(t *testing.T) float64 {
	l := Layer{Prandtl: r.number(t, "Pr"), Solute: Solute{Rayleigh: r.number(t, "Ra_S"), Diffusivity: r.number(t, "tau")}}
	if r.quantity != "sigma" {
		return r.asked(t, l, Search{})
	}
	s, err := NewSolver(l, nil)
	require.NoError(t, err)
	all, err := s.Spectrum(r.rayleigh(t), r.number(t, "k"), 6)
	require.NoError(t, err)
	return nearestRate(all, r.value)
}

func (r reference) stack(t *testing.T) float64 {
	walls := map[bool]Wall{true: Rigid, false: Free}
	z := r.number(t, "interface z")
	s := Stack{
		Bottom: walls[r.has("bottom no-slip")], Top: walls[r.has("top no-slip")], Gravity: 1,
		Layers: []Stratum{
			{Thickness: z, Density: 0, Viscosity: r.number(t, "eta_lower")},
			{Thickness: 1 - z, Density: 1, Viscosity: r.number(t, "eta_upper")},
		},
	}
	if r.quantity == "sigma" {
		g, err := s.Growth(r.number(t, "k"))
		require.NoError(t, err)
		require.Len(t, g, 1)
		return g[0].Rate
	}
	g, err := s.Fastest()
	require.NoError(t, err)
	if r.quantity == "k_max" {
		return g.Wavenumber
	}
	return g.Rate
}

func sectionG(t *testing.T, r reference) float64 {
	m := regexp.MustCompile(`A=(sqrt)?([0-9.]+)`).FindStringSubmatch(r.definition)
	aspect, err := strconv.ParseFloat(m[2], 64)
	require.NoError(t, err)
	if m[1] != "" {
		aspect = math.Sqrt(aspect)
	}
	var l Layer
	switch {
	case r.has("top/bottom no-slip isothermal"):
		l = Layer{Bottom: Rigid, Top: Rigid}
	case !r.has("top/bottom free-slip isothermal"):
		l = r.layer(t)
	}
	first, second, err := l.InBox(Box{Aspect: aspect})
	require.NoError(t, err)
	require.Greater(t, second.Rayleigh, first.Rayleigh)
	if r.quantity == "n_rolls" {
		return float64(first.Rolls)
	}
	return first.Rayleigh
}

func sectionH(t *testing.T, r reference) float64 {
	if g := r.group(); strings.HasPrefix(g, "H05") || strings.HasPrefix(g, "H06") {
		h := map[string]CoolingHalfSpace{
			"H05darcyF": {Porous: Darcy}, "H05stokesF": {}, "H05stokesR": {Top: Rigid},
			"H06": {Porous: Darcy, Measure: FrozenBase},
		}[g]
		o, err := h.Critical()
		require.NoError(t, err)
		if r.quantity == "k_delta_c" {
			return o.Wavenumber
		}
		return o.R
	}
	l := r.layer(t)
	l.Base = CoolingFromAbove(r.number(t, "t"))
	return r.asked(t, l, Search{})
}

func sectionI(t *testing.T, r reference) float64 {
	var l Layer
	if r.group() != "I01" {
		l = map[string]Layer{"RR": {Bottom: Rigid, Top: Rigid}, "RF": {Bottom: Rigid}}[r.id[3:5]]
	}
	if r.has("Pr=") {
		l.Prandtl = r.prandtl(t)
	}
	s, err := NewSolver(l, nil)
	require.NoError(t, err)
	if r.quantity == "Nu_slope" {
		slope, _, err := s.NusseltSlope()
		require.NoError(t, err)
		return slope
	}
	n, err := s.NearOnset()
	require.NoError(t, err)
	if r.quantity == "tau0" {
		return n.Time
	}
	return n.Coherence
}

func sectionJ(t *testing.T, r reference) float64 {
	walls := map[bool]Wall{true: Rigid, false: Free}
	var s Shell
	if strings.HasPrefix(r.id, "J01") {
		s.Outer = walls[r.has("no-slip")]
	} else {
		m := regexp.MustCompile(`eta([0-9.]+)p0`).FindStringSubmatch(r.id)
		var err error
		s.RadiusRatio, err = strconv.ParseFloat(m[1], 64)
		require.NoError(t, err)
		s.Inner, s.Outer = walls[r.id[3] == 'R'], walls[r.id[4] == 'R']
	}
	if r.quantity == "l_c" {
		o, err := s.Critical()
		require.NoError(t, err)
		return float64(o.Degree)
	}
	m := regexp.MustCompile(`l=([0-9]+)`).FindStringSubmatch(r.name)
	degree, err := strconv.Atoi(m[1])
	require.NoError(t, err)
	o, err := s.Neutral(degree)
	require.NoError(t, err)
	return o.Rayleigh
}
