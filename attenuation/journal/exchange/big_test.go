package exchange_test

import (
	"context"
	"fmt"
	"io"
	"runtime"
	"sync/atomic"
	"testing"
	"time"

	"gylebook/attenuation/journal/exchange"
)

// table makes a table of readings while it is read: batches of 40 readings, with
// every column that an export has, until size bytes are out.
type table struct {
	size, out int
	row       int
	rest      []byte
}

func (g *table) Read(p []byte) (int, error) {
	if len(g.rest) == 0 {
		if g.out >= g.size {
			return 0, io.EOF
		}
		g.rest = g.next(g.rest[:0])
		g.out += len(g.rest)
	}
	n := copy(p, g.rest)
	g.rest = g.rest[n:]
	return n, nil
}

func (g *table) next(b []byte) []byte {
	if g.row == 0 {
		for i, name := range exchange.Columns() {
			if i > 0 {
				b = append(b, ',')
			}
			b = append(b, name...)
		}
		b = append(b, '\r', '\n')
	}
	// 100 rows at a time.
	for range 100 {
		n, k := g.row/40, g.row%40
		at := day0.Add(time.Duration(k) * 6 * time.Hour).Format(time.RFC3339)
		b = fmt.Appendf(b, "%d,B-%d,T%d,%s,exact,%d.00,1.0%02d0,sg,18.%d,yes,H1,0.000000,0.000000,-0.000412,1.0%02d588,0.000613,11.9412,12.3880,11.9412,3.606,3.606,0.235,balling,2,ok,,mara,1,Harbour Stout,2026-06-01T08:00:00+02:00,1.0500,1200\r\n",
			g.row+1, n, n%40, at, k*6, 50-k, k%10, 49-k)
		g.row++
	}
	return b
}

// peak runs fn and returns the largest heap in use meanwhile, beyond that before.
func peak(fn func()) uint64 {
	runtime.GC()
	var m runtime.MemStats
	runtime.ReadMemStats(&m)
	before := m.HeapInuse
	var most atomic.Uint64
	stop, done := make(chan struct{}), make(chan struct{})
	go func() {
		defer close(done)
		var m runtime.MemStats
		for {
			runtime.ReadMemStats(&m)
			most.Store(max(most.Load(), m.HeapInuse))
			select {
			case <-stop:
				return
			case <-time.After(20 * time.Millisecond):
			}
		}
	}()
	fn()
	close(stop)
	<-done
	return most.Load() - min(before, most.Load())
}

// Reading takes no more memory for 200 MB than for little.
func TestReadingIsFlat(t *testing.T) {
	size := 200 << 20
	if testing.Short() {
		size = 10 << 20
	}
	g := &table{size: size}
	got := peak(func() {
		in, err := exchange.ReadReadings(g, exchange.ReadOptions{})
		if err != nil {
			t.Fatal(err)
		}
		rows := 0
		for row, err := range in.All() {
			if err != nil {
				t.Fatal(err)
			}
			rows++
			if row.Line != rows+1 {
				t.Fatalf("line %d, wanted %d", row.Line, rows+1)
			}
		}
		if rows != g.row {
			t.Errorf("%d rows read of %d", rows, g.row)
		}
	})
	t.Logf("%d MB in %d rows: at most %d MB of heap", size>>20, g.row, got>>20)
	// The sample and its records, and what the collector has not yet taken.
	if got > 32<<20 {
		t.Errorf("%d MB of heap for %d MB, wanted it flat", got>>20, size>>20)
	}
}

// BenchmarkImport is a dry run, which does all but the store's own work.
func BenchmarkImport(b *testing.B) {
	for _, mb := range []int{20, 200} {
		b.Run(fmt.Sprintf("%dMB", mb), func(b *testing.B) {
			s := newJournals(b).empty()
			b.SetBytes(int64(mb) << 20)
			var most uint64
			for range b.N {
				g := &table{size: mb << 20}
				most = max(most, peak(func() {
					report, err := exchange.Import(context.Background(), s, by, now, g, exchange.Options{DryRun: true, Create: true})
					if err != nil || report.Readings != g.row {
						b.Fatalf("%d readings of %d rows, %v", report.Readings, g.row, err)
					}
				}))
			}
			b.ReportMetric(float64(most)/(1<<20), "MB-peak")
		})
	}
}
