package gravity_test

import (
	"strings"
	"testing"

	"gylebook/gravity"
)

func TestWaterAgainstIAPWS95(t *testing.T) {
	for _, r := range rows(t, "water_iapws95") {
		at := gravity.Celsius(number(t, r, "t_C"))
		for _, w := range gravity.Waters {
			if w.Valid[0].Contains(float64(at)) {
				agree(t, r, w.ID, "rho_kg_m3", 1, float64(w.Fn(at)))
			}
		}
	}
}

func TestWaterAgainstQuotedPoints(t *testing.T) {
	seen := 0
	for _, r := range rows(t, "water_points") {
		switch {
		case strings.HasPrefix(r.Text("t_C"), "~4"):
			// The maximum: -a1 of the formula is its temperature.
			agree(t, r, "tanaka2001", "rho_kg_m3", 1, float64(gravity.Tanaka(3.983035)))
		case strings.HasPrefix(r.Text("kind"), "true"):
			at := gravity.Celsius(number(t, r, "t_C"))
			agree(t, r, "tanaka2001", "rho_kg_m3", 1, float64(gravity.Tanaka(at)))
			agree(t, r, "kell-its90", "rho_kg_m3", 1, float64(gravity.Kell(at)))
		case strings.HasPrefix(r.Text("kind"), "apparent"):
			// Weighed in air against brass, per millilitre of 1.000028 cm³: what
			// 1 mL weighs is (rho - air)/(1 - air/brass).
			const air, brass, oldLitre = 1.2, 8400, 0.999972
			rho := float64(gravity.Tanaka(20)) / oldLitre
			agree(t, r, "tanaka2001", "rho_kg_m3", 1, (rho-air)/(1-air/brass))
		default:
			t.Errorf("%s: kind %q is not known here", r.Where(), r.Text("kind"))
		}
		seen++
	}
	if seen < 5 {
		t.Errorf("%d rows, wanted the five quoted points", seen)
	}
}

// Water is densest near 4 °C and thins on either side of it.
func TestWaterHasOneMaximum(t *testing.T) {
	for _, w := range gravity.Waters {
		for at := gravity.Celsius(0); at < 40; at += 0.25 {
			rises := w.Fn(at+0.25) > w.Fn(at)
			if at+0.25 <= 3.75 && !rises || at >= 4.25 && rises {
				t.Errorf("%s: rises from %v to %v °C is %t", w.ID, at, at+0.25, rises)
			}
		}
	}
}

// Each liquid model has its own water: at zero content the model is that water,
// and the waters differ by less than 0.007 kg/m³ (OIML R 22 is of 1973, on IPTS-68).
func TestModelsKeepTheirOwnWater(t *testing.T) {
	for _, at := range []gravity.Celsius{0, 4, 15, 20, 30, 40} {
		sucrose, ethanol := gravity.SucroseAt(at), gravity.EthanolAt(at)
		if got, want := sucrose.Density(0), sucrose.Water(); got != want {
			t.Errorf("sucrose model at %v °C: %v at 0 %%, water %v", at, got, want)
		}
		if got, want := ethanol.Density(0), ethanol.Water(); got != want {
			t.Errorf("ethanol model at %v °C: %v at 0 %%, water %v", at, got, want)
		}
		if sucrose.Water() != gravity.Kell(at) {
			t.Errorf("water of the sucrose model at %v °C is not Kell's", at)
		}
		near(t, "water of the ethanol model", float64(ethanol.Water()), float64(gravity.Tanaka(at)), 0.007)
	}
}
