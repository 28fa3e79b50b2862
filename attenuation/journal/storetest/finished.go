package storetest

import (
	"context"
	"slices"
	"testing"
	"time"

	"gylebook/attenuation/journal"
)

// testFinished asks for the closed batches of a product and a yeast, newest first.
func testFinished(t *testing.T, s journal.Store) {
	add := func(id, product, yeast string, pitched time.Time) {
		b := batch(id)
		b.Product, b.Yeast, b.Pitched = product, yeast, &pitched
		append1(t, s, b, reading(id, 8, 9))
	}
	add("B-1", "cider", "house", noon(3, 9))
	add("B-2", "cider", "house", noon(1, 9))
	add("B-3", "cider", "wild", noon(2, 9))
	add("B-4", "stout", "house", noon(2, 9))
	add("B-5", "cider", "house", noon(4, 9)) // stays open
	add("B-6", "cider", "house", noon(3, 9))
	for id, day := range map[string]int{"B-1": 9, "B-2": 12, "B-3": 9, "B-4": 9, "B-6": 9} {
		append1(t, s, ending(id, day))
	}
	finished := func(product, yeast string, before time.Time) []string {
		t.Helper()
		got := []string{}
		for rec, err := range s.Finished(context.Background(), product, yeast, before) {
			if err != nil {
				t.Fatal(err)
			}
			if rec.Closed == nil || len(rec.Readings) != 1 || rec.Readings[0].Body.Batch != rec.Batch.ID {
				t.Errorf("batch %s, closed %v, with %d readings, wanted it closed with its own one", rec.Batch.ID, rec.Closed, len(rec.Readings))
			}
			got = append(got, rec.Batch.ID)
		}
		return got
	}
	for _, c := range []struct {
		product, yeast string
		before         time.Time
		want           []string
	}{
		{"cider", "house", noon(20, 9), []string{"B-6", "B-1", "B-2"}},
		{"cider", "house", noon(12, 18), []string{"B-6", "B-1"}}, // at that moment is not before it
		{"cider", "house", noon(9, 18), []string{}},
		{"cider", "wild", noon(20, 9), []string{"B-3"}},
		{"stout", "house", noon(20, 9), []string{"B-4"}},
		{"stout", "", noon(20, 9), []string{}},
	} {
		if got := finished(c.product, c.yeast, c.before); !slices.Equal(got, c.want) {
			t.Errorf("%s with %q closed before %v: %v, wanted %v", c.product, c.yeast, c.before, got, c.want)
		}
	}
	closed := record(t, s, "B-1").Closed
	append1(t, s, voidOf(closed.Number)) // open again
	if got := finished("cider", "house", noon(20, 9)); !slices.Equal(got, []string{"B-6", "B-2"}) {
		t.Errorf("with the close of B-1 void: %v, wanted B-6, B-2", got)
	}
	for rec, err := range s.Finished(context.Background(), "cider", "house", noon(20, 9)) {
		if err != nil || rec.Batch.ID != "B-6" {
			t.Errorf("first of an iteration stopped early: %s, error %v", rec.Batch.ID, err)
		}
		break
	}
}
