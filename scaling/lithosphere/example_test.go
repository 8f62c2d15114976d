package lithosphere_test

import (
	"fmt"
	"log"

	"example.org/overturn/scaling/lithosphere"
	"example.org/overturn/units"
)

// How old is sea floor that loses 60 mW/m², how deep, and how thick is its
// lithosphere?
func Example() {
	plate := lithosphere.SteinStein()
	age, err := plate.AgeOfHeatFlux(60 * units.MilliwattPerSquareMetre)
	if err != nil {
		log.Fatal(err)
	}
	subsidence, err := plate.Subsidence(age)
	if err != nil {
		log.Fatal(err)
	}
	thickness, err := plate.Thickness(0.9, age)
	if err != nil {
		log.Fatal(err)
	}
	fmt.Printf("age %.0f Myr\n", age.In(units.Megayear))
	fmt.Printf("depth %.1f km\n", (lithosphere.SteinSteinRidge + subsidence).In(units.Kilometre))
	fmt.Printf("thickness %.0f km\n", thickness.In(units.Kilometre))
	// Output:
	// age 75 Myr
	// depth 5.3 km
	// thickness 82 km
}

// The age of a lithosphere 100 km thick that cools for ever.
func ExampleHalfSpace_Thickness() {
	p := lithosphere.SteinStein()
	cooling := lithosphere.HalfSpace{Material: p.Material, Surface: p.Surface, Mantle: p.Mantle, Overburden: p.Overburden}
	for _, myr := range []units.Time{25, 50, 100} {
		d, err := cooling.Thickness(0.9, myr*units.Megayear)
		if err != nil {
			log.Fatal(err)
		}
		fmt.Printf("%3.0f Myr: %3.0f km\n", float64(myr), d.In(units.Kilometre))
	}
	// Output:
	//  25 Myr:  59 km
	//  50 Myr:  83 km
	// 100 Myr: 117 km
}
