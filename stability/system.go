package stability

import (
	"math"
	"slices"

	"example.org/overturn/stability/internal/element"
	"example.org/overturn/stability/internal/pencil"
)

// A system is a linear stability problem before it is discretised: fields,
// the operators that couple them, and a first mesh. The equations are those of
// [pencil]: the unknowns are w, the vertical velocity, and others scaled so
// that every coefficient is a polynomial in k:
//
//	θ̂ = k θ     heat                 ŝ = k s     solute
//	ζ̂ = ζ/√Ta   vertical vorticity    b̂, ĵ       vertical field and current over √Q
type system struct {
	operator element.Operator
	fields   []element.Field
	nodes    []float64

	// Index of each field, -1 for none.
	velocity, temperature, solute, vorticity, induced, current int

	// interfaces are unknowns of their own, after those of the fields.
	interfaces []bump

	still bool // no mass

	rotationRoot float64 // √Ta
	unlimited    bool    // nothing limits velocity and temperature as k → 0
	irregular    bool    // singular at k = 0

	// scale multiplies the solution for θ̂ and ŝ, so that w and they are of
	// the same size near onset.
	scale float64
}

// A bump is the displacement ζ of an interface at height z, which is a node:
// σζ = w there, and it weighs (excess - tension k²) ζ upwards.
type bump struct {
	z               float64
	excess, tension float64
}

// bumpBlocks couples the interfaces to the velocity.
func (s *system) bumpBlocks(l *element.Layout) []pencil.Block {
	var blocks []pencil.Block
	one := func(part, power, row, col int, v float64) {
		blocks = append(blocks, pencil.Block{
			Part: part, Power: power, Row: row, Rows: 1, Col: col, Cols: 1, Data: []float64{v},
		})
	}
	for i, b := range s.interfaces {
		zeta := l.Size() + i
		w := l.NodeValue(s.velocity, slices.Index(l.Nodes, b.z))
		one(pencil.Base, 2, w, zeta, -b.excess)
		one(pencil.Base, 4, w, zeta, b.tension)
		one(pencil.Base, 0, zeta, w, -1)
		one(pencil.Mass, 0, zeta, zeta, -1)
	}
	return blocks
}

// driveOf returns the part of the pencil that a number multiplies. The solute
// counts as a drive with its sign reversed.
func driveOf(n Number) int { return int(n) }

func newSystem(scale float64, still bool) *system {
	return &system{
		still:       still,
		operator:    element.Operator{Coefficients: make([]func(float64) float64, 1), Excess: 2},
		temperature: -1, solute: -1, vorticity: -1, induced: -1, current: -1, velocity: -1,
		scale: scale,
	}
}

// field adds a field and returns its index.
func (s *system) field(f element.Field) int {
	s.fields = append(s.fields, f)
	return len(s.fields) - 1
}

// coefficient adds a function of z and returns its index; nil means 1.
func (s *system) coefficient(f func(float64) float64) int {
	if f == nil {
		return 0
	}
	s.operator.Coefficients = append(s.operator.Coefficients, f)
	return len(s.operator.Coefficients) - 1
}

// An integral is the place of an integral in the equations.
type integral struct {
	part, power int
	row, col    int // fields
	coefficient int
}

// add adds scale ∫ c Dⁱv Dʲu.
func (s *system) add(at integral, i, j int, scale float64) {
	if scale == 0 || s.still && at.part == pencil.Mass {
		return
	}
	s.operator.Terms = append(s.operator.Terms, element.Term{
		Part: at.part, Power: at.power, Row: at.row, Col: at.col,
		RowOrder: i, ColOrder: j, Coefficient: at.coefficient, Scale: scale,
	})
}

// addEnd adds scale Dⁱv Dʲu at an end: 0 the bottom, 1 the top.
func (s *system) addEnd(at integral, end, i, j int, scale float64) {
	if scale == 0 {
		return
	}
	s.operator.Ends = append(s.operator.Ends, element.EndTerm{
		Part: at.part, Power: at.power, Row: at.row, Col: at.col,
		RowOrder: i, ColOrder: j, End: end, Scale: scale,
	})
}

// diffusion adds ∫ c (v'u' + k² v u), and with inertia the mass -m ∫ v u that
// a term σ m u of the equation gives.
func (s *system) diffusion(field, coefficient int, scale, mass float64) {
	at := integral{pencil.Base, 0, field, field, coefficient}
	s.add(at, 1, 1, scale)
	at.power = 2
	s.add(at, 0, 0, scale)
	s.add(integral{pencil.Mass, 0, field, field, 0}, 0, 0, -mass)
}

// layerSystem builds the equations of a plane layer. A still system is for
// stationary solutions: it has no mass, and it is regular at k = 0.
func layerSystem(l *Layer, base *baseState, eta *viscosityState, still bool, scale float64) *system {
	s := newSystem(scale, still)
	viscosity := 0
	if !eta.one {
		viscosity = s.coefficient(eta.at)
	}
	if l.Porous == Darcy {
		s.darcy(l, viscosity, still)
	} else {
		s.stokes(l, viscosity)
	}
	s.heat(l, base, still)
	s.unweighCoupled()
	if l.Solute.Diffusivity > 0 {
		s.addSolute(l, still)
	}
	if l.Taylor > 0 {
		s.rotation(l, viscosity, still)
	}
	if l.Magnetic.Chandrasekhar > 0 {
		s.magnetic(l, still)
	}
	s.nodes = layerNodes(l, base, eta)
	s.operator.Excess += (max(base.degree(), eta.degree()) + 1) / 2
	return s
}

// stokes adds the viscous dissipation, its inertia and thermocapillarity:
//
//	∫ η [(w″+k²w)(v″+k²v) + 4k²w'v'] + (σ/Pr) ∫ (w'v'+k²wv) + k² Ma θ v'|₁
func (s *system) stokes(l *Layer, viscosity int) {
	fixed := func(w Wall) int {
		if w == Rigid {
			return 2
		}
		return 1
	}
	s.velocity = s.field(element.Field{
		Class: element.C1,
		Fixed: [2]int{fixed(conditionsOf(l.Bottom).wall), fixed(conditionsOf(l.Top).wall)},
	})
	w := s.velocity
	at := integral{pencil.Base, 0, w, w, viscosity}
	s.add(at, 2, 2, 1)
	at.power = 2
	s.add(at, 2, 0, 1)
	s.add(at, 0, 2, 1)
	s.add(at, 1, 1, 4)
	at.power = 4
	s.add(at, 0, 0, 1)
	mass := integral{pencil.Mass, 0, w, w, 0}
	s.add(mass, 1, 1, -l.inertia())
	mass.power = 2
	s.add(mass, 0, 0, -l.inertia())
}

// darcy adds ∫ r (w'v' + k²wv), r the resistance to flow.
func (s *system) darcy(l *Layer, resistance int, still bool) {
	f := element.Field{Class: element.C0}
	for i, c := range []conditions{conditionsOf(l.Bottom), conditionsOf(l.Top)} {
		if c.wall != Permeable {
			f.Fixed[i] = 1
		}
	}
	f.Constant = f.Fixed == [2]int{}
	f.Weighted = still && f.Constant
	s.velocity = s.field(f)
	s.diffusion(s.velocity, resistance, 1, 0)
}

// heat adds σθ = (D²-k²)θ + f w and the buoyancy Ra k²θ.
func (s *system) heat(l *Layer, base *baseState, still bool) {
	f := element.Field{Class: element.C0}
	biot := [2]float64{conditionsOf(l.Bottom).biot, conditionsOf(l.Top).biot}
	for i, b := range biot {
		if math.IsInf(b, 1) {
			f.Fixed[i], biot[i] = 1, 0
		}
	}
	f.Constant = f.Fixed == [2]int{}
	f.Weighted = still && f.Constant && biot == [2]float64{}
	s.temperature = s.field(f)
	t := s.temperature
	s.diffusion(t, 0, 1, 1)
	for end, b := range biot {
		s.addEnd(integral{pencil.Base, 0, t, t, 0}, end, 0, 0, b)
	}
	gradient := 0
	if !base.unit() {
		gradient = s.coefficient(base.gradient)
	}
	s.add(integral{pencil.Base, 1, t, s.velocity, gradient}, 0, 0, -1/s.scale)
	buoyancy := integral{pencil.FirstDrive + driveOf(ThermalRayleigh), 1, s.velocity, t, 0}
	s.add(buoyancy, 0, 0, -s.scale)
	if l.Porous == Fluid && conditionsOf(l.Top).wall == Free {
		stress := integral{pencil.FirstDrive + driveOf(MarangoniNumber), 1, s.velocity, t, 0}
		if f.Fixed[1] == 0 {
			s.addEnd(stress, 1, 1, 0, s.scale)
		}
	}
}

// unweighCoupled drops the weights of the constants of velocity and
// temperature where both have one: their coupling would be singular at k = 0.
func (s *system) unweighCoupled() {
	w, t := &s.fields[s.velocity], &s.fields[s.temperature]
	if w.Weighted && t.Weighted {
		w.Weighted, t.Weighted = false, false
		s.unlimited = true
	}
}

// addSolute adds σs = τ(D²-k²)s + h w and the buoyancy -Ra_S k²s.
func (s *system) addSolute(l *Layer, still bool) {
	f := element.Field{Class: element.C0}
	for i, w := range []SoluteWall{l.Solute.Bottom, l.Solute.Top} {
		if w == FixedConcentration {
			f.Fixed[i] = 1
		}
	}
	f.Constant = f.Fixed == [2]int{}
	f.Weighted = still && f.Constant && !s.fields[s.velocity].Weighted
	s.irregular = f.Constant && !f.Weighted
	s.solute = s.field(f)
	s.diffusion(s.solute, 0, l.Solute.Diffusivity, 1)
	gradient := s.coefficient(l.Solute.Gradient)
	s.add(integral{pencil.Base, 1, s.solute, s.velocity, gradient}, 0, 0, -1/s.scale)
	buoyancy := integral{pencil.FirstDrive + driveOf(SoluteRayleigh), 1, s.velocity, s.solute, 0}
	s.add(buoyancy, 0, 0, -s.scale)
}

// rotation adds (σ/Pr)ζ = D(ηDζ) - ηk²ζ + Dw and the force Ta Dζ on w.
func (s *system) rotation(l *Layer, viscosity int, still bool) {
	f := element.Field{Class: element.C0}
	for i, b := range []Boundary{l.Bottom, l.Top} {
		if conditionsOf(b).wall == Rigid {
			f.Fixed[i] = 1
		}
	}
	f.Constant = f.Fixed == [2]int{}
	f.Weighted = still && f.Constant
	s.vorticity = s.field(f)
	s.diffusion(s.vorticity, viscosity, 1, l.inertia())
	// The derivatives are on ζ, and w vanishes at the walls: the coupling of a
	// constant ζ is exactly zero.
	root := math.Sqrt(l.Taylor)
	s.rotationRoot = root
	s.add(integral{pencil.Base, 0, s.velocity, s.vorticity, 0}, 0, 1, -root)
	s.add(integral{pencil.Base, 0, s.vorticity, s.velocity, 0}, 1, 0, root)
}

// magnetic adds the Lorentz force. With q = κ/λ, and b the induced field,
//
//	σ q b = (D²-k²) b + Dw,  force on w:  -Q D(D²-k²)b = Q D²w - σ q Q Db
//
// of which only Q D²w is left for σ = 0 or q = 0. With rotation, the current j
// and the vorticity are coupled: (D²-k²-σq) j = -Dζ, force on ζ: Q Dj.
func (s *system) magnetic(l *Layer, still bool) {
	m, w := &l.Magnetic, s.velocity
	s.add(integral{pencil.Base, 0, w, w, 0}, 1, 1, m.Chandrasekhar)
	root, q := math.Sqrt(m.Chandrasekhar), m.induction()
	walls := [2]MagneticWall{m.Bottom, m.Top}
	if q > 0 && !still {
		s.addInduction(walls, root, q)
	}
	if s.vorticity >= 0 {
		s.addCurrent(walls, root, q)
	}
}

// addCurrent adds the field j. Between walls without current through them the
// derivative can be on ζ, where a constant makes it exactly zero; else the limit
// k → 0 is out of reach.
func (s *system) addCurrent(walls [2]MagneticWall, root, q float64) {
	f := element.Field{Class: element.C0}
	for i, wall := range walls {
		if wall != Conducting {
			f.Fixed[i] = 1
		}
	}
	f.Constant = f.Fixed == [2]int{}
	s.current = s.field(f)
	s.diffusion(s.current, 0, 1, q)
	if f.Fixed == [2]int{1, 1} {
		s.add(integral{pencil.Base, 0, s.vorticity, s.current, 0}, 1, 0, root)
	} else {
		s.add(integral{pencil.Base, 0, s.vorticity, s.current, 0}, 0, 1, -root)
		s.irregular = s.irregular || s.fields[s.vorticity].Weighted || s.still && f.Constant
		s.fields[s.vorticity].Weighted = false
	}
	s.add(integral{pencil.Base, 0, s.current, s.vorticity, 0}, 0, 1, -root)
}

// addInduction adds the field b. Outside an insulating wall it decays like
// exp(-k|z|), and so Db = ∓k b there.
func (s *system) addInduction(walls [2]MagneticWall, root, q float64) {
	f := element.Field{Class: element.C0}
	for i, wall := range walls {
		if wall == Conducting {
			f.Fixed[i] = 1
		}
	}
	s.induced = s.field(f)
	b := s.induced
	s.diffusion(b, 0, 1, q)
	for end, wall := range walls {
		if wall == Insulating {
			s.addEnd(integral{pencil.Base, 1, b, b, 0}, end, 0, 0, 1)
		}
	}
	s.add(integral{pencil.Base, 0, b, s.velocity, 0}, 0, 1, -root)
	s.add(integral{pencil.Mass, 0, s.velocity, b, 0}, 1, 0, q*root)
}

func (s *baseState) unit() bool { return s.uniform && s.gradient(0.5) == 1 }

func (s *viscosityState) degree() int {
	if s.resolved == nil {
		return 0
	}
	return s.resolved.Degree()
}

// sameNode is the distance below which two nodes of a mesh are one.
const sameNode = 1e-9

// layerNodes returns the element boundaries that the profiles ask for, and
// those that resolve boundary layers at the walls: of Ekman with rotation, of
// Hartmann with a magnetic field.
func layerNodes(l *Layer, base *baseState, eta *viscosityState) []float64 {
	nodes := base.nodes()
	if eta.resolved != nil {
		nodes = append(nodes, eta.resolved.Nodes...)
	}
	for _, inverse := range []float64{math.Sqrt(math.Sqrt(l.Taylor)), math.Sqrt(l.Magnetic.Chandrasekhar)} {
		for thick := 6 / inverse; thick < 0.3; thick *= 4 {
			nodes = append(nodes, thick, 1-thick)
		}
	}
	slices.Sort(nodes)
	nodes = slices.CompactFunc(nodes, func(a, b float64) bool { return math.Abs(b-a) < sameNode })
	nodes[len(nodes)-1] = 1
	return nodes
}
