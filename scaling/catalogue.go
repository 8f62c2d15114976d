package scaling

import "slices"

// Query selects laws. A field of zero matches every law; a law made for any
// walls, heating or rheology matches every query.
type Query struct {
	Quantity Quantity
	Geometry Geometry
	Walls    Walls
	Heating  Heating
	Rheology Rheology
	Flow     Flow

	// Basis asks for laws in one Rayleigh number.
	Basis Group

	// Within, where it is not zero, asks for laws whose groups are all given and
	// within range, and that can be evaluated.
	Within Groups
}

// Matches reports whether a law is what the query asks for.
func (q Query) Matches(l Law) bool {
	ok := matches(q.Quantity, l.Quantity) && matches(q.Geometry, l.Geometry) && matches(q.Walls, l.Walls) &&
		matches(q.Heating, l.Heating) && matches(q.Rheology, l.Rheology) && matches(q.Flow, l.Flow) &&
		(q.Basis == 0 || q.Basis == l.Basis)
	if !ok || q.Within == (Groups{}) {
		return ok
	}
	_, err := l.At(q.Within)
	return err == nil
}

func matches[K ~int](want, have K) bool { return want == 0 || have == 0 || want == have }

// Select returns those of the laws that match a query, in order: the catalogue
// of [All], or your own.
func Select(laws []Law, q Query) []Law {
	return slices.DeleteFunc(slices.Clone(laws), func(l Law) bool { return !q.Matches(l) })
}

// Find returns the laws of the catalogue that match a query.
func Find(q Query) []Law { return Select(All(), q) }

// All returns the catalogue: every published law that this package has, those
// with a parameter at its common values. Laws that could not be confirmed are in
// [Unconfirmed].
func All() []Law {
	laws := marginalLaws()
	laws = append(laws,
		FreeRolls(SineCore), FreeRolls(ViscousCore), FreeRolls(InviscidCore), FreeRollsReynolds(), RigidRolls(), BestRigidRolls(),
		PorousElder(),
		GrossmannLohse(), GrossmannLohseReynolds(),
		SolomatovMoresi(), DavailleJaupart(), SteadyLid(), LidOnset(), OgawaLid(), OgawaBimodal(), YieldingLid(),
	)
	laws = append(laws, handbookLaws()...)
	return append(laws, exponentLaws()...)
}

// Unconfirmed returns the laws that are remembered but could not be confirmed:
// do not publish a number that rests on one of them before you have read its
// source.
func Unconfirmed() []Law { return []Law{MixedHeating()} }

// marginalLaws are the laws of marginal stability at the critical numbers of
// the three pairs of walls.
func marginalLaws() []Law {
	var laws []Law
	for _, w := range []Walls{Free, FreeOverRigid, Rigid} {
		rd, _, err := w.Critical()
		if err != nil {
			continue // none of the three
		}
		laws = append(laws, MarginalLayer(rd, w), HowardCycle(rd, w), WholeLayer(rd, third, w), MarginalTop(rd, w),
			MarginalMixed(rd, w), MarginalMixedTemperature(rd, w))
	}
	return laws
}

func handbookLaws() []Law {
	rough, roughTurbulent := VerticalPlateRough()
	up, upTurbulent := HotPlateUp()
	older, newer := HotPlateDown()
	return []Law{
		GlobeDropkin(), HollandsHorizontal(), HollandsInclined(),
		CattonSquare(), CattonTall(), MacGregorEmery(), MacGregorEmeryTurbulent(),
		VerticalPlateAllRegimes(), VerticalPlateLaminar(), rough, roughTurbulent,
		Cylinder(), up, upTurbulent, older, newer,
	}
}
