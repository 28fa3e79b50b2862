package storetest

import (
	"context"
	"errors"
	"strings"
	"testing"
	"time"

	"github.com/google/go-cmp/cmp"

	"gylebook/attenuation/journal"
)

func testEmpty(t *testing.T, s journal.Store) {
	ctx := context.Background()
	if n, chain := head(t, s); n != 0 || chain != "" {
		t.Errorf("head %d %q, wanted 0 and none", n, chain)
	}
	verified(t, s, 0)
	if ids, err := s.BatchIDs(ctx); err != nil || len(ids) != 0 {
		t.Errorf("batch ids %v, error %v, wanted none", ids, err)
	}
	if got := openIDs(t, s); len(got) != 0 {
		t.Errorf("open %v, wanted none", got)
	}
	if got := collect(t, s, journal.Filter{}); len(got) != 0 {
		t.Errorf("batches %v, wanted none", got)
	}
	if got := instrumentsOf(t, s); len(got) != 0 {
		t.Errorf("%d instruments, wanted none", len(got))
	}
}

func testNumbers(t *testing.T, s journal.Store) {
	first := append1(t, s, batch("B-1"))
	refused(t, s, journal.ErrExists, batch("B-1"))
	second := append1(t, s, reading("B-1", 3, 9), reading("B-1", 4, 9))
	if first[0].Number != 1 || second[0].Number != 2 || second[1].Number != 3 {
		t.Errorf("numbers %d, %d, %d, wanted 1, 2, 3", first[0].Number, second[0].Number, second[1].Number)
	}
	chain := ""
	for _, e := range append(first, second...) {
		if err := e.Verify(chain); err != nil {
			t.Error(err)
		}
		if e.By != operator || !e.RecordedAt.Equal(clock) {
			t.Errorf("entry %d by %q at %v, wanted %q at %v", e.Number, e.By, e.RecordedAt, operator, clock)
		}
		chain = e.Chain
	}
	if n, c := head(t, s); n != 3 || c != chain {
		t.Errorf("head %d %.8s, wanted 3 %.8s", n, c, chain)
	}
	verified(t, s, 3)
}

// comesBack appends bodies and compares what every way of reading gives.
func comesBack(t *testing.T, s journal.Store, bodies ...journal.Body) {
	t.Helper()
	made := append1(t, s, bodies...)
	want := make([]string, len(made))
	for k, e := range made {
		want[k] = exported(t, e)
		if got, err := s.Entry(context.Background(), e.Number); err != nil || exported(t, got) != want[k] {
			t.Errorf("entry %d came back as %s, error %v, wanted %s", e.Number, exported(t, got), err, want[k])
		}
	}
	got := []string{}
	for e, err := range s.Entries(context.Background()) {
		if err != nil {
			t.Fatal(err)
		}
		got = append(got, exported(t, e))
	}
	if diff := cmp.Diff(want, got[len(got)-len(want):]); diff != "" {
		t.Errorf("entries (-wanted +got):\n%s", diff)
	}
	verified(t, s, int64(len(got)))
}

func exported(t *testing.T, e journal.Entry) string {
	t.Helper()
	if e.Body == nil {
		return "no body"
	}
	text, err := e.MarshalJSON()
	if err != nil {
		t.Fatal(err)
	}
	return string(text)
}

func testEveryKind(t *testing.T, s journal.Store) {
	unpitched := batch("B-2")
	unpitched.Pitched, unpitched.Vessel, unpitched.Volume, unpitched.Generation, unpitched.Note = nil, "", "", 0, ""
	gassy := reading("B-1", 4, 9)
	gassy.Gassy, gassy.Keep, gassy.Quality, gassy.Instrument = true, "stuck pump", journal.Estimated, "H1"
	blend := event("B-1", 5)
	blend.What, blend.From, blend.Gravity, blend.VolumeL, blend.Vessel = journal.Blend, "B-2", typed("1.0120"), "12.50", "T6"
	thermometer := journal.Instrument{ID: "Th1", Type: journal.Thermometer, Since: noon(1, 8)}
	comesBack(
		t, s, hydrometer("H1"), thermometer, certificate("H1", 2), check("H1", 3), batch("B-1"), unpitched, og("B-1", 10), limit("B-1", 9),
		reading("B-1", 3, 9), gassy, event("B-1", 4), blend, volume("B-1", "98.50", 5), voidOf(9), ending("B-1", 20), retire("H1", 21),
	)
	for _, r := range record(t, s, "B-1").Readings {
		if r.Body.Gravity.Text != "1.0480" || r.Body.Temp.Text != "18.50" {
			t.Errorf("reading came back as %q at %q, wanted 1.0480 at 18.50", r.Body.Gravity.Text, r.Body.Temp.Text)
		}
	}
	if got := record(t, s, "B-2").Batch.Pitched; got != nil {
		t.Errorf("a batch not pitched came back pitched at %v", got)
	}
}

func testPointers(t *testing.T, s journal.Store) {
	b, r := batch("B-1"), reading("B-1", 3, 9)
	comesBack(t, s, &b, &r)
	refused(t, s, journal.ErrIncomplete, nil)
	refused(t, s, journal.ErrIncomplete, (*journal.Reading)(nil))
}

func testOddText(t *testing.T, s journal.Store) {
	b := batch("Fäß-1")
	b.Product = "Weiße \u2028 <b>&amp;</b> 🍺 'q' \"Q\" \\ ; DROP TABLE reading --"
	r := reading("Fäß-1", 3, 9)
	r.Note = "  spaces kept \t\r\n\n" + "nul \x00 and after, \x1f, \x7f"
	r.Vessel = "Tank № 4"
	long := reading("Fäß-1", 4, 9)
	long.Note = strings.Repeat("ö", 1000)
	comesBack(t, s, b, r, long)
	if got := record(t, s, "Fäß-1"); got.Batch.Product != b.Product || got.Readings[0].Body.Note != r.Note || got.Readings[1].Body.Note != long.Note {
		t.Errorf("product %q, note %q, wanted %q and %q", got.Batch.Product, got.Readings[0].Body.Note, b.Product, r.Note)
	}
}

func testOffsets(t *testing.T, s journal.Store) {
	append1(t, s, batch("B-1"))
	zones := []*time.Location{time.UTC, time.FixedZone("", 5*3600+45*60), time.FixedZone("", -9*3600-1800), time.FixedZone("LMT", 53*60+28)}
	bodies := make([]journal.Body, len(zones))
	for k, zone := range zones {
		r := reading("B-1", 3, 9)
		r.TakenAt = time.Date(2026, 10, 25, 2, 30, k, 123_456_789, zone)
		bodies[k] = r
	}
	comesBack(t, s, bodies...)
	got := record(t, s, "B-1").Readings
	// 02:30 comes first at +05:45, then +00:53, +00:00, -09:30.
	for k, want := range []string{
		"2026-10-25T02:30:01.123456789+05:45", "2026-10-25T02:30:03.123456789+00:53",
		"2026-10-25T02:30:00.123456789Z", "2026-10-25T02:30:02.123456789-09:30",
	} {
		if text := got[k].Body.TakenAt.Format(time.RFC3339Nano); text != want {
			t.Errorf("reading %d taken at %s, wanted %s", k, text, want)
		}
	}
}

func testClock(t *testing.T, s journal.Store) {
	draft := func(journal.Reader) ([]journal.Body, error) { return []journal.Body{reading("B-1", 3, 9)}, nil }
	append1(t, s, batch("B-1"))
	back, err := s.Append(context.Background(), operator, clock.Add(-time.Hour), draft)
	if err != nil || !back[0].RecordedAt.Equal(clock) {
		t.Fatalf("recorded at %v, error %v, wanted %v: not before the entry before it", back, err, clock)
	}
	on, err := s.Append(context.Background(), operator, clock.Add(time.Second+123456789*time.Nanosecond), draft)
	if want := clock.Add(time.Second + 123*time.Millisecond); err != nil || !on[0].RecordedAt.Equal(want) {
		t.Fatalf("recorded at %v, error %v, wanted %v", on, err, want)
	}
	verified(t, s, 3)
}

func testClosedStore(t *testing.T, s journal.Store) {
	append1(t, s, batch("B-1"))
	if err := s.Close(); err != nil {
		t.Fatal(err)
	}
	ctx := context.Background()
	_, appendErr := appendAs(s, operator, reading("B-1", 3, 9))
	_, _, eachErr := appendEach(s, nil, reading("B-1", 3, 9))
	_, batchErr := s.Batch(ctx, "B-1")
	_, verifyErr := journal.VerifyAll(ctx, s)
	_, restoreErr := s.Restore(ctx, func(func(journal.Entry, error) bool) {})
	for what, err := range map[string]error{
		"append": appendErr, "append each": eachErr, "batch": batchErr, "verify": verifyErr, "restore": restoreErr, "backup": s.Backup(ctx, t.TempDir()+"/copy"),
	} {
		if !errors.Is(err, journal.ErrClosed) {
			t.Errorf("%s of a closed store: %v, wanted %v", what, err, journal.ErrClosed)
		}
	}
}
