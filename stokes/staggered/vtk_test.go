package staggered_test

import (
	"bytes"
	"encoding/base64"
	"encoding/binary"
	"encoding/xml"
	"errors"
	"io"
	"math"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"example.org/overturn/stokes/staggered"
)

// vtkFile is what a reader of the format must find.
type vtkFile struct {
	Type   string `xml:"type,attr"`
	Header string `xml:"header_type,attr"`
	Order  string `xml:"byte_order,attr"`
	Grid   struct {
		WholeExtent string `xml:",attr"`
		Piece       struct {
			Extent      string     `xml:",attr"`
			Coordinates []vtkArray `xml:"Coordinates>DataArray"`
			Cells       []vtkArray `xml:"CellData>DataArray"`
			Points      []vtkArray `xml:"PointData>DataArray"`
		}
	} `xml:"RectilinearGrid"`
}

type vtkArray struct {
	Name       string `xml:",attr"`
	Type       string `xml:"type,attr"`
	Format     string `xml:"format,attr"`
	Components int    `xml:"NumberOfComponents,attr"`
	Text       string `xml:",chardata"`
}

func (a vtkArray) numbers(t *testing.T) []float64 {
	t.Helper()
	require.Equal(t, "Float64", a.Type)
	require.Equal(t, "binary", a.Format)
	raw, err := base64.StdEncoding.DecodeString(strings.TrimSpace(a.Text))
	require.NoError(t, err)
	require.EqualValues(t, len(raw)-8, binary.LittleEndian.Uint64(raw))
	values := make([]float64, (len(raw)-8)/8)
	for j := range values {
		values[j] = math.Float64frombits(binary.LittleEndian.Uint64(raw[8+8*j:]))
	}
	return values
}

func TestWriteVTKKeepsEveryBit(t *testing.T) {
	g := graded(t, 3, 2)
	s, n, f := staggered.NewScalar(g), staggered.NewNodal(g), staggered.NewFlow(g)
	s.Fill(func(x, z float64) float64 { return math.Sin(x) / (1 + z) })
	n.Fill(func(x, z float64) float64 { return x - z })
	f.FillVelocity(func(x, _ float64) float64 { return x }, func(_, z float64) float64 { return 10 * z })
	f.P[4] = 8

	var b bytes.Buffer
	require.NoError(t, staggered.WriteVTK(&b, g,
		staggered.Field{Name: "a<b", Data: s}, staggered.Field{Name: "psi", Data: n}, staggered.Field{Name: "v", Data: f}))
	var file vtkFile
	require.NoError(t, xml.Unmarshal(b.Bytes(), &file))
	assert.Equal(t, "RectilinearGrid", file.Type)
	assert.Equal(t, "UInt64", file.Header)
	assert.Equal(t, "LittleEndian", file.Order)
	assert.Equal(t, "0 3 0 0 0 2", file.Grid.WholeExtent)
	piece := file.Grid.Piece
	assert.Equal(t, "0 3 0 0 0 2", piece.Extent)
	require.Len(t, piece.Coordinates, 3)
	assert.Equal(t, g.XNodes(), piece.Coordinates[0].numbers(t))
	assert.Equal(t, []float64{0}, piece.Coordinates[1].numbers(t))
	assert.Equal(t, g.ZNodes(), piece.Coordinates[2].numbers(t))
	require.Len(t, piece.Cells, 3)
	assert.Equal(t, "a<b", piece.Cells[0].Name)
	assert.Equal(t, s.Values, piece.Cells[0].numbers(t))
	assert.Equal(t, 3, piece.Cells[1].Components)
	velocity := piece.Cells[1].numbers(t)
	require.Len(t, velocity, 18)
	assert.InDelta(t, g.XCentres()[2], velocity[15], 1e-15)
	assert.Zero(t, velocity[16])
	assert.InDelta(t, 10*g.ZCentres()[1], velocity[17], 1e-14)
	assert.Equal(t, "v_pressure", piece.Cells[2].Name)
	assert.Equal(t, f.P, piece.Cells[2].numbers(t))
	require.Len(t, piece.Points, 1)
	assert.Equal(t, n.Values, piece.Points[0].numbers(t))
}

func TestWriteVTKRefusesBadFields(t *testing.T) {
	g := graded(t, 3, 2)
	here, elsewhere := staggered.NewScalar(g), graded(t, 2, 3)
	for want, fields := range map[string][]staggered.Field{
		`"" is empty or repeated`:  {{Name: "", Data: here}},
		`"T" is empty or repeated`: {{Name: "T", Data: here}, {Name: "T", Data: here}},
		`"T" lives on another`:     {{Name: "T", Data: staggered.NewScalar(elsewhere)}},
		`"n" lives on another`:     {{Name: "n", Data: staggered.NewNodal(elsewhere)}},
		`"v" lives on another`:     {{Name: "v", Data: staggered.NewFlow(elsewhere)}},
		`"u" has no data`:          {{Name: "u"}},
		`"s" holds 5 numbers`:      {{Name: "s", Data: &staggered.Scalar{Grid: g, Values: make([]float64, 5)}}},
		`"m" holds 6 numbers`:      {{Name: "m", Data: &staggered.Nodal{Grid: g, Values: make([]float64, 6)}}},
		`"w" holds 6 numbers`:      {{Name: "w", Data: &staggered.Flow{Grid: g, VX: make([]float64, 6)}}},
	} {
		var b bytes.Buffer
		assert.ErrorContains(t, staggered.WriteVTK(&b, g, fields...), want)
		assert.Zero(t, b.Len(), "nothing is written")
	}
}

type fullDisk struct{}

var errFull = errors.New("disk full")

func (fullDisk) Write([]byte) (int, error) { return 0, errFull }

func TestWriteVTKReportsTheWriter(t *testing.T) {
	g := graded(t, 30, 30)
	assert.ErrorIs(t, staggered.WriteVTK(fullDisk{}, g, staggered.Field{Name: "T", Data: staggered.NewScalar(g)}), errFull)
	assert.NoError(t, staggered.WriteVTK(io.Discard, g))
}
