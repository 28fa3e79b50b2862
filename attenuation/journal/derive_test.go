package journal

import (
	"errors"
	"strings"
	"testing"

	"gylebook/attenuation"
	"gylebook/gravity"
	"gylebook/tempcorr"
)

// A check in water that finds 0.998 where 1.000 is right adds 0.002; U (k = 2) is
// 2 · 0.0005/√3 = 0.000577 from a division of 0.001.
func TestCheckCorrects(t *testing.T) {
	rec := glass("H1")
	rec.Checks = []Numbered[Check]{{Number: 5, Body: Check{
		Instrument: "H1", At: after(0), Liquid: InWater, Found: sg("0.998"), Expected: sg("1.000"), Temp: celsius("20"), Correction: "0.002",
	}}}
	book := NewBook([]*InstrumentRecord{rec})
	h, notes, err := book.Hydrometer("H1", after(0))
	if err != nil || len(notes) > 0 {
		t.Fatal(notes, err)
	}
	if len(h.Certificate) != 1 || h.Certificate[0].Reading != 0.998 || h.Certificate[0].Correction != 0.002 || h.InLiquid {
		t.Errorf("got %+v", h)
	}
	near(t, "U", h.Certificate[0].U, 0.000577, 1e-6)

	b := brew("B1", "T1", "1.048", "").read(24, "1.030", "18")
	b.rec.Readings[0].Body.Instrument = "H1"
	one := Derive(b.rec, book).Values[0]
	want, err := tempcorr.Correct(h, tempcorr.Observation{Reading: 1.030, Step: 0.001, T: 18, OE: gravity.Fits.Default().Fn.Extract(1.048)})
	if err != nil {
		t.Fatal(err)
	}
	if one.Err != nil || one.Result.Corrected != want.Corrected || one.Result.Budget.Expanded != want.Budget.Expanded || one.Result.Method.ID != "fermenting" {
		t.Errorf("got %+v (%v), want %+v", one.Result, one.Err, want)
	}
	near(t, "instrument", one.Result.Instrument(), 0.002, 1e-12)
}

// Corrections hold from their time until the next check or certificate.
func TestCorrectionsAsTheyWere(t *testing.T) {
	rec := glass("H1")
	rec.Certificates = []Numbered[Certificate]{
		{Number: 2, Body: Certificate{At: after(24), Points: []CertificatePoint{{"1.000", "0.0010", "0.0004"}, {"1.050", "0.0020", "0.0004"}}}},
		{Number: 9, Void: true, Body: Certificate{At: after(200), Points: []CertificatePoint{{"1.000", "0.9", ""}}}},
	}
	drink := Check{At: after(96), Liquid: InDrink, Found: sg("1.011"), Expected: sg("1.0102"), Temp: celsius("20"), Correction: "-0.0008"}
	rec.Checks = []Numbered[Check]{{Number: 3, Body: drink}}
	book := NewBook([]*InstrumentRecord{rec})
	for _, tt := range []struct {
		hours  float64
		points int
		first  float64
		liquid bool
	}{{23, 0, 0, false}, {24, 2, 0.001, false}, {95, 2, 0.001, false}, {96, 1, -0.0008, true}, {300, 1, -0.0008, true}} {
		h, _, err := book.Hydrometer("H1", after(tt.hours))
		if err != nil || len(h.Certificate) != tt.points || h.InLiquid != tt.liquid || tt.points > 0 && h.Certificate[0].Correction != tt.first {
			t.Errorf("after %g h: %+v, %v", tt.hours, h, err)
		}
	}
	// In the drink the laboratory's last place is in U too: √(0.001² + 0.0001²)/√3.
	h, _, _ := book.Hydrometer("H1", after(96))
	near(t, "U", h.Certificate[0].U, 0.0005802, 1e-7)
}

func TestInstrumentNotes(t *testing.T) {
	rec := glass("H1")
	rec.Retired = &Numbered[Retire]{Body: Retire{At: after(100), Reason: "broken"}}
	book := NewBook([]*InstrumentRecord{rec, {Instrument: Instrument{ID: "R1", Type: Refractometer, Scale: "brix", Since: day0}}})
	for _, tt := range []struct {
		hours float64
		codes string
	}{{99, ""}, {100, NoteRetired}, {24 * 400, NoteRetired + " " + NoteOverdue}} {
		_, notes, err := book.Hydrometer("H1", after(tt.hours))
		var codes []string
		for _, n := range notes {
			codes = append(codes, n.Code)
		}
		if err != nil || strings.Join(codes, " ") != tt.codes {
			t.Errorf("after %g h: %v, %v; want %q", tt.hours, notes, err, tt.codes)
		}
	}
	var ie *InstrumentError
	if _, _, err := book.Hydrometer("H2", day0); !errors.Is(err, ErrNotFound) || !strings.Contains(hint(t, err), "H1") {
		t.Errorf("unknown: %v", err)
	}
	if _, _, err := book.Hydrometer("R1", day0); !errors.As(err, &ie) || errors.Is(err, ErrNotFound) {
		t.Errorf("refractometer: %v", err)
	}
}

// A glass of two scales, read on the other one: 12.00 % mass is SG 1.04837 in NBS
// C440 Table 114 (in air), 6e-5 less as a true density; half a place of 1.048.
func TestReadOnItsOtherScale(t *testing.T) {
	book := NewBook([]*InstrumentRecord{glass("H1")})
	b := brew("B1", "T1", "", "")
	r := b.reading(1, "12.00", "20")
	r.Gravity.Scale, r.Instrument = "plato", "H1"
	one := Derive(b.add(r).rec, book).Values[0]
	if one.Err != nil || !hasNote(one.Notes, "interpreted") {
		t.Fatalf("%v %v", one.Err, one.Notes)
	}
	near(t, "SG", float64(one.SG), 1.0483, 0.0001)
}

func TestOriginalGravityIsTheMean(t *testing.T) {
	b := brew("B1", "T1", "1.050", "")
	for k, text := range []string{"1.052", "1.060", "1.0530"} {
		b.rec.OGs = append(b.rec.OGs, Numbered[OG]{Number: int64(50 + k), Void: text == "1.060", Body: OG{At: after(1), Gravity: sg(text)}})
	}
	v := Derive(b.rec, nil)
	if v.OG == nil || v.OG.N != 3 || len(v.OG.Numbers) != 3 {
		t.Fatalf("got %+v", v.OG)
	}
	near(t, "mean", float64(v.OG.SG), (1.050+1.052+1.053)/3, 1e-12)
	near(t, "spread", v.OG.Spread, 0.003, 1e-12)
	// With a temperature it is corrected as wort, as correct does.
	b = brew("B1", "T1", "", "")
	b.rec.OGs = []Numbered[OG]{{Body: OG{At: day0, Gravity: sg("1.050"), Temp: celsius("28")}}}
	want, err := tempcorr.Correct(tempcorr.New(gravity.ScaleSG, gravity.Pair2020, tempcorr.Bodies[0]), tempcorr.Observation{Reading: 1.050, Step: 0.001, T: 28})
	if err != nil {
		t.Fatal(err)
	}
	if v = Derive(b.rec, nil); v.OG == nil || v.OG.SG != want.SG || v.OG.Extract != want.Extract {
		t.Errorf("got %+v, want %v", v.OG, want.SG)
	}
	// What cannot be used is said, and left out.
	b.rec.OGs[0].Body.Gravity.Text = "12.1"
	if v = Derive(b.rec, nil); v.OG != nil || !hasNote(v.Notes, NoteUnused) {
		t.Errorf("got %+v %v", v.OG, v.Notes)
	}
}

func TestWithoutOriginalGravity(t *testing.T) {
	b := brew("B1", "T1", "", "").read(1, "1.040", "20").read(25, "1.020", "20")
	v := Derive(b.rec, nil)
	for _, one := range v.Values {
		if one.Attenuation != nil || one.Alcohol != nil || one.Why != "original gravity not known" || one.AlcoholWhy != one.Why || one.Result.Method.ID != "sucrose" {
			t.Errorf("got %+v", one)
		}
	}
	// A later one fills them.
	b.rec.OGs = []Numbered[OG]{{Number: 90, Body: OG{At: after(30), Gravity: sg("1.048")}}}
	for _, one := range Derive(b.rec, nil).Values {
		if one.Attenuation == nil || one.Why != "" || one.Result.Method.ID != "fermenting" {
			t.Errorf("got %+v", one)
		}
	}
}

func TestReplicatesShareTheirMean(t *testing.T) {
	b := brew("B1", "T1", "1.050", "").read(24, "1.0200", "20").read(24+0.5/60, "1.0220", "20").read(24, "1.0300", "20").read(0, "1.049", "20")
	b.rec.Readings[2].Void = true
	v := Derive(b.rec, nil)
	last := v.Last()
	near(t, "mean", float64(last.SG), 1.021, 1e-12)
	near(t, "own", float64(last.Result.SG), 1.022, 1e-12)
	g := attenuation.Gravities{OG: v.OG.SG, FG: last.SG, OE: v.OG.Extract, AE: gravity.Fits.Default().Fn.Extract(last.SG)}
	a, err := attenuation.Attenuate(g)
	if err != nil || *last.Attenuation != a {
		t.Errorf("got %+v, want %+v (%v)", *last.Attenuation, a, err)
	}
	marked := 0
	for _, one := range v.Values {
		if one.Mean && one.Replicates == 2 && !one.Void {
			marked++
		}
	}
	if marked != 2 || len(v.Counting()) != 2 {
		t.Errorf("%d marked, %d count", marked, len(v.Counting()))
	}
	fall, ok := v.Fall24h() // 28 points within 24 h and half a minute
	if near(t, "fall", fall, 28, 0.02); !ok {
		t.Error("no fall")
	}
}

func TestWhatCounts(t *testing.T) {
	b := brew("B1", "T1", "1.050", "").read(0, "1.049", "20").read(24, "1.030", "20").read(48, "1.045", "20").read(72, "1.010", "20").read(80, "12.1", "20")
	b.rec.Readings[2].Body.Keep = "foam"
	b.rec.Readings[3].Void, b.rec.Readings[3].VoidReason = true, "T2"
	v := Derive(b.rec, nil)
	if len(v.Values) != 5 || v.Last().Number != b.rec.Readings[1].Number || v.Values[4].Err == nil || v.Values[4].Why == "" {
		t.Fatalf("last is %+v", v.Last())
	}
	if v.Values[2].Attenuation == nil || !v.Values[2].Suspect || v.Values[3].VoidReason != "T2" {
		t.Error("suspect and void values are shown too")
	}
	if !v.Pitched.Equal(after(0)) {
		t.Errorf("pitched %v", v.Pitched)
	}
	if d, ok := v.Days(after(48)); !ok || d != 2 || !v.Open() {
		t.Errorf("%v days", d)
	}
	// Narrowed, the newest two that count and what lies after them.
	if n := DeriveLast(b.rec, nil, 1); len(n.Values) != 4 || n.Last().SG != v.Last().SG || !n.Pitched.Equal(v.Pitched) {
		t.Errorf("%d values", len(n.Values))
	}
	if n := DeriveLast(b.rec, nil, 0); len(n.Values) != 0 || n.OG == nil {
		t.Errorf("%d values", len(n.Values))
	}
}

func TestVesselAfterMoves(t *testing.T) {
	b := brew("B1", "T1", "", "").event(50, Event{What: Racking, Vessel: "T9"}).event(20, Event{What: Move, Vessel: "T2"}).event(60, Event{What: Move, Vessel: "T5"})
	b.rec.Events[2].Void = true
	if got := Derive(b.rec, nil).Vessel(); got != "T9" {
		t.Errorf("in %s, want T9", got)
	}
}

func TestAboveFortyDegrees(t *testing.T) {
	b := brew("B1", "T1", "1.050", "").read(1, "1.040", "45C")
	one := Derive(b.rec, nil).Values[0]
	if one.Err != nil || one.Result.Method.ID != "sucrose" || one.OE == 0 || one.Attenuation == nil || !hasNote(one.Notes, "hot-sample") {
		t.Errorf("got %+v", one)
	}
}

func TestNothing(t *testing.T) {
	v := Derive(nil, nil)
	if v.Last() != nil || v.Vessel() != "" || v.Open() {
		t.Errorf("got %+v", v)
	}
	if _, ok := v.Fall24h(); ok {
		t.Error("a fall of nothing")
	}
	if _, err := v.ExpectedABV(); !errors.Is(err, ErrNoStrength) {
		t.Error(err)
	}
}
