package exact

// SlabInsulated is a [Slab] whose face z = Thickness lets no heat pass: half of
// one of twice the thickness with both faces alike (Carslaw & Jaeger 1959, 3.3;
// section from memory).
type SlabInsulated struct {
	Material
	Thickness float64 // default 1
	Initial   float64 // temperature
	Low       float64 // temperature of the face z = 0
	Source    float64 // heat produced per volume and time
}

func (s SlabInsulated) whole() Slab {
	return Slab{
		Material: s.Material, Thickness: 2 * orOne(s.Thickness),
		Initial: s.Initial, Low: s.Low, High: s.Low, Source: s.Source,
	}
}

func (s SlabInsulated) profile(z, t float64) (float64, float64) { return s.whole().profile(z, t) }

// Mean returns the mean temperature of the slab.
func (s SlabInsulated) Mean(t float64) float64 { return s.whole().Mean(t) }

// Solve implements [Problem].
func (s SlabInsulated) Solve() (Solution, error) { return checked(s) }

// At implements [Solution].
func (s SlabInsulated) At(x, z, t float64) State { return along(s, x, z, t) }

// Medium implements [Solution].
func (s SlabInsulated) Medium(x, z, t float64) Medium { return s.whole().Medium(x, z, t) }

// Domain implements [Solution]: 0 ≤ z ≤ Thickness, t ≥ 0.
func (s SlabInsulated) Domain() Domain { return layer(orOne(s.Thickness), 0) }

// Validate implements [Solution].
func (s SlabInsulated) Validate() error {
	return first(
		s.check("SlabInsulated"),
		notNegative("SlabInsulated.Thickness", s.Thickness),
		anyFinite("SlabInsulated.Initial", s.Initial),
		anyFinite("SlabInsulated.Low", s.Low),
		anyFinite("SlabInsulated.Source", s.Source),
	)
}
