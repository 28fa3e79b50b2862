package main

import (
	"fmt"
	"slices"
	"strings"
	"testing"
	"time"

	"gylebook/attenuation/journal"
)

// standingAt is when the batches of these tests are looked at.
var standingAt = time.Date(2026, 11, 18, 12, 0, 0, 0, time.UTC)

func hoursBefore(hours float64) time.Time {
	return standingAt.Add(-time.Duration(hours * float64(time.Hour)))
}

// deeds makes a batch of OG 1.048, pitched so many hours ago, from words such as
// "48:1.040" (hours ago, reading at 20 °C), "30:sugar", "10:1.020kept" (as suspect),
// "9:1.011void" and "limit:1.010".
func deeds(pitched float64, words string) *journal.Record {
	at := hoursBefore(pitched)
	rec := &journal.Record{
		Batch: journal.Batch{ID: "B1", Product: "Lane Bitter", Vessel: "T1", Volume: "100", Pitched: &at, Opened: at},
		OGs:   []journal.Numbered[journal.OG]{{Body: journal.OG{Batch: "B1", At: at, Gravity: sg("1.048")}}},
	}
	for n, word := range strings.Fields(words) {
		when, what, _ := strings.Cut(word, ":")
		var hours float64
		if _, err := fmt.Sscan(when, &hours); err != nil {
			rec.Limits = append(rec.Limits, journal.Numbered[journal.Limit]{Body: journal.Limit{Batch: "B1", At: at, Gravity: sg(what)}})
			continue
		}
		if slices.Contains(journal.EventKinds, what) {
			e := journal.Event{Batch: "B1", At: hoursBefore(hours), What: what, MassKg: "2"}
			rec.Events = append(rec.Events, journal.Numbered[journal.Event]{Number: int64(n), Body: e})
			continue
		}
		r := journal.Numbered[journal.Reading]{Number: int64(n + 1)}
		what, r.Void = strings.CutSuffix(what, "void")
		what, kept := strings.CutSuffix(what, "kept")
		r.Body = journal.Reading{
			Batch: "B1", TakenAt: hoursBefore(hours), Quality: journal.Exact, Gravity: sg(what),
			Temp: journal.TypedTemp{Text: "20", Unit: "C"},
		}
		if kept {
			r.Body.Keep = "hazy"
		}
		rec.Readings = append(rec.Readings, r)
	}
	return rec
}

func sg(text string) journal.Typed { return journal.Typed{Text: text, Scale: "sg"} }

// Readings stand at 20 °C on a 20/20 glass, so that what was typed is what counts.
func TestStanding(t *testing.T) {
	for _, c := range []struct {
		pitched float64
		deeds   string
		word    string
		rank    attention
	}{
		{10, "", "new", inCourse},
		// 1.5 × 24 h is the limit.
		{36, "", "new", inCourse},
		{37, "", "no reading 37 h", unread},
		{80, "", "no reading 3 d", unread},
		{20, "10:1.047", "new", inCourse},
		{60, "29:1.040 5:1.030", "falling", inCourse},
		// 0.6 point is a fall, 0.5 point is none.
		{200, "29:1.0126 5:1.0120", "falling", inCourse},
		{200, "29:1.0125 5:1.0120", "unchanged 24 h", inCourse},
		{200, "53:1.0120 29:1.0125 5:1.0120", "unchanged 48 h", inCourse},
		{200, "53:1.0140 29:1.0120 5:1.0120", "unchanged 24 h", inCourse},
		{300, "77:1.012 29:1.012 5:1.012", "unchanged 3 d", inCourse},
		// 1.030 of 1.048 is 36 % attenuation, 1.022 is 53 %.
		{200, "53:1.030 29:1.030 5:1.030", "unchanged 48 h", stands},
		{200, "53:1.022 29:1.022 5:1.022", "unchanged 48 h", inCourse},
		// A forced ferment says better where the end is: 5 points above it.
		{200, "limit:1.010 53:1.016 29:1.016 5:1.016", "unchanged 48 h", stands},
		{200, "limit:1.010 53:1.014 29:1.014 5:1.014", "unchanged 48 h", inCourse},
		{200, "limit:1.028 53:1.030 29:1.030 5:1.030", "unchanged 48 h", inCourse},
		// On the first day, and within a few hours, nothing stands still.
		{23, "22:1.048 1:1.048", "unchanged 21 h", inCourse},
		{200, "8:1.030 5:1.030", "unchanged 3 h", inCourse},
		{200, "29:1.012 5:1.014", "rising", rising},
		{200, "29:1.012 5:1.020kept", "rising", rising},
		{200, "53:1.014 29:1.012 5:1.011kept", "falling", inCourse},
		{200, "53:1.014 29:1.012 5:1.020void", "falling", inCourse},
		{200, "29:1.012 20:sugar 5:1.018", "after sugar", inCourse},
		{200, "29:1.012 20:dry-hop 5:1.012", "unchanged 24 h", inCourse},
		// While it falls a reading is due every 24 h, at rest every 72 h, in store
		// every 168 h; half as much again is late.
		{200, "60:1.030 37:1.020", "no reading 37 h", unread},
		{200, "60:1.030 35:1.020", "falling", inCourse},
		{300, "131:1.012 107:1.012", "unchanged 24 h", inCourse},
		{300, "133:1.012 109:1.012", "no reading 4 d", unread},
		{1000, "275:1.012 251:1.012", "unchanged 24 h", inCourse},
		{1000, "277:1.012 253:1.012", "no reading 10 d", unread},
		{1000, "300:1.040 253:1.012", "no reading 10 d", unread},
	} {
		s := standingOf(journal.DeriveLast(deeds(c.pitched, c.deeds), nil, 3), standingAt)
		if s.word != c.word || s.rank != c.rank {
			t.Errorf("pitched %v h ago, %q: %q, rank %d; wanted %q, rank %d", c.pitched, c.deeds, s.word, s.rank, c.word, c.rank)
		}
	}
}

// The figures beside the word: 9 points in 24 h, 18 h ago.
func TestStandingFigures(t *testing.T) {
	s := standingOf(journal.DeriveLast(deeds(90, "66:1.045 42:1.039 18:1.030"), nil, 3), standingAt)
	near := func(p *float64, want float64) bool { return p != nil && *p > want-0.02 && *p < want+0.02 }
	if !near(s.hours, 18) || !near(s.fall, 9) || !near(s.days, 3.75) {
		t.Errorf("hours %v, fall %v, days %v; wanted 18, 9, 3.75", *s.hours, *s.fall, *s.days)
	}
	if cells := s.cells(); cells[0] != "T1" || cells[2] != "3" || cells[3] != "18" || cells[4] != "1.0300" || cells[7] != "↓ falling" {
		t.Errorf("cells %q", cells)
	}
}

// Late for its stage comes first, the latest one leading; then what rises, then what
// stands still too high, then the longest unread.
func TestAttentionOrder(t *testing.T) {
	cases := []struct {
		vessel  string
		pitched float64
		deeds   string
	}{
		{"late-twice", 200, "72:1.030 48:1.020"},            // 48 of 24 h
		{"late-more", 1000, "400:1.012 370:1.012"},          // 370 of 168 h, 2.2 times
		{"rising", 200, "29:1.012 5:1.014"},                 //
		{"high-long", 200, "53:1.030 29:1.030 20:1.030"},    //
		{"high", 200, "53:1.030 29:1.030 5:1.030"},          //
		{"unread", 12, ""},                                  // no reading at all is the longest
		{"quiet-100h", 300, "124:1.012 100:1.012"},          //
		{"T2", 60, "29:1.040 5:1.030"},                      // the same hours: by vessel
		{"T10", 60, "29:1.040 5:1.030"},                     //
		{"falling-4h", 60, "28:1.040 4:1.030 2:1.020void"},  // void ones do not count
		{"suspect-2h", 60, "28:1.040 4:1.030 2:1.0299kept"}, // suspect ones are readings too
	}
	want := "late-more late-twice rising high-long high unread quiet-100h T2 T10 falling-4h suspect-2h"
	var list []standing
	for _, c := range slices.Backward(cases) {
		rec := deeds(c.pitched, c.deeds)
		rec.Batch.Vessel = c.vessel
		list = append(list, standingOf(journal.DeriveLast(rec, nil, 3), standingAt))
	}
	slices.SortFunc(list, byAttention)
	var got []string
	for _, s := range list {
		got = append(got, s.vessel)
	}
	if strings.Join(got, " ") != want {
		t.Errorf("order\n%s\nwanted\n%s", strings.Join(got, " "), want)
	}
}
