package sqlstore

import (
	"cmp"
	"context"
	"database/sql"
	"errors"
	"fmt"
	"iter"
	"slices"
	"time"

	"gylebook/attenuation/journal"
)

// child runs over what hangs on the batches, one row ahead.
type child[B journal.Body] struct {
	rows   *sql.Rows
	again  func(number int64) (journal.Entry, error)
	id     *string            // batch of the row ahead
	at     func(*B) time.Time // its own time
	dest   []any
	ahead  journal.Numbered[B]
	reason sql.NullString
	text   string
	more   bool
	err    error
}

func newChild[B journal.Body](ctx context.Context, v *view, s selection, t table[B], at func(*B) time.Time) (*child[B], error) {
	query, args := childSQL(s, t)
	rows, err := v.query(ctx, query, args...)
	if err != nil {
		return nil, err
	}
	c := &child[B]{rows: rows, at: at, again: func(number int64) (journal.Entry, error) { return v.Entry(ctx, number) }}
	body := t.dest(&c.ahead.Body)
	c.id = body[max(0, slices.Index(t.columns, t.owner))].(*string) // the batch comes first in each of these tables
	c.dest = append([]any{recordedOf{&c.ahead.RecordedAt}, &c.ahead.By}, body...)
	c.next()
	return c, nil
}

func (c *child[B]) next() {
	c.more = c.rows.Next()
	if !c.more {
		c.err = c.rows.Err()
		return
	}
	err := c.rows.Scan(&c.ahead.Number, &c.reason, &c.text)
	if err == nil {
		err = unpack(c.text, c.dest)
	}
	if errors.Is(err, errPacked) {
		var e journal.Entry
		if e, err = c.again(c.ahead.Number); err == nil {
			c.ahead.RecordedAt, c.ahead.By = e.RecordedAt, e.By
			c.ahead.Body, _ = e.Body.(B)
		}
	}
	if err != nil {
		c.more, c.err = false, fmt.Errorf("entry %d: %w", c.ahead.Number, err)
	}
	c.ahead.Void, c.ahead.VoidReason = c.reason.Valid, c.reason.String
}

// take returns the rows of a batch in the order of their own time, then number.
func (c *child[B]) take(id string) ([]journal.Numbered[B], error) {
	var list []journal.Numbered[B]
	for c.more && *c.id == id {
		list = append(list, c.ahead)
		c.next()
	}
	slices.SortFunc(list, func(a, b journal.Numbered[B]) int {
		return cmp.Or(c.at(&a.Body).Compare(c.at(&b.Body)), cmp.Compare(a.Number, b.Number))
	})
	return list, c.err
}

// children holds one result a kind.
type children struct {
	ogs      *child[journal.OG]
	limits   *child[journal.Limit]
	volumes  *child[journal.Volume] // nil in a journal that has none yet
	readings *child[journal.Reading]
	events   *child[journal.Event]
	given    *child[journal.Event]
	closes   *child[journal.Close]
}

func newChildren(ctx context.Context, v *view, s selection) (c children, err error) {
	open := func(run func() error) {
		if err == nil {
			err = run()
		}
	}
	open(func() (err error) {
		c.ogs, err = newChild(ctx, v, s, ogs, func(o *journal.OG) time.Time { return o.At })
		return err
	})
	open(func() (err error) {
		c.limits, err = newChild(ctx, v, s, limits, func(l *journal.Limit) time.Time { return l.At })
		return err
	})
	open(func() (err error) {
		c.readings, err = newChild(ctx, v, s, readings, func(r *journal.Reading) time.Time { return r.TakenAt })
		return err
	})
	open(func() (err error) {
		c.events, err = newChild(ctx, v, s, events, func(e *journal.Event) time.Time { return e.At })
		return err
	})
	open(func() (err error) {
		c.given, err = newChild(ctx, v, s, given, func(e *journal.Event) time.Time { return e.At })
		return err
	})
	if v.version >= volumesFrom {
		open(func() (err error) {
			c.volumes, err = newChild(ctx, v, s, volumes, func(w *journal.Volume) time.Time { return w.At })
			return err
		})
	}
	open(func() (err error) {
		c.closes, err = newChild(ctx, v, s, closes, func(c *journal.Close) time.Time { return c.At })
		return err
	})
	return c, err
}

func (c children) close() {
	if c.ogs != nil {
		_ = c.ogs.rows.Close()
	}
	if c.limits != nil {
		_ = c.limits.rows.Close()
	}
	if c.readings != nil {
		_ = c.readings.rows.Close()
	}
	if c.events != nil {
		_ = c.events.rows.Close()
	}
	if c.given != nil {
		_ = c.given.rows.Close()
	}
	if c.volumes != nil {
		_ = c.volumes.rows.Close()
	}
	if c.closes != nil {
		_ = c.closes.rows.Close()
	}
}

// fill takes what hangs on the record's batch.
func (c children) fill(r *journal.Record) error {
	id := r.Batch.ID
	var errs [7]error
	r.OGs, errs[0] = c.ogs.take(id)
	r.Limits, errs[1] = c.limits.take(id)
	r.Readings, errs[2] = c.readings.take(id)
	r.Events, errs[3] = c.events.take(id)
	var closed []journal.Numbered[journal.Close]
	closed, errs[4] = c.closes.take(id)
	for k := range closed {
		if !closed[k].Void {
			r.Closed = &closed[k]
		}
	}
	r.Given, errs[5] = c.given.take(id)
	if c.volumes != nil {
		r.Volumes, errs[6] = c.volumes.take(id)
	}
	return errors.Join(errs[:]...)
}

// records runs over the batches of a selection with all that hangs on them.
func (v *view) records(ctx context.Context, s selection) iter.Seq2[*journal.Record, error] {
	return func(yield func(*journal.Record, error) bool) {
		c, err := newChildren(ctx, v, s)
		defer c.close()
		if err != nil {
			yield(nil, err)
			return
		}
		var head journal.Record
		dest := append([]any{&head.Number}, batches.dest(&head.Batch)...)
		var reason sql.NullString
		if s.void {
			dest = append(dest, &reason)
		}
		err = v.each(ctx, s.batchSQL(), s.args, dest, func() error {
			r := head
			r.Void, r.VoidReason = reason.Valid, reason.String
			if err := c.fill(&r); err != nil {
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
