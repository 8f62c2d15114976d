package rolls

import (
	"errors"
	"fmt"
	"math"

	"gonum.org/v1/gonum/mat"
)

// Core is the interior flow of a steady roll of width a in a layer of depth
// one, far from its boundary layers. All values but those of an inviscid core
// are in the scaling in which edge vorticity times edge speed is one along the
// plumes.
type Core struct {
	// PlateTime is ∫ |u| dx over one plate; zero at a rigid one.
	PlateTime float64
	// PlumeTime is ∫ |w| dz over one plume.
	PlumeTime float64
	// RootShear is ∫ √|∂u/∂z| dx over one rigid plate; zero at a free one.
	RootShear float64
	// MeanStream is the mean of ψ over the roll, for an inviscid core.
	MeanStream float64
	// MeanSquareSpeed is the mean of |u|² over the roll, for a viscous core
	// between free plates.
	MeanSquareSpeed float64
}

// Inviscid returns the core of uniform vorticity one, ∇²ψ = -1 with ψ = 0 all
// around, which a roll of any finite Prandtl number approaches as Ra → ∞
// between stress-free plates (Chini and Cox 2009). The sums are
//
//	τ_h = Σ 8 tanh(k/2)/(nπk²),  τ_v = a/2 - τ_h,  ⟨ψ⟩ = Σ 8 (1 - tanh(k/2)/(k/2))/(a nπk³)
//
// over odd n with k = nπ/a; the parts that fall slowly are taken in closed form.
func Inviscid(a float64) Core {
	const (
		odd3 = 7. / 8 * 1.2020569031595942854   // Σ 1/n³ over odd n, ζ(3)
		odd5 = 31. / 32 * 1.0369277551433699263 // Σ 1/n⁵ over odd n, ζ(5)
		odd4 = math.Pi * math.Pi * math.Pi * math.Pi / 96
	)
	third, fifth := odd3, odd5
	for n := 1.0; ; n += 2 {
		// 1 - tanh q = 2/(e^{2q}+1), q = k/2
		rest := 2 / (math.Exp(n*math.Pi/a) + 1)
		if rest < 1e-18*n*n*n {
			break
		}
		third -= rest / (n * n * n)
		fifth -= rest / (n * n * n * n * n)
	}
	pi := math.Pi
	plate := 8 * a * a / (pi * pi * pi) * third
	return Core{
		PlateTime:  plate,
		PlumeTime:  a/2 - plate,
		MeanStream: 8 * a * a / (pi * pi * pi * pi) * (odd4 - 2*a/pi*fifth),
	}
}

// Range of roll widths that the viscous cores are made for.
const (
	MinWidth      = 0.1
	MaxFreeWidth  = 10
	MaxRigidWidth = 2.5 // wider ones have counter-rotating eddies at the plates
)

// Free returns the viscous core between stress-free plates, which a roll of
// infinite Prandtl number approaches as Ra → ∞: ∇⁴ψ = 0, no vorticity on the
// plates, |ω w| = 1 on the plumes (Roberts 1979; Jimenez and Zufiria 1987).
func Free(a float64) (Core, error) {
	if !(a >= MinWidth && a <= MaxFreeWidth) {
		return Core{}, fmt.Errorf("roll width is %g, want %g to %g", a, MinWidth, float64(MaxFreeWidth))
	}
	e := newEdge(a)
	response := e.alongside(a)
	vorticity, err := e.plumeVorticity(response)
	if err != nil {
		return Core{}, fmt.Errorf("roll of width %g between free plates: %w", a, err)
	}
	speed := product(response, vorticity)
	plate := product(e.across(1, a), vorticity)
	return Core{
		PlateTime: a * e.integral(plate), PlumeTime: e.integral(speed),
		MeanSquareSpeed: e.meanSquareSpeed(vorticity, a, lastMode),
	}, nil
}

// lastMode leaves an error of about 1e-7.
const lastMode = 61

// meanSquareSpeed returns ⟨|u|²⟩ = ⟨ψω⟩ of a roll of width a between free plates.
// A sine mode of the plume vorticity with amplitude w and q = ka/2 adds
//
//	w²/(8ak³) [tanh q + q (2q tanh q - 1)/cosh²q].
//
// The amplitudes fall like n^(-1/2), which closes the sum after the last mode.
func (e *edge) meanSquareSpeed(vorticity []float64, a float64, last int) float64 {
	sum, term := 0.0, 0.0
	t, f := e.refined(vorticity, 10)
	for n := 1; n <= last; n += 2 {
		k := float64(n) * math.Pi
		amplitude := 0.0
		for i := range t {
			amplitude += f[i] * math.Sin(k/(1+math.Exp(-t[i])))
		}
		amplitude *= 2 * (t[1] - t[0])
		q := k * a / 2
		sech := 1 / math.Cosh(q)
		term = amplitude * amplitude / (8 * a * k * k * k) * (math.Tanh(q) + q*(2*q*math.Tanh(q)-1)*sech*sech)
		sum += term
	}
	return sum + term*float64(last)/6
}

// Rigid returns the viscous core between no-slip plates at infinite Prandtl
// number: ∇⁴ψ = 0, ∂ψ/∂z = 0 on the plates, |ω w| = 1 on the plumes (Roberts
// 1979). Near the upper end of the widths the plates are nearly stagnant in the
// middle and RootShear keeps five digits only.
func Rigid(a float64) (Core, error) {
	if !(a >= MinWidth && a <= MaxRigidWidth) {
		return Core{}, fmt.Errorf("roll width is %g, want %g to %g", a, MinWidth, MaxRigidWidth)
	}
	e := newEdge(math.Min(a, 1/a))
	// The vorticity p of the plates undoes the slip that the plumes cause:
	// a·alongside(1/a) p + across(1, a) w = 0.
	slip := e.across(1, a)
	plates := e.alongside(1 / a)
	plates.Scale(-a, plates)
	var reaction mat.Dense
	if err := reaction.Solve(plates, slip); ill(err) {
		return Core{}, fmt.Errorf("roll of width %g between rigid plates: %w", a, err)
	}
	response := e.alongside(a)
	var back mat.Dense
	back.Mul(e.across(a, 1), &reaction)
	response.Add(response, &back)
	vorticity, err := e.plumeVorticity(response)
	if err != nil {
		return Core{}, fmt.Errorf("roll of width %g between rigid plates: %w", a, err)
	}
	shear := product(&reaction, vorticity)
	return Core{PlumeTime: e.integral(product(response, vorticity)), RootShear: a * e.rootIntegral(shear)}, nil
}

func product(a mat.Matrix, x []float64) []float64 {
	var y mat.VecDense
	y.MulVec(a, mat.NewVecDense(len(x), x))
	return y.RawVector().Data
}

// ill tells an error from the mere warning that a matrix is nearly singular:
// the rows that belong to the very corners are, and they carry no weight.
func ill(err error) bool {
	var c mat.Condition
	return err != nil && !(errors.As(err, &c) && !math.IsInf(float64(c), 1))
}
