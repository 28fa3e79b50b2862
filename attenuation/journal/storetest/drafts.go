package storetest

import (
	"context"
	"errors"
	"fmt"
	"slices"
	"testing"
	"time"

	"gylebook/attenuation/journal"
)

func testAllOrNone(t *testing.T, s journal.Store) {
	append1(t, s, batch("B-1"))
	refused(t, s, journal.ErrNotFound, reading("B-1", 3, 9), event("B-1", 3), reading("B-9", 3, 9))
	refused(t, s, journal.ErrExists, batch("B-2"), reading("B-2", 3, 9), batch("B-2"))
	refused(t, s, journal.ErrClosed, batch("B-3"), ending("B-3", 9), reading("B-3", 3, 9))
	if rec := record(t, s, "B-1"); len(rec.Readings)+len(rec.Events) != 0 {
		t.Errorf("a refused append left %d readings and %d events", len(rec.Readings), len(rec.Events))
	}
	if ids, err := s.BatchIDs(context.Background()); err != nil || !slices.Equal(ids, []string{"B-1"}) {
		t.Errorf("batch ids %v, error %v, wanted B-1: nothing of a refused append is kept", ids, err)
	}
	if got := openIDs(t, s); !slices.Equal(got, []string{"B-1"}) {
		t.Errorf("open %v, wanted B-1", got)
	}
	append1(t, s, batch("B-2")) // the id was never used
	verified(t, s, 2)
}

func testDraft(t *testing.T, s journal.Store) {
	append1(t, s, batch("B-1"))
	own := errors.New("of the caller's own")
	_, err := s.Append(context.Background(), operator, clock, func(journal.Reader) ([]journal.Body, error) {
		return []journal.Body{reading("B-1", 3, 9)}, own
	})
	if err != own {
		t.Errorf("error %v, wanted the draft's own as it is", err)
	}
	none, err := s.Append(context.Background(), operator, clock, func(journal.Reader) ([]journal.Body, error) { return nil, nil })
	if err != nil || len(none) != 0 {
		t.Errorf("a draft of nothing gave %d entries, error %v", len(none), err)
	}
	verified(t, s, 1)
	func() {
		defer func() {
			if recover() == nil {
				t.Error("a draft's panic was swallowed")
			}
		}()
		_, _ = s.Append(context.Background(), operator, clock, func(journal.Reader) ([]journal.Body, error) { panic("draft") })
	}()
	append1(t, s, reading("B-1", 3, 9)) // the write lock is free again
}

func testDraftView(t *testing.T, s journal.Store) {
	append1(t, s, batch("B-1"), batch("B-2"), ending("B-2", 9))
	var kept journal.Reader
	for n := range 3 {
		_, err := s.Append(context.Background(), operator, clock, func(r journal.Reader) ([]journal.Body, error) {
			kept = r
			if got := len(record(t, r, "B-1").Readings); got != n {
				return nil, fmt.Errorf("the draft saw %d readings, wanted %d", got, n)
			}
			if got, _ := head(t, r); got != int64(3+n) {
				return nil, fmt.Errorf("the draft saw entry %d, wanted %d", got, 3+n)
			}
			if got := collect(t, r, journal.Filter{Closed: true}); !slices.Equal(got, []string{"B-2"}) {
				return nil, fmt.Errorf("the draft saw closed %v, wanted B-2", got)
			}
			verified(t, r, int64(3+n))
			return []journal.Body{reading("B-1", 3+n, 9)}, nil
		})
		if err != nil {
			t.Fatal(err)
		}
	}
	if _, err := kept.Batch(context.Background(), "B-1"); !errors.Is(err, journal.ErrClosed) {
		t.Errorf("a view kept after its draft gave %v, wanted %v", err, journal.ErrClosed)
	}
}

func testCancelled(t *testing.T, s journal.Store) {
	append1(t, s, batch("B-1"))
	ctx, cancel := context.WithCancel(context.Background())
	draft := func(journal.Reader) ([]journal.Body, error) {
		cancel()
		return []journal.Body{reading("B-1", 3, 9)}, nil
	}
	if _, err := s.Append(ctx, operator, clock, draft); !errors.Is(err, context.Canceled) {
		t.Errorf("cancelled in the draft: %v, wanted %v", err, context.Canceled)
	}
	if _, err := s.Append(ctx, operator, clock, draft); !errors.Is(err, context.Canceled) {
		t.Errorf("append after the cancel: %v, wanted %v", err, context.Canceled)
	}
	if _, err := s.Batch(ctx, "B-1"); !errors.Is(err, context.Canceled) {
		t.Errorf("batch after the cancel: %v, wanted %v", err, context.Canceled)
	}
	if _, err := journal.VerifyAll(ctx, s); !errors.Is(err, context.Canceled) {
		t.Errorf("verify after the cancel: %v, wanted %v", err, context.Canceled)
	}
	verified(t, s, 1)

	// A second writer stops waiting when its time is over.
	waiting, stop := context.WithTimeout(context.Background(), 50*time.Millisecond)
	defer stop()
	_, err := s.Append(context.Background(), operator, clock, func(journal.Reader) ([]journal.Body, error) {
		began := time.Now()
		_, err := s.Append(waiting, operator, clock, draft)
		if !errors.Is(err, context.DeadlineExceeded) {
			return nil, fmt.Errorf("a waiting writer gave %w, wanted %w", err, context.DeadlineExceeded)
		}
		if d := time.Since(began); d > 5*time.Second {
			return nil, fmt.Errorf("a waiting writer stopped after %v, wanted 50 ms", d)
		}
		return []journal.Body{reading("B-1", 4, 9)}, nil
	})
	if err != nil {
		t.Fatal(err)
	}
	verified(t, s, 2)

	// In the middle of an iteration.
	middle, stopMiddle := context.WithCancel(context.Background())
	defer stopMiddle()
	var last error
	for _, err := range s.Entries(middle) {
		last = err
		stopMiddle()
	}
	if !errors.Is(last, context.Canceled) {
		t.Errorf("cancelled between entries: %v, wanted %v", last, context.Canceled)
	}
}
