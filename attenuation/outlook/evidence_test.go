package outlook_test

import (
	"fmt"
	"math"
	"strings"
	"testing"

	"gylebook/attenuation"
	"gylebook/attenuation/curve"
	"gylebook/attenuation/journal"
	"gylebook/attenuation/outlook"
)

func TestWords(t *testing.T) {
	h := ales(t)
	whole := course(10, 46, 204)
	for _, c := range []struct {
		name, words string
		hours       float64
		want        curve.State
	}{
		{"in its middle", whole, 60, curve.Moving},
		{"at rest for days", whole, 204, curve.Terminal},
		{"stopped at 1.024", "12:1.0455 24:1.0420 36:1.0340 48:1.0260 60:1.0242 72:1.0240 96:1.0240 120:1.0240 144:1.0240", 150, curve.Stalled},
		{"high above the forced ferment", "40:limit1.0060 " + whole, 204, curve.Stalled},
		{"nothing read", "", 60, curve.Moving},
	} {
		if e := evidence(t, c.words, h, c.hours); e.Weighed.State != c.want {
			t.Errorf("%s: %s, wanted %s", c.name, e.Weighed.State, c.want)
		}
	}
}

func TestFactsOfTheEnd(t *testing.T) {
	e := evidence(t, course(10, 46, 204), ales(t), 204)
	for code, met := range map[string]bool{"unchanged": true, "curve": true, "watch": true, "warm": true} {
		if f := factOf(t, e, code); !f.Known || f.Met != met || f.Text == "" {
			t.Errorf("%s: %+v, wanted met %v", code, f, met)
		}
	}
	if f := factOf(t, e, "limit"); f.Known || f.Text != "no forced ferment" {
		t.Errorf("limit: %+v", f)
	}
	if !e.Since.IsZero() {
		t.Errorf("since %v before it was asked for", e.Since)
	}
	// 38 points fall; less than 2 are left from 82 h on, so the curve cannot call it
	// much sooner.
	if s := e.WithSince().Since; s.Before(after(72)) || s.After(after(144)) {
		t.Errorf("since %v, wanted between hours 72 and 144", s)
	}
	moving := evidence(t, course(10, 46, 60), ales(t), 60)
	for _, code := range []string{"unchanged", "curve"} {
		if f := factOf(t, moving, code); !f.Known || f.Met {
			t.Errorf("in its middle, %s: %+v", code, f)
		}
	}
	if !moving.WithSince().Since.IsZero() {
		t.Error("a moving batch has ended since some time")
	}
}

// Dry hops begin a new watch period: what stood still before them no longer counts.
func TestDryHopsRestartTheWatch(t *testing.T) {
	h := ales(t)
	words := course(10, 46, 168)
	if e := evidence(t, words, h, 170); e.Weighed.State != curve.Terminal {
		t.Fatalf("before the hops: %s", e.Weighed.State)
	}
	for _, what := range []string{journal.DryHop, journal.Dilution} {
		e := evidence(t, words+" 170:"+what, h, 171)
		f := factOf(t, e, "watch")
		if e.Weighed.State != curve.Moving || f.Met || !strings.Contains(f.Text, "since the "+what) {
			t.Errorf("after %s: %s, %+v; wanted moving", what, e.Weighed.State, f)
		}
		if u := factOf(t, e, "unchanged"); u.Met || !strings.HasPrefix(u.Text, "no reading that counts") {
			t.Errorf("after %s: %+v", what, u)
		}
	}
	// 24 h are not enough, 48 h are.
	if e := evidence(t, words+" 170:dry-hop 172:1.0100 196:1.0100", h, 196); e.Weighed.State != curve.Moving {
		t.Errorf("24 h after the hops: %s", e.Weighed.State)
	}
	if e := evidence(t, words+" 170:dry-hop 172:1.0100 196:1.0100 220:1.0100", h, 220); e.Weighed.State != curve.Terminal || !factOf(t, e, "watch").Met {
		t.Errorf("48 h after the hops: %s", e.Weighed.State)
	}
}

// Cold yeast stands still: readings after the crash prove nothing, those before stand.
func TestColdReadingsProveNothing(t *testing.T) {
	h := ales(t)
	e := evidence(t, course(12, 46, 84)+" 85:crash 96:1.0140 120:1.0140 144:1.0140 168:1.0140", h, 170)
	if e.Weighed.State == curve.Terminal || e.Weighed.Unchanged {
		t.Errorf("four days of cold readings: %s, unchanged %v", e.Weighed.State, e.Weighed.Unchanged)
	}
	if f := factOf(t, e, "warm"); f.Met || !strings.Contains(f.Text, "4 readings since prove nothing") {
		t.Errorf("warm: %+v", f)
	}
	e = evidence(t, course(10, 46, 168)+" 170:crash 190:1.0100", h, 200)
	if e.Weighed.State != curve.Terminal {
		t.Errorf("proved before the crash: %s", e.Weighed.State)
	}
}

// Two readings a day apart, divided to a point: the difference of two roundings has
// half-width 1 point and a triangular distribution, 95 % within 1-√0.05 = 0.776; from
// half a point over √3 each, 1.96·√2·0.289 = 0.80. Either is 0.8 points a day.
func TestTwoEqualReadingsExcludeLittle(t *testing.T) {
	e := evidence(t, "100:1.012 124:1.012", ales(t), 124)
	s := e.Weighed.Slope
	if !e.Weighed.SlopeKnown || s.N != 2 || math.Abs(s.Days-1) > 1e-9 || fmt.Sprintf("%.1f", s.NotExcluded) != "0.8" {
		t.Errorf("slope %+v, wanted 0.8 points/day not excluded by 2 readings a day apart", s)
	}
	// Gas in the samples leaves more open.
	gassy := evidence(t, "100:1.012gassy 124:1.012gassy", ales(t), 124)
	if gassy.Weighed.Slope.NotExcluded < 2*s.NotExcluded {
		t.Errorf("not degassed: %v points/day", gassy.Weighed.Slope.NotExcluded)
	}
}

// What may be left reaches down to the lower end of the forecast, and to the forced
// ferment where that is lower.
func TestWhatMayBeLeft(t *testing.T) {
	h := ales(t)
	e := evidence(t, course(10, 46, 204), h, 204)
	fg, _ := e.Forecast.FG()
	last := float64(e.Forecast.Course.Last.SG)
	if !e.LeftKnown || e.Left < 1000*(last-fg.Lo)-1e-6 || e.Left < 0.5 {
		t.Errorf("%v points left, %v at %v to %v", e.Left, e.LeftKnown, last, fg.Lo)
	}
	g, v := attenuation.CO2ToCome(e.Left)
	if e.CO2GPL != g || e.CO2Volumes != v || g <= 0 {
		t.Errorf("%v g/L and %v volumes, wanted %v and %v", e.CO2GPL, e.CO2Volumes, g, v)
	}
	if e.LimitDifference != nil {
		t.Error("a difference to a limit that nobody found")
	}
	limited := evidence(t, "40:limit1.0030 "+course(10, 46, 204), h, 204)
	if math.Abs(limited.Left-7) > 0.1 { // 1.0100 less 1.0030
		t.Errorf("%v points left above a forced ferment 7 points lower", limited.Left)
	}
	if f := factOf(t, limited, "limit"); f.Met || !strings.Contains(f.Text, "7.0 points above the forced ferment at 1.0030") {
		t.Errorf("limit: %+v", f)
	}
	if d := limited.LimitDifference; d == nil || *d < 13 || *d > 15.5 {
		t.Errorf("difference to the limit %v, wanted about 7 of 48 points, 14.6 %%", d)
	}
}

// A yeast that goes on slowly is not called at its end without a forced ferment.
func TestSlowYeastWantsAForcedFerment(t *testing.T) {
	h := ales(t)
	words := course(10, 46, 204)
	for _, c := range []struct {
		words string
		want  bool
	}{{words, false}, {"40:limit1.0095 " + words, true}} {
		e, err := outlook.EvidenceOf(view(c.words), h, after(204), true)
		if err != nil {
			t.Fatal(err)
		}
		if got := e.Weighed.State == curve.Terminal; got != c.want {
			t.Errorf("with limit %v: %s", c.want, e.Weighed.State)
		}
	}
}
