package season_test

import (
	"path/filepath"
	"testing"

	"github.com/google/go-cmp/cmp"

	"gylebook/attenuation/journal"
	"gylebook/attenuation/journal/demo"
	"gylebook/attenuation/journal/sqlstore"
	"gylebook/attenuation/season"
)

// Every figure of the demo season is that of the batch on its own, and the groups
// hold every batch once.
func TestDemoSeason(t *testing.T) {
	store, err := sqlstore.Create(t.Context(), filepath.Join(t.TempDir(), "demo.gylebook"))
	if err != nil {
		t.Fatal(err)
	}
	defer func() {
		if err := store.Close(); err != nil {
			t.Error(err)
		}
	}()
	sum, err := demo.Write(t.Context(), store)
	if err != nil {
		t.Fatal(err)
	}
	instruments, err := store.Instruments(t.Context())
	if err != nil {
		t.Fatal(err)
	}
	book := journal.NewBook(instruments)
	var rows []season.Row
	for row, err := range season.Rows(t.Context(), store, journal.Filter{Year: 2026}, book) {
		if err != nil {
			t.Fatal(err)
		}
		rows = append(rows, row)
		rec, err := store.Batch(t.Context(), row.Batch)
		if err != nil {
			t.Fatal(err)
		}
		v := journal.Derive(rec, book)
		last := v.Last()
		if row.SG != last.SG || row.OE != last.OE || row.AE != last.Extract || row.Why != last.Why || row.Vessel != v.Vessel() {
			t.Errorf("%s: %+v, the batch has %+v", row.Batch, row, last)
		}
		if diff := cmp.Diff(last.Attenuation, row.Attenuation); diff != "" {
			t.Errorf("%s: %s", row.Batch, diff)
		}
		fall, _, ok := season.LastFall(v.Counting())
		if days, known := v.Days(fall); !ok || !known || row.Days == nil || *row.Days != days {
			t.Errorf("%s: %v days, of all values %v", row.Batch, row.Days, days)
		}
	}
	if len(rows) != sum.Batches {
		t.Errorf("%d rows, wanted %d", len(rows), sum.Batches)
	}
	batches, open := 0, 0
	for _, g := range season.Groups(rows) {
		batches, open = batches+g.Batches, open+g.Open
		t.Logf("%s, %s: %d, %d open; apparent %.1f (%.1f to %.1f) days %.1f (%.1f to %.1f)", g.Product, g.Yeast, g.Batches, g.Open,
			g.Apparent.Median, g.Apparent.Min, g.Apparent.Max, g.Days.Median, g.Days.Min, g.Days.Max)
		if g.Product == "Lane Bitter" && !(g.Apparent.Median > 76 && g.Apparent.Median < 81 && g.Apparent.Min < 70) {
			t.Errorf("%s: apparent attenuation %+v", g.Product, g.Apparent)
		}
		if g.Product == "Night Porter" && g.Apparent.N != g.Days.N-1 {
			t.Errorf("%s: %d attenuations of %d batches, wanted one less: sugar that nobody weighed", g.Product, g.Apparent.N, g.Days.N)
		}
	}
	if batches != sum.Batches || open != sum.Open {
		t.Errorf("%d batches, %d open in the groups; wanted %d and %d", batches, open, sum.Batches, sum.Open)
	}
}
