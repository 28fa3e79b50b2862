package storetest

import (
	"context"
	"testing"
	"time"

	"github.com/google/go-cmp/cmp"

	"gylebook/attenuation/journal"
)

// testLean compares batches with those that lack what no figure is made of.
func testLean(t *testing.T, s journal.Store) {
	odd, gassy := reading("B-1", 4, 9), reading("B-1", 5, 9)
	odd.Keep, odd.Note = "stuck \x1e1\x1f pump", "between \x1e and \x1f"
	gassy.Gassy, gassy.Instrument = true, "H1"
	append1(
		t, s, hydrometer("H1"), batch("B-1"), og("B-1", 12), limit("B-1", 3), // 1 … 4
		reading("B-1", 6, 9), odd, gassy, reading("B-1", 3, 9), event("B-1", 4), // 5 … 9
		batch("B-2"), reading("B-2", 3, 9), batch("B-3"), // 10 … 12
	)
	append1(t, s, voidOf(8), voidOf(3), ending("B-1", 9))
	for rec, err := range s.Batches(context.Background(), journal.Filter{Lean: true}) {
		if err != nil {
			t.Fatal(err)
		}
		want := record(t, s, rec.Batch.ID)
		if diff := cmp.Diff(leanly(want), leanly(rec)); diff != "" {
			t.Errorf("batch %s, lean:\n%s", rec.Batch.ID, diff)
		}
	}
	if got := record(t, s, "B-1").Readings[1].Body; got.Keep != odd.Keep || got.Note != odd.Note {
		t.Errorf("kept as %q with the note %q, wanted %q and %q", got.Keep, got.Note, odd.Keep, odd.Note)
	}
}

// leanly blanks what a lean record may lack.
func leanly(rec *journal.Record) journal.Record {
	r := *rec
	r.OGs, r.Limits, r.Volumes = blank(r.OGs), blank(r.Limits), blank(r.Volumes)
	r.Readings, r.Events, r.Given = blank(r.Readings), blank(r.Events), blank(r.Given)
	for k := range r.Readings {
		body := &r.Readings[k].Body
		body.Vessel, body.Quality, body.Note = "", "", ""
	}
	if r.Closed != nil {
		r.Closed = &blank([]journal.Numbered[journal.Close]{*r.Closed})[0]
	}
	return r
}

func blank[B journal.Body](list []journal.Numbered[B]) []journal.Numbered[B] {
	var out []journal.Numbered[B]
	for _, n := range list {
		n.By, n.RecordedAt = "", time.Time{}
		out = append(out, n)
	}
	return out
}

// testOpenPlaces asks where the open batches are.
func testOpenPlaces(t *testing.T, s journal.Store) {
	first, second, ended := batch("B-1"), batch("B-2"), batch("B-3")
	first.Vessel, second.Vessel, ended.Vessel = "T2", "T1", "T3"
	append1(t, s, first, second, ended, event("B-1", 4), event("B-1", 3), reading("B-1", 5, 9)) // 1 … 6
	append1(t, s, voidOf(4), ending("B-3", 9))
	list, err := s.OpenPlaces(context.Background())
	if err != nil || len(list) != 2 || list[0].Batch.ID != "B-2" || list[1].Batch.ID != "B-1" {
		t.Fatalf("%d batches, error %v, wanted B-2 and B-1", len(list), err)
	}
	want := record(t, s, "B-1")
	if diff := cmp.Diff(want.Batch, list[1].Batch); diff != "" {
		t.Errorf("batch:\n%s", diff)
	}
	if diff := cmp.Diff(blank(want.Events), blank(list[1].Events)); diff != "" || len(want.Events) != 2 {
		t.Errorf("%d events:\n%s", len(want.Events), diff)
	}
}
