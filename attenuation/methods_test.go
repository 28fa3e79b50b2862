package attenuation

import (
	"errors"
	"fmt"
	"strings"
	"testing"

	"gylebook/gravity"
	"gylebook/gravity/method"
)

func hasRange(err error) bool {
	var r *method.RangeError
	return errors.As(err, &r)
}

// formulaOnly are the methods without a published row of their own: factors of
// the trade and a formula seen as a quotation. The measured brews serve them all.
var formulaOnly = map[string]bool{"factor-131": true, "hall1995": true, "mead-132": true}

func TestRegistry(t *testing.T) {
	want := "balling balling-const densimetric cutaia2009 uk-duty factor-131 hall1995 mead-132 must-1683"
	if got := strings.Join(ABVMethods.IDs(), " "); got != want {
		t.Errorf("methods are %s, wanted %s", got, want)
	}
	for _, e := range ABVMethods {
		if e.Name == "" || e.Source.Status == "" || e.Check == "" || e.Use == "" || e.Fn == nil {
			t.Errorf("%s: incomplete: %+v", e.ID, e.Info)
		}
		if (e.Check == method.FormulaOnly) != formulaOnly[e.ID] {
			t.Errorf("%s: check is %q", e.ID, e.Check)
		}
		if e.Better != "" {
			if _, err := ABVMethods.Find(e.Better); err != nil {
				t.Errorf("%s: %v", e.ID, err)
			}
		}
		// Every range must be about something that can be looked up.
		full := Alcohol{ABW: new(gravity.MassPct), RE: new(gravity.Plato)}
		for _, r := range e.Valid {
			if _, ok := valueOf(r.Of, Gravities{}, full); !ok {
				t.Errorf("%s: no value for the range of %q", e.ID, r.Of)
			}
		}
	}
}

// By hand: 38.0·0.130 = 4.94; 131.25·0.038 = 4.9875; 132·0.038 = 5.016; Hall
// 76.08·0.038/0.727 = 3.9767, ·1.010/0.794 = 5.0584. Balling, OE 11.914, AE
// 2.562: A = 7.591/(2.0665 - 0.1271) = 3.914, ·1.010·998.2/789.24 = 5.00.
// Cutaia, (0.372 + 0.00357·11.914)·9.352 = 3.877, ABV 4.95.
func TestWorkedABV(t *testing.T) {
	g := at(t, 1.048, 1.010)
	for _, c := range []struct {
		id       string
		abv, tol float64
	}{
		{"uk-duty", 4.94, 1e-12},
		{"factor-131", 4.9875, 1e-9},
		{"mead-132", 5.016, 1e-9},
		{"hall1995", 5.0584, 1e-3},
		{"balling", 5.00, 0.005},
		{"cutaia2009", 4.95, 0.005},
	} {
		near(t, c.id, float64(by(t, c.id, g).ABV), c.abv, c.tol)
	}
}

// Cutaia, Reid & Speers 2009, Table III: mean real extract of each data set from
// its mean original and apparent extract.
func TestCutaiaMeans(t *testing.T) {
	for _, id := range []string{"39", "41", "43", "45", "47"} {
		ex := worked(t, id)
		re := by(t, "cutaia2009", extracts(t, ex.in["OE"], ex.in["AE"])).RE
		near(t, "row "+id+" real extract", float64(*re), ex.want[0], ex.tol)
	}
}

// The mixture that densimetric returns has the density that was read and the
// original extract that it came from.
func TestDensimetricSolves(t *testing.T) {
	for _, c := range [][2]float64{{1.048, 1.010}, {1.048, 0.998}, {1.090, 1.020}, {1.140, 0.995}, {1.009, 1.001}, {1.30, 1.10}} {
		g := at(t, c[0], c[1])
		a := by(t, "densimetric", g)
		m := gravity.Mixture{Alcohol: *a.ABW, Extract: *a.RE}
		near(t, "SG", mixture20.Relative(m), c[1], 1e-9)
		near(t, "OE", float64(gravity.OriginalExtract(*a.ABW, *a.RE)), float64(g.OE), 1e-9)
	}
}

func TestInRange(t *testing.T) {
	for _, c := range []struct {
		id     string
		og, fg float64
		in     bool
	}{
		{"balling", 1.160, 1.020, true},
		{"balling-const", 1.060, 1.012, true},
		{"balling-const", 1.0601, 1.012, false},
		{"densimetric", 1.048, 1.010, true},  // real extract 4.3
		{"densimetric", 1.060, 1.018, false}, // real extract above 5
		{"cutaia2009", 1.0376, 1.008, true},  // 9.4 °P
		{"cutaia2009", 1.036, 1.008, false},
		{"cutaia2009", 1.0742, 1.012, false}, // 18.0 °P
		{"uk-duty", 1.100, 1.000, true},
		{"factor-131", 1.070, 1.012, true},
		{"factor-131", 1.071, 1.012, false},
		{"hall1995", 1.055, 1.012, true},
		{"hall1995", 1.056, 1.012, false},
	} {
		e, err := ABVMethods.Find(c.id)
		if err != nil {
			t.Fatal(err)
		}
		g := at(t, c.og, c.fg)
		notes := InRange(e, g, by(t, c.id, g))
		if (len(notes) == 0) != c.in {
			t.Errorf("%s at %v/%v: in range %v, wanted %v (%v)", c.id, c.og, c.fg, len(notes) == 0, c.in, notes)
		}
		if len(notes) > 0 && e.Better != "" && !strings.Contains(notes[0].Text, e.Better) {
			t.Errorf("%s: the note %q does not name %s", c.id, notes[0].Text, e.Better)
		}
	}
}

// Measured spread between methods (derived over usual attenuations): 0.28 % vol
// up to OG 1.060; the values outside their range do not widen it.
func TestSpread(t *testing.T) {
	es := Estimates(at(t, 1.048, 1.010))
	lo, hi := 100.0, 0.0
	for _, e := range es {
		if e.Info.Kind == KindABV {
			lo, hi = min(lo, float64(e.Alcohol.ABV)), max(hi, float64(e.Alcohol.ABV))
		}
	}
	near(t, "spread", float64(Spread(es)), hi-lo, 1e-12)
	if s := Spread(es); s <= 0 || s > 0.28 {
		t.Errorf("spread at 1.048/1.010 is %v, wanted up to 0.28", s)
	}
	strong := Estimates(at(t, 1.140, 1.030))
	for _, e := range strong {
		if e.Info.ID == "hall1995" && (e.InRange || Spread(strong) > e.Alcohol.ABV-strong[0].Alcohol.ABV) {
			t.Errorf("hall1995 widens the spread %v at OG 1.140", Spread(strong))
		}
	}
	if s := Spread(nil); s != 0 {
		t.Errorf("spread of nothing is %v", s)
	}
}

func TestEstimatesWithoutValue(t *testing.T) {
	for _, c := range []struct {
		og, fg float64
		none   string // ids without a value
	}{
		{1.048, 1.010, ""},
		{1.120, 1.010, "uk-duty"},
		{1.036, 1.010, "must-1683"},
		{1.160, 1.020, "uk-duty must-1683"},
		{1.050, 1.051, "balling balling-const densimetric cutaia2009 uk-duty factor-131 hall1995 mead-132"},
	} {
		var none []string
		for _, e := range Estimates(at(t, c.og, c.fg)) {
			if e.Err != nil {
				none = append(none, e.Info.ID)
			}
			if e.Info.ID == "uk-duty" && e.Err == nil && fmt.Sprint(e.Notes) == "[]" {
				t.Error("uk-duty without its historic note")
			}
		}
		if got := strings.Join(none, " "); got != c.none {
			t.Errorf("%v/%v: no value by %q, wanted %q", c.og, c.fg, got, c.none)
		}
	}
}
