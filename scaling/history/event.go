package history

import (
	"cmp"
	"math"
	"slices"

	"example.org/overturn/scaling/internal/ode"
	"example.org/overturn/scaling/internal/root"
	"example.org/overturn/units"
)

// Direction says which crossings of zero an event looks for, in the direction of
// integration.
type Direction int

// Directions.
const (
	Either Direction = iota
	Rising
	Falling
)

// After says what happens after an event.
type After int

// Actions.
const (
	Continue After = iota
	Stop           // the run ends at the event
)

// Event is something to look for during a run: a zero of Value. Zeros are found
// by changes of sign between a few points within each step, and then to round-off
// on the dense output. Value must not change anything.
type Event struct {
	Name      string
	Value     func(Sample) float64
	Direction Direction // default [Either]
	After     After     // default [Continue]
}

// Occurrence is an event that took place.
type Occurrence struct {
	Event string
	Time  units.Time
}

// Events returns the events that took place, in the order of integration.
func (h *History) Events() []Occurrence { return append([]Occurrence(nil), h.events...) }

// StopsConvecting is the event that the law of a reservoir's loss falls to
// conduction, Nu = 1. The loss must be a [Describer].
func StopsConvecting(reservoir int) Event {
	return Event{
		Name:      "convection stops",
		Value:     func(s Sample) float64 { return s.Layer[reservoir].Nusselt - 1 },
		Direction: Falling,
	}
}

// CoolsTo is the event that a reservoir cools to a temperature.
func CoolsTo(reservoir int, t units.Temperature) Event {
	return Event{
		Name:      "cools to " + t.String(),
		Value:     func(s Sample) float64 { return float64(s.Temperature[reservoir].Sub(t)) },
		Direction: Falling,
	}
}

// watch looks for events on the path of a run, step by step.
type watch struct {
	h    *History
	path *ode.Path
	last []float64 // values at the end of the last step
	y    []float64
}

func newWatch(h *History, path *ode.Path) *watch {
	return &watch{h: h, path: path, y: make([]float64, len(h.model.capacity))}
}

// watchPoints is the number of points within a step that are looked at.
const watchPoints = 4

// step looks for events in the last step and reports whether one of them stops
// the run, which it then ends there.
func (w *watch) step() (stop bool) {
	events := w.h.model.settings.Events
	if len(events) == 0 {
		return false
	}
	times := w.path.Times()
	a, b := times[len(times)-2], times[len(times)-1]
	if w.last == nil {
		w.last = make([]float64, len(events))
		for i, e := range events {
			w.last[i] = w.value(e, a)
		}
	}
	for k := range watchPoints {
		t0, t1 := a+(b-a)*float64(k)/watchPoints, a+(b-a)*float64(k+1)/watchPoints
		if k == watchPoints-1 {
			t1 = b
		}
		if w.between(events, t0, t1) {
			return true
		}
	}
	return false
}

// between looks for events from t0 to t1 and records them in order.
func (w *watch) between(events []Event, t0, t1 float64) (stop bool) {
	var found []Occurrence
	end := math.NaN() // of the run, if an event stops it
	for i, e := range events {
		before, after := w.last[i], w.value(e, t1)
		w.last[i] = after
		if !crosses(before, after, e.Direction) {
			continue
		}
		t, err := root.Find(func(t float64) float64 { return w.value(e, t) }, t0, t1, 0)
		if err != nil {
			continue // a value that is not a number within the step
		}
		found = append(found, Occurrence{e.Name, units.Time(t)})
		if e.After == Stop && !(math.Abs(t-t0) >= math.Abs(end-t0)) {
			end = t
		}
	}
	slices.SortStableFunc(found, func(a, b Occurrence) int {
		return cmp.Compare(math.Abs(float64(a.Time)-t0), math.Abs(float64(b.Time)-t0))
	})
	for _, o := range found {
		if !(math.Abs(float64(o.Time)-t0) > math.Abs(end-t0)) {
			w.h.events = append(w.h.events, o)
		}
	}
	if math.IsNaN(end) {
		return false
	}
	w.h.to = units.Time(end)
	return true
}

// crosses reports a change of sign. Arriving at zero is one, leaving it is not,
// so that a zero at the end of a stretch counts once.
func crosses(before, after float64, d Direction) bool {
	if !(before < 0 && after >= 0 || before > 0 && after <= 0) {
		return false
	}
	return d == Either || (d == Rising) == (before < 0)
}

func (w *watch) value(e Event, t float64) float64 {
	if err := w.path.At(w.y, nil, t); err != nil {
		return math.NaN()
	}
	s, err := w.h.model.sample(units.Time(t), w.y)
	if err != nil {
		return math.NaN()
	}
	return e.Value(s)
}
