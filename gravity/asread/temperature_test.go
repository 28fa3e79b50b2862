package asread

import (
	"errors"
	"math"
	"strings"
	"testing"

	"gylebook/gravity"
)

func TestParseTemperatureAccepts(t *testing.T) {
	tests := []struct {
		text   string
		def    Unit
		c      gravity.Celsius
		step   float64
		unit   string
		readAs string
	}{
		{"20C", C, 20, 1, "C", "20 °C"},
		{"20 °c", F, 20, 1, "C", "20 °C"},
		{"20", C, 20, 1, "C", "20 °C"},
		{"20°", C, 20, 1, "C", "20 °C"},
		{"0", C, 0, 1, "C", "0 °C"},
		{"37", C, 37, 1, "C", "37 °C"},
		{"20,5C", C, 20.5, 0.1, "C", "20.5 °C"},
		{"20.50", C, 20.5, 0.01, "C", "20.50 °C"},
		{"40C", C, 40, 1, "C", "40 °C"}, // a suffix settles the doubt
		{"60C", C, 60, 1, "C", "60 °C"},
		// 68 °F = (68-32)·5/9 = 20 °C; a degree Fahrenheit is 5/9 °C.
		{"68F", C, 20, 5.0 / 9, "F", "68 °F (20.0 °C)"},
		{"68", F, 20, 5.0 / 9, "F", "68 °F (20.0 °C)"},
		{"68.0 fahrenheit", C, 20, 0.5 / 9, "F", "68.0 °F (20.0 °C)"},
		{"32", F, 0, 5.0 / 9, "F", "32 °F (0.0 °C)"},
		{"140", F, 60, 5.0 / 9, "F", "140 °F (60.0 °C)"},
		{"40", F, 40.0 / 9, 5.0 / 9, "F", "40 °F (4.4 °C)"}, // (40-32)·5/9
	}
	for _, tt := range tests {
		t.Run(tt.text+"/"+string(tt.def), func(t *testing.T) {
			got, err := ParseTemperature(tt.text, tt.def)
			if err != nil {
				t.Fatal(err)
			}
			if math.Abs(float64(got.C-tt.c)) > 1e-12 || math.Abs(got.Step-tt.step) > 1e-15 || got.Unit != tt.unit {
				t.Errorf("got %v step %v %s, want %v step %v %s", got.C, got.Step, got.Unit, tt.c, tt.step, tt.unit)
			}
			if got.ReadAs() != tt.readAs || got.Input != tt.text {
				t.Errorf("got %q of %q, want %q", got.ReadAs(), got.Input, tt.readAs)
			}
		})
	}
}

func TestParseTemperatureDoubtsAndRefuses(t *testing.T) {
	const doubt, refusal = true, false
	const (
		warm = "warm the sample, then read again"
		cool = "cool the sample before reading: hot liquid burns and breaks glass"
	)
	tests := []struct {
		text  string
		def   Unit
		doubt bool
		types string
		hint  string // "" where the proposals make the hint
	}{
		{"40", C, doubt, "40C 40F", ""},
		{"37.5", C, doubt, "37.5C 37.5F", ""},
		{"38", C, doubt, "38C 38F", ""},
		{"60", C, doubt, "60C 60F", ""},
		{"61", C, refusal, "61F", ""},
		{"68", C, refusal, "68F", ""},
		{"140", C, refusal, "140F", ""},
		{"141", C, refusal, "", cool},
		{"-1", C, refusal, "", warm},
		{"20", F, refusal, "20C", ""},
		{"31", F, refusal, "31C", ""},
		{"-1", F, refusal, "", warm},
		{"141", F, refusal, "", cool},
		{"−1C", C, refusal, "", warm},
		{"61C", C, refusal, "", cool},
		{"60.01C", C, refusal, "", cool},
		{"31F", C, refusal, "", warm},
		{"141F", C, refusal, "", cool},
		{"293K", C, refusal, "", "write it like 20C or 68F"},
		{"12P", C, refusal, "", "write it like 20C or 68F"},
		{"20", Unit("K"), refusal, "", "write it like 20C or 68F"},
	}
	for _, tt := range tests {
		t.Run(tt.text+"/"+string(tt.def), func(t *testing.T) {
			got, err := ParseTemperature(tt.text, tt.def)
			if err == nil {
				t.Fatalf("accepted as %s", got.ReadAs())
			}
			ps := checkError(t, tt.text, err)
			var d *Doubt
			if errors.As(err, &d) != tt.doubt {
				t.Errorf("got %T, want doubt %v", err, tt.doubt)
			}
			if types(ps) != tt.types {
				t.Errorf("proposed %q, want %q", types(ps), tt.types)
			}
			var h interface{ Hint() string }
			if errors.As(err, &h) && tt.hint != "" && h.Hint() != tt.hint {
				t.Errorf("hint %q, want %q", h.Hint(), tt.hint)
			}
			for _, p := range ps {
				if r, err := ParseTemperature(p.Type, tt.def); err != nil || r.ReadAs() != p.Means {
					t.Errorf("proposal %q reads as %q, %v; want %q", p.Type, r.ReadAs(), err, p.Means)
				}
			}
		})
	}
}

func TestParsePair(t *testing.T) {
	for text, want := range map[string]gravity.Pair{
		"20/20":        gravity.Pair2020,
		" 20 °C / 20 ": gravity.Pair2020,
		"15/15":        gravity.Pair1515,
		"15/4":         gravity.Pair154,
		"20/4":         gravity.Pair204,
		"17.5/17.5":    gravity.Pair175175,
		"17,5/17,5":    gravity.Pair175175,
		"60/60F":       gravity.Pair6060F,
		"60F/60F":      gravity.Pair6060F,
		"60F/60":       gravity.Pair6060F,
		"60°F/60 f":    gravity.Pair6060F,
		"15.56/15.56":  gravity.Pair6060F,
		"15.6/15.6":    gravity.Pair6060F,
		"60F/20C":      {Sample: gravity.Pair6060F.Sample, Water: 20},
		"60/60":        {Sample: 60, Water: 60}, // °C where no unit is typed
		"0/60":         {Sample: 0, Water: 60},
	} {
		if got, err := ParsePair(text); err != nil || got != want {
			t.Errorf("%q: %v, %v; want %v", text, got, err, want)
		}
	}
	for _, text := range []string{"", "20", "20/", "/20", "20/20/20", "61/20", "20/-1", "31/60F", "20K/20K", "20P/20", "NaN/20", "a/b"} {
		got, err := ParsePair(text)
		if err == nil {
			t.Errorf("%q: accepted as %v", text, got)
			continue
		}
		checkError(t, text, err)
		if !strings.Contains(err.Error(), "20/20") {
			t.Errorf("%q: %q gives no example", text, err)
		}
	}
	for _, p := range []gravity.Pair{gravity.Pair2020, gravity.Pair1515, gravity.Pair6060F, gravity.Pair175175, gravity.Pair154, gravity.Pair204} {
		if got, err := ParsePair(p.String()); err != nil || got != p {
			t.Errorf("%s does not come back: %v, %v", p, got, err)
		}
	}
}
