package asread

import (
	"errors"
	"strings"
	"testing"

	"gylebook/gravity"
)

func TestParseReadingAccepts(t *testing.T) {
	tests := []struct {
		text      string
		def       gravity.Scale
		scale     gravity.Scale
		value     float64
		step      float64
		readAs    string
		canonical string
	}{
		// One density, three ways to type it.
		{"1.048", gravity.ScaleSG, gravity.ScaleSG, 1.048, 0.001, "SG 1.048", "1.048sg"},
		{"1048", gravity.ScaleSG, gravity.ScaleSG, 1.048, 0.001, "SG 1.048", "1.048sg"},
		{"1,048", gravity.ScaleSG, gravity.ScaleSG, 1.048, 0.001, "SG 1.048", "1.048sg"},
		{" 1.048\t", gravity.ScaleSG, gravity.ScaleSG, 1.048, 0.001, "SG 1.048", "1.048sg"},
		// The last typed place counts.
		{"1.0480", gravity.ScaleSG, gravity.ScaleSG, 1.048, 0.0001, "SG 1.0480", "1.0480sg"},
		{"1050", gravity.ScaleSG, gravity.ScaleSG, 1.05, 0.001, "SG 1.050", "1.050sg"},
		// A suffix names the scale.
		{"12P", gravity.ScaleSG, gravity.ScalePlato, 12, 1, "12 °P", "12P"},
		{"12°P", gravity.ScaleSG, gravity.ScalePlato, 12, 1, "12 °P", "12P"},
		{"12ºP", gravity.ScaleSG, gravity.ScalePlato, 12, 1, "12 °P", "12P"},
		{"12 ° p", gravity.ScaleSG, gravity.ScalePlato, 12, 1, "12 °P", "12P"},
		{"12\u00a0P", gravity.ScaleSG, gravity.ScalePlato, 12, 1, "12 °P", "12P"},
		{"12,1 plato", gravity.ScaleSG, gravity.ScalePlato, 12.1, 0.1, "12.1 °P", "12.1P"},
		{"12.1 Balling", gravity.ScaleSG, gravity.ScalePlato, 12.1, 0.1, "12.1 °P", "12.1P"},
		{"12.1Bx", gravity.ScaleSG, gravity.ScaleBrix, 12.1, 0.1, "12.1 °Bx", "12.1Bx"},
		{"12.1 BRIX", gravity.ScaleSG, gravity.ScaleBrix, 12.1, 0.1, "12.1 °Bx", "12.1Bx"},
		{"48pt", gravity.ScaleSG, gravity.ScalePoints, 48, 1, "48 points", "48pt"},
		{"48 points", gravity.ScaleSG, gravity.ScalePoints, 48, 1, "48 points", "48pt"},
		{"90Oe", gravity.ScaleSG, gravity.ScaleOechsle, 90, 1, "90 °Oe", "90Oe"},
		{"90 Oechsle", gravity.ScaleSG, gravity.ScaleOechsle, 90, 1, "90 °Oe", "90Oe"},
		{"18.2KMW", gravity.ScaleSG, gravity.ScaleKMW, 18.2, 0.1, "18.2 °KMW", "18.2KMW"},
		{"6.9Be", gravity.ScaleSG, gravity.ScaleBaume, 6.9, 0.1, "6.9 °Bé", "6.9Be"},
		{"6.9 °Bé", gravity.ScaleSG, gravity.ScaleBaume, 6.9, 0.1, "6.9 °Bé", "6.9Be"},
		{"6.9 BAUMÉ", gravity.ScaleSG, gravity.ScaleBaume, 6.9, 0.1, "6.9 °Bé", "6.9Be"},
		{"6.9Be\u0301", gravity.ScaleSG, gravity.ScaleBaume, 6.9, 0.1, "6.9 °Bé", "6.9Be"},
		{"18Tw", gravity.ScaleSG, gravity.ScaleTwaddell, 18, 1, "18 °Tw", "18Tw"},
		{"1046kg/m3", gravity.ScaleSG, gravity.ScaleDensity, 1046, 1, "1046 kg/m³", "1046kg/m3"},
		{"1,046.5 kg/m³", gravity.ScaleSG, gravity.ScaleDensity, 1046.5, 0.1, "1046.5 kg/m³", "1046.5kg/m3"},
		{"1.046,5 kg/m³", gravity.ScaleSG, gravity.ScaleDensity, 1046.5, 0.1, "1046.5 kg/m³", "1046.5kg/m3"},
		{"104g/L", gravity.ScaleSG, gravity.ScaleGPL, 104, 1, "104 g/L", "104g/L"},
		{"1.16sg", gravity.ScaleSG, gravity.ScaleSG, 1.16, 0.01, "SG 1.16", "1.16sg"},
		{"1.048 SG", gravity.ScalePlato, gravity.ScaleSG, 1.048, 0.001, "SG 1.048", "1.048sg"},
		// Bare specific gravity from 0.980 to 1.180.
		{"0.980", gravity.ScaleSG, gravity.ScaleSG, 0.98, 0.001, "SG 0.980", "0.980sg"},
		{"1.180", gravity.ScaleSG, gravity.ScaleSG, 1.18, 0.001, "SG 1.180", "1.180sg"},
		{"1.10", gravity.ScaleSG, gravity.ScaleSG, 1.1, 0.01, "SG 1.10", "1.10sg"},
		{"1.05", gravity.ScaleSG, gravity.ScaleSG, 1.05, 0.01, "SG 1.05", "1.05sg"},
		{"1.1", gravity.ScaleSG, gravity.ScaleSG, 1.1, 0.1, "SG 1.1", "1.1sg"},
		{"980", gravity.ScaleSG, gravity.ScaleSG, 0.98, 0.001, "SG 0.980", "0.980sg"},
		{"1180", gravity.ScaleSG, gravity.ScaleSG, 1.18, 0.001, "SG 1.180", "1.180sg"},
		// Bare whole points.
		{"48", gravity.ScaleSG, gravity.ScaleSG, 1.048, 0.001, "SG 1.048", "1.048sg"},
		{"0", gravity.ScaleSG, gravity.ScaleSG, 1, 0.001, "SG 1.000", "1.000sg"},
		{"180", gravity.ScaleSG, gravity.ScaleSG, 1.18, 0.001, "SG 1.180", "1.180sg"},
		// Below water.
		{"0.996", gravity.ScaleSG, gravity.ScaleSG, 0.996, 0.001, "SG 0.996", "0.996sg"},
		{"996", gravity.ScaleSG, gravity.ScaleSG, 0.996, 0.001, "SG 0.996", "0.996sg"},
		{"-1P", gravity.ScaleSG, gravity.ScalePlato, -1, 1, "-1 °P", "-1P"},
		{"−1P", gravity.ScaleSG, gravity.ScalePlato, -1, 1, "-1 °P", "-1P"},
		// Other defaults.
		{"12.1", gravity.ScalePlato, gravity.ScalePlato, 12.1, 0.1, "12.1 °P", "12.1P"},
		{"12°", gravity.ScalePlato, gravity.ScalePlato, 12, 1, "12 °P", "12P"},
		{"-5", gravity.ScaleBrix, gravity.ScaleBrix, -5, 1, "-5 °Bx", "-5Bx"},
		{"40", gravity.ScaleBrix, gravity.ScaleBrix, 40, 1, "40 °Bx", "40Bx"},
		{"1.05", gravity.ScalePlato, gravity.ScalePlato, 1.05, 0.01, "1.05 °P", "1.05P"},
		{"90", gravity.ScaleOechsle, gravity.ScaleOechsle, 90, 1, "90 °Oe", "90Oe"},
		{"48.0", gravity.ScalePoints, gravity.ScalePoints, 48, 0.1, "48.0 points", "48.0pt"},
		{"1046", gravity.ScaleDensity, gravity.ScaleDensity, 1046, 1, "1046 kg/m³", "1046kg/m3"},
		// The ends of the stated intervals.
		{"0.950sg", gravity.ScaleSG, gravity.ScaleSG, 0.95, 0.001, "SG 0.950", "0.950sg"},
		{"1.450sg", gravity.ScaleSG, gravity.ScaleSG, 1.45, 0.001, "SG 1.450", "1.450sg"},
		{"48P", gravity.ScalePlato, gravity.ScalePlato, 48, 1, "48 °P", "48P"},
		{"85Bx", gravity.ScaleSG, gravity.ScaleBrix, 85, 1, "85 °Bx", "85Bx"},
		{"-50Oe", gravity.ScaleSG, gravity.ScaleOechsle, -50, 1, "-50 °Oe", "-50Oe"},
		{"0g/L", gravity.ScaleSG, gravity.ScaleGPL, 0, 1, "0 g/L", "0g/L"},
	}
	for _, tt := range tests {
		t.Run(tt.text+"/"+tt.def.String(), func(t *testing.T) {
			r, err := ParseReading(tt.text, tt.def)
			if err != nil {
				t.Fatal(err)
			}
			if r.Scale != tt.scale || r.Value != tt.value || r.Step != tt.step {
				t.Errorf("got %v %v step %v, want %v %v step %v", r.Scale, r.Value, r.Step, tt.scale, tt.value, tt.step)
			}
			if r.ReadAs() != tt.readAs || r.Canonical() != tt.canonical {
				t.Errorf("got %q %q, want %q %q", r.ReadAs(), r.Canonical(), tt.readAs, tt.canonical)
			}
			if r.Input != strings.TrimSpace(tt.text) {
				t.Errorf("input %q, want it as typed", r.Input)
			}
		})
	}
}

// The types to type, joined by a space; what else the hint says is checked below.
func TestParseReadingDoubtsAndRefuses(t *testing.T) {
	const doubt, refusal = true, false
	tests := []struct {
		text  string
		def   gravity.Scale
		doubt bool
		types string
	}{
		{"1.16", gravity.ScaleSG, doubt, "1.016 1.16sg"},
		{"1.11", gravity.ScaleSG, doubt, "1.011 1.11sg"},
		{"1.18", gravity.ScaleSG, doubt, "1.018 1.18sg"},
		{"1,16", gravity.ScaleSG, doubt, "1.016 1.16sg"},
		{"12.1", gravity.ScaleSG, doubt, "12.1P 12.1pt"},
		{"12,1", gravity.ScaleSG, doubt, "12.1P 12.1pt"},
		{"1.2", gravity.ScaleSG, doubt, "1.2P 1.2pt"},
		{"48.0", gravity.ScaleSG, doubt, "48.0P 48.0pt"},
		{"150.5", gravity.ScaleSG, doubt, "150.5pt"},
		{"1048.5", gravity.ScaleSG, doubt, "1.0485 1048.5kg/m3"},
		{"1,048.5", gravity.ScaleSG, doubt, "1.0485 1048.5kg/m3"},
		{"1.048,5", gravity.ScaleSG, doubt, "1.0485 1048.5kg/m3"},
		{"1", gravity.ScaleSG, doubt, "1.000 1pt"}, // SG 1, or one point
		{"+48", gravity.ScaleSG, doubt, "48P 48pt"},
		{"12°", gravity.ScaleSG, doubt, "12P 12Oe"},
		{"1.48", gravity.ScaleSG, refusal, "1.048"},
		{"1.52", gravity.ScaleSG, refusal, "1.052"},
		{"1.99", gravity.ScaleSG, refusal, "1.099"},
		{"1.19", gravity.ScaleSG, refusal, "1.019 1.19sg"},
		{"1.181", gravity.ScaleSG, refusal, "1.0181 1.181sg"},
		{"0.96", gravity.ScaleSG, refusal, "0.996 0.96sg"},
		{"0.979", gravity.ScaleSG, refusal, "0.979sg"},
		{"0.048", gravity.ScaleSG, refusal, "1.048 0.048P 0.048pt"},
		{"0.5", gravity.ScaleSG, refusal, "0.5P 0.5pt"},
		{"-4", gravity.ScaleSG, refusal, "-4P -4pt"},
		{"-20", gravity.ScaleSG, refusal, "-20pt"},
		{"-1.048", gravity.ScaleSG, refusal, "1.048 -1.048P -1.048pt"},
		{"181", gravity.ScaleSG, refusal, "181pt"},
		{"960", gravity.ScaleSG, refusal, "0.960sg 960kg/m3"},
		{"1200", gravity.ScaleSG, refusal, "1.200sg 1200kg/m3"},
		{"1480", gravity.ScaleSG, refusal, ""},
		{"48", gravity.ScalePlato, refusal, "48pt 48P"},
		{"48", gravity.ScaleBrix, refusal, "48pt 48Bx"},
		{"1048", gravity.ScalePlato, refusal, "1.048sg"},
		{"1048.5", gravity.ScaleBrix, refusal, "1.0485sg 1048.5kg/m3"},
		{"1.048", gravity.ScalePlato, doubt, "1.048sg 1.048P"},
		{"1.048", gravity.ScaleBrix, doubt, "1.048sg 1.048Bx"},
		{"1048", gravity.ScaleOechsle, refusal, "1.048sg"},
		{"1.046kg/m3", gravity.ScaleSG, refusal, "1046kg/m3"},
		{"1.05 kg/m3", gravity.ScaleSG, refusal, "1050kg/m3"},
		{"1.046", gravity.ScaleDensity, refusal, "1046kg/m3"},
		{"1048sg", gravity.ScaleSG, refusal, "1.048sg"},
		{"1.48sg", gravity.ScaleSG, refusal, "1.048sg"},
		{"48sg", gravity.ScaleSG, refusal, "48pt"},
		{"0sg", gravity.ScaleSG, refusal, ""},
		{"-1sg", gravity.ScaleSG, refusal, ""},
		{"90P", gravity.ScaleSG, refusal, "90pt"},
		{"451pt", gravity.ScaleSG, refusal, ""},
		{"-51Oe", gravity.ScaleSG, refusal, ""},
		{"61KMW", gravity.ScaleSG, refusal, "61pt"},
		{"46Be", gravity.ScaleSG, refusal, "46pt"},
		{"91Tw", gravity.ScaleSG, refusal, "91pt"},
		{"1451kg/m3", gravity.ScaleSG, refusal, ""},
		{"1251g/L", gravity.ScaleSG, refusal, ""},
		{"-1g/L", gravity.ScaleSG, refusal, "-1pt"},
		{"20C", gravity.ScaleSG, refusal, ""},
		{"12X", gravity.ScaleSG, refusal, ""},
		{"1.048.", gravity.ScaleSG, refusal, ""},
		{"NaN", gravity.ScaleSG, refusal, ""},
		{"1e400", gravity.ScaleSG, refusal, ""},
		{"", gravity.ScaleSG, refusal, ""},
		{"1.048", gravity.Scale(99), refusal, ""},
	}
	for _, tt := range tests {
		t.Run(tt.text+"/"+tt.def.String(), func(t *testing.T) {
			r, err := ParseReading(tt.text, tt.def)
			if err == nil {
				t.Fatalf("accepted as %s", r.ReadAs())
			}
			ps := checkError(t, tt.text, err)
			var d *Doubt
			if errors.As(err, &d) != tt.doubt {
				t.Errorf("got %T, want doubt %v", err, tt.doubt)
			}
			if got := types(ps); got != tt.types {
				t.Errorf("proposed %q, want %q", got, tt.types)
			}
			// What is proposed must be readable as it stands.
			for _, p := range ps {
				if r, err := ParseReading(p.Type, tt.def); err != nil || !strings.HasPrefix(p.Means, r.ReadAs()) {
					t.Errorf("proposal %q (%s) reads as %q, %v", p.Type, p.Means, r.ReadAs(), err)
				}
			}
		})
	}
}

func TestRefusalsNameTheInterval(t *testing.T) {
	for text, wanted := range map[string]string{
		"1.5sg":     "SG 0.950 to 1.450",
		"86P":       "-10 to 85 °P",
		"86Bx":      "-10 to 85 °Bx",
		"451pt":     "-50 to 450 points",
		"451Oe":     "-50 to 450 °Oe",
		"61KMW":     "-10 to 60 °KMW",
		"46Be":      "-5 to 45 °Bé",
		"91Tw":      "-10 to 90 °Tw",
		"899kg/m3":  "900 to 1450 kg/m³",
		"1251 g/L":  "0 to 1250 g/L",
		"1.48":      "SG 0.980 to 1.180",
		"20 °C":     "a gravity, not a temperature",
		"12 stones": "a known scale behind the number",
	} {
		_, err := ParseReading(text, gravity.ScaleSG)
		if err == nil || !strings.Contains(err.Error(), "wanted "+wanted) {
			t.Errorf("%q: %v, want it to say %q", text, err, wanted)
		}
	}
}

func types(ps []Proposal) string {
	ts := make([]string, len(ps))
	for i, p := range ps {
		ts[i] = p.Type
	}
	return strings.Join(ts, " ")
}
