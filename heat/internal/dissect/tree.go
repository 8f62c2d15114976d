package dissect

// leafCells is the largest number of cells eliminated in one dense block
// without a further cut.
const leafCells = 24

// front is one node of the elimination tree: the cells it eliminates and the
// dense matrix that it needs for that.
type front struct {
	cells    []int32   // those eliminated here first, then those that surround them
	own      int       // number of cells eliminated here
	children []int     // fronts that hand their Schur complements to this one
	into     [][]int32 // position here of each surrounding cell of each child
	entries  []entry   // coefficients of the matrix that first appear here
	lu       []float64 // own×own, factored in place
	upper    []float64 // own×rest
	lower    []float64 // rest×own
	swaps    []int     // row exchanges among the own cells
	schur    []float64 // rest×rest, what the parent takes over
}

// entry says where in the front a coefficient goes.
type entry struct {
	direction, cell int32
	at              int32
}

func (f *front) size() int { return len(f.cells) }
func (f *front) rest() int { return len(f.cells) - f.own }

// box is a rectangle of cells, i0 ≤ i < i1 and k0 ≤ k < k1.
type box struct{ i0, i1, k0, k1 int }

func (b box) width() int  { return b.i1 - b.i0 }
func (b box) height() int { return b.k1 - b.k0 }
func (b box) area() int   { return b.width() * b.height() }

// planner builds the elimination tree, children before parents.
type planner struct {
	nx, nz int
	ring   bool
	fronts []front
	turn   []int32 // front that eliminates each cell
	place  []int32 // scratch: position of a cell in the front at hand
}

func plan(nx, nz int, ring bool) *planner {
	p := &planner{nx: nx, nz: nz, ring: ring, turn: make([]int32, nx*nz), place: make([]int32, nx*nz)}
	for c := range p.place {
		p.place[c] = -1
	}
	whole := box{0, nx, 0, nz}
	if !ring || nx < 3 {
		p.divide(whole)
		return p
	}
	// A column of its own opens the ring.
	open := p.divide(box{1, nx, 0, nz})
	p.add(p.list(nil, box{0, 1, 0, nz}), nil, []int{open})
	return p
}

// divide plans the elimination of a box and returns the index of its last
// front.
func (p *planner) divide(b box) int {
	around := p.around(b)
	if b.area() <= leafCells || (b.width() < 3 && b.height() < 3) {
		return p.add(p.list(nil, b), around, nil)
	}
	var first, cut, second box
	if b.width() >= b.height() {
		m := b.i0 + b.width()/2
		first, cut, second = box{b.i0, m, b.k0, b.k1}, box{m, m + 1, b.k0, b.k1}, box{m + 1, b.i1, b.k0, b.k1}
	} else {
		m := b.k0 + b.height()/2
		first, cut, second = box{b.i0, b.i1, b.k0, m}, box{b.i0, b.i1, m, m + 1}, box{b.i0, b.i1, m + 1, b.k1}
	}
	children := []int{p.divide(first), p.divide(second)}
	return p.add(p.list(nil, cut), around, children)
}

// list appends the cells of b to dst.
func (p *planner) list(dst []int32, b box) []int32 {
	for k := b.k0; k < b.k1; k++ {
		for i := b.i0; i < b.i1; i++ {
			dst = append(dst, int32(k*p.nx+i))
		}
	}
	return dst
}

// around lists the cells outside b that touch it.
func (p *planner) around(b box) []int32 {
	var dst []int32
	if b.k0 > 0 {
		dst = p.list(dst, box{b.i0, b.i1, b.k0 - 1, b.k0})
	}
	if b.k1 < p.nz {
		dst = p.list(dst, box{b.i0, b.i1, b.k1, b.k1 + 1})
	}
	if b.width() == p.nx {
		return dst
	}
	west, east := b.i0-1, b.i1
	if p.ring {
		west, east = (west+p.nx)%p.nx, east%p.nx
	}
	if west >= 0 {
		dst = p.list(dst, box{west, west + 1, b.k0, b.k1})
	}
	if east < p.nx && east != west {
		dst = p.list(dst, box{east, east + 1, b.k0, b.k1})
	}
	return dst
}

// add appends the front that eliminates own.
func (p *planner) add(own, around []int32, children []int) int {
	f := front{cells: append(own, around...), own: len(own), children: children}
	n := len(p.fronts)
	for at, c := range f.cells {
		p.place[c] = int32(at)
	}
	for _, c := range own {
		p.turn[c] = int32(n)
	}
	for _, ch := range children {
		child := &p.fronts[ch]
		into := make([]int32, child.rest())
		for j, c := range child.cells[child.own:] {
			into[j] = p.place[c]
		}
		f.into = append(f.into, into)
	}
	f.entries = p.entries(&f)
	for _, c := range f.cells {
		p.place[c] = -1
	}
	f.lu = make([]float64, f.own*f.own)
	f.upper = make([]float64, f.own*f.rest())
	f.lower = make([]float64, f.own*f.rest())
	f.swaps = make([]int, f.own)
	p.fronts = append(p.fronts, f)
	return n
}

// entries lists the coefficients of the rows and columns of f's own cells
// that no earlier front has taken.
func (p *planner) entries(f *front) []entry {
	var list []entry
	n := int32(f.size())
	for at, c := range f.cells[:f.own] {
		at := int32(at)
		list = append(list, entry{centre, c, at*n + at})
		for d := south; d <= north; d++ {
			nb := p.neighbour(c, d)
			if nb < 0 || p.place[nb] < 0 {
				continue // a wall, or a cell that an earlier front eliminated
			}
			to := p.place[nb]
			list = append(list, entry{d, c, at*n + to})
			if int(to) >= f.own {
				list = append(list, entry{opposite(d), nb, to*n + at})
			}
		}
	}
	return list
}

// neighbour returns the cell next to c in a direction, -1 beyond a wall.
func (p *planner) neighbour(c, direction int32) int32 {
	nx := int32(p.nx)
	i, k := c%nx, c/nx
	switch direction {
	case south:
		k--
	case north:
		k++
	case west:
		i--
	case east:
		i++
	}
	if p.ring {
		i = (i + nx) % nx
	}
	if i < 0 || i >= nx || k < 0 || k >= int32(p.nz) {
		return -1
	}
	return k*nx + i
}

// The coefficients of a row of the matrix.
const (
	centre int32 = iota
	south
	west
	east
	north
)

func opposite(direction int32) int32 { return south + north - direction }
