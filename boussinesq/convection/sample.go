package convection

import (
	"fmt"
	"iter"
	"math"

	"example.org/overturn/heat"
)

// Diagnostics are the numbers that describe one state of a layer. They are in
// the units of the problem; the Nusselt numbers have none.
type Diagnostics struct {
	// NuTop and NuBottom are the mean heat flux conducted upward through the
	// wall over that of a layer at rest between the mean temperatures of bottom
	// and top. Infinite or NaN where these two are equal, to rounding.
	NuTop, NuBottom float64

	// HeatFlowTop and HeatFlowBottom are the mean heat fluxes conducted upward
	// through the walls, per area and time.
	HeatFlowTop, HeatFlowBottom float64

	// RMSVelocity is the root mean square speed over the box, SurfaceVelocity
	// that along the top wall.
	RMSVelocity, SurfaceVelocity float64

	// MeanTemperature is the mean over the box.
	MeanTemperature float64

	// CornerGradients are −∂T/∂z, not scaled further, at the corners upper
	// left, upper right, lower right, lower left: q1 to q4 of Blankenbach et al.
	// (1989) for a cell with its upwelling at the left.
	CornerGradients [4]float64

	// Dissipation is the viscous dissipation in the box and BuoyancyWork the
	// work of buoyancy, both per time and length. They are equal, to the
	// tolerance of the Stokes solve, unless walls do work.
	Dissipation, BuoyancyWork float64
}

// All walks the diagnostics by name, in a fixed order.
func (d Diagnostics) All() iter.Seq2[string, float64] {
	return func(yield func(string, float64) bool) {
		_ = yield("NuTop", d.NuTop) &&
			yield("NuBottom", d.NuBottom) &&
			yield("HeatFlowTop", d.HeatFlowTop) &&
			yield("HeatFlowBottom", d.HeatFlowBottom) &&
			yield("RMSVelocity", d.RMSVelocity) &&
			yield("SurfaceVelocity", d.SurfaceVelocity) &&
			yield("MeanTemperature", d.MeanTemperature) &&
			yield("CornerGradient1", d.CornerGradients[0]) &&
			yield("CornerGradient2", d.CornerGradients[1]) &&
			yield("CornerGradient3", d.CornerGradients[2]) &&
			yield("CornerGradient4", d.CornerGradients[3]) &&
			yield("Dissipation", d.Dissipation) &&
			yield("BuoyancyWork", d.BuoyancyWork)
	}
}

// WorkError returns the relative difference between dissipation and the work
// of buoyancy, 0 where nothing moves. It measures an error only between walls
// that do no work: at rest along no slip, uncrossed.
func (d Diagnostics) WorkError() float64 {
	size := max(math.Abs(d.Dissipation), math.Abs(d.BuoyancyWork))
	if size == 0 {
		return 0
	}
	return math.Abs(d.Dissipation-d.BuoyancyWork) / size
}

// A Stop says why a run stopped.
type Stop int

// Reasons to stop.
const (
	Running       Stop = iota // it did not
	AtEndTime                 // Settings.EndTime was reached
	AtMaxSteps                // Settings.MaxSteps were taken
	AtSteadyState             // Sample.Change fell to Settings.SteadyTolerance
)

// String returns the reason in words.
func (s Stop) String() string {
	switch s {
	case Running:
		return "running"
	case AtEndTime:
		return "end time reached"
	case AtMaxSteps:
		return "steps used up"
	case AtSteadyState:
		return "steady"
	}
	return fmt.Sprintf("Stop(%d)", int(s))
}

// A Sample is the state of a run at one time.
type Sample struct {
	Diagnostics

	Step     int     // steps taken since time zero
	Time     float64 // of this state
	TimeStep float64 // length of the step that led to it

	// Change is the root mean square of ∂T/∂t over the last step, in
	// temperature ranges per diffusion time of the layer: what has to fall for
	// a state to be called steady. NaN before the first step.
	Change float64

	// HeatBudgetError is what the heat content changed by in the last step
	// less what walls and heating supplied, relative to the heat content or the
	// heat exchanged, whichever is larger: rounding.
	HeatBudgetError float64

	// StokesIterations of the last solve.
	StokesIterations int

	// Stop says whether this is the last sample, and why.
	Stop Stop
}

// String gives the sample in one line.
func (s Sample) String() string {
	return fmt.Sprintf("step %d, time %.6g: Nu %.5f (top) %.5f (bottom), v_rms %.6g, mean T %.5f, change %.2e",
		s.Step, s.Time, s.NuTop, s.NuBottom, s.RMSVelocity, s.MeanTemperature, s.Change)
}

func (m *Model) sample(reason Stop) (Sample, error) {
	d, err := m.sampler.diagnose(m.temperature, m.flow)
	return Sample{
		Diagnostics:      d,
		Step:             m.steps,
		Time:             m.time,
		TimeStep:         m.last,
		Change:           m.change,
		HeatBudgetError:  m.budget,
		StokesIterations: m.iterations,
		Stop:             reason,
	}, err
}

// budgetError compares the change of the heat content with the report of the
// step.
func budgetError(before, after float64, rep *heat.Report) float64 {
	size := max(math.Abs(before), math.Abs(after))
	for s := range rep.Conducted {
		size = max(size, rep.Step*math.Abs(rep.Conducted[s]))
	}
	if size == 0 {
		return 0
	}
	return math.Abs(after-before-rep.Step*rep.Power()) / size
}
