package asread

import (
	"errors"
	"math"
	"strings"
	"testing"

	"pgregory.net/rapid"
)

func TestParseMass(t *testing.T) {
	tests := []struct {
		text string
		kg   float64
		kept string
	}{
		{"2kg", 2, "2"},
		{" 2.50 KG ", 2.5, "2.50"},
		{"2,5kg", 2.5, "2.5"},
		{"500 g", 0.5, "0.500"},
		{"500g", 0.5, "0.500"},
		{"0.5g", 0.0005, "0.0005"},
		{"4lb", 1.81436948, "1.81436948"}, // 4 · 0.45359237
		{"1 lbs", 0.45359237, "0.45359237"},
		{"1,200.5 kg", 1200.5, "1200.5"},
	}
	for _, tt := range tests {
		m, err := ParseMass(tt.text)
		if err != nil || m.Kg != tt.kg || m.Text != tt.kept || m.Input != strings.TrimSpace(tt.text) {
			t.Errorf("%q: %+v, %v; want %v kg kept as %q", tt.text, m, err, tt.kg, tt.kept)
		}
	}
}

func TestParseVolume(t *testing.T) {
	tests := []struct {
		text string
		l    float64
		kept string
	}{
		{"100L", 100, "100"},
		{"100.0 l", 100, "100.0"},
		{"5hl", 500, "500"},
		{"5.5 hL", 550, "550.0"},
		{"750 mL", 0.75, "0.750"},
		{"33cl", 0.33, "0.33"},
		{"1,5 litres", 1.5, "1.5"},
	}
	for _, tt := range tests {
		v, err := ParseVolume(tt.text)
		if err != nil || v.L != tt.l || v.Text != tt.kept || v.Input != strings.TrimSpace(tt.text) {
			t.Errorf("%q: %+v, %v; want %v L kept as %q", tt.text, v, err, tt.l, tt.kept)
		}
	}
}

func TestQuantityRefuses(t *testing.T) {
	mass := func(s string) error { _, err := ParseMass(s); return err }
	volume := func(s string) error { _, err := ParseVolume(s); return err }
	tests := []struct {
		parse       func(string) error
		text        string
		wants, hint string
	}{
		{mass, "2", "not a bare number", "type 2kg or 2g"},
		{mass, "2,50", "not a bare number", "type 2.50kg or 2.50g"},
		{mass, "2 stone", "a mass in kg, g or lb", "write it like 2kg or 5g"},
		{mass, "2L", "a mass in kg, g or lb", "write it like 2kg or 5g"},
		{mass, "-2kg", "0.000001 to 10000000 kg", "check the unit and the decimal mark"},
		{mass, "0kg", "0.000001 to 10000000 kg", "check the unit and the decimal mark"},
		{mass, "99999999kg", "0.000001 to 10000000 kg", "check the unit and the decimal mark"},
		{mass, "1.00000000000000000000000000000000000001lb", "fewer decimals", "leave out the last decimals"},
		{mass, "kg", "a number first", ""},
		{mass, "", "a number", ""},
		{mass, "2kg 3kg", "a mass in kg, g or lb", "write it like 2kg or 5g"},
		{volume, "100", "not a bare number", "type 100L or 100hL"},
		{volume, "5gal", "not the same everywhere", "type litres, such as 100L"},
		{volume, "5 Gallons", "not the same everywhere", "type litres, such as 100L"},
		{volume, "1bbl", "not the same everywhere", "type litres, such as 100L"},
		{volume, "1 barrel", "not the same everywhere", "type litres, such as 100L"},
		{volume, "2kg", "a volume in L, hL or mL", "write it like 2L or 5hL"},
		{volume, "1e3L", "a volume in L, hL or mL", "write it like 2L or 5hL"},
	}
	for _, tt := range tests {
		err := tt.parse(tt.text)
		var r *Refusal
		if !errors.As(err, &r) {
			t.Errorf("%q: %v, want a refusal", tt.text, err)
			continue
		}
		checkError(t, tt.text, err)
		if !strings.Contains(r.Wanted, tt.wants) || r.Hint() != tt.hint {
			t.Errorf("%q: %q, hint %q; want %q, hint %q", tt.text, r.Wanted, r.Hint(), tt.wants, tt.hint)
		}
	}
}

// checkQuantity asserts what holds for any text.
func checkQuantity(t failer, text string) {
	t.Helper()
	m, err := ParseMass(text)
	if err != nil {
		checkError(t, text, err)
	} else {
		kept(t, text, m.Text, m.Kg)
	}
	v, err := ParseVolume(text)
	if err != nil {
		checkError(t, text, err)
	} else {
		kept(t, text, v.Text, v.L)
	}
}

// kept asserts that the text kept is the value, in bounds.
func kept(t failer, text, kept string, x float64) {
	t.Helper()
	n, err := ParseNumber(kept)
	if err != nil || n.Float() != x || n.String() != kept || !(x >= 1e-6 && x <= 1e7) || math.IsNaN(x) {
		t.Errorf("%q: kept as %q for %v, read again as %v, %v", text, kept, x, n, err)
	}
}

func TestQuantityProperties(t *testing.T) {
	units := []string{"kg", " g", "lb", "L", "hl", " mL", "cl", "gal", "bbl", "", "P"}
	rapid.Check(t, func(t *rapid.T) {
		checkQuantity(t, rapid.StringMatching(`[-+]?[0-9]{1,8}([.,][0-9]{1,6})?`).Draw(t, "number")+rapid.SampledFrom(units).Draw(t, "unit"))
		checkQuantity(t, rapid.String().Draw(t, "any"))
	})
}

func FuzzParseQuantity(f *testing.F) {
	for _, s := range []string{"2kg", "500 g", "4lb", "100L", "5hl", "1,5 l", "5gal", "2", "", "\x00", "1,234.5kg", "−1kg"} {
		f.Add(s)
	}
	f.Fuzz(func(t *testing.T, text string) { checkQuantity(t, text) })
}
