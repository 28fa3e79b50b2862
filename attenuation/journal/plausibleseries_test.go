package journal_test

import (
	"testing"
	"time"

	"gylebook/attenuation/journal"
)

// Readings at the reference temperature of an unnamed instrument are what they are
// read as: 1.020 after 1.018 is a rise of 2 points, 1.019 one of 1, which is not
// doubted. One that is in the journal already puts the fault on the new one before
// it, and what is kept as suspect may rise. A plain book finds the same.
func TestSeries(t *testing.T) {
	start := time.Date(2026, 6, 1, 8, 0, 0, 0, time.UTC)
	type row struct {
		hours      int
		text, keep string
		fresh      bool
		code       string
		blames     int64 // 0: itself
	}
	for name, rows := range map[string][]row{
		"falls":          {{0, "1.040", "", true, "", 0}, {24, "1.020", "", true, "", 0}, {48, "1.020", "", true, "", 0}},
		"rises":          {{0, "1.018", "", true, "", 0}, {24, "1.019", "", true, "", 0}, {48, "1.022", "", true, journal.HoldRise, 0}, {72, "1.020", "", true, "", 0}},
		"kept":           {{0, "1.018", "", true, "", 0}, {24, "1.022", "foam", true, "", 0}, {48, "1.018", "", true, "", 0}},
		"under one here": {{0, "1.010", "", true, "", 0}, {24, "1.020", "", false, journal.HoldRise, 1}},
		"both here":      {{0, "1.010", "", false, "", 0}, {24, "1.020", "", false, "", 0}},
		"before":         {{-1, "1.040", "", true, journal.HoldBeforePitch, 0}},
	} {
		for _, plain := range []bool{false, true} {
			rec := &journal.Record{Batch: journal.Batch{ID: "B-1", Product: "Ale", Pitched: &start, Opened: start}}
			for i, r := range rows {
				rec.Readings = append(rec.Readings, journal.Numbered[journal.Reading]{Number: int64(i + 1), Body: journal.Reading{
					Batch: "B-1", TakenAt: start.Add(time.Duration(r.hours) * time.Hour), Quality: journal.Exact, Keep: r.keep,
					Gravity: journal.Typed{Text: r.text, Scale: "sg"}, Temp: journal.TypedTemp{Text: "20", Unit: "C"},
				}})
			}
			book := journal.NewBook(nil)
			book.Plain = plain
			view, q := journal.Derive(rec, book), journal.NewSeries(rec, book)
			for i, r := range rows {
				hold, number := q.Next(view, &view.Values[i], r.fresh)
				code, want := "", r.blames
				if hold != nil {
					code = hold.Code
				}
				if r.code != "" && want == 0 {
					want = int64(i + 1)
				}
				if code != r.code || number != want {
					t.Errorf("%s, plain %v, reading %d: %q of %d, wanted %q of %d", name, plain, i+1, code, number, r.code, want)
				}
			}
		}
	}
}
