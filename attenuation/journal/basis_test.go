package journal

import (
	"errors"
	"testing"

	"gylebook/attenuation"
	"gylebook/gravity"
)

// The mass balance of an addition by hand is in the tests of package attenuation:
// 100 L of OG 1.050 and 2 kg of sugar make OE 14.03 °P, effective OG 1.0570.
func TestSugarAddition(t *testing.T) {
	b := brew("B1", "T1", "1.050", "100").read(24, "1.030", "20").event(24, Event{What: Sugar, MassKg: "2"}).read(25, "1.037", "20").read(48, "1.012", "20")
	v := Derive(b.rec, nil)
	if len(v.Basis) != 1 || v.Basis[0].Broken {
		t.Fatalf("got %+v", v.Basis)
	}
	near(t, "OE", float64(v.Basis[0].OE), 14.03, 0.005)
	near(t, "effective OG", float64(v.Basis[0].SG), 1.0570, 0.00005)
	near(t, "mass", v.Basis[0].MassKg, 106.81, 0.02)
	// Values keep the original extract of their time; at the very same time the
	// sample was drawn first.
	if v.Values[0].OE != v.OG.Extract || v.Values[1].OE != v.Basis[0].OE || v.Values[2].OG != v.Basis[0].SG {
		t.Errorf("got %v %v %v", v.Values[0].OE, v.Values[1].OE, v.Values[2].OE)
	}
	if _, ok := Derive(brewUntil(b, 2), nil).Fall24h(); ok {
		t.Error("a fall across an addition")
	}
	if _, ok := v.Fall24h(); !ok {
		t.Error("no fall after the addition")
	}
}

// brewUntil is the batch with its first n readings.
func brewUntil(b *builder, n int) *Record {
	rec := *b.rec
	rec.Readings = rec.Readings[:n]
	return &rec
}

// 100 L of 15.00 °P (105.9 kg) and 26.48 kg of water are 12.00 °P; by hand in the
// tests of package attenuation.
func TestOtherAdditions(t *testing.T) {
	plato := func(text string) Typed { return Typed{Text: text, Scale: "plato"} }
	for name, tt := range map[string]struct {
		event Event
		oe    float64
		why   string
	}{
		"water by mass":   {Event{What: Dilution, MassKg: "26.48"}, 12.00, ""},
		"water by volume": {Event{What: Dilution, VolumeL: "26.53"}, 12.00, ""}, // 26.48/0.9982
		"the same wort":   {Event{What: TopUp, VolumeL: "50", Gravity: plato("15")}, 15.00, ""},
		// 105.9 kg at 15 and 105.9 kg at 9: the mean.
		"by mass":     {Event{What: TopUp, MassKg: "105.9", Gravity: plato("9")}, 12.00, ""},
		"blend":       {Event{What: Blend, MassKg: "105.9", From: "B7"}, 12.00, ""},
		"blend typed": {Event{What: Blend, MassKg: "105.9", From: "B8", Gravity: plato("9")}, 12.00, ""},
		// (105.9 · 15 + 10 · 80)/115.9 = 20.61.
		"syrup": {Event{What: Sugar, MassKg: "10", Gravity: plato("80P")}, 20.61, ""},
		// (105.9 · 15 + 20 · 10)/125.9 = 14.21.
		"fruit": {Event{What: Fruit, MassKg: "20", Gravity: plato("10")}, 14.21, ""},

		"sugar alone":    {Event{What: Sugar}, 0, "sugar added without mass"},
		"fruit alone":    {Event{What: Fruit, MassKg: "20"}, 0, "fruit added without mass and gravity"},
		"fruit by taste": {Event{What: Fruit, Gravity: plato("10")}, 0, "fruit added without mass and gravity"},
		"water alone":    {Event{What: Dilution}, 0, "dilution added without mass or volume"},
		"no gravity":     {Event{What: TopUp, VolumeL: "5"}, 0, "top-up added without gravity"},
		"no volume":      {Event{What: TopUp, Gravity: plato("9")}, 0, "top-up added without mass or volume"},
		"unknown blend":  {Event{What: Blend, VolumeL: "5", From: "B8"}, 0, "blend added, original gravity of B8 not known"},
		"doubtful":       {Event{What: TopUp, VolumeL: "5", Gravity: sg("12.1")}, 0, "top-up added without gravity"},
		"all sugar":      {Event{What: Sugar, MassKg: "100000"}, 0, "what was added cannot be: sugar"},
	} {
		t.Run(name, func(t *testing.T) {
			b := brew("B1", "T1", "", "100").event(2, tt.event).read(24, "1.040", "20")
			b.rec.OGs = []Numbered[OG]{{Body: OG{At: day0, Gravity: plato("15.00")}}}
			book := NewBook(nil)
			book.OE = func(id string) (gravity.Plato, bool) { return 9, id == "B7" }
			v := Derive(b.rec, book)
			one := v.Values[0]
			if tt.why != "" {
				if one.Why != tt.why || one.Attenuation != nil || one.OE != 0 || !v.Basis[0].Broken || !hasNote(v.Notes, NoteBasis) {
					t.Errorf("got %q %+v, want %q", one.Why, v.Basis, tt.why)
				}
				return
			}
			if one.Attenuation == nil {
				t.Fatal(one.Why)
			}
			near(t, "OE", float64(one.OE), tt.oe, 0.005)
		})
	}
}

// A gap stays until it is closed: a later, complete addition does not help; voiding
// the first and entering it anew does.
func TestBrokenUntilEnteredAnew(t *testing.T) {
	b := brew("B1", "T1", "1.050", "100").event(2, Event{What: Sugar}).event(3, Event{What: Sugar, MassKg: "1"}).read(24, "1.030", "20")
	v := Derive(b.rec, nil)
	if len(v.Basis) != 2 || !v.Basis[1].Broken || v.Values[0].Why != "sugar added without mass" {
		t.Fatalf("got %+v, %q", v.Basis, v.Values[0].Why)
	}
	b.rec.Events[0].Void = true
	b.event(2, Event{What: Sugar, MassKg: "1"})
	v = Derive(b.rec, nil)
	near(t, "OE", float64(v.Values[0].OE), 14.03, 0.005)
	// Without the batch's volume nothing can be balanced.
	b.rec.Batch.Volume = ""
	if v = Derive(b.rec, nil); v.Values[0].Why != "batch volume not known" {
		t.Errorf("got %q", v.Values[0].Why)
	}
}

// Half the batch is racked off the lees, so that 1 kg does what 2 did.
func TestLossesCount(t *testing.T) {
	b := brew("B1", "T1", "1.050", "100").event(1, Event{What: Racking, VolumeL: "50"}).event(2, Event{What: DryHop, MassKg: "1"}).
		event(2, Event{What: Crash}).event(2, Event{What: Move, Vessel: "T2"}).event(3, Event{What: Sugar, MassKg: "1"})
	v := Derive(b.rec, nil)
	if len(v.Basis) != 1 {
		t.Fatalf("got %+v", v.Basis)
	}
	near(t, "OE", float64(v.Basis[0].OE), 14.03, 0.005)
	b.rec.Events[0].Body.VolumeL = "100"
	if v = Derive(b.rec, nil); !v.Basis[0].Broken || v.Basis[0].Why != "more taken out than was left" {
		t.Errorf("got %+v", v.Basis)
	}
}

func TestPrimingCountsAsExpectedStrength(t *testing.T) {
	b := brew("B1", "T1", "1.050", "100").read(240, "1.010", "20").event(250, Event{What: Priming, MassKg: "0.6"}).read(260, "1.012", "20")
	book := NewBook(nil)
	v := Derive(b.rec, book)
	if len(v.Basis) != 0 || v.Values[1].OE != v.OG.Extract || !v.Primed.Equal(after(250)) {
		t.Fatalf("got %+v", v)
	}
	// 0.6 kg of sugar in 100 L give 0.6/2.0665 kg of ethanol, 0.290/0.78924 =
	// 0.368 L, less what the 0.3 L that the sugar takes thin the rest: 0.35 % vol,
	// on the Balling strength of the value before.
	got, err := v.ExpectedABV()
	if err != nil {
		t.Fatal(err)
	}
	near(t, "gain", float64(got-v.Values[0].Attenuation.ABV), 0.35, 0.005)

	rule, _ := attenuation.FindRule("uk-duty")
	if !errors.Is(v.CheckRule(rule), ErrPrimed) {
		t.Error("the rule takes a primed batch")
	}
	label, _ := attenuation.FindRule("eu-label")
	if v.CheckRule(label) != nil {
		t.Error("the label rule does not")
	}
	book.ABV, _ = attenuation.ABVMethods.Find("uk-duty")
	v = Derive(b.rec, book)
	if v.Values[0].Alcohol == nil || v.Values[1].Alcohol != nil || v.Values[1].AlcoholWhy != ErrPrimed.Error() || v.Values[1].Attenuation == nil {
		t.Errorf("got %+v, %q", v.Values[1].Alcohol, v.Values[1].AlcoholWhy)
	}
	// 40 points at 0.130 (the band 36.1 to 46.5).
	near(t, "duty strength", float64(v.Values[0].Alcohol.ABV), 5.2, 1e-9)

	b.rec.Events[0].Body.MassKg = ""
	if _, err = Derive(b.rec, nil).ExpectedABV(); !errors.Is(err, ErrNoStrength) {
		t.Errorf("without mass: %v", err)
	}
	b.rec.Events[0].Void = true
	v = Derive(b.rec, nil)
	if got, err = v.ExpectedABV(); err != nil || got != v.Last().Attenuation.ABV {
		t.Errorf("unprimed: %v, %v", got, err)
	}
}

func TestLimitOfAttenuation(t *testing.T) {
	b := brew("B1", "T1", "1.050", "").read(24, "1.030", "20")
	b.rec.Limits = []Numbered[Limit]{
		{Number: 8, Body: Limit{At: after(1), Gravity: sg("1.008")}},
		{Number: 7, Body: Limit{At: after(2), Gravity: Typed{Text: "2.10", Scale: "plato"}}},
		{Number: 9, Void: true, Body: Limit{At: after(3), Gravity: sg("1.020")}},
	}
	if v := Derive(b.rec, nil); v.Limit == nil || *v.Limit != 2.10 {
		t.Errorf("got %v", v.Limit)
	}
}
