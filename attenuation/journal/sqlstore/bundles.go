package sqlstore

import (
	"context"
	"errors"
	"time"

	"gylebook/attenuation/journal"
)

// bundles hold one bundle a kind, nil for one that is not wanted.
type bundles struct {
	ogs      *bundle[journal.OG]
	limits   *bundle[journal.Limit]
	volumes  *bundle[journal.Volume]
	readings *bundle[journal.Reading]
	events   *bundle[journal.Event]
	given    *bundle[journal.Event]
	closes   *bundle[journal.Close]

	columns []string
	dest    []any
	args    []any
}

// newBundles takes what the selection asks for and a schema of this version has.
func newBundles(s selection, version int) *bundles {
	eventAt := func(e *journal.Event) time.Time { return e.At }
	b := &bundles{}
	b.events = add(b, s, events, eventAt)
	if s.moves {
		return b
	}
	b.given = add(b, s, given, eventAt)
	b.ogs = add(b, s, ogs, func(o *journal.OG) time.Time { return o.At })
	b.limits = add(b, s, limits, func(l *journal.Limit) time.Time { return l.At })
	b.closes = add(b, s, closes, func(c *journal.Close) time.Time { return c.At })
	if version >= volumesFrom {
		b.volumes = add(b, s, volumes, func(w *journal.Volume) time.Time { return w.At })
	}
	if s.last != noReadings {
		t := readings
		if s.lean {
			t = leanReadings
		}
		b.readings = add(b, s, t, func(r *journal.Reading) time.Time { return r.TakenAt })
	}
	return b
}

// add puts a bundle of one kind among those that are read.
func add[B journal.Body](b *bundles, s selection, t table[B], at func(*B) time.Time) *bundle[B] {
	one := newBundle(s, t, at)
	text, args := one.expression()
	b.columns, b.dest, b.args = append(b.columns, text), append(b.dest, &one.text), append(b.args, args...)
	return one
}

// fill takes what hangs on the record's batch.
func (b *bundles) fill(ctx context.Context, v *view, r *journal.Record) error {
	id := r.Batch.ID
	var errs [7]error
	var closed []journal.Numbered[journal.Close]
	r.OGs, errs[0] = b.ogs.take(ctx, v, id)
	r.Limits, errs[1] = b.limits.take(ctx, v, id)
	r.Volumes, errs[2] = b.volumes.take(ctx, v, id)
	r.Readings, errs[3] = b.readings.take(ctx, v, id)
	r.Events, errs[4] = b.events.take(ctx, v, id)
	r.Given, errs[5] = b.given.take(ctx, v, id)
	closed, errs[6] = b.closes.take(ctx, v, id)
	for k := range closed {
		if !closed[k].Void {
			r.Closed = &closed[k]
		}
	}
	for k := range r.Readings {
		r.Readings[k].Body.Batch = id // the lean ones come without it
	}
	return errors.Join(errs[:]...)
}
