package journal

import (
	"strings"
	"testing"
)

// A volume entered later counts as if it had been known at once: 100 L of 12.39 %
// and 2 kg of sugar are 14.03 %, as in TestSugarAddition.
func TestVolumeEnteredLater(t *testing.T) {
	b := brew("B1", "T1", "1.050", "").event(2, Event{What: Sugar, MassKg: "2"}).read(24, "1.040", "20")
	v := Derive(b.rec, nil)
	if !v.Basis[0].Broken || len(v.Notes) != 1 || !strings.Contains(v.Notes[0].Text, "gylebook batch volume B1 100L") {
		t.Fatalf("without a volume: %+v, notes %v", v.Basis, v.Notes)
	}
	b.rec.Volumes = []Numbered[Volume]{
		{Number: 20, Body: Volume{Batch: "B1", At: day0, Volume: "50"}},
		{Number: 21, Body: Volume{Batch: "B1", At: day0, Volume: "100"}},
		{Number: 22, Body: Volume{Batch: "B1", At: day0, Volume: "70"}, Void: true},
	}
	v = Derive(b.rec, nil)
	near(t, "OE", float64(v.Values[0].OE), 14.03, 0.005)
	if len(v.Notes) != 0 || b.rec.Volume() != "100" {
		t.Errorf("notes %v, volume %s, wanted none and 100: of one moment the later entry, not the void one", v.Notes, b.rec.Volume())
	}
}

// Sugar without its mass is named with the way to close the gap.
func TestMissingMassIsNamed(t *testing.T) {
	v := Derive(brew("B1", "T1", "1.050", "100").event(2, Event{What: Sugar}).rec, nil)
	if len(v.Notes) != 1 || !strings.Contains(v.Notes[0].Text, "with --mass") || !strings.Contains(v.Notes[0].Text, "gylebook void ") {
		t.Errorf("notes %v", v.Notes)
	}
}

// Half the batch went into another before the sugar: 1 kg does what 2 kg did in all
// of it. What came after the sugar changes nothing.
func TestBlendedAwayIsGone(t *testing.T) {
	b := brew("B1", "T1", "1.050", "100").event(2, Event{What: Sugar, MassKg: "1"})
	given := func(hour float64, litres string) Numbered[Event] {
		return Numbered[Event]{Number: 40, Body: Event{Batch: "B2", From: "B1", What: Blend, VolumeL: litres, At: after(2 + hour)}}
	}
	b.rec.Given = []Numbered[Event]{given(-1, "50")}
	v := Derive(b.rec, nil)
	near(t, "OE", float64(v.Basis[0].OE), 14.03, 0.005)
	// 52.4 kg of wort with 1 kg of sugar are left.
	near(t, "mass", v.AmountAt(b.rec.Events[0].Body.At).MassKg, 53.4, 0.02)
	b.rec.Given = []Numbered[Event]{given(1, "50")}
	// 12.98 kg of extract and 1 kg of sugar in 105.8 kg.
	near(t, "OE", float64(Derive(b.rec, nil).Basis[0].OE), 13.21, 0.01)
	b.rec.Given = []Numbered[Event]{given(-1, "200")}
	if v = Derive(b.rec, nil); v.Basis[0].Why != "more taken out than was left" {
		t.Errorf("got %+v", v.Basis)
	}
}
