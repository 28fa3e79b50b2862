package sqlstore

import (
	"context"
	"errors"
	"fmt"
	"iter"
	"reflect"
	"slices"
	"time"

	"gylebook/attenuation/journal"
)

// Append implements journal.Store. An entry's time is never before that of the
// entry before it, whatever the clock says.
func (s *Store) Append(ctx context.Context, by string, now time.Time, draft func(journal.Reader) ([]journal.Body, error)) ([]journal.Entry, error) {
	var made []journal.Entry
	err := s.add(ctx, by, now, func(r journal.Reader) (iter.Seq2[journal.Body, error], error) {
		bodies, err := draft(r)
		if err != nil || len(bodies) == 0 {
			return nil, err
		}
		return oneByOne(bodies), nil
	}, func(e journal.Entry) { made = append(made, e) })
	if err != nil {
		return nil, err
	}
	return made, nil
}

func oneByOne(bodies []journal.Body) iter.Seq2[journal.Body, error] {
	return func(yield func(journal.Body, error) bool) {
		for _, b := range bodies {
			if !yield(b, nil) {
				return
			}
		}
	}
}

// AppendEach implements journal.Store.
func (s *Store) AppendEach(ctx context.Context, by string, now time.Time, draft func(journal.Reader) (iter.Seq2[journal.Body, error], error)) (first, last int64, err error) {
	err = s.add(ctx, by, now, draft, func(e journal.Entry) {
		if first == 0 {
			first = e.Number
		}
		last = e.Number
	})
	if err != nil {
		return 0, 0, err
	}
	return first, last, nil
}

// add appends the bodies of a draft and shows each entry to made. Without bodies
// nothing is written.
func (s *Store) add(ctx context.Context, by string, now time.Time, draft func(journal.Reader) (iter.Seq2[journal.Body, error], error), made func(journal.Entry)) error {
	return s.write(ctx, func(v *view) (bool, error) {
		bodies, err := draft(v)
		if err != nil {
			return false, drafted{err}
		}
		if bodies == nil {
			return false, nil
		}
		w, err := newWriter(ctx, v)
		if err != nil {
			return false, err
		}
		at := now.UTC().Truncate(time.Millisecond)
		if at.Before(w.at) {
			at = w.at
		}
		some := false
		for b, err := range bodies {
			if err != nil {
				return false, drafted{err}
			}
			e := journal.Entry{Number: w.number + 1, RecordedAt: at, By: by, Body: plain(b)}
			if err := w.check(ctx, e); err != nil {
				return false, err
			}
			if e, err = e.Seal(w.chain); err != nil {
				return false, err
			}
			if err := w.insert(ctx, e); err != nil {
				return false, err
			}
			made(e)
			some = true
		}
		return some, nil
	})
}

// Restore implements journal.Store.
func (s *Store) Restore(ctx context.Context, entries iter.Seq2[journal.Entry, error]) (int64, error) {
	var n int64
	err := s.write(ctx, func(v *view) (bool, error) {
		w, err := newWriter(ctx, v)
		if err != nil {
			return false, err
		}
		if w.number != 0 {
			return false, fmt.Errorf("entry %d is the last: %w", w.number, journal.ErrNotEmpty)
		}
		for e, err := range entries {
			if err != nil {
				return false, drafted{err}
			}
			if e.Number != w.number+1 {
				return false, fmt.Errorf("entry %d follows on entry %d: %w", e.Number, w.number, journal.ErrTampered)
			}
			e.Body = plain(e.Body)
			if e.Body == nil {
				return false, fmt.Errorf("entry %d has no content: %w", e.Number, journal.ErrTampered)
			}
			if err := e.Verify(w.chain); err != nil {
				return false, err
			}
			if err := w.check(ctx, e); err != nil {
				return false, fmt.Errorf("entry %d: %w", e.Number, err)
			}
			if err := w.insert(ctx, e); err != nil {
				return false, err
			}
		}
		n = w.number
		return n > 0, nil
	})
	if err != nil {
		return 0, err
	}
	return n, nil
}

// drafted is an error of the caller's own, which is handed back as it is.
type drafted struct{ error }

// write calls fn in a transaction that holds the write lock, and commits when fn
// wants that. The context ends the wait and the work; a commit that has begun runs
// to its end, so that an error means that nothing was written.
func (s *Store) write(ctx context.Context, fn func(*view) (bool, error)) error {
	if s.closed.Load() {
		return closedErr()
	}
	if s.frozen {
		return fmt.Errorf("journal %s: %w", s.path, journal.ErrReadOnly)
	}
	select {
	case s.turn <- struct{}{}:
		defer func() { <-s.turn }()
	case <-ctx.Done():
		return ctx.Err()
	}
	own, end := context.WithCancel(context.WithoutCancel(ctx))
	defer end()
	release := context.AfterFunc(ctx, end)
	defer release()
	tx, err := s.db.BeginTx(own, nil)
	if err != nil {
		return s.unwritten(ctx, err)
	}
	defer func() { _ = tx.Rollback() }()
	v := newView(tx, s.version)
	defer v.over.Store(true)
	commit, err := fn(v)
	var draft drafted
	if errors.As(err, &draft) {
		return readErr(draft.error)
	}
	if err != nil {
		return s.unwritten(ctx, err)
	}
	if !commit {
		return nil
	}
	if !release() {
		return ctx.Err()
	}
	return s.unwritten(context.WithoutCancel(ctx), tx.Commit())
}

// refusals are the errors of a write that say why it was refused.
var refusals = []error{
	journal.ErrIncomplete, journal.ErrNotFound, journal.ErrExists, journal.ErrClosed, journal.ErrRetired, journal.ErrVoided,
	journal.ErrNotEmpty, journal.ErrTampered, journal.ErrNoJournal, journal.ErrReadOnly, journal.ErrDiskFull, journal.ErrBusy,
	journal.ErrNotWritten, context.Canceled, context.DeadlineExceeded,
}

// unwritten gives every other error of a write the name journal.ErrNotWritten.
func (s *Store) unwritten(ctx context.Context, err error) error {
	err = s.failed(ctx, err, writeErr)
	if err == nil || slices.ContainsFunc(refusals, func(r error) bool { return errors.Is(err, r) }) {
		return err
	}
	return wrap(journal.ErrNotWritten, err)
}

// plain takes the pointer off a body.
func plain(b journal.Body) journal.Body {
	v := reflect.ValueOf(b)
	if !v.IsValid() || v.Kind() != reflect.Pointer {
		return b
	}
	if v.IsNil() {
		return nil
	}
	body, _ := v.Elem().Interface().(journal.Body)
	return body
}
