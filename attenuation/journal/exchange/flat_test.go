package exchange_test

import (
	"context"
	"errors"
	"fmt"
	"io"
	"iter"
	"os"
	"runtime"
	"strings"
	"testing"
	"time"

	"gylebook/attenuation/journal"
	"gylebook/attenuation/journal/exchange"
)

// counting is a store that takes bodies one by one and keeps none of them.
type counting struct {
	journal.Store
	bodies int
}

func (c *counting) AppendEach(_ context.Context, _ string, _ time.Time, draft func(journal.Reader) (iter.Seq2[journal.Body, error], error)) (first, last int64, err error) {
	bodies, err := draft(c.Store)
	if err != nil {
		return 0, 0, err
	}
	for _, err := range bodies {
		if err != nil {
			return 0, 0, err
		}
		c.bodies++
	}
	return 1, int64(c.bodies), nil
}

// weighed is a file that weighs what is alive whenever it has been read a while.
type weighed struct {
	*os.File
	reads int
	most  *uint64
}

func (w *weighed) ReadAt(b []byte, at int64) (int, error) {
	if w.reads++; w.reads%400 == 0 {
		*w.most = max(*w.most, alive())
	}
	return w.File.ReadAt(b, at)
}

func alive() uint64 {
	runtime.GC()
	var m runtime.MemStats
	runtime.ReadMemStats(&m)
	return m.HeapAlloc
}

// inRows makes a table of readings while it is read.
type inRows struct {
	rows, made int
	row        func(b []byte, n int) []byte
	rest       []byte
}

func (g *inRows) Read(p []byte) (int, error) {
	if len(g.rest) == 0 {
		if g.made == g.rows {
			return 0, io.EOF
		}
		if g.made == 0 {
			g.rest = append(g.rest[:0], "batch_id,vessel,taken_at,entered_text,sample_temp_c,sg_20_20,product,note\n"...)
		} else {
			g.rest = g.rest[:0]
		}
		g.rest = g.row(g.rest, g.made)
		g.made++
	}
	n := copy(p, g.rest)
	g.rest = g.rest[n:]
	return n, nil
}

// An import holds what is known of the batches, not the rows: of four times as many
// rows, batch by batch, round by round or of one batch, there is hardly more in
// memory, though the file is larger by some 7 MB.
func TestImportIsFlat(t *testing.T) {
	note := strings.Repeat("of many ", 40)
	at := func(minutes int) string { return day0.Add(time.Duration(minutes) * time.Minute).Format(time.RFC3339) }
	line := func(b []byte, batch int, minutes, n int) []byte {
		return fmt.Appendf(b, "B-%d,T%d,%s,1.0200,18.0,1.0196,Harbour Stout,row %d %s\n", batch, batch%40, at(minutes), n, note)
	}
	const few = 6_000
	for name, row := range map[string]func([]byte, int) []byte{
		"batch by batch": func(b []byte, n int) []byte { return line(b, n/40, 360*(n%40), n) },
		"round by round": func(b []byte, n int) []byte { return line(b, n%50, 5*(n/50), n) },
		"one batch":      func(b []byte, n int) []byte { return line(b, 1, n, n) },
	} {
		t.Run(name, func(t *testing.T) {
			held := func(rows int) uint64 {
				s := &counting{Store: newJournals(t).empty()}
				most := alive()
				before := most
				dir := t.TempDir()
				report, err := exchange.Import(context.Background(), s, by, now, &inRows{rows: rows, row: row}, exchange.Options{
					Create: true,
					Scratch: func() (exchange.Scratch, error) {
						f, err := os.CreateTemp(dir, "*")
						return &weighed{File: f, most: &most}, err
					},
				})
				if err != nil || report.Readings != rows || s.bodies != rows+len(report.Batches) {
					t.Fatalf("%d readings and %d bodies of %d rows, %v", report.Readings, s.bodies, rows, err)
				}
				if most == before {
					t.Fatal("nothing was weighed")
				}
				return most - before
			}
			one, four := held(few), held(4*few)
			t.Logf("%d rows hold %d kB, %d rows %d kB", few, one>>10, 4*few, four>>10)
			if four > one+1<<20 {
				t.Errorf("%d rows hold %d kB, %d rows %d kB: wanted it flat", few, one>>10, 4*few, four>>10)
			}
		})
	}
}

// What goes through a file comes in as what fits into memory does: in the order of
// the file, whatever the order of the times, and rows that name a vessel alone with
// those that name its batch.
func TestImportThroughAFile(t *testing.T) {
	var file strings.Builder
	file.WriteString("batch_id,vessel,taken_at,entered_text,sample_temp_c,note,status,reason\n")
	const rows = 1500
	for n := range rows {
		batch, vessel := "B-1", "T1"
		switch n % 3 {
		case 1:
			batch = ""
		case 2:
			batch, vessel = "B-2", ""
		}
		status := ",,"
		if n%500 == 7 {
			status = ",void,slip"
		}
		// A permutation of the minutes: 1301 and 1500 have no common divisor.
		minutes := 24*60 + n*1301%rows
		fmt.Fprintf(&file, "%s,%s,%s,1.020,20,%s%s\n", batch, vessel, day0.Add(time.Duration(minutes)*time.Minute).Format(time.RFC3339),
			fmt.Sprintf("row %d ", n)+strings.Repeat("x", 900), status)
	}
	inMemory, inFile := cellar(t), cellar(t)
	if _, err := take(inMemory, file.String(), exchange.Options{}); err != nil {
		t.Fatal(err)
	}
	made, closed := 0, 0
	report, err := take(inFile, file.String(), exchange.Options{Scratch: func() (exchange.Scratch, error) {
		made++
		f, err := os.CreateTemp(t.TempDir(), "*")
		return closing{f, &closed}, err
	}})
	if err != nil || report.Readings != rows || report.Voids != 3 || made != 1 || closed != 1 {
		t.Fatalf("%d readings, %d void, %d files, %d closed, %v", report.Readings, report.Voids, made, closed, err)
	}
	if lines(t, inFile) != lines(t, inMemory) {
		t.Error("other entries than without a file")
	}
	n := 0
	for e, err := range inFile.Entries(context.Background()) {
		if err != nil {
			t.Fatal(err)
		}
		if r, ok := e.Body.(journal.Reading); ok {
			if !strings.HasPrefix(r.Note, fmt.Sprintf("row %d ", n)) || (r.Batch == "B-2") != (n%3 == 2) {
				t.Fatalf("reading %d is %.12q of %s", n, r.Note, r.Batch)
			}
			n++
		}
	}
}

type closing struct {
	*os.File
	closed *int
}

func (c closing) Close() error { *c.closed++; return c.File.Close() }

// Without room for the rows nothing is written.
func TestNoRoomForRows(t *testing.T) {
	s := cellar(t)
	before := entries(t, s)
	own := errors.New("no room")
	rows := &inRows{rows: 1500, row: func(b []byte, n int) []byte {
		return fmt.Appendf(b, "B-1,,%s,1.020,20,,,%0900d\n", day0.Add(time.Duration(24*60+n)*time.Minute).Format(time.RFC3339), n)
	}}
	_, err := exchange.Import(context.Background(), s, by, now, rows, exchange.Options{Scratch: func() (exchange.Scratch, error) { return nil, own }})
	if !errors.Is(err, own) || entries(t, s) != before {
		t.Errorf("%v, %d entries written", err, entries(t, s)-before)
	}
}
