package attenuation_test

import (
	"fmt"

	"gylebook/attenuation"
	"gylebook/gravity"
)

// Balling, Die Bierbrauerei, vol. 1 part 2, p. 513: a wort of 12 % that reads
// 3 % holds 4.695 % real extract and 3.767 % alcohol by mass (he cuts the fourth
// decimal of 7.305·0.5158 = 3.7679); attenuated by 0.750 apparently, 0.608 really.
func ExampleAttenuate() {
	c := gravity.NewConverter()
	og, err := c.Convert(gravity.ScalePlato, 12, gravity.Pair2020)
	if err != nil {
		fmt.Println(err)
		return
	}
	pg, err := c.Convert(gravity.ScalePlato, 3, gravity.Pair2020)
	if err != nil {
		fmt.Println(err)
		return
	}
	a, err := attenuation.Attenuate(attenuation.Of(og, pg))
	if err != nil {
		fmt.Println(err)
		return
	}
	fmt.Printf("real extract %.3f %%\n", a.RE)
	fmt.Printf("alcohol %.2f %% mass\n", a.ABW)
	fmt.Printf("attenuation %.3f apparent, %.3f real\n", a.Apparent/100, a.Real/100)
	// Output:
	// real extract 4.695 %
	// alcohol 3.77 % mass
	// attenuation 0.750 apparent, 0.609 real
}

// HMRC Excise Notice 226, par. 30.2-30.3: 38.0 points times 0.130; the strength
// is declared truncated.
func ExampleRule_Declare() {
	rule, err := attenuation.FindRule("uk-duty")
	if err != nil {
		fmt.Println(err)
		return
	}
	points, factor, err := attenuation.DutyFactor(1.048, 1.010)
	if err != nil {
		fmt.Println(err)
		return
	}
	fmt.Printf("%.1f points, factor %.3f, declared %.1f %% vol\n", points, factor, rule.Declare(gravity.VolPct(points*factor)))
	// Output:
	// 38.0 points, factor 0.130, declared 4.9 % vol
}
