package sqlstore

import (
	"context"
	"database/sql"
	"errors"
	"fmt"
	"iter"
	"sync/atomic"
	"time"

	"gylebook/attenuation/journal"
)

// view is the journal as one transaction sees it. Its statements are prepared once
// and last as long as the transaction. They run without the caller's context: it
// is asked between rows, which is far cheaper than a watcher a statement.
type view struct {
	tx       *sql.Tx
	version  int // of the schema
	prepared map[string]*sql.Stmt
	over     atomic.Bool // whoever kept the view may not use it
}

var _ journal.Reader = (*view)(nil)

func newView(tx *sql.Tx, version int) *view {
	return &view{tx: tx, version: version, prepared: make(map[string]*sql.Stmt)}
}

func (v *view) prepare(ctx context.Context, query string) (*sql.Stmt, error) {
	if err := ctx.Err(); err != nil {
		return nil, err
	}
	if v.over.Load() {
		return nil, fmt.Errorf("view of the journal: %w", journal.ErrClosed)
	}
	if st, ok := v.prepared[query]; ok {
		return st, nil
	}
	st, err := v.tx.PrepareContext(context.Background(), query)
	if err == nil {
		v.prepared[query] = st
	}
	return st, err
}

func (v *view) query(ctx context.Context, query string, args ...any) (*sql.Rows, error) {
	st, err := v.prepare(ctx, query)
	if err != nil {
		return nil, err
	}
	return st.Query(args...)
}

// one scans the one row of a query; sql.ErrNoRows.
func (v *view) one(ctx context.Context, query string, args []any, dest ...any) error {
	st, err := v.prepare(ctx, query)
	if err != nil {
		return err
	}
	return st.QueryRow(args...).Scan(dest...)
}

func (v *view) exec(ctx context.Context, query string, args ...any) error {
	st, err := v.prepare(ctx, query)
	if err != nil {
		return err
	}
	_, err = st.Exec(args...)
	return err
}

// each calls fn after every row has been scanned into dest.
func (v *view) each(ctx context.Context, query string, args, dest []any, fn func() error) error {
	rows, err := v.query(ctx, query, args...)
	if err != nil {
		return err
	}
	defer rows.Close()
	for rows.Next() {
		if err := ctx.Err(); err != nil {
			return err
		}
		if err := rows.Scan(dest...); err != nil {
			return err
		}
		if err := fn(); err != nil {
			return err
		}
	}
	return rows.Err()
}

// BatchIDs implements journal.Reader.
func (v *view) BatchIDs(ctx context.Context) ([]string, error) {
	var ids []string
	var id string
	err := v.each(ctx, "SELECT id FROM batch ORDER BY id", nil, []any{&id}, func() error {
		ids = append(ids, id)
		return nil
	})
	return ids, err
}

// Head implements journal.Reader.
func (v *view) Head(ctx context.Context) (int64, string, error) {
	var number int64
	var chain string
	err := v.one(ctx, "SELECT number, chain FROM entry ORDER BY number DESC LIMIT 1", nil, &number, &chain)
	if errors.Is(err, sql.ErrNoRows) {
		return 0, "", nil
	}
	return number, chain, err
}

// LastBy implements journal.Reader.
func (v *view) LastBy(ctx context.Context, by string) (journal.Entry, error) {
	var number int64
	err := v.one(ctx, `SELECT e.number FROM entry e
		WHERE e.operator = ? AND e.kind <> 'void' AND NOT EXISTS (SELECT 1 FROM void_entry x WHERE x.entry = e.number)
		ORDER BY e.number DESC LIMIT 1`, []any{by}, &number)
	if errors.Is(err, sql.ErrNoRows) {
		return journal.Entry{}, fmt.Errorf("an entry of %.60q: %w", by, journal.ErrNotFound)
	}
	if err != nil {
		return journal.Entry{}, err
	}
	return v.Entry(ctx, number)
}

// LastInstrumentBy implements journal.Reader.
func (v *view) LastInstrumentBy(ctx context.Context, by string) (string, error) {
	var id string
	err := v.one(ctx, `SELECT r.instrument FROM entry e CROSS JOIN reading r
		WHERE r.number = e.number AND e.operator = ? AND NOT EXISTS (SELECT 1 FROM void_entry x WHERE x.entry = e.number)
		ORDER BY e.number DESC LIMIT 1`, []any{by}, &id)
	if errors.Is(err, sql.ErrNoRows) {
		return "", nil
	}
	return id, err
}

// stored is what a method of Store returns through a view.
func stored[T any](ctx context.Context, s *Store, fn func(*view) (T, error)) (T, error) {
	var out T
	err := s.view(ctx, func(v *view) (err error) {
		out, err = fn(v)
		return err
	})
	return out, err
}

// Instruments implements journal.Reader.
func (s *Store) Instruments(ctx context.Context) ([]*journal.InstrumentRecord, error) {
	return stored(ctx, s, func(v *view) ([]*journal.InstrumentRecord, error) { return v.Instruments(ctx) })
}

// Batch implements journal.Reader.
func (s *Store) Batch(ctx context.Context, id string) (*journal.Record, error) {
	return stored(ctx, s, func(v *view) (*journal.Record, error) { return v.Batch(ctx, id) })
}

// Open implements journal.Reader.
func (s *Store) Open(ctx context.Context) ([]*journal.Record, error) {
	return stored(ctx, s, func(v *view) ([]*journal.Record, error) { return v.Open(ctx) })
}

// OpenLast implements journal.Reader.
func (s *Store) OpenLast(ctx context.Context, n int) ([]*journal.Record, error) {
	return stored(ctx, s, func(v *view) ([]*journal.Record, error) { return v.OpenLast(ctx, n) })
}

// OpenPlaces implements journal.Reader.
func (s *Store) OpenPlaces(ctx context.Context) ([]*journal.Record, error) {
	return stored(ctx, s, func(v *view) ([]*journal.Record, error) { return v.OpenPlaces(ctx) })
}

// BatchIDs implements journal.Reader.
func (s *Store) BatchIDs(ctx context.Context) ([]string, error) {
	return stored(ctx, s, func(v *view) ([]string, error) { return v.BatchIDs(ctx) })
}

// Entry implements journal.Reader.
func (s *Store) Entry(ctx context.Context, number int64) (journal.Entry, error) {
	return stored(ctx, s, func(v *view) (journal.Entry, error) { return v.Entry(ctx, number) })
}

// LastBy implements journal.Reader.
func (s *Store) LastBy(ctx context.Context, by string) (journal.Entry, error) {
	return stored(ctx, s, func(v *view) (journal.Entry, error) { return v.LastBy(ctx, by) })
}

// LastInstrumentBy implements journal.Reader.
func (s *Store) LastInstrumentBy(ctx context.Context, by string) (string, error) {
	return stored(ctx, s, func(v *view) (string, error) { return v.LastInstrumentBy(ctx, by) })
}

// Head implements journal.Reader.
func (s *Store) Head(ctx context.Context) (int64, string, error) {
	type head struct {
		number int64
		chain  string
	}
	h, err := stored(ctx, s, func(v *view) (h head, err error) {
		h.number, h.chain, err = v.Head(ctx)
		return h, err
	})
	return h.number, h.chain, err
}

// Batches implements journal.Reader.
func (s *Store) Batches(ctx context.Context, f journal.Filter) iter.Seq2[*journal.Record, error] {
	return streamed(ctx, s, func(v *view) iter.Seq2[*journal.Record, error] { return v.Batches(ctx, f) })
}

// Finished implements journal.Reader.
func (s *Store) Finished(ctx context.Context, product, yeast string, before time.Time) iter.Seq2[*journal.Record, error] {
	return streamed(ctx, s, func(v *view) iter.Seq2[*journal.Record, error] { return v.Finished(ctx, product, yeast, before) })
}

// Entries implements journal.Reader.
func (s *Store) Entries(ctx context.Context) iter.Seq2[journal.Entry, error] {
	return streamed(ctx, s, func(v *view) iter.Seq2[journal.Entry, error] { return v.Entries(ctx) })
}

// errStopped ends a view whose reader wants no more.
var errStopped = errors.New("stopped")

// streamed runs an iteration of a view in a transaction of its own, which ends
// with the iteration.
func streamed[T any](ctx context.Context, s *Store, of func(*view) iter.Seq2[T, error]) iter.Seq2[T, error] {
	return func(yield func(T, error) bool) {
		err := s.view(ctx, func(v *view) error {
			for item, err := range of(v) {
				if err != nil {
					return err
				}
				if !yield(item, nil) {
					return errStopped
				}
			}
			return nil
		})
		if err != nil && !errors.Is(err, errStopped) {
			var none T
			yield(none, err)
		}
	}
}
