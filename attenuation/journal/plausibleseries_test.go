package journal_test

import (
	"testing"
	"time"

	"gylebook/attenuation/journal"
)

// row is a reading of a series, in hours after pitching, and what it is held for.
type row struct {
	hours      int
	text, keep string
	fresh      bool
	code       string
	blames     int64 // 0: itself
}

// Readings at the reference temperature of an unnamed instrument are what they are
// read as: 1.020 after 1.018 is a rise of 2 points, 1.019 one of 1, which is not
// doubted. One that is in the journal already puts the fault on the new one before
// it, and what is kept as suspect may rise.
func TestSeries(t *testing.T) {
	judged(t, nil, map[string][]row{
		"falls":          {{0, "1.040", "", true, "", 0}, {24, "1.020", "", true, "", 0}, {48, "1.020", "", true, "", 0}},
		"rises":          {{0, "1.018", "", true, "", 0}, {24, "1.019", "", true, "", 0}, {48, "1.022", "", true, journal.HoldRise, 0}, {72, "1.020", "", true, "", 0}},
		"kept":           {{0, "1.018", "", true, "", 0}, {24, "1.022", "foam", true, "", 0}, {48, "1.018", "", true, "", 0}},
		"under one here": {{0, "1.010", "", true, "", 0}, {24, "1.020", "", false, journal.HoldRise, 1}},
		"both here":      {{0, "1.010", "", false, "", 0}, {24, "1.020", "", false, "", 0}},
		"before":         {{-1, "1.040", "", true, journal.HoldBeforePitch, 0}},
	})
}

// Over the original gravity of 1.050 a point is not doubted either. From it, and from
// the reading before, the gravity may fall by 3 points at once and by 40 in a day
// besides. Two readings of one minute may be 2 points apart.
func TestSeriesOfOriginalGravity(t *testing.T) {
	judged(t, []journal.Numbered[journal.OG]{{Body: journal.OG{Batch: "B-1", At: pitching, Gravity: journal.Typed{Text: "1.050", Scale: "sg"}}}}, map[string][]row{
		"above":         {{0, "1.051", "", true, "", 0}, {0, "1.054", "", true, journal.HoldAboveOG, 0}, {24, "1.053", "scale?", true, "", 0}},
		"above, here":   {{0, "1.054", "", false, "", 0}, {24, "1.050", "", true, "", 0}},
		"at once":       {{0, "1.047", "", true, "", 0}, {1, "1.040", "", true, journal.HoldFall, 0}, {24, "1.008", "", true, "", 0}},
		"from original": {{6, "1.037", "", true, "", 0}},
		"too far":       {{6, "1.036", "", true, journal.HoldFall, 0}},
		"kept far":      {{6, "1.036", "hot", true, "", 0}},
		"over one here": {{12, "1.045", "", true, "", 0}, {13, "1.030", "", false, journal.HoldFall, 1}},
		"one minute":    {{24, "1.020", "", true, "", 0}, {24, "1.022", "", true, "", 0}, {24, "1.023", "", true, journal.HoldSpread, 0}},
		"minute here":   {{24, "1.020", "", true, "", 0}, {24, "1.023", "", false, journal.HoldSpread, 1}},
	})
}

// What was typed in the wrong order is no gravity of 1.018 at 1.012 °C.
func TestSeriesSwapped(t *testing.T) {
	rec := &journal.Record{Batch: journal.Batch{ID: "B-1", Product: "Ale", Opened: pitching}}
	rec.Readings = []journal.Numbered[journal.Reading]{{Number: 1, Body: journal.Reading{
		Batch: "B-1", TakenAt: pitching, Quality: journal.Exact, Keep: "sure",
		Gravity: journal.Typed{Text: "18", Scale: "sg"}, Temp: journal.TypedTemp{Text: "1.012", Unit: "C"},
	}}}
	view := journal.Derive(rec, nil)
	if hold, number := journal.NewSeries(rec, nil).Next(view, &view.Values[0], true); hold == nil || hold.Code != journal.HoldSwapped || !hold.Final || number != 1 {
		t.Errorf("%+v of %d, wanted that the two changed places", hold, number)
	}
}

var pitching = time.Date(2026, 6, 1, 8, 0, 0, 0, time.UTC)

// judged goes through each series, with a plain book too.
func judged(t *testing.T, ogs []journal.Numbered[journal.OG], series map[string][]row) {
	t.Helper()
	for name, rows := range series {
		for _, plain := range []bool{false, true} {
			rec := &journal.Record{Batch: journal.Batch{ID: "B-1", Product: "Ale", Pitched: &pitching, Opened: pitching}, OGs: ogs}
			for i, r := range rows {
				rec.Readings = append(rec.Readings, journal.Numbered[journal.Reading]{Number: int64(i + 1), Body: journal.Reading{
					Batch: "B-1", TakenAt: pitching.Add(time.Duration(r.hours) * time.Hour), Quality: journal.Exact, Keep: r.keep,
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
