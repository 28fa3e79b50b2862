package season_test

import (
	"errors"
	"math"
	"slices"
	"testing"
	"time"

	"github.com/google/go-cmp/cmp"

	"gylebook/attenuation/journal"
	"gylebook/attenuation/season"
	"gylebook/gravity"
)

func near(t *testing.T, what string, got, want, tol float64) {
	t.Helper()
	if !(math.Abs(got-want) <= tol) {
		t.Errorf("%s is %v, wanted %v", what, got, want)
	}
}

// OG 1.048 to FG 1.010, by hand from the ASBC polynomial
// P = -616.868 + 1111.14 S - 630.272 S² + 135.997 S³:
//
//	OE = -616.868 + 1164.47472 - 692.23840... = 11.91, AE = 2.56
//	apparent 100 (11.91-2.56)/11.91 = 78.5; points 100 (48-10)/48 = 79.17
//	q = 1.22 + 0.01191 = 1.23191; RE = 11.91 - 9.35/1.23191 = 4.32; real = 63.7
//	ABW = 7.59/(2.0665 - 0.010665·11.91) = 3.913; ABV = 3.913·1.010·998.2/789.24 = 4.999
func TestRow(t *testing.T) {
	rec := closed(record("LB-1", "1.048", sg{1, "1.040"}, sg{2, "1.024"}, sg{3.5, "1.011"}, sg{5, "1.010"}, sg{7, "1.010"}))
	rec.Limits = []journal.Numbered[journal.Limit]{{Number: 50, Body: journal.Limit{
		Batch: "LB-1", At: pitched, Gravity: journal.Typed{Text: "1.008", Scale: "sg"},
	}}}
	row := season.Of(rec, nil)
	if row.Attenuation == nil || row.ABV == nil || row.Days == nil || row.LimitDifference == nil {
		t.Fatalf("%+v", row)
	}
	near(t, "OE", float64(row.OE), 11.91, 0.005)
	near(t, "AE", float64(row.AE), 2.56, 0.005)
	near(t, "apparent", row.Attenuation.Apparent, 78.5, 0.05)
	near(t, "points", row.Attenuation.ApparentPoints, 79.17, 0.005)
	near(t, "real", row.Attenuation.Real, 63.7, 0.05)
	near(t, "ABV", float64(*row.ABV), 5.00, 0.01)
	// 1.011 at 3.5 days is within a point of 1.010; 1.024 is not.
	near(t, "days", *row.Days, 3.5, 1e-9)
	// AE of 1.008 is 2.05: 100 (2.56-2.05)/11.91 = 4.3
	near(t, "difference to the limit", *row.LimitDifference, 4.3, 0.05)
	got := row
	got.Attenuation, got.ABV, got.Days, got.LimitDifference, got.OE, got.AE = nil, nil, nil, nil, 0, 0
	want := season.Row{
		Batch: "LB-1", Product: "Lane Bitter", Yeast: "house ale", Vessel: "T1", Pitched: pitched, Readings: 5,
		LastAt: pitched.AddDate(0, 0, 7), OG: 1.048, SG: 1.010, Method: "balling",
	}
	if diff := cmp.Diff(want, got); diff != "" {
		t.Error(diff)
	}
}

func TestRowsWithoutFigures(t *testing.T) {
	gap := record("LB-3", "1.048", sg{1, "1.040"}, sg{4, "1.010"})
	gap.Events = []journal.Numbered[journal.Event]{{Number: 40, Body: journal.Event{Batch: "LB-3", At: pitched.AddDate(0, 0, 2), What: journal.Sugar}}}
	void := record("LB-4", "1.048", sg{1, "1.040"}, sg{2, "1.010"})
	void.Readings[0].Void = true
	void.Readings[1].Body.Keep = "foam"
	for _, c := range []struct {
		rec      *journal.Record
		why      string
		readings int
		days     bool
	}{
		{record("LB-1", ""), "no reading that counts", 0, false},
		{record("LB-2", "", sg{1, "1.040"}, sg{4, "1.010"}), "original gravity not known", 2, true},
		{gap, "sugar added without mass", 2, true},
		{void, "no reading that counts", 0, false},
	} {
		row := season.Of(c.rec, nil)
		if row.Attenuation != nil || row.ABV != nil || row.Why != c.why || row.ABVWhy != c.why || row.Readings != c.readings || (row.Days != nil) != c.days || !row.Open {
			t.Errorf("%s: %+v, wanted %q", row.Batch, row, c.why)
		}
	}
}

// A refractometer's readings of a fermenting batch are not counted, and its last
// one gives no figures.
func TestRefractometerDoesNotCount(t *testing.T) {
	rec := record("LB-1", "1.048", sg{1, "1.040"}, sg{4, "1.010"}, sg{5, "1.020"})
	rec.Readings[2].Body.Instrument = "R1"
	book := journal.NewBook([]*journal.InstrumentRecord{{Instrument: journal.Instrument{ID: "R1", Type: journal.Refractometer, Scale: "brix"}}})
	row := season.Of(rec, book)
	if row.Readings != 2 || row.SG != 1.010 {
		t.Errorf("%d readings, last %v; wanted 2 and 1.010", row.Readings, row.SG)
	}
}

func TestLastFall(t *testing.T) {
	for what, c := range map[string]struct {
		readings []sg
		days     float64 // NaN: not known
	}{
		"nothing":           {nil, math.NaN()},
		"one tells no fall": {[]sg{{3, "1.010"}}, math.NaN()},
		"still falling":     {[]sg{{1, "1.040"}, {2, "1.030"}, {3, "1.020"}}, 3},
		"a point is rest":   {[]sg{{1, "1.040"}, {3, "1.011"}, {5, "1.010"}}, 3},
		"two are a fall":    {[]sg{{1, "1.040"}, {3, "1.012"}, {5, "1.010"}}, 5},
		// Each step is a point, from 1.011 to the low 1.009 it is two.
		"two in two steps":     {[]sg{{1, "1.040"}, {3, "1.011"}, {4, "1.010"}, {5, "1.009"}, {6, "1.010"}}, 4},
		"noise of one mark":    {[]sg{{1, "1.040"}, {3, "1.010"}, {4, "1.011"}, {5, "1.010"}, {6, "1.011"}}, 3},
		"from the first on":    {[]sg{{3, "1.010"}, {4, "1.010"}, {5, "1.010"}}, 3},
		"sugar raised it once": {[]sg{{1, "1.030"}, {2, "1.010"}, {3, "1.022"}, {4, "1.014"}, {5, "1.010"}, {6, "1.010"}}, 5},
		// Other scales of the same values: 48 points, whole thousandths.
		"typed in other ways": {[]sg{{1, "1040"}, {3, "11"}, {5, "1.0100"}}, 3},
	} {
		row := season.Of(record("LB-1", "1.048", c.readings...), nil)
		switch {
		case math.IsNaN(c.days):
			if row.Days != nil {
				t.Errorf("%s: %v days, wanted none", what, *row.Days)
			}
		case row.Days == nil:
			t.Errorf("%s: no days, wanted %v", what, c.days)
		default:
			near(t, what, *row.Days, c.days, 1e-9)
		}
	}
}

// 24 October 12:00 to 25 October 12:00 is 25 hours where the clock goes back.
func TestDaysAcrossTheClockChange(t *testing.T) {
	rec := record("LB-1", "1.048", sg{1, "1.010"}, sg{2, "1.010"})
	p := time.Date(2026, time.October, 24, 12, 0, 0, 0, time.FixedZone("", 7200))
	rec.Batch.Pitched = &p
	rec.Readings[0].Body.TakenAt = time.Date(2026, time.October, 25, 12, 0, 0, 0, time.FixedZone("", 3600))
	rec.Readings[1].Body.TakenAt = time.Date(2026, time.October, 26, 12, 0, 0, 0, time.FixedZone("", 3600))
	near(t, "days", *season.Of(rec, nil).Days, 25.0/24, 1e-9)
}

func TestRowsStream(t *testing.T) {
	broken := errors.New("no more")
	r := &fake{records: many(5, 12), err: broken}
	var got []string
	for row, err := range season.Rows(t.Context(), r, journal.Filter{}, nil) {
		if err != nil {
			if !errors.Is(err, broken) || row.Batch != "" {
				t.Errorf("%v with %+v", err, row)
			}
			got = append(got, "error")
			continue
		}
		got = append(got, row.Batch)
	}
	if diff := cmp.Diff([]string{"B00000", "B00001", "B00002", "B00003", "B00004", "error"}, got); diff != "" {
		t.Error(diff)
	}
	r.given = 0
	for row, err := range season.Rows(t.Context(), r, journal.Filter{Product: "none"}, nil) {
		if !errors.Is(err, broken) {
			t.Errorf("%+v, %v; wanted the error alone", row, err)
		}
	}
	if r.given != 0 {
		t.Errorf("the filter let %d batches pass", r.given)
	}
}

// A season is not held in memory: one row asks for a few batches, and who stops
// early has the rest left unread.
func TestRowsAreLazy(t *testing.T) {
	r := &fake{records: many(500, 3)}
	for range season.Rows(t.Context(), r, journal.Filter{}, nil) {
		break
	}
	if r.given > 40 {
		t.Errorf("%d batches were read for one row", r.given)
	}
	var ids []string
	for row, err := range season.Rows(t.Context(), r, journal.Filter{}, nil) {
		if err != nil {
			t.Fatal(err)
		}
		ids = append(ids, row.Batch)
	}
	if len(ids) != 500 || !slices.IsSorted(ids) {
		t.Errorf("%d rows, in order: %v", len(ids), slices.IsSorted(ids))
	}
}

// What a blend needs of another batch is asked where the reader is used.
func TestBlendAsksOneAtATime(t *testing.T) {
	list := many(60, 3)
	for _, rec := range list {
		rec.Events = []journal.Numbered[journal.Event]{{Number: 70, Body: journal.Event{
			Batch: rec.Batch.ID, At: pitched, What: journal.Blend, VolumeL: "100", From: "X",
		}}}
	}
	book := journal.NewBook(nil)
	asked := 0 // the race detector sees a second goroutine
	book.OE = func(string) (gravity.Plato, bool) { asked++; return 10, true }
	n := 0
	for row, err := range season.Rows(t.Context(), &fake{records: list}, journal.Filter{}, book) {
		if err != nil || row.Attenuation == nil || !(row.OE > 10 && row.OE < 11.9) {
			t.Fatalf("%+v, %v", row, err)
		}
		n++
	}
	if n != 60 || asked < 60 {
		t.Errorf("%d rows, asked %d times", n, asked)
	}
}
