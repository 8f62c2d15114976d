package staggered

import (
	"bufio"
	"encoding/base64"
	"encoding/binary"
	"encoding/xml"
	"fmt"
	"io"
	"math"
	"strings"
)

// A Field is a named array for [WriteVTK].
type Field struct {
	Name string
	Data FieldData
}

// FieldData is implemented by [*Scalar], [*Nodal] and [*Flow].
type FieldData interface {
	// vtkArrays returns the arrays to write for a field of that name on g.
	vtkArrays(name string, g *Grid) ([]vtkArray, error)
}

// A vtkArray is one DataArray element of the file.
type vtkArray struct {
	name       string
	onCorners  bool
	components int
	values     []float64
}

// size returns how many numbers the array must hold on g.
func (a vtkArray) size(g *Grid) int {
	if a.onCorners {
		return a.components * (g.NX() + 1) * (g.NZ() + 1)
	}
	return a.components * g.NX() * g.NZ()
}

// WriteVTK writes the grid and the fields on it as a VTK XML RectilinearGrid
// file (customary suffix .vtr), an open format that general-purpose
// visualisation programs read. A Scalar becomes cell data, a Nodal point data;
// a Flow becomes the cell data NAME, the velocity vector averaged to the cell
// centres with its z component third, and NAME_pressure. Numbers are
// little-endian float64 in base64, so that nothing is lost.
//
// It fails when names are empty or repeated, when a field lives on another
// grid or does not fill its own, and when w does.
func WriteVTK(w io.Writer, g *Grid, fields ...Field) error {
	var cells, corners []vtkArray
	seen := map[string]bool{}
	for _, f := range fields {
		if f.Data == nil {
			return fmt.Errorf("staggered: field %q has no data", f.Name)
		}
		arrays, err := f.Data.vtkArrays(f.Name, g)
		if err != nil {
			return err
		}
		for _, a := range arrays {
			if strings.TrimSpace(a.name) == "" || seen[a.name] {
				return fmt.Errorf("staggered: field name %q is empty or repeated", a.name)
			}
			seen[a.name] = true
			if want := a.size(g); len(a.values) != want {
				return fmt.Errorf("staggered: field %q holds %d numbers, want %d", a.name, len(a.values), want)
			}
			if a.onCorners {
				corners = append(corners, a)
			} else {
				cells = append(cells, a)
			}
		}
	}
	return writeRectilinear(w, g, cells, corners)
}

func writeRectilinear(w io.Writer, g *Grid, cells, corners []vtkArray) error {
	b := bufio.NewWriter(w)
	extent := fmt.Sprintf("0 %d 0 0 0 %d", g.NX(), g.NZ())
	fmt.Fprintln(b, `<?xml version="1.0"?>`)
	fmt.Fprintln(b, `<VTKFile type="RectilinearGrid" version="1.0" byte_order="LittleEndian" header_type="UInt64">`)
	fmt.Fprintf(b, "<RectilinearGrid WholeExtent=%q>\n<Piece Extent=%q>\n", extent, extent)
	writeArrays(b, "Coordinates", []vtkArray{
		{name: "x", components: 1, values: g.x.nodes},
		{name: "y", components: 1, values: []float64{0}},
		{name: "z", components: 1, values: g.z.nodes},
	})
	writeArrays(b, "CellData", cells)
	writeArrays(b, "PointData", corners)
	fmt.Fprintln(b, "</Piece>\n</RectilinearGrid>\n</VTKFile>")
	// A bufio.Writer remembers the first error of the calls above.
	return b.Flush()
}

func writeArrays(b *bufio.Writer, element string, arrays []vtkArray) {
	fmt.Fprintf(b, "<%s>\n", element)
	for _, a := range arrays {
		fmt.Fprint(b, `<DataArray type="Float64" Name="`)
		xml.EscapeText(b, []byte(a.name)) //nolint:errcheck // b remembers
		fmt.Fprintf(b, "\" NumberOfComponents=\"%d\" format=\"binary\">\n", a.components)
		writeBase64(b, a.values)
		fmt.Fprintln(b, "\n</DataArray>")
	}
	fmt.Fprintf(b, "</%s>\n", element)
}

// writeBase64 encodes the length in bytes, as the format wants it, and then
// the numbers.
func writeBase64(b *bufio.Writer, values []float64) {
	raw := make([]byte, 0, 8+8*len(values))
	raw = binary.LittleEndian.AppendUint64(raw, uint64(8*len(values)))
	for _, v := range values {
		raw = binary.LittleEndian.AppendUint64(raw, math.Float64bits(v))
	}
	b.WriteString(base64.StdEncoding.EncodeToString(raw)) //nolint:errcheck // b remembers
}

func (s *Scalar) vtkArrays(name string, g *Grid) ([]vtkArray, error) {
	if !s.Grid.Equal(g) {
		return nil, fmt.Errorf("staggered: field %q lives on another grid", name)
	}
	return []vtkArray{{name: name, components: 1, values: s.Values}}, nil
}

func (n *Nodal) vtkArrays(name string, g *Grid) ([]vtkArray, error) {
	if !n.Grid.Equal(g) {
		return nil, fmt.Errorf("staggered: field %q lives on another grid", name)
	}
	return []vtkArray{{name: name, onCorners: true, components: 1, values: n.Values}}, nil
}

func (f *Flow) vtkArrays(name string, g *Grid) ([]vtkArray, error) {
	if !f.Grid.Equal(g) {
		return nil, fmt.Errorf("staggered: field %q lives on another grid", name)
	}
	nx, nz := g.Cells()
	if n := (nx + 1) * nz; len(f.VX) != n || len(f.VZ) != nx*(nz+1) {
		return nil, fmt.Errorf("staggered: field %q holds %d numbers for vx and %d for vz, want %d and %d",
			name, len(f.VX), len(f.VZ), n, nx*(nz+1))
	}
	velocity := make([]float64, 0, 3*nx*nz)
	for k := range nz {
		for i := range nx {
			vx, vz := f.cellVelocity(i, k)
			velocity = append(velocity, vx, 0, vz)
		}
	}
	return []vtkArray{
		{name: name, components: 3, values: velocity},
		{name: name + "_pressure", components: 1, values: f.P},
	}, nil
}
