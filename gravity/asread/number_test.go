package asread

import (
	"errors"
	"strings"
	"testing"

	"github.com/google/go-cmp/cmp"

	"gylebook/gravity"
	"gylebook/gravity/method"
)

func TestParseNumber(t *testing.T) {
	tests := []struct {
		text   string
		value  float64
		places int
		step   float64
		prints string
	}{
		{"1.0480", 1.048, 4, 0.0001, "1.0480"},
		{"1,0480", 1.048, 4, 0.0001, "1.0480"},
		{"48", 48, 0, 1, "48"},
		{" 48 ", 48, 0, 1, "48"},
		{"+0.50", 0.5, 2, 0.01, "0.50"},
		{"-0.5", -0.5, 1, 0.1, "-0.5"},
		{"−0,5", -0.5, 1, 0.1, "-0.5"},
		{"-0.00", 0, 2, 0.01, "0.00"},
		{"007", 7, 0, 1, "7"},
		{"1,048.5", 1048.5, 1, 0.1, "1048.5"},
		{"1.048,5", 1048.5, 1, 0.1, "1048.5"},
		{"12,345,678.25", 12345678.25, 2, 0.01, "12345678.25"},
		{strings.Repeat("9", 40), 1e40, 0, 1, strings.Repeat("9", 40)},
	}
	for _, tt := range tests {
		v, err := ParseNumber(tt.text)
		if err != nil {
			t.Errorf("%q: %v", tt.text, err)
			continue
		}
		if v.Float() != tt.value || v.Places() != tt.places || v.Step() != tt.step || v.String() != tt.prints {
			t.Errorf("%q: %v, %d places, step %v, %q; want %v, %d, %v, %q", tt.text,
				v.Float(), v.Places(), v.Step(), v.String(), tt.value, tt.places, tt.step, tt.prints)
		}
		if v.Text != strings.TrimSpace(tt.text) {
			t.Errorf("%q: text %q", tt.text, v.Text)
		}
	}
}

func TestParseNumberRefuses(t *testing.T) {
	for _, text := range []string{
		"", " ", "-", "+", "−", ".", ",", ".5", "5.", "1..5", "1.0.5", "1,2,3", "1,048,576", "1.048.576",
		"10,48.5", "1,0485.5", "0,048.5", ",048.5", "1.048,5,5", "1,048.576.5", "1,.5",
		"--5", "+-5", "- 5", "5-", "1e3", "1E400", "0x10", "NaN", "Inf", "-Inf", "infinity", "1_000", "1 000",
		"１２", "1２", "٣", "12P", "20%", "1.048\x00", "\x00", "\xff\xfe", "½",
		strings.Repeat("9", 41), "0." + strings.Repeat("0", 40), strings.Repeat("1", 1<<16),
	} {
		v, err := ParseNumber(text)
		if err == nil {
			t.Errorf("%.50q: accepted as %v", text, v)
			continue
		}
		checkError(t, text, err)
		if len(err.Error()) > 250 {
			t.Errorf("%.50q: the error repeats too much", text)
		}
	}
	_, err := ParseNumber(strings.Repeat("9", 41))
	if err == nil || !strings.Contains(err.Error(), "too long") {
		t.Errorf("41 digits: %v, want it to say too long", err)
	}
}

func TestZeroValue(t *testing.T) {
	var v Value
	if v.Float() != 0 || v.Places() != 0 || v.Step() != 1 || v.String() != "0" {
		t.Errorf("zero value is %v, %d places, step %v, %q", v.Float(), v.Places(), v.Step(), v.String())
	}
}

func TestParseScale(t *testing.T) {
	for text, want := range map[string]gravity.Scale{
		"SG": gravity.ScaleSG, "P": gravity.ScalePlato, "°P": gravity.ScalePlato, " Plato ": gravity.ScalePlato,
		"balling": gravity.ScalePlato, "Bx": gravity.ScaleBrix, "brix": gravity.ScaleBrix, "pt": gravity.ScalePoints,
		"points": gravity.ScalePoints, "Oe": gravity.ScaleOechsle, "KMW": gravity.ScaleKMW, "Be": gravity.ScaleBaume,
		"Baumé": gravity.ScaleBaume, "Tw": gravity.ScaleTwaddell, "kg/m3": gravity.ScaleDensity,
		"kg / m³": gravity.ScaleDensity, "g/L": gravity.ScaleGPL,
	} {
		if got, err := ParseScale(text); err != nil || got != want {
			t.Errorf("%q: %v, %v; want %v", text, got, err, want)
		}
	}
	// Every scale is reached by its id and its symbol, and has limits.
	for _, info := range gravity.Scales() {
		for _, text := range []string{info.ID, info.Symbol, limits[info.Scale].suffix} {
			if got, err := ParseScale(text); err != nil || got != info.Scale {
				t.Errorf("%q: %v, %v; want %v", text, got, err, info.Scale)
			}
		}
	}
	for _, text := range []string{"", "°", "C", "proof", "\x00"} {
		_, err := ParseScale(text)
		var unknown *method.UnknownError
		if !errors.As(err, &unknown) || unknown.Got != text || len(unknown.Known) != len(gravity.Scales()) {
			t.Errorf("%q: %v, want an unknown scale with the ids", text, err)
		}
	}
}

func TestFields(t *testing.T) {
	for line, want := range map[string][]string{
		"":                             nil,
		"12 P 1.048":                   {"12 P", "1.048"},
		"12P 1.048":                    {"12P", "1.048"},
		" 1046\tkg/m3  20 C\r\n":       {"1046 kg/m3", "20 C"},
		"12 ° P":                       {"12 ° P"},
		"12° P 3 °P":                   {"12° P", "3 °P"},
		"P 12":                         {"P", "12"},
		"12P P":                        {"12P", "P"}, // it has its unit already
		"12 P P":                       {"12 P", "P"},
		"T4 P 1.012 18 C":              {"T4", "P", "1.012", "18 C"},
		"−1 Plato -1 bx":               {"−1 Plato", "-1 bx"},
		"1.048 stones":                 {"1.048", "stones"},
		"1.050 1.010":                  {"1.050", "1.010"},
		"--units C 1.048 SG 68\u00a0F": {"--units", "C", "1.048 SG", "68 F"},
	} {
		if diff := cmp.Diff(want, Fields(line)); diff != "" {
			t.Errorf("%q: -want +got\n%s", line, diff)
		}
	}
	args := []string{"12", "P", "1.048"}
	Join(args)
	if diff := cmp.Diff([]string{"12", "P", "1.048"}, args); diff != "" {
		t.Errorf("Join changed its input:\n%s", diff)
	}
}
