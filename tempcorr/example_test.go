package tempcorr_test

import (
	"fmt"

	"gylebook/gravity"
	"gylebook/tempcorr"
)

// Bigelow & Stevenson 1923, National Canners Association Bulletin 21-L, Table 8:
// -.20 °Bx at 60 °F and +.32 at 78 °F, on a 20 °C instrument; the page states no
// concentration, 5 °Bx fits it best.
func ExampleSucrose() {
	f := tempcorr.Float{Scale: gravity.ScaleBrix, Basis: gravity.Pair2020, Expansion: 25e-6}
	for _, fahrenheit := range []float64{60, 78} {
		p, err := tempcorr.Sucrose(f, 5, tempcorr.Sample{T: gravity.FromFahrenheit(fahrenheit)})
		if err != nil {
			fmt.Println(err)
			return
		}
		fmt.Printf("%.0f °F %+.2f °Bx\n", fahrenheit, p-5)
	}
	// Output:
	// 60 °F -0.20 °Bx
	// 78 °F +0.32 °Bx
}
