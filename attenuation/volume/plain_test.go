package volume

import (
	"math"
	"strings"
	"testing"

	"pgregory.net/rapid"

	"gylebook/gravity"
	"gylebook/gravity/asread"
)

// typed are cells as people write them, good and bad.
var typed = rapid.OneOf(
	rapid.StringMatching(`[01][.,][0-9]{1,16}`),
	rapid.StringMatching(`1[.,][01][0-9]{2,3}`),
	rapid.StringMatching(`0[.,]9[78][0-9]{1,12}`),
	rapid.StringMatching(`1[.,]1[78][0-9]{1,12}`),
	rapid.StringMatching(`[0-9]{1,3}([.,][0-9]{1,14})?`),
	rapid.StringMatching(`[0-9]{1,18}`),
	rapid.StringMatching(`['+-]?[0-9.,]{0,20}`),
	rapid.StringMatching(` ?[0-9]{1,2}(\.[0-9])? ?[°]?[PCFpcf]?`),
	rapid.SampledFrom([]string{"", ".", "0.980", "1.180", "1.1800000000001", "0.97999999999999", "1,048", "1.048", "1048", "48", "37", "37.0", "37.00000000001", "140", "32", "−1", "٣", "1.0480sg"}),
)

func TestPlainSGIsParseReading(t *testing.T) {
	taken := 0
	rapid.Check(t, func(t *rapid.T) {
		cell := typed.Draw(t, "cell")
		x, ok := plainSG([]byte(cell))
		if !ok {
			return
		}
		taken++
		r, err := asread.ParseReading(cell, gravity.ScaleSG)
		if err != nil || r.Scale != gravity.ScaleSG || math.Float64bits(r.Value) != math.Float64bits(x) {
			t.Fatalf("%q is %v, wanted %v on %v, %v", cell, x, r.Value, r.Scale, err)
		}
	})
	if taken == 0 {
		t.Error("no cell was plain, so nothing was compared")
	}
	for _, plain := range []string{"1.048", "1.0480", "0.998", "1,050", "1.180"} {
		if _, ok := plainSG([]byte(plain)); !ok {
			t.Errorf("%q is not taken for plain", plain)
		}
	}
}

func TestPlainTemperatureIsParseTemperature(t *testing.T) {
	taken := 0
	rapid.Check(t, func(t *rapid.T) {
		cell := typed.Draw(t, "cell")
		unit := rapid.SampledFrom([]asread.Unit{asread.C, asread.F}).Draw(t, "unit")
		x, ok := plainTemperature([]byte(cell), unit)
		if !ok {
			return
		}
		taken++
		r, err := asread.ParseTemperature(cell, unit)
		if err != nil || math.Float64bits(float64(r.C)) != math.Float64bits(float64(x)) {
			t.Fatalf("%q %s is %v, wanted %v, %v", cell, unit, x, r.C, err)
		}
	})
	if taken == 0 {
		t.Error("no cell was plain, so nothing was compared")
	}
}

func FuzzPlain(f *testing.F) {
	for _, s := range []string{"1.048", "1,0480", "0.98", "37", "1.18", "20.5", "140.0", "1.000000000000001"} {
		f.Add(s)
	}
	f.Fuzz(func(t *testing.T, s string) {
		if strings.Contains(s, "\x00") {
			return
		}
		if x, ok := plainSG([]byte(s)); ok {
			r, err := asread.ParseReading(s, gravity.ScaleSG)
			if err != nil || r.Value != x || r.Scale != gravity.ScaleSG {
				t.Errorf("%q is %v, wanted %v, %v", s, x, r.Value, err)
			}
		}
		for _, unit := range []asread.Unit{asread.C, asread.F} {
			if x, ok := plainTemperature([]byte(s), unit); ok {
				r, err := asread.ParseTemperature(s, unit)
				if err != nil || r.C != x {
					t.Errorf("%q %s is %v, wanted %v, %v", s, unit, x, r.C, err)
				}
			}
		}
	})
}
