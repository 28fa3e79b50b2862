package main

import (
	"context"
	"fmt"
	"strings"
	"sync"
	"testing"
	"time"

	"gylebook/attenuation/journal"
	"gylebook/attenuation/journal/sqlstore"
	"gylebook/tables/web"
)

// asAnew compares what a desk shows with what one shows that has kept nothing.
func asAnew(t *testing.T, d *desk, what string) {
	t.Helper()
	anew := &desk{store: d.store, flags: d.flags, now: d.now, place: d.place, file: d.file}
	say := func(d *desk) string {
		board, err := d.Board(t.Context())
		if err != nil {
			t.Fatal(err)
		}
		text := fmt.Sprintf("%+v", board)
		for _, id := range []string{"LB-17", "LB-16", "T3"} {
			b, err := d.Batch(t.Context(), id, "ines")
			if err != nil {
				t.Fatal(err)
			}
			text += fmt.Sprintf("\n%+v", b)
		}
		return text
	}
	if kept, want := say(d), say(anew); kept != want {
		t.Errorf("%s: shown\n%s\nwanted\n%s", what, kept, want)
	}
}

// What is kept never differs from what would be reckoned anew, whoever has written.
func TestDeskKeepsNothingStale(t *testing.T) {
	d, ctx := demoDesk(t), context.Background()
	asAnew(t, d, "at first")
	asAnew(t, d, "again")
	log := func(batch, gravity string) string {
		t.Helper()
		_, entry, err := d.Log(ctx, web.Reading{Batch: batch, Gravity: gravity, Temp: "20", Instrument: "H1", Operator: "ines"})
		if err != nil || entry == "" {
			t.Fatalf("entry %q, error %v", entry, err)
		}
		return entry
	}
	log("LB-17", "1.0110")
	asAnew(t, d, "after a reading")
	entry := log("LB-16", "1.0080")
	asAnew(t, d, "after a reading of another batch")
	if _, err := d.Undo(ctx, entry, "ines", ""); err != nil {
		t.Fatal(err)
	}
	asAnew(t, d, "after undo")

	// Another process.
	other, err := sqlstore.Open(ctx, d.place)
	if err != nil {
		t.Fatal(err)
	}
	defer func() { _ = other.Close() }()
	write := func(what string, body journal.Body) {
		t.Helper()
		if _, err := other.Append(ctx, "tom", deskNow, func(journal.Reader) ([]journal.Body, error) { return []journal.Body{body}, nil }); err != nil {
			t.Fatalf("%s: %v", what, err)
		}
		asAnew(t, d, what)
	}
	write("after an addition", journal.Event{Batch: "LB-17", What: journal.Racking, At: deskNow.Add(-time.Hour)})
	write("after a batch ended", journal.Close{Batch: "LB-16", At: deskNow.Add(-time.Minute)})
	later := deskNow.Add(keptFor / 2)
	d.now = func() time.Time { return later }
	board, err := d.Board(ctx)
	if err != nil || !strings.Contains(board.Notes[0].Text, "6 open") {
		t.Errorf("the board says %+v, %v; wanted one vessel fewer", board.Notes, err)
	}
	later = deskNow.Add(30 * time.Hour)
	asAnew(t, d, "a day later")
}

// Many at once read while others write: each who has stored finds it on the pages.
func TestDeskAtOnce(t *testing.T) {
	d, ctx := demoDesk(t), context.Background()
	batches := []string{"LB-17", "LB-16", "HC-06", "OD-04"}
	gravity := map[string]string{}
	for _, id := range batches {
		rec, err := d.store.Batch(ctx, id)
		if err != nil {
			t.Fatal(err)
		}
		gravity[id] = rec.Readings[len(rec.Readings)-1].Body.Gravity.Text
	}
	var all sync.WaitGroup
	for n := range 12 {
		all.Go(func() {
			id, who := batches[n%len(batches)], fmt.Sprintf("p%d", n)
			taken := deskNow.Add(-time.Duration(n+1) * time.Minute).Format(time.RFC3339)
			_, entry, err := d.Log(ctx, web.Reading{Batch: id, Gravity: gravity[id], Temp: "19", Taken: taken, Instrument: "none", Operator: who, Keep: "a test"})
			if err != nil {
				t.Errorf("%s of %s: %v", who, id, err)
				return
			}
			b, err := d.Batch(ctx, id, who)
			if err != nil || b.LastEntry != entry || !strings.Contains(fmt.Sprintf("%+v", b.Answer.Tables), "["+entry+" ") {
				t.Errorf("%s stored #%s, the page of %s has #%s last, error %v: %+v", who, entry, id, b.LastEntry, err, b.Answer.Tables)
			}
			if _, err := d.Board(ctx); err != nil {
				t.Error(err)
			}
			if _, err := d.Bench(ctx, "abv", map[string]string{"og": "1.048", "fg": "1.010"}); err != nil {
				t.Error(err)
			}
			if picture, err := d.Curve(ctx, id, "svg", true); err != nil || len(picture) == 0 {
				t.Errorf("no picture of %s: %v", id, err)
			}
		})
	}
	all.Wait()
	asAnew(t, d, "after all of them")
}
