package storetest

import (
	"context"
	"errors"
	"fmt"
	"sync"
	"testing"

	"gylebook/attenuation/journal"
)

// perWriter is how many entries each of several writers appends.
const perWriter = 25

// appendMany appends from n goroutines at once, in turn to each of the stores, and
// checks that all is there, none twice.
func appendMany(t *testing.T, n int, stores ...journal.Store) {
	t.Helper()
	before, _ := head(t, stores[0])
	var wg sync.WaitGroup
	var mu sync.Mutex
	given := make(map[int64]string)
	for w := range n {
		wg.Go(func() {
			for k := range perWriter {
				r := reading("B-1", 3, 9)
				r.Note = fmt.Sprintf("%d-%d", w, k)
				made, err := appendAs(stores[w%len(stores)], operator, r)
				if err != nil {
					t.Errorf("writer %d, entry %d: %v", w, k, err)
					return
				}
				mu.Lock()
				if other, twice := given[made[0].Number]; twice {
					t.Errorf("number %d was given to %s and %s", made[0].Number, other, r.Note)
				}
				given[made[0].Number] = r.Note
				mu.Unlock()
			}
		})
	}
	wg.Wait()
	verified(t, stores[0], before+int64(n*perWriter))
	for e, err := range stores[0].Entries(context.Background()) {
		if err != nil {
			t.Fatal(err)
		}
		if r, ok := e.Body.(journal.Reading); ok && e.Number > before && given[e.Number] != r.Note {
			t.Errorf("entry %d holds %q, wanted what its writer was told, %q", e.Number, r.Note, given[e.Number])
		}
	}
}

func testGoroutines(t *testing.T, s journal.Store) {
	append1(t, s, batch("B-1"))
	appendMany(t, 8, s)
}

func testTwoWriters(t *testing.T, a, b journal.Store) {
	append1(t, a, batch("B-1"))
	appendMany(t, 8, a, b)
}

func testTwoStores(t *testing.T, a, b journal.Store) {
	append1(t, a, batch("B-1"), hydrometer("H1"))
	refused(t, b, journal.ErrExists, batch("B-1"))
	append1(t, b, reading("B-1", 3, 9), ending("B-1", 9), retire("H1", 9))
	refused(t, a, journal.ErrClosed, reading("B-1", 4, 9))
	refused(t, a, journal.ErrRetired, check("H1", 10))
	append1(t, b, voidOf(4))
	append1(t, a, reading("B-1", 4, 9))
	if got := len(record(t, b, "B-1").Readings); got != 2 {
		t.Errorf("the second store sees %d readings, wanted 2", got)
	}
	verified(t, a, 7)
	verified(t, b, 7)
}

func testReaderBeside(t *testing.T, a, b journal.Store) {
	append1(t, a, batch("B-1"))
	_, err := a.Append(context.Background(), operator, clock, func(journal.Reader) ([]journal.Body, error) {
		if got := len(record(t, b, "B-1").Readings); got != 0 { // reads though a writes
			return nil, fmt.Errorf("a reader saw %d readings, wanted none before the commit", got)
		}
		return []journal.Body{reading("B-1", 3, 9)}, nil
	})
	if err != nil {
		t.Fatal(err)
	}
	if got := len(record(t, b, "B-1").Readings); got != 1 {
		t.Errorf("a reader saw %d readings after the commit, wanted 1", got)
	}
}

func testKept(t *testing.T, open func() journal.Store) {
	s := open()
	append1(t, s, batch("B-1"), reading("B-1", 3, 9))
	n, chain := head(t, s)
	if err := s.Close(); err != nil {
		t.Fatal(err)
	}
	s = open()
	defer s.Close()
	if got, c := head(t, s); got != n || c != chain {
		t.Errorf("opened again: head %d %.8s, wanted %d %.8s", got, c, n, chain)
	}
	verified(t, s, 2)
}

func testBackup(t *testing.T, open func(t *testing.T, place string) journal.Store) {
	ctx := context.Background()
	place := t.TempDir()
	s := open(t, place+"/journal")
	defer s.Close()
	append1(t, s, batch("B-1"), reading("B-1", 3, 9))
	if err := s.Backup(ctx, place+"/copy"); err != nil {
		t.Fatal(err)
	}
	if err := s.Backup(ctx, place+"/copy"); !errors.Is(err, journal.ErrExists) {
		t.Errorf("backup over a file: %v, wanted %v", err, journal.ErrExists)
	}
	append1(t, s, reading("B-1", 4, 9))
	c := open(t, place+"/copy")
	defer c.Close()
	verified(t, c, 2)
	append1(t, c, reading("B-1", 5, 9)) // a journal of its own
	verified(t, c, 3)
	verified(t, s, 3)
	if got := openIDs(t, c); len(got) != 1 {
		t.Errorf("%d open batches in the copy, wanted 1", len(got))
	}
	if err := s.Backup(ctx, place+"/no such folder/copy"); err == nil || errors.Is(err, journal.ErrExists) {
		t.Errorf("backup into a folder that is not there: %v, wanted an error", err)
	}
}

func testBackupWriting(t *testing.T, open func(t *testing.T, place string) journal.Store) {
	place := t.TempDir()
	s := open(t, place+"/journal")
	defer s.Close()
	append1(t, s, batch("B-1"))
	done := make(chan struct{})
	go func() {
		defer close(done)
		appendMany(t, 4, s)
	}()
	running := true
	for k := 0; running && k < 20; k++ {
		select {
		case <-done:
			running = false
		default:
		}
		name := fmt.Sprintf("%s/copy%d", place, k)
		if err := s.Backup(context.Background(), name); err != nil {
			t.Fatal(err)
		}
		c := open(t, name)
		n, _ := head(t, c)
		verified(t, c, n)
		if err := c.Close(); err != nil {
			t.Error(err)
		}
	}
	<-done
}
