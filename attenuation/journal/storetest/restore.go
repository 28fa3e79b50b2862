package storetest

import (
	"bytes"
	"context"
	"encoding/json"
	"errors"
	"iter"
	"slices"
	"testing"

	"gylebook/attenuation/journal"
)

// export writes every entry on a line.
func export(t *testing.T, r journal.Reader) []byte {
	t.Helper()
	var out bytes.Buffer
	enc := json.NewEncoder(&out)
	for e, err := range r.Entries(context.Background()) {
		if err == nil {
			err = enc.Encode(e)
		}
		if err != nil {
			t.Fatal(err)
		}
	}
	return out.Bytes()
}

// imported reads such lines.
func imported(data []byte) iter.Seq2[journal.Entry, error] {
	return func(yield func(journal.Entry, error) bool) {
		for dec := json.NewDecoder(bytes.NewReader(data)); dec.More(); {
			var e journal.Entry
			err := dec.Decode(&e)
			if !yield(e, err) || err != nil {
				return
			}
		}
	}
}

// sample fills a store with entries of every kind.
func sample(t *testing.T, s journal.Store) {
	t.Helper()
	append1(t, s, hydrometer("H1"), certificate("H1", 2), check("H1", 3), batch("B-1"), og("B-1", 10), limit("B-1", 9))
	append1(t, s, reading("B-1", 3, 9), reading("B-1", 4, 9), event("B-1", 5), voidOf(8), ending("B-1", 20))
	append1(t, s, voidOf(11), retire("H1", 21), batch("B-2"), batch("B-3"), voidOf(15), ending("B-2", 22))
}

func testRestore(t *testing.T, open func(t *testing.T) journal.Store) {
	from, to := open(t), open(t)
	defer from.Close()
	defer to.Close()
	sample(t, from)
	want := export(t, from)
	n, err := to.Restore(context.Background(), imported(want))
	if err != nil || n != 17 {
		t.Fatalf("%d entries restored, error %v, wanted 17", n, err)
	}
	if got := export(t, to); !bytes.Equal(got, want) {
		t.Errorf("exported again:\n%s\nwanted:\n%s", got, want)
	}
	verified(t, to, 17)
	if a, b := openIDs(t, from), openIDs(t, to); !slices.Equal(a, b) || !slices.Equal(a, []string{"B-1"}) {
		t.Errorf("open %v, restored %v, wanted B-1", a, b)
	}
	if _, err := to.Restore(context.Background(), imported(want)); !errors.Is(err, journal.ErrNotEmpty) {
		t.Errorf("restored twice: %v, wanted %v", err, journal.ErrNotEmpty)
	}
	if made := append1(t, to, reading("B-1", 6, 9)); made[0].Number != 18 {
		t.Errorf("the next entry has the number %d, wanted 18", made[0].Number)
	}
	verified(t, to, 18)
}

func testRestoreRefused(t *testing.T, open func(t *testing.T) journal.Store) {
	from, to := open(t), open(t)
	defer from.Close()
	defer to.Close()
	sample(t, from)
	good := export(t, from)
	lines := bytes.SplitAfter(good, []byte("\n"))
	own := errors.New("of the caller's own")
	failing := func(yield func(journal.Entry, error) bool) {
		for e, err := range imported(good) {
			if e.Number == 5 {
				e, err = journal.Entry{}, own
			}
			if !yield(e, err) {
				return
			}
		}
	}
	// An entry that seals well though the journal does not admit it.
	orphan, err := journal.Entry{Number: 1, RecordedAt: clock, By: operator, Body: reading("B-9", 3, 9)}.Seal("")
	if err != nil {
		t.Fatal(err)
	}
	for _, c := range []struct {
		name    string
		entries iter.Seq2[journal.Entry, error]
		want    error
	}{
		{"changed", imported(bytes.Replace(good, []byte("1.0480"), []byte("1.0430"), 1)), journal.ErrTampered},
		{"one left out", imported(bytes.Join(append(slices.Clone(lines[:6]), lines[7:]...), nil)), journal.ErrTampered},
		{"two exchanged", imported(bytes.Join([][]byte{lines[1], lines[0]}, nil)), journal.ErrTampered},
		{"the first twice", imported(bytes.Join([][]byte{lines[0], lines[0]}, nil)), journal.ErrTampered},
		{"failing", failing, own},
		{"orphan", func(yield func(journal.Entry, error) bool) { yield(orphan, nil) }, journal.ErrNotFound},
		{"no content", func(yield func(journal.Entry, error) bool) { yield(journal.Entry{Number: 1}, nil) }, journal.ErrTampered},
	} {
		if n, err := to.Restore(context.Background(), c.entries); !errors.Is(err, c.want) || n != 0 {
			t.Errorf("%s: %d entries, error %v, wanted 0 and %v", c.name, n, err, c.want)
		}
		verified(t, to, 0)
	}
	if n, err := to.Restore(context.Background(), imported(nil)); n != 0 || err != nil {
		t.Errorf("nothing restored: %d entries, error %v", n, err)
	}
	if n, err := to.Restore(context.Background(), imported(good)); n != 17 || err != nil {
		t.Errorf("restored at last: %d entries, error %v, wanted 17", n, err)
	}
}
