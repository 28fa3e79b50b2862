package main

import (
	"math"
	"strings"
	"testing"

	"gylebook/attenuation/curve"
)

func TestReadCourses(t *testing.T) {
	cs, err := readCourses(strings.NewReader(`# a comment
series,hours,gravity_value,unit,temp_C
b_wine,30,20,sg_points,18
a,2.5,12.0,degP,18
b_wine,6,90,sg_points,18
a,14.5,10.0,degBrix_app,18
g,0,0,co2_g_per_L,18
g,24,11,co2_g_per_L,18
`), "beer_x")
	if err != nil {
		t.Fatal(err)
	}
	if len(cs) != 3 || cs[0].name != "b_wine" || cs[1].name != "a" {
		t.Fatalf("%+v: wanted three courses in the order of the file", cs)
	}
	if cs[0].kind != curve.Wine || cs[1].kind != curve.Beer {
		t.Errorf("kinds %s and %s, wanted wine and beer", cs[0].kind, cs[1].kind)
	}
	if h := cs[0].hours; h[0] != 0 || h[1] != 24 || cs[0].points[0] != 90 {
		t.Errorf("%+v: wanted the first reading, 90, at hour 0 and the next at 24", cs[0])
	}
	// The sugar tables of the trade give 1.0484 for 12 °P.
	if math.Abs(cs[1].points[0]-48.4) > 0.1 {
		t.Errorf("12 °P is %.2f points, wanted 48.4", cs[1].points[0])
	}
	// A point that ferments gives 1.1 g/L of gas: 11 g/L are 10 points.
	if fell := cs[2].points[0] - cs[2].points[1]; math.Abs(fell-10) > 1e-9 {
		t.Errorf("11 g/L of gas are %.3f points, wanted 10", fell)
	}
}

func TestBrokenFilesAreNamed(t *testing.T) {
	const head = "series,hours,gravity_value,unit\n"
	for name, c := range map[string]struct{ text, want string }{
		"empty":        {"# nothing\n", "wanted a header"},
		"no row":       {head, "no row"},
		"no column":    {"series,hours,gravity\na,1,2\n", "no column gravity_value"},
		"unknown unit": {head + "a,0,12,furlongs\n", `line 2: unknown unit "furlongs", known: degP`},
		"no number":    {head + "a,0,50,sg_points\na,1,wet,sg_points\n", `line 3: gravity_value is "wet"`},
		"not finite":   {head + "a,NaN,50,sg_points\n", "line 2: hours is"},
		"short row":    {head + "a,1\n", "wrong number of fields"},
		"no liquid":    {head + "a,0,900,degP\n", "line 2: gravity_value"},
	} {
		if _, err := readCourses(strings.NewReader(c.text), "x"); err == nil || !strings.Contains(err.Error(), c.want) {
			t.Errorf("%s: %v, wanted %q", name, err, c.want)
		}
	}
}

func TestClassOf(t *testing.T) {
	for _, c := range []struct{ stem, name, want string }{
		{"beer_pilot", "x_00_PS_22_A", "beer_pilot/beer/22"},
		{"beer_pilot", "x_00_PS_12_A", "beer_pilot/beer/cool"},
		{"beer_lab", "x_00_SS_20_A", "beer_lab/beer"},
		{"mixed", "syn_wine_001", "mixed/wine"},
	} {
		if got := classOf(c.stem, c.name); got != c.want {
			t.Errorf("%s of %s: class %s, wanted %s", c.name, c.stem, got, c.want)
		}
	}
}

func TestTruth(t *testing.T) {
	c := course{
		hours: []float64{0, 24, 48, 72, 96, 120}, points: []float64{50, 40, 20, 12, 11, 10.6}, plateau: 1.5,
	}
	got, ok := c.truth()
	// Plateau 12, 11, 10.6: range 1.4, mean 11.2; 13.2 between 20 at 48 and 12 at
	// 72 h: 48 + 24·6.8/8 = 68.4 h.
	if !ok || math.Abs(got.fg-11.2) > 1e-9 || math.Abs(got.end-68.4) > 1e-9 {
		t.Errorf("%+v, %v: wanted 11.2 points at 68.4 h", got, ok)
	}
	for name, c := range map[string]course{
		"no plateau": {hours: []float64{0, 24, 48, 72}, points: []float64{50, 40, 30, 20}, plateau: 1.5},
		"too short":  {hours: []float64{0, 24, 48, 60}, points: []float64{50, 30, 11, 11}, plateau: 1.5},
		"small fall": {hours: []float64{0, 24, 48, 96}, points: []float64{24, 14, 11, 11}, plateau: 1.5},
		"two":        {hours: []float64{0, 24}, points: []float64{50, 11}, plateau: 1.5},
	} {
		if got, ok := c.truth(); ok {
			t.Errorf("%s: truth %+v, wanted none", name, got)
		}
	}
}

func TestThinned(t *testing.T) {
	c := course{name: "a"}
	for h := 0; h < 600; h++ {
		c.hours, c.points = append(c.hours, float64(h)), append(c.points, 50)
	}
	thin := c.thinned(7)
	for k := 1; k < len(thin.hours); k++ {
		if gap := thin.hours[k] - thin.hours[k-1]; gap < gapLo || gap > gapHi+1 {
			t.Errorf("gap of %g h, wanted %g to %g", gap, gapLo, gapHi)
		}
	}
	if again := c.thinned(7); len(again.hours) != len(thin.hours) || again.hours[3] != thin.hours[3] {
		t.Error("the same seed thins differently")
	}
	if other := c.thinned(8); len(other.hours) == len(thin.hours) && other.hours[1] == thin.hours[1] && other.hours[2] == thin.hours[2] {
		t.Error("another seed thins alike")
	}
	sparse := course{hours: []float64{0, 12, 24}, points: []float64{50, 40, 30}}
	if got := sparse.thinned(7); len(got.hours) != 3 {
		t.Errorf("%d readings left of 3 that are 12 h apart", len(got.hours))
	}
}
