package season_test

import (
	"testing"

	"gylebook/attenuation/journal"
	"gylebook/attenuation/season"
)

// One batch of forty readings, nine of them before it came to rest.
func BenchmarkRow(b *testing.B) {
	rec := many(1, 40)[0]
	for b.Loop() {
		if row := season.Of(rec, nil); row.Attenuation == nil {
			b.Fatal(row.Why)
		}
	}
}

func BenchmarkRowEveryReadingCorrected(b *testing.B) {
	rec := many(1, 40)[0]
	for b.Loop() {
		if v := journal.Derive(rec, nil); v.Last() == nil {
			b.Fatal("no value")
		}
	}
}

func BenchmarkSeasonOf10000(b *testing.B) {
	r := &fake{records: many(10000, 40)}
	for b.Loop() {
		var rows []season.Row
		for row, err := range season.Rows(b.Context(), r, journal.Filter{}, nil) {
			if err != nil {
				b.Fatal(err)
			}
			rows = append(rows, row)
		}
		if groups := season.Groups(rows); groups[0].Apparent.N != len(r.records) {
			b.Fatal(groups)
		}
	}
}
