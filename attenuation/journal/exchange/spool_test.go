package exchange

import (
	"bytes"
	"errors"
	"fmt"
	"io"
	"os"
	"path/filepath"
	"slices"
	"testing"
	"time"

	"pgregory.net/rapid"

	"gylebook/attenuation/journal"
)

// A row comes back as it was kept, whatever is in it.
func TestPackedRows(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		text := rapid.String()
		want := planned{
			reading: journal.Reading{
				Batch: text.Draw(t, "batch"), Vessel: text.Draw(t, "vessel"), Quality: text.Draw(t, "quality"),
				Gravity: journal.Typed{Text: text.Draw(t, "text"), Scale: text.Draw(t, "scale")},
				Temp:    journal.TypedTemp{Text: text.Draw(t, "temp"), Unit: text.Draw(t, "unit")},
				TakenAt: time.Unix(rapid.Int64Range(-1<<40, 1<<40).Draw(t, "second"), rapid.Int64Range(0, 1e9-1).Draw(t, "nanosecond")).
					In(time.FixedZone("", rapid.IntRange(-50_000, 50_000).Draw(t, "offset"))),
				Instrument: text.Draw(t, "instrument"), Gassy: rapid.Bool().Draw(t, "gassy"), Keep: text.Draw(t, "keep"), Note: text.Draw(t, "note"),
			},
			reason: text.Draw(t, "reason"), claim: rapid.SliceOfN(rapid.Byte(), 1, 20).Draw(t, "claim"),
			place: rapid.IntRange(0, 1<<40).Draw(t, "place"), line: rapid.IntRange(1, 1<<40).Draw(t, "line"),
			own: rapid.Bool().Draw(t, "own"), failed: rapid.Bool().Draw(t, "failed"), void: rapid.Bool().Draw(t, "void"),
		}
		b := want.pack(nil)
		var got planned
		if err := newUnpacker().unpack(&got, b); err != nil {
			t.Fatal(err)
		}
		if at, _ := when(b); !at.Equal(want.reading.TakenAt) {
			t.Errorf("its time is %v, wanted %v", at, want.reading.TakenAt)
		}
		if g, w := got.reading.TakenAt.Format(time.RFC3339Nano), want.reading.TakenAt.Format(time.RFC3339Nano); g != w {
			t.Errorf("taken at %s, wanted %s", g, w)
		}
		if !bytes.Equal(got.claim, want.claim) {
			t.Errorf("claim %v, wanted %v", got.claim, want.claim)
		}
		got.reading.TakenAt, got.claim, want.claim = want.reading.TakenAt, nil, nil
		if fmt.Sprint(got) != fmt.Sprint(want) {
			t.Errorf("%+v\nwanted\n%+v", got, want)
		}
		// What was cut off is an error, and no more than that.
		for n := range len(b) - len(want.claim) {
			_ = newUnpacker().unpack(&got, b[:n])
		}
	})
}

// The lists of several batches, in turn and in stretches, give back each batch's
// records, from memory and from a file, and in the order of time those of any of
// them together.
func TestRowLists(t *testing.T) {
	dir := t.TempDir()
	rapid.Check(t, func(t *rapid.T) {
		s := &spool{}
		if rapid.Bool().Draw(t, "file") {
			s.scratch = func() (Scratch, error) { return os.CreateTemp(dir, "*") }
		}
		defer s.close()
		lists := make([]rowList, 3)
		want := make([][]string, 3)
		type timed struct {
			at  int64
			row string
		}
		var all []timed
		at := int64(0)
		for k := range rapid.IntRange(0, 20).Draw(t, "rows") {
			b := rapid.IntRange(0, 2).Draw(t, "batch")
			at += rapid.Int64Range(-2, 5).Draw(t, "later")
			p := planned{place: k, reading: journal.Reading{TakenAt: time.Unix(at, 0)}}
			p.reading.Note = string(bytes.Repeat([]byte{'x'}, rapid.SampledFrom([]int{0, 10, readAhead, 300_000}).Draw(t, "size")))
			from := s.size()
			row := p.pack(nil)
			if err := s.add(row); err != nil {
				t.Fatal(err)
			}
			lists[b].add(from, s.size(), p.reading.TakenAt)
			want[b] = append(want[b], string(row))
			all = append(all, timed{at, string(row)})
		}
		if s.scratch == nil && s.file != nil {
			t.Error("a file was made that nobody gave")
		}
		c := &cursor{s: s}
		for b := range lists {
			var got []string
			for row, err := range lists[b].each(c) {
				if err != nil {
					t.Fatal(err)
				}
				got = append(got, string(row.record))
			}
			if !slices.Equal(got, want[b]) {
				t.Errorf("list %d gives %d rows, wanted its %d in order", b, len(got), len(want[b]))
			}
		}
		slices.SortStableFunc(all, func(a, b timed) int { return int(a.at - b.at) })
		k := 0
		for row, err := range byTime(c, []*rowList{&lists[0], &lists[1], &lists[2]}) {
			if err != nil || string(row) != all[k].row {
				t.Fatalf("row %d in time is another than wanted, error %v", k, err)
			}
			k++
		}
		if k != len(all) {
			t.Errorf("%d rows in time, wanted %d", k, len(all))
		}
	})
}

// A file that cannot be made, written or read gives its error.
func TestScratchFails(t *testing.T) {
	big := make([]byte, inMemory)
	own := errors.New("of the disk's own")
	s := &spool{scratch: func() (Scratch, error) { return nil, own }}
	if err := s.add(big); !errors.Is(err, own) {
		t.Errorf("%v, wanted that there is no file", err)
	}
	path := filepath.Join(t.TempDir(), "scratch")
	s = &spool{scratch: func() (Scratch, error) { return os.Create(path) }}
	for range 3 {
		if err := s.add(big); err != nil {
			t.Fatal(err)
		}
	}
	if err := os.Truncate(path, 10); err != nil {
		t.Fatal(err)
	}
	if _, _, err := (&cursor{s: s}).at(0); !errors.Is(err, io.ErrUnexpectedEOF) {
		t.Errorf("%v, wanted that the file ends too soon", err)
	}
	if err := s.file.Close(); err != nil {
		t.Fatal(err)
	}
	if err := s.add(big); !errors.Is(err, os.ErrClosed) {
		t.Errorf("%v, wanted that the file cannot be written", err)
	}
	s.close()
}
