package storetest

import (
	"context"
	"errors"
	"slices"
	"testing"
	"time"

	"gylebook/attenuation/journal"
)

func numbers[B any](list []journal.Numbered[B]) []int64 {
	out := []int64{}
	for _, n := range list {
		out = append(out, n.Number)
	}
	return out
}

func testRecord(t *testing.T, s journal.Store) {
	append1(t, s, batch("B-1"), batch("B-2"))
	append1(
		t, s, reading("B-1", 5, 9), reading("B-1", 3, 9), reading("B-2", 3, 9), reading("B-1", 3, 9), // 3 4 5 6
		og("B-1", 11), og("B-1", 10), limit("B-1", 9), limit("B-1", 8), event("B-1", 6), event("B-1", 4), // 7 … 12
	)
	rec := record(t, s, "B-1")
	if rec.Number != 1 || rec.Batch.ID != "B-1" {
		t.Errorf("entry %d, batch %q, wanted 1 and B-1", rec.Number, rec.Batch.ID)
	}
	for what, pair := range map[string][2][]int64{
		"readings": {numbers(rec.Readings), {4, 6, 3}}, // by time, then number
		"ogs":      {numbers(rec.OGs), {8, 7}},
		"limits":   {numbers(rec.Limits), {10, 9}},
		"events":   {numbers(rec.Events), {12, 11}},
	} {
		if !slices.Equal(pair[0], pair[1]) {
			t.Errorf("%s in the order %v, wanted %v", what, pair[0], pair[1])
		}
	}
	if r := rec.Readings[0]; r.By != operator || !r.RecordedAt.Equal(clock) || r.Body.Batch != "B-1" {
		t.Errorf("reading of %q by %q at %v, wanted B-1, %q, %v", r.Body.Batch, r.By, r.RecordedAt, operator, clock)
	}
}

func testInstruments(t *testing.T, s journal.Store) {
	append1(
		t, s, hydrometer("H2"), hydrometer("H1"), certificate("H1", 9), certificate("H1", 4), check("H1", 8), check("H1", 6),
		check("H2", 5), retire("H2", 10),
	)
	list := instrumentsOf(t, s)
	if len(list) != 2 || list[0].Instrument.ID != "H1" || list[1].Instrument.ID != "H2" {
		t.Fatalf("%d instruments, wanted H1 and H2", len(list))
	}
	h1, h2 := list[0], list[1]
	if got := numbers(h1.Certificates); !slices.Equal(got, []int64{4, 3}) {
		t.Errorf("certificates %v, wanted 4, 3 by time", got)
	}
	if got := h1.Certificates[0].Body.Points; !slices.Equal(got, certificate("H1", 4).Points) {
		t.Errorf("points %v, wanted %v", got, certificate("H1", 4).Points)
	}
	if got := numbers(h1.Checks); !slices.Equal(got, []int64{6, 5}) {
		t.Errorf("checks %v, wanted 6, 5 by time", got)
	}
	if h1.Number != 2 || h1.Retired != nil {
		t.Errorf("H1 by entry %d, retired %v, wanted 2 and not", h1.Number, h1.Retired)
	}
	if !slices.Equal(numbers(h2.Checks), []int64{7}) || h2.Retired == nil || h2.Retired.Number != 8 || h2.Retired.Body.Reason != "dropped" {
		t.Errorf("H2 with checks %v, retired %v, wanted 7 and by entry 8", numbers(h2.Checks), h2.Retired)
	}
}

func testOpen(t *testing.T, s journal.Store) {
	vessels := map[string]string{"B-1": "T6", "B-2": "T4", "B-3": "T4", "B-4": "", "B-5": "T1"}
	for _, id := range []string{"B-5", "B-3", "B-1", "B-4", "B-2"} {
		b := batch(id)
		b.Vessel = vessels[id]
		append1(t, s, b, reading(id, 3, 9), reading(id, 4, 9))
	}
	append1(t, s, ending("B-5", 9))
	if got, want := openIDs(t, s), []string{"B-4", "B-2", "B-3", "B-1"}; !slices.Equal(got, want) {
		t.Errorf("open %v, wanted %v by vessel, then id", got, want)
	}
	list, err := s.Open(context.Background())
	if err != nil {
		t.Fatal(err)
	}
	for _, rec := range list {
		if len(rec.Readings) != 2 || rec.Readings[0].Body.Batch != rec.Batch.ID || rec.Readings[1].Body.Batch != rec.Batch.ID {
			t.Errorf("open batch %s came with %d readings, wanted its own 2", rec.Batch.ID, len(rec.Readings))
		}
	}
}

func testFilters(t *testing.T, s journal.Store) {
	add := func(id, product, yeast string, opened time.Time, pitched *time.Time) {
		b := batch(id)
		b.Product, b.Yeast, b.Opened, b.Pitched = product, yeast, opened, pitched
		append1(t, s, b, reading(id, 3, 9))
	}
	// 2025-12-31 23:30 UTC, though the clock at the tank shows 2026.
	eve := time.Date(2026, 1, 1, 0, 30, 0, 0, time.FixedZone("", 3600))
	summer := time.Date(2026, 7, 1, 9, 0, 0, 0, time.UTC)
	add("B-1", "stout", "house", summer, nil)
	add("B-2", "cider", "wild", summer, &eve)
	add("B-3", "cider", "house", noon(2, 9), nil)
	add("B-4", "cider", "house", noon(1, 9), nil)
	add("B-5", "cider", "house", noon(1, 9), nil)
	append1(t, s, ending("B-4", 9))
	for _, c := range []struct {
		name   string
		filter journal.Filter
		want   []string
	}{
		{"all", journal.Filter{}, []string{"B-2", "B-4", "B-5", "B-3", "B-1"}}, // product, pitch, id
		{"product", journal.Filter{Product: "cider"}, []string{"B-2", "B-4", "B-5", "B-3"}},
		{"unknown product", journal.Filter{Product: "cid"}, []string{}},
		{"yeast", journal.Filter{Yeast: "house"}, []string{"B-4", "B-5", "B-3", "B-1"}},
		{"year", journal.Filter{Year: 2026}, []string{"B-4", "B-5", "B-3", "B-1"}},
		{"year of the pitch in UTC", journal.Filter{Year: 2025}, []string{"B-2"}},
		{"open", journal.Filter{Open: true}, []string{"B-2", "B-5", "B-3", "B-1"}},
		{"closed", journal.Filter{Closed: true}, []string{"B-4"}},
		{"open and closed", journal.Filter{Open: true, Closed: true}, []string{}},
		{"together", journal.Filter{Product: "cider", Yeast: "house", Year: 2026, Open: true}, []string{"B-5", "B-3"}},
	} {
		if got := collect(t, s, c.filter); !slices.Equal(got, c.want) {
			t.Errorf("%s: %v, wanted %v", c.name, got, c.want)
		}
		for rec, err := range s.Batches(context.Background(), c.filter) {
			if err != nil || len(rec.Readings) != 1 || rec.Readings[0].Body.Batch != rec.Batch.ID {
				t.Errorf("%s: batch %s with %d readings, error %v, wanted its own one", c.name, rec.Batch.ID, len(rec.Readings), err)
			}
		}
	}
}

func testLastBy(t *testing.T, s journal.Store) {
	append1(t, s, batch("B-1"), reading("B-1", 3, 9))
	if _, err := appendAs(s, "ben", reading("B-1", 4, 9)); err != nil {
		t.Fatal(err)
	}
	append1(t, s, voidOf(2))
	for by, want := range map[string]int64{operator: 1, "ben": 3} { // entry 2 is void, 4 is a void
		if e, err := s.LastBy(context.Background(), by); err != nil || e.Number != want || e.Body == nil {
			t.Errorf("last of %s is entry %d, error %v, wanted %d", by, e.Number, err, want)
		}
	}
	append1(t, s, voidOf(1))
	for _, by := range []string{operator, "nobody", ""} {
		if e, err := s.LastBy(context.Background(), by); !errors.Is(err, journal.ErrNotFound) {
			t.Errorf("last of %q is entry %d, error %v, wanted %v", by, e.Number, err, journal.ErrNotFound)
		}
	}
}

func testLastInstrument(t *testing.T, s journal.Store) {
	last := func(by, want string) {
		t.Helper()
		if id, err := s.LastInstrumentBy(context.Background(), by); err != nil || id != want {
			t.Errorf("last instrument of %s is %q, error %v, wanted %q", by, id, err, want)
		}
	}
	append1(t, s, hydrometer("H1"), hydrometer("H2"), batch("B-1"))
	last(operator, "")
	first, second := reading("B-1", 5, 9), reading("B-1", 3, 9)
	first.Instrument, second.Instrument = "H1", "H2"
	append1(t, s, first, second, event("B-1", 6))
	last(operator, "H2") // newest by number, whenever it was taken
	last("ben", "")
	append1(t, s, voidOf(5))
	last(operator, "H1")
	append1(t, s, reading("B-1", 6, 9)) // names none
	last(operator, "")
}

func testStopped(t *testing.T, s journal.Store) {
	append1(t, s, batch("B-1"), batch("B-2"), batch("B-3"))
	// More often than any pool has connections.
	for range 100 {
		for _, err := range s.Entries(context.Background()) {
			if err != nil {
				t.Fatal(err)
			}
			break
		}
		for _, err := range s.Batches(context.Background(), journal.Filter{}) {
			if err != nil {
				t.Fatal(err)
			}
			break
		}
	}
	append1(t, s, reading("B-1", 3, 9))
	verified(t, s, 4)
}

func testSnapshot(t *testing.T, s journal.Store) {
	append1(t, s, batch("B-1"), batch("B-2"))
	seen := 0
	for rec, err := range s.Batches(context.Background(), journal.Filter{}) {
		if err != nil {
			t.Fatal(err)
		}
		seen += 1 + len(rec.Readings)
		append1(t, s, reading("B-2", 3+seen, 9)) // while the view is open
	}
	if seen != 2 {
		t.Errorf("%d batches and readings seen, wanted the 2 batches that were there when the view began", seen)
	}
	verified(t, s, 4)
}
