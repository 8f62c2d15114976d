package convection

import (
	"bufio"
	"bytes"
	"encoding/binary"
	"errors"
	"fmt"
	"hash/crc32"
	"io"
	"math"

	"example.org/overturn/stokes/staggered"
)

// ErrCheckpoint reports data that is not a checkpoint, is damaged or was written
// for another grid.
var ErrCheckpoint = errors.New("bad checkpoint")

// checkpointMagic begins every file; its last byte counts versions.
var checkpointMagic = []byte("overturn convection checkpoint 1\n")

// A checkpointHead is what a model knows besides its arrays.
type checkpointHead struct {
	NX, NZ              uint64
	Steps               int64
	Time, Last, Limit   float64
	Iterations          int64
	Solved, HasPrevious uint8
	Balance             uint32 // see Model.balance
}

// Save writes the state of the run: a model that [Resume] makes from it
// continues bit for bit. The problem and the settings are not written, as a
// viscosity law is code.
func (m *Model) Save(w io.Writer) error {
	balance, err := m.balance()
	if err != nil {
		return err
	}
	var b bytes.Buffer
	b.Write(checkpointMagic)
	flag := func(v bool) uint8 {
		if v {
			return 1
		}
		return 0
	}
	nx, nz := m.sys.Grid.Cells()
	head := checkpointHead{
		NX: uint64(nx), NZ: uint64(nz), Steps: int64(m.steps),
		Time: m.time, Last: m.last, Limit: m.limit,
		Iterations: int64(m.iterations), Solved: flag(m.solved), HasPrevious: flag(m.hasPrevious),
		Balance: balance,
	}
	// Writing to a bytes.Buffer cannot fail.
	_ = binary.Write(&b, binary.LittleEndian, head)
	for _, a := range m.checkpointArrays() {
		_ = binary.Write(&b, binary.LittleEndian, a)
	}
	_ = binary.Write(&b, binary.LittleEndian, crc32.ChecksumIEEE(b.Bytes()))
	if _, err := w.Write(b.Bytes()); err != nil {
		return fmt.Errorf("convection: checkpoint: %w", err)
	}
	return nil
}

// balance returns a checksum of the stresses and the buoyancy that the model
// holds for balanced, 0 where its flow is not solved for. It is another one
// under another Rayleigh number, viscosity or wall.
func (m *Model) balance() (uint32, error) {
	if !m.solved {
		return 0, nil
	}
	if m.sys.viscosity != nil {
		m.sys.viscosityTo(m.sys.viscosity, m.temperature)
	}
	stresses := staggered.NewVector(m.sys.Grid)
	if err := m.sys.stokes.ApplyTo(stresses, m.flow, m.sys.viscosity); err != nil {
		return 0, fmt.Errorf("convection: checkpoint: %w", err)
	}
	m.sys.buoyancy.FillVertical(m.temperature, m.sys.Rayleigh)
	sum := crc32.NewIEEE()
	for _, a := range [][]float64{stresses.X, stresses.Z, m.sys.buoyancy.Z} {
		_ = binary.Write(sum, binary.LittleEndian, a) // cannot fail
	}
	return sum.Sum32(), nil
}

// checkpointArrays lists the arrays of a checkpoint in order; the first two are
// the grid's.
func (m *Model) checkpointArrays() [][]float64 {
	g := m.sys.Grid
	return [][]float64{
		g.XNodes(), g.ZNodes(), m.temperature.Values,
		m.flow.VX, m.flow.VZ, m.flow.P, m.previous.VX, m.previous.VZ, m.previous.P,
	}
}

// Resume returns a model in the state that [Model.Save] wrote. The problem must
// have the same grid; with the same problem and settings too, the run continues
// as if it had never stopped. Where another Rayleigh number, viscosity or wall
// makes the saved flow wrong, temperature and time are kept and the flow is
// found anew. Damaged data is an error that wraps [ErrCheckpoint].
func Resume(r io.Reader, p Problem, s *Settings) (*Model, error) {
	m, err := newModel(p, s)
	if err != nil {
		return nil, err
	}
	sum := crc32.NewIEEE()
	in := io.TeeReader(bufio.NewReader(r), sum)
	magic := make([]byte, len(checkpointMagic))
	if _, err := io.ReadFull(in, magic); err != nil || !bytes.Equal(magic, checkpointMagic) {
		return nil, fmt.Errorf("convection: %w: it does not begin as one", ErrCheckpoint)
	}
	var head checkpointHead
	if err := binary.Read(in, binary.LittleEndian, &head); err != nil {
		return nil, fmt.Errorf("convection: %w: %w", ErrCheckpoint, err)
	}
	if err := m.readArrays(in, head); err != nil {
		return nil, err
	}
	want := sum.Sum32()
	var got uint32
	if err := binary.Read(in, binary.LittleEndian, &got); err != nil || got != want {
		return nil, fmt.Errorf("convection: %w: checksum does not fit", ErrCheckpoint)
	}
	if err := checkTemperature(m.temperature); err != nil {
		return nil, fmt.Errorf("%w: %w", ErrCheckpoint, err)
	}
	m.steps, m.iterations = int(head.Steps), int(head.Iterations)
	m.time, m.last, m.limit = head.Time, head.Last, head.Limit
	m.solved, m.hasPrevious = head.Solved != 0, head.HasPrevious != 0
	balance, err := m.balance()
	if err != nil {
		return nil, err
	}
	if balance != head.Balance {
		m.restart()
	}
	return m, nil
}

// readArrays fills the model's arrays once it is clear that they fit.
func (m *Model) readArrays(in io.Reader, head checkpointHead) error {
	g := m.sys.Grid
	if head.NX != uint64(g.NX()) || head.NZ != uint64(g.NZ()) {
		return fmt.Errorf("convection: %w: it holds %dx%d cells, want %dx%d", ErrCheckpoint, head.NX, head.NZ, g.NX(), g.NZ())
	}
	x, z := make([]float64, g.NX()+1), make([]float64, g.NZ()+1)
	arrays := m.checkpointArrays()
	arrays[0], arrays[1] = x, z
	for _, a := range arrays {
		if err := binary.Read(in, binary.LittleEndian, a); err != nil {
			return fmt.Errorf("convection: %w: %w", ErrCheckpoint, err)
		}
	}
	if h, err := staggered.NewGrid(x, z); err != nil || !h.Equal(g) {
		return fmt.Errorf("convection: %w: it was written for other cell edges", ErrCheckpoint)
	}
	if math.IsNaN(head.Time) {
		return fmt.Errorf("convection: %w: its time is NaN", ErrCheckpoint)
	}
	return nil
}
