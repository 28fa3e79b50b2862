package gravity_test

import (
	"fmt"

	"gylebook/gravity"
)

// G. Holzner 1883, Dinglers Polytechnisches Journal 248, p. 472: 20 lb Long is
// 13.68 °Balling, and 12 °Balling is 17.42 lb.
func ExampleLongBalling() {
	fmt.Printf("%.2f °Balling\n", gravity.LongBalling(20))
	fmt.Printf("%.2f lb per barrel\n", gravity.LongPounds(12))
	// Output:
	// 13.68 °Balling
	// 17.42 lb per barrel
}

// Ambrosi 1994, Wein A bis Z: 30 °KMW is 156 °Oe.
func ExampleOechsleOfKMW() {
	fmt.Printf("%.0f °Oe\n", gravity.OechsleOfKMW(30))
	// Output: 156 °Oe
}

// Published statement: SG 1.040 in air is 9.9936 °P by the ASBC polynomial and
// 9.9933 °Bx by the fit of NBS C440; both are printed here to two decimals.
func ExampleASBC() {
	fmt.Printf("asbc %.2f °P\n", gravity.ASBC(1.040))
	fmt.Printf("nbs  %.2f °Bx\n", gravity.NBS(1.040))
	// Output:
	// asbc 9.99 °P
	// nbs  9.99 °Bx
}

// OIML R 22 (1973): pure ethanol has 789.24 kg/m³ at 20 °C. The worked example of
// the GOST water-alcohol tables has 0.8042 g/cm³ for 95 % by mass at 20 °C; R 22
// gives 804.14 kg/m³, which is 0.02 % by mass away.
func ExampleEthanolDensity() {
	fmt.Printf("%.2f kg/m³\n", gravity.EthanolDensity(100, 20))
	fmt.Printf("%.1f kg/m³\n", gravity.EthanolDensity(95, 20))
	// Output:
	// 789.24 kg/m³
	// 804.1 kg/m³
}

// NBS Circular C440 (1942), Table 114: 12 % sucrose has 1.04837 in air.
func ExampleConverter_Convert() {
	f, err := gravity.NewConverter().Convert(gravity.ScaleBrix, 12, gravity.Pair2020)
	if err != nil {
		fmt.Println(err)
		return
	}
	fmt.Printf("%.2f °Bx is SG %.4f\n", f.Extract, f.SG)
	// Output: 12.00 °Bx is SG 1.0484
}
