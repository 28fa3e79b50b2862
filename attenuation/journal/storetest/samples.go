package storetest

import (
	"context"
	"errors"
	"testing"
	"time"

	"gylebook/attenuation/journal"
)

const operator = "ada"

// noon is a time at an offset, so that a store that keeps UTC alone shows.
func noon(day, hour int) time.Time {
	return time.Date(2026, 3, day, hour, 0, 0, 0, time.FixedZone("", 3600))
}

func hydrometer(id string) journal.Instrument {
	return journal.Instrument{
		ID: id, Type: journal.Hydrometer, Scale: "sg", Basis: "20/20", Division: "0.0010", RangeLo: "0.990", RangeHi: "1.060",
		Body: "glass", ReadAt: "bottom", StemMM: "4.50", Note: "blue < box & \"rack\"", Since: noon(1, 8),
	}
}

func certificate(id string, day int) journal.Certificate {
	return journal.Certificate{
		Instrument: id, At: noon(day, 9), Reference: "C-1",
		Points: []journal.CertificatePoint{{Reading: "1.0000", Correction: "+0.0010", U: "0.00030"}, {Reading: "1.0500", Correction: "-0.0005", U: ""}},
	}
}

func check(id string, day int) journal.Check {
	return journal.Check{
		Instrument: id, At: noon(day, 9), Liquid: journal.InWater, Found: typed("0.9980"), Expected: typed("1.0000"),
		Temp: celsius("20.0"), Correction: "0.0020",
	}
}

func retire(id string, day int) journal.Retire {
	return journal.Retire{Instrument: id, At: noon(day, 9), Reason: "dropped"}
}

func typed(text string) journal.Typed       { return journal.Typed{Text: text, Scale: "sg"} }
func celsius(text string) journal.TypedTemp { return journal.TypedTemp{Text: text, Unit: "C"} }

func batch(id string) journal.Batch {
	pitched := noon(2, 12)
	return journal.Batch{
		ID: id, Product: "stout", Vessel: "T4", Volume: "100.0", Yeast: "house", Generation: 3, Parent: "B-0",
		Pitched: &pitched, Opened: noon(2, 9), Note: "first\nsecond line",
	}
}

func og(id string, hour int) journal.OG {
	return journal.OG{Batch: id, At: noon(2, hour), Gravity: typed("1.0500"), Temp: celsius("20")}
}

func limit(id string, day int) journal.Limit {
	return journal.Limit{Batch: id, At: noon(day, 10), Gravity: journal.Typed{Text: "2.10", Scale: "plato"}}
}

func ending(id string, day int) journal.Close { return journal.Close{Batch: id, At: noon(day, 18)} }

func reading(id string, day, hour int) journal.Reading {
	return journal.Reading{
		Batch: id, Vessel: "T4", TakenAt: noon(day, hour), Quality: journal.Exact, Gravity: typed("1.0480"), Temp: celsius("18.50"),
	}
}

func event(id string, day int) journal.Event {
	return journal.Event{Batch: id, At: noon(day, 11), What: journal.Sugar, MassKg: "2.00", VolumeL: ""}
}

func voidOf(number int64) journal.Void { return journal.Void{Entry: number, Reason: "typed wrong"} }

// clock is the time of the first append; each later one a test makes is its own.
var clock = time.Date(2026, 3, 2, 11, 0, 0, 0, time.UTC)

// append1 appends bodies and fails the test when that fails.
func append1(t *testing.T, s journal.Store, bodies ...journal.Body) []journal.Entry {
	t.Helper()
	entries, err := appendAs(s, operator, bodies...)
	if err != nil {
		t.Fatalf("append %T: %v", bodies[0], err)
	}
	return entries
}

func appendAs(s journal.Store, by string, bodies ...journal.Body) ([]journal.Entry, error) {
	return s.Append(context.Background(), by, clock, func(journal.Reader) ([]journal.Body, error) { return bodies, nil })
}

// refused fails the test unless appending the bodies gives the error and leaves
// the journal as it was.
func refused(t *testing.T, s journal.Store, want error, bodies ...journal.Body) {
	t.Helper()
	before, chain := head(t, s)
	entries, err := appendAs(s, operator, bodies...)
	if !errors.Is(err, want) || entries != nil {
		t.Errorf("append %T gave %d entries and the error %v, wanted the error %q", bodies[len(bodies)-1], len(entries), err, want)
	}
	if after, c := head(t, s); after != before || c != chain {
		t.Errorf("a refused append took the journal from entry %d to %d", before, after)
	}
}

func head(t *testing.T, r journal.Reader) (int64, string) {
	t.Helper()
	n, chain, err := r.Head(context.Background())
	if err != nil {
		t.Fatal(err)
	}
	return n, chain
}

// verified fails the test unless the journal holds n entries that verify.
func verified(t *testing.T, r journal.Reader, n int64) {
	t.Helper()
	got, err := journal.VerifyAll(context.Background(), r)
	if err != nil || got != n {
		t.Errorf("%d entries verified, error %v, wanted %d", got, err, n)
	}
}

func record(t *testing.T, r journal.Reader, id string) *journal.Record {
	t.Helper()
	rec, err := r.Batch(context.Background(), id)
	if err != nil {
		t.Fatalf("batch %s: %v", id, err)
	}
	return rec
}

func instrumentsOf(t *testing.T, r journal.Reader) []*journal.InstrumentRecord {
	t.Helper()
	list, err := r.Instruments(context.Background())
	if err != nil {
		t.Fatal(err)
	}
	return list
}

// collect runs over the batches of a filter and returns their ids.
func collect(t *testing.T, r journal.Reader, f journal.Filter) []string {
	t.Helper()
	ids := []string{}
	for rec, err := range r.Batches(context.Background(), f) {
		if err != nil {
			t.Fatal(err)
		}
		ids = append(ids, rec.Batch.ID)
	}
	return ids
}

func openIDs(t *testing.T, r journal.Reader) []string {
	t.Helper()
	list, err := r.Open(context.Background())
	if err != nil {
		t.Fatal(err)
	}
	ids := []string{}
	for _, rec := range list {
		ids = append(ids, rec.Batch.ID)
	}
	return ids
}
