package sqlstore

import (
	"context"
	"database/sql"
	"errors"
	"fmt"
	"time"

	"gylebook/attenuation/journal"
)

// writer appends entries within one transaction. What it has looked up it keeps,
// so that a long restore asks once a batch and once an instrument.
type writer struct {
	v           *view
	number      int64 // of the newest entry
	chain       string
	at          time.Time
	batches     map[string]state
	instruments map[string]state
}

// state is that of a batch or an instrument.
type state int

const (
	unknown state = iota
	void          // its id is used up
	inUse
	ended // closed, or out of use
)

func newWriter(ctx context.Context, v *view) (*writer, error) {
	w := &writer{v: v}
	w.forget()
	err := v.one(ctx, "SELECT number, recorded_at, chain FROM entry ORDER BY number DESC LIMIT 1", nil,
		&w.number, recordedOf{&w.at}, &w.chain)
	if errors.Is(err, sql.ErrNoRows) {
		err = nil
	}
	return w, err
}

func (w *writer) forget() {
	w.batches, w.instruments = make(map[string]state), make(map[string]state)
}

const (
	batchState = `SELECT CASE
		WHEN EXISTS (SELECT 1 FROM void_entry x WHERE x.entry = b.number) THEN 1
		WHEN EXISTS (SELECT 1 FROM batch_close c WHERE c.batch = b.id
			AND NOT EXISTS (SELECT 1 FROM void_entry x WHERE x.entry = c.number)) THEN 3
		ELSE 2 END FROM batch b WHERE b.id = ?`
	instrumentState = `SELECT CASE
		WHEN EXISTS (SELECT 1 FROM void_entry x WHERE x.entry = b.number) THEN 1
		WHEN EXISTS (SELECT 1 FROM retirement c WHERE c.instrument = b.id
			AND NOT EXISTS (SELECT 1 FROM void_entry x WHERE x.entry = c.number)) THEN 3
		ELSE 2 END FROM instrument b WHERE b.id = ?`
)

func (w *writer) lookUp(ctx context.Context, known map[string]state, query, id string) (state, error) {
	if st, ok := known[id]; ok {
		return st, nil
	}
	var st state
	err := w.v.one(ctx, query, []any{id}, &st)
	if errors.Is(err, sql.ErrNoRows) {
		err = nil
	}
	if err == nil {
		known[id] = st
	}
	return st, err
}

// insert writes an entry that passed check.
func (w *writer) insert(ctx context.Context, e journal.Entry) error {
	err := w.v.exec(ctx, "INSERT INTO entry ("+entryColumns+") VALUES (?, ?, ?, ?, ?, ?)",
		e.Number, recorded(e.RecordedAt), e.By, string(e.Body.Kind()), e.Digest, e.Chain)
	if err != nil {
		return err
	}
	w.number, w.chain, w.at = e.Number, e.Chain, e.RecordedAt
	switch b := e.Body.(type) {
	case journal.Instrument:
		w.instruments[b.ID] = inUse
		return put(ctx, w, instruments, e, &b)
	case journal.Certificate:
		return errors.Join(put(ctx, w, certificates, e, &b), w.v.insertPoints(ctx, e.Number, b.Points))
	case journal.Check:
		return put(ctx, w, checks, e, &b)
	case journal.Retire:
		w.instruments[b.Instrument] = ended
		return put(ctx, w, retirements, e, &b)
	case journal.Batch:
		w.batches[b.ID] = inUse
		return errors.Join(put(ctx, w, batches, e, &b), w.opened(ctx, b.ID, b.Vessel))
	case journal.OG:
		return put(ctx, w, ogs, e, &b)
	case journal.Limit:
		return put(ctx, w, limits, e, &b)
	case journal.Volume:
		return put(ctx, w, volumes, e, &b)
	case journal.Close:
		w.batches[b.Batch] = ended
		return errors.Join(put(ctx, w, closes, e, &b), w.ended(ctx, b.Batch))
	case journal.Reading:
		return put(ctx, w, readings, e, &b)
	case journal.Event:
		return put(ctx, w, events, e, &b)
	case journal.Void:
		return errors.Join(put(ctx, w, voids, e, &b), w.voided(ctx, b.Entry))
	}
	return fmt.Errorf("%w: a body of type %T", journal.ErrIncomplete, e.Body)
}

func put[B journal.Body](ctx context.Context, w *writer, t table[B], e journal.Entry, b *B) error {
	query, args := t.insert(e, b)
	return w.v.exec(ctx, query, args...)
}

// The cache of open batches follows.

func (w *writer) opened(ctx context.Context, id, vessel string) error {
	return w.v.exec(ctx, "INSERT INTO open_batch (batch, vessel) VALUES (?, ?)", id, vessel)
}

func (w *writer) ended(ctx context.Context, id string) error {
	return w.v.exec(ctx, "DELETE FROM open_batch WHERE batch = ?", id)
}

// voided drops what was known, since a void may reopen a batch, take one out, or
// bring an instrument back.
func (w *writer) voided(ctx context.Context, number int64) error {
	w.forget()
	var id, vessel string
	err := w.v.one(ctx, `SELECT b.id, b.vessel FROM batch b WHERE b.number = ?
		UNION ALL SELECT b.id, b.vessel FROM batch_close c JOIN batch b ON b.id = c.batch WHERE c.number = ?`,
		[]any{number, number}, &id, &vessel)
	if errors.Is(err, sql.ErrNoRows) {
		return nil // neither opened nor closed a batch
	}
	if err != nil {
		return err
	}
	st, err := w.lookUp(ctx, w.batches, batchState, id)
	if err != nil {
		return err
	}
	if err := w.ended(ctx, id); err != nil || st != inUse {
		return err
	}
	return w.opened(ctx, id, vessel)
}
