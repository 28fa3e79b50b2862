package storetest

import (
	"context"
	"slices"
	"testing"

	"gylebook/attenuation/journal"
)

func volume(id, litres string, day int) journal.Volume {
	return journal.Volume{Batch: id, At: noon(day, 12), Volume: litres}
}

func testVolume(t *testing.T, s journal.Store) {
	append1(t, s, batch("B-1"), volume("B-1", "98.50", 5), volume("B-1", "97", 4), ending("B-1", 9))
	rec := record(t, s, "B-1")
	if got := numbers(rec.Volumes); !slices.Equal(got, []int64{3, 2}) || rec.Volume() != "98.50" {
		t.Errorf("volumes %v, the last %q, wanted 3, 2 by time and 98.50", got, rec.Volume())
	}
	append1(t, s, volume("B-1", "96", 6), voidOf(5)) // of a closed batch, and void
	if rec = record(t, s, "B-1"); len(rec.Volumes) != 3 || !rec.Volumes[2].Void || rec.Volume() != "98.50" {
		t.Errorf("%d volumes, the last %q, wanted the third void and 98.50", len(rec.Volumes), rec.Volume())
	}
	append1(t, s, voidOf(2), voidOf(3))
	if got := record(t, s, "B-1").Volume(); got != "100.0" {
		t.Errorf("volume %q, wanted the 100.0 of the opening", got)
	}
	refused(t, s, journal.ErrNotFound, volume("B-9", "90", 5))
	refused(t, s, journal.ErrIncomplete, volume("B-1", "", 5))
	refused(t, s, journal.ErrIncomplete, volume("B-1", "-3", 5))
}

// What was blended into others hangs on the batch that it came from, unless the
// other batch is void.
func testGiven(t *testing.T, s journal.Store) {
	into := func(id string, day int) journal.Event {
		return journal.Event{Batch: id, At: noon(day, 11), What: journal.Blend, VolumeL: "10", From: "B-1"}
	}
	append1(t, s, batch("B-1"), batch("B-2"), batch("B-3"), into("B-2", 5), into("B-3", 4), into("B-2", 3), event("B-1", 3))
	rec := record(t, s, "B-1")
	if got := numbers(rec.Given); !slices.Equal(got, []int64{6, 5, 4}) || rec.Given[1].Body.Batch != "B-3" {
		t.Errorf("given %v, wanted 6, 5, 4 by time, the second to B-3", got)
	}
	if got := numbers(rec.Events); !slices.Equal(got, []int64{7}) {
		t.Errorf("events %v, wanted its own, 7", got)
	}
	if got := record(t, s, "B-2"); len(got.Given) != 0 || len(got.Events) != 2 {
		t.Errorf("%d given and %d events of B-2, wanted 0 and 2", len(got.Given), len(got.Events))
	}
	append1(t, s, voidOf(6), voidOf(3))
	if rec = record(t, s, "B-1"); len(rec.Given) != 2 || !rec.Given[0].Void {
		t.Errorf("%d given, wanted the void one and that to B-2; B-3 is void", len(rec.Given))
	}
}

// A batch that is void is found by who asks for it.
func testVoidOnes(t *testing.T, s journal.Store) {
	append1(t, s, batch("B-1"), reading("B-1", 3, 9), batch("B-2"), voidOf(1))
	if got := collect(t, s, journal.Filter{Void: true}); !slices.Equal(got, []string{"B-1", "B-2"}) {
		t.Errorf("with void ones %v, wanted B-1 and B-2", got)
	}
	if got := collect(t, s, journal.Filter{Batch: "B-2"}); !slices.Equal(got, []string{"B-2"}) {
		t.Errorf("by id %v, wanted B-2", got)
	}
	if got := collect(t, s, journal.Filter{Batch: "B-1"}); len(got) != 0 {
		t.Errorf("by id %v, wanted none: it is void", got)
	}
	for rec, err := range s.Batches(context.Background(), journal.Filter{Void: true}) {
		if err != nil {
			t.Fatal(err)
		}
		want := ""
		if rec.Batch.ID == "B-1" {
			want = "typed wrong"
		}
		if rec.Void != (want != "") || rec.VoidReason != want || (rec.Batch.ID == "B-1") != (len(rec.Readings) == 1) {
			t.Errorf("%s: void %t, reason %q, %d readings", rec.Batch.ID, rec.Void, rec.VoidReason, len(rec.Readings))
		}
	}
}

// An instrument that is out of use now was in use before.
func testRetiredBefore(t *testing.T, s journal.Store) {
	append1(t, s, hydrometer("H1"), batch("B-1"), retire("H1", 9))
	before, after := reading("B-1", 9, 8), reading("B-1", 9, 9) // it went out of use at 9
	before.Instrument, after.Instrument = "H1", "H1"
	early := og("B-1", 10)
	early.Instrument = "H1"
	append1(t, s, before, early, certificate("H1", 8), check("H1", 7))
	refused(t, s, journal.ErrRetired, after)
	refused(t, s, journal.ErrRetired, retire("H1", 5)) // a second one, of whatever time
	append1(t, s, voidOf(3), after, retire("H1", 5))
	refused(t, s, journal.ErrRetired, before)
}
