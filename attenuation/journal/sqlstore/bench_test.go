package sqlstore

import (
	"context"
	"fmt"
	"path/filepath"
	"sync"
	"testing"
	"time"

	"gylebook/attenuation/journal"
)

var benchDay = time.Date(2026, 1, 5, 9, 0, 0, 0, time.UTC)

func benchBatch(k int) journal.Batch {
	opened := benchDay.Add(time.Duration(k) * time.Hour)
	return journal.Batch{
		ID: fmt.Sprintf("B-%05d", k), Product: fmt.Sprintf("product %d", k%7), Vessel: fmt.Sprintf("T%d", k%300), Volume: "100", Yeast: "house",
		Pitched: &opened, Opened: opened,
	}
}

func benchReading(b journal.Batch, k int) journal.Reading {
	return journal.Reading{
		Batch: b.ID, Vessel: b.Vessel, TakenAt: b.Opened.Add(time.Duration(12*k) * time.Hour), Quality: journal.Exact,
		Gravity: journal.Typed{Text: fmt.Sprintf("1.0%02d", 50-k), Scale: "sg"}, Temp: journal.TypedTemp{Text: "18.5", Unit: "C"}, Instrument: "H1",
	}
}

// cellar fills a journal with batches of 40 readings each; the last few stay open.
func cellar(tb testing.TB, s *Store, n, stayOpen int) {
	tb.Helper()
	ctx := context.Background()
	fill := func(bodies []journal.Body) {
		_, err := s.Append(ctx, "ada", benchDay, func(journal.Reader) ([]journal.Body, error) { return bodies, nil })
		if err != nil {
			tb.Fatal(err)
		}
	}
	fill([]journal.Body{journal.Instrument{
		ID: "H1", Type: journal.Hydrometer, Scale: "sg", Basis: "20/20", Division: "0.001", Body: "glass", ReadAt: "bottom", Since: benchDay,
	}})
	const chunk = 100
	for first := 0; first < n; first += chunk {
		// Batches ferment side by side, so their readings lie mixed.
		var bodies []journal.Body
		last := min(first+chunk, n)
		for k := first; k < last; k++ {
			b := benchBatch(k)
			bodies = append(bodies, b, journal.OG{Batch: b.ID, At: b.Opened, Gravity: journal.Typed{Text: "1.0520", Scale: "sg"}})
		}
		for r := range 40 {
			for k := first; k < last; k++ {
				bodies = append(bodies, benchReading(benchBatch(k), r))
			}
		}
		for k := first; k < last && k < n-stayOpen; k++ {
			bodies = append(bodies, journal.Close{Batch: benchBatch(k).ID, At: benchDay.AddDate(2, 0, 0)})
		}
		fill(bodies)
	}
}

// many is a cellar of 10 000 batches, 200 of them open, made once a run.
var many = sync.OnceValues(func() (string, int) {
	n := 10_000
	if testing.Short() {
		n = 500
	}
	return filepath.Join(shelf, "many"), n
})

func openMany(b *testing.B) (*Store, int) {
	b.Helper()
	place, n := many()
	s, made, err := OpenOrCreate(context.Background(), place)
	if err != nil {
		b.Fatal(err)
	}
	b.Cleanup(func() { _ = s.Close() })
	if made {
		cellar(b, s, n, 200)
	}
	b.ResetTimer()
	return s, n
}

func BenchmarkAppend(b *testing.B) {
	s := openAt(b, filepath.Join(b.TempDir(), "journal"))
	cellar(b, s, 10, 10)
	r := benchReading(benchBatch(3), 1)
	b.ResetTimer()
	for b.Loop() {
		_, err := s.Append(context.Background(), "ada", benchDay, func(v journal.Reader) ([]journal.Body, error) {
			return []journal.Body{r}, nil
		})
		if err != nil {
			b.Fatal(err)
		}
	}
}

// BenchmarkOpenAppendClose is what a process does that logs one reading.
func BenchmarkOpenAppendClose(b *testing.B) {
	place := filepath.Join(b.TempDir(), "journal")
	cellar(b, openAt(b, place), 10, 10)
	r := benchReading(benchBatch(3), 1)
	b.ResetTimer()
	for b.Loop() {
		s := openAt(b, place)
		_, err := s.Append(context.Background(), "ada", benchDay, func(v journal.Reader) ([]journal.Body, error) {
			return []journal.Body{r}, nil
		})
		if err != nil {
			b.Fatal(err)
		}
		if err := s.Close(); err != nil {
			b.Fatal(err)
		}
	}
}

// BenchmarkOpenBatches200 must not grow with the batches that are closed.
func BenchmarkOpenBatches200(b *testing.B) {
	s, _ := openMany(b)
	for b.Loop() {
		list, err := s.Open(context.Background())
		if err != nil || len(list) != 200 {
			b.Fatalf("%d batches, error %v", len(list), err)
		}
	}
}

func BenchmarkBatch(b *testing.B) {
	s, _ := openMany(b)
	for b.Loop() {
		if _, err := s.Batch(context.Background(), "B-00123"); err != nil {
			b.Fatal(err)
		}
	}
}

func BenchmarkBatches10k(b *testing.B) {
	s, want := openMany(b)
	for b.Loop() {
		n := 0
		for rec, err := range s.Batches(context.Background(), journal.Filter{}) {
			if err != nil || len(rec.Readings) != 40 {
				b.Fatalf("%d readings, error %v", len(rec.Readings), err)
			}
			n++
		}
		if n != want {
			b.Fatalf("%d batches, wanted %d", n, want)
		}
	}
}

func BenchmarkVerify(b *testing.B) {
	s, _ := openMany(b)
	for b.Loop() {
		if _, err := journal.VerifyAll(context.Background(), s); err != nil {
			b.Fatal(err)
		}
	}
}
