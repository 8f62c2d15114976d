package convection

import (
	"bytes"
	"context"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"example.org/overturn/stokes"
)

// What was saved of the flow is that of another problem: it must be found anew
// before anything is said about it.
func TestResumeWithAnotherProblemFindsItsFlow(t *testing.T) {
	p := variable(square(t, 12))
	m := run(t, p, &Settings{MaxSteps: 5})
	var file bytes.Buffer
	require.NoError(t, m.Save(&file))
	saved := file.Bytes()
	for name, change := range map[string]func(*Problem){
		"Rayleigh":  func(p *Problem) { p.Rayleigh *= 3 },
		"Viscosity": func(p *Problem) { p.Viscosity = nil },
		"Walls":     func(p *Problem) { p.Walls.Bottom = stokes.FreeSlip },
		"velocity of a wall": func(p *Problem) {
			p.Walls.Top = stokes.NoSlip.Moving(func(float64) float64 { return 7 })
		},
	} {
		other := p
		change(&other)
		resumed, err := Resume(bytes.NewReader(saved), other, &Settings{MaxSteps: 3})
		require.NoError(t, err)
		assert.Equal(t, m.Temperature().Values, resumed.Temperature().Values)
		fresh, err := New(other, &Settings{MaxSteps: 3})
		require.NoError(t, err)
		require.NoError(t, fresh.SetTemperature(m.Temperature()))
		a, err := resumed.Run(context.Background())
		require.NoError(t, err)
		b, err := fresh.Run(context.Background())
		require.NoError(t, err)
		assert.InEpsilon(t, b.RMSVelocity, a.RMSVelocity, 1e-6, name)
		assert.InEpsilon(t, m.Time()+b.Time, a.Time, 1e-6, name)
		assert.Equal(t, 8, a.Step)
	}
}

// To save is not to touch.
func TestSavingDoesNotChangeTheRun(t *testing.T) {
	p := variable(square(t, 12))
	whole := run(t, p, &Settings{MaxSteps: 12})
	m := run(t, p, &Settings{MaxSteps: 6})
	var file bytes.Buffer
	require.NoError(t, m.Save(&file))
	_, err := m.Run(context.Background())
	require.NoError(t, err)
	assert.Equal(t, whole.Temperature().Values, m.Temperature().Values)
}
