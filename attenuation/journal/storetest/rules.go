package storetest

import (
	"context"
	"errors"
	"slices"
	"testing"
	"time"

	"gylebook/attenuation/journal"
)

func testIDs(t *testing.T, s journal.Store) {
	append1(t, s, batch("B-1"), hydrometer("H1"), batch("B-2"), ending("B-2", 9), hydrometer("H2"), retire("H2", 9))
	for _, id := range []string{"B-1", "B-2"} {
		refused(t, s, journal.ErrExists, batch(id))
	}
	for _, id := range []string{"H1", "H2"} {
		refused(t, s, journal.ErrExists, hydrometer(id))
	}
	append1(t, s, voidOf(1), voidOf(2))
	refused(t, s, journal.ErrExists, batch("B-1"))
	refused(t, s, journal.ErrExists, hydrometer("H1"))
	append1(t, s, batch("H1"), hydrometer("B-1")) // batches and instruments have ids apart
}

func testNotFound(t *testing.T, s journal.Store) {
	ctx := context.Background()
	append1(t, s, batch("B-1"))
	noSuch := reading("B-1", 3, 9)
	noSuch.Instrument = "H9"
	noSuchOG := og("B-1", 10)
	noSuchOG.Instrument = "H9"
	for _, b := range []journal.Body{
		certificate("H9", 2), check("H9", 2), retire("H9", 2), og("B-9", 10), limit("B-9", 9), ending("B-9", 9), reading("B-9", 3, 9),
		event("B-9", 3), noSuch, noSuchOG, voidOf(2), voidOf(99),
	} {
		refused(t, s, journal.ErrNotFound, b)
	}
	if _, err := s.Batch(ctx, "B-9"); !errors.Is(err, journal.ErrNotFound) {
		t.Errorf("batch B-9: %v, wanted %v", err, journal.ErrNotFound)
	}
	for _, n := range []int64{-1, 0, 2} {
		if _, err := s.Entry(ctx, n); !errors.Is(err, journal.ErrNotFound) {
			t.Errorf("entry %d: %v, wanted %v", n, err, journal.ErrNotFound)
		}
	}
}

func testClosed(t *testing.T, s journal.Store) {
	append1(t, s, batch("B-1"), reading("B-1", 3, 9), ending("B-1", 9))
	for _, b := range []journal.Body{og("B-1", 10), reading("B-1", 4, 9), event("B-1", 4), ending("B-1", 10)} {
		refused(t, s, journal.ErrClosed, b)
	}
	append1(t, s, limit("B-1", 10))
	append1(t, s, voidOf(2))
	rec := record(t, s, "B-1")
	if rec.Closed == nil || rec.Closed.Number != 3 || len(rec.Limits) != 1 || !rec.Readings[0].Void {
		t.Errorf("closed %v, %d limits, reading void %t, wanted closed by entry 3, 1 limit, void", rec.Closed, len(rec.Limits), rec.Readings[0].Void)
	}
	if got := openIDs(t, s); len(got) != 0 {
		t.Errorf("open %v, wanted none", got)
	}
	append1(t, s, voidOf(3))
	if got := openIDs(t, s); !slices.Equal(got, []string{"B-1"}) {
		t.Errorf("open after the void close %v, wanted B-1", got)
	}
	append1(t, s, reading("B-1", 4, 9))
	if rec := record(t, s, "B-1"); rec.Closed != nil {
		t.Errorf("closed by entry %d, which is void", rec.Closed.Number)
	}
	append1(t, s, ending("B-1", 12))
	if rec := record(t, s, "B-1"); rec.Closed == nil || rec.Closed.Number != 8 {
		t.Errorf("closed %v, wanted by entry 8", rec.Closed)
	}
	refused(t, s, journal.ErrClosed, reading("B-1", 5, 9))
}

func testRetired(t *testing.T, s journal.Store) {
	append1(t, s, hydrometer("H1"), batch("B-1"), retire("H1", 9))
	with := reading("B-1", 10, 9)
	with.Instrument = "H1"
	withOG := og("B-1", 10)
	withOG.Instrument, withOG.At = "H1", noon(10, 9)
	for _, b := range []journal.Body{certificate("H1", 10), check("H1", 10), retire("H1", 10), with, withOG} {
		refused(t, s, journal.ErrRetired, b)
	}
	append1(t, s, voidOf(3), with)
	if got := instrumentsOf(t, s); got[0].Retired != nil {
		t.Error("an instrument whose retirement is void came back retired")
	}
}

func testVoid(t *testing.T, s journal.Store) {
	append1(t, s, batch("B-1"), og("B-1", 10), limit("B-1", 9), reading("B-1", 3, 9), event("B-1", 3), hydrometer("H1"), check("H1", 2), certificate("H1", 3))
	made := append1(t, s, voidOf(2), voidOf(3), voidOf(4), voidOf(5), voidOf(7), voidOf(8))
	refused(t, s, journal.ErrVoided, voidOf(4))
	refused(t, s, journal.ErrVoided, reading("B-1", 4, 9), voidOf(15), voidOf(15))
	refused(t, s, journal.ErrNotFound, voidOf(made[0].Number)) // no void of a void
	rec := record(t, s, "B-1")
	for what, isVoid := range map[string]bool{
		"og": rec.OGs[0].Void, "limit": rec.Limits[0].Void, "reading": rec.Readings[0].Void, "event": rec.Events[0].Void,
	} {
		if !isVoid {
			t.Errorf("a void %s is not marked", what)
		}
	}
	if got := rec.Readings[0].VoidReason; got != "typed wrong" {
		t.Errorf("reason %q, wanted \"typed wrong\"", got)
	}
	if got := instrumentsOf(t, s)[0]; len(got.Checks)+len(got.Certificates) != 0 {
		t.Errorf("%d void checks and %d void certificates were not left out", len(got.Checks), len(got.Certificates))
	}
	append1(t, s, reading("B-1", 3, 9)) // entered anew, both stay
	if got := record(t, s, "B-1").Readings; len(got) != 2 || !got[0].Void || got[1].Void {
		t.Errorf("%d readings, wanted the void one and the new one", len(got))
	}
	verified(t, s, 15)
}

func testVoidBatch(t *testing.T, s journal.Store) {
	ctx := context.Background()
	append1(t, s, batch("B-1"), reading("B-1", 3, 9), batch("B-2"), ending("B-2", 9), voidOf(1), voidOf(3))
	if _, err := s.Batch(ctx, "B-1"); !errors.Is(err, journal.ErrNotFound) {
		t.Errorf("a void batch: %v, wanted %v", err, journal.ErrNotFound)
	}
	if got := collect(t, s, journal.Filter{}); len(got) != 0 {
		t.Errorf("batches %v, wanted none: they are void", got)
	}
	if got := openIDs(t, s); len(got) != 0 {
		t.Errorf("open %v, wanted none: they are void", got)
	}
	for _, b := range []journal.Body{reading("B-1", 4, 9), limit("B-1", 9), ending("B-1", 9), limit("B-2", 9)} {
		refused(t, s, journal.ErrNotFound, b)
	}
	if ids, err := s.BatchIDs(ctx); err != nil || !slices.Equal(ids, []string{"B-1", "B-2"}) {
		t.Errorf("batch ids %v, error %v, wanted B-1 and B-2: void ids are used too", ids, err)
	}
	append1(t, s, voidOf(4)) // the close of a void batch
	if got := openIDs(t, s); len(got) != 0 {
		t.Errorf("open %v, wanted none: a void close does not bring a void batch back", got)
	}
}

func testVoidInstrument(t *testing.T, s journal.Store) {
	append1(t, s, hydrometer("H1"), certificate("H1", 3), voidOf(1))
	if got := instrumentsOf(t, s); len(got) != 0 {
		t.Errorf("%d instruments, wanted none: it is void", len(got))
	}
	refused(t, s, journal.ErrNotFound, check("H1", 4))
	append1(t, s, batch("B-1"))
	with := reading("B-1", 3, 9)
	with.Instrument = "H1"
	refused(t, s, journal.ErrNotFound, with)
}

func testIncomplete(t *testing.T, s journal.Store) {
	append1(t, s, batch("B-1"))
	noText := reading("B-1", 3, 9)
	noText.Gravity.Text = ""
	noTime := event("B-1", 3)
	noTime.At = time.Time{}
	for _, b := range []journal.Body{noText, noTime, journal.Void{Entry: 1}, journal.Batch{ID: "B-2"}, batch("with space")} {
		refused(t, s, journal.ErrIncomplete, b)
	}
}
