package season_test

import (
	"slices"
	"testing"

	"github.com/google/go-cmp/cmp"
	"pgregory.net/rapid"

	"gylebook/attenuation/journal"
	"gylebook/attenuation/season"
)

// register is a hydrometer that a check on the tenth day corrects by 1.2 points, a
// saccharometer and a refractometer.
func register() *journal.Book {
	one := func(id, kind, scale string) *journal.InstrumentRecord {
		return &journal.InstrumentRecord{Instrument: journal.Instrument{
			ID: id, Type: kind, Scale: scale, Basis: "20/20", Division: "0.001", Body: "glass", ReadAt: "bottom", Since: pitched,
		}}
	}
	h1 := one("H1", journal.Hydrometer, "sg")
	h1.Checks = []journal.Numbered[journal.Check]{{Number: 3, Body: journal.Check{
		Instrument: "H1", At: pitched.AddDate(0, 0, 10), Liquid: journal.InWater, Correction: "+0.0012",
		Found: journal.Typed{Text: "0.9988", Scale: "sg"}, Expected: journal.Typed{Text: "1.0000", Scale: "sg"},
		Temp: journal.TypedTemp{Text: "20", Unit: "C"},
	}}}
	return journal.NewBook([]*journal.InstrumentRecord{
		h1, one("S1", journal.Hydrometer, "plato"), one("R1", journal.Refractometer, "brix"),
	})
}

// Correcting only some readings gives what correcting all of them gives.
func TestRowEqualsFullDerivation(t *testing.T) {
	book := register()
	rapid.Check(t, func(t *rapid.T) {
		n := rapid.IntRange(0, 25).Draw(t, "n")
		var course []sg
		at := 0.0
		for range n {
			// Sometimes in the same minute: a replicate.
			at += rapid.SampledFrom([]float64{0, 0.25, 1, 2.5}).Draw(t, "later")
			text := rapid.SampledFrom([]string{"1.044", "1030", "1.0135", "12", "1.011", "1.010", "1.0095", "1.009", "2.5P"}).Draw(t, "text")
			course = append(course, sg{at, text})
		}
		rec := record("LB-1", rapid.SampledFrom([]string{"", "1.048"}).Draw(t, "og"), course...)
		for k := range rec.Readings {
			r := &rec.Readings[k]
			r.Body.Instrument = rapid.SampledFrom([]string{"", "H1", "H1", "S1", "R1"}).Draw(t, "instrument")
			r.Body.Temp.Text = rapid.SampledFrom([]string{"5", "12.5", "20", "30", "36"}).Draw(t, "temp")
			r.Void = rapid.IntRange(0, 6).Draw(t, "void") == 0
			if rapid.IntRange(0, 6).Draw(t, "keep") == 0 {
				r.Body.Keep = "foam"
			}
		}
		if rapid.Bool().Draw(t, "sugar") {
			rec.Events = []journal.Numbered[journal.Event]{{Number: 7, Body: journal.Event{
				Batch: "LB-1", At: pitched.AddDate(0, 0, 9), What: journal.Sugar, MassKg: rapid.SampledFrom([]string{"", "2"}).Draw(t, "kg"),
			}}}
		}
		if rapid.IntRange(0, 4).Draw(t, "shuffled") == 0 {
			slices.Reverse(rec.Readings)
		}
		row := season.Of(rec, book)
		v := journal.Derive(rec, book)
		last := v.Last()
		if last == nil {
			if row.Why == "" || row.SG != 0 || row.Days != nil {
				t.Fatalf("%+v", row)
			}
			return
		}
		if row.SG != last.SG || row.OE != last.OE || row.Why != last.Why {
			t.Fatalf("row %+v, last %+v", row, last)
		}
		if diff := cmp.Diff(last.Attenuation, row.Attenuation); diff != "" {
			t.Fatal(diff)
		}
		fall, _, ok := season.LastFall(v.Counting())
		if ok != (row.Days != nil) {
			t.Fatalf("days %v, of all values %v", row.Days, ok)
		}
		if ok && *row.Days != fall.Sub(v.Pitched).Hours()/24 {
			t.Fatalf("%v days, of all values %v", *row.Days, fall)
		}
	})
}
