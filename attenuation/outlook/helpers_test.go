package outlook_test

import (
	"context"
	"fmt"
	"iter"
	"math"
	"slices"
	"strings"
	"testing"
	"time"

	"gylebook/attenuation/curve"
	"gylebook/attenuation/journal"
	"gylebook/attenuation/outlook"
)

var pitched = time.Date(2026, time.May, 4, 12, 0, 0, 0, time.UTC)

func after(hours float64) time.Time { return pitched.Add(time.Duration(hours * float64(time.Hour))) }

func sg(text string) journal.Typed { return journal.Typed{Text: text, Scale: "sg"} }

// batch makes a batch of OG 1.048 from words: "24:1.040" is a reading at 20 °C so many
// hours after pitching, with "kept", "void" or "gassy" behind it; "30:sugar" an event
// of 2 kg, "30:sugar?" one that nobody weighed, "30:dilution" one of 10 L of water;
// "40:limit1.010" a forced ferment. The batch is of 100 L.
func batch(id, words string) *journal.Record {
	at := pitched
	rec := &journal.Record{
		Batch: journal.Batch{ID: id, Product: "Lane Bitter", Yeast: "house ale", Vessel: "T1", Volume: "100", Pitched: &at, Opened: at},
		OGs:   []journal.Numbered[journal.OG]{{Number: 1, Body: journal.OG{Batch: id, At: at, Gravity: sg("1.048")}}},
	}
	for n, word := range strings.Fields(words) {
		when, what, _ := strings.Cut(word, ":")
		var hours float64
		if _, err := fmt.Sscan(when, &hours); err != nil {
			panic(err)
		}
		number := int64(n + 2)
		if limit, ok := strings.CutPrefix(what, "limit"); ok {
			rec.Limits = append(rec.Limits, journal.Numbered[journal.Limit]{Number: number, Body: journal.Limit{Batch: id, At: after(hours), Gravity: sg(limit)}})
			continue
		}
		kind, unknown := strings.CutSuffix(what, "?")
		if slices.Contains(journal.EventKinds, kind) {
			e := journal.Event{Batch: id, At: after(hours), What: kind, MassKg: "2"}
			switch {
			case unknown:
				e.MassKg = ""
			case kind == journal.Dilution:
				e.MassKg, e.VolumeL = "", "10"
			}
			rec.Events = append(rec.Events, journal.Numbered[journal.Event]{Number: number, Body: e})
			continue
		}
		r := journal.Numbered[journal.Reading]{Number: number}
		what, r.Void = strings.CutSuffix(what, "void")
		what, kept := strings.CutSuffix(what, "kept")
		what, gassy := strings.CutSuffix(what, "gassy")
		r.Body = journal.Reading{
			Batch: id, TakenAt: after(hours), Quality: journal.Exact, Gravity: sg(what), Gassy: gassy,
			Temp: journal.TypedTemp{Text: "20", Unit: "C"},
		}
		if kept {
			r.Body.Keep = "hazy"
		}
		rec.Readings = append(rec.Readings, r)
	}
	return rec
}

// course is the words of a whole ale: a logistic fall from 1.048 to fg in points,
// half of it at the hour middle, read to 1.0001 every 12 h until the hour end.
func course(fg, middle, end float64) string {
	var words []string
	for h := 12.0; h <= end; h += 12 {
		words = append(words, fmt.Sprintf("%g:%.4f", h, 1+(fg+(48-fg)/(1+math.Exp(0.08*(h-middle))))/1000))
	}
	return strings.Join(words, " ")
}

// closed closes a batch at an hour.
func closed(rec *journal.Record, hours float64) *journal.Record {
	rec.Closed = &journal.Numbered[journal.Close]{Number: 1000, Body: journal.Close{Batch: rec.Batch.ID, At: after(hours)}}
	return rec
}

// reader knows finished batches, the newest first.
type reader struct {
	records []*journal.Record
	err     error // after the records
	given   int
}

func (r *reader) Finished(_ context.Context, _, _ string, _ time.Time) iter.Seq2[*journal.Record, error] {
	return func(yield func(*journal.Record, error) bool) {
		for _, rec := range r.records {
			r.given++
			if !yield(rec, nil) {
				return
			}
		}
		if r.err != nil {
			yield(nil, r.err)
		}
	}
}

// ales is the history of six ales that ended at 9 to 11 points.
func ales(t testing.TB) outlook.History {
	t.Helper()
	r := &reader{}
	for k := range 6 {
		words := course(9+0.4*float64(k), 42+2*float64(k), 204)
		r.records = append(r.records, closed(batch(fmt.Sprintf("A%d", k+1), words), 220))
	}
	return history(t, r)
}

func history(t testing.TB, r *reader) outlook.History {
	t.Helper()
	h, err := outlook.HistoryOf(t.Context(), r, journal.NewBook(nil), "Lane Bitter", "house ale", after(1000), outlook.Drink{})
	if err != nil {
		t.Fatal(err)
	}
	return h
}

func view(words string) journal.View { return journal.Derive(batch("B1", words), nil) }

func forecast(t testing.TB, words string, h outlook.History, hours float64) outlook.Forecast {
	t.Helper()
	f, err := outlook.Of(view(words), h, after(hours))
	if err != nil {
		t.Fatalf("%q: %v", words, err)
	}
	return f
}

func evidence(t testing.TB, words string, h outlook.History, hours float64) outlook.Evidence {
	t.Helper()
	e, err := outlook.EvidenceOf(view(words), h, after(hours), false)
	if err != nil {
		t.Fatalf("%q: %v", words, err)
	}
	return e
}

func factOf(t testing.TB, e outlook.Evidence, code string) outlook.Fact {
	t.Helper()
	for _, f := range e.Facts {
		if f.Code == code {
			return f
		}
	}
	t.Fatalf("no fact %q", code)
	return outlook.Fact{}
}

func contains(i curve.Interval, x float64) bool { return x >= i.Lo && x <= i.Hi }

func minutes(n int) time.Duration { return time.Duration(n) * time.Minute }
