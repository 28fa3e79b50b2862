package sqlstore

import (
	"context"
	"database/sql"
	"errors"
	"fmt"
	"iter"
	"slices"
	"time"

	"gylebook/attenuation/journal"
)

// records runs over the batches of a selection with all that hangs on them.
func (v *view) records(ctx context.Context, s selection) iter.Seq2[*journal.Record, error] {
	return func(yield func(*journal.Record, error) bool) {
		b := newBundles(s, v.version)
		var head journal.Record
		dest := append([]any{&head.Number}, batches.dest(&head.Batch)...)
		var reason sql.NullString
		if s.void {
			dest = append(dest, &reason)
		}
		err := v.each(ctx, s.recordSQL(b.columns), slices.Concat(b.args, s.args), append(dest, b.dest...), func() error {
			r := head
			r.Void, r.VoidReason = reason.Valid, reason.String
			if err := b.fill(ctx, v, &r); err != nil {
				return err
			}
			if !yield(&r, nil) {
				return errStopped
			}
			return nil
		})
		if err != nil && !errors.Is(err, errStopped) {
			yield(nil, err)
		}
	}
}

// Batches implements journal.Reader.
func (v *view) Batches(ctx context.Context, f journal.Filter) iter.Seq2[*journal.Record, error] {
	return v.records(ctx, selectionOf(f))
}

// Finished implements journal.Reader.
func (v *view) Finished(ctx context.Context, product, yeast string, before time.Time) iter.Seq2[*journal.Record, error] {
	return v.records(ctx, finishedOnes(product, yeast, before))
}

// Open implements journal.Reader.
func (v *view) Open(ctx context.Context) ([]*journal.Record, error) {
	return v.list(ctx, openOnes)
}

// OpenLast implements journal.Reader.
func (v *view) OpenLast(ctx context.Context, n int) ([]*journal.Record, error) {
	s := openOnes
	if s.last = n; n < 1 {
		s.last = noReadings
	}
	return v.list(ctx, s)
}

// OpenPlaces implements journal.Reader.
func (v *view) OpenPlaces(ctx context.Context) ([]*journal.Record, error) {
	s := openOnes
	s.lean, s.moves = true, true
	return v.list(ctx, s)
}

func (v *view) list(ctx context.Context, s selection) ([]*journal.Record, error) {
	var list []*journal.Record
	for r, err := range v.records(ctx, s) {
		if err != nil {
			return nil, err
		}
		list = append(list, r)
	}
	return list, nil
}

// Batch implements journal.Reader.
func (v *view) Batch(ctx context.Context, id string) (*journal.Record, error) {
	s := byID
	s.args = []any{id}
	for r, err := range v.records(ctx, s) {
		return r, err
	}
	return nil, fmt.Errorf("batch %.60q: %w", id, journal.ErrNotFound)
}
