package asread_test

import (
	"errors"
	"fmt"

	"gylebook/gravity"
	"gylebook/gravity/asread"
)

func ExampleParseReading() {
	for _, text := range []string{"1.0480", "1048", "48", "12,1 °P"} {
		r, err := asread.ParseReading(text, gravity.ScaleSG)
		if err != nil {
			fmt.Println(err)
			continue
		}
		fmt.Println(r.ReadAs(), r.Value, r.Step)
	}
	// Output:
	// SG 1.0480 1.048 0.0001
	// SG 1.048 1.048 0.001
	// SG 1.048 1.048 0.001
	// 12.1 °P 12.1 0.1
}

func ExampleDoubt() {
	_, err := asread.ParseReading("12.1", gravity.ScaleSG)
	var doubt *asread.Doubt
	if errors.As(err, &doubt) {
		fmt.Println(err)
		fmt.Println("hint:", doubt.Hint())
	}
	// Output:
	// read "12.1", wanted the scale: 12.1 °P (SG 1.0488) or 12.1 points (SG 1.0121)?
	// hint: type 12.1P for 12.1 °P (SG 1.0488) or 12.1pt for 12.1 points (SG 1.0121)
}

func ExampleParseTemperature() {
	t, err := asread.ParseTemperature("68F", asread.C)
	fmt.Println(t.ReadAs(), err)
	// Output: 68 °F (20.0 °C) <nil>
}

// UK strength for duty drops every decimal after the first: 7.59 % is 7.5 %
// (Alcoholic Products Technical Guide, section 11; quoted).
func ExampleFixed() {
	fmt.Println(asread.Fixed(7.59, 1, asread.Truncate))
	fmt.Println(asread.Fixed(1.0485, 3, asread.HalfEven), asread.Fixed(1.0485, 3, asread.HalfUp))
	// Output:
	// 7.5
	// 1.048 1.049
}

func ExampleRoundDiff() {
	fmt.Println(asread.RoundDiff(1.048, 1.010, 1000, 1, asread.HalfUp))
	// Output: 38
}

func ExampleFields() {
	fmt.Printf("%q\n", asread.Fields("12 P 1.048 20 C"))
	// Output: ["12 P" "1.048" "20 C"]
}
