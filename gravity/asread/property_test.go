package asread

import (
	"fmt"
	"math"
	"testing"
	"unicode/utf8"

	"pgregory.net/rapid"

	"gylebook/gravity"
)

// bounded are the documented ends of each scale, written out again so that a
// slip in the table of the package shows.
var bounded = map[gravity.Scale][2]float64{
	gravity.ScaleSG: {0.95, 1.45}, gravity.ScalePlato: {-10, 85}, gravity.ScaleBrix: {-10, 85},
	gravity.ScalePoints: {-50, 450}, gravity.ScaleOechsle: {-50, 450}, gravity.ScaleKMW: {-10, 60},
	gravity.ScaleBaume: {-5, 45}, gravity.ScaleTwaddell: {-10, 90}, gravity.ScaleDensity: {900, 1450},
	gravity.ScaleGPL: {0, 1250},
}

type failer interface {
	Helper()
	Errorf(string, ...any)
}

// checkReading asserts what holds for any text: an error in form, or a value in
// bounds whose canonical text reads back alike under every default.
func checkReading(t failer, text string, def gravity.Scale) {
	t.Helper()
	r, err := ParseReading(text, def)
	if err != nil {
		for _, p := range checkError(t, text, err) {
			if _, err := ParseReading(p.Type, def); err != nil {
				t.Errorf("%q: proposal %q: %v", text, p.Type, err)
			}
		}
		return
	}
	if b := bounded[r.Scale]; !(r.Value >= b[0] && r.Value <= b[1]) || !(r.Step > 0 && r.Step <= 1) {
		t.Errorf("%q: %v %v step %v is out of bounds", text, r.Value, r.Scale, r.Step)
	}
	for _, info := range gravity.Scales() {
		again, err := ParseReading(r.Canonical(), info.Scale)
		if err != nil || again.Value != r.Value || again.Scale != r.Scale || again.Step != r.Step ||
			again.Canonical() != r.Canonical() || again.ReadAs() != r.ReadAs() {
			t.Errorf("%q: %q on %v reads back as %q, %v", text, r.Canonical(), info.Scale, again.Canonical(), err)
		}
	}
}

func checkTemperature(t failer, text string, def Unit) {
	t.Helper()
	r, err := ParseTemperature(text, def)
	if err != nil {
		for _, p := range checkError(t, text, err) {
			if _, err := ParseTemperature(p.Type, def); err != nil {
				t.Errorf("%q: proposal %q: %v", text, p.Type, err)
			}
		}
		return
	}
	if !(r.C >= 0 && r.C <= 60) || !(r.Step > 0 && r.Step <= 1) {
		t.Errorf("%q: %v °C step %v is out of bounds", text, r.C, r.Step)
	}
	for _, u := range []Unit{C, F} {
		again, err := ParseTemperature(r.Canonical(), u)
		if err != nil || again.C != r.C || again.Unit != r.Unit || again.Step != r.Step || again.ReadAs() != r.ReadAs() {
			t.Errorf("%q: %q with %v reads back as %q, %v", text, r.Canonical(), u, again.ReadAs(), err)
		}
	}
}

// typed draws numbers as people type them, good and bad.
var typed = rapid.Custom(func(t *rapid.T) string {
	x := rapid.OneOf(rapid.Float64Range(0.9, 1.5), rapid.Float64Range(-60, 200), rapid.Float64Range(800, 1500)).Draw(t, "x")
	number := fmt.Sprintf("%.*f", rapid.IntRange(0, 5).Draw(t, "places"), x)
	return number + rapid.SampledFrom([]string{"", "", "", "P", " °Bx", "pt", "Oe", "KMW", "Be", "Tw", "kg/m3", "g/L", "sg", "C", "F", "?"}).Draw(t, "suffix")
})

func TestReadingProperties(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		text := typed.Draw(t, "text")
		checkReading(t, text, gravity.Scale(rapid.IntRange(0, len(gravity.Scales())-1).Draw(t, "default")))
		checkTemperature(t, text, rapid.SampledFrom([]Unit{C, F}).Draw(t, "unit"))
	})
}

// The value of a number is the float64 that Go reads from the same digits, and
// its text comes back.
func TestNumberProperties(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		n, places := rapid.Int64().Draw(t, "n"), rapid.IntRange(0, 15).Draw(t, "places")
		text := fmt.Sprintf("%.*f", places, float64(n)/1e15)
		v, err := ParseNumber(text)
		if err != nil {
			t.Fatal(err)
		}
		var want float64
		if _, err := fmt.Sscan(text, &want); err != nil {
			t.Fatal(err)
		}
		if v.Float() != want || v.Places() != places || v.Step() != math.Pow10(-places) {
			t.Fatalf("%q: %v, %d places, step %v", text, v.Float(), v.Places(), v.Step())
		}
		if again, err := ParseNumber(v.String()); err != nil || again.String() != v.String() || again.Float() != want {
			t.Fatalf("%q: %q does not come back: %v", text, v.String(), err)
		}
	})
}

func FuzzParseReading(f *testing.F) {
	for i, s := range []string{
		"1.048", "1048", "1,048", "1,048.5", "1.048,5", "12.1", "1.16", "1.48", "0.96", "48", "1", "-4", "−1P", "12 °P",
		"1046kg/m3", "1.05kg/m³", "104 g/L", "6.9 Baumé", "1e400", "NaN", "", "\x00\xff", "9999999999999999999999999999999999999999",
		"0.00000000000000000000000000000000000001P", "١٢", "12°", "K", "1.048sg",
	} {
		f.Add(s, i%len(gravity.Scales()))
	}
	f.Fuzz(func(t *testing.T, text string, def int) {
		checkReading(t, text, gravity.Scale(def))
	})
}

func FuzzParseTemperature(f *testing.F) {
	for i, s := range []string{"20", "40", "68", "20C", "68F", "20,5C", "−1C", "60.0000001", "293K", "", "\xff", "140F", "32", "20 ° c", "1e1"} {
		f.Add(s, i%2 == 0)
	}
	f.Fuzz(func(t *testing.T, text string, fahrenheit bool) {
		def := C
		if fahrenheit {
			def = F
		}
		checkTemperature(t, text, def)
		if p, err := ParsePair(text + "/" + text); err == nil && !(p.Sample >= 0 && p.Sample <= 60 && p.Water >= 0 && p.Water <= 60) {
			t.Errorf("%q: pair %v is out of bounds", text, p)
		}
		for _, field := range Fields(text) {
			if !utf8.ValidString(field) && utf8.ValidString(text) {
				t.Errorf("%q: field %q broke a character", text, field)
			}
		}
	})
}

func BenchmarkParseReading(b *testing.B) {
	for _, text := range []string{"1.0480", "12.1P", "48", "12.1"} {
		b.Run(text, func(b *testing.B) {
			b.ReportAllocs()
			for b.Loop() {
				// 12.1 is the doubt, whose proposals cost the most.
				if _, err := ParseReading(text, gravity.ScaleSG); (err != nil) != (text == "12.1") {
					b.Fatal(err)
				}
			}
		})
	}
}
