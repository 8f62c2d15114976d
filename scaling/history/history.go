package history

import (
	"math"

	"example.org/overturn/scaling/internal/check"
	"example.org/overturn/scaling/internal/ode"
	"example.org/overturn/units"
)

// History is the outcome of a run: it can be read at any time between its start
// and its end. It is not changed by its methods and is safe for concurrent use.
type History struct {
	model    *Model
	from, to units.Time
	path     ode.Path
	events   []Occurrence

	// Counts of the work done: steps, and evaluations of the fluxes.
	Steps, Evaluations int
}

// Span returns the start and the end of the run, in the order of integration.
// An event may have ended it before the time asked for.
func (h *History) Span() (from, to units.Time) { return h.from, h.to }

// Sample is a history at one time. Slices hold one value a reservoir, from the
// deepest up.
type Sample struct {
	Time        units.Time
	Temperature []units.Temperature
	Flux        []units.HeatFlux // through the top
	Flow        []units.Power    // Flux times the area of the top
	Heating     []units.Power    // made inside

	// Urey is the Urey ratio of the body, heat made over heat lost at the
	// surface.
	Urey float64

	// Cooling is -dT/dt, in kelvin per billion years.
	Cooling []units.TemperatureDifference

	// Layer describes the layers at the tops of reservoirs whose loss is a
	// [Describer]; it is zero for others.
	Layer []Layer
}

// At returns the history at a time within its span.
func (h *History) At(t units.Time) (Sample, error) {
	low, high := min(h.from, h.to), max(h.from, h.to)
	if err := check.Within(pkg, "time", t, low, high); err != nil {
		return Sample{}, err
	}
	y := make([]float64, len(h.model.capacity))
	if err := h.path.At(y, nil, float64(t)); err != nil {
		return Sample{}, err
	}
	return h.model.sample(t, y)
}

// Temperatures fills dst, one value a reservoir, with the temperatures at a time
// and returns it; a nil dst is allocated. It is the quick part of [History.At].
func (h *History) Temperatures(dst []units.Temperature, t units.Time) ([]units.Temperature, error) {
	low, high := min(h.from, h.to), max(h.from, h.to)
	if err := check.Within(pkg, "time", t, low, high); err != nil {
		return dst, err
	}
	var room [4]float64
	y := room[:]
	n := len(h.model.capacity)
	if n > len(room) {
		y = make([]float64, n)
	}
	if err := h.path.At(y[:n], nil, float64(t)); err != nil {
		return dst, err
	}
	dst = dst[:0]
	for _, x := range y[:n] {
		dst = append(dst, units.Temperature(x))
	}
	return dst, nil
}

// sample derives everything from the temperatures.
func (m *Model) sample(t units.Time, y []float64) (Sample, error) {
	n := len(y)
	s := Sample{
		Time: t, Temperature: make([]units.Temperature, n), Flux: make([]units.HeatFlux, n), Flow: make([]units.Power, n),
		Heating: make([]units.Power, n), Cooling: make([]units.TemperatureDifference, n), Layer: make([]Layer, n),
	}
	for i, x := range y {
		s.Temperature[i] = units.Temperature(x)
	}
	made, below := 0.0, 0.0
	for i := range m.body.Reservoirs {
		r := &m.body.Reservoirs[i]
		above := m.body.Surface
		if i+1 < n {
			above = s.Temperature[i+1]
		}
		s.Flux[i] = r.Loss.Flux(s.Temperature[i], above)
		s.Flow[i] = units.Power(float64(r.Area) * float64(s.Flux[i]))
		if r.Heating != nil {
			s.Heating[i] = units.Power(float64(r.Mass) * float64(r.Heating.At(t)))
		}
		if d, ok := r.Loss.(Describer); ok {
			s.Layer[i] = d.Describe(s.Temperature[i], above)
		}
		rate := (float64(s.Heating[i]) + below - float64(s.Flow[i])) / m.capacity[i]
		s.Cooling[i] = units.TemperatureDifference(-rate * float64(units.Gigayear))
		below = float64(s.Flow[i])
		made += float64(s.Heating[i])
	}
	if below != 0 {
		s.Urey = made / below
	}
	if _, err := check.Result(pkg, "sample", float64(s.Flow[n-1])+s.Urey); err != nil {
		return Sample{}, err
	}
	return s, nil
}

// Budget says where the heat went between two times.
type Budget struct {
	From, To units.Time

	// One value a reservoir: Stored is the change of heat content, Made what was
	// generated, Lost what went through the top; what came in from below is what
	// the reservoir below lost.
	Stored, Made, Lost []units.Energy

	// Residual is what the body as a whole misses, stored - made + lost at the
	// surface, and Relative that over the largest of the three.
	Residual units.Energy
	Relative float64
}

// Budget returns the budget of the whole run.
func (h *History) Budget() (Budget, error) { return h.BudgetBetween(h.from, h.to) }

// BudgetBetween returns the budget between two times within the span. Heating is
// integrated exactly, losses by the integrator, and temperatures are what they
// are: the three need not agree, and the residual tells how well they do.
func (h *History) BudgetBetween(from, to units.Time) (Budget, error) {
	low, high := min(h.from, h.to), max(h.from, h.to)
	if err := check.First(check.Within(pkg, "from", from, low, high), check.Within(pkg, "to", to, low, high)); err != nil {
		return Budget{}, err
	}
	n := len(h.model.capacity)
	y0, y1, q0, q1 := make([]float64, n), make([]float64, n), make([]float64, n), make([]float64, n)
	if err := check.First(h.path.At(y0, q0, float64(from)), h.path.At(y1, q1, float64(to))); err != nil {
		return Budget{}, err
	}
	b := Budget{From: from, To: to, Stored: make([]units.Energy, n), Made: make([]units.Energy, n), Lost: make([]units.Energy, n)}
	var stored, made float64
	for i, r := range h.model.body.Reservoirs {
		b.Stored[i] = units.Energy(h.model.capacity[i] * (y1[i] - y0[i]))
		b.Lost[i] = units.Energy(q1[i] - q0[i])
		if r.Heating != nil {
			b.Made[i] = units.Energy(float64(r.Mass) * float64(r.Heating.Energy(from, to)))
		}
		stored += float64(b.Stored[i])
		made += float64(b.Made[i])
	}
	lost := float64(b.Lost[n-1])
	b.Residual = units.Energy(stored - made + lost)
	if size := max(math.Abs(stored), math.Abs(made), math.Abs(lost)); size > 0 {
		b.Relative = math.Abs(float64(b.Residual)) / size
	}
	return b, nil
}
