package history_test

import (
	"fmt"
	"log"

	"example.org/overturn/boussinesq"
	"example.org/overturn/scaling"
	"example.org/overturn/scaling/history"
	"example.org/overturn/units"
)

// mantle is a body of one reservoir with a stagnant lid, heated by the isotopes
// of the silicate Earth.
func mantle(start units.Temperature, viscosity units.DynamicViscosity) (history.Body, error) {
	heating, err := history.NewRadiogenic(history.McDonoughSun(), history.Isotopes(), 4.5*units.Gigayear)
	if err != nil {
		return history.Body{}, err
	}
	return history.Body{
		Surface: 250,
		Reservoirs: []history.Reservoir{{
			Name: "mantle", Mass: 5e23 * units.Kilogram, SpecificHeat: 1200 * units.JoulePerKilogramKelvin,
			Area: 1.4e14 * units.SquareMetre, Heating: heating, Start: start,
			Loss: history.StagnantLid{
				Layer: boussinesq.Layer{
					Material: boussinesq.Material{Density: 3400, Expansivity: 3e-5, Conductivity: 3.5, SpecificHeat: 1200},
					Depth:    1700 * units.Kilometre, Gravity: 3.7 * units.MetrePerSecondSquared,
				},
				Viscosity: scaling.Arrhenius{Reference: viscosity, Anchor: 1600, Energy: 300 * units.KilojoulePerMole},
				Law:       scaling.DavailleJaupartLid,
			},
		}},
	}, nil
}

// A small planet cools under its lid.
func Example() {
	body, err := mantle(1900, 1e20)
	if err != nil {
		log.Fatal(err)
	}
	model, err := history.New(body, &history.Settings{Events: []history.Event{history.CoolsTo(0, 1850)}})
	if err != nil {
		log.Fatal(err)
	}
	h, err := model.Run(0, 4.5*units.Gigayear)
	if err != nil {
		log.Fatal(err)
	}
	for _, t := range []units.Time{0, 1, 2, 4.5} {
		s, err := h.At(t * units.Gigayear)
		if err != nil {
			log.Fatal(err)
		}
		fmt.Printf("%3.1f Gyr: %4.0f K, %4.1f mW/m², lid %3.0f km, Urey ratio %.2f\n", float64(t), float64(s.Temperature[0]),
			s.Flux[0].In(units.MilliwattPerSquareMetre), s.Layer[0].Lid.In(units.Kilometre), s.Urey)
	}
	for _, e := range h.Events() {
		fmt.Printf("%s after %.1f Gyr\n", e.Event, e.Time.In(units.Gigayear))
	}
	b, err := h.Budget()
	if err != nil {
		log.Fatal(err)
	}
	fmt.Printf("made %.2g J, lost %.2g J; budget closed to 1e-10: %v\n", float64(b.Made[0]), float64(b.Lost[0]), b.Relative < 1e-10)
	// Output:
	// 0.0 Gyr: 1900 K, 41.0 mW/m², lid 141 km, Urey ratio 2.03
	// 1.0 Gyr: 1971 K, 56.8 mW/m², lid 106 km, Urey ratio 0.89
	// 2.0 Gyr: 1908 K, 42.6 mW/m², lid 136 km, Urey ratio 0.79
	// 4.5 Gyr: 1781 K, 22.7 mW/m², lid 237 km, Urey ratio 0.78
	// cools to 1850 K after 3.0 Gyr
	// made 7.3e+29 J, lost 8e+29 J; budget closed to 1e-10: true
}
