package storetest

import (
	"context"
	"errors"
	"fmt"
	"iter"
	"slices"
	"testing"

	"gylebook/attenuation/journal"
)

// inTurn gives the bodies one by one, and then the error, unless it is nil.
func inTurn(end error, bodies ...journal.Body) iter.Seq2[journal.Body, error] {
	return func(yield func(journal.Body, error) bool) {
		for _, b := range bodies {
			if !yield(b, nil) {
				return
			}
		}
		if end != nil {
			yield(nil, end)
		}
	}
}

func appendEach(s journal.Store, end error, bodies ...journal.Body) (first, last int64, err error) {
	return s.AppendEach(context.Background(), operator, clock, func(journal.Reader) (iter.Seq2[journal.Body, error], error) {
		return inTurn(end, bodies...), nil
	})
}

// What comes one by one is entered as if it came at once: a void of an entry just
// made, a pointer to a body and all.
func testEach(t *testing.T, s journal.Store) {
	append1(t, s, hydrometer("H1"))
	late := reading("B-1", 4, 9)
	first, last, err := appendEach(s, nil, batch("B-1"), og("B-1", 10), reading("B-1", 3, 9), voidOf(4), &late)
	if err != nil || first != 2 || last != 6 {
		t.Fatalf("entries %d to %d, error %v, wanted 2 to 6", first, last, err)
	}
	rec := record(t, s, "B-1")
	if len(rec.OGs) != 1 || len(rec.Readings) != 2 || !rec.Readings[0].Void || rec.Readings[1].Void {
		t.Errorf("%d original gravities, readings %+v, wanted one, and the first of two void", len(rec.OGs), rec.Readings)
	}
	for e, err := range s.Entries(context.Background()) {
		if err != nil || e.By != operator || !e.RecordedAt.Equal(clock) {
			t.Errorf("entry %d by %q at %v, error %v, wanted %q at %v", e.Number, e.By, e.RecordedAt, err, operator, clock)
		}
	}
	if made := append1(t, s, reading("B-1", 5, 9)); made[0].Number != 7 {
		t.Errorf("the next entry has the number %d, wanted 7", made[0].Number)
	}
	verified(t, s, 7)
}

func testEachAllOrNone(t *testing.T, s journal.Store) {
	append1(t, s, batch("B-1"))
	own := errors.New("of the caller's own")
	for _, c := range []struct {
		name   string
		end    error
		bodies []journal.Body
		want   error
	}{
		{"the last is refused", nil, []journal.Body{reading("B-1", 3, 9), event("B-1", 3), reading("B-9", 3, 9)}, journal.ErrNotFound},
		{"an id twice", nil, []journal.Body{batch("B-2"), reading("B-2", 3, 9), batch("B-2")}, journal.ErrExists},
		{"after its closing", nil, []journal.Body{ending("B-1", 9), reading("B-1", 3, 9)}, journal.ErrClosed},
		{"incomplete", nil, []journal.Body{reading("B-1", 3, 9), journal.Reading{Batch: "B-1"}}, journal.ErrIncomplete},
		{"nothing there", nil, []journal.Body{reading("B-1", 3, 9), nil}, journal.ErrIncomplete},
		{"ends with an error", own, []journal.Body{reading("B-1", 3, 9), reading("B-1", 4, 9)}, own},
		{"an error alone", own, nil, own},
	} {
		first, last, err := appendEach(s, c.end, c.bodies...)
		if !errors.Is(err, c.want) || c.end != nil && err != own || first != 0 || last != 0 {
			t.Errorf("%s: entries %d to %d, error %v, wanted none and %v", c.name, first, last, err, c.want)
		}
		if rec := record(t, s, "B-1"); len(rec.Readings)+len(rec.Events) != 0 || rec.Closed != nil {
			t.Errorf("%s: it left %d readings and %d events, closing %v", c.name, len(rec.Readings), len(rec.Events), rec.Closed)
		}
		if ids, err := s.BatchIDs(context.Background()); err != nil || !slices.Equal(ids, []string{"B-1"}) {
			t.Errorf("%s: batches %v, error %v, wanted B-1 alone", c.name, ids, err)
		}
		verified(t, s, 1)
	}
	for name, draft := range map[string]func(journal.Reader) (iter.Seq2[journal.Body, error], error){
		"of nothing": func(journal.Reader) (iter.Seq2[journal.Body, error], error) { return inTurn(nil), nil },
		"of nil":     func(journal.Reader) (iter.Seq2[journal.Body, error], error) { return nil, nil },
	} {
		if first, last, err := s.AppendEach(context.Background(), operator, clock, draft); first != 0 || last != 0 || err != nil {
			t.Errorf("a draft %s: entries %d to %d, error %v", name, first, last, err)
		}
	}
	_, _, err := s.AppendEach(context.Background(), operator, clock, func(journal.Reader) (iter.Seq2[journal.Body, error], error) {
		return inTurn(nil, reading("B-1", 3, 9)), own
	})
	if err != own {
		t.Errorf("error %v, wanted the draft's own as it is", err)
	}
	func() {
		defer func() {
			if recover() == nil {
				t.Error("a panic between the bodies was swallowed")
			}
		}()
		_, _, _ = s.AppendEach(context.Background(), operator, clock, func(journal.Reader) (iter.Seq2[journal.Body, error], error) {
			return func(yield func(journal.Body, error) bool) { yield(reading("B-1", 3, 9), nil); panic("bodies") }, nil
		})
	}()
	verified(t, s, 1)
	append1(t, s, reading("B-1", 3, 9)) // the write lock is free again
}

func testEachView(t *testing.T, s journal.Store) {
	append1(t, s, batch("B-1"))
	var kept journal.Reader
	first, last, err := s.AppendEach(context.Background(), operator, clock, func(r journal.Reader) (iter.Seq2[journal.Body, error], error) {
		kept = r
		return func(yield func(journal.Body, error) bool) {
			for n := range 3 {
				if got := len(record(t, r, "B-1").Readings); got != n {
					t.Errorf("the view has %d readings, wanted the %d taken before", got, n)
				}
				if got, _ := head(t, r); got != int64(n+1) {
					t.Errorf("the view ends with entry %d, wanted %d", got, n+1)
				}
				if !yield(reading("B-1", 3+n, 9), nil) {
					return
				}
			}
		}, nil
	})
	if err != nil || first != 2 || last != 4 {
		t.Fatalf("entries %d to %d, error %v, wanted 2 to 4", first, last, err)
	}
	if _, err := kept.Batch(context.Background(), "B-1"); !errors.Is(err, journal.ErrClosed) {
		t.Errorf("a view kept after its bodies gave %v, wanted %v", err, journal.ErrClosed)
	}
	verified(t, s, 4)
}

func testEachCancelled(t *testing.T, s journal.Store) {
	append1(t, s, batch("B-1"))
	ctx, cancel := context.WithCancel(context.Background())
	defer cancel()
	taken := 0
	_, _, err := s.AppendEach(ctx, operator, clock, func(journal.Reader) (iter.Seq2[journal.Body, error], error) {
		return func(yield func(journal.Body, error) bool) {
			for yield(reading("B-1", 3, 9), nil) {
				if taken++; taken == 5 {
					cancel()
				}
				if taken > 5 {
					return // it went on after the cancel
				}
			}
		}, nil
	})
	if !errors.Is(err, context.Canceled) || taken > 5 {
		t.Errorf("cancelled after 5 bodies: %v after %d, wanted %v", err, taken, context.Canceled)
	}
	verified(t, s, 1)
}

func testReaderBesideEach(t *testing.T, a, b journal.Store) {
	append1(t, a, batch("B-1"))
	const many = 500
	_, last, err := a.AppendEach(context.Background(), operator, clock, func(journal.Reader) (iter.Seq2[journal.Body, error], error) {
		return func(yield func(journal.Body, error) bool) {
			for n := range many {
				r := reading("B-1", 3, 9)
				r.Note = fmt.Sprint(n)
				if !yield(r, nil) {
					return
				}
				if got, _ := head(t, b); n%100 == 0 && got != 1 {
					t.Errorf("a reader saw entry %d, wanted 1 before all are there", got)
				}
			}
		}, nil
	})
	if err != nil || last != many+1 {
		t.Fatalf("last entry %d, error %v, wanted %d", last, err, many+1)
	}
	verified(t, b, many+1)
}
