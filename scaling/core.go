package scaling

import (
	"math"
	"sync"

	"example.org/overturn/scaling/internal/rolls"
)

// Core names a model of the flow in a roll outside its boundary layers.
type Core int

const (
	// SineCore is ψ = ψ₀ sin(πx/a) sin(πz) between free walls: the pattern at
	// onset, kept at any vigour. All of its results are in closed form.
	SineCore Core = iota

	// ViscousCore is the flow that steady rolls of infinite Prandtl number
	// between free walls approach as Ra → ∞: ∇⁴ψ = 0, driven by the vorticity
	// of its plumes (Roberts 1979; Olson & Corcos 1980; Jimenez & Zufiria 1987).
	ViscousCore

	// InviscidCore is the flow that steady rolls of any finite Prandtl number
	// between free walls approach as Ra → ∞: uniform vorticity (Chini & Cox
	// 2009). At a given Ra, large Prandtl numbers are nearer to ViscousCore:
	// the two limits do not commute.
	InviscidCore
)

// String returns the name of the core.
func (c Core) String() string { return name(int(c), "sine core", "viscous core", "inviscid core") }

// Range of cell widths that the cores are made for.
const (
	MinCellWidth      = 0.1
	MaxCellWidth      = 10
	MaxRigidCellWidth = 2.5 // wider cells have counter-rotating eddies at rigid walls
)

// circulation is a core flow of unit amplitude in a cell of width a and depth
// one: ∫|u| over a plate, ∫|w| over a plume, mean squares of vorticity and speed.
type circulation struct {
	plate, plume float64
	dissipation  float64 // ⟨ω²⟩
	kinetic      float64 // ⟨|u|²⟩
}

// circulation returns the core flow; the viscous one is expensive and is
// remembered.
func (c Core) circulation(a float64) (circulation, error) {
	switch c {
	case ViscousCore:
		core, err := freeCores.at(a)
		// |ω w| = 1 along the plumes, so that ⟨ω²⟩ = ∮ ω u ds/a = 2/a.
		return circulation{plate: core.PlateTime, plume: core.PlumeTime, dissipation: 2 / a, kinetic: core.MeanSquareSpeed}, err
	case InviscidCore:
		core := rolls.Inviscid(a)
		// ω = 1 and ⟨|u|²⟩ = ⟨ψω⟩
		return circulation{plate: core.PlateTime, plume: core.PlumeTime, dissipation: 1, kinetic: core.MeanStream}, nil
	default:
		k2 := math.Pi * math.Pi * (1 + 1/(a*a))
		return circulation{plate: 2 * a, plume: 2 / a, dissipation: k2 * k2 / 4, kinetic: k2 / 4}, nil
	}
}

// Exchange returns the heat Q(r) that the layer around a steady roll picks up
// from a plate, per root of the Péclet number along the plate and half of the
// temperature drop on either side of the core. The plume ratio r is the
// integral of the speed along a plume over that along a plate: Q falls from
// 0.858 at r = 0, where the layer keeps all of its heat from plate to plate, to
// 1/√π at r = ∞, half-space cooling. r must be at least 0.005; +Inf is allowed.
//
// The problem is that of Roberts (1979), Jimenez & Zufiria (1987) and Chini &
// Cox (2009); computed here, to fourteen digits.
func Exchange(r float64) (float64, error) {
	q, err := exchanges.at(r)
	if err != nil {
		return 0, &FieldError{Package: string(pkg), Field: "plume ratio", Value: formatFloat(r), Want: ">= 0.005", Err: err}
	}
	return q, nil
}

// Results that take milliseconds are kept: a Monte Carlo study asks for the
// same cell ten thousand times.
var (
	exchanges  = memory[float64]{compute: rolls.HeatExchange}
	freeCores  = memory[rolls.Core]{compute: rolls.Free}
	rigidCores = memory[rolls.Core]{compute: rolls.Rigid}
)

// memory remembers a function of one number. It is safe for concurrent use, and
// what it returns does not depend on what it remembers.
type memory[T any] struct {
	compute func(float64) (T, error)

	mu    sync.RWMutex
	known map[float64]T
}

// maxKnown bounds the memory; a full one is emptied.
const maxKnown = 4096

func (m *memory[T]) at(x float64) (T, error) {
	m.mu.RLock()
	y, ok := m.known[x]
	m.mu.RUnlock()
	if ok {
		return y, nil
	}
	y, err := m.compute(x)
	if err != nil {
		return y, err
	}
	m.mu.Lock()
	defer m.mu.Unlock()
	if m.known == nil || len(m.known) >= maxKnown {
		m.known = make(map[float64]T)
	}
	m.known[x] = y
	return y, nil
}
