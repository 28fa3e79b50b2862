package storetest

import (
	"context"
	"slices"
	"testing"

	"gylebook/attenuation/journal"
)

// testOpenLast asks for the newest readings of open batches.
func testOpenLast(t *testing.T, s journal.Store) {
	add := func(id, vessel string, pitched bool) {
		b := batch(id)
		b.Vessel, b.Pitched = vessel, nil
		if at := noon(1, 9); pitched {
			b.Pitched = &at
		}
		append1(t, s, b)
	}
	add("B-1", "T3", true)
	add("B-2", "T2", true)
	add("B-3", "T1", false) // its first reading tells when it began
	add("B-4", "T0", true)
	add("B-5", "T4", true)
	append1(
		t, s, reading("B-1", 5, 9), reading("B-1", 3, 9), reading("B-1", 4, 9), reading("B-1", 4, 9), // 6 7 8 9
		reading("B-2", 3, 9), reading("B-3", 3, 9), reading("B-3", 4, 9), reading("B-3", 5, 9), // 10 … 13
		reading("B-5", 3, 9), og("B-1", 2), event("B-1", 3), event("B-1", 4), // 14 … 17
	)
	append1(t, s, voidOf(6), ending("B-5", 9))
	for _, c := range []struct {
		n    int
		want map[string][]int64
	}{
		{1, map[string][]int64{"B-1": {6}, "B-2": {10}, "B-3": {11, 12, 13}, "B-4": {}}}, // a void one counts too
		{0, map[string][]int64{"B-1": {}, "B-2": {}, "B-3": {}, "B-4": {}}},
		{-1, map[string][]int64{"B-1": {}, "B-2": {}, "B-3": {}, "B-4": {}}},
		{2, map[string][]int64{"B-1": {8, 9, 6}, "B-2": {10}, "B-3": {11, 12, 13}, "B-4": {}}},
		{9, map[string][]int64{"B-1": {7, 8, 9, 6}, "B-2": {10}, "B-3": {11, 12, 13}, "B-4": {}}},
	} {
		list, err := s.OpenLast(context.Background(), c.n)
		if err != nil {
			t.Fatal(err)
		}
		var ids []string
		for _, rec := range list {
			ids = append(ids, rec.Batch.ID)
			if got := numbers(rec.Readings); !slices.Equal(got, c.want[rec.Batch.ID]) {
				t.Errorf("newest %d of %s: readings %v, wanted %v", c.n, rec.Batch.ID, got, c.want[rec.Batch.ID])
			}
			if rec.Batch.ID == "B-1" && (len(rec.OGs) != 1 || len(rec.Events) != 2) {
				t.Errorf("B-1 with %d original gravities and %d events, wanted 1 and 2", len(rec.OGs), len(rec.Events))
			}
			for _, r := range rec.Readings {
				if r.Void != (r.Number == 6) {
					t.Errorf("reading %d is void: %v", r.Number, r.Void)
				}
			}
		}
		if want := []string{"B-4", "B-3", "B-2", "B-1"}; !slices.Equal(ids, want) {
			t.Errorf("open %v, wanted %v by vessel", ids, want)
		}
	}
}
