package main

import (
	"context"
	"errors"
	"os"
	"path/filepath"
	"slices"
	"strings"
	"testing"
	"time"

	"gylebook/attenuation/journal"
	"gylebook/attenuation/journal/demo"
	"gylebook/attenuation/journal/sqlstore"
	"gylebook/attenuation/outlook"
	"gylebook/tables/chart"
	"gylebook/tables/web"
)

// deskNow is an hour of the demo season at which batches are open.
var deskNow = time.Date(2026, time.November, 28, 8, 0, 0, 0, time.UTC)

// demoDesk is a desk on the invented season, at deskNow.
func demoDesk(t *testing.T) *desk {
	t.Helper()
	t.Setenv("SOURCE_DATE_EPOCH", "1795852800") // deskNow
	place := filepath.Join(t.TempDir(), "demo.db")
	s, err := sqlstore.Create(t.Context(), place)
	if err != nil {
		t.Fatal(err)
	}
	t.Cleanup(func() { _ = s.Close() })
	if _, err := demo.Write(t.Context(), s); err != nil {
		t.Fatal(err)
	}
	info, err := os.Stat(place)
	if err != nil {
		t.Fatal(err)
	}
	return &desk{store: s, now: func() time.Time { return deskNow }, place: place, file: info}
}

func headOf(t *testing.T, s journal.Store) int64 {
	t.Helper()
	n, _, err := s.Head(t.Context())
	if err != nil {
		t.Fatal(err)
	}
	return n
}

// The pages say what the commands say: a reading is judged without a trace, stored
// with its operator, and taken back.
func TestDeskStoresWhatItReadBack(t *testing.T) {
	d, ctx := demoDesk(t), context.Background()
	before := headOf(t, d.store)
	r := web.Reading{Batch: "LB-17", Gravity: "1.0110", Temp: "20", Instrument: "H1", Operator: "ines", Note: "foam --keep=x"}
	judged, err := d.Judge(ctx, r)
	if err != nil || judged.Held != "" {
		t.Fatalf("held %q, error %v", judged.Held, err)
	}
	if now := headOf(t, d.store); now != before {
		t.Fatalf("judging wrote entry %d", now)
	}
	stored, entry, err := d.Log(ctx, r)
	if err != nil || entry == "" {
		t.Fatalf("entry %q, error %v", entry, err)
	}
	said, says := judged.Answer.Ladders[0], stored.Ladders[0]
	if len(said.Answer) != 2 || !slices.Equal(append(said.Answer, "#"+entry), says.Answer) || !slices.Equal(said.Rungs, says.Rungs) {
		t.Errorf("read back %q, stored %q", said, says)
	}
	if judged.Taken != deskNow.Format(time.RFC3339) {
		t.Errorf("judged for %q, wanted now", judged.Taken)
	}
	last, err := d.store.LastBy(ctx, "ines")
	if err != nil {
		t.Fatal(err)
	}
	body := last.Body.(journal.Reading)
	if body.Gravity.Text != "1.0110" || body.Note != r.Note || body.Keep != "" || last.By != "ines" {
		t.Errorf("on disk: %+v by %s", body, last.By)
	}
	if b, err := d.Batch(ctx, "LB-17", "ines"); err != nil || b.LastEntry != entry {
		t.Errorf("last entry %q, error %v, wanted %s", b.LastEntry, err, entry)
	}
	if b, err := d.Batch(ctx, "LB-17", "anna"); err != nil || b.LastEntry == entry {
		t.Errorf("anna is offered ines' entry %q, error %v", b.LastEntry, err)
	}
	if _, err := d.Undo(ctx, entry, "anna", ""); statusOfError(err) != 409 {
		t.Errorf("anna took back ines' entry: %v", err)
	}
	if _, err := d.Undo(ctx, entry, "ines", "wrong tank"); err != nil {
		t.Fatal(err)
	}
	if _, err := d.Undo(ctx, entry, "ines", ""); statusOfError(err) != 409 {
		t.Errorf("took the same entry back twice: %v", err)
	}
}

func statusOfError(err error) int {
	var refused *web.Refused
	if errors.As(err, &refused) {
		return refused.Status
	}
	return 0
}

func TestDeskRefuses(t *testing.T) {
	d, ctx := demoDesk(t), context.Background()
	before := headOf(t, d.store)
	for name, r := range map[string]web.Reading{
		"no gravity":  {Batch: "LB-17", Gravity: "beer", Temp: "20", Operator: "ines"},
		"a flag":      {Batch: "LB-17", Gravity: "--help", Temp: "20", Operator: "ines"},
		"no batch":    {Batch: "LB-99", Gravity: "1.030", Temp: "20", Operator: "ines"},
		"no vessel":   {Batch: "-", Gravity: "1.030", Temp: "20", Operator: "ines"},
		"too hot":     {Batch: "LB-17", Gravity: "1.030", Temp: "200", Operator: "ines"},
		"no hydro":    {Batch: "LB-17", Gravity: "1.030", Temp: "20", Instrument: "H9", Operator: "ines"},
		"time ahead":  {Batch: "LB-17", Gravity: "1.030", Temp: "20", Taken: "2030-01-01 12:00", Operator: "ines"},
		"no time":     {Batch: "LB-17", Gravity: "1.030", Temp: "20", Taken: "soon", Operator: "ines"},
		"three words": {Batch: "LB-17", Gravity: "1.011 20 30", Temp: "20", Operator: "ines"},
	} {
		if _, _, err := d.Log(ctx, r); statusOfError(err) < 400 || statusOfError(err) >= 500 {
			t.Errorf("%s: error %v, wanted a refusal", name, err)
		}
	}
	held, err := d.Judge(ctx, web.Reading{Batch: "LB-17", Gravity: "1.0400", Temp: "20", Instrument: "H1", Operator: "ines"})
	if err != nil || held.Held == "" || strings.Contains(held.Hint, "--") {
		t.Errorf("a rise of 25 points: held %q, hint %q, error %v", held.Held, held.Hint, err)
	}
	if now := headOf(t, d.store); now != before {
		t.Errorf("%d entries were written", now-before)
	}
	// A journal that was moved away would swallow what is stored.
	if err := os.Rename(d.place, d.place+".away"); err != nil {
		t.Fatal(err)
	}
	if _, _, err := d.Log(ctx, web.Reading{Batch: "LB-17", Gravity: "1.0110", Temp: "20", Instrument: "H1", Operator: "ines"}); statusOfError(err) != 503 {
		t.Errorf("without its file: %v", err)
	}
	if _, err := d.Board(ctx); statusOfError(err) != 503 {
		t.Errorf("board without its file: %v", err)
	}
	if err := os.Rename(d.place+".away", d.place); err != nil {
		t.Fatal(err)
	}
	if now := headOf(t, d.store); now != before {
		t.Errorf("%d entries were written", now-before)
	}
}

// The board is today: the same batches in the same order, and new after an entry.
func TestDeskBoard(t *testing.T) {
	d, ctx := demoDesk(t), context.Background()
	got, err := d.ask(ctx, "", []string{"today"})
	if err != nil {
		t.Fatal(err)
	}
	board, err := d.Board(ctx)
	if err != nil || len(board.Vessels) != len(got[0].records) {
		t.Fatalf("%d vessels, error %v, wanted %d", len(board.Vessels), err, len(got[0].records))
	}
	for k, rec := range got[0].records {
		if board.Vessels[k].Batch != rec.Get("batch") || board.Vessels[k].Word != rec.Get("word") {
			t.Errorf("place %d: %+v, wanted %v", k+1, board.Vessels[k], rec)
		}
	}
	stored, _, err := d.Log(ctx, web.Reading{Batch: "LB-17", Gravity: "1.0110", Temp: "20", Instrument: "H1", Operator: "ines"})
	if err != nil {
		t.Fatal(err)
	}
	if board, err = d.Board(ctx); err != nil {
		t.Fatal(err)
	}
	for _, v := range board.Vessels {
		if said := stored.Ladders[0].Answer[0]; v.Batch == "LB-17" && v.Gravity != said {
			t.Errorf("after the entry the board shows %s, stored was %q", v.Gravity, said)
		}
	}
}

// Every batch of the season can be drawn, and what is drawn is what is there.
func TestPicturesOfTheSeason(t *testing.T) {
	d, ctx := demoDesk(t), context.Background()
	ids, err := d.store.BatchIDs(ctx)
	if err != nil || len(ids) < 30 {
		t.Fatalf("%d batches, error %v", len(ids), err)
	}
	f, err := newForesight(ctx, d.store, deskNow, outlook.Drink{})
	if err != nil {
		t.Fatal(err)
	}
	for _, id := range ids {
		rec, err := shownBy(ctx, d.store, id)
		if err != nil {
			t.Fatal(err)
		}
		p, err := pictureOf(ctx, d.store, f, rec)
		if err != nil {
			t.Errorf("%s: %v", id, err)
			continue
		}
		marks, hollow := 0, 0
		v := journal.Derive(rec, f.book)
		for _, one := range v.Values {
			if one.Err == nil {
				marks++
				if one.Void || one.Suspect {
					hollow++
				}
			}
		}
		drawn := 0
		for _, m := range p.course.Marks {
			if m.Hollow {
				drawn++
			}
			if !(m.U > 0) {
				t.Errorf("%s: a reading without uncertainty", id)
			}
		}
		if len(p.course.Marks) != marks || drawn != hollow {
			t.Errorf("%s: %d marks, %d hollow, wanted %d and %d", id, len(p.course.Marks), drawn, marks, hollow)
		}
		var one, two strings.Builder
		if err := errors.Join(p.course.Write(&one, chart.SVG, chart.Page), p.course.Write(&two, chart.SVG, chart.Page)); err != nil || one.String() != two.String() {
			t.Errorf("%s: error %v, twice the same %v", id, err, one.String() == two.String())
		}
		if len(p.lines) == 0 {
			t.Errorf("%s: no words beside the picture", id)
		}
	}
}
