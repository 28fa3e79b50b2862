package sqlstore

import (
	"context"
	"database/sql"
	"errors"
	"fmt"
	"time"

	"gylebook/attenuation/journal"
)

// check returns an error for an entry that the journal does not admit, as
// journal.Store.Append documents. A parent and a batch that was blended in are not
// looked up: they may be older than the journal.
func (w *writer) check(ctx context.Context, e journal.Entry) error {
	if e.Body == nil {
		return fmt.Errorf("%w: no content", journal.ErrIncomplete)
	}
	if err := e.Body.Check(); err != nil {
		return err
	}
	switch b := e.Body.(type) {
	case journal.Instrument:
		return w.unused(ctx, "instrument", w.instruments, instrumentState, b.ID)
	case journal.Certificate:
		return w.instrument(ctx, b.Instrument, b.At)
	case journal.Check:
		return w.instrument(ctx, b.Instrument, b.At)
	case journal.Retire:
		return w.instrument(ctx, b.Instrument, always)
	case journal.Batch:
		return w.unused(ctx, "batch", w.batches, batchState, b.ID)
	case journal.OG:
		return firstOf(w.batch(ctx, b.Batch, false), func() error { return w.named(ctx, b.Instrument, b.At) })
	case journal.Volume:
		return w.batch(ctx, b.Batch, true)
	case journal.Limit:
		return w.batch(ctx, b.Batch, true)
	case journal.Close:
		return w.batch(ctx, b.Batch, false)
	case journal.Reading:
		return firstOf(w.batch(ctx, b.Batch, false), func() error { return w.named(ctx, b.Instrument, b.TakenAt) })
	case journal.Event:
		return w.batch(ctx, b.Batch, false)
	case journal.Void:
		return w.voidable(ctx, b.Entry)
	}
	return fmt.Errorf("%w: a body of type %T", journal.ErrIncomplete, e.Body)
}

func firstOf(err error, then func() error) error {
	if err != nil {
		return err
	}
	return then()
}

func (w *writer) unused(ctx context.Context, what string, known map[string]state, query, id string) error {
	st, err := w.lookUp(ctx, known, query, id)
	if err == nil && st != unknown {
		err = fmt.Errorf("%s %q: %w", what, id, journal.ErrExists)
	}
	return err
}

// named admits no instrument, or one that is in use at a time.
func (w *writer) named(ctx context.Context, id string, at time.Time) error {
	if id == "" {
		return nil
	}
	return w.instrument(ctx, id, at)
}

// always is after every retirement.
var always = time.Date(9999, 12, 31, 0, 0, 0, 0, time.UTC)

const retiredFrom = `SELECT MIN(c.at_ms) FROM retirement c
	WHERE c.instrument = ? AND NOT EXISTS (SELECT 1 FROM void_entry x WHERE x.entry = c.number)`

// instrument admits one that is in use at a time, whether or not it is now.
func (w *writer) instrument(ctx context.Context, id string, at time.Time) error {
	st, err := w.lookUp(ctx, w.instruments, instrumentState, id)
	if err == nil && st == ended {
		var from int64
		if err = w.v.one(ctx, retiredFrom, []any{id}, &from); err == nil && millisecond(at) < from {
			st = inUse
		}
	}
	switch {
	case err != nil:
		return err
	case st == ended:
		return fmt.Errorf("instrument %.60q: %w", id, journal.ErrRetired)
	case st != inUse:
		return fmt.Errorf("instrument %.60q: %w", id, journal.ErrNotFound)
	}
	return nil
}

func (w *writer) batch(ctx context.Context, id string, closedToo bool) error {
	st, err := w.lookUp(ctx, w.batches, batchState, id)
	switch {
	case err != nil:
		return err
	case st == ended && !closedToo:
		return fmt.Errorf("batch %.60q: %w", id, journal.ErrClosed)
	case st != inUse && st != ended:
		return fmt.Errorf("batch %.60q: %w", id, journal.ErrNotFound)
	}
	return nil
}

func (w *writer) voidable(ctx context.Context, number int64) error {
	var kind string
	var isVoid bool
	err := w.v.one(ctx, `SELECT e.kind, EXISTS (SELECT 1 FROM void_entry x WHERE x.entry = e.number) FROM entry e WHERE e.number = ?`,
		[]any{number}, &kind, &isVoid)
	switch {
	case errors.Is(err, sql.ErrNoRows):
		return fmt.Errorf("entry %d: %w", number, journal.ErrNotFound)
	case err != nil:
		return err
	case journal.Kind(kind) == journal.KindVoid:
		return fmt.Errorf("entry %d to void: %w: it is a void itself", number, journal.ErrNotFound)
	case isVoid:
		return fmt.Errorf("entry %d: %w", number, journal.ErrVoided)
	}
	return nil
}
