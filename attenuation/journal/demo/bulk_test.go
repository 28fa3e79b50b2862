package demo

import (
	"errors"
	"testing"
	"time"

	"gylebook/attenuation/journal"
)

func TestBulk(t *testing.T) {
	batches, readings := 400, 40
	if testing.Short() {
		batches = 210
	}
	store := empty(t)
	began := time.Now()
	if err := Bulk(t.Context(), store, batches, readings); err != nil {
		t.Fatal(err)
	}
	t.Logf("%d batches of %d readings in %v", batches, readings, time.Since(began))
	// One instrument; a batch, its original gravity and its readings; an end for all
	// but 200.
	want := int64(1 + batches*(2+readings) + batches - 200)
	if n, err := journal.VerifyAll(t.Context(), store); err != nil || n != want {
		t.Errorf("%d entries hold, %v; wanted %d", n, err, want)
	}
	open, err := store.Open(t.Context())
	if err != nil || len(open) != 200 {
		t.Fatalf("%d open, %v; wanted 200", len(open), err)
	}
	instruments, err := store.Instruments(t.Context())
	if err != nil {
		t.Fatal(err)
	}
	book := journal.NewBook(instruments)
	for _, rec := range open {
		v := journal.Derive(rec, book)
		last := v.Last()
		if len(v.Values) != readings || last == nil || last.Attenuation == nil {
			t.Fatalf("%s: %d values, last %+v", rec.Batch.ID, len(v.Values), last)
		}
		if a := last.Attenuation.Apparent; a < 70 || a > 85 {
			t.Errorf("%s is at %.1f %%", rec.Batch.ID, a)
		}
	}
	if err := Bulk(t.Context(), store, 1, 1); !errors.Is(err, journal.ErrNotEmpty) {
		t.Errorf("again: %v, wanted %v", err, journal.ErrNotEmpty)
	}
}
