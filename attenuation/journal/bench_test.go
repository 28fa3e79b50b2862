package journal

import (
	"fmt"
	"testing"
)

// forty is a batch of 40 readings, two a day, with an addition.
func forty() *Record {
	b := brew("B1", "T1", "1.050", "100").event(30, Event{What: Sugar, MassKg: "2"})
	for k := range 40 {
		r := b.reading(float64(12*k), fmt.Sprintf("1.0%02d", 50-k), "18.5")
		r.Instrument = "H1"
		b.add(r)
	}
	return b.rec
}

func bookOfOne() *Book {
	rec := glass("H1")
	rec.Checks = []Numbered[Check]{{Body: Check{At: day0, Liquid: InWater, Found: sg("0.998"), Expected: sg("1.000"), Temp: celsius("20"), Correction: "0.002"}}}
	return NewBook([]*InstrumentRecord{rec})
}

func BenchmarkDerive(b *testing.B) {
	rec, book := forty(), bookOfOne()
	b.ReportAllocs()
	for b.Loop() {
		if len(Derive(rec, book).Values) != 40 {
			b.Fatal("not all")
		}
	}
}

func BenchmarkDeriveLast(b *testing.B) {
	rec, book := forty(), bookOfOne()
	b.ReportAllocs()
	for b.Loop() {
		if len(DeriveLast(rec, book, 2).Values) != 2 {
			b.Fatal("not two")
		}
	}
}

func BenchmarkJudge(b *testing.B) {
	rec := forty()
	s := Situation{Now: after(1000), Target: rec, Book: bookOfOne()}
	for k := range 20 {
		other := *rec
		other.Batch.ID = fmt.Sprintf("B%d", k+2)
		s.Others = append(s.Others, &other)
	}
	r := rec.Readings[39].Body
	r.TakenAt, r.Gravity = after(490), sg("1.010")
	b.ReportAllocs()
	for b.Loop() {
		if _, hold := Judge(s, r); hold != nil {
			b.Fatal(hold)
		}
	}
}
